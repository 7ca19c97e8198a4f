package linkage

import (
	"fmt"

	"gonum.org/v1/gonum/mat"
)

// Sensitivity is how a joint moves when one length, or one coordinate of a ground pivot, grows by a
// millimetre, the drive angle held: mm per mm.
type Sensitivity struct {
	Link, A, B string // the length; empty for a ground pivot
	Pivot      string // the ground pivot; empty for a length
	Along      Point  // of a ground pivot: direction in which it is shifted
	Move       Point
}

// Sensitivities returns the derivatives of the place of a joint at a position by every length of
// every link (in their order) and by both coordinates of every ground pivot (in the order of the
// joints). They are exact, from the same linear equations that give the speeds.
//
// The lengths of pins on one line are not independent; there a length counts for what it shifts the
// pins along the line, the other lengths giving way as little as they can. Lengths of surplus links
// have no influence.
func (c *Cycle) Sensitivities(p Position, joint string) ([]Sensitivity, error) {
	j, ok := c.m.joint[joint]
	if !ok {
		return nil, fmt.Errorf("sensitivity: there is no joint %s", joint)
	}
	pr := c.prog.clone()
	f := pr.frameOf(&p)
	for i, flat := range f.flat {
		if flat {
			return nil, fmt.Errorf("sensitivity: %s lie in line at drive angle %s, nothing can be said there", andList(c.m.linkNames(pr.dyadLinks(i))), degrees(p.Angle))
		}
	}
	var out []Sensitivity
	still := make([]Point, pr.joints)
	for k, l := range c.m.linkage.Links {
		for i, g := range l.Lengths {
			v := variation{pr: pr, f: f, pins: c.m.pins, shape: c.m.shape, link: k, grow: shapeDerivative(l, c.m.shape[k], i), move: make([]Point, pr.joints)}
			v.run(still)
			out = append(out, Sensitivity{Link: l.Name, A: g.A, B: g.B, Move: v.move[j]})
		}
	}
	for _, o := range c.m.ground {
		for _, along := range []Point{{X: 1}, {Y: 1}} {
			shift := make([]Point, pr.joints)
			shift[o] = along
			v := variation{pr: pr, f: f, pins: c.m.pins, shape: c.m.shape, link: -1, move: make([]Point, pr.joints)}
			v.run(shift)
			out = append(out, Sensitivity{Pivot: c.m.jointNames[o], Along: along, Move: v.move[j]})
		}
	}
	return out, nil
}

func (pr *program) dyadLinks(i int) []int {
	for _, s := range pr.steps {
		if s.kind == dyadStep && s.index == i {
			return s.links
		}
	}
	return nil
}

// shapeDerivative returns how the local places of a link's pins move when its length number i grows
// by one: the least-squares solution of the linearised distances, smallest when several are equal.
func shapeDerivative(l Link, shape []Point, i int) []Point {
	n := len(shape)
	at := map[string]int{}
	for k, p := range l.Pins {
		at[p] = k
	}
	a := mat.NewDense(len(l.Lengths), 2*n, nil)
	rhs := mat.NewVecDense(len(l.Lengths), nil)
	rhs.SetVec(i, 1)
	for r, g := range l.Lengths {
		p, q := at[g.A], at[g.B]
		d := sub(shape[p], shape[q])
		u := norm(d)
		a.Set(r, 2*p, d.X/u)
		a.Set(r, 2*p+1, d.Y/u)
		a.Set(r, 2*q, -d.X/u)
		a.Set(r, 2*q+1, -d.Y/u)
	}
	grow := make([]Point, n)
	var svd mat.SVD
	if !svd.Factorize(a, mat.SVDThin) {
		return grow
	}
	var x mat.VecDense
	svd.SolveVecTo(&x, rhs, svd.Rank(rankTolerance))
	for k := range grow {
		grow[k] = Point{X: x.AtVec(2 * k), Y: x.AtVec(2*k + 1)}
	}
	return grow
}

// variation carries a small change of one link's shape and of the ground pivots through the program,
// group by group as the speeds are, the drive held.
type variation struct {
	pr    *program
	f     *frame
	pins  [][]int
	shape [][]Point
	link  int     // whose shape changes; -1: none
	grow  []Point // of its local places
	move  []Point // result, by joint
}

