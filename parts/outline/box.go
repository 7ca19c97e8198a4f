package outline

import "math"

// EmptyBox returns the box of nothing: the neutral element of Union.
func EmptyBox() Box {
	return Box{Min: Point{math.Inf(1), math.Inf(1)}, Max: Point{math.Inf(-1), math.Inf(-1)}}
}

// BoxOf returns the smallest box with all the points; the empty box for none.
func BoxOf(pts ...Point) Box {
	b := EmptyBox()
	for _, p := range pts {
		b.add(p)
	}
	return b
}

func (b *Box) add(p Point) {
	b.Min.X = min(b.Min.X, p.X)
	b.Min.Y = min(b.Min.Y, p.Y)
	b.Max.X = max(b.Max.X, p.X)
	b.Max.Y = max(b.Max.Y, p.Y)
}

// Empty says whether the box holds no point.
func (b Box) Empty() bool { return !(b.Min.X <= b.Max.X && b.Min.Y <= b.Max.Y) }

// Width returns the extent in x, mm; 0 for an empty box.
func (b Box) Width() float64 { return max(0, b.Max.X-b.Min.X) }

// Height returns the extent in y, mm; 0 for an empty box.
func (b Box) Height() float64 { return max(0, b.Max.Y-b.Min.Y) }

// Centre returns the middle of the box.
func (b Box) Centre() Point { return b.Min.Lerp(b.Max, 0.5) }

// Union returns the smallest box with both in it.
func (b Box) Union(c Box) Box {
	return Box{
		Min: Point{min(b.Min.X, c.Min.X), min(b.Min.Y, c.Min.Y)},
		Max: Point{max(b.Max.X, c.Max.X), max(b.Max.Y, c.Max.Y)},
	}
}

// Grow returns the box moved outwards by d on all four sides; a negative d may leave it empty.
func (b Box) Grow(d float64) Box {
	return Box{Min: Point{b.Min.X - d, b.Min.Y - d}, Max: Point{b.Max.X + d, b.Max.Y + d}}
}

// Contains says whether p is in the box, its edge included.
func (b Box) Contains(p Point) bool {
	return p.X >= b.Min.X && p.X <= b.Max.X && p.Y >= b.Min.Y && p.Y <= b.Max.Y
}

// ContainsBox says whether c lies in b, edges included; an empty c does.
func (b Box) ContainsBox(c Box) bool {
	return c.Empty() || b.Contains(c.Min) && b.Contains(c.Max)
}

// Intersects says whether the boxes have a point in common, edges included.
func (b Box) Intersects(c Box) bool {
	return b.Min.X <= c.Max.X && c.Min.X <= b.Max.X && b.Min.Y <= c.Max.Y && c.Min.Y <= b.Max.Y
}

// Distance returns the shortest way between the boxes, mm; 0 when they meet.
func (b Box) Distance(c Box) float64 { return math.Sqrt(b.distance2(c)) }

// distance2 is the square of Distance.
func (b Box) distance2(c Box) float64 {
	dx := max(0, c.Min.X-b.Max.X, b.Min.X-c.Max.X)
	dy := max(0, c.Min.Y-b.Max.Y, b.Min.Y-c.Max.Y)
	return dx*dx + dy*dy
}

// pointDistance2 is the square of the distance from p to the box.
func (b Box) pointDistance2(p Point) float64 {
	dx := max(0, p.X-b.Max.X, b.Min.X-p.X)
	dy := max(0, p.Y-b.Max.Y, b.Min.Y-p.Y)
	return dx*dx + dy*dy
}
