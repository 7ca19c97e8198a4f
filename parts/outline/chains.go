package outline

import "slices"

// Steps 5 and 6 of the arrangement: which edges are boundary.

// loops returns the boundary of where inside holds for the winding numbers of the two operands, as outlines
// with the inside on the left. ok is false if they do not close up.
func (g *arrangement) loops(inside func(w [2]int) bool) (out []loop, ok bool) {
	sweepPairs(g.boxes, g.tol, g.meet)
	if !g.met && len(g.starts) <= 32 {
		return g.apart(inside), true
	}
	kept, ok := g.boundary(inside)
	return g.trace(kept), ok
}

// apart is the short way for contours none of which meets itself or another: each of them is boundary or is
// not.
func (g *arrangement) apart(inside func(w [2]int) bool) []loop {
	type own struct {
		lo, hi int32
		turned bool
	}
	var keep []own
	for k, lo := range g.starts {
		hi := int32(len(g.curves))
		if k+1 < len(g.starts) {
			hi = g.starts[k+1]
		}
		if lo == hi {
			continue
		}
		sample := lo
		for i := lo; i < hi; i++ {
			if g.curves[i].len > g.curves[sample].len {
				sample = i
			}
		}
		p := g.curves[sample].mid()
		var left [2]int
		for i := range g.curves {
			if int32(i) != sample {
				left[g.operand[i]] += g.curves[i].wind(p)
			}
		}
		left[g.operand[sample]] += beside(g.curves[sample].a, g.curves[sample].b, p)
		right := left
		right[g.operand[sample]]--
		l, r := inside(left), inside(right)
		if l == r {
			continue
		}
		keep = append(keep, own{lo, hi, r})
	}
	var out []loop
	for _, k := range keep {
		cs := g.curves[k.lo:k.hi:k.hi]
		if k.turned {
			slices.Reverse(cs)
			for i := range cs {
				cs[i] = cs[i].reverse()
			}
		}
		if l, ok := newLoop(tidyCurves(cs, g.tol), g.tol); ok {
			out = append(out, l)
		}
	}
	return out
}

// boundary returns the edges of the boundary, directed, the inside on their left. ok is false if they do not
// close up.
func (g *arrangement) boundary(inside func(w [2]int) bool) (kept []edge, ok bool) {
	g.cut()
	chains := g.chains()
	index := newHeightIndex(g, len(chains))
	kept = make([]edge, 0, len(g.edges))
	balance := make([]int32, len(g.nodes))
	for _, ch := range chains {
		left := index.left(ch.sample)
		m := g.edges[ch.sample].m
		right := [2]int{left[0] - int(m[0]), left[1] - int(m[1])}
		l, r := inside(left), inside(right)
		if l == r {
			continue
		}
		for _, i := range ch.edges {
			e := g.edges[i]
			if r {
				e.from, e.to, e.s0, e.s1 = e.to, e.from, e.s1, e.s0
			}
			balance[e.from]++
			balance[e.to]--
			kept = append(kept, e)
		}
	}
	for _, b := range balance {
		if b != 0 {
			return kept, false
		}
	}
	return kept, true
}

// chain is a run of edges with the same winding numbers on each side.
type chain struct {
	edges  []int32
	sample int32 // its longest edge
}

func (g *arrangement) chains() []chain {
	at := g.incidence()
	done := make([]bool, len(g.edges))
	buf := make([]int32, 0, len(g.edges))
	// next returns the edge that goes on from the end v of edge i, or -1.
	next := func(i, v int32) int32 {
		own := at.of(v)
		if len(own) != 2 {
			return -1
		}
		j := own[0]
		if j == i {
			j = own[1]
		}
		if j == i || done[j] || g.edges[j].m != g.edges[i].m {
			return -1
		}
		if (g.edges[i].to == v) != (g.edges[j].from == v) {
			return -1
		}
		return j
	}
	var out []chain
	for i := range g.edges {
		if done[i] {
			continue
		}
		begin := len(buf)
		for j := int32(i); j >= 0; j = next(j, g.edges[j].to) {
			done[j] = true
			buf = append(buf, j)
		}
		for j := next(int32(i), g.edges[i].from); j >= 0; j = next(j, g.edges[j].from) {
			done[j] = true
			buf = append(buf, j)
		}
		ch := chain{edges: buf[begin:len(buf):len(buf)], sample: int32(i)}
		best := 0.0
		for _, j := range ch.edges {
			e := &g.edges[j]
			if l := max(e.s1-e.s0, e.s0-e.s1); l > best {
				best, ch.sample = l, j
			}
		}
		out = append(out, ch)
	}
	return out
}
