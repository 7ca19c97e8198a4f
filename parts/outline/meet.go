package outline

// Steps 2 and 3 of the arrangement: what curves have in common.

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
