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
	g.endsOn(i, j)
	g.endsOn(j, i)
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
}

// endsOn puts the ends of curve i that lie on curve j there.
func (g *arrangement) endsOn(i, j int32) {
	b := &g.boxes[j]
	for _, v := range g.ends[i] {
		p := g.nodes[v]
		if p.X < b.Min.X-g.tol || p.X > b.Max.X+g.tol || p.Y < b.Min.Y-g.tol || p.Y > b.Max.Y+g.tol {
			continue
		}
		if r := g.root(v); r == g.root(g.ends[j][0]) || r == g.root(g.ends[j][1]) {
			continue
		}
		if s, ok := g.curves[j].on(p, g.tol); ok {
			g.hit(j, s, v)
		}
	}
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
