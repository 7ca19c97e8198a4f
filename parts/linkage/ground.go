package linkage

import (
	"fmt"
	"math"
	"sort"
	"strings"
)

// Setting gives the place of adjustable pivots: joint name to parameter, 0 at the beginning of its
// Range and 1 at the end. A pivot that is not named stays where it is set (Ground.At). Nil is the
// linkage as set.
type Setting map[string]float64

// String lists the pivots by name, "C 0.25, O 1"; empty for the linkage as set.
func (s Setting) String() string {
	names := make([]string, 0, len(s))
	for n := range s {
		names = append(names, n)
	}
	sort.Strings(names)
	for i, n := range names {
		names[i] = fmt.Sprintf("%s at %s of its range", n, number(s[n]))
	}
	return strings.Join(names, ", ")
}

// Place returns the point of the range at parameter t: 0 is From (or Start), 1 is To (or End).
func (r Range) Place(t float64) Point {
	if r.Radius > 0 {
		s, c := math.Sincos(r.Start + t*(r.End-r.Start))
		return Point{X: r.Centre.X + r.Radius*c, Y: r.Centre.Y + r.Radius*s}
	}
	return Point{X: r.From.X + t*(r.To.X-r.From.X), Y: r.From.Y + t*(r.To.Y-r.From.Y)}
}

// Length is the length of the range, mm.
func (r Range) Length() float64 {
	if r.Radius > 0 {
		return r.Radius * math.Abs(r.End-r.Start)
	}
	return dist(r.From, r.To)
}

// Nearest returns the parameter of the point of the range that is nearest to p, between 0 and 1,
// and how far away p is, mm.
func (r Range) Nearest(p Point) (t, away float64) {
	if r.Radius > 0 {
		sweep := r.End - r.Start
		a := math.Atan2(p.Y-r.Centre.Y, p.X-r.Centre.X) - r.Start
		if sweep < 0 {
			a = -a
		}
		a = math.Mod(a, 2*math.Pi)
		if a < 0 {
			a += 2 * math.Pi
		}
		if s := math.Abs(sweep); s > 0 && a <= s {
			t = a / s
		} else if dist(p, r.Place(1)) < dist(p, r.Place(0)) {
			t = 1
		}
		return t, dist(p, r.Place(t))
	}
	d := sub(r.To, r.From)
	if n := dot(d, d); n > 0 {
		t = math.Max(0, math.Min(1, dot(sub(p, r.From), d)/n))
	}
	return t, dist(p, r.Place(t))
}

func dist(a, b Point) float64  { return math.Hypot(a.X-b.X, a.Y-b.Y) }
func sub(a, b Point) Point     { return Point{X: a.X - b.X, Y: a.Y - b.Y} }
func dot(a, b Point) float64   { return a.X*b.X + a.Y*b.Y }
func cross(a, b Point) float64 { return a.X*b.Y - a.Y*b.X }
func left(a Point) Point       { return Point{X: -a.Y, Y: a.X} }
func finite(x float64) bool    { return !math.IsNaN(x) && !math.IsInf(x, 0) }
func finitePoint(p Point) bool { return finite(p.X) && finite(p.Y) }
func norm(a Point) float64     { return math.Hypot(a.X, a.Y) }
func addScaled(a Point, k float64, b Point) Point {
	return Point{X: a.X + k*b.X, Y: a.Y + k*b.Y}
}
