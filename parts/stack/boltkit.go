package stack

import (
	"errors"
	"math"
	"slices"

	"pinwright/parts/hardware"
	"pinwright/parts/job"
)

// mostUnder is how many washers may be put under a nut so that a bolt is not too long, or so that its
// nut stays off the shank.
const mostUnder = 4

// boltKit stacks a kit on a bolt and chooses the bolt, with as few further washers under the nut as will
// do.
func (p *plan) boltKit(f *fitting, pl *pile) error {
	pl.put(Element{Kind: HeadElement, What: string(f.screw.Head) + " head", Thickness: f.screw.HeadHeight, Diameter: f.screw.HeadDiameter})
	face := pl.z
	pl.washer(f)
	if f.rodEnd != nil && f.pin.RodEnd == job.HeadSide {
		pl.ball(f)
		pl.washer(f)
	}
	if err := p.parts(f, pl); err != nil {
		return err
	}
	if f.rodEnd != nil && f.pin.RodEnd == job.NutSide {
		pl.washer(f)
		pl.ball(f)
	}
	if f.nut != nil {
		pl.washer(f)
	}
	var first error
	for under := range mostUnder + 1 {
		if under > 0 && (f.nut == nil || f.washer == nil || f.open || f.as != f.size) {
			break
		}
		try := *pl
		try.kit.Elements = slices.Clone(pl.kit.Elements)
		for range under {
			try.washer(f)
		}
		try.kit.Washers = under
		err := try.nut(f, face)
		if err == nil {
			*pl = try
			return nil
		}
		if first == nil {
			first = err
		}
		var long hardware.TooShortError
		if errors.As(err, &long) {
			break
		}
	}
	placed := fault(p.job, pinKey(p.job, f.pin.Joint), first.Error(), "")
	var long hardware.TooShortError
	if errors.As(first, &long) {
		return &LongError{f.pin.Joint, placed}
	}
	return placed
}

// nut closes a kit with its nut and chooses the bolt.
func (p *pile) nut(f *fitting, face float64) error {
	if f.nut != nil && f.turns() && (f.jam == nil || f.jamFirst()) {
		p.kit.Play += f.play()[1]
		p.z += f.play()[1]
	}
	p.kit.close()
	nutFace := p.z
	if f.nut != nil {
		p.put(f.nutElement(f.nut))
	}
	through, err := f.choose(p.kit.Budget, min(p.firstNut, p.kit.Budget.Least), f.turningTop(p.kit, face))
	if err != nil {
		return err
	}
	through.From, through.To = tidy(face), tidy(face+max(through.Length, math.Ceil(through.Need*10-slack)/10))
	if f.nut != nil {
		through.Past = tidy(through.To - nutFace - f.nut.Height)
	}
	p.kit.Through = through
	return nil
}

// turningTop is how far over the head's face the highest part reaches that turns on the bolt itself, mm.
func (f *fitting) turningTop(k Kit, face float64) float64 {
	top := 0.0
	for _, e := range k.Elements {
		if e.Kind == PartElement && f.turns() && !f.isClamped(e.Part) {
			top = max(top, e.To-face)
		}
	}
	return top
}

// turns tells whether links turn on the bolt itself. With a bearing, a sleeve or a rod end the bolt is
// tightened.
func (f *fitting) turns() bool { return f.pin.Kind == job.BoltPin || f.pin.Kind == job.ClampPin }
