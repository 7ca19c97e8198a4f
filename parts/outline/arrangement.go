package outline

import (
	"cmp"
	"slices"
)

// Booleans and offsets both come down to one question: given closed contours, which part of the plane
// has the right winding numbers, and what is its boundary? The answer is an arrangement.
//
// Plan:
//
//  1. Contours become curves between numbered nodes; what is shorter than the tolerance is dropped,
//     arcs of more than half a turn are halved.
//  2. Pairs of curves whose boxes meet are found by a sweep along the longer axis (sweep.go).
//  3. Each pair is intersected. An end that lies on the other curve, and a crossing or touch, becomes a
//     node on both; nodes closer than the tolerance become one. Whatever node of one curve lies on the
//     other is put there too, until nothing changes: after that, curves that run within the tolerance
//     of each other over some length share both nodes at its ends.
//  4. Curves are cut at their nodes into edges. Edges with the same ends and the same middle are
//     coincident: they become one, whose multiplicity is the sum, a sign for the direction. Edges that
//     cancel out are dropped.
//  5. Edges between the same crossings form chains; along a chain the winding numbers on both sides do
//     not change. They are counted once for each chain, at the middle of its longest edge (winding.go):
//     every contour counts as the polygon of its chords plus the pieces between chords and arcs, which
//     is exact for a point that is not within rounding of an edge.
//  6. A chain is boundary if exactly one side has the right winding numbers. Boundary edges are joined
//     to outlines with the inside on the left (trace.go).
//
// Guarantees. Every answer is a set of closed outlines whose vertices are exact to rounding where
// nothing is degenerate, and to the tolerance where it is. If the counts of step 6 do not close up at
// some node (thin slivers near the tolerance can do that), everything is done again with a tolerance
// eight times larger, up to a thousandth of a millimetre, which makes the sliver degenerate; should
// even that fail, what does not close is left out. The same input always takes the same way.
//
// Time: O((n+x) log n) for n curves and x pairs of curves whose boxes meet, with the winding numbers at
// O(c m) for c chains and m edges at the same height.

type arrangement struct {
	tol      float64
	curves   []curve
	boxes    []Box
	ends     [][2]int32 // nodes at the ends of each curve
	operand  []int8
	nodes    []Point
	parent   []int32 // nodes that are one place: union-find, the smallest number is the root
	head     []int32 // first split of each curve, or -1
	splits   []split
	touching [][2]int32 // pairs of curves that have a point in common
	met      bool       // something meets, other than neighbours in a contour
	starts   []int32    // first curve of each contour
	edges    []edge
}

// split is a node somewhere along a curve, in a linked list.
type split struct {
	s    float64
	node int32
	next int32
}

// edge is a piece of a curve between two nodes, from s0 to s1 along it (s0 > s1: backwards).
type edge struct {
	from, to int32
	curve    int32
	s0, s1   float64
	m        [2]int16 // how often it occurs in each operand in this direction
}

func newArrangement(tol float64, size int) *arrangement {
	return &arrangement{
		tol:     tol,
		curves:  make([]curve, 0, size),
		boxes:   make([]Box, 0, size),
		ends:    make([][2]int32, 0, size),
		operand: make([]int8, 0, size),
		nodes:   make([]Point, 0, size+size/2),
		parent:  make([]int32, 0, size+size/2),
		head:    make([]int32, 0, size),
	}
}

func (g *arrangement) node(p Point) int32 {
	v := int32(len(g.nodes))
	g.nodes = append(g.nodes, p)
	g.parent = append(g.parent, v)
	return v
}

func (g *arrangement) root(v int32) int32 {
	for g.parent[v] != v {
		g.parent[v] = g.parent[g.parent[v]]
		v = g.parent[v]
	}
	return v
}

// unite makes two nodes one place; the older one keeps its coordinates, so that vertices of the input
// stay where they are.
func (g *arrangement) unite(v, w int32) {
	g.met = true
	v, w = g.root(v), g.root(w)
	if v < w {
		g.parent[w] = v
	} else {
		g.parent[v] = w
	}
}

// add puts a closed contour in.
func (g *arrangement) add(o []Vertex, operand int8) {
	if len(o) < 2 {
		return
	}
	first := g.node(o[0].Point)
	begin := len(g.curves)
	g.starts = append(g.starts, int32(begin))
	cur := first
	for i := range o {
		last := i == len(o)-1
		target := o[0].Point
		if !last {
			target = o[i+1].Point
		}
		c := newCurve(g.nodes[cur], target, o[i].Bulge)
		if c.len <= 4*g.tol && c.a.Dist(c.b) <= g.tol {
			if last && len(g.curves) > begin && cur != first {
				// The last piece is too short: the one before it ends at the start instead.
				n := len(g.curves) - 1
				g.unite(cur, first)
				g.ends[n][1] = first
				g.curves[n] = newCurve(g.curves[n].a, target, g.curves[n].bulge)
				g.boxes[n] = g.curves[n].box()
			}
			continue
		}
		if c.bulge > 1+1e-9 || c.bulge < -1-1e-9 {
			half := c.part(0, c.len/2)
			m := g.node(c.mid())
			g.push(newCurve(c.a, g.nodes[m], half), cur, m, operand)
			c = newCurve(g.nodes[m], c.b, half)
			cur = m
		}
		next := first
		if !last {
			next = g.node(target)
		}
		g.push(c, cur, next, operand)
		cur = next
	}
}

