package nest

import (
	"cmp"
	"math"
	"slices"

	"pinwright/parts/outline"
)

// Cutting is one piece of work on a sheet, to be put in order: a closed cut, or an open stroke to be
// engraved.
type Cutting struct {
	Part   int             // which part it belongs to
	Closed outline.Outline // a cut, at its place on the sheet; nil for an engraved stroke
	Open   outline.Path    // an engraved stroke
}

// Order returns the order in which to do the work: a permutation of the cuttings.
//
// Rules: engraving comes first, while all lies flat and still. A cut comes after every cut that lies
// inside it: holes before the outline of their part, small parts in a window wholly before the part that
// has the window. What is engraved on a part is engraved in one go, and a part is cut in one go.
//
// Plan: under these rules the next cutting is the nearest to the end of the last one (from the
// sheet's origin at first). That tour is then made shorter by tour.go, the parts among each other and the
// cuts of each part between the part before and the one after, by turns until neither gains.
// Cutting begins and ends at the first vertex. Where one cut does not lie in the other, travel decides, and
// not size. Running time is quadratic in the number of parts, and in the number of cuts for the first tour.
func Order(work []Cutting) []int {
	inside := nesting(work)
	var strokes, cuts []int
	for i, c := range work {
		if c.Closed == nil {
			strokes = append(strokes, i)
		} else {
			cuts = append(cuts, i)
		}
	}
	at := outline.Point{}
	out := units(work, strokes, inside).order(at)
	if len(out) > 0 {
		_, at = ends(work[out[len(out)-1]])
	}
	return append(out, units(work, cuts, inside).order(at)...)
}

// ends returns where a cutting begins and ends; the origin for one without vertices.
func ends(c Cutting) (from, to outline.Point) {
	switch {
	case len(c.Closed) > 0:
		return c.Closed[0].Point, c.Closed[0].Point
	case len(c.Open) > 0:
		return c.Open[0].Point, c.Open[len(c.Open)-1].Point
	}
	return outline.Point{}, outline.Point{}
}

// bundle is cuttings in units that are worked in one go, with what must come before what.
type bundle struct {
	work   []Cutting
	units  [][]int       // cuttings
	before [][]int       // of units: the units that must come before
	within map[int][]int // of cuttings: the cuttings of the same unit that must come before
}

// units groups cuttings by their part. If that contradicts what lies in what, each is a unit of its own.
func units(work []Cutting, which []int, inside [][]int) bundle {
	b := bundle{work: work}
	number := map[int]int{}
	for _, i := range which {
		u, ok := number[work[i].Part]
		if !ok {
			u = len(b.units)
			number[work[i].Part] = u
			b.units = append(b.units, nil)
		}
		b.units[u] = append(b.units[u], i)
	}
	b.link(inside)
	if !sortable(b.before) {
		b.units = nil
		for _, i := range which {
			b.units = append(b.units, []int{i})
		}
		b.link(inside)
	}
	return b
}

// link states what must come before what.
func (b *bundle) link(inside [][]int) {
	unit := map[int]int{}
	for u, list := range b.units {
		for _, i := range list {
			unit[i] = u
		}
	}
	b.before = make([][]int, len(b.units))
	b.within = map[int][]int{}
	for u, list := range b.units {
		for _, i := range list {
			for _, outer := range inside[i] {
				switch v := unit[outer]; {
				case v == u:
					b.within[outer] = append(b.within[outer], i)
				case !slices.Contains(b.before[v], u):
					b.before[v] = append(b.before[v], u)
				}
			}
		}
	}
}

// sortable tells whether the units can be put in an order at all.
func sortable(before [][]int) bool {
	waits := make([]int, len(before))
	after := make([][]int, len(before))
	var ready []int
	for v, list := range before {
		waits[v] = len(list)
		if waits[v] == 0 {
			ready = append(ready, v)
		}
		for _, u := range list {
			after[u] = append(after[u], v)
		}
	}
	n := 0
	for ; len(ready) > 0; n++ {
		u := ready[len(ready)-1]
		ready = ready[:len(ready)-1]
		for _, v := range after[u] {
			if waits[v]--; waits[v] == 0 {
				ready = append(ready, v)
			}
		}
	}
	return n == len(before)
}

