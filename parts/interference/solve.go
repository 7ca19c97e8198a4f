package interference

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/mat"

	"pinwright/parts/outline"
)

const (
	// newtonStop ends the iteration: below it the positions are exact to the last bits of a
	// coordinate of some hundred millimetres.
	newtonStop = 1e-11
	// newtonSteps is ample: from a seed on the right branch five steps suffice.
	newtonSteps = 30
)

// grounds returns place, velocity by parameter and curvature bound of every ground joint at the
// parameters u; entries of moving joints are zero.
func (m *mechanism) grounds(u []float64) (at []Point, vel [][]Point, curve [][]float64) {
	at = make([]Point, len(m.joints))
	vel = make([][]Point, m.parameters())
	curve = make([][]float64, m.parameters())
	for k := range vel {
		vel[k] = make([]Point, len(m.joints))
		curve[k] = make([]float64, len(m.joints))
	}
	for j, g := range m.ground {
		if g.fixed {
			at[j] = g.at
		}
	}
	for s, j := range m.settings {
		at[j], vel[s+1][j], curve[s+1][j] = m.ground[j].groundAt(u[s+1])
	}
	return at, vel, curve
}

// turned returns where pin i of the driven link lies from the hub at drive angle theta.
func (m *mechanism) turned(i int, theta float64) Point {
	b := m.links[m.driven]
	hub, next := 0, -1
	for k, p := range b.pins {
		if p == m.hub {
			hub = k
		} else if next < 0 {
			next = k
		}
	}
	zero := b.frame[next].Sub(b.frame[hub])
	d := b.frame[i].Sub(b.frame[hub])
	s, c := math.Sincos(theta - math.Atan2(zero.Y, zero.X))
	return Point{X: c*d.X - s*d.Y, Y: s*d.X + c*d.Y}
}

// term is one coefficient block of an equation: a row vector (cx, cy) applied to a joint.
type term struct {
	joint  int
	cx, cy float64
}

// equation is one row: its terms, its residual at the present positions, and what may drive it.
type equation struct {
	terms    []term
	residual float64
	distance int // index of the link whose distance it is, or -1
	turn     Point
	turns    bool // a row of the driven link: turn is its pin's place from the hub
	axis     int  // 0: x, 1: y, of a row of the driven link
}

// equations writes the linearised system at the positions at.
func (m *mechanism) equations(at []Point, theta float64) []equation {
	rows := make([]equation, 0, m.rows)
	for i, b := range m.links {
		if i == m.driven {
			for k, p := range b.pins {
				if p == m.hub {
					continue
				}
				want := m.turned(k, theta)
				off := at[p].Sub(at[m.hub]).Sub(want)
				rows = append(rows,
					equation{terms: []term{{p, 1, 0}, {m.hub, -1, 0}}, residual: off.X, distance: -1, turn: want, turns: true, axis: 0},
					equation{terms: []term{{p, 0, 1}, {m.hub, 0, -1}}, residual: off.Y, distance: -1, turn: want, turns: true, axis: 1})
			}
			continue
		}
		p, q := b.pins[0], b.pins[1]
		d := at[p].Sub(at[q])
		n := d.Scale(1 / b.length)
		rows = append(rows, equation{
			terms:    []term{{p, n.X, n.Y}, {q, -n.X, -n.Y}},
			residual: (d.Dot(d) - b.length*b.length) / (2 * b.length),
			distance: i,
		})
		base := at[q].Sub(at[p])
		for k, r := range b.pins[2:] {
			fa, fb := b.a[k], b.b[k]
			off := at[r].Sub(at[p]).Sub(base.Scale(fa)).Sub(base.Left().Scale(fb))
			rows = append(rows,
				equation{terms: []term{{r, 1, 0}, {p, fa - 1, -fb}, {q, -fa, fb}}, residual: off.X, distance: -1},
				equation{terms: []term{{r, 0, 1}, {p, fb, fa - 1}, {q, -fb, -fa}}, residual: off.Y, distance: -1})
		}
	}
	return rows
}

