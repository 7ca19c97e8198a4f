package stack

import (
	"errors"
	"fmt"
	"slices"

	"pinwright/parts/hardware"
)

// clamp looks up the thin nut that clamps the bolt to a link: between its head and that nut when the link
// is the first of the stack, between that nut and the pin's own when it is the last.
func (f *fitting) clamp() error {
	if f.nut == nil {
		return errors.New("a bolt is clamped to a link by nuts: say nut: lock")
	}
	i := slices.IndexFunc(f.members, func(m member) bool { return m.name == f.pin.Clamped })
	switch {
	case i < 0:
		return fmt.Errorf("the bolt is to be clamped to %s, which is not on this joint", f.pin.Clamped)
	case len(f.members) < 2:
		return fmt.Errorf("the bolt is clamped to %s, and nothing turns on it", f.pin.Clamped)
	case i > 0 && i < len(f.members)-1:
		return fmt.Errorf("%s lies between %s and %s, and no nut can be reached there: give the link to which the bolt is clamped the lowest or the highest plane of the joint",
			f.pin.Clamped, f.members[i-1].name, f.members[i+1].name)
	}
	n, err := hardware.NutFor(hardware.ThinNut, f.as)
	if err != nil {
		return err
	}
	f.jam = &n
	f.members[i].clamped = true
	return nil
}

// jamUnder tells whether the thin nut lies between a member and the one before, and jamFirst on which side.
func (f *fitting) jamUnder(i int) bool {
	if f.jam == nil || i == 0 {
		return false
	}
	if f.jamFirst() {
		return i == 1
	}
	return i == len(f.members)-1
}

// jamFirst: the link to which the bolt is clamped is the first, so that the nut lies on it.
func (f *fitting) jamFirst() bool { return f.members[0].clamped }

// jamHeight is what the thin nut, its washer and, under a last link, the play of what turns take of the
// room under a member.
func (f *fitting) jamHeight(i int) float64 {
	if !f.jamUnder(i) {
		return 0
	}
	h := f.washerThickness() + f.jam.Height
	if !f.jamFirst() {
		h += f.play()[1]
	}
	return h
}

// nutElement is a nut as it lies on the bolt.
func (f *fitting) nutElement(n *hardware.Nut) Element {
	what := n.Designation()
	if f.as != f.size {
		what = fmt.Sprintf("%s nut %s", n.Kind, f.size)
	}
	return Element{Kind: NutElement, What: what, Thickness: n.Height, Diameter: n.Corners}
}

// putJam stacks the thin nut and the washer between it and the clamped link.
func (p *pile) putJam(f *fitting) {
	least := f.jam.Least
	if least == 0 {
		least = f.jam.Height
	}
	nut := func() {
		p.firstNut = min(p.firstNut, p.kit.Budget.Least)
		p.put(f.nutElement(f.jam))
		p.kit.Budget.add(least, f.jam.Height, f.jam.Height)
	}
	if f.jamFirst() {
		p.washer(f)
		nut()
		return
	}
	p.z += f.play()[1]
	p.kit.Play += f.play()[1]
	nut()
	p.washer(f)
}
