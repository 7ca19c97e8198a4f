package outline

import "math"

// Offset by winding numbers.
//
// The material grown by d is the union of the material and, for every segment, the strip of all points
// on the way from the segment straight out to the distance d, and for every convex corner the sector of
// radius d between two strips: whatever lies within d of the material has its nearest point on a segment
// or at a convex corner, and lies on the way straight out from there. Every one of these pieces is run
// round counter-clockwise, so that in their sum the winding number counts how many pieces cover a point:
// it is at least 1 in the grown material, and 0 outside. Inner edges of the pieces cancel, and what is
// left of the sum is the raw curve (X.-Z. Liu et al., An offset algorithm for polyline curves, Computers
// in Industry 58, 2007, describe it for polylines with arcs):
//
//  1. Each line moved out by d, each arc with its radius changed by d about the same centre.
//  2. An arc whose radius would become negative: the strip ends at the centre, and the curve goes to the
//     centre and out again. No nearest way crosses a centre of curvature.
//  3. At a corner that is convex in the direction of the offset: an arc about the corner.
//  4. At a concave corner the sides of the two strips do not cancel: the curve goes to the corner and out
//     again. Where the strips are long compared with their overlap, the curve is shortened: to where the
//     two pieces cross, or, if the corner is so flat that this is badly determined, straight from one end
//     to the other. What is cut off so lies in both strips, near the corner, and takes one from a
//     winding number of at least 2; the cuts at both ends of a strip stay in their halves of it and so
//     never take away twice.
//
// Shrinking is growing of what is not material: the same curve with d negative, and the material is
// again where the winding number is at least 1.
//
// The points of the result are at exactly the distance d from the outline: lines and arcs are moved, never
// approximated. Time: that of the arrangement, O(n log n) for a curve with few crossings.

// Offset returns the regions grown by d (mm) on all sides, with round corners, or shrunk by -d if d is
// negative. Holes shrink when the material grows, and vanish when they are too small; regions may join,
// split or vanish. A circle stays a circle. Regions that overlap are united first.
func Offset(rs []Region, d float64) []Region {
	if math.IsNaN(d) || math.Abs(d) > largestCoordinate {
		return nil
	}
	if d == 0 || len(rs) > 1 && d < 0 && overlapping(rs) {
		rs = Union(rs...)
	}
	if d == 0 {
		return rs
	}
	box := EmptyBox()
	size := 0
	for _, r := range rs {
		for _, o := range r.Outlines() {
			if o.usable() {
				box = box.Union(o.looseBounds())
				size += len(o)
			}
		}
	}
	if d < 0 && 2*-d > min(box.Width(), box.Height())+tolerance {
		return nil
	}
	tol := toleranceFor(box.Grow(max(0, d)))
	raw := make([]Vertex, 0, 2*size+size/2)
	var ends []int
	for _, r := range rs {
		for i, o := range r.Outlines() {
			if !o.usable() {
				continue
			}
			if o.clockwise() == (i == 0 && len(r.Outer) > 0) {
				o = o.Reverse()
			}
			raw = rawOffset(raw, o, d, tol)
			ends = append(ends, len(raw))
		}
	}
	return resolve(tol, len(raw), func(w [2]int) bool { return w[0] >= 1 }, func(g *arrangement) {
		begin := 0
		for _, end := range ends {
			g.add(raw[begin:end], 0)
			begin = end
		}
	})
}

// looseBounds returns a box with the whole outline in it, cheaply.
func (o Outline) looseBounds() Box {
	b := EmptyBox()
	belly := 0.0
	for i, v := range o {
		b.add(v.Point)
		if v.Bulge != 0 {
			s := o.segment(i)
			belly = max(belly, s.A.Dist(s.B)*math.Abs(s.Bulge)/2)
		}
	}
	return b.Grow(belly)
}

// overlapping says whether the boxes of two regions meet.
func overlapping(rs []Region) bool {
	boxes := make([]Box, len(rs))
	for i, r := range rs {
		boxes[i] = r.Bounds()
	}
	met := false
	sweepPairs(boxes, tolerance, func(_, _ int32) { met = true })
	return met
}

// OffsetOutline returns the outline moved by d to its right: a counter-clockwise one grows, a clockwise
// one (a hole) shrinks. Usually that is one outline again, running the same way; it may be none, or
// several, and one that closes on itself leaves outlines of the other direction inside. Those that run
// the way of o come first.
func OffsetOutline(o Outline, d float64) []Outline {
	hole := o.Area() < 0
	if hole {
		o, d = o.Reverse(), -d
	}
	var same, other []Outline
	for _, r := range Offset([]Region{{Outer: o}}, d) {
		same = append(same, r.Outer)
		other = append(other, r.Holes...)
	}
	out := append(same, other...)
	if hole {
		for i := range out {
			out[i] = out[i].Reverse().Clean()
		}
	}
	return out
}

// RoundInside rounds concave corners with radius r and closes gaps narrower than 2r: out and in again.
func RoundInside(rs []Region, r float64) []Region {
	if !(r > 0) {
		return Offset(rs, 0)
	}
	return Offset(Offset(rs, r), -r)
}

// RoundOutside rounds convex corners with radius r and removes what is thinner than 2r: in and out again.
func RoundOutside(rs []Region, r float64) []Region {
	if !(r > 0) {
		return Offset(rs, 0)
	}
	return Offset(Offset(rs, -r), r)
}

// Stroke returns all places within r of the path: a bar of width 2r with round ends along it.
func Stroke(p Path, r float64) []Region {
	if len(p) < 2 || !(r > 0) || r > largestCoordinate {
		return nil
	}
	there := Outline(append([]Vertex(nil), p...))
	back := p.Reverse()
	there = append(there[:len(there)-1], back[:len(back)-1]...)
	if !there.usable() {
		return nil
	}
	tol := toleranceFor(there.Bounds().Grow(r))
	// A path without length is a disc.
	if there.Length() <= 2*tol {
		return []Region{{Outer: Circle(p[0].Point, r)}}
	}
	return resolve(tol, 4*len(there), func(w [2]int) bool { return w[0] >= 1 }, func(g *arrangement) {
		g.add(rawOffset(nil, there, r, tol), 0)
	})
}
