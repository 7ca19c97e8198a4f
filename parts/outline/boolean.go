package outline

// Union returns everything that lies in at least one of the regions, as regions that do not overlap,
// sorted from the bottom up. Outlines that run the wrong way are turned; regions that touch along a
// line become one, regions that touch in a point stay two. Empty if nothing is left.
//
// Input may be anything: outlines that cross themselves count where they run round a point counter-clockwise
// more often than clockwise (a hole takes one away), all regions together.
func Union(rs ...Region) []Region {
	return combine(rs, nil, func(w [2]int) bool { return w[0] >= 1 })
}

// Intersection returns what lies in a region of a and in a region of b. See Union.
func Intersection(a, b []Region) []Region {
	if !Bounds(a).Intersects(Bounds(b)) {
		return nil
	}
	return combine(a, b, func(w [2]int) bool { return w[0] >= 1 && w[1] >= 1 })
}

// Difference returns what lies in a region of a and in none of b. See Union.
func Difference(a, b []Region) []Region {
	return combine(a, b, func(w [2]int) bool { return w[0] >= 1 && w[1] < 1 })
}

// SymmetricDifference returns what lies in a region of a or of b, but not of both. See Union.
func SymmetricDifference(a, b []Region) []Region {
	return combine(a, b, func(w [2]int) bool { return (w[0] >= 1) != (w[1] >= 1) })
}

func combine(a, b []Region, inside func(w [2]int) bool) []Region {
	var contours [2][]Outline
	box := EmptyBox()
	size := 0
	for k, rs := range [2][]Region{a, b} {
		for _, r := range rs {
			for i, o := range r.Outlines() {
				if !o.usable() {
					continue
				}
				if o.clockwise() == (i == 0 && len(r.Outer) > 0) {
					o = o.Reverse()
				}
				contours[k] = append(contours[k], o)
				box = box.Union(o.looseBounds())
				size += len(o)
			}
		}
	}
	return resolve(toleranceFor(box), size, inside, func(g *arrangement) {
		for k, os := range contours {
			for _, o := range os {
				g.add(o, int8(k))
			}
		}
	})
}

// largestRetry is the tolerance at which resolve gives up.
const largestRetry = 1e-3

// resolve builds the arrangement and returns the regions where inside holds. See arrangement.go for
// what happens when it does not close up.
func resolve(tol float64, size int, inside func(w [2]int) bool, fill func(g *arrangement)) []Region {
	for {
		g := newArrangement(tol, size+8)
		fill(g)
		loops, ok := g.loops(inside)
		if ok || tol*8 > largestRetry {
			return regionsOf(loops)
		}
		tol *= 8
	}
}
