package linkage

import "math"

// program is the plan with figures: the shapes of the links are chosen, so every joint follows from
// the ones before it by arithmetic. It is read only, except for the scratch inside its blocks: clone
// gives each walker its own.
type program struct {
	joints     int
	pivot, tip int     // the drive link's ground pin and next pin
	reach      float64 // between them, mm
	ground     []int
	steps      []progStep
	dyads      int
	blocks     int
	size       float64 // the longest length, mm
}

type progStep struct {
	kind   stepKind
	dyad   dyad
	index  int // among dyads or among blocks
	carry  []carried
	block  *block
	links  []int
	joints []int
}

// dyad is joint j at distance ra from a and rb from b.
type dyad struct {
	j, a, b int
	ra, rb  float64
}

// compile chooses a shape for each link (local points in the order of its pins).
func compile(joints int, pins [][]int, shape [][]Point, steps []planStep, ground []int, pivot, tip int) *program {
	pr := &program{joints: joints, pivot: pivot, tip: tip, ground: ground}
	local := func(link, joint int) Point {
		for i, p := range pins[link] {
			if p == joint {
				return shape[link][i]
			}
		}
		return Point{}
	}
	for k := range pins {
		for i, p := range shape[k] {
			for _, q := range shape[k][:i] {
				pr.size = math.Max(pr.size, dist(p, q))
			}
		}
	}
	placed := make([]bool, joints)
	for _, g := range ground {
		placed[g] = true
	}
	for n, s := range steps {
		ps := progStep{kind: s.kind, links: s.links, joints: s.joints}
		switch s.kind {
		case rigidStep:
			k := s.links[0]
			a, b := pivot, tip
			if n > 0 {
				a, b = base(pins[k], shape[k], placed)
			} else {
				pr.reach = dist(local(k, pivot), local(k, tip))
			}
			for _, j := range s.joints {
				if n > 0 || j != tip {
					ps.carry = append(ps.carry, carry(k, j, a, b, local(k, j), local(k, a), local(k, b)))
				}
			}
		case dyadStep:
			a, b := s.from[0], s.from[1]
			ps.dyad = dyad{
				j: s.joint, a: a, b: b,
				ra: dist(local(s.links[0], s.joint), local(s.links[0], a)),
				rb: dist(local(s.links[1], s.joint), local(s.links[1], b)),
			}
			ps.index = pr.dyads
			pr.dyads++
		case blockStep:
			var bs []blockBar
			var cs []carried
			for _, k := range s.links {
				a, b := base(pins[k], shape[k], nil)
				bs = append(bs, blockBar{a, b, dist(local(k, a), local(k, b))})
				for _, j := range pins[k] {
					if j != a && j != b {
						cs = append(cs, carry(k, j, a, b, local(k, j), local(k, a), local(k, b)))
					}
				}
			}
			ps.block = newBlock(joints, s.joints, bs, cs)
			ps.index = pr.blocks
			pr.blocks++
		}
		for _, j := range s.joints {
			placed[j] = true
		}
		pr.steps = append(pr.steps, ps)
	}
	return pr
}

// base returns the two pins furthest apart (of those allowed): the other pins are carried from them
// with the least error.
func base(pins []int, shape []Point, allowed []bool) (a, b int) {
	best := -1.0
	for i := range pins {
		for j := 0; j < i; j++ {
			if allowed != nil && !(allowed[pins[i]] && allowed[pins[j]]) {
				continue
			}
			if d := dist(shape[i], shape[j]); d > best*(1+1e-12) {
				best, a, b = d, pins[j], pins[i]
			}
		}
	}
	return a, b
}

func carry(link, k, a, b int, pk, pa, pb Point) carried {
	d, e := sub(pb, pa), sub(pk, pa)
	n := dot(d, d)
	return carried{link: link, k: k, a: a, b: b, alpha: dot(e, d) / n, beta: cross(d, e) / n}
}

// clone returns a program with blocks of its own.
func (pr *program) clone() *program {
	c := *pr
	c.steps = append([]progStep(nil), pr.steps...)
	for i := range c.steps {
		if b := c.steps[i].block; b != nil {
			c.steps[i].block = newBlock(pr.joints, b.joints, b.bars, b.carried)
		}
	}
	return &c
}

// frame is everything about one drive angle.
type frame struct {
	angle float64
	p, v  []Point   // places, and speeds per radian of drive
	signs []float64 // of each dyad: +1 when its joint lies left of a to b
	gap   []float64 // of each dyad: square of the joint's distance from the line a b, mm2
	slope []float64 // of each dyad: derivative of gap by the drive angle
	flat  []bool    // of each dyad: its links lie in line
	det   []float64 // of each block
}

func (pr *program) newFrame() *frame {
	f := &frame{
		p: make([]Point, pr.joints), v: make([]Point, pr.joints),
		signs: make([]float64, pr.dyads), gap: make([]float64, pr.dyads), slope: make([]float64, pr.dyads),
		flat: make([]bool, pr.dyads), det: make([]float64, pr.blocks),
	}
	return f
}

