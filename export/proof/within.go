package proof

import (
	"sort"

	"pinwright/parts/outline"
)

// nest finds for every cut the cuts it lies in. Cuts that cross are found later, by their distance of
// nothing; here a cut lies where its first vertex lies.
func (s *scene) nest() {
	bySize := make([]int, len(s.cuts))
	for i := range bySize {
		bySize[i] = i
	}
	sort.SliceStable(bySize, func(a, b int) bool { return s.cuts[bySize[a]].area < s.cuts[bySize[b]].area })
	for rank, i := range bySize {
		c := &s.cuts[i]
		for _, j := range bySize[rank+1:] {
			if s.cuts[j].box.ContainsBox(c.box) && s.cuts[j].path.Locate(c.path[0].Point) == outline.Inside {
				c.within = append(c.within, j)
			}
		}
	}
}

// order checks that what lies in a cut is cut before it. Once a contour is cut through, what is inside
// it hangs on nothing: a hole made after its part's outside lands anywhere, and a part nested in a
// window is lost with the window's slug.
func (l *ledger) order(s *scene) {
	for i := range s.cuts {
		c := &s.cuts[i]
		for _, j := range c.within {
			around := &s.cuts[j]
			l.count(order, 1)
			if around.turn > c.turn {
				continue
			}
			l.fail(order, Finding{
				File: s.file, Line: c.line,
				What: "a cut " + near(c.path[0].Point) + " comes after the cut of line " + plain(around.line) + " that goes round it",
				Do:   "put it before: once that is cut, it hangs on nothing",
			})
		}
	}
}
