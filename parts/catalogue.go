package parts

import (
	"fmt"

	"pinwright/parts/hardware"
	"pinwright/parts/job"
	"pinwright/parts/outline"
)

// What the parts ask of the catalogue of hardware.

// holeFor returns the hole that a pin asks for in a link or frame plate, about the origin: see
// job.Pin.HoleIn.
func holeFor(p job.Pin, part string, plate bool) (drilling, error) {
	if p.Kind == job.BearingPin && len(p.Seats) == 0 {
		return drilling{}, fmt.Errorf("the bearing of joint %s sits in no part: say in which, in: [...]", p.Joint)
	}
	spec := p.HoleIn(part, plate)
	kind := PinHole
	if spec.Kind == hardware.BearingSeat {
		kind = BearingSeat
	}
	size, err := hardware.Hole(spec)
	if err != nil {
		return drilling{}, fmt.Errorf("hole %s: %w", p.Joint, err)
	}
	return round(p.Joint, kind, p.Joint, outline.Point{}, size.Diameter), nil
}

// coverOf is the radius about a pin that a washer hides, mm; without one in the catalogue, the
// diameter of the hole.
func coverOf(p job.Pin, hole Hole) float64 {
	var w hardware.Washer
	var err error
	switch {
	case p.Washer == "" || p.Washer == "none":
		return hole.Diameter
	case p.Kind == job.ShaftPin:
		w, err = hardware.ShaftWasher(hardware.WasherKind(p.Washer), p.Shaft)
	default:
		w, err = hardware.WasherFor(hardware.WasherKind(p.Washer), p.Bolt)
	}
	if err != nil {
		return hole.Diameter
	}
	return max(w.Outside, hole.Diameter) / 2
}

// mountHole is the diameter of the mounting holes.
func mountHole(m job.Mount) (float64, error) {
	if m.Diameter > 0 {
		return m.Diameter, nil
	}
	size, err := hardware.BoltHole(m.Bolt, m.Fit)
	return size.Diameter, err
}
