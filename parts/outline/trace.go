package outline

import (
	"cmp"
	"math"
	"slices"
)

// Tracing: directed boundary edges, the inside on their left, become outlines and outlines become regions.
//
// Plan:
//
//  1. Follow edges from node to node. Where several go on, take the one furthest to the left, so that
//     pieces that touch in a point stay pieces of their own.
//  2. A walk that comes back to a node it has been at is cut there: every loop visits a node once.
//  3. Pieces of one curve are put together again, then the outline is tidied (clean.go).
//  4. Loops thinner than the tolerance are dropped. Counter-clockwise ones are outer outlines, clockwise
//     ones holes of the smallest outer outline around them.
//
// What does not close (see arrangement.go) is dropped.

func (g *arrangement) trace(kept []edge) []loop {
	out := incidenceOut(kept, len(g.nodes))
	used := make([]bool, len(kept))
	place := make([]int32, len(g.nodes)) // 1 + where on the walk a node was left
	var result []loop
	walk := make([]int32, 0, len(kept))
	for i := range kept {
		if used[i] {
			continue
		}
		walk = walk[:0]
		cur := int32(i)
		for cur >= 0 {
			e := &kept[cur]
			used[cur] = true
			place[e.from] = int32(len(walk)) + 1
			walk = append(walk, cur)
			if p := place[e.to]; p > 0 {
				// Back at a node: cut the loop out.
				round := walk[p-1:]
				if l, ok := g.loop(kept, round); ok {
					result = append(result, l)
				}
				for _, k := range round {
					place[kept[k].from] = 0
				}
				walk = walk[:p-1]
				if len(walk) == 0 {
					cur = -1
					continue
				}
				e = &kept[cur]
			}
			cur = g.leftmost(kept, &out, used, e)
		}
		for _, k := range walk {
			place[kept[k].from] = 0
		}
	}
	return result
}

// incidenceOut lists the edges that leave each node.
func incidenceOut(edges []edge, nodes int) incidence {
	a := incidence{first: make([]int32, nodes+2), list: make([]int32, len(edges))}
	for i := range edges {
		a.first[edges[i].from+2]++
	}
	for v := 2; v < nodes+2; v++ {
		a.first[v] += a.first[v-1]
	}
	for i := range edges {
		v := edges[i].from
		a.list[a.first[v+1]] = int32(i)
		a.first[v+1]++
	}
	a.first = a.first[:nodes+1]
	return a
}

// leftmost returns the unused edge leaving the end of e that turns furthest to the left, or -1.
func (g *arrangement) leftmost(kept []edge, out *incidence, used []bool, e *edge) int32 {
	only, n := int32(-1), 0
	for _, j := range out.of(e.to) {
		if !used[j] {
			only = j
			n++
		}
	}
	if n < 2 {
		return only
	}
	// Directions are compared a little way from the node, so that curves that leave it along one
	// tangent are told apart by their curvature.
	step := math.Abs(e.s1 - e.s0)
	for _, j := range out.of(e.to) {
		if !used[j] {
			step = min(step, math.Abs(kept[j].s1-kept[j].s0))
		}
	}
	step /= 2
	p := g.nodes[e.to]
	along := func(e *edge, from, to float64) Point {
		return g.curves[e.curve].at(from + math.Copysign(step, to-from))
	}
	back := along(e, e.s1, e.s0).Sub(p)
	best, bestTurn := int32(-1), math.Inf(-1)
	for _, j := range out.of(e.to) {
		if used[j] {
			continue
		}
		f := &kept[j]
		d := along(f, f.s0, f.s1).Sub(p)
		// Counter-clockwise from the way back: the further, the more it turns to the left.
		turn := math.Atan2(back.Cross(d), back.Dot(d))
		if turn < 0 {
			turn += 2 * math.Pi
		}
		if turn > bestTurn {
			best, bestTurn = j, turn
		}
	}
	return best
}

