// Package tube cuts pieces of tube from tubes of one length with the fewest tubes: the cutting stock
// problem in one dimension.
//
// Plan:
//
//  1. Lengths become whole micrometres. Every piece is taken as long as itself and a saw cut, and the
//     tube a saw cut longer than it is: the last piece of a tube that is used up needs no cut. That makes
//     it bin packing.
//  2. Longest piece first, each into the first tube with room (first-fit decreasing, at most 11/9 of
//     the fewest and 6/9 of a tube: Dosa 2007), gives a plan.
//  3. A bound from below is the best of: the sum of the pieces over the tube, and the same sum after
//     lengths were stretched by the dual feasible functions of Fekete and Schepers (Math. Program. 91,
//     2001), and, where a tube has few fillings, the linear relaxation (prices.go). Where the plan meets
//     it, the plan is the best.
//  4. Else tubes are filled one by one: the longest piece that is left goes into the next tube, and all
//     fillings that leave no room for a further piece are tried, the fullest first; what may be wasted
//     in all is known, so that a filling that wastes more is passed over (bin completion, after Martello
//     and Toth 1990 and Korf 2003). What is left over and was seen before is not tried again.
//
// The search ends when all is tried, which proves the plan, or after Most steps, when the bound says how
// far it may be from the best. Its time is exponential at worst; spacers of a machine are tens of
// pieces of a few lengths, which takes milliseconds.
package tube

import (
	"fmt"
	"math"
	"slices"
)

// Most is how many fillings the search tries before it gives up proving.
const Most = 200_000

// Piece is so many pieces of a length.
type Piece struct {
	Length float64 // mm
	Count  int
}

// Bar is a tube and the pieces that are cut from it, longest first.
type Bar struct {
	Cuts []float64 // mm
	Left float64   // what remains whole after the last cut, mm
}

// Plan is how the pieces are cut.
type Plan struct {
	Bars  []Bar
	Bound int     // fewer tubes are impossible
	Best  bool    // no plan has fewer tubes
	Saw   float64 // lost in cuts, mm
	Left  float64 // sum of the remnants, mm
}

// Cut plans the cutting of pieces from tubes of a length with a saw of a width, mm. No pieces give the
// empty plan, which is the best. A piece longer than the tube, or a length that is not a positive
// number, is an error.
func Cut(length, saw float64, pieces []Piece) (Plan, error) {
	return cut(length, saw, pieces, Most)
}

func cut(length, saw float64, pieces []Piece, most int) (Plan, error) {
	if !(length > 0) || length > longest || !(saw >= 0) || saw > longest {
		return Plan{}, fmt.Errorf("a tube of %g mm and a saw cut of %g mm: both must be lengths up to %g m", length, saw, longest/1000)
	}
	kinds := map[int]int{} // micrometres to count
	total := 0
	for _, p := range pieces {
		switch {
		case p.Count == 0:
			continue
		case p.Count < 0 || p.Count > mostPieces:
			return Plan{}, fmt.Errorf("%d pieces of %g mm", p.Count, p.Length)
		case !(p.Length > 0) || micro(p.Length) == 0:
			return Plan{}, fmt.Errorf("a piece of %g mm cannot be cut", p.Length)
		case micro(p.Length) > micro(length):
			return Plan{}, fmt.Errorf("a piece of %g mm is longer than the tube of %g mm: get longer tube", p.Length, length)
		}
		kinds[micro(p.Length)] += p.Count
		if total += p.Count; total > mostPieces {
			return Plan{}, fmt.Errorf("more than %d pieces", mostPieces)
		}
	}
	s := search{capacity: micro(length) + micro(saw), seen: map[string]int{}, most: most}
	for l := range kinds {
		s.sizes = append(s.sizes, l+micro(saw))
	}
	slices.Sort(s.sizes)
	slices.Reverse(s.sizes)
	for _, size := range s.sizes {
		s.left = append(s.left, kinds[size-micro(saw)])
	}
	bins, bound, best := s.solve()
	return s.plan(bins, bound, best, length, saw), nil
}

const (
	longest    = 1e6   // mm
	mostPieces = 10000 // in all
)

func micro(mm float64) int { return int(math.Round(mm * 1000)) }

func milli(um int) float64 { return float64(um) / 1000 }

// plan writes bins as bars.
func (s *search) plan(bins []filling, bound int, best bool, length, saw float64) Plan {
	p := Plan{Bound: bound, Best: best}
	total := micro(length)
	for _, b := range bins {
		var bar Bar
		room := s.capacity
		for k, n := range b {
			for range n {
				bar.Cuts = append(bar.Cuts, milli(s.sizes[k]-micro(saw)))
				room -= s.sizes[k]
			}
		}
		// Room is what is left and one saw cut that the last piece may not need.
		bar.Left = milli(max(0, room-micro(saw)))
		p.Left += bar.Left
		used := 0
		for _, c := range bar.Cuts {
			used += micro(c)
		}
		p.Saw += milli(total-used) - bar.Left
		p.Bars = append(p.Bars, bar)
	}
	p.Saw, p.Left = math.Round(p.Saw*1000)/1000, math.Round(p.Left*1000)/1000
	return p
}
