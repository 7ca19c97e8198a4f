package nest

import (
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
// Plan: engraving comes first, while all lies flat and still. A cut comes after every cut that lies
// inside it: holes before the outline of their part, and parts that lie in a window, wholly, before the
// window. Under these rules the next cutting is the nearest to the end of the last one, among the cuts
// of the part begun; a part is finished before the next is begun. Distances count from the first
// vertex, where the beam starts. Running time is quadratic in the number of cuttings.
func Order(work []Cutting) []int {
	inside := nesting(work)
	waits := make([]int, len(work)) // cuts that must come before
	for _, outer := range inside {
		for _, o := range outer {
			waits[o]++
		}
	}
	done := make([]bool, len(work))
	var out []int
	at := outline.Point{}
	take := func(i int) {
		done[i] = true
		out = append(out, i)
		for _, o := range inside[i] {
			waits[o]--
		}
		if work[i].Closed == nil {
			at = work[i].Open[len(work[i].Open)-1].Point
			return
		}
		at = work[i].Closed[0].Point
	}
	nearest := func(may func(i int) bool) int {
		best, least := -1, math.Inf(1)
		for i := range work {
			if done[i] || !may(i) {
				continue
			}
			if d := start(work[i]).Dist(at); d < least {
				best, least = i, d
			}
		}
		return best
	}
	for {
		i := nearest(func(i int) bool { return work[i].Closed == nil })
		if i < 0 {
			break
		}
		take(i)
	}
	for part := -1; ; {
		i := nearest(func(i int) bool { return work[i].Part == part && waits[i] == 0 })
		if i < 0 {
			i = nearest(func(i int) bool { return waits[i] == 0 })
		}
		if i < 0 {
			return out
		}
		part = work[i].Part
		take(i)
	}
}

func start(c Cutting) outline.Point {
	if c.Closed == nil {
		return c.Open[0].Point
	}
	return c.Closed[0].Point
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
	slices.SortStableFunc(byLeft, func(a, b int) int {
		switch {
		case boxes[a].Min.X < boxes[b].Min.X:
			return -1
		case boxes[a].Min.X > boxes[b].Min.X:
			return 1
		}
		return 0
	})
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