// order returns the cuttings in order, the beam coming from a point.
func (b bundle) order(from outline.Point) []int {
	order := b.nearest(from)
	const rounds = 10
	for range rounds {
		gain := b.improveUnits(order, from)
		gain += b.improveWithin(order, from)
		if gain < leastGain {
			break
		}
	}
	var out []int
	for _, u := range order {
		out = append(out, b.units[u]...)
	}
	return out
}

// nearest returns the order of units in which the next cutting is always the nearest that may come next,
// and puts the cuttings of each unit in that order.
func (b bundle) nearest(at outline.Point) []int {
	var order []int
	done := make([]bool, len(b.units))
	cut := make([]bool, len(b.work))
	free := func(u int) bool {
		return !done[u] && !slices.ContainsFunc(b.before[u], func(v int) bool { return !done[v] })
	}
	next := func(list []int) (best int, least float64) {
		best, least = -1, math.Inf(1)
		for _, i := range list {
			if cut[i] || slices.ContainsFunc(b.within[i], func(k int) bool { return !cut[k] }) {
				continue
			}
			if begin, _ := ends(b.work[i]); best < 0 || begin.Dist(at) < least {
				best, least = i, begin.Dist(at)
			}
		}
		return best, least
	}
	for range b.units {
		unit, least := -1, math.Inf(1)
		for u, list := range b.units {
			if !free(u) {
				continue
			}
			if _, d := next(list); unit < 0 || d < least {
				unit, least = u, d
			}
		}
		var list []int
		for range b.units[unit] {
			i, _ := next(b.units[unit])
			cut[i] = true
			list = append(list, i)
			_, at = ends(b.work[i])
		}
		copy(b.units[unit], list)
		done[unit] = true
		order = append(order, unit)
	}
	return order
}

// improveUnits shortens the travel between the units, and returns by how much, mm.
func (b bundle) improveUnits(order []int, from outline.Point) float64 {
	t := tour{from: from}
	for u, list := range b.units {
		begin, _ := ends(b.work[list[0]])
		_, end := ends(b.work[list[len(list)-1]])
		t.stops = append(t.stops, stop{begin, end, b.before[u]})
	}
	return t.improve(order)
}

// improveWithin shortens the travel within each unit, and returns by how much, mm.
func (b bundle) improveWithin(order []int, from outline.Point) (gain float64) {
	for n, u := range order {
		list := b.units[u]
		if len(list) > 1 {
			t := tour{from: from}
			place := map[int]int{}
			sequence := make([]int, len(list))
			for k, i := range list {
				place[i], sequence[k] = k, k
			}
			for _, i := range list {
				begin, end := ends(b.work[i])
				s := stop{begin: begin, end: end}
				for _, k := range b.within[i] {
					s.before = append(s.before, place[k])
				}
				t.stops = append(t.stops, s)
			}
			if n+1 < len(order) {
				begin, _ := ends(b.work[b.units[order[n+1]][0]])
				t.onward = &begin
			}
			gain += t.improve(sequence)
			sorted := make([]int, len(list))
			for k, s := range sequence {
				sorted[k] = list[s]
			}
			copy(list, sorted)
		}
		_, from = ends(b.work[list[len(list)-1]])
	}
	return gain
}

// nesting lists, for every cut, the cuts that it lies inside.
func nesting(work []Cutting) [][]int {
	out := make([][]int, len(work))
	boxes := make([]outline.Box, len(work))
	for i, c := range work {
		boxes[i] = c.Closed.Bounds()
	}
	byLeft := make([]int, len(work))
	for i := range byLeft {
		byLeft[i] = i
	}
	slices.SortStableFunc(byLeft, func(a, b int) int { return cmp.Compare(boxes[a].Min.X, boxes[b].Min.X) })
	for _, o := range byLeft {
		if work[o].Closed == nil {
			continue
		}
		for _, i := range byLeft {
			if boxes[i].Min.X > boxes[o].Max.X {
				break
			}
			if i == o || work[i].Closed == nil || !boxes[o].ContainsBox(boxes[i]) {
				continue
			}
			if work[o].Closed.Locate(work[i].Closed[0].Point) == outline.Inside {
				out[i] = append(out[i], o)
			}
		}
	}
	return out
}
