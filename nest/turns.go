package nest

import (
	"math"
	"slices"

	"pinwright/parts/outline"
)

// sameTurn is the angle below which two turns are one, radians: over the length of a part of a metre
// it moves nothing by more than a tenth of a millimetre.
const sameTurn = 1e-4

// turns lists the turns that are tried for an item, radians: the allowed ones or, when any is allowed,
// a set that follows the shape. Only turns in which the shape fits the free part of the sheet (w by h,
// mm) are listed; none if there are none.
//
// Any turn allowed: quarter turns from the one that lays the narrowest box about the shape square to
// the sheet, from the one that does so with its long axis (of the second moments), and from the shape's
// own frame; and the eighths between the first. If the shape fits in none of these, as a long bar that
// only lies along the diagonal, the turn in which it has most room.
func turns(it Item, w, h float64) []float64 {
	o := it.Shape.Outer
	fits := func(a float64) bool { return over(o, a, w, h) <= fitTolerance }
	if it.Angles != nil {
		return slices.DeleteFunc(slices.Clone(it.Angles), func(a float64) bool { return !fits(a) })
	}
	m := it.Shape.Moments()
	axis := -0.5 * math.Atan2(-2*m.Ixy, m.Ixx-m.Iyy)
	narrow, _ := narrowest(hullOf(o))
	var out []float64
	for _, from := range []float64{narrow, axis, 0, narrow + math.Pi/4} {
		for i := range 4 {
			a := math.Remainder(from+float64(i)*math.Pi/2, 2*math.Pi)
			if fits(a) && !slices.ContainsFunc(out, func(b float64) bool { return math.Abs(math.Remainder(a-b, 2*math.Pi)) < sameTurn }) {
				out = append(out, a)
			}
		}
	}
	if len(out) == 0 {
		if a := roomiest(o, w, h); fits(a) {
			out = append(out, a)
		}
	}
	return out
}

// fitTolerance is by how much a shape may seem too large for a sheet through rounding, mm.
const fitTolerance = 1e-9

// hullOf returns the corners of the convex hull of an outline, counter-clockwise, its arcs by chords that
// are off by a twentieth of a millimetre.
func hullOf(o outline.Outline) []outline.Point {
	pts := outline.Flatten(o, 0.05, outline.Inscribed)
	discs := make([]outline.Disc, len(pts))
	for i, p := range pts {
		discs[i].Centre = p
	}
	hull := outline.Hull(discs...)
	out := make([]outline.Point, len(hull))
	for i, v := range hull {
		out[i] = v.Point
	}
	return out
}

// over is by how much an outline turned by a is too large for w by h, mm; negative if there is room.
func over(o outline.Outline, a, w, h float64) float64 {
	box := o.Transform(outline.Place(a, false, outline.Point{})).Bounds()
	return math.Max(box.Width()-w, box.Height()-h)
}

// narrowest returns the turn that makes the box about a hull least high, and that height, mm: the least
// width of a convex polygon is square to one of its edges.
func narrowest(hull []outline.Point) (turn, width float64) {
	width = math.Inf(1)
	for i, p := range hull {
		along := hull[(i+1)%len(hull)].Sub(p).Unit()
		high := 0.0
		for _, q := range hull {
			high = math.Max(high, along.Cross(q.Sub(p)))
		}
		// The margin keeps the first of edges that are equal but for rounding.
		if high < width-1e-7 {
			turn, width = -along.Angle(), high
		}
	}
	return turn, width
}

// roomiest returns the turn for which an outline exceeds w by h least (over): the best of 720 turns, then
// finer steps about it until they are below a billionth of a turn.
func roomiest(o outline.Outline, w, h float64) float64 {
	best, least := 0.0, math.Inf(1)
	try := func(a float64) {
		if x := over(o, a, w, h); x < least-1e-12 {
			best, least = a, x
		}
	}
	for i := range 720 {
		try(float64(i) * math.Pi / 360)
	}
	for step := math.Pi / 720; step > 1e-10; step /= 2 {
		at := best
		try(at - step)
		try(at + step)
	}
	return math.Remainder(best, 2*math.Pi)
}
