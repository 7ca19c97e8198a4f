package profile

import (
	"bytes"
	"fmt"
	"math"
	"strconv"

	"pinwright/kerf/estimate"
)

// what says in words what a figure is.
var what = map[estimate.Term]string{
	estimate.Kerf:     "full width of a straight cut",
	estimate.Holes:    "what holes have on top, at the size centre",
	estimate.Diameter: "times (centre / drawn - 1): more of it in smaller holes",
	estimate.Axis:     "kerf along x less kerf along y",
	estimate.Taper:    "opening at the top less at the bottom",
	estimate.Scatter:  "standard deviation from hole to hole",
	estimate.Repeat:   "standard deviation of measuring",
	estimate.DropsAt:  "clearance from which a pin drops",
	estimate.PushAt:   "how much too thick a pin can be pushed in",
}

// Write writes the profile as YAML: the same profile gives the same bytes. Figures are rounded to a
// hundredth of a micrometre. An error when the profile is not sound.
func (p Profile) Write() ([]byte, error) {
	if err := p.sound(); err != nil {
		return nil, err
	}
	var b bytes.Buffer
	say := func(format string, args ...any) { fmt.Fprintf(&b, format, args...) }
	say("# What a laser does to a sheet, from readings of a coupon. Lengths are mm; low and high are the ends\n# of the 95 %% interval.\n")
	say("profile: 1\nmaterial: %s\nthickness: %s\n", strconv.Quote(p.Material), number(p.Thickness))
	if p.Laser != "" {
		say("laser: %s\n", strconv.Quote(p.Laser))
	}
	if p.Date != "" {
		say("date: %q\n", p.Date)
	}
	say("readings: %d\nfeatures: %d\nfreedom: %s\n", p.Readings, p.Features, number(p.Freedom))
	if p.Largest > 0 {
		say("holes: {centre: %s, smallest: %s, largest: %s}\n", number(p.Centre), number(p.Smallest), number(p.Largest))
	}
	say("figures:\n")
	for _, f := range p.Figures {
		say("  %s: {value: %s, se: %s, low: %s, high: %s}   # %s\n", f.Term, number(f.Value), number(f.SE), number(f.Low), number(f.High), what[f.Term])
	}
	say("covariance:   # of the figures but spreads and thresholds, in their order, mm2\n")
	for _, row := range p.Covariance {
		say("  - [")
		for i, v := range row {
			if i > 0 {
				say(", ")
			}
			say("%s", small(v))
		}
		say("]\n")
	}
	return b.Bytes(), nil
}

// number writes to a hundredth of a micrometre.
func number(v float64) string {
	switch {
	case math.IsInf(v, 1):
		return ".inf"
	case math.IsInf(v, -1):
		return "-.inf"
	}
	v = math.Round(v*1e5) / 1e5
	if v == 0 {
		v = 0 // no minus
	}
	return strconv.FormatFloat(v, 'f', -1, 64)
}

// small writes to four digits.
func small(v float64) string {
	if v == 0 {
		return "0"
	}
	return strconv.FormatFloat(v, 'e', 3, 64)
}
