package outline

import "math"

// Area returns the enclosed area, mm2: positive when the outline runs counter-clockwise.
func (o Outline) Area() float64 {
	if len(o) < 2 {
		return 0
	}
	ref := o[0].Point // measured from a corner, so that far from the origin no digits are lost
	var sum float64
	for i := range o {
		s := o.segment(i)
		sum += s.A.Sub(ref).Cross(s.B.Sub(ref))/2 + segmentArea(s)
	}
	return sum
}

// roughArea returns the area within slack of the true one, without trigonometry.
func (o Outline) roughArea() (area, slack float64) {
	if len(o) < 2 {
		return 0, 0
	}
	ref := o[0].Point
	v := o[len(o)-1]
	for _, w := range o {
		area += v.Sub(ref).Cross(w.Sub(ref)) / 2
		if v.Bulge != 0 {
			// Up to a half circle the area of the segment is bulge chord^2 (1/3 to pi/8).
			l := v.Sub(w.Point)
			part := v.Bulge * l.Dot(l)
			area += 0.36 * part
			slack += 0.04 * math.Abs(part)
			if math.Abs(v.Bulge) > 1 {
				return o.Area(), 0
			}
		}
		v = w
	}
	return area, slack
}

// clockwise says whether the outline runs clockwise.
func (o Outline) clockwise() bool {
	a, slack := o.roughArea()
	if math.Abs(a) <= slack {
		a = o.Area()
	}
	return a < 0
}

// segmentArea returns the area between the chord and the arc of s, positive when the arc turns left:
// r^2/2 (w - sin w) for the sweep w.
func segmentArea(s Segment) float64 {
	if s.IsLine() {
		return 0
	}
	w := s.Sweep()
	r := s.Radius()
	return r * r / 2 * lessSine(w)
}

// lessSine returns w - sin w without losing digits for small w.
func lessSine(w float64) float64 {
	if math.Abs(w) > 0.5 {
		return w - math.Sin(w)
	}
	// w^3/3! - w^5/5! + ...
	term := w * w * w / 6
	var sum float64
	for k := 4.0; k < 24; k += 2 {
		sum += term
		term *= -w * w / (k * (k + 1))
	}
	return sum
}

// Length returns the length of the outline, mm.
func (o Outline) Length() float64 {
	if len(o) < 2 {
		return 0
	}
	var sum float64
	for i := range o {
		sum += o.segment(i).Length()
	}
	return sum
}

// Bounds returns the smallest box with the whole outline in it, arcs included; the empty box for the
// empty outline.
func (o Outline) Bounds() Box {
	b := EmptyBox()
	if len(o) == 1 {
		b.add(o[0].Point)
	}
	if len(o) < 2 {
		return b
	}
	for i := range o {
		c := o.curve(i)
		b = b.Union(c.box())
	}
	return b
}

// Area returns the area of the material, mm2: outer less holes.
func (r Region) Area() float64 {
	a := r.Outer.Area()
	for _, h := range r.Holes {
		a += h.Area()
	}
	return a
}

// Bounds returns the smallest box with the whole region in it.
func (r Region) Bounds() Box { return r.Outer.Bounds() }

// Outlines returns the outer outline and then the holes.
func (r Region) Outlines() []Outline {
	out := make([]Outline, 0, 1+len(r.Holes))
	if len(r.Outer) > 0 {
		out = append(out, r.Outer)
	}
	return append(out, r.Holes...)
}

// Length returns the length of all outlines, mm.
func (r Region) Length() float64 {
	l := r.Outer.Length()
	for _, h := range r.Holes {
		l += h.Length()
	}
	return l
}

// Area returns the area of all regions, mm2; what lies in two of them counts twice.
func Area(rs []Region) float64 {
	var a float64
	for _, r := range rs {
		a += r.Area()
	}
	return a
}

// Bounds returns the smallest box with all regions in it.
func Bounds(rs []Region) Box {
	b := EmptyBox()
	for _, r := range rs {
		b = b.Union(r.Bounds())
	}
	return b
}

// Length returns the length of the path, mm.
func (p Path) Length() float64 {
	var sum float64
	for _, s := range p.Segments() {
		sum += s.Length()
	}
	return sum
}

// Bounds returns the smallest box with the whole path in it; the empty box for the empty path.
func (p Path) Bounds() Box {
	b := EmptyBox()
	for _, v := range p {
		b.add(v.Point)
	}
	for _, s := range p.Segments() {
		b = b.Union(s.Bounds())
	}
	return b
}
