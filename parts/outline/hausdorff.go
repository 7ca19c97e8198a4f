package outline

import "math"

// HausdorffDistance returns how far two curves are from being the same: the largest distance from a point of
// either to the other, mm. The result is never too small, and too large by at most 1e-10 mm plus a
// millionth of itself. Infinite if exactly one outline is empty.
//
// Plan (branch and bound; Lipschitz argument):
//
//  1. The distance from a point to the other outline is the smallest of those to its segments, so over a piece of
//     curve it is at most the largest distance to any one segment, taken alone. That one is known exactly:
//     along a line or arc, the distance to a line or arc has its extremes at the piece's ends, where the
//     piece is square to the way to the segment's carrier or ends, or on the line half way between the
//     segment's ends.
//  2. It is also at most the distance at the middle plus half the length of the piece.
//  3. The distance at a point of a piece is a lower bound. Pieces whose upper bound is not above the best
//     lower bound are done; the others are halved.
//
// Two outlines that are nearly the same have segments in pairs, and step 1 settles each pair at once.
func HausdorffDistance(a, b Outline) float64 {
	s, t := newShape(a), newShape(b)
	if len(s.curves) == 0 || len(t.curves) == 0 {
		if len(s.curves) == len(t.curves) {
			return 0
		}
		return math.Inf(1)
	}
	return max(s.excess(&t, 0), t.excess(&s, 0))
}

// Excess returns how far a strays from b: the largest distance from a point of a to the curve b. See
// HausdorffDistance.
func Excess(a, b Outline) float64 {
	s, t := newShape(a), newShape(b)
	switch {
	case len(s.curves) == 0:
		return 0
	case len(t.curves) == 0:
		return math.Inf(1)
	}
	return s.excess(&t, 0)
}

func (s *shape) excess(t *shape, low float64) float64 {
	for i := range s.curves {
		low = max(low, t.distanceTo(s.curves[i].a))
	}
	high := low
	// The stack grows by one for each halving, so its depth is bounded by the depth of the halving.
	type piece struct {
		c     curve
		depth int
	}
	var stack []piece
	for i := range s.curves {
		stack = append(stack[:0], piece{s.curves[i], 0})
		for len(stack) > 0 {
			p := stack[len(stack)-1]
			stack = stack[:len(stack)-1]
			m := p.c.mid()
			dm := t.distanceTo(m)
			low = max(low, dm)
			target := low*(1+1e-6) + 1e-10
			up := dm + p.c.len/2
			if up > target {
				for j := range t.curves {
					if t.boxes[j].pointDistance2(m) > up*up {
						continue
					}
					if l := farthest(&p.c, &t.curves[j]); l < up {
						up = l
						if up <= target {
							break
						}
					}
				}
			}
			if up <= target || p.depth > 60 {
				high = max(high, min(up, target))
				continue
			}
			half := p.c.part(0, p.c.len/2)
			stack = append(stack,
				piece{newCurve(m, p.c.b, half), p.depth + 1},
				piece{newCurve(p.c.a, m, half), p.depth + 1})
		}
	}
	return max(high, low)
}

// distanceTo returns the distance from p to the nearest curve.
func (s *shape) distanceTo(p Point) float64 {
	best := math.Inf(1)
	for j := range s.curves {
		if s.boxes[j].pointDistance2(p) >= best*best {
			continue
		}
		if _, d := s.curves[j].nearest(p); d < best {
			best = d
		}
	}
	return best
}

// farthest returns the largest distance from a point of c to the curve d.
func farthest(c, d *curve) float64 {
	best := 0.0
	try := func(p Point) {
		_, l := d.nearest(p)
		best = max(best, l)
	}
	on := func(p Point) {
		if c.beside(p) {
			try(p)
		}
	}
	try(c.a)
	try(c.b)
	if c.len == 0 {
		return best
	}
	// Square to the carrier of d, and to the ways to its ends.
	if c.k != 0 {
		centre := c.centre()
		ways := [3]Point{d.t.Left(), d.a.Sub(centre).Unit(), d.b.Sub(centre).Unit()}
		if d.k != 0 {
			ways[0] = d.centre().Sub(centre).Unit()
		}
		for _, w := range ways {
			if w == (Point{}) {
				continue
			}
			for _, p := range c.facing(w) {
				on(p)
			}
		}
	} else if d.k != 0 {
		on(c.foot(d.centre()))
	}
	// Half way between the ends of d.
	if w := d.b.Sub(d.a); w != (Point{}) {
		half := newCurve(d.a.Lerp(d.b, 0.5), d.a.Lerp(d.b, 0.5).Add(w.Left()), 0)
		pts, n := crossings(c, &half, 0)
		for _, p := range pts[:n] {
			on(p)
		}
	}
	return best
}
