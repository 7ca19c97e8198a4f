package outline

import "math"

// Add returns p+q.
func (p Point) Add(q Point) Point { return Point{p.X + q.X, p.Y + q.Y} }

// Sub returns p-q.
func (p Point) Sub(q Point) Point { return Point{p.X - q.X, p.Y - q.Y} }

// Scale returns p times f.
func (p Point) Scale(f float64) Point { return Point{f * p.X, f * p.Y} }

// Dot returns the inner product.
func (p Point) Dot(q Point) float64 { return p.X*q.X + p.Y*q.Y }

// Cross returns the z component of the outer product: positive when q points to the left of p.
func (p Point) Cross(q Point) float64 { return p.X*q.Y - p.Y*q.X }

// Len returns the distance from the origin.
func (p Point) Len() float64 { return math.Sqrt(p.X*p.X + p.Y*p.Y) }

// Dist returns the distance between p and q.
func (p Point) Dist(q Point) float64 { return p.Sub(q).Len() }

// Left returns p turned a quarter counter-clockwise.
func (p Point) Left() Point { return Point{-p.Y, p.X} }

// Unit returns the direction of p at length 1, or the zero point for the zero point.
func (p Point) Unit() Point {
	l := p.Len()
	if l == 0 {
		return Point{}
	}
	return Point{p.X / l, p.Y / l}
}

// Angle returns the direction of p in radians, from -pi to pi, counter-clockwise from the x axis; 0
// for the zero point.
func (p Point) Angle() float64 { return math.Atan2(p.Y, p.X) }

// Polar returns the point at this distance from the origin in this direction (radians).
func Polar(r, angle float64) Point {
	s, c := math.Sincos(angle)
	return Point{r * c, r * s}
}

// Lerp returns the point t of the way from p to q: p at 0, q at 1.
func (p Point) Lerp(q Point, t float64) Point {
	return Point{p.X + t*(q.X-p.X), p.Y + t*(q.Y-p.Y)}
}

// rot returns p turned by the angle whose cosine and sine are given.
func (p Point) rot(c, s float64) Point { return Point{c*p.X - s*p.Y, s*p.X + c*p.Y} }

// finite says whether the point is usable: no NaN, not beyond the largest coordinate.
func (p Point) finite() bool {
	return math.Abs(p.X) <= largestCoordinate && math.Abs(p.Y) <= largestCoordinate
}
