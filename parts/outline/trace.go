package outline

import (
	"cmp"
	"math"
	"slices"
)

// Tracing: directed boundary edges, the inside on their left, become outlines and these regions.
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

func (g *arrangement) trace(kept []edge) []Outline {
	out := incidenceOut(kept, len(g.nodes))
	used := make([]bool, len(kept))
	place := make([]int32, len(g.nodes)) // 1 + where on the walk a node was left
	var result []Outline
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
				loop := walk[p-1:]
				if o := g.outline(kept, loop); o != nil {
					result = append(result, o)
				}
				for _, k := range loop {
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

// outline makes a loop of edges an outline; nil if nothing of it is left.
func (g *arrangement) outline(kept []edge, loop []int32) Outline {
	o := make(Outline, 0, len(loop))
	for x := 0; x < len(loop); {
		e := kept[loop[x]]
		y := x + 1
		for y < len(loop) {
			f := &kept[loop[y]]
			if f.curve != e.curve || (f.s1 > f.s0) != (e.s1 > e.s0) || (e.s1 < f.s0) != (e.s0 < e.s1) && e.s1 != f.s0 {
				break
			}
			e.s1, e.to = f.s1, f.to
			y++
		}
		c := &g.curves[e.curve]
		v := Vertex{Point: g.nodes[e.from]}
		switch {
		case e.s0 == 0 && e.s1 == c.len:
			v.Bulge = c.bulge
		case e.s0 == c.len && e.s1 == 0:
			v.Bulge = -c.bulge
		default:
			v.Bulge = c.part(e.s0, e.s1)
		}
		o = append(o, v)
		x = y
	}
	if len(o) < 2 {
		return nil
	}
	o = tidy(o, g.tol)
	if o == nil || math.Abs(o.Area()) <= g.tol*o.Length() {
		return nil
	}
	return o
}

// regions sorts loops into outer outlines and their holes.
func regionsOf(loops []Outline) []Region {
	var outs, holes []Outline
	for _, o := range loops {
		if o.Area() > 0 {
			outs = append(outs, o)
		} else {
			holes = append(holes, o)
		}
	}
	slices.SortStableFunc(outs, compareOutlines)
	slices.SortStableFunc(holes, compareOutlines)
	rs := make([]Region, len(outs))
	boxes := make([]Box, len(outs))
	for i, o := range outs {
		rs[i].Outer = o
		boxes[i] = o.Bounds()
	}
	for _, h := range holes {
		hb := h.Bounds()
		best, area := -1, math.Inf(1)
		for i := range rs {
			if !boxes[i].Grow(tolerance).ContainsBox(hb) || !holeIn(h, rs[i].Outer) {
				continue
			}
			if a := rs[i].Outer.Area(); a < area {
				best, area = i, a
			}
		}
		if best >= 0 {
			rs[best].Holes = append(rs[best].Holes, h)
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

// compareOutlines orders by the first vertex, from the bottom up and then from the left, then by area.
func compareOutlines(a, b Outline) int {
	if c := cmp.Compare(a[0].Y, b[0].Y); c != 0 {
		return c
	}
	if c := cmp.Compare(a[0].X, b[0].X); c != 0 {
		return c
	}
	return cmp.Compare(a.Area(), b.Area())
}
