package fit

import (
	"fmt"
	"math"
	"slices"

	"pinwright/parts/hardware"
	"pinwright/parts/job"
	"pinwright/parts/material"
)

// Hole is a hole that a pin of a job asks for: what goes through, what fit is wanted, and the finished
// size that the job aims at.
type Hole struct {
	Joint    string
	What     string // "bolt M4, medium", "bearing 624, press"
	Pin      Pin
	Window   Window
	Finished float64
}

// Holes are the holes that the pins of a job ask for, in the order of its pins; a bearing has its seat
// first and then the hole of its bolt in the other parts. Bores whose size the maker gives are not
// among them.
func Holes(j job.Job) ([]Hole, error) {
	var out []Hole
	for _, p := range j.Pins {
		var specs []hardware.Spec
		switch p.Kind {
		case job.BearingPin, job.SleevePin:
			if len(p.Seats) > 0 {
				specs = append(specs, p.HoleIn(p.Seats[0], false))
			}
			if p.Bolt != "" {
				specs = append(specs, p.HoleIn("", false))
			}
		case job.ClampPin:
			specs = append(specs, p.HoleIn("", false), p.HoleIn(p.Clamped, false))
		case job.ShaftPin:
			specs = append(specs, p.HoleIn("", false))
			if hardware.Tight(p.Fit, p.Clearance) && inPlate(j, p.Joint) {
				specs = append(specs, p.HoleIn("", true))
			}
		default:
			specs = append(specs, p.HoleIn("", false))
		}
		for _, s := range specs {
			h, err := HoleFor(s)
			if err != nil {
				return nil, fmt.Errorf("%s: joint %s: %w", j.At("pins."+p.Joint), p.Joint, err)
			}
			h.Joint = p.Joint
			out = append(out, h)
		}
	}
	return out, nil
}

// HoleFor states what a hole is for by pin, window and finished size.
func HoleFor(s hardware.Spec) (Hole, error) {
	size, err := hardware.Hole(s)
	if err != nil {
		return Hole{}, err
	}
	pin, err := PinFor(s)
	if err != nil {
		return Hole{}, err
	}
	h := Hole{What: pin.Name + ", " + s.Fit, Pin: pin, Finished: size.Diameter}
	if s.Clearance != nil {
		h.What = fmt.Sprintf("%s, clearance %s", pin.Name, mm(*s.Clearance))
		h.Window = given(*s.Clearance, size.Nominal, pin)
		return h, nil
	}
	if s.Kind == hardware.Bolt {
		h.Window, err = clearanceWindow(s.Fit, size, pin)
		return h, err
	}
	h.Window = zoneWindow(size, pin)
	return h, nil
}

// PinFor gives the limits of what goes through a hole.
func PinFor(s hardware.Spec) (Pin, error) {
	switch s.Kind {
	case hardware.Bolt:
		if hardware.IsInch(s.Size) {
			d, err := hardware.BoltDiameter(s.Size)
			return Pin{"bolt " + s.Size, d - 0.25, d - 0.02, "unified thread class 2A, about; from memory: measure yours"}, err
		}
		t, err := hardware.ThreadFor(s.Size)
		return Pin{"bolt " + s.Size, t.Least, t.Most, t.Source.String()}, err
	case hardware.BearingSeat:
		b, err := hardware.BearingFor(s.Size)
		if err != nil {
			return Pin{}, err
		}
		z, err := b.OutsideLimits()
		return Pin{"bearing " + s.Size, b.Outside + z.Lower, b.Outside + z.Upper, z.Source.String()}, err
	}
	// Ready-made shafts are ground to h6 or drawn to h9; the wider one is taken.
	z, err := hardware.ZoneOf("h9", s.Diameter)
	return Pin{"shaft " + mm(s.Diameter), s.Diameter + z.Lower, s.Diameter + z.Upper, "h9: " + z.Source.String()}, err
}

// clearanceWindow of a bolt that turns or passes: it binds with no clearance, and rattles when the hole
// is over what the class allows: H12 for fine, H13 for medium, H14 for coarse (ISO 273, from memory;
// IT13 and IT14 are ten times IT8 and IT9, ISO 286-1, from memory). The classes of inch bolts, close,
// normal and loose, are taken alike.
func clearanceWindow(class string, size hardware.HoleSize, pin Pin) (Window, error) {
	grade, times, name := "IT8", 10.0, "H13"
	switch class {
	case "fine", "close":
		grade, times, name = "IT12", 1, "H12"
	case "coarse", "loose":
		grade, times, name = "IT9", 10, "H14"
	}
	g, err := hardware.Grade(grade, size.Diameter)
	return Window{Binds: 0, Rattles: size.Diameter + times*g - pin.Least, Rule: size.Rule + ", hole " + name}, err
}

// zoneWindow of a class of ISO 286: what the class allows between its limits and those of the pin. A
// running or sliding fit binds only when there is no clearance at all.
func zoneWindow(size hardware.HoleSize, pin Pin) Window {
	w := Window{Binds: size.Nominal + size.Lower - pin.Most, Rattles: size.Nominal + size.Upper - pin.Least, Rule: size.Rule}
	w.Press = size.Upper <= 0
	if size.Lower >= 0 {
		w.Binds = min(w.Binds, 0)
	}
	return w
}

// given is the window of a clearance that the maker gives: with clearance, from none to twice as much;
// with interference, from twice as much to none; a tenth of a millimetre wide at least. The limits of
// the pin come on top. Judgement, no source.
func given(c, nominal float64, pin Pin) Window {
	half := max(math.Abs(c), 0.05)
	w := Window{Binds: c - half + nominal - pin.Most, Rattles: c + half + nominal - pin.Least, Press: c < 0, Rule: "clearance as given, +-" + mm(half)}
	if c >= 0 {
		w.Binds = min(w.Binds, 0)
	}
	return w
}

// Stress is the press fit of a pin in a foreseen hole at its tightest: the thickest pin in the tight
// end of a hole that is narrower than 97.5 % of them. The material round it is taken as wide as the rule
// of the material's rims asks for. ok is false where nothing presses or the theory does not hold.
func Stress(f Fit, sheet string, thickness float64) (p Press, ok bool) {
	e, known := ElasticOf(sheet)
	tight := f.Pin.Most - f.Low
	if !known || tight <= 0 {
		return Press{}, false
	}
	rim := f.Pin.Most / 3
	if m, err := material.Lookup(sheet); err == nil {
		rim = m.Rim(thickness, f.Pin.Most).Want
	}
	p, err := Lame(f.Pin.Most, 0, f.Pin.Most+2*rim, tight, e, steel)
	return p, err == nil
}

// inPlate tells whether a plate of the frame carries a joint.
func inPlate(j job.Job, joint string) bool {
	return j.Frame != nil && slices.ContainsFunc(j.Frame.Plates, func(p job.FramePlate) bool {
		return slices.Contains(p.Pivots, joint)
	})
}
