package parts

import (
	"fmt"
	"slices"

	"pinwright/parts/hardware"
	"pinwright/parts/job"
	"pinwright/parts/outline"
)

// What the parts ask of the catalogue of hardware.

// holeFor returns the hole that a pin asks for in a link or frame plate, about the origin: the seat of
// a bearing where it sits, else the clearance hole of the bolt or the fit of the shaft. The bolt
// through a bearing has the closest clearance hole in the other parts (fine, close): they are clamped, so
// that hole alone holds their place, and the pin's fit is the bearing's. In a plate of the frame a shaft
// always turns (hardware.PlateFit).
func holeFor(p job.Pin, part string, plate bool) (drilling, error) {
	spec := hardware.Spec{Fit: p.Fit, Clearance: p.Clearance}
	kind := PinHole
	switch {
	case p.Kind == job.BearingPin && slices.Contains(p.Seats, part):
		spec.Kind, spec.Size = hardware.BearingSeat, p.Bearing
		kind = BearingSeat
	case p.Kind == job.BearingPin && len(p.Seats) == 0:
		return drilling{}, fmt.Errorf("the bearing of joint %s sits in no part: say in which, in: [...]", p.Joint)
	case p.Kind == job.BearingPin:
		spec = hardware.Spec{Kind: hardware.Bolt, Size: p.Bolt, Fit: "fine"}
		if hardware.IsInch(p.Bolt) {
			spec.Fit = "close"
		}
	case p.Kind == job.ShaftPin:
		spec.Kind, spec.Diameter = hardware.Shaft, p.Shaft
		if plate {
			spec.Fit, spec.Clearance = hardware.PlateFit(spec.Fit, spec.Clearance)
		}
	default:
		spec.Kind, spec.Size = hardware.Bolt, p.Bolt
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