// loop is a closed outline and which way it runs.
type loop struct {
	o    Outline
	hole bool
}

// loop makes an outline of the edges; not ok if nothing of it is left.
func (g *arrangement) loop(kept []edge, edges []int32) (l loop, ok bool) {
	cs := make([]curve, 0, len(edges))
	for x := 0; x < len(edges); {
		e := kept[edges[x]]
		y := x + 1
		for y < len(edges) {
			f := &kept[edges[y]]
			if f.curve != e.curve || (f.s1 > f.s0) != (e.s1 > e.s0) || (f.s0 > e.s0) != (e.s1 > e.s0) {
				break
			}
			e.s1, e.to = f.s1, f.to
			y++
		}
		c := &g.curves[e.curve]
		a, b := g.nodes[e.from], g.nodes[e.to]
		switch {
		case e.s0 == 0 && e.s1 == c.len && a == c.a && b == c.b:
			cs = append(cs, *c)
		case e.s0 == c.len && e.s1 == 0 && a == c.b && b == c.a:
			cs = append(cs, c.reverse())
		default:
			cs = append(cs, newCurve(a, b, c.part(e.s0, e.s1)))
		}
		x = y
	}
	return newLoop(tidyCurves(cs, g.tol), g.tol)
}

// newLoop measures an outline; not ok if it is empty or thinner than the tolerance.
func newLoop(o Outline, tol float64) (l loop, ok bool) {
	if o == nil {
		return loop{}, false
	}
	// Large ones cannot be too thin, however long they are.
	a, slack := o.roughArea()
	if math.Abs(a) <= 2*slack+tol*largestCoordinate {
		a = o.Area()
		if b := math.Abs(a); b <= tol*largestCoordinate && b <= tol*o.Length() {
			return loop{}, false
		}
	}
	return loop{o, a < 0}, true
}

// regionsOf sorts loops into outer outlines and their holes.
func regionsOf(loops []loop) []Region {
	var outs, holes []loop
	for _, l := range loops {
		if l.hole {
			holes = append(holes, l)
		} else {
			outs = append(outs, l)
		}
	}
	slices.SortStableFunc(outs, compareLoops)
	slices.SortStableFunc(holes, compareLoops)
	rs := make([]Region, len(outs))
	for i, l := range outs {
		rs[i].Outer = l.o
	}
	if len(holes) == 0 {
		return rs
	}
	boxes, areas := make([]Box, len(outs)), make([]float64, len(outs))
	for i, l := range outs {
		boxes[i], areas[i] = l.o.Bounds(), l.o.Area()
	}
	for _, h := range holes {
		hb := h.o.Bounds()
		best, area := -1, math.Inf(1)
		for i, l := range outs {
			if areas[i] < area && boxes[i].Grow(tolerance).ContainsBox(hb) && holeIn(h.o, l.o) {
				best, area = i, areas[i]
			}
		}
		if best >= 0 {
			rs[best].Holes = append(rs[best].Holes, h.o)
		}
	}
	return rs
}

// holeIn says whether the outline h, which does not cross o, lies within it.
func holeIn(h, o Outline) bool {
	// They may touch in points: ask at the middles and ends of the segments until one is clear.
	for i := range h {
		c := h.curve(i)
		for _, p := range [2]Point{c.mid(), c.a} {
			switch o.Locate(p) {
			case Inside:
				return true
			case Outside:
				return false
			case OnEdge:
			}
		}
	}
	return false
}

// compareLoops orders by the first vertex, from the bottom up and then from the left, then by the second.
func compareLoops(a, b loop) int {
	return cmp.Or(cmp.Compare(a.o[0].Y, b.o[0].Y), cmp.Compare(a.o[0].X, b.o[0].X),
		cmp.Compare(a.o[1].Y, b.o[1].Y), cmp.Compare(a.o[1].X, b.o[1].X))
}
