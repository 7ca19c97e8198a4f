package outline

import "math"

// curve is a segment prepared for arithmetic: a piece of constant curvature given by its start, its
// first direction, its curvature and its length. Lines are curvature 0, and nothing below divides by
// the curvature or goes through a centre, so that a nearly flat arc with a radius of kilometres is as
// exact as a line.
//
// With q = p - a and the left normal n at a, the carrier (the whole line or circle) is
//
//	h(p) = n.q - k/2 |q|^2 = 0,
//
// h is positive on the left, and the signed distance is 2h / (1 + sqrt(1 - 2kh)).
type curve struct {
	a, b  Point
	t, u  Point   // unit tangents at a and at b
	k     float64 // curvature, 1/mm, positive when it turns left
	len   float64 // length along the curve, mm
	bulge float64
}

// newCurve prepares the segment from a to b. The length is 0 when a and b are the same.
func newCurve(a, b Point, bulge float64) curve {
	d := b.Sub(a)
	l := d.Len()
	c := curve{a: a, b: b, len: l}
	if l == 0 {
		return c
	}
	dir := Point{d.X / l, d.Y / l}
	if math.Abs(bulge) < smallestBulge {
		c.t, c.u = dir, dir
		return c
	}
	// Half the sweep has the cosine (1-b^2)/(1+b^2) and the sine 2b/(1+b^2).
	f := 1 / (1 + bulge*bulge)
	cos, sin := (1-bulge*bulge)*f, 2*bulge*f
	c.t, c.u = dir.rot(cos, -sin), dir.rot(cos, sin)
	c.k = 2 * sin / l
	c.len = 4 * math.Atan(bulge) / c.k
	c.bulge = bulge
	return c
}

// sweep returns the angle turned along the curve, positive counter-clockwise.
func (c *curve) sweep() float64 { return c.k * c.len }

// height returns h of the carrier at p.
func (c *curve) height(p Point) float64 {
	qx, qy := p.X-c.a.X, p.Y-c.a.Y
	return c.t.X*qy - c.t.Y*qx - c.k/2*(qx*qx+qy*qy)
}

// left returns the signed distance of p from the carrier, positive on the left.
func (c *curve) left(p Point) float64 {
	h := c.height(p)
	if c.k == 0 {
		return h
	}
	return 2 * h / (1 + math.Sqrt(max(0, 1-2*c.k*h)))
}

// at returns the point at the distance s along the curve from its start.
func (c *curve) at(s float64) Point {
	if c.k == 0 {
		return Point{c.a.X + s*c.t.X, c.a.Y + s*c.t.Y}
	}
	half := c.k * s / 2
	sin, cos := math.Sincos(half)
	chord := s
	if half != 0 {
		chord = s * (sin / half)
	}
	d := c.t.rot(cos, sin)
	return Point{c.a.X + chord*d.X, c.a.Y + chord*d.Y}
}

// mid returns the point half way along the curve.
func (c *curve) mid() Point {
	m := c.a.Lerp(c.b, 0.5)
	if c.k == 0 {
		return m
	}
	// The sagitta is bulge times half the chord, to the right of a left turn.
	d := c.b.Sub(c.a)
	return Point{m.X + c.bulge/2*d.Y, m.Y - c.bulge/2*d.X}
}

// tangent returns the unit direction at the distance s.
func (c *curve) tangent(s float64) Point {
	if c.k == 0 {
		return c.t
	}
	sin, cos := math.Sincos(c.k * s)
	return c.t.rot(cos, sin)
}

// param returns how far along the curve the foot of p on the carrier lies: negative before the
// start, more than the length after the end. On a circle it is the turn that leaves the curve least.
func (c *curve) param(p Point) float64 {
	q := p.Sub(c.a)
	along := c.t.Dot(q)
	if c.k == 0 {
		return along
	}
	s := math.Atan2(c.k*along, 1-c.k*c.t.Cross(q)) / c.k
	if s >= 0 && s <= c.len {
		return s
	}
	turn := 2 * math.Pi / math.Abs(c.k)
	if s < 0 {
		if over := s + turn - c.len; over < -s {
			return s + turn
		}
		return s
	}
	if before := turn - s; before < s-c.len {
		return s - turn
	}
	return s
}

