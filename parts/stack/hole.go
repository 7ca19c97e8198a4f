package stack

import (
	"fmt"
	"slices"

	"pinwright/parts/hardware"
	"pinwright/parts/job"
)

// HoleFor gives the finished hole that a pin asks for in a part, which is named by its link or frame
// plate: the seat of the bearing in the parts that carry it, the hole of bolt or shaft in the others.
// What the bolt of a bearing clamps has the closest clearance hole (fine, close), because its place is
// held by that hole alone.
func HoleFor(pin job.Pin, part string) (hardware.HoleSize, error) {
	spec := hardware.Spec{Kind: hardware.Bolt, Size: pin.Bolt, Fit: pin.Fit, Clearance: pin.Clearance}
	switch pin.Kind {
	case job.ShaftPin:
		spec.Kind, spec.Diameter = hardware.Shaft, pin.Shaft
	case job.BearingPin:
		if slices.Contains(pin.Seats, part) {
			spec.Kind, spec.Size = hardware.BearingSeat, pin.Bearing
			break
		}
		spec.Fit, spec.Clearance = "fine", nil
		if hardware.IsInch(pin.Bolt) {
			spec.Fit = "close"
		}
	}
	h, err := hardware.Hole(spec)
	if err != nil {
		return hardware.HoleSize{}, fmt.Errorf("joint %s, hole in %s: %w", pin.Joint, part, err)
	}
	return h, nil
}
