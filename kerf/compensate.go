package kerf

import (
	"errors"
	"fmt"
	"math"

	"pinwright/parts/outline"
)

// Compensate returns the way of the beam's centre so that the part comes out at finished size: the
// outer outline moved out by half the beam's width, every hole moved in by half of it, exactly.
//
// holeNames are the names of the region's holes, in their order, for messages; name is the part's.
// A beam of width 0 leaves everything as it is. What a round beam cannot make is an error, all of them
// joined, each an *Error with the feature's name:
//
//   - a hole or slot narrower than the beam, as a whole or at a neck;
//   - a notch in the outer outline narrower than the beam.
//
// A sharp inside corner (of a slot, a hexagon, a notch) comes out with the radius of the beam and is no
// error: that is as sharp as it gets.
func Compensate(name string, r outline.Region, holeNames []string, b Beam) (Cut, error) {
	if err := b.usable(); err != nil {
		return Cut{}, fmt.Errorf("%s: %w", name, err)
	}
	if len(holeNames) != len(r.Holes) {
		return Cut{}, fmt.Errorf("%s: %d holes with %d names", name, len(r.Holes), len(holeNames))
	}
	if err := r.Validate(); err != nil {
		return Cut{}, fmt.Errorf("%s: no part can be cut to this outline: %w", name, err)
	}
	if b.Width == 0 {
		return Cut{Outside: r.Outer, Inside: r.Holes}, nil
	}
	var errs []error
	outside, fault := path(r.Outer, b)
	if fault != nil {
		fault.Part, fault.Feature = name, "outside"
		errs = append(errs, fault)
	}
	c := Cut{Outside: outside}
	for i, h := range r.Holes {
		inside, fault := path(h, b)
		if fault != nil {
			fault.Part, fault.Feature = name, holeNames[i]
			errs = append(errs, fault)
		}
		c.Inside = append(c.Inside, inside)
	}
	if len(errs) > 0 {
		return Cut{}, errors.Join(errs...)
	}
	return c, nil
}

// path moves one outline to its right, outer ones out and holes in, and checks that the beam makes it.
func path(o outline.Outline, b Beam) (outline.Outline, *Error) {
	hole := o.Area() < 0
	half := b.Width / 2
	moved := outline.OffsetOutline(o, half)
	switch {
	case len(moved) == 0:
		size, at := width(o)
		return nil, &Error{At: at, Size: size, Beam: b.Width, what: fmt.Sprintf(
			"is %s mm wide, the beam takes %s mm: make it at least %s mm, or leave it out",
			millimetres(size), millimetres(b.Width), millimetres(roomFor(b)))}
	case len(moved) > 1 && hole:
		return nil, narrow(o, moved, b, "its path falls into pieces")
	case len(moved) > 1:
		return nil, narrow(o, moved, b, "its path closes on itself")
	}
	// A sharp corner of the angle a keeps (1/sin(a/2) - 1) times the beam's radius: less than one
	// radius from 60 degrees up. More is a slit that the beam does not enter.
	if back := run(moved[0], b); len(back) != 1 || outline.HausdorffDistance(o, back[0]) > half {
		return nil, narrow(o, moved, b, "the beam does not go into it")
	}
	return moved[0], nil
}

// run moves a path back by the beam's radius: the edge that the beam leaves.
func run(path outline.Outline, b Beam) []outline.Outline {
	return outline.OffsetOutline(path, -b.Width/2)
}

// roomFor is what to ask for instead of a feature that is too narrow: a tenth wider than the beam, in
// tenths of a millimetre.
func roomFor(b Beam) float64 { return math.Ceil(b.Width*11-1e-9) / 10 }

// narrow finds the place of an outline that the beam cannot make: of all points of the outline the one
// that is furthest from what the beam leaves.
func narrow(o outline.Outline, moved []outline.Outline, b Beam, what string) *Error {
	var edges outline.Region
	for _, m := range moved {
		edges.Holes = append(edges.Holes, run(m, b)...)
	}
	left := outline.EdgesOf(edges)
	e := &Error{Beam: b.Width}
	worst := -1.0
	for _, s := range o.Segments() {
		for i := range 17 {
			p := s.At(float64(i) / 16)
			if d := left.Nearest(p).Distance; d > worst && !math.IsInf(d, 1) {
				worst, e.At = d, p
			}
		}
	}
	e.Size = gapAt(o, e.At, b)
	e.what = fmt.Sprintf("is narrower than the beam (%s mm, the beam takes %s mm): %s; make it at least %s mm wide there",
		millimetres(e.Size), millimetres(b.Width), what, millimetres(roomFor(b)))
	return e
}

// gapAt is how wide the opening beside the outline is near a point: the least way across it that
// starts within a beam's width of the point, at most the beam's width.
func gapAt(o outline.Outline, at outline.Point, b Beam) float64 {
	gap := b.Width
	// The opening is the material of the outline turned inside out; holes are open inside.
	open := outline.Region{Outer: o}
	if o.Area() < 0 {
		open.Outer = o.Reverse()
	} else {
		box := o.Bounds().Grow(10 * b.Width)
		open = outline.Region{Outer: box.Outline(), Holes: []outline.Outline{o.Reverse()}}
	}
	near := math.Inf(1)
	for _, n := range outline.ThinPlaces(open, b.Width) {
		d := min(n.A.Dist(at), n.B.Dist(at))
		if d < near {
			near, gap = d, n.Distance
		}
	}
	return gap
}

// width returns how wide an outline is at its widest, mm: the diameter of the largest disc in it,
// to a ten-thousandth, and the middle of what is left when it is moved in by nearly as much.
func width(o outline.Outline) (float64, outline.Point) {
	in := o
	if o.Area() > 0 {
		in = o.Reverse()
	}
	if c, r, ok := o.AsCircle(); ok {
		return 2 * r, c
	}
	low, high := 0.0, min(o.Bounds().Width(), o.Bounds().Height())/2+1e-3
	at := o.Bounds().Centre()
	for high-low > 5e-5 {
		middle := (low + high) / 2
		if left := outline.OffsetOutline(in, middle); len(left) > 0 {
			low, at = middle, left[0].Bounds().Centre()
		} else {
			high = middle
		}
	}
	return 2 * low, at
}
