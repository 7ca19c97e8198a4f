package outline

import "math"

// Flatten returns the outline as a polygon, in its direction, every vertex of the outline among its
// corners. No point of either is further than chord (mm) from the other. Side says to which side the
// polygon may stray; what counts is the enclosed set, for a clockwise outline too (see FlattenRegion for
// holes as gaps in material). A chord error that is not positive counts as a thousandth of a millimetre;
// an arc gets 4096 corners at most.
//
// Within and Around hold to rounding (1e-12 of the coordinates). With a chord error that is small compared
// with the distances between segments that are not neighbours, the polygon of a simple outline is simple.
func Flatten(o Outline, chord float64, side Side) []Point {
	if !o.usable() {
		return nil
	}
	ccw := o.Area() > 0
	out := make([]Point, 0, 4*len(o))
	for _, c := range o.curves() {
		// A convex arc bulges out of what is enclosed.
		convex := (c.k > 0) == ccw
		tangents := side == Within && !convex || side == Around && convex
		out = c.flatten(out, chord, tangents)
	}
	return out
}

// FlattenRegion returns the polygons of the outer outline and then of the holes, with Within and Around
// meaning the material: Within leaves less of it everywhere, Around more.
func FlattenRegion(r Region, chord float64, side Side) [][]Point {
	out := [][]Point{Flatten(r.Outer, chord, side)}
	switch side {
	case Within:
		side = Around
	case Around:
		side = Within
	case Inscribed:
	}
	for _, h := range r.Holes {
		out = append(out, Flatten(h, chord, side))
	}
	return out
}

// FlattenPath returns the path as corners of straight lines, all on the path, no point further than chord
// (mm) from it.
func FlattenPath(p Path, chord float64) []Point {
	if len(p) == 0 {
		return nil
	}
	var out []Point
	for _, s := range p.Segments() {
		c := s.curve()
		out = c.flatten(out, chord, false)
	}
	return append(out, p[len(p)-1].Point)
}

// flatten appends the corners of the curve from its start on, without its end: on the curve, or on
// tangents of it.
func (c *curve) flatten(out []Point, chord float64, tangents bool) []Point {
	out = append(out, c.a)
	n := c.pieces(chord, tangents)
	if c.k == 0 {
		return out
	}
	step := c.len / float64(n)
	if !tangents {
		for i := 1; i < n; i++ {
			out = append(out, c.at(float64(i)*step))
		}
		return out
	}
	// The tangents at both ends of a piece meet over its middle, at r (sec(w/2) - 1) from the arc. Its
	// ends are on the arc, so the polygon touches it there.
	half := c.k * step / 2
	over := math.Tan(half) / c.k // from an end of the piece to where the tangents meet
	for i := range n {
		s := float64(i) * step
		p, t := c.at(s), c.tangent(s)
		if i == 0 {
			p, t = c.a, c.t
		}
		out = append(out, Point{p.X + over*t.X, p.Y + over*t.Y})
	}
	return out
}

// pieces returns into how many pieces an arc is cut so that chords or tangents stay within the error.
func (c *curve) pieces(chord float64, tangents bool) int {
	const most = 4096
	if !(chord > 0) {
		chord = 1e-3
	}
	if c.k == 0 {
		return 1
	}
	w := math.Abs(c.sweep())
	x := chord * math.Abs(c.k) // error over radius
	var half float64           // half the sweep of a piece
	if tangents {
		half = math.Atan(math.Sqrt(x * (2 + x))) // sec h = 1+x
	} else if x < 1 {
		half = 2 * math.Asin(math.Sqrt(x/2)) // cos h = 1-x
	} else {
		half = math.Pi / 2
	}
	// Never more than a third of a turn in one piece: a chord or two tangents then still run with the arc.
	half = min(half, math.Pi/3)
	return max(1, min(most, int(math.Ceil(w/(2*half)-1e-9))))
}
