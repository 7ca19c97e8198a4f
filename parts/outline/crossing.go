package outline

import (
	"math"
	"slices"
)

// crossings returns the points where the carriers of two curves cross or touch, at most two, whether
// or not they lie on the curves themselves. None for coincident carriers: there the ends of the
// curves say everything. A penetration of less than tol is a touch: one point in its middle.
func crossings(c, d *curve, tol float64) (pts [2]Point, n int) {
	if math.Abs(c.k) < math.Abs(d.k) {
		c, d = d, c
	}
	if c.k == 0 {
		return lineLine(c, d, tol)
	}
	// c is an arc. Reduce d to a line, g.q = e with q measured from c.a: d itself if it is straight,
	// else what is left of both circles when the quadratic term is taken out (the radical line).
	w := c.a.Sub(d.a)
	nc, nd := c.t.Left(), d.t.Left()
	g := Point{
		c.k*(d.k*w.X-nd.X) + d.k*nc.X,
		c.k*(d.k*w.Y-nd.Y) + d.k*nc.Y,
	}
	e := -c.k * (d.k/2*w.Dot(w) - nd.Dot(w))
	gl := g.Len()
	if d.k != 0 {
		// gl is the distance of the centres times both curvatures. Centres in one place: no crossing,
		// or one circle on top of the other.
		if gl <= tol*math.Abs(c.k*d.k) {
			return pts, 0
		}
	}
	if gl == 0 {
		return pts, 0
	}
	g = g.Scale(1 / gl)
	q0 := g.Scale(e / gl)
	u := g.Left()
	// Along the line, q = q0 + s u: k/2 s^2 - (n.u) s + k/2 |q0|^2 - n.q0 = 0.
	qa, qb, qc := c.k/2, -nc.Dot(u), c.k/2*q0.Dot(q0)-nc.Dot(q0)
	disc := qb*qb - 4*qa*qc
	// The middle of the two roots is where the curves are nearest or deepest.
	sm := -qb / (2 * qa)
	m := Point{c.a.X + q0.X + sm*u.X, c.a.Y + q0.Y + sm*u.Y}
	if math.Abs(c.left(m)) <= tol && math.Abs(d.left(m)) <= tol {
		pts[0] = m
		return pts, 1
	}
	if disc <= 0 {
		return pts, 0
	}
	q := -(qb + math.Copysign(math.Sqrt(disc), qb)) / 2
	s1, s2 := q/qa, qc/q
	for _, s := range [2]float64{s1, s2} {
		if !(math.Abs(s) <= 1e12) {
			continue
		}
		pts[n] = Point{c.a.X + q0.X + s*u.X, c.a.Y + q0.Y + s*u.Y}
		n++
	}
	return pts, n
}

func lineLine(c, d *curve, tol float64) (pts [2]Point, n int) {
	x := c.t.Cross(d.t)
	if math.Abs(x)*max(c.len, d.len) <= tol {
		return pts, 0 // they stay within the tolerance of parallel: their ends say everything
	}
	w := d.a.Sub(c.a)
	s := w.Cross(d.t) / x
	pts[0] = Point{c.a.X + s*c.t.X, c.a.Y + s*c.t.Y}
	return pts, 1
}

// on returns where p lies along the curve, if it lies on it within tol.
func (c *curve) on(p Point, tol float64) (s float64, ok bool) {
	if d := c.left(p); d > tol || d < -tol {
		return 0, false
	}
	s = c.param(p)
	if s < -tol || s > c.len+tol {
		return 0, false
	}
	return s, true
}

// commonPoints returns what two curves have in common, along c: see Segment.Intersect.
func commonPoints(c, d *curve, tol float64) []Point {
	type hit struct {
		s float64
		p Point
	}
	var hits []hit
	add := func(p Point) {
		s, ok := c.on(p, tol)
		if !ok {
			return
		}
		if _, ok := d.on(p, tol); !ok {
			return
		}
		for _, h := range hits {
			if h.p.Dist(p) <= 2*tol {
				return
			}
		}
		hits = append(hits, hit{s, p})
	}
	if c.len == 0 || d.len == 0 {
		if c.len == 0 {
			if _, l := d.nearest(c.a); l <= tol {
				return []Point{c.a}
			}
		} else if _, l := c.nearest(d.a); l <= tol {
			return []Point{d.a}
		}
		return nil
	}
	for _, p := range [4]Point{c.a, c.b, d.a, d.b} {
		add(p)
	}
	pts, n := crossings(c, d, tol)
	for _, p := range pts[:n] {
		add(p)
	}
	slices.SortFunc(hits, func(a, b hit) int {
		switch {
		case a.s < b.s:
			return -1
		case a.s > b.s:
			return 1
		}
		return 0
	})
	var out []Point
	for _, h := range hits {
		out = append(out, h.p)
	}
	return out
}