func (g *arrangement) push(c curve, from, to int32, operand int8) {
	g.curves = append(g.curves, c)
	g.boxes = append(g.boxes, c.box())
	g.ends = append(g.ends, [2]int32{from, to})
	g.operand = append(g.operand, operand)
	g.head = append(g.head, -1)
}

// hit puts node v on curve i at s.
func (g *arrangement) hit(i int32, s float64, v int32) {
	switch {
	case s <= g.tol:
		g.unite(v, g.ends[i][0])
	case s >= g.curves[i].len-g.tol:
		g.unite(v, g.ends[i][1])
	default:
		g.met = true
		g.splits = append(g.splits, split{s, v, g.head[i]})
		g.head[i] = int32(len(g.splits) - 1)
	}
}

// has says whether node v (a root) is on curve i already.
func (g *arrangement) has(i, v int32) bool {
	if g.root(g.ends[i][0]) == v || g.root(g.ends[i][1]) == v {
		return true
	}
	for k := g.head[i]; k >= 0; k = g.splits[k].next {
		if g.root(g.splits[k].node) == v {
			return true
		}
	}
	return false
}

// meet finds what curves i and j have in common.
func (g *arrangement) meet(i, j int32) {
	ci, cj := &g.curves[i], &g.curves[j]
	ei, ej := g.ends[i], g.ends[j]
	joined, other := ei[1] == ej[0], ei[0] == ej[1]
	if joined != other {
		// Neighbours: a curve that turns less than half a turn in all does not meet itself.
		if joined && turnsLittle(ci, cj) || other && turnsLittle(cj, ci) {
			return
		}
	}
	touched := joined || other
	if g.endsOn(i, j) {
		touched = true
	}
	if g.endsOn(j, i) {
		touched = true
	}
	pts, n := crossings(ci, cj, g.tol)
	for _, p := range pts[:n] {
		si, ok := ci.on(p, g.tol)
		if !ok {
			continue
		}
		sj, ok := cj.on(p, g.tol)
		if !ok {
			continue
		}
		touched = true
		var v int32
		switch {
		case si <= g.tol:
			v = ei[0]
		case si >= ci.len-g.tol:
			v = ei[1]
		case sj <= g.tol:
			v = ej[0]
		case sj >= cj.len-g.tol:
			v = ej[1]
		default:
			v = g.node(p)
		}
		g.hit(i, si, v)
		g.hit(j, sj, v)
	}
	if touched {
		g.touching = append(g.touching, [2]int32{i, j})
	}
}

// endsOn puts the ends of curve i that lie on curve j there.
func (g *arrangement) endsOn(i, j int32) bool {
	touched := false
	b := &g.boxes[j]
	for _, v := range g.ends[i] {
		p := g.nodes[v]
		if p.X < b.Min.X-g.tol || p.X > b.Max.X+g.tol || p.Y < b.Min.Y-g.tol || p.Y > b.Max.Y+g.tol {
			continue
		}
		if r := g.root(v); r == g.root(g.ends[j][0]) || r == g.root(g.ends[j][1]) {
			touched = true
			continue
		}
		if s, ok := g.curves[j].on(p, g.tol); ok {
			g.hit(j, s, v)
			touched = true
		}
	}
	return touched
}

// turnsLittle says that c and the curve d that follows it turn by clearly less than half a turn in
// all, the corner between them included.
func turnsLittle(c, d *curve) bool {
	turn := max(c.sweep(), -c.sweep()) + max(d.sweep(), -d.sweep())
	dot := c.u.Dot(d.t)
	switch {
	case dot > 0.999: // less than 0.045 at the corner
		return turn < 3.08
	case dot > 0: // less than a right angle
		return turn < 1.56
	case dot > -0.9: // less than 2.7
		return turn < 0.43
	case dot > -0.9999: // less than 3.128
		return turn == 0
	}
	return false
}

// settle completes step 3: nodes of touching curves are put on both, until nothing changes.
func (g *arrangement) settle() {
	for range 16 {
		changed := false
		for _, t := range g.touching {
			if g.share(t[0], t[1]) {
				changed = true
			}
			if g.share(t[1], t[0]) {
				changed = true
			}
		}
		if !changed {
			return
		}
	}
}

// share puts the nodes of curve i that lie on curve j there too.
func (g *arrangement) share(i, j int32) bool {
	changed := false
	try := func(v int32) {
		v = g.root(v)
		if g.has(j, v) {
			return
		}
		if s, ok := g.curves[j].on(g.nodes[v], g.tol); ok {
			g.hit(j, s, v)
			changed = true
		}
	}
	try(g.ends[i][0])
	try(g.ends[i][1])
	for k := g.head[i]; k >= 0; k = g.splits[k].next {
		try(g.splits[k].node)
	}
	return changed
}

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
	g.settle()
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
