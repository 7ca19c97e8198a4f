package outline

import "math"

// Overlap says whether the regions overlap deeper than tol (mm): whether a disc of that diameter fits into what
// both cover. Touching is no overlap; with a tol that is not positive the tolerance of the package counts.
func Overlap(a, b Region, tol float64) bool {
	tol = max(tol, tolerance)
	ab, bb := a.Bounds(), b.Bounds()
	if !ab.Grow(-tol / 2).Intersects(bb.Grow(-tol / 2)) {
		return false
	}
	s, t := newShape(a.Outlines()...), newShape(b.Outlines()...)
	if s.box.Empty() || t.box.Empty() {
		return false
	}
	best := Nearest{Distance: math.Inf(1)}
	s.distance(&t, &best)
	if best.Distance > tolerance && a.Locate(b.Outer[0].Point) == Outside && b.Locate(a.Outer[0].Point) == Outside {
		return false
	}
	common := Intersection([]Region{a}, []Region{b})
	return len(Offset(common, -tol/2)) > 0
}

// Contains says whether all of b lies within the material of a, edges included: b may touch a's edges from
// inside, and may stick out by less than the tolerance.
func Contains(a, b Region) bool {
	if !a.Bounds().Grow(tolerance).ContainsBox(b.Bounds()) {
		return false
	}
	rest := Difference([]Region{b}, []Region{a})
	return len(rest) == 0
}
