package stack

import (
	"errors"
	"fmt"
	"math"

	"pinwright/parts/hardware"
	"pinwright/parts/job"
)

// ball looks up the rod end whose ball the bolt clamps.
func (f *fitting) ball() error {
	if hardware.IsInch(f.size) {
		return fmt.Errorf("rod end for bolt %s: %w", f.size, hardware.ErrInch)
	}
	if f.pin.RodEnd != job.HeadSide && f.pin.RodEnd != job.NutSide {
		return fmt.Errorf("the side of the rod end is %q: say rod-end: head or rod-end: nut", f.pin.RodEnd)
	}
	if f.nut == nil {
		return errors.New("the ball of a rod end is clamped by a nut: say nut: lock")
	}
	e, err := hardware.RodEndFor(f.diameter())
	if err != nil {
		return err
	}
	if f.washer == nil {
		return errors.New("without washers the eye of the rod end rubs on the link: take washer: none out")
	}
	f.rodEnd = &e
	tilt := e.Tilt(f.washer.Outside) * 180 / math.Pi
	f.notes = append(f.notes, fmt.Sprintf(
		"Between washers %s the rod end tilts by up to %.0f degrees each way; its sizes (ball %g mm, eye %g mm wide) are from memory: measure it.",
		f.washer.Designation(), math.Floor(tilt), e.Width, e.Eye))
	return f.oneBody(func(member) bool { return false }, "bearing")
}

// ballNarrow is how much narrower than nominal the ball may be (ISO 12240-4: 0/-120 um; from memory).
const ballNarrow = 0.12

func (p *pile) ball(f *fitting) {
	e := f.rodEnd
	p.put(Element{Kind: RodEndElement, What: e.Designation(), Thickness: e.Width, Diameter: e.Outside})
	p.kit.Budget.add(e.Width-ballNarrow, e.Width, e.Width)
}