func (f *frame) copyFrom(g *frame) {
	f.angle = g.angle
	copy(f.p, g.p)
	copy(f.v, g.v)
	copy(f.signs, g.signs)
	copy(f.gap, g.gap)
	copy(f.slope, g.slope)
	copy(f.flat, g.flat)
	copy(f.det, g.det)
}

// The tolerances of a dyad's gap, relative to the square of its longer link.
const (
	// openGap: a gap below minus this is a loop that does not close. The links then miss each other
	// by 1e-13 of their length, which is rounding and far below the promised closure.
	openGap = 2e-13
	// flatGap: below this the dyad's links lie in line, within 1e-7 of their length.
	flatGap = 1e-14
)

// placeDrive places the ground pivots and the whole drive link.
func (pr *program) placeDrive(f *frame, angle float64) {
	f.angle = angle
	s, c := math.Sincos(angle)
	o := f.p[pr.pivot]
	f.p[pr.tip] = Point{X: o.X + pr.reach*c, Y: o.Y + pr.reach*s}
	f.v[pr.tip] = Point{X: -pr.reach * s, Y: pr.reach * c}
}

func (f *frame) carry(cs []carried) {
	for i := range cs {
		c := &cs[i]
		a, b := f.p[c.a], f.p[c.b]
		dx, dy := b.X-a.X, b.Y-a.Y
		f.p[c.k] = Point{X: a.X + c.alpha*dx - c.beta*dy, Y: a.Y + c.alpha*dy + c.beta*dx}
		a, b = f.v[c.a], f.v[c.b]
		dx, dy = b.X-a.X, b.Y-a.Y
		f.v[c.k] = Point{X: a.X + c.alpha*dx - c.beta*dy, Y: a.Y + c.alpha*dy + c.beta*dx}
	}
}

// meet places the dyad's joint on the side given by f.signs, with its speed; it reports false when
// the circles do not meet.
func (f *frame) meet(d *dyad, i int) bool {
	a, b := f.p[d.a], f.p[d.b]
	dx, dy := b.X-a.X, b.Y-a.Y
	span2 := dx*dx + dy*dy
	long := d.ra
	if d.rb > long {
		long = d.rb
	}
	if span2 < 1e-18*long*long {
		f.gap[i] = math.Inf(-1)
		return false
	}
	span := math.Sqrt(span2)
	diff := (d.ra - d.rb) * (d.ra + d.rb)
	x := (diff/span + span) / 2
	gap := (d.ra - x) * (d.ra + x)
	f.gap[i] = gap
	if gap < -openGap*long*long {
		return false
	}
	h := 0.0
	if gap > 0 {
		h = math.Sqrt(gap)
	}
	h *= f.signs[i]
	ux, uy := dx/span, dy/span
	nax, nay := x*ux-h*uy, x*uy+h*ux
	f.p[d.j] = Point{X: a.X + nax, Y: a.Y + nay}

	va, vb := f.v[d.a], f.v[d.b]
	turn := ux*(vb.X-va.X) + uy*(vb.Y-va.Y)
	f.slope[i] = -x * turn * (1 - diff/span2)
	f.flat[i] = gap <= flatGap*long*long
	if f.flat[i] {
		return true // the speed stays what it was just before
	}
	nbx, nby := nax-dx, nay-dy
	ra := nax*va.X + nay*va.Y
	rb := nbx*vb.X + nby*vb.Y
	det := 1 / (nax*nby - nay*nbx)
	f.v[d.j] = Point{X: (ra*nby - rb*nay) * det, Y: (nax*rb - nbx*ra) * det}
	return true
}

// fits returns by how much the joints in place miss the shape of a link, mm: the largest difference
// of a distance between two pins, or of a pin's place as carried from the base, which also tells a
// mirrored shape.
func fits(pins []int, shape, p []Point) float64 {
	worst := 0.0
	for i, a := range pins {
		for j := range i {
			worst = math.Max(worst, math.Abs(dist(p[a], p[pins[j]])-dist(shape[i], shape[j])))
		}
	}
	if len(pins) > 2 {
		a, b := base(pins, shape, nil)
		var pa, pb Point
		for i, j := range pins {
			if j == a {
				pa = shape[i]
			}
			if j == b {
				pb = shape[i]
			}
		}
		for i, j := range pins {
			c := carry(0, j, a, b, shape[i], pa, pb)
			d := sub(p[b], p[a])
			at := Point{X: p[a].X + c.alpha*d.X - c.beta*d.Y, Y: p[a].Y + c.alpha*d.Y + c.beta*d.X}
			worst = math.Max(worst, dist(at, p[j]))
		}
	}
	return worst
}

// closure returns the largest difference between a length and the distance of its pins, mm, over all
// links.
func closure(pins [][]int, shape [][]Point, p []Point) float64 {
	worst := 0.0
	for k := range pins {
		worst = math.Max(worst, fits(pins[k], shape[k], p))
	}
	return worst
}
