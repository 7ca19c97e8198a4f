package stack

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"pinwright/parts/hardware"
	"pinwright/parts/job"
)

// remarks are what the assembler ought to know of a kit.
func (p *plan) remarks(f *fitting, k *Kit) {
	note := func(format string, args ...any) { k.Notes = append(k.Notes, fmt.Sprintf(format, args...)) }
	if f.pin.Kind != job.ShaftPin {
		switch {
		case f.nut == nil:
			note("No nut: the bolt holds by a thread in %s, or by what it is screwed into.", f.members[len(f.members)-1].name)
		case f.turns() && f.nut.Kind != hardware.LockNut:
			note("A %s nut on an axle works loose: lock it with a second one or with thread lock, leaving %g mm of play.", f.nut.Kind, f.play()[1])
		case f.turns():
			note("Tighten the nut and turn it back %s until the links move freely: %g to %g mm of play.", f.turnBack(), f.play()[0], f.play()[1])
		}
		p.onThread(f, k)
	}
	p.ofKind(f, k)
	if p.spacersUnsure(f, k) {
		note("The sheets between are taken at their nominal thickness: measure them before cutting the spacers, and say measured.")
	}
	if f.open {
		note("The frame is not in the job: add its thickness to the length.")
	}
	if f.movable {
		note("Adjustable pivot: when it is set, clamp it so that it does not creep in its slot.")
	}
	if f.pin.Kind == job.BearingPin && k.Play > slack {
		note("The bolt closes %.2f mm of gaps when it clamps the inner rings.", k.Play)
	}
	if f.washer == nil && len(f.members) > 1 {
		note("No washers: the parts rub on each other.")
	}
}

// spacersUnsure tells whether a kit has a spacer whose length follows a thickness that was not measured.
func (p *plan) spacersUnsure(f *fitting, k *Kit) bool {
	if !slices.ContainsFunc(k.Elements, func(e Element) bool { return e.Kind == SpacerElement }) {
		return false
	}
	first, last := f.members[0].plane, f.members[len(f.members)-1].plane
	return slices.ContainsFunc(p.planes, func(plane int) bool {
		return first <= plane && plane <= last && p.unsure[plane]
	})
}

// turnBack is how far a nut is turned back for the play wanted, in words: the play over the pitch, to
// 10 degrees.
func (f *fitting) turnBack() string {
	middle := (f.play()[0] + f.play()[1]) / 2
	return fmt.Sprintf("about %.0f degrees", 10*math.Round(36*middle/f.screw.Pitch))
}

// onThread says which parts turn on thread instead of on the shank.
func (p *plan) onThread(f *fitting, k *Kit) {
	if !f.turns() || k.Through.Length == 0 {
		return
	}
	shank := f.screw.Shank(k.Through.Length)
	if shank == 0 {
		k.Notes = append(k.Notes, "The bolt is threaded to the head: the links turn on thread.")
		return
	}
	var on []string
	for _, e := range k.Elements {
		if e.Kind == PartElement && !f.isClamped(e.Part) && e.To > k.Through.From+shank+slack {
			on = append(on, e.Part)
		}
	}
	if len(on) > 0 {
		k.Notes = append(k.Notes, fmt.Sprintf("The shank is %.1f mm long, as far as it is sure: %s on thread.", shank, turnsOn(on)))
	}
}

func turnsOn(names []string) string {
	if len(names) == 1 {
		return names[0] + " turns"
	}
	return strings.Join(names[:len(names)-1], ", ") + " and " + names[len(names)-1] + " turn"
}

// isClamped tells whether a part is the one that the bolt is clamped to.
func (f *fitting) isClamped(part string) bool { return f.jam != nil && part == f.pin.Clamped }

// ofKind is what is to be minded of sleeves, clamped bolts, shafts and washers put under a nut.
func (p *plan) ofKind(f *fitting, k *Kit) {
	note := func(format string, args ...any) { k.Notes = append(k.Notes, fmt.Sprintf(format, args...)) }
	for _, t := range k.Turning {
		note("%s turns on its sleeve with %.2f to %.2f mm of end play (%.2f to %.2f mm by root-sum-square): tighten the nut.",
			t.Part, t.Play.Least, t.Play.Most, t.Play.LikelyLeast, t.Play.LikelyMost)
		if t.Play.Most > f.play()[1]+slack {
			note("%s may have more play than the %g mm wanted: measure its sheet, or file the sleeve to it.", t.Part, f.play()[1])
		}
	}
	if f.jam != nil {
		between := "the head and the thin nut"
		if !f.jamFirst() {
			between = "the thin nut and the " + string(f.nut.Kind) + " nut"
		}
		note("Clamp %s between %s: the bolt turns with it, the others turn on the bolt.", f.pin.Clamped, between)
		if !f.jamFirst() {
			note("Set the thin nut so that the links move freely: %g to %g mm of play.", f.play()[0], f.play()[1])
		}
	}
	if f.rodEnd != nil {
		note("Tighten the nut: the rod end moves on its ball, not on the bolt.")
	}
	if f.pin.Kind == job.ShaftPin && slices.ContainsFunc(k.Elements, func(e Element) bool { return e.Kind == CollarElement }) {
		note("Set the %s with a feeler gauge: %g to %g mm of play at either end that has one.", f.keeperWord(), f.play()[0], f.play()[1])
	}
	if k.Washers > 0 {
		note("%d of the washers under the nut are there to take up the length of the bolt.", k.Washers)
	}
}

func (f *fitting) keeperWord() string {
	if f.pin.Retain == job.RingRetainer {
		return "push-on ring"
	}
	return "collar"
}
