package proof

import (
	"fmt"
	"math"
	"sort"

	"pinwright/export/manifest"
	"pinwright/parts/outline"
)

// kind is the parts of a drawing that are alike in every figure: any of them may be any other.
type kind struct {
	part    manifest.Part // the first of them
	members []int         // indices into the expected parts
}

// match assigns the pieces to the expected parts, compares each pair, and reports what is left over on
// either side.
func (l *ledger) match(s *scene) {
	kinds := kindsOf(s.expected)
	middle := make([]outline.Point, len(s.expected))
	for i, p := range s.expected {
		middle[i] = motionOf(p.Place).Apply(outline.Point(p.Outside.Middle))
	}

	// What agrees in everything.
	choices := make([][]int, len(s.parts)) // expected parts for each piece: the right mark first, then the nearest place
	for i := range s.parts {
		p := &s.parts[i]
		for _, k := range kinds {
			if len(p.holes) != len(k.part.Holes) || edgeError(k.part.Outside, p.measure) > edgeLimit {
				continue
			}
			if f := lay(k.part, p, motionOf(k.part.Place)); f.out == 0 {
				choices[i] = append(choices[i], k.members...)
			}
		}
		at := outline.Point(p.measure.Middle)
		sort.SliceStable(choices[i], func(a, b int) bool {
			x, y := choices[i][a], choices[i][b]
			markX, markY := s.marks[i].agrees(s.expected[x].Mark), s.marks[i].agrees(s.expected[y].Mark)
			if markX != markY {
				return markX
			}
			return at.Dist(middle[x]) < at.Dist(middle[y])
		})
	}
	partner := assign(choices, len(s.expected)) // expected to piece

	// The rest, by the place on the sheet.
	free := make([]bool, len(s.parts))
	for i := range free {
		free[i] = true
	}
	for _, piece := range partner {
		if piece >= 0 {
			free[piece] = false
		}
	}
	s.pairLeftOver(partner, free, middle)

	l.count(partCount, len(s.expected))
	for e, part := range s.expected {
		l.count(holeCount, len(part.Holes))
		if partner[e] < 0 {
			l.fail(partCount, Finding{
				File: s.file, Part: part.Name, What: "is missing", Expected: spot(middle[e]),
				Do: "write the files anew",
			})
			continue
		}
		l.compare(s, part, partner[e])
		l.mark(s, part, partner[e])
	}
	for i := range s.parts {
		if !free[i] {
			continue
		}
		c := s.cuts[s.parts[i].outside]
		what := "a part " + around(c.box) + " that is not in the job"
		if len(choices[i]) > 0 {
			what = "a part " + around(c.box) + " too many, like " + s.expected[choices[i][0]].Name
		}
		l.fail(partCount, Finding{File: s.file, Line: c.line, What: what, Do: "take it away"})
	}
}

// kindsOf groups parts that are alike.
func kindsOf(parts []manifest.Part) []*kind {
	var kinds []*kind
	byFigures := map[string]*kind{}
	for i, p := range parts {
		key := fmt.Sprint(p.Place.Flip, p.Outside, p.Feet, p.Lengths, len(p.Holes))
		for _, h := range p.Holes {
			key += fmt.Sprint(h.Kind, h.Joint, h.Centre, h.Diameter, h.Measure)
		}
		k := byFigures[key]
		if k == nil {
			k = &kind{part: p}
			byFigures[key] = k
			kinds = append(kinds, k)
		}
		k.members = append(k.members, i)
	}
	return kinds
}

// assign gives every piece one of its choices where that can be done, the first choices first, and
// returns the piece of every expected part, -1: none.
func assign(choices [][]int, expected int) []int {
	partner := make([]int, expected)
	for i := range partner {
		partner[i] = -1
	}
	// Most pieces lie where they were put; they take their place and never move.
	settled := make([]bool, len(choices))
	for i, c := range choices {
		if len(c) > 0 && partner[c[0]] < 0 {
			partner[c[0]], settled[i] = i, true
		}
	}
	for i := range choices {
		if !settled[i] {
			augment(choices, partner, i)
		}
	}
	return partner
}

// augment looks for a chain of exchanges that finds a place for one more piece, breadth first.
func augment(choices [][]int, partner []int, start int) {
	from := map[int]int{} // expected part to the piece that reached it
	place := map[int]int{}
	for e, p := range partner {
		if p >= 0 {
			place[p] = e
		}
	}
	queue := []int{start}
	for len(queue) > 0 {
		piece := queue[0]
		queue = queue[1:]
		for _, e := range choices[piece] {
			if _, seen := from[e]; seen {
				continue
			}
			from[e] = piece
			if partner[e] >= 0 {
				queue = append(queue, partner[e])
				continue
			}
			for { // take the places over, back to the start
				piece := from[e]
				previous, had := place[piece]
				partner[e] = piece
				if !had {
					return
				}
				e = previous
			}
		}
	}
}

// pairLeftOver pairs what agreed with nothing: like shapes first, then the nearest place. Pieces far
// from any place that is still open, with nothing in common, stay alone.
func (s *scene) pairLeftOver(partner []int, free []bool, middle []outline.Point) {
	var open, loose []int
	for e, p := range partner {
		if p < 0 {
			open = append(open, e)
		}
	}
	for i, f := range free {
		if f {
			loose = append(loose, i)
		}
	}
	// With so many, something has shifted them all, and their places tell enough.
	crowd := len(open)*len(loose) > 4096
	type pair struct {
		e, piece int
		in       int     // features that agree
		d        float64 // between the places
	}
	var pairs []pair
	for _, e := range open {
		part := s.expected[e]
		for _, i := range loose {
			p := pair{e: e, piece: i, d: middle[e].Dist(outline.Point(s.parts[i].measure.Middle))}
			if !s.placed {
				p.d = 0
			}
			if !crowd {
				p.in = 1 + len(part.Holes) - lay(part, &s.parts[i], motionOf(part.Place)).out
			}
			if p.in >= 2 || p.d < 1 {
				pairs = append(pairs, p)
			}
		}
	}
	sort.SliceStable(pairs, func(a, b int) bool {
		nearA, nearB := pairs[a].d < 1, pairs[b].d < 1
		switch {
		case nearA != nearB:
			return nearA
		case pairs[a].in != pairs[b].in:
			return pairs[a].in > pairs[b].in
		}
		return pairs[a].d < pairs[b].d
	})
	for _, p := range pairs {
		if partner[p.e] < 0 && free[p.piece] {
			partner[p.e], free[p.piece] = p.piece, false
		}
	}
}

// motionOf is the placement of a part as a motion.
func motionOf(p manifest.Placement) outline.Transform {
	return outline.Place(p.Turn*math.Pi/180, p.Flip, outline.Point{X: p.X, Y: p.Y})
}

// edgeError is how far the edge of a contour is off on average, from its area and its perimeter, mm.
func edgeError(want, have manifest.Measure) float64 {
	return math.Max(math.Abs(want.Area-have.Area)/want.Perimeter, math.Abs(want.Perimeter-have.Perimeter)/8)
}
