package nest

import (
	"cmp"
	"math"
	"slices"

	"pinwright/parts/outline"
)

// Sliding a form until it touches.
//
// Plan: the edges of a form that face down are its lower faces, and so on; every face is a line
// v = v(u) over a stretch of u, u being the coordinate across the direction of the slide and v that along it.
// A form that slides down is stopped by the upper faces of what lies below: for two faces with a
// common stretch of u, the way between them is linear over the stretch, so it is least at one of its
// ends. The least way over all pairs is the length of the slide. Exact for polygons; running time is the
// number of lower faces times that of upper faces of the forms in the way.

// direction is one in which edges face, as seen from the material.
type direction int

const (
	down direction = iota
	left
	up
	right
)

// face is an edge as a line over a stretch of the coordinate across its direction: from (from, v0) to
// (to, v1), from < to.
type face struct {
	from, to, v0, v1 float64
	low, high        float64 // the lesser and the greater of v0 and v1
}

// at returns the face's place above u.
func (f face) at(u float64) float64 {
	if u <= f.from {
		return f.v0
	}
	if u >= f.to {
		return f.v1
	}
	return f.v0 + (f.v1-f.v0)*(u-f.from)/(f.to-f.from)
}

const (
	// stripOfNothing is the common stretch of two faces that is none, mm: forms that touch sideways
	// overlap by this much through rounding.
	stripOfNothing = 1e-9
	// behind is how far a face must be behind another one to be no obstacle, mm. Forms never overlap by
	// more than stripOfNothing across a face, which along a steep one is many times as much.
	behind = 1e-4
)

// facesOf sorts the edges of rings by where they face, and in each direction by where they begin. Rings
// run with their material to the left.
func facesOf(rings [][]outline.Point) (out [4][]face) {
	add := func(d direction, from, to, v0, v1 float64) {
		out[d] = append(out[d], face{from, to, v0, v1, min(v0, v1), max(v0, v1)})
	}
	for _, ring := range rings {
		for i, p := range ring {
			q := ring[(i+1)%len(ring)]
			switch {
			case q.X > p.X:
				add(down, p.X, q.X, p.Y, q.Y)
			case q.X < p.X:
				add(up, q.X, p.X, q.Y, p.Y)
			}
			switch {
			case q.Y > p.Y:
				add(right, p.Y, q.Y, p.X, q.X)
			case q.Y < p.Y:
				add(left, q.Y, p.Y, q.X, p.X)
			}
		}
	}
	for d := range out {
		slices.SortStableFunc(out[d], func(a, b face) int { return cmp.Compare(a.from, b.from) })
	}
	return out
}

// way returns how far form f at p can slide down or left before it touches g at q, at most limit.
func way(f *form, p outline.Point, g *form, q outline.Point, d direction, limit float64) float64 {
	du, dv := p.X-q.X, p.Y-q.Y
	fw, gw, fh, gh := f.width, g.width, f.height, g.height
	if d == left {
		du, dv = dv, du
		fw, gw, fh, gh = fh, gh, fw, gw
	}
	// f's box may be beside g's, out of reach, or below it.
	if du >= gw-stripOfNothing || du+fw <= stripOfNothing || dv-gh >= limit || dv+fh < -behind {
		return limit
	}
	back := g.faces[d+2]
	for _, a := range f.faces[d] {
		a.from, a.to, a.v0, a.v1 = a.from+du, a.to+du, a.v0+dv, a.v1+dv
		if a.from >= gw || a.to <= 0 {
			continue
		}
		low, high := a.v0, a.v1
		if low > high {
			low, high = high, low
		}
		for i := range back {
			b := &back[i]
			if b.from >= a.to {
				break // faces are in the order of their beginnings
			}
			if b.to <= a.from || low-b.high >= limit || high-b.low < -behind {
				continue
			}
			from, to := a.from, a.to
			if b.from > from {
				from = b.from
			}
			if b.to < to {
				to = b.to
			}
			if to-from <= stripOfNothing {
				continue
			}
			gap0, gap1 := a.at(from)-b.at(from), a.at(to)-b.at(to)
			if gap0+gap1 < -2*behind {
				continue
			}
			limit = math.Min(limit, math.Max(0, math.Min(gap0, gap1)))
		}
	}
	return limit
}

// stride is how far a form slides at a time, cells. The raster has found the lowest free place, so the way
// is seldom longer, and what is further off need not be looked at.
const stride = 3

// slide moves a form from p down and left by turns until it touches on both sides, and returns where it
// ends. What lies on the table never stands in the way of the start.
func (t *table) slide(f *form, p outline.Point) outline.Point {
	if t.raster {
		return p
	}
	const rounds = 8
	still, far := 0, stride*t.cell
	for i := range 2 * rounds {
		d := direction(i % 2)
		s := p.Y + f.inner.Min.Y
		if d == left {
			s = p.X + f.inner.Min.X
		}
		s = math.Min(s, far)
		for k := range t.placed {
			s = way(f, p, t.placed[k].form, t.placed[k].at, d, s)
			if s <= 0 {
				break
			}
		}
		s = math.Max(s, 0)
		if d == left {
			p.X -= s
		} else {
			p.Y -= s
		}
		if s > 1e-9 {
			still = 0
		} else if still++; still == 2 {
			break
		}
	}
	return p
}
