package outline

import (
	"cmp"
	"math"
	"slices"
)

// Thin returns the places where the material is narrower than width (mm): the middles of ThinPlaces.
func Thin(r Region, width float64) []Point {
	var out []Point
	for _, n := range ThinPlaces(r, width) {
		out = append(out, n.A.Lerp(n.B, 0.5))
	}
	return out
}

// opposite is the cosine of the angle between the inward normals of two edges from which on they count as
// facing each other: 120 degrees. Walls of a corner of 60 degrees or more do not: a corner gets narrow
// towards its tip without being thin.
const opposite = -0.5

// ThinPlaces returns where the material is narrower than width: the shortest ways through the material
// between two edges that face each other, narrowest first, no two of them closer than width.
//
// A place counts if the disc that fits there touches edges on both sides: if the way across leaves both
// edges into the material and their inward normals are at least 120 degrees apart. The tip of a convex
// corner of 60 degrees or more, sharp, chamfered or rounded, does not. A round end of less than width does,
// as does the web between two holes.
//
// Plan: every pair of segments whose boxes come within width gives its shortest way, every arc that turns
// by 120 degrees or more round the material its own diameter; those that fulfil the above are kept.
func ThinPlaces(r Region, width float64) []Nearest {
	if !(width > 0) {
		return nil
	}
	var cs []curve
	var boxes []Box
	type place struct{ outline, segment, n int }
	var at []place
	for i, o := range r.Outlines() {
		o = o.Clean()
		for k := range o {
			c := o.curve(k)
			cs = append(cs, c)
			boxes = append(boxes, c.box())
			at = append(at, place{i, k, len(o)})
		}
	}
	var found []Nearest
	keep := func(w Nearest, c, d *curve) {
		if !(w.Distance < width-tolerance) || w.Distance <= tolerance {
			return
		}
		way := w.B.Sub(w.A).Unit()
		nc, nd := c.inward(w.A), d.inward(w.B)
		// At the ends of the segments the way need not be square to them, but it must leave them inwards.
		if nc.Dot(nd) > opposite || way.Dot(nc) < 0.1 || way.Dot(nd) > -0.1 {
			return
		}
		if r.Locate(w.A.Lerp(w.B, 0.5)) == Outside {
			return
		}
		found = append(found, w)
	}
	for i := range cs {
		c := &cs[i]
		if c.k <= 0 || c.sweep() <= 2*math.Pi/3 {
			continue
		}
		// Material inside the arc: its diameter, square to the way from its middle to its centre.
		m, out := c.mid(), c.inward(c.mid()).Scale(1/c.k)
		centre, along := m.Add(out), out.Left()
		w := Nearest{Distance: 2 / c.k, A: centre.Sub(along), B: centre.Add(along)}
		if w.Distance < width-tolerance && r.Locate(centre) == Inside {
			found = append(found, w)
		}
	}
	sweepPairs(boxes, width, func(i, j int32) {
		if at[i].outline == at[j].outline {
			gap := (at[j].segment - at[i].segment + at[i].n) % at[i].n
			if gap == 1 || gap == at[i].n-1 {
				return // neighbours meet at their corner
			}
		}
		if boxes[i].distance2(boxes[j]) >= width*width {
			return
		}
		best := Nearest{Distance: math.Inf(1)}
		curveDistance(&cs[i], &cs[j], &best)
		middleOfParallel(&cs[i], &cs[j], &best)
		keep(best, &cs[i], &cs[j])
	})
	slices.SortFunc(found, func(a, b Nearest) int {
		return cmp.Or(cmp.Compare(a.Distance, b.Distance), cmp.Compare(a.A.Y+a.B.Y, b.A.Y+b.B.Y), cmp.Compare(a.A.X+a.B.X, b.A.X+b.B.X))
	})
	var out []Nearest
	for _, n := range found {
		m := n.A.Lerp(n.B, 0.5)
		if !slices.ContainsFunc(out, func(o Nearest) bool { return o.A.Lerp(o.B, 0.5).Dist(m) < width }) {
			out = append(out, n)
		}
	}
	return out
}

// inward returns the normal at p of the carrier on the left, where the material is.
func (c *curve) inward(p Point) Point {
	q := p.Sub(c.a)
	return Point{-c.t.Y - c.k*q.X, c.t.X - c.k*q.Y}.Unit()
}

// middleOfParallel moves the shortest way between two parallel lines to the middle of where they face each
// other.
func middleOfParallel(c, d *curve, best *Nearest) {
	if c.k != 0 || d.k != 0 || math.Abs(c.t.Cross(d.t)) > 1e-9 {
		return
	}
	s0, s1 := c.t.Dot(d.a.Sub(c.a)), c.t.Dot(d.b.Sub(c.a))
	lo, hi := max(0, min(s0, s1)), min(c.len, max(s0, s1))
	if lo >= hi {
		return
	}
	a := c.at((lo + hi) / 2)
	*best = Nearest{Distance: a.Dist(d.foot(a)), A: a, B: d.foot(a)}
}
