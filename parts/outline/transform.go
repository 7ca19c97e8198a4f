package outline

import "math"

// Transform is a rigid motion: mirror (x to -x) if asked, then turn about the origin, then move.
// Make one with Place; the zero value is not a motion.
type Transform struct {
	Cos, Sin float64
	Mirror   bool
	Move     Point
}

// Place returns the motion that mirrors (x to -x, if asked), turns by angle (radians) and then moves.
// Whole quarter turns are exact: Place(math.Pi/2, ...) has a cosine of exactly 0.
func Place(angle float64, mirror bool, move Point) Transform {
	s, c := math.Sincos(angle)
	quarter := angle / (math.Pi / 2)
	if near := math.Round(quarter); math.Abs(quarter-near) < 1e-14*(1+math.Abs(near)) {
		switch ((int(near) % 4) + 4) % 4 {
		case 0:
			c, s = 1, 0
		case 1:
			c, s = 0, 1
		case 2:
			c, s = -1, 0
		case 3:
			c, s = 0, -1
		}
	}
	return Transform{Cos: c, Sin: s, Mirror: mirror, Move: move}
}

// Angle returns the turn in radians, between -pi and pi.
func (t Transform) Angle() float64 { return math.Atan2(t.Sin, t.Cos) }

// Apply moves a point.
func (t Transform) Apply(p Point) Point {
	x, y := p.X, p.Y
	if t.Mirror {
		x = -x
	}
	return Point{t.Cos*x - t.Sin*y + t.Move.X, t.Sin*x + t.Cos*y + t.Move.Y}
}

// Then returns the motion that does t first and u after it.
func (t Transform) Then(u Transform) Transform {
	c, s := t.Cos, t.Sin
	if u.Mirror {
		s = -s
	}
	return Transform{
		Cos:    u.Cos*c - u.Sin*s,
		Sin:    u.Sin*c + u.Cos*s,
		Mirror: t.Mirror != u.Mirror,
		Move:   u.Apply(t.Move),
	}
}

// Inverse returns the motion that undoes t.
func (t Transform) Inverse() Transform {
	inv := Transform{Cos: t.Cos, Sin: -t.Sin, Mirror: t.Mirror}
	if t.Mirror {
		inv.Sin = t.Sin
	}
	back := inv.Apply(t.Move)
	inv.Move = Point{-back.X, -back.Y}
	return inv
}
