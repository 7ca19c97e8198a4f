package outline

// winding counts how often the closed contour of curves runs round p, counter-clockwise positive:
// crossings of the chords with a ray to the right, plus one for every piece between chord and arc
// that p lies in. Exact but for p within rounding of the contour.
func winding(cs []curve, p Point) int {
	n := 0
	for i := range cs {
		n += cs[i].wind(p)
	}
	return n
}

// wind is what one curve adds to the winding number round p. A point on the chord counts for one side
// of it: the right of a rising one, the left of a falling one, the upper of a level one, the same for
// chord and arc.
func (c *curve) wind(p Point) int {
	n := 0
	dx, dy := c.b.X-c.a.X, c.b.Y-c.a.Y
	side := dx*(p.Y-c.a.Y) - dy*(p.X-c.a.X)
	left := side > 0 || side == 0 && (dy < 0 || dy == 0 && dx > 0)
	if c.a.Y <= p.Y {
		if c.b.Y > p.Y && left {
			n++
		}
	} else if c.b.Y <= p.Y && !left {
		n--
	}
	switch {
	case c.k > 0 && !left && c.height(p) > 0:
		n++
	case c.k < 0 && left && c.height(p) < 0:
		n--
	}
	return n
}

// Locate says where p lies with regard to what the outline encloses; within the tolerance of the
// curve it is OnEdge. The direction of the outline does not matter.
func (o Outline) Locate(p Point) Location {
	if !o.usable() || !p.finite() {
		return Outside
	}
	tol := toleranceFor(BoxOf(p))
	n := 0
	for i := range o {
		c := o.curve(i)
		if c.box().Grow(tol).Contains(p) {
			if _, d := c.nearest(p); d <= tol {
				return OnEdge
			}
		}
		n += c.wind(p)
	}
	if n != 0 {
		return Inside
	}
	return Outside
}

// Locate says where p lies with regard to the material: in a hole is Outside.
func (r Region) Locate(p Point) Location {
	if at := r.Outer.Locate(p); at != Inside {
		return at
	}
	for _, h := range r.Holes {
		switch h.Locate(p) {
		case OnEdge:
			return OnEdge
		case Inside:
			return Outside
		case Outside:
		}
	}
	return Inside
}
