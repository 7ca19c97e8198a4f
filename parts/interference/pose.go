package interference

import (
	"fmt"
	"math"
	"slices"

	"gonum.org/v1/gonum/mat"
)

const (
	// newtonStop ends the iteration: below it the positions are exact to the last bits of a
	// coordinate of some hundred millimetres.
	newtonStop = 1e-11
	// roundingSlack bounds what rounding adds to an equation: newtonStop and the last bits of products of
	// coordinates and velocities, mm.
	roundingSlack = 1e-10
	// newtonSteps is ample: from a seed on the right branch five steps suffice.
	newtonSteps = 30
)

// pose is the state at the middle of a box and what can happen within it.
type pose struct {
	at    []Point   // by joint
	vel   [][]Point // by parameter, by joint: mm per unit of the parameter
	rho   []float64 // by joint: how far it may stray from the linear motion, mm
	loose bool      // nothing can be said about the box: rho is infinite
}

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
	hub := b.frame[slices.Index(b.pins, m.hub)]
	d := b.frame[i].Sub(hub)
	s, c := math.Sincos(theta - m.aside.Angle())
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
	for _, g := range m.parallel {
		o, a, b, d := g[0], g[1], g[2], g[3]
		off := at[a].Sub(at[o]).Sub(at[b].Sub(at[d]))
		rows = append(rows,
			equation{terms: []term{{a, 1, 0}, {o, -1, 0}, {b, -1, 0}, {d, 1, 0}}, residual: off.X, distance: -1},
			equation{terms: []term{{a, 0, 1}, {o, 0, -1}, {b, 0, -1}, {d, 0, 1}}, residual: off.Y, distance: -1})
	}
	return rows
}

// jacobian fills the matrix of the equations over the unknown joints.
func (m *mechanism) jacobian(rows []equation) *mat.Dense {
	data := make([]float64, m.rows*2*m.n)
	for i, r := range rows {
		for _, t := range r.terms {
			if s := m.slot[t.joint]; s >= 0 {
				data[i*2*m.n+2*s] += t.cx
				data[i*2*m.n+2*s+1] += t.cy
			}
		}
	}
	return mat.NewDense(m.rows, 2*m.n, data)
}

// surplus tells whether there are more equations than unknowns.
func (m *mechanism) surplus() bool { return m.rows > 2*m.n }

