package job

import (
	"slices"

	"pinwright/parts/hardware"
)

// HoleIn says what hole the pin asks for in a part on its joint: the seat of a bearing where it sits,
// the running fit of a sleeve in what turns on it, the clearance hole of a bolt, the fit of a shaft.
//
// What a bolt clamps beside a bearing, a sleeve or a rod end has the closest clearance hole (fine,
// close): that hole alone holds its place, and the pin's fit is that of the bearing or the sleeve. In
// a plate of the frame a shaft always turns (hardware.PlateFit).
func (p Pin) HoleIn(part string, plate bool) hardware.Spec {
	spec := hardware.Spec{Kind: hardware.Bolt, Size: p.Bolt, Fit: p.Fit, Clearance: p.Clearance}
	seated := slices.Contains(p.Seats, part)
	switch p.Kind {
	case BearingPin:
		if !seated {
			return p.closeHole()
		}
		spec.Kind, spec.Size = hardware.BearingSeat, p.Bearing
	case SleevePin:
		if !seated {
			return p.closeHole()
		}
		spec.Kind, spec.Size, spec.Diameter = hardware.Shaft, "", p.Sleeve
	case ClampPin:
		if part == p.Clamped {
			return p.closeHole()
		}
	case ShaftPin:
		spec.Kind, spec.Size, spec.Diameter = hardware.Shaft, "", p.Shaft
		if plate {
			spec.Fit, spec.Clearance = hardware.PlateFit(spec.Fit, spec.Clearance)
		}
	}
	return spec
}

// closeHole is the closest clearance hole of the bolt.
func (p Pin) closeHole() hardware.Spec {
	fit := "fine"
	if hardware.IsInch(p.Bolt) {
		fit = "close"
	}
	return hardware.Spec{Kind: hardware.Bolt, Size: p.Bolt, Fit: fit}
}
