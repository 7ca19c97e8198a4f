package planes

import (
	"math"
	"math/bits"
)

// impossible is the expense of what cannot be finished.
var impossible = expense{planes: math.MaxInt32}

// finish gives lower bounds of what it costs to place the rest.
type finish struct {
	m     *model
	known map[set]expense
	left  int  // sets that may still be looked at
	weak  bool // there are too many sets: bounds come from what cannot share planes alone
}

// mostSets bounds the sets of step 2 of the plan.
const mostSets = 1 << 20

func newFinish(m *model) *finish {
	f := &finish{m: m, known: map[set]expense{}, left: 20 * mostSets}
	f.exact(0)
	if f.left <= 0 {
		f.weak = true
		clear(f.known)
	}
	return f
}

// from returns a lower bound of what it costs to place all that is not placed yet.
func (f *finish) from(placed set) expense {
	if !f.weak {
		return f.exact(placed)
	}
	if e, ok := f.known[placed]; ok {
		return e
	}
	e := expense{planes: f.clique(f.m.all &^ placed)}
	f.known[placed] = e
	return e
}

// exact is the least expense without heads, nuts and the numbers of demanded planes.
func (f *finish) exact(placed set) expense {
	if placed == f.m.all {
		return expense{}
	}
	if e, ok := f.known[placed]; ok {
		return e
	}
	m, best := f.m, impossible
	open := m.open(placed)
	m.layers(m.ready(placed, open), func(next set) {
		f.left--
		if f.left <= 0 {
			return
		}
		rest := f.exact(placed | next)
		if rest == impossible || 1+rest.planes > best.planes {
			return
		}
		opening, stay := m.opening(placed, next), m.open(placed|next)
		if m.clash(open, opening, (open|opening)&^stay, stay) {
			return
		}
		if e := m.step(open, opening, next, m.washer, 0).add(rest); e.compare(best) < 0 {
			best = e
		}
	})
	f.known[placed] = best
	return best
}

// clique is the size of a set of bodies of which no two can share a plane, found greedily from each body.
func (f *finish) clique(rest set) int {
	best := 0
	each(rest, func(b int) {
		size, left := 1, rest&f.m.apart[b]
		for left != 0 {
			pick, most := -1, -1
			each(left, func(i int) {
				if n := count(left & f.m.apart[i]); n > most {
					pick, most = i, n
				}
			})
			size++
			left &= f.m.apart[pick]
		}
		best = max(best, size)
	})
	return best
}

func count(s set) int { return bits.OnesCount64(s) }
