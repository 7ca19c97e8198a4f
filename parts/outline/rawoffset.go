package outline

import "math"

// displaced is a segment moved to its right, and what of it is used: from s0 to s1 along it.
type displaced struct {
	curve
	s0, s1 float64
	strip  float64 // the shorter side of the strip between the segment and its offset; 0: it ends at the centre
	centre Point   // then
	corner Point   // where the segment itself ends
	join   join
}

// join is how a displaced segment goes on to the next.
type join int

const (
	straight join = iota // the next begins where it ends, or near enough
	sector               // an arc about the corner
	inAndOut             // to the corner and out again
)

// rawOffset appends the raw curve of o at distance d to its right.
func rawOffset(buf []Vertex, o Outline, d, tol float64) []Vertex {
	ds := make([]displaced, 0, len(o))
	for i := range o {
		c := o.curve(i)
		if c.len <= 4*tol && c.a.Dist(c.b) <= tol {
			continue
		}
		f := 1 + d*c.k
		x := displaced{curve: c, corner: c.b}
		x.a = Point{c.a.X + d*c.t.Y, c.a.Y - d*c.t.X}
		x.b = Point{c.b.X + d*c.u.Y, c.b.Y - d*c.u.X}
		if f > 0 {
			x.k, x.len = c.k/f, c.len*f
			x.strip = min(c.len, x.len)
			x.s1 = x.len
		} else {
			x.centre = c.centre()
		}
		ds = append(ds, x)
	}
	n := len(ds)
	for i := range ds {
		ds[i].joinTo(&ds[(i+1)%n], d, tol)
	}
	for i := range ds {
		x, next := &ds[i], &ds[(i+1)%n]
		a := x.a
		if x.s0 > 0 {
			a = x.at(x.s0)
		}
		if x.strip > 0 {
			buf = append(buf, Vertex{a, x.part(x.s0, x.s1)})
		} else {
			buf = append(buf, Vertex{Point: a}, Vertex{Point: x.centre})
		}
		switch x.join {
		case straight:
			if x.s1 == x.len && x.b.Dist(next.a) > tol/4 {
				buf = append(buf, Vertex{Point: x.b})
			}
		case sector:
			turn := math.Atan2(x.u.Cross(next.t), x.u.Dot(next.t))
			if turn*d < 0 {
				turn += math.Copysign(2*math.Pi, d) // a cusp, by rounding on the wrong side
			}
			buf = append(buf, Vertex{x.b, math.Tan(turn / 4)})
		case inAndOut:
			buf = append(buf, Vertex{Point: x.b}, Vertex{Point: x.corner})
		}
	}
	return buf
}

// joinTo decides how x goes on to next, and shortens both if they cross near the corner.
func (x *displaced) joinTo(next *displaced, d, tol float64) {
	if x.b.Dist(next.a) <= tol/4 {
		return
	}
	cross, dot := x.u.Cross(next.t), x.u.Dot(next.t)
	// At a cusp the tangents do not tell in from out: curves that touch and part again have the same ones, up
	// to rounding either way. A sector is right in any case, for it lies within d of the corner.
	if cross*d > 0 || dot < 0 && math.Abs(cross) < 1e-3 {
		x.join = sector
		return
	}
	x.join = inAndOut
	// How far the strips reach into each other: more than a quarter turn, all their width.
	overlap := math.Abs(d)
	if dot > 0 {
		overlap *= math.Abs(cross)
	}
	if dot < -0.5 || 2*overlap > min(x.strip, next.strip) || x == next {
		return
	}
	if math.Abs(cross) < 1e-3 {
		x.join = straight
		return
	}
	pts, n := crossings(&x.curve, &next.curve, 0)
	for _, p := range pts[:n] {
		s, t := x.param(p), next.param(p)
		if s > x.len/2 && s < x.len && t > 0 && t < next.len/2 && s > x.s0 && (x.len-s)*math.Abs(x.k) < 0.5 && t*math.Abs(next.k) < 0.5 {
			x.join, x.s1, next.s0 = straight, s, t
			return
		}
	}
}
