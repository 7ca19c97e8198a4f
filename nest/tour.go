package nest

import (
	"slices"

	"pinwright/parts/outline"
)

// A tour through stops, made shorter by local search.
//
// Plan: two kinds of move, as long as one of them gains:
//
//  1. a stretch of one to three stops moves elsewhere, in its own order (I. Or, Traveling
//     salesman-type combinatorial problems, Northwestern University 1976);
//  2. a stretch is run through the other way round (G. A. Croes, A method for solving traveling-salesman
//     problems, Operations Research 6, 1958). A stop is not turned itself, so the ways within the
//     stretch change when its ends differ; sums of the ways there and back from the tour's beginning give
//     the change at once.
//
// Moves that would put a stop before one that must precede it are not looked at: both kinds move one
// end of a stretch on step by step, and stop at the first such pair. Moves are tried in a fixed order and the first
// that gains is made. A pass takes time proportional to the square of the number of stops.

// stop is a place to be worked.
type stop struct {
	begin, end outline.Point
	before     []int // stops that must come before
}

// tour is stops between where the beam comes from and where it goes on to.
type tour struct {
	stops  []stop
	from   outline.Point
	onward *outline.Point // nil: nowhere
}

const (
	// leastGain is the travel below which a move is no gain, mm.
	leastGain = 1e-6
	// passes bounds the work; some ten are usual.
	passes = 100
)

// improve puts a tour in a better order that keeps what must come before what, as it must have to
// begin with, and returns the travel saved, mm.
func (t tour) improve(order []int) (gain float64) {
	for range passes {
		g := t.moveStretches(order) + t.reverseStretches(order)
		gain += g
		if g < leastGain {
			break
		}
	}
	return gain
}

// way is the travel between the stops at two places of the order that follow each other: from is -1 for
// where the tour begins, to is len(order) for where it goes on to.
func (t tour) way(order []int, from, to int) float64 {
	a := t.from
	if from >= 0 {
		a = t.stops[order[from]].end
	}
	if to < len(order) {
		return a.Dist(t.stops[order[to]].begin)
	}
	if t.onward != nil {
		return a.Dist(*t.onward)
	}
	return 0
}

// latest returns, for every place of the order, the last place of a stop that must precede it; -1 for
// none.
func (t tour) latest(order []int) []int {
	place := make([]int, len(order))
	for i, s := range order {
		place[s] = i
	}
	out := make([]int, len(order))
	for i, s := range order {
		out[i] = -1
		for _, b := range t.stops[s].before {
			out[i] = max(out[i], place[b])
		}
	}
	return out
}

// moveStretches moves stretches of up to three stops to where they gain most travel.
func (t tour) moveStretches(order []int) (gain float64) {
	n := len(order)
	for i := 0; i < n; i++ {
		for j := i; j < min(n, i+3); j++ {
			out := t.way(order, i-1, i) + t.way(order, j, j+1) - t.way(order, i-1, j+1)
			best, most := -1, leastGain
			// The stretch comes between the places k and k+1.
			try := func(k int) {
				in := t.way(order, k, i) + t.way(order, j, k+1) - t.way(order, k, k+1)
				if out-in > most {
					best, most = k, out-in
				}
			}
			for k := i - 2; k >= -1 && !t.precedes(order, k+1, i, j); k-- {
				try(k)
			}
			for k := j + 1; k < n && !t.follows(order, k, i, j); k++ {
				try(k)
			}
			if most > leastGain {
				shift(order, i, j, best)
				gain += most
			}
		}
	}
	return gain
}

// follows tells whether the stop at place k must come after one of the places i to j.
func (t tour) follows(order []int, k, i, j int) bool {
	return slices.ContainsFunc(t.stops[order[k]].before, func(b int) bool { return slices.Contains(order[i:j+1], b) })
}

// precedes tells whether the stop at place k must come before one of the places i to j.
func (t tour) precedes(order []int, k, i, j int) bool {
	return slices.ContainsFunc(order[i:j+1], func(s int) bool { return slices.Contains(t.stops[s].before, order[k]) })
}

// shift moves the places i to j between k and k+1.
func shift(order []int, i, j, k int) {
	if k < i {
		rotate(order[k+1:j+1], i-k-1)
		return
	}
	rotate(order[i:k+1], j-i+1)
}

// rotate brings the first n of a list to its end.
func rotate(list []int, n int) {
	head := append([]int(nil), list[:n]...)
	copy(list, list[n:])
	copy(list[len(list)-n:], head)
}

// reverseStretches runs stretches the other way round where that is shorter.
func (t tour) reverseStretches(order []int) (gain float64) {
	n := len(order)
	there, back := make([]float64, n), make([]float64, n) // sums of the ways up to a place
	sums := func() {
		for i := 1; i < n; i++ {
			there[i] = there[i-1] + t.way(order, i-1, i)
			back[i] = back[i-1] + t.way(order, i, i-1)
		}
	}
	sums()
	latest := t.latest(order)
	for i := 0; i < n-1; i++ {
		for j := i + 1; j < n && latest[j] < i; j++ {
			old := t.way(order, i-1, i) + there[j] - there[i] + t.way(order, j, j+1)
			other := t.way(order, i-1, j) + back[j] - back[i] + t.way(order, i, j+1)
			if old-other > leastGain {
				for a, b := i, j; a < b; a, b = a+1, b-1 {
					order[a], order[b] = order[b], order[a]
				}
				gain += old - other
				latest = t.latest(order)
				sums()
			}
		}
	}
	return gain
}