func (v *variation) local(link, joint int) (at, grow Point) {
	for i, p := range v.pins[link] {
		if p == joint {
			at = v.shape[link][i]
			if link == v.link {
				grow = v.grow[i]
			}
		}
	}
	return at, grow
}

// stretch is by how much the distance of two pins of a link grows.
func (v *variation) stretch(link, i, j int) float64 {
	p, dp := v.local(link, i)
	q, dq := v.local(link, j)
	d := sub(p, q)
	return dot(d, sub(dp, dq)) / norm(d)
}

// bend is by how much the factors of a carried pin change, as a shift of the pin in the plane.
func (v *variation) bend(link int, c carried) Point {
	pa, da := v.local(link, c.a)
	pb, db := v.local(link, c.b)
	pk, dk := v.local(link, c.k)
	d, e := sub(pb, pa), sub(pk, pa)
	dd, de := sub(db, da), sub(dk, da)
	n, dn := dot(d, d), 2*dot(d, dd)
	alpha := (dot(de, d) + dot(e, dd) - c.alpha*dn) / n
	beta := (cross(dd, e) + cross(d, de) - c.beta*dn) / n
	w := sub(v.f.p[c.b], v.f.p[c.a])
	return Point{X: alpha*w.X - beta*w.Y, Y: alpha*w.Y + beta*w.X}
}

func (v *variation) carry(link int, cs []carried) {
	for _, c := range cs {
		a, b := v.move[c.a], v.move[c.b]
		d, bent := sub(b, a), v.bend(link, c)
		v.move[c.k] = Point{X: a.X + c.alpha*d.X - c.beta*d.Y + bent.X, Y: a.Y + c.alpha*d.Y + c.beta*d.X + bent.Y}
	}
}

func (v *variation) run(ground []Point) {
	pr, f := v.pr, v.f
	for _, o := range pr.ground {
		v.move[o] = ground[o]
	}
	drive := pr.steps[0].links[0]
	arm := sub(f.p[pr.tip], f.p[pr.pivot])
	v.move[pr.tip] = addScaled(v.move[pr.pivot], v.stretch(drive, pr.pivot, pr.tip)/pr.reach, arm)
	for k := range pr.steps {
		s := &pr.steps[k]
		switch s.kind {
		case rigidStep:
			v.carry(s.links[0], s.carry)
		case dyadStep:
			d := s.dyad
			na, nb := sub(f.p[d.j], f.p[d.a]), sub(f.p[d.j], f.p[d.b])
			ra := dot(na, v.move[d.a]) + d.ra*v.stretch(s.links[0], d.j, d.a)
			rb := dot(nb, v.move[d.b]) + d.rb*v.stretch(s.links[1], d.j, d.b)
			det := cross(na, nb)
			v.move[d.j] = Point{X: (ra*nb.Y - rb*na.Y) / det, Y: (na.X*rb - nb.X*ra) / det}
		case blockStep:
			v.solveBlock(s)
		}
	}
}

func (v *variation) solveBlock(s *progStep) {
	b := s.block
	b.jacobian(v.f.p, b.jac)
	if factor(b.jac, b.n, b.swap) == 0 {
		return
	}
	for _, j := range b.joints {
		v.move[j] = Point{}
	}
	for r, e := range b.bars {
		b.res[r] = v.stretch(s.links[r], e.i, e.j) - dot(sub(v.f.p[e.i], v.f.p[e.j]), sub(v.move[e.i], v.move[e.j]))/e.mm
	}
	r := len(b.bars)
	for _, c := range b.carried {
		bent := v.bend(c.link, c)
		d := sub(v.move[c.b], v.move[c.a])
		b.res[r] = bent.X - (v.move[c.k].X - v.move[c.a].X - c.alpha*d.X + c.beta*d.Y)
		b.res[r+1] = bent.Y - (v.move[c.k].Y - v.move[c.a].Y - c.alpha*d.Y - c.beta*d.X)
		r += 2
	}
	backSolve(b.jac, b.n, b.swap, b.res)
	for i, j := range b.joints {
		v.move[j] = Point{X: b.res[2*i], Y: b.res[2*i+1]}
	}
}
