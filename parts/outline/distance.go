package outline

import (
	"math"
	"slices"
)

// Shortest ways between curves, exact on lines and arcs.
//
// Between two segments the shortest way ends at an end of one of them, or runs along a common normal:
// through both centres, or through the centre and square to the line. Between outlines every pair of
// segments is a candidate; pairs are skipped by their bounding boxes. The segments of the first
// outline are taken in the order of their boxes' distance from the second outline, so that a short way
// is found early and most of the rest is skipped: O(n log n + n k) with k small when the outlines are
// apart, O(n m) box tests at worst.

// Nearest returns the shortest way from the outline (its A) to p (its B). Infinite for an empty
// outline.
func (o Outline) Nearest(p Point) Nearest {
	best := Nearest{Distance: math.Inf(1), B: p}
	for _, c := range o.curves() {
		if b := c.box(); b.pointDistance2(p) >= best.Distance*best.Distance {
			continue
		}
		if f, d := c.nearest(p); d < best.Distance {
			best.Distance, best.A = d, f
		}
	}
	return best
}

// Nearest returns the shortest way from the path (its A) to p (its B). Infinite for an empty path.
func (p Path) Nearest(q Point) Nearest {
	best := Nearest{Distance: math.Inf(1), B: q}
	for _, s := range p.Segments() {
		if n := s.Nearest(q); n.Distance < best.Distance {
			best = n
		}
	}
	return best
}

// SegmentDistance returns the shortest way between two segments.
func SegmentDistance(s, t Segment) Nearest {
	c, d := s.curve(), t.curve()
	best := Nearest{Distance: math.Inf(1)}
	curveDistance(&c, &d, &best)
	return best
}

// curveDistance improves best by the shortest way from c to d.
func curveDistance(c, d *curve, best *Nearest) {
	try := func(p, q Point) {
		if l := p.Dist(q); l < best.Distance {
			*best = Nearest{Distance: l, A: p, B: q}
		}
	}
	for _, p := range [2]Point{c.a, c.b} {
		if q, l := d.nearest(p); l < best.Distance {
			*best = Nearest{Distance: l, A: p, B: q}
		}
	}
	for _, q := range [2]Point{d.a, d.b} {
		if p, l := c.nearest(q); l < best.Distance {
			*best = Nearest{Distance: l, A: p, B: q}
		}
	}
	if best.Distance == 0 || c.len == 0 || d.len == 0 {
		return
	}
	// Crossing: both ends of the way are one point.
	pts, n := crossings(c, d, 0)
	for _, p := range pts[:n] {
		if c.beside(p) && d.beside(p) {
			*best = Nearest{A: p, B: p}
			return
		}
	}
	// Common normals: take a point of one carrier, its foot on the other.
	switch {
	case c.k == 0 && d.k == 0:
	case d.k == 0:
		for _, p := range c.facing(d.t.Left()) {
			if c.beside(p) {
				if q := d.foot(p); d.beside(q) {
					try(p, q)
				}
			}
		}
	case c.k == 0:
		for _, q := range d.facing(c.t.Left()) {
			if d.beside(q) {
				if p := c.foot(q); c.beside(p) {
					try(p, q)
				}
			}
		}
	default:
		way := d.centre().Sub(c.centre()).Unit()
		if way == (Point{}) {
			return // concentric: the ends of the curves say all
		}
		for _, p := range c.facing(way) {
			if !c.beside(p) {
				continue
			}
			for _, q := range d.facing(way) {
				if d.beside(q) {
					try(p, q)
				}
			}
		}
	}
}

// facing returns the two points of a circle whose normal is along the unit direction n.
func (c *curve) facing(n Point) [2]Point {
	r := 1 / c.k
	left := c.t.Left()
	// Centre + n r, gathered so that for a nearly flat arc the large numbers cancel first.
	return [2]Point{
		{c.a.X + (left.X+n.X)*r, c.a.Y + (left.Y+n.Y)*r},
		{c.a.X + (left.X-n.X)*r, c.a.Y + (left.Y-n.Y)*r},
	}
}

// shape is a contour ready for many distance questions.
type shape struct {
	curves []curve
	boxes  []Box
	box    Box
}

func newShape(os ...Outline) shape {
	s := shape{box: EmptyBox()}
	for _, o := range os {
		for _, c := range o.curves() {
			b := c.box()
			s.curves = append(s.curves, c)
			s.boxes = append(s.boxes, b)
			s.box = s.box.Union(b)
		}
	}
	return s
}

// distance improves best by the shortest way from s to t.
func (s *shape) distance(t *shape, best *Nearest) {
	if s.box.Empty() || t.box.Empty() || s.box.distance2(t.box) >= best.Distance*best.Distance {
		return
	}
	type entry struct {
		d2 float64
		i  int
	}
	limit := best.Distance * best.Distance
	order := make([]entry, 0, len(s.curves))
	for i, b := range s.boxes {
		if d2 := b.distance2(t.box); d2 < limit {
			order = append(order, entry{d2, i})
		}
	}
	slices.SortFunc(order, func(a, b entry) int {
		switch {
		case a.d2 < b.d2:
			return -1
		case a.d2 > b.d2:
			return 1
		}
		return a.i - b.i
	})
	for _, e := range order {
		if e.d2 >= best.Distance*best.Distance {
			return
		}
		b := s.boxes[e.i]
		for j := range t.boxes {
			if b.distance2(t.boxes[j]) < best.Distance*best.Distance {
				curveDistance(&s.curves[e.i], &t.curves[j], best)
			}
		}
		if best.Distance == 0 {
			return
		}
	}
}

// OutlineDistance returns the shortest way between two curves: what they enclose does not count.
// Infinite if one is empty.
func OutlineDistance(a, b Outline) Nearest {
	s, t := newShape(a), newShape(b)
	best := Nearest{Distance: math.Inf(1)}
	s.distance(&t, &best)
	return best
}

// Between returns the shortest way between two regions, their holes taken into account: 0 if they
// touch or overlap, also if one lies within the material of the other. Infinite if one is empty.
func Between(a, b Region) Nearest {
	return EdgesOf(a).Between(EdgesOf(b))
}
