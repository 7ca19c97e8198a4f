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
//     again. If both strips are long compared with their overlap, the way from one end straight to the
//     other does as well and leaves fewer edges: the triangle that it cuts off is covered by both strips,
//     and no two such triangles overlap on one strip.
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
				box = box.Union(o.Bounds())
				size += 2 * len(o)
			}
		}
	}
	if d < 0 && 2*-d > min(box.Width(), box.Height())+tolerance {
		return nil
	}
	tol := toleranceFor(box.Grow(max(0, d)))
	return resolve(tol, size, func(w [2]int) bool { return w[0] >= 1 }, func(g *arrangement) {
		var buf []Vertex
		for _, r := range rs {
			for i, o := range r.Outlines() {
				if !o.usable() {
					continue
				}
				if (o.Area() < 0) == (i == 0 && len(r.Outer) > 0) {
					o = o.Reverse()
				}
				buf = rawOffset(buf[:0], o, d, tol)
				g.add(buf, 0)
			}
		}
	})
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

// rawOffset appends the raw curve of o at distance d to its right.
func rawOffset(buf []Vertex, o Outline, d, tol float64) []Vertex {
	n := len(o)
	cs := make([]curve, 0, n)
	for i := range o {
		if c := o.curve(i); c.len > 4*tol || c.a.Dist(c.b) > tol {
			cs = append(cs, c)
		}
	}
	for i := range cs {
		c := &cs[i]
		next := &cs[0]
		if i+1 < len(cs) {
			next = &cs[i+1]
		}
		a := Point{c.a.X + d*c.t.Y, c.a.Y - d*c.t.X}
		b := Point{c.b.X + d*c.u.Y, c.b.Y - d*c.u.X}
		if 1+d*c.k > 0 {
			buf = append(buf, Vertex{a, c.bulge})
		} else {
			buf = append(buf, Vertex{Point: a}, Vertex{Point: c.centre()})
		}
		start := Point{next.a.X + d*next.t.Y, next.a.Y - d*next.t.X}
		if b.Dist(start) <= tol/4 {
			continue // the segments go on in one direction
		}
		cross, dot := c.u.Cross(next.t), c.u.Dot(next.t)
		back := dot < 0 && math.Abs(cross) < 1e-9 // a cusp, in or out: a sector is right either way
		if cross*d > 0 || back {
			turn := math.Atan2(cross, dot)
			if turn*d < 0 {
				turn += math.Copysign(2*math.Pi, d)
			}
			buf = append(buf, Vertex{b, math.Tan(turn / 4)})
			continue
		}
		buf = append(buf, Vertex{Point: b})
		overlap := 2 * math.Abs(d*cross)
		if dot > 0.5 && c.strip(d) >= overlap && next.strip(d) >= overlap {
			continue
		}
		buf = append(buf, Vertex{Point: next.a})
	}
	return buf
}

// strip returns the shorter side of the strip between the curve and its offset, 0 when it ends at the
// centre.
func (c *curve) strip(d float64) float64 {
	return c.len * max(0, min(1, 1+d*c.k))
}
