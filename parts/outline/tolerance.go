package outline

import "math"

// The tolerance policy of the whole geometry. There is one length below which two places are the
// same place, and everything else follows from it.
//
// Why a nanometre: coordinates of a part or a sheet stay below some 3 m, where a float64 resolves
// 5e-13 mm and a few chained operations cost ten times that. A thousand times more than rounding is
// room enough for degenerate input (tangent contact, coincident edges) to be recognised after it has
// been turned, moved and offset; a thousandth of a micrometre is still a thousand times finer than
// anything promised for a finished part.
//
// What it means: two points closer than this are one vertex; a curve that passes a point closer than
// this passes through it; curves that run closer than this are coincident there; a contact less deep
// than this is a touch and no overlap; pieces of material or gaps thinner than this do not exist.
// Where nothing is degenerate no result is rounded to it: results are as good as float64 gives.
const tolerance = 1e-9 // mm

// relativeTolerance takes over for coordinates beyond a metre or so, where rounding grows with the
// numbers: 1e-12 of the largest coordinate is some 5,000 units in the last place.
const relativeTolerance = 1e-12

// largestCoordinate is where the geometry gives up: contours with larger (or no) numbers are refused
// by Validate and left out by every other operation. 1e6 mm is a kilometre.
const largestCoordinate = 1e6

// smallestBulge is the bulge below which a segment is straight: its sagitta is half the bulge times
// the chord, so below the tolerance for any chord shorter than 1e-3 of the largest coordinate and
// below the relative tolerance for longer ones.
const smallestBulge = 1e-12

// largestBulge bounds arcs that are nearly full circles: beyond it the chord is less than 1e-6 of
// the radius and no longer fixes the arc.
const largestBulge = 1e6

// longestArc is the sweep from which a merged arc is written as two halves, because the bulge of a
// nearly full turn fixes its radius badly.
const longestArc = 1.5 * math.Pi

// longestTouch is the length over which curves may be coincident and still only touch: circles with radii
// of 20 and 20.1 mm that touch from inside are within the tolerance of each other over 0.006 mm.
const longestTouch = 0.02 // mm

// toleranceFor returns the tolerance for shapes within the box.
func toleranceFor(b Box) float64 {
	if b.Empty() {
		return tolerance
	}
	m := math.Max(math.Max(math.Abs(b.Min.X), math.Abs(b.Max.X)), math.Max(math.Abs(b.Min.Y), math.Abs(b.Max.Y)))
	return math.Max(tolerance, relativeTolerance*m)
}
