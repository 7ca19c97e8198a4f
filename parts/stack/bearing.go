package stack

import (
	"errors"
	"fmt"
	"slices"
	"strings"

	"pinwright/parts/hardware"
)

// engagement is the part of a bearing's outer ring that must be held by its seat (judgement, no source):
// with less it tilts out.
const engagement = 0.5

// bearing puts the bearing into its seats, and takes a washer that stays off its outer ring.
func (f *fitting) bearing() error {
	b, err := hardware.BearingFor(f.pin.Bearing)
	if err != nil {
		return err
	}
	if d := f.diameter(); d > b.Bore {
		return fmt.Errorf("bolt %s of %g mm does not go through the bore of bearing %s, %g mm", f.size, d, b.Designation, b.Bore)
	}
	if len(f.pin.Seats) == 0 {
		return errors.New("no part is named that the bearing sits in")
	}
	for _, seat := range f.pin.Seats {
		i := slices.IndexFunc(f.members, func(m member) bool { return m.name == seat })
		if i < 0 {
			return fmt.Errorf("the bearing is to sit in %s, which is not on this joint", seat)
		}
		f.members[i].seat = &b
	}
	if err := f.engaged(b); err != nil {
		return err
	}
	if err := f.oneBody(func(m member) bool { return m.seat != nil }, "bearing"); err != nil {
		return err
	}
	if b.Other != 0 && b.Other != b.Width && !b.Shielded {
		f.notes = append(f.notes, fmt.Sprintf("Bearing %s is the open form, %g mm wide; the shielded %sZZ is %g mm wide: buy what the list says.", b.Designation, b.Width, b.Designation, b.Other))
	}
	if f.washer == nil {
		return nil
	}
	limit := b.InnerRing()
	if f.washer.Outside > limit && f.washer.Kind != hardware.SmallWasher {
		if small, err := hardware.WasherFor(hardware.SmallWasher, f.as); err == nil {
			f.washer = &small
		}
	}
	if f.washer.Outside > limit {
		f.notes = append(f.notes, fmt.Sprintf("Washer %s is %g mm wide and may rub on the outer ring of bearing %s, which begins at about %.1f mm: turn it down, or use shim rings as thick.", f.washer.Designation(), f.washer.Outside, b.Designation, limit))
	}
	f.spacer = min(f.spacer, limit)
	return f.enters(b)
}

// engaged checks that the seats hold enough of the outer ring behind a flange.
func (f *fitting) engaged(b hardware.Bearing) error {
	ring := b.Width - b.FlangeWidth
	for _, m := range f.members {
		if m.seat != nil && m.thickness < engagement*ring-slack {
			return fmt.Errorf("bearing %s is %g mm wide and %s %g mm thick: the seat holds %.0f %% of the ring, and it wants half: take a thinner bearing of that bore%s, or sheet of at least %g mm",
				b.Designation, b.Width, m.name, m.thickness, 100*m.thickness/ring, thinner(b, m.thickness), engagement*ring)
		}
	}
	return nil
}

// thinner names a bearing of the same bore that a sheet holds.
func thinner(b hardware.Bearing, sheet float64) string {
	for _, name := range hardware.Bearings() {
		o, err := hardware.BearingFor(name)
		if err == nil && o.Bore == b.Bore && o.Flange == 0 && sheet >= engagement*o.Width {
			return " (" + name + ")"
		}
	}
	return ""
}

// enters checks that washers go into the pocket that a bearing thinner than its part leaves.
func (f *fitting) enters(b hardware.Bearing) error {
	for _, m := range f.members {
		if m.seat != nil && m.top() < m.thickness-slack && f.washer.Outside >= b.Outside {
			return fmt.Errorf("bearing %s ends %.2f mm below the face of %s, and washer %s of %g mm does not go into its hole of %g mm: take washer: small, or a wider bearing",
				b.Designation, m.thickness-m.top(), m.name, f.washer.Designation(), f.washer.Outside, b.Outside)
		}
	}
	return nil
}

// oneBody checks that what the bolt clamps belongs together: two links beside the bearings or sleeves
// could not turn on each other.
func (f *fitting) oneBody(free func(member) bool, what string) error {
	clamped := ""
	for _, m := range f.members {
		if free(m) {
			continue
		}
		body := m.name
		if m.plate {
			body = "the frame"
		}
		if clamped != "" && clamped != body {
			return fmt.Errorf("the bolt clamps %s and %s together, and they could not turn on each other: give one of them a %s too (in: [%s, %s])",
				clamped, body, what, strings.Join(f.pin.Seats, ", "), m.name)
		}
		clamped = body
	}
	return nil
}
