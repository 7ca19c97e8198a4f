package outline

import "math"

// Circle returns the full circle, counter-clockwise: two vertices, at its lowest and highest point.
// Empty if the radius is not positive.
func Circle(centre Point, radius float64) Outline {
	if !(radius > 0) {
		return nil
	}
	return Outline{
		{Point: Point{centre.X, centre.Y - radius}, Bulge: 1},
		{Point: Point{centre.X, centre.Y + radius}, Bulge: 1},
	}
}

// CircleHole returns the full circle, clockwise.
func CircleHole(centre Point, radius float64) Outline {
	return Circle(centre, radius).Reverse()
}

// Rectangle returns the box with these two opposite corners, counter-clockwise from its lower left.
func Rectangle(a, b Point) Outline {
	box := BoxOf(a, b)
	return Polygon(box.Min, Point{box.Max.X, box.Min.Y}, box.Max, Point{box.Min.X, box.Max.Y})
}

// Outline returns the box as an outline, counter-clockwise from its lower left; nil for an empty box.
func (b Box) Outline() Outline {
	if b.Empty() {
		return nil
	}
	return Rectangle(b.Min, b.Max)
}

// Polygon returns the outline of straight lines through the points, in their order.
func Polygon(pts ...Point) Outline {
	o := make(Outline, len(pts))
	for i, p := range pts {
		o[i].Point = p
	}
	return o
}

// Capsule returns the outline of all places within r of the line from a to b, counter-clockwise: a
// bar or slot with round ends. A circle if a and b are the same; empty if r is not positive.
func Capsule(a, b Point, r float64) Outline {
	return Hull(Disc{a, r}, Disc{b, r})
}

// ArcSlot returns the outline of all places within halfWidth of an arc, counter-clockwise: a ring
// sector with round ends. The arc runs about the centre from angle from to angle to (radians, either
// way). Nil if the measures make no simple outline: halfWidth not below the radius, or round ends
// that meet, so that what is inside would fall out; Stroke gives such shapes as regions.
func ArcSlot(centre Point, radius, from, to, halfWidth float64) Outline {
	if !(halfWidth > 0) || !(radius > halfWidth) || math.IsNaN(from) || math.IsNaN(to) {
		return nil
	}
	if from > to {
		from, to = to, from
	}
	sweep := to - from
	if sweep*radius <= tolerance {
		return Circle(centre.Add(Polar(radius, from)), halfWidth)
	}
	// The round ends stay apart if the chord over the gap is longer than the width.
	gap := 2*math.Pi - sweep
	if gap <= 0 || gap < math.Pi && 2*radius*math.Sin(gap/2) <= 2*halfWidth+tolerance {
		return nil
	}
	outer, inner := radius+halfWidth, radius-halfWidth
	d0, d1 := Polar(1, from), Polar(1, to)
	o := Outline{
		{centre.Add(d0.Scale(outer)), math.Tan(sweep / 4)},
		{centre.Add(d1.Scale(outer)), 1},
		{centre.Add(d1.Scale(inner)), -math.Tan(sweep / 4)},
		{centre.Add(d0.Scale(inner)), 1},
	}
	return o.Clean()
}

// Arc returns the path along a circle from angle from to angle to, counter-clockwise if to is the
// larger. Sweeps are at most one turn; arcs of more than half a turn get a vertex in the middle.
func Arc(centre Point, radius, from, to float64) Path {
	sweep := max(-2*math.Pi, min(2*math.Pi, to-from))
	n := 1
	if math.Abs(sweep) > math.Pi {
		n = 2
	}
	p := make(Path, n+1)
	for i := range p {
		p[i].Point = centre.Add(Polar(radius, from+sweep*float64(i)/float64(n)))
		if i < n {
			p[i].Bulge = math.Tan(sweep / float64(4*n))
		}
	}
	return p
}
