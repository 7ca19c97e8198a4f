package outline

// Overlap says whether the regions overlap deeper than tol (mm): whether a disc of that diameter fits into what
// both cover. Touching is no overlap; with a tol that is not positive the tolerance of the package counts.
func Overlap(a, b Region, tol float64) bool {
	tol = max(tol, tolerance)
	ab, bb := a.Bounds(), b.Bounds()
	if !ab.Grow(-tol / 2).Intersects(bb.Grow(-tol / 2)) {
		return false
	}
	// Overlapping curves are at no distance; so the curves are apart if the regions are.
	if Between(a, b).Distance > tolerance {
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