// beside says whether a point of the carrier lies between the ends of the curve.
func (c *curve) beside(p Point) bool {
	if c.k == 0 {
		s := c.t.Dot(p.Sub(c.a))
		return s >= 0 && s <= c.len
	}
	// A circle is cut by the chord; the arc is the part on the right of the chord of a left turn.
	side := c.b.Sub(c.a).Cross(p.Sub(c.a))
	return side <= 0 == (c.k > 0) || side == 0
}

// foot returns the point of the carrier nearest to p.
func (c *curve) foot(p Point) Point {
	q := p.Sub(c.a)
	if c.k == 0 {
		s := c.t.Dot(q)
		return Point{c.a.X + s*c.t.X, c.a.Y + s*c.t.Y}
	}
	g := Point{-c.t.Y - c.k*q.X, c.t.X - c.k*q.Y}
	l := g.Len()
	if l < 1e-14 {
		return c.mid() // p is the centre: every point is as near
	}
	d := c.left(p) / l
	return Point{p.X - d*g.X, p.Y - d*g.Y}
}

// nearest returns the point of the curve nearest to p, and the distance.
func (c *curve) nearest(p Point) (Point, float64) {
	if c.len == 0 {
		return c.a, c.a.Dist(p)
	}
	if f := c.foot(p); c.beside(f) {
		return f, f.Dist(p)
	}
	da, db := c.a.Dist(p), c.b.Dist(p)
	if da <= db {
		return c.a, da
	}
	return c.b, db
}

// centre returns the centre of an arc; not to be asked of a line.
func (c *curve) centre() Point {
	if math.Abs(c.bulge) == 1 {
		return c.a.Lerp(c.b, 0.5)
	}
	// From the middle of the chord rather than from an end: the errors of both ends halve.
	d := c.b.Sub(c.a)
	f := (1 - c.bulge*c.bulge) / (4 * c.bulge)
	return Point{(c.a.X+c.b.X)/2 - f*d.Y, (c.a.Y+c.b.Y)/2 + f*d.X}
}

// box returns the bounding box.
func (c *curve) box() Box {
	b := Box{
		Min: Point{min(c.a.X, c.b.X), min(c.a.Y, c.b.Y)},
		Max: Point{max(c.a.X, c.b.X), max(c.a.Y, c.b.Y)},
	}
	if c.k == 0 {
		return b
	}
	if math.Abs(c.bulge) < 0.05 {
		// A flat arc has one extreme in an axis at most, where its tangent turns through it; its centre is
		// too far away to find it from there.
		if c.t.Y*c.u.Y < 0 {
			b.add(c.at(math.Atan2(-math.Copysign(c.t.Y, c.t.X*c.t.Y), math.Abs(c.t.X)) / c.k))
		}
		if c.t.X*c.u.X < 0 {
			b.add(c.at(math.Atan2(math.Copysign(c.t.X, c.t.X*c.t.Y), math.Abs(c.t.Y)) / c.k))
		}
		return b
	}
	// A quarter point of the circle counts if it lies on the arc.
	r := 1 / c.k
	n := c.t.Left()
	r2 := math.Abs(r)
	if e := (Point{c.a.X + n.X*r, c.a.Y + n.Y*r - r2}); c.beside(e) {
		b.Min.Y = min(b.Min.Y, e.Y)
	}
	if e := (Point{c.a.X + n.X*r, c.a.Y + n.Y*r + r2}); c.beside(e) {
		b.Max.Y = max(b.Max.Y, e.Y)
	}
	if e := (Point{c.a.X + n.X*r - r2, c.a.Y + n.Y*r}); c.beside(e) {
		b.Min.X = min(b.Min.X, e.X)
	}
	if e := (Point{c.a.X + n.X*r + r2, c.a.Y + n.Y*r}); c.beside(e) {
		b.Max.X = max(b.Max.X, e.X)
	}
	return b
}

// reverse returns the curve run backwards.
func (c *curve) reverse() curve {
	return curve{
		a: c.b, b: c.a, t: c.u.Scale(-1), u: c.t.Scale(-1),
		k: -c.k, len: c.len, bulge: -c.bulge,
	}
}

// part returns the bulge of the piece from s0 to s1.
func (c *curve) part(s0, s1 float64) float64 {
	if c.k == 0 {
		return 0
	}
	switch {
	case s0 == 0 && s1 == c.len:
		return c.bulge
	case s0 == c.len && s1 == 0:
		return -c.bulge
	}
	return math.Tan(c.k * (s1 - s0) / 4)
}