// slack bounds by how much an equation may be off, mm: rounding, and with surplus links what package
// linkage lets them stretch, twice that to be safe.
func (m *mechanism) slack() float64 {
	if m.surplus() {
		return roundingSlack + 2e-7*m.size
	}
	return roundingSlack
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
	moved := math.Inf(1)
	for range newtonSteps {
		rows := m.equations(at, u[0])
		j := m.jacobian(rows)
		worst := 0.0
		f := mat.NewVecDense(m.rows, nil)
		for i, r := range rows {
			f.SetVec(i, r.residual)
			worst = math.Max(worst, math.Abs(r.residual))
		}
		// Surplus equations that fit to within the slack only keep a rest that no step removes.
		if worst < newtonStop || m.surplus() && moved < newtonStop && worst < m.slack()/2 {
			return at, rows, j, nil
		}
		if err := step.SolveVec(j, f); err != nil {
			if _, ill := err.(mat.Condition); !ill {
				return nil, nil, nil, fmt.Errorf("at drive angle %.3f deg the linkage is at a toggle: %w", u[0]*180/math.Pi, err)
			}
		}
		moved = mat.Norm(&step, math.Inf(1))
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
// remainders of their circles, |u| d^2/2. So J r = q, and r = K q with K a left inverse of J.
// q is bounded by |q| <= (sum |V_a - V_b| h + rho_a + rho_b)^2 / 2L when |r_j| <= rho_j.
//
// If K maps these bounds strictly into the box |r_j| <= rho_j, the branch through the middle cannot leave
// it: it starts inside and moves continuously, and on the wall it would have to be strictly inside.
// Without surplus equations it is also required that r -> K q(r) contracts in the norm max |r_j|/rho_j:
// then there is one position in the tube for every d of the box, continuous in d, so that the loops are
// proven to close. If either fails the pose is loose and the box must be halved.
//
// Rounding: equations are off by a slack, which goes through K as well; K J differs from 1 by a matrix
// that is computed, and r = K q - (K J - 1) r.
func (m *mechanism) poseAt(u, h []float64, seed []Point) (pose, error) {
	at, rows, jac, err := m.solve(u, seed)
	if err != nil {
		return pose{}, err
	}
	p := pose{at: at, rho: make([]float64, len(m.joints))}
	inv, off, err := leftInverse(jac)
	if err != nil {
		return pose{}, fmt.Errorf("at drive angle %.3f deg the linkage is at a toggle: %w", u[0]*180/math.Pi, err)
	}
	_, groundVel, curve := m.grounds(u)
	rest := make([]float64, len(m.joints)) // remainder of the ground joints
	for k := range m.parameters() {
		p.vel = append(p.vel, m.velocities(rows, inv, k, groundVel[k]))
		for j := range rest {
			rest[j] += curve[k][j] * h[k] * h[k]
		}
	}
	m.remainders(&p, rows, inv, off, h, rest)
	return p, nil
}

// leftInverse returns K with K J = 1, and the largest row sum of |K J - 1|.
func leftInverse(jac *mat.Dense) (*mat.Dense, float64, error) {
	rows, cols := jac.Dims()
	var inv mat.Dense
	var err error
	if rows == cols {
		err = inv.Inverse(jac)
	} else {
		one := mat.NewDense(rows, rows, nil)
		for i := range rows {
			one.Set(i, i, 1)
		}
		err = inv.Solve(jac, one)
	}
	if err != nil {
		if _, ill := err.(mat.Condition); !ill {
			return nil, 0, err
		}
	}
	var product mat.Dense
	product.Mul(&inv, jac)
	off := 0.0
	for i := range cols {
		sum := 0.0
		for k := range cols {
			want := 0.0
			if i == k {
				want = 1
			}
			sum += math.Abs(product.At(i, k) - want)
		}
		off = math.Max(off, sum)
	}
	if math.IsNaN(off) {
		off = math.Inf(1)
	}
	return &inv, off, nil
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
func (m *mechanism) remainders(p *pose, rows []equation, inv *mat.Dense, off float64, h, rest []float64) {
	linear := make([]float64, len(m.links)) // bound of |V_a - V_b| d for each distance
	for i, b := range m.links {
		for k := range h {
			linear[i] += p.vel[k][b.pins[0]].Sub(p.vel[k][b.pins[1]]).Len() * h[k]
		}
	}
	q := make([]float64, m.rows)
	through := func(rho, out []float64) { // out = |K| q, by joint
		worst := 0.0
		for j, s := range m.slot {
			if s >= 0 {
				worst = math.Max(worst, rho[j])
			}
		}
		for j, s := range m.slot {
			if s < 0 {
				out[j] = rest[j]
				continue
			}
			x, y := off*worst, off*worst
			kx, ky := inv.RawRowView(2*s), inv.RawRowView(2*s+1)
			for i, v := range q {
				x += math.Abs(kx[i]) * v
				y += math.Abs(ky[i]) * v
			}
			out[j] = math.Hypot(x, y)
		}
	}
	slack := m.slack()
	apply := func(rho, out []float64) {
		for i, r := range rows {
			q[i] = slack
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
		through(rho, out)
	}
	contracts := func(rho, out []float64) {
		for i, r := range rows {
			q[i] = 0
			if r.distance >= 0 {
				b := m.links[r.distance]
				own := 0.0 // ground joints have no part in the difference of two positions
				for _, j := range b.pins[:2] {
					if m.slot[j] >= 0 {
						own += rho[j]
					}
				}
				q[i] = (linear[r.distance] + rho[b.pins[0]] + rho[b.pins[1]]) * own / b.length
			}
		}
		through(rho, out)
	}
	rho := make([]float64, len(m.joints))
	next := make([]float64, len(m.joints))
	for range 40 {
		apply(rho, next)
		grown, far := false, false
		for j := range next {
			grown = grown || next[j] > rho[j]*1.001+1e-15
			far = far || !(next[j] < 10*m.size)
		}
		rho, next = next, rho
		if !grown || far {
			break
		}
	}
	for j := range rho {
		rho[j] = rho[j]*1.05 + 1e-9
	}
	inside := func() bool {
		for j := range rho {
			if m.slot[j] >= 0 && !(next[j] < rho[j]) {
				return false
			}
		}
		return true
	}
	apply(rho, next)
	holds := inside()
	if holds && !m.surplus() {
		contracts(rho, next)
		holds = inside()
	}
	if !holds {
		p.loose = true
		for i := range rho {
			rho[i] = math.Inf(1)
		}
	}
	p.rho = rho
}