// jacobian fills the square matrix of the equations over the unknown joints.
func (m *mechanism) jacobian(rows []equation) *mat.Dense {
	j := mat.NewDense(m.rows, 2*m.n, nil)
	for i, r := range rows {
		for _, t := range r.terms {
			if s := m.slot[t.joint]; s >= 0 {
				j.Set(i, 2*s, j.At(i, 2*s)+t.cx)
				j.Set(i, 2*s+1, j.At(i, 2*s+1)+t.cy)
			}
		}
	}
	return j
}

// solve returns the positions of all joints at the parameters u, starting from seed.
func (m *mechanism) solve(u []float64, seed []Point) ([]Point, []equation, *mat.Dense, error) {
	at, _, _ := m.grounds(u)
	for j := range at {
		if m.slot[j] >= 0 {
			at[j] = seed[j]
		}
	}
	var step mat.VecDense
	for range newtonSteps {
		rows := m.equations(at, u[0])
		j := m.jacobian(rows)
		worst := 0.0
		f := mat.NewVecDense(m.rows, nil)
		for i, r := range rows {
			f.SetVec(i, r.residual)
			worst = math.Max(worst, math.Abs(r.residual))
		}
		if worst < newtonStop {
			return at, rows, j, nil
		}
		if err := step.SolveVec(j, f); err != nil {
			if _, ill := err.(mat.Condition); !ill {
				return nil, nil, nil, fmt.Errorf("at drive angle %.3f deg the linkage is at a toggle: %w", u[0]*180/math.Pi, err)
			}
		}
		for k, s := range m.slot {
			if s >= 0 {
				at[k] = at[k].Sub(Point{X: step.AtVec(2 * s), Y: step.AtVec(2*s + 1)})
			}
		}
	}
	return nil, nil, nil, fmt.Errorf("at drive angle %.3f deg the loop does not close", u[0]*180/math.Pi)
}

// poseAt solves the middle u of a box of half widths h and bounds what happens within it.
//
// With e the displacement of the joints from the middle, V the velocities and d the parameters'
// displacement, write e = V d + r. A distance equation between joints a and b, length L, unit
// vector n, reads n.(e_a - e_b) = -|e_a - e_b|^2 / 2L exactly; V d fulfils its linear part, so
// n.(r_a - r_b) = -|e_a - e_b|^2 / 2L. The driven pins and the adjustable pivots contribute the
// remainders of their circles, |u| d^2/2. With K the inverse of the Jacobian, r = K q, and q is
// bounded by |q| <= (sum |V_a - V_b| h + rho_a + rho_b)^2 / 2L when |r_j| <= rho_j. If that bound
// maps the box |r_j| <= rho_j into itself, the branch through the middle cannot leave it (it starts
// inside and moves continuously, and on the wall it would have to be strictly inside): rho is
// proven. Otherwise rho is infinite and the box must be halved.
func (m *mechanism) poseAt(u, h []float64, seed []Point) (pose, error) {
	at, rows, jac, err := m.solve(u, seed)
	if err != nil {
		return pose{}, err
	}
	p := pose{at: at, rho: make([]float64, len(m.joints))}
	var inv mat.Dense
	if err := inv.Inverse(jac); err != nil {
		if _, ill := err.(mat.Condition); !ill {
			return pose{}, fmt.Errorf("at drive angle %.3f deg the linkage is at a toggle: %w", u[0]*180/math.Pi, err)
		}
	}
	_, groundVel, curve := m.grounds(u)
	rest := make([]float64, len(m.joints)) // remainder of the ground joints
	for k := range m.parameters() {
		p.vel = append(p.vel, m.velocities(rows, &inv, k, groundVel[k]))
		for j := range rest {
			rest[j] += curve[k][j] * h[k] * h[k]
		}
	}
	m.remainders(&p, rows, &inv, h, rest)
	return p, nil
}

