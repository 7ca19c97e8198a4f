package linkage

import "math"

// block is a set of links that has to be solved together: the places of its joints are the unknowns,
// and every link of n pins gives one distance (its two base pins) and 2(n-2) linear equations that
// carry its other pins along with these. The linear form keeps a link whose pins lie on one line
// regular, where three distances would be singular. The Jacobian is analytic.
//
// The scratch in it makes a block usable by one walker at a time.
type block struct {
	joints  []int // unknown joints, ascending
	col     []int // joint to its column, -1 when it is placed already
	bars    []blockBar
	carried []carried
	n       int // equations = unknowns = 2 len(joints)
	size    float64

	jac, res, save []float64
	swap           []int
}

type blockBar struct {
	i, j int
	mm   float64
}

// carried is joint k at a + alpha (b-a) + beta left(b-a).
type carried struct {
	k, a, b     int
	link        int
	alpha, beta float64
}

func newBlock(joints int, placed []int, bars []blockBar, rest []carried) *block {
	b := &block{joints: placed, bars: bars, carried: rest, n: 2 * len(placed), col: make([]int, joints)}
	for i := range b.col {
		b.col[i] = -1
	}
	for i, j := range placed {
		b.col[j] = 2 * i
	}
	for _, r := range bars {
		b.size = math.Max(b.size, r.mm)
	}
	b.jac = make([]float64, b.n*b.n)
	b.res = make([]float64, b.n)
	b.save = make([]float64, b.n)
	b.swap = make([]int, b.n)
	return b
}

// residuals writes by how much each equation is missed, mm, and returns the largest.
func (b *block) residuals(p []Point, res []float64) float64 {
	worst := 0.0
	for r, e := range b.bars {
		d := sub(p[e.i], p[e.j])
		res[r] = (d.X*d.X + d.Y*d.Y - e.mm*e.mm) / (2 * e.mm)
		worst = math.Max(worst, math.Abs(res[r]))
	}
	r := len(b.bars)
	for _, c := range b.carried {
		d := sub(p[c.b], p[c.a])
		res[r] = p[c.k].X - p[c.a].X - c.alpha*d.X + c.beta*d.Y
		res[r+1] = p[c.k].Y - p[c.a].Y - c.alpha*d.Y - c.beta*d.X
		worst = math.Max(worst, math.Max(math.Abs(res[r]), math.Abs(res[r+1])))
		r += 2
	}
	return worst
}

// jacobian writes the derivatives of the equations with respect to the unknown joints.
func (b *block) jacobian(p []Point, jac []float64) {
	clear(jac)
	for r, e := range b.bars {
		d := sub(p[e.i], p[e.j])
		x, y := d.X/e.mm, d.Y/e.mm
		if c := b.col[e.i]; c >= 0 {
			jac[r*b.n+c] += x
			jac[r*b.n+c+1] += y
		}
		if c := b.col[e.j]; c >= 0 {
			jac[r*b.n+c] -= x
			jac[r*b.n+c+1] -= y
		}
	}
	r := len(b.bars)
	for _, e := range b.carried {
		if c := b.col[e.k]; c >= 0 {
			jac[r*b.n+c]++
			jac[(r+1)*b.n+c+1]++
		}
		if c := b.col[e.a]; c >= 0 {
			jac[r*b.n+c] += e.alpha - 1
			jac[r*b.n+c+1] -= e.beta
			jac[(r+1)*b.n+c] += e.beta
			jac[(r+1)*b.n+c+1] += e.alpha - 1
		}
		if c := b.col[e.b]; c >= 0 {
			jac[r*b.n+c] -= e.alpha
			jac[r*b.n+c+1] += e.beta
			jac[(r+1)*b.n+c] -= e.beta
			jac[(r+1)*b.n+c+1] -= e.alpha
		}
		r += 2
	}
}

// newton improves the unknown joints of p until the equations hold to rounding. It returns the
// determinant of the Jacobian at the solution, 0 when it did not converge.
func (b *block) newton(p []Point) float64 {
	tol := math.Max(1e-12, 8e-15*b.size)
	for range 14 {
		miss := b.residuals(p, b.res)
		if !(miss < 1e6*(1+b.size)) {
			return 0
		}
		b.jacobian(p, b.jac)
		det := factor(b.jac, b.n, b.swap)
		if det == 0 {
			return 0
		}
		backSolve(b.jac, b.n, b.swap, b.res)
		for i, j := range b.joints {
			p[j].X -= b.res[2*i]
			p[j].Y -= b.res[2*i+1]
		}
		if miss <= tol {
			return det
		}
	}
	if b.residuals(p, b.res) <= 4*tol {
		b.jacobian(p, b.jac)
		return factor(b.jac, b.n, b.swap)
	}
	return 0
}

// speeds writes the speeds of the unknown joints from those of the placed ones; newton has just left
// the factors of the Jacobian.
func (b *block) speeds(p, v []Point) {
	for _, j := range b.joints {
		v[j] = Point{}
	}
	for r, e := range b.bars {
		b.res[r] = -dot(sub(p[e.i], p[e.j]), sub(v[e.i], v[e.j])) / e.mm
	}
	r := len(b.bars)
	for _, c := range b.carried {
		d := sub(v[c.b], v[c.a])
		b.res[r] = -(v[c.k].X - v[c.a].X - c.alpha*d.X + c.beta*d.Y)
		b.res[r+1] = -(v[c.k].Y - v[c.a].Y - c.alpha*d.Y - c.beta*d.X)
		r += 2
	}
	backSolve(b.jac, b.n, b.swap, b.res)
	for i, j := range b.joints {
		v[j] = Point{X: b.res[2*i], Y: b.res[2*i+1]}
	}
}

// settle brings the unknown joints as near to closing as they go, by least squares with damping
// (Levenberg, Marquardt), and returns the largest miss, mm. It allocates; the search for assemblies
// and the size of a gap use it.
func (b *block) settle(p []Point, rounds int) float64 {
	n := b.n
	normal, rhs := make([]float64, n*n), make([]float64, n)
	try := append([]Point(nil), p...)
	sum := func(q []Point) float64 {
		b.residuals(q, b.save)
		s := 0.0
		for _, x := range b.save {
			s += x * x
		}
		return s
	}
	damp, cost := 1e-2, sum(p)
	for range rounds {
		if !(cost > 1e-24*b.size*b.size) {
			break
		}
		b.residuals(p, b.res)
		b.jacobian(p, b.jac)
		better := false
		for range 8 {
			for i := 0; i < n; i++ {
				rhs[i] = 0
				for k := 0; k < n; k++ {
					rhs[i] += b.jac[k*n+i] * b.res[k]
				}
				for j := 0; j < n; j++ {
					s := 0.0
					for k := 0; k < n; k++ {
						s += b.jac[k*n+i] * b.jac[k*n+j]
					}
					normal[i*n+j] = s
				}
				normal[i*n+i] += damp
			}
			if factor(normal, n, b.swap) != 0 {
				backSolve(normal, n, b.swap, rhs)
				copy(try, p)
				for i, j := range b.joints {
					try[j].X -= rhs[2*i]
					try[j].Y -= rhs[2*i+1]
				}
				if c := sum(try); c < cost {
					better = cost-c > 1e-12*cost
					cost = c
					copy(p, try)
					damp = math.Max(damp/8, 1e-12)
					break
				}
			}
			damp *= 6
		}
		if !better {
			break
		}
	}
	return b.residuals(p, b.res)
}
