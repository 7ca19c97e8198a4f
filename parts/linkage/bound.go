package linkage

import "math"

// Bound holds upper bounds over an interval of the drive, for proofs that hold between positions and
// not at them only. An entry is +Inf where nothing can be promised (a dyad may come in line within
// the interval): take a shorter interval.
type Bound struct {
	Speed []float64 // of each joint, mm per radian of drive
	Turn  []float64 // angular velocity of each link, radians per radian of drive, absolute
	Pull  []float64 // acceleration of each joint, mm per radian squared
}

// Reach bounds the speed of any point of link k (its index in Linkage.Links) that lies within away
// mm of the joint with index j, a pin of that link.
func (b Bound) Reach(k, j int, away float64) float64 { return b.Speed[j] + away*b.Turn[k] }

// Bound returns bounds that hold from half radians before the position to half after it, as far as
// the drive goes. They are proved, rounding aside, group by group as the places are solved:
//
//  1. The crank's pins move in circles.
//  2. A dyad's pivots part at no more than their speed difference now plus what their accelerations
//     add; that bounds their distance over the interval, and by the law of cosines the sine s of the
//     angle between the links from below. A link of length r then turns at no more than w =
//     dv/(r s), and gains no more than (da + r w^2 + r' w'^2)/(r s), dv and da being the differences
//     of the pivots' speed and acceleration. Speed now plus half times acceleration bounds the speed.
//  3. In a block the inverse Jacobian now, corrected for how far the Jacobian can change (Neumann's
//     series), bounds the accelerations by the speeds; these are raised until they bound themselves,
//     which by continuity makes them bounds.
//
// As half shrinks the bounds of the speeds tend to the speeds themselves. Time as for solving.
func (c *Cycle) Bound(p Position, half float64) Bound {
	m, pr := c.m, c.prog
	half = math.Abs(half)
	g := bounder{pr: pr, p: p, half: half, speed: make([]float64, pr.joints), pull: make([]float64, pr.joints), gain: make([]float64, len(m.pins))}
	for k := range g.gain {
		g.gain[k] = math.Inf(1)
	}
	g.gain[m.drive] = 0
	g.speed[pr.tip], g.pull[pr.tip] = pr.reach, pr.reach
	for k := range pr.steps {
		s := &pr.steps[k]
		switch s.kind {
		case rigidStep:
			g.carry(s.carry)
		case dyadStep:
			g.dyad(s)
		case blockStep:
			g.block(s)
		}
	}
	b := Bound{Speed: g.speed, Pull: g.pull, Turn: make([]float64, len(m.pins))}
	for k, pins := range m.pins {
		i, j := base(pins, m.shape[k], nil)
		d := dist(p.Places[i], p.Places[j])
		gain := math.Min(g.gain[k], (g.pull[i]+g.pull[j])/d)
		b.Turn[k] = math.Min(math.Abs(m.Turn(m.linkage.Links[k].Name, p))+half*gain, (g.speed[i]+g.speed[j])/d)
	}
	return b
}

type bounder struct {
	pr          *program
	p           Position
	half        float64
	speed, pull []float64 // by joint
	gain        []float64 // angular acceleration by link
}

func (g *bounder) carry(cs []carried) {
	for _, c := range cs {
		wa, wb := math.Hypot(1-c.alpha, c.beta), math.Hypot(c.alpha, c.beta)
		g.pull[c.k] = wa*g.pull[c.a] + wb*g.pull[c.b]
		g.speed[c.k] = math.Min(wa*g.speed[c.a]+wb*g.speed[c.b], norm(g.p.Speeds[c.k])+g.half*g.pull[c.k])
	}
}

func (g *bounder) dyad(s *progStep) {
	d, p := s.dyad, g.p
	da := g.pull[d.a] + g.pull[d.b]
	dv := norm(sub(p.Speeds[d.b], p.Speeds[d.a])) + g.half*da
	span := dist(p.Places[d.a], p.Places[d.b])
	sine := math.Min(d.sine(span-g.half*dv), d.sine(span+g.half*dv))
	if !(sine > 0) {
		g.speed[d.j], g.pull[d.j] = math.Inf(1), math.Inf(1)
		return
	}
	wa, wb := dv/(d.ra*sine), dv/(d.rb*sine)
	push := da + d.ra*wa*wa + d.rb*wb*wb
	ga, gb := push/(d.ra*sine), push/(d.rb*sine)
	g.gain[s.links[0]], g.gain[s.links[1]] = ga, gb
	g.pull[d.j] = math.Min(g.pull[d.a]+d.ra*(ga+wa*wa), g.pull[d.b]+d.rb*(gb+wb*wb))
	g.speed[d.j] = math.Min(
		norm(p.Speeds[d.j])+g.half*g.pull[d.j],
		math.Min(g.speed[d.a]+d.ra*wa, g.speed[d.b]+d.rb*wb))
}

// sine is that of the angle at the joint when the pivots are span apart; 0 when they cannot be.
func (d dyad) sine(span float64) float64 {
	if span <= 0 {
		return 0
	}
	cos := (d.ra*d.ra + d.rb*d.rb - span*span) / (2 * d.ra * d.rb)
	return math.Sqrt(math.Max(0, (1-cos)*(1+cos)))
}

func (g *bounder) block(s *progStep) {
	b := newBlock(g.pr.joints, s.block.joints, s.block.bars, s.block.carried)
	n := b.n
	fail := func() {
		for _, j := range b.joints {
			g.speed[j], g.pull[j] = math.Inf(1), math.Inf(1)
		}
	}
	b.jacobian(g.p.Places, b.jac)
	if factor(b.jac, n, b.swap) == 0 {
		fail()
		return
	}
	rows := make([]float64, n) // absolute row sums of the inverse
	for k := range n {
		clear(b.res)
		b.res[k] = 1
		backSolve(b.jac, n, b.swap, b.res)
		for i, x := range b.res {
			rows[i] += math.Abs(x)
		}
	}
	inverse := 0.0
	for _, x := range rows {
		inverse = math.Max(inverse, x)
	}
	known := func(j int) float64 { // acceleration of a joint that is placed already
		if b.col[j] < 0 {
			return g.pull[j]
		}
		return 0
	}
	speed := func(j int) float64 {
		if b.col[j] < 0 {
			return g.speed[j]
		}
		return norm(g.p.Speeds[j]) + g.half*g.pull[j]
	}
	for _, j := range b.joints {
		g.pull[j] = 0
	}
	for range 40 {
		shift, push := 0.0, 0.0
		for _, e := range b.bars {
			dv := norm(sub(g.p.Speeds[e.i], g.p.Speeds[e.j])) + g.half*(g.pull[e.i]+g.pull[e.j])
			shift = math.Max(shift, 2*math.Sqrt2*g.half*(speed(e.i)+speed(e.j))/e.mm)
			push = math.Max(push, dv*dv/e.mm+known(e.i)+known(e.j))
		}
		for _, c := range b.carried {
			push = math.Max(push, known(c.k)+math.Hypot(1-c.alpha, c.beta)*known(c.a)+math.Hypot(c.alpha, c.beta)*known(c.b))
		}
		if !(inverse*shift < 0.9) {
			break
		}
		pull := math.Sqrt2 * inverse / (1 - inverse*shift) * push
		holds := true
		for _, j := range b.joints {
			holds = holds && pull <= g.pull[j]
			g.pull[j] = math.Max(g.pull[j], 1.05*pull)
		}
		if holds {
			for _, j := range b.joints {
				g.speed[j] = speed(j)
			}
			return
		}
	}
	fail()
}
