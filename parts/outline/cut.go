package outline

import (
	"cmp"
	"slices"
)

// Step 4 of the arrangement: curves cut into edges, coincident ones made one.

// cut is step 4: edges, coincident ones made one.
func (g *arrangement) cut() {
	type mark struct {
		s    float64
		node int32
	}
	marks := make([]mark, 0, 2*len(g.curves)+len(g.splits))
	start := make([]int32, len(g.curves)+1)
	for i := range g.curves {
		start[i] = int32(len(marks))
		marks = append(marks, mark{0, g.ends[i][0]})
		for k := g.head[i]; k >= 0; k = g.splits[k].next {
			marks = append(marks, mark{g.splits[k].s, g.splits[k].node})
		}
		if own := marks[start[i]+1:]; len(own) > 1 {
			slices.SortFunc(own, func(a, b mark) int {
				if c := cmp.Compare(a.s, b.s); c != 0 {
					return c
				}
				return cmp.Compare(a.node, b.node)
			})
		}
		marks = append(marks, mark{g.curves[i].len, g.ends[i][1]})
		own := marks[start[i]:]
		for k := 1; k < len(own); k++ {
			if own[k].s-own[k-1].s <= 2*g.tol {
				g.unite(own[k].node, own[k-1].node)
			}
		}
	}
	start[len(g.curves)] = int32(len(marks))
	g.edges = make([]edge, 0, len(marks)-len(g.curves))
	for i := range g.curves {
		own := marks[start[i]:start[i+1]]
		v, s := g.root(own[0].node), own[0].s
		for _, m := range own[1:] {
			w := g.root(m.node)
			if w != v {
				e := edge{from: v, to: w, curve: int32(i), s0: s, s1: m.s}
				e.m[g.operand[i]] = 1
				g.edges = append(g.edges, e)
			}
			v, s = w, m.s
		}
	}
	g.mergeCoincident()
}

func (g *arrangement) middle(e *edge) Point {
	c := &g.curves[e.curve]
	if e.s0 == 0 && e.s1 == c.len {
		return c.mid()
	}
	return c.at((e.s0 + e.s1) / 2)
}

// mergeCoincident joins edges with the same ends and the same middle.
func (g *arrangement) mergeCoincident() {
	at := g.incidence()
	for v := range g.nodes {
		own := at.of(int32(v))
		if len(own) < 3 {
			continue // an edge and its double leave at least two more
		}
		for x, ei := range own {
			e := &g.edges[ei]
			if e.m == ([2]int16{}) || min(e.from, e.to) != int32(v) {
				continue
			}
			var mid Point
			known := false
			for _, fi := range own[x+1:] {
				f := &g.edges[fi]
				same := e.from == f.from && e.to == f.to
				if !same && !(e.from == f.to && e.to == f.from) || f.m == ([2]int16{}) {
					continue
				}
				if !known {
					mid, known = g.middle(e), true
				}
				if mid.Dist(g.middle(f)) > 4*g.tol {
					continue
				}
				sign := int16(1)
				if !same {
					sign = -1
				}
				for k := range e.m {
					e.m[k] += sign * f.m[k]
				}
				f.m = [2]int16{}
				if e.m == ([2]int16{}) {
					break
				}
			}
		}
	}
	kept := g.edges[:0]
	for _, e := range g.edges {
		if e.m == ([2]int16{}) {
			continue
		}
		if e.m[0] < 0 || e.m[0] == 0 && e.m[1] < 0 {
			e.from, e.to, e.s0, e.s1 = e.to, e.from, e.s1, e.s0
			e.m[0], e.m[1] = -e.m[0], -e.m[1]
		}
		kept = append(kept, e)
	}
	g.edges = kept
}

// incidence lists the edges at each node.
type incidence struct {
	first []int32
	list  []int32
}

func (a *incidence) of(v int32) []int32 { return a.list[a.first[v]:a.first[v+1]] }

func (g *arrangement) incidence() incidence {
	n := len(g.nodes)
	a := incidence{first: make([]int32, n+2), list: make([]int32, 2*len(g.edges))}
	for i := range g.edges {
		a.first[g.edges[i].from+2]++
		a.first[g.edges[i].to+2]++
	}
	for v := 2; v < n+2; v++ {
		a.first[v] += a.first[v-1]
	}
	for i := range g.edges {
		for _, v := range [2]int32{g.edges[i].from, g.edges[i].to} {
			a.list[a.first[v+1]] = int32(i)
			a.first[v+1]++
		}
	}
	a.first = a.first[:n+1]
	return a
}
