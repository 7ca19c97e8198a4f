package hardware

import (
	"fmt"
	"slices"
)

// zone is a tolerance zone of ISO 286 over a range of diameters, deviations in micrometres.
type zone struct {
	kind         string // grade, hole, shaft
	class        string
	over, incl   float64
	upper, lower float64
	source       Source
}

func zoneOf(r *row) zone {
	return zone{
		kind: r.text("kind"), class: r.text("class"),
		over: r.number("over_mm"), incl: r.number("incl_mm"),
		upper: r.number("upper_um"), lower: r.number("lower_um"),
		source: r.source("ISO 286"),
	}
}

// Zone is the limits of a tolerance class at one diameter.
type Zone struct {
	Class        string
	Upper, Lower float64 // deviations from the nominal diameter, mm
	Source       Source
}

// Middle is the deviation in the middle of the zone, mm.
func (z Zone) Middle() float64 { return (z.Upper + z.Lower) / 2 }

// Limits gives the upper and lower deviation of a tolerance class of ISO 286-2 at a diameter, mm:
// hole classes have capitals ("H7"), shaft classes small letters ("h6"). The classes run from 1 mm
// to 50 mm inclusive; an unknown class is an error that lists them.
func Limits(class string, diameter float64) (upper, lower float64, err error) {
	z, err := ZoneOf(class, diameter)
	return z.Upper, z.Lower, err
}

// ZoneOf is Limits with where the figures come from.
func ZoneOf(class string, diameter float64) (Zone, error) {
	return find(class, diameter, "hole", "shaft")
}

// Grade gives the width of a standard tolerance grade of ISO 286-1 ("IT7") at a diameter over 0 up
// to 120 mm, mm.
func Grade(grade string, diameter float64) (float64, error) {
	z, err := find(grade, diameter, "grade")
	return z.Upper, err
}

// HoleClasses are the hole classes of the table, in its order.
func HoleClasses() []string { return classes("hole") }

// ShaftClasses are the shaft classes of the table, in its order.
func ShaftClasses() []string { return classes("shaft") }

func classes(kinds ...string) []string {
	c, err := read()
	if err != nil {
		return nil
	}
	var names []string
	for _, z := range c.zones {
		if slices.Contains(kinds, z.kind) && !slices.Contains(names, z.class) {
			names = append(names, z.class)
		}
	}
	return names
}

func find(class string, diameter float64, kinds ...string) (Zone, error) {
	c, err := read()
	if err != nil {
		return Zone{}, err
	}
	var least, most float64
	for _, z := range c.zones {
		if z.class != class || !slices.Contains(kinds, z.kind) {
			continue
		}
		if most == 0 {
			least = z.over
		}
		most = z.incl
		// The first row of the classes reads "from 1 up to and including 3".
		if diameter > z.over && diameter <= z.incl || diameter == z.over && z.over == 1 {
			return Zone{Class: class, Upper: z.upper / 1000, Lower: z.lower / 1000, Source: z.source}, nil
		}
	}
	if most == 0 {
		return Zone{}, unknown("tolerance class", class, classes(kinds...))
	}
	return Zone{}, fmt.Errorf("%s at %g mm: the table runs from %g to %g mm", class, diameter, least, most)
}
