package outline

// heightIndex answers winding numbers beside edges of an arrangement. The edges are sorted into rows
// of equal height, each in all rows that it reaches; a ray to the right from a point needs only the
// edges of its row.
type heightIndex struct {
	g      *arrangement
	shapes []edgeShape
	low    float64
	scale  float64 // rows per mm
	n      int     // rows; 0: every ray looks at every edge
	first  []int32
	list   []int32
}

// edgeShape is what a ray needs to know of an edge.
type edgeShape struct {
	a, b       Point   // its nodes
	k          float64 // curvature in its direction
	low, high  float64 // in y, the arc's belly included
	right      float64
	sweepsBack bool // runs against its curve
}

func newHeightIndex(g *arrangement, queries int) *heightIndex {
	x := &heightIndex{g: g, shapes: make([]edgeShape, len(g.edges))}
	var spans float64
	low, high := 0.0, 0.0
	for i := range g.edges {
		e := &g.edges[i]
		c := &g.curves[e.curve]
		s := edgeShape{a: g.nodes[e.from], b: g.nodes[e.to], k: c.k}
		if e.s0 > e.s1 {
			s.k, s.sweepsBack = -c.k, true
		}
		// The sagitta of an arc is at most k l^2 / 8.
		l := e.s1 - e.s0
		belly := max(c.k, -c.k) * l * l / 8
		s.low, s.high = min(s.a.Y, s.b.Y)-belly, max(s.a.Y, s.b.Y)+belly
		s.right = max(s.a.X, s.b.X) + belly
		x.shapes[i] = s
		spans += s.high - s.low
		if i == 0 {
			low, high = s.low, s.high
		} else {
			low, high = min(low, s.low), max(high, s.high)
		}
	}
	n := len(g.edges)
	if queries < 4 || high <= low {
		return x // not worth it
	}
	rows := n
	if spans > 0 {
		rows = max(1, min(n, int(4*float64(n)*(high-low)/spans)))
	}
	x.n, x.low, x.scale = rows, low, float64(rows)/(high-low)
	x.first = make([]int32, rows+2)
	for i := range x.shapes {
		r0, r1 := x.rows(&x.shapes[i])
		for r := r0; r <= r1; r++ {
			x.first[r+2]++
		}
	}
	for r := 2; r < len(x.first); r++ {
		x.first[r] += x.first[r-1]
	}
	x.list = make([]int32, x.first[rows+1])
	for i := range x.shapes {
		r0, r1 := x.rows(&x.shapes[i])
		for r := r0; r <= r1; r++ {
			x.list[x.first[r+1]] = int32(i)
			x.first[r+1]++
		}
	}
	x.first = x.first[:rows+1]
	return x
}

func (x *heightIndex) row(y float64) int {
	return max(0, min(x.n-1, int((y-x.low)*x.scale)))
}

func (x *heightIndex) rows(s *edgeShape) (int, int) { return x.row(s.low), x.row(s.high) }

// left returns the winding numbers immediately to the left of the middle of edge i.
func (x *heightIndex) left(i int32) [2]int {
	e := &x.g.edges[i]
	p := x.g.middle(e)
	var w [2]int
	count := func(j int32) {
		s := &x.shapes[j]
		if p.Y < s.low || p.Y > s.high || p.X > s.right || j == i {
			return
		}
		if n := x.wind(j, s, p); n != 0 {
			m := &x.g.edges[j].m
			w[0] += n * int(m[0])
			w[1] += n * int(m[1])
		}
	}
	if x.n == 0 {
		for j := range x.shapes {
			count(int32(j))
		}
	} else {
		r := x.row(p.Y)
		for _, j := range x.list[x.first[r]:x.first[r+1]] {
			count(j)
		}
	}
	if own := beside(x.shapes[i].a, x.shapes[i].b, p); own != 0 {
		w[0] += own * int(e.m[0])
		w[1] += own * int(e.m[1])
	}
	return w
}

// wind is curve.wind for an edge: chord between its nodes, arc from its curve.
func (x *heightIndex) wind(j int32, s *edgeShape, p Point) int {
	n := 0
	dx, dy := s.b.X-s.a.X, s.b.Y-s.a.Y
	side := dx*(p.Y-s.a.Y) - dy*(p.X-s.a.X)
	left := side > 0 || side == 0 && (dy < 0 || dy == 0 && dx > 0)
	if s.a.Y <= p.Y {
		if s.b.Y > p.Y && left {
			n++
		}
	} else if s.b.Y <= p.Y && !left {
		n--
	}
	if s.k > 0 && !left || s.k < 0 && left {
		h := x.g.curves[x.g.edges[j].curve].height(p)
		if s.sweepsBack {
			h = -h
		}
		if s.k > 0 && h > 0 {
			n++
		} else if s.k < 0 && h < 0 {
			n--
		}
	}
	return n
}

// beside is what an edge from a to b itself adds to the winding number immediately to the left of its
// middle p. The chords count p on the side of the chord where it is; if that is the right side, the left side
// has one more.
func beside(a, b, p Point) int {
	switch {
	case a.Y <= p.Y && p.Y < b.Y:
		return 1
	case b.Y <= p.Y && p.Y < a.Y:
		return 0
	}
	above := p.Y >= max(a.Y, b.Y)
	if above == (b.X > a.X) {
		return 0
	}
	return 1
}
