package outline

import "math"

// Segment is one line or arc of an outline or path, from A to B. Bulge is as in Vertex.
type Segment struct {
	A, B  Point
	Bulge float64
}

func (s Segment) curve() curve { return newCurve(s.A, s.B, s.Bulge) }

// IsLine says whether the segment is straight.
func (s Segment) IsLine() bool { return math.Abs(s.Bulge) < smallestBulge }

// Length returns the length along the segment, mm.
func (s Segment) Length() float64 { return math.Abs(s.curve().len) }

// Sweep returns the angle that the segment turns through, radians, positive counter-clockwise.
func (s Segment) Sweep() float64 { return 4 * math.Atan(s.Bulge) }

// Centre returns the centre of an arc, and the middle of a line.
func (s Segment) Centre() Point {
	if s.IsLine() {
		return s.A.Lerp(s.B, 0.5)
	}
	c := s.curve()
	return c.centre()
}

// Radius returns the radius of an arc, mm, and +Inf for a line.
func (s Segment) Radius() float64 {
	if s.IsLine() {
		return math.Inf(1)
	}
	b := math.Abs(s.Bulge)
	return s.A.Dist(s.B) * (1 + b*b) / (4 * b)
}

// At returns the point at t of the way along the segment: A at 0, B at 1, evenly by length.
func (s Segment) At(t float64) Point {
	switch t {
	case 0:
		return s.A
	case 1:
		return s.B
	}
	c := s.curve()
	return c.at(t * c.len)
}

// Tangent returns the unit direction at t of the way along; the zero point if the segment has no
// length.
func (s Segment) Tangent(t float64) Point {
	c := s.curve()
	switch t {
	case 0:
		return c.t
	case 1:
		return c.u
	}
	return c.tangent(t * c.len)
}

// Bounds returns the smallest box with the whole segment in it.
func (s Segment) Bounds() Box {
	c := s.curve()
	return c.box()
}

// Nearest returns the shortest way from the segment (its A) to p (its B).
func (s Segment) Nearest(p Point) Nearest {
	c := s.curve()
	f, d := c.nearest(p)
	return Nearest{Distance: d, A: f, B: p}
}

// Reverse returns the segment run backwards.
func (s Segment) Reverse() Segment { return Segment{A: s.B, B: s.A, Bulge: -s.Bulge} }

// Intersect returns the points that the two segments have in common, in the order of s: at most two
// of them, or the ends of the common piece when they run along each other. A touch counts.
func (s Segment) Intersect(other Segment) []Point {
	c, d := s.curve(), other.curve()
	tol := toleranceFor(c.box().Union(d.box()))
	return commonPoints(&c, &d, tol)
}

// Segments returns the segments in order, the closing one last. Empty for fewer than two vertices.
func (o Outline) Segments() []Segment {
	if len(o) < 2 {
		return nil
	}
	out := make([]Segment, len(o))
	for i := range o {
		out[i] = o.segment(i)
	}
	return out
}

// segment returns the one that leaves vertex i.
func (o Outline) segment(i int) Segment {
	j := i + 1
	if j == len(o) {
		j = 0
	}
	return Segment{A: o[i].Point, B: o[j].Point, Bulge: o[i].Bulge}
}

func (o Outline) curve(i int) curve {
	j := i + 1
	if j == len(o) {
		j = 0
	}
	return newCurve(o[i].Point, o[j].Point, o[i].Bulge)
}

// curves returns all segments ready for arithmetic, none for an outline that is not usable.
func (o Outline) curves() []curve {
	if !o.usable() {
		return nil
	}
	out := make([]curve, len(o))
	for i := range o {
		out[i] = o.curve(i)
	}
	return out
}

// usable says whether the outline has at least two vertices and only numbers that the geometry can
// work with.
func (o Outline) usable() bool {
	if len(o) < 2 {
		return false
	}
	for _, v := range o {
		if !v.finite() || !(math.Abs(v.Bulge) <= largestBulge) {
			return false
		}
	}
	return true
}

// Segments returns the segments in order: one fewer than vertices.
func (p Path) Segments() []Segment {
	if len(p) < 2 {
		return nil
	}
	out := make([]Segment, len(p)-1)
	for i := range out {
		out[i] = Segment{A: p[i].Point, B: p[i+1].Point, Bulge: p[i].Bulge}
	}
	return out
}
