package job

import (
	"errors"
	"slices"
	"strings"

	"pinwright/parts/hardware"
	"pinwright/parts/material"
)

// What the reader asks the catalogues of hardware and materials; nothing else in the package knows a
// size.

func boltNames() []string { return hardware.BoltSizes() }

func boltDiameter(name string) (float64, bool) {
	mm, err := hardware.BoltDiameter(name)
	return mm, err == nil
}

// boltFor is the metric bolt that fills a bore, "" when there is none.
func boltFor(bore float64) string {
	for _, name := range hardware.BoltSizes() {
		if mm, ok := boltDiameter(name); ok && mm == bore && strings.HasPrefix(name, "M") {
			return name
		}
	}
	return ""
}

func bearingNames() []string { return hardware.Bearings() }

func bearingBore(name string) (float64, bool) {
	b, err := hardware.BearingFor(name)
	return b.Bore, err == nil
}

func isHoleClass(name string) bool { return slices.Contains(hardware.HoleClasses(), name) }

// material reads the name of a material, which must be one that may be lasered.
func (r *reader) material(v *value) string {
	if !v.ok() {
		return ""
	}
	_, err := material.Lookup(v.text)
	var no material.RefusedError
	switch {
	case errors.As(err, &no):
		r.fail(v.at, "take another material", "%s must not go into a laser: %s", short(v.text), no.Reason)
	case err != nil:
		hint := meant(v.text, material.Names())
		if hint == "" {
			hint = "the materials are " + allOf(material.Names())
		}
		r.fail(v.at, hint, "unknown material %s", short(v.text))
	}
	return v.text
}

// usualGrain is how parts of a material may be turned when the job does not say.
func usualGrain(v *value) string {
	m, err := material.Lookup(v.textOr(""))
	if err != nil {
		return string(NoGrain)
	}
	return m.Grain
}