// velocities returns the joints' velocities with respect to parameter k; known holds those of the
// ground joints.
func (m *mechanism) velocities(rows []equation, inv *mat.Dense, k int, known []Point) []Point {
	rhs := mat.NewVecDense(m.rows, nil)
	for i, r := range rows {
		v := 0.0
		for _, t := range r.terms {
			if m.slot[t.joint] < 0 {
				v -= t.cx*known[t.joint].X + t.cy*known[t.joint].Y
			}
		}
		if r.turns && k == 0 {
			if r.axis == 0 {
				v -= r.turn.Y
			} else {
				v += r.turn.X
			}
		}
		rhs.SetVec(i, v)
	}
	var x mat.VecDense
	x.MulVec(inv, rhs)
	vel := make([]Point, len(m.joints))
	for j, s := range m.slot {
		if s >= 0 {
			vel[j] = Point{X: x.AtVec(2 * s), Y: x.AtVec(2*s + 1)}
		} else {
			vel[j] = known[j]
		}
	}
	return vel
}

// remainders finds rho of poseAt by iterating the bound from below, widening it a little and testing
// that it maps into itself.
func (m *mechanism) remainders(p *pose, rows []equation, inv *mat.Dense, h, rest []float64) {
	linear := make([]float64, len(m.links)) // bound of |V_a - V_b| d for each distance
	for i, b := range m.links {
		for k := range h {
			linear[i] += p.vel[k][b.pins[0]].Sub(p.vel[k][b.pins[1]]).Len() * h[k]
		}
	}
	q := make([]float64, m.rows)
	apply := func(rho, out []float64) {
		for i, r := range rows {
			q[i] = 0
			for _, t := range r.terms {
				if m.slot[t.joint] < 0 {
					q[i] += math.Hypot(t.cx, t.cy) * rest[t.joint]
				}
			}
			if r.turns {
				q[i] += r.turn.Len() * h[0] * h[0] / 2
			}
			if r.distance >= 0 {
				b := m.links[r.distance]
				d := linear[r.distance] + rho[b.pins[0]] + rho[b.pins[1]]
				q[i] += d * d / (2 * b.length)
			}
		}
		for j, s := range m.slot {
			if s < 0 {
				out[j] = rest[j]
				continue
			}
			var x, y float64
			for i, v := range q {
				x += math.Abs(inv.At(2*s, i)) * v
				y += math.Abs(inv.At(2*s+1, i)) * v
			}
			out[j] = math.Hypot(x, y)
		}
	}
	rho := make([]float64, len(m.joints))
	next := make([]float64, len(m.joints))
	for range 40 {
		apply(rho, next)
		grown := false
		for j := range next {
			if next[j] > rho[j]*1.001+1e-15 {
				grown = true
			}
		}
		rho, next = next, rho
		if !grown {
			break
		}
	}
	for j := range rho {
		rho[j] = rho[j]*1.05 + 1e-9
	}
	apply(rho, next)
	for j := range rho {
		if m.slot[j] >= 0 && !(next[j] < rho[j]) {
			for i := range p.rho {
				p.rho[i] = math.Inf(1)
			}
			return
		}
	}
	p.rho = rho
}

// placement returns the motion that carries link i from its frame to the pose.
func (m *mechanism) placement(p pose, i int) outline.Transform {
	b := m.links[i]
	local := b.frame[1].Sub(b.frame[0])
	d := p.at[b.pins[1]].Sub(p.at[b.pins[0]])
	// cos and sin of the turn from the local base to the present one, without angles.
	c := local.Dot(d) / (b.length * b.length)
	s := local.Cross(d) / (b.length * b.length)
	norm := math.Hypot(c, s)
	t := outline.Transform{Cos: c / norm, Sin: s / norm}
	at := t.Apply(b.frame[0])
	t.Move = p.at[b.pins[0]].Sub(at)
	return t
}
