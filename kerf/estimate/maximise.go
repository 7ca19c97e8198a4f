package estimate

import (
	"errors"
	"math"
	"slices"

	"gonum.org/v1/gonum/mat"
	"gonum.org/v1/gonum/stat/distuv"
)

// peak is a maximum of a likelihood.
type peak struct {
	at    []float64
	value float64
}

// start is least squares on the middles of the readings: where the search begins.
func (d *data) start(m model) []float64 {
	k := len(m.mean)
	p := make([]float64, m.size())
	var xs, ys []float64
	for _, f := range d.features {
		low, high := math.Inf(-1), math.Inf(1)
		var x [meanTerms]float64
		for _, r := range f.rows {
			if r.answer != "" && len(f.rows) > 1 {
				low, high = max(low, r.low), min(high, r.high)
				x = r.x
				continue
			}
			xs, ys = append(xs, pick(m, r.x)...), append(ys, middle(r.low, r.high))
		}
		if !math.IsInf(low, -1) || !math.IsInf(high, 1) {
			xs, ys = append(xs, pick(m, x)...), append(ys, middle(low, high))
		}
	}
	n := len(ys)
	spread := 0.05
	if n > 0 {
		x, y := mat.NewDense(n, k, xs), mat.NewVecDense(n, ys)
		var normal mat.SymDense
		normal.SymOuterK(1, x.T())
		for i := range k {
			normal.SetSym(i, i, normal.At(i, i)*(1+1e-9)+1e-9)
		}
		var c mat.Cholesky
		var b, right mat.VecDense
		right.MulVec(x.T(), y)
		if c.Factorize(&normal) && c.SolveVecTo(&b, &right) == nil {
			for i := range k {
				p[i] = b.AtVec(i)
			}
			var left mat.VecDense
			left.MulVec(x, &b)
			left.SubVec(y, &left)
			spread = math.Sqrt(mat.Dot(&left, &left) / float64(n))
		}
	}
	spread = min(max(spread, 2*d.scale), 1)
	p[m.scatterAt()] = math.Log(spread)
	if m.repeat {
		p[m.repeatAt()] = math.Log(max(d.leastRepeat, spread/3))
	}
	for _, at := range []int{m.dropsAt(), m.pushAt()} {
		if at >= 0 {
			p[at] = math.Log(0.05)
		}
	}
	return p
}

// pick takes the model's columns of a row of the design.
func pick(m model, x [meanTerms]float64) []float64 {
	out := make([]float64, len(m.mean))
	for i, t := range m.mean {
		out[i] = x[t]
	}
	return out
}

// middle of an interval, or its end a little inside.
func middle(low, high float64) float64 {
	switch {
	case math.IsInf(low, -1):
		return high - 0.05
	case math.IsInf(high, 1):
		return low + 0.05
	}
	return (low + high) / 2
}

// errStuck is the error of a search that found no maximum.
var errStuck = errors.New("the readings have no best explanation by this model: look for slips in the table, or measure more with a calliper")

// maximise finds the maximum of the (restricted) likelihood from a start, nil: least squares.
func (d *data) maximise(m model, restricted bool, from []float64) (peak, error) {
	if from == nil {
		from = d.start(m)
	}
	return d.climb(m, restricted, from, -1, nil)
}

// climb maximises over all parameters but the one that is held (-1: none), by the quasi-Newton method
// of Broyden, Fletcher, Goldfarb and Shanno in coordinates in which the Hessian, or when it is nil the
// information of exact readings, is the unit matrix.
func (d *data) climb(m model, restricted bool, from []float64, held int, hessian *mat.SymDense) (peak, error) {
	var free []int
	for i := range from {
		if i != held {
			free = append(free, i)
		}
	}
	full := slices.Clone(from)
	if len(free) == 0 {
		return peak{full, d.likelihood(m, full, nil, restricted)}, nil
	}
	back, enough := mat.Matrix(nil), 2e-5
	if hessian == nil {
		back = d.whitening(m, from, free)
	} else {
		// Near the peak: a gradient of 1e-3 is then a value within 1e-6.
		back, enough = whiten(hessian, free), 1e-3
	}
	expand := func(z []float64) {
		copy(full, from)
		for i, at := range free {
			for k := range z {
				full[at] += back.At(i, k) * z[k]
			}
		}
	}
	g := make([]float64, len(from))
	wall := func() bool {
		for i, v := range full {
			if math.IsNaN(v) || math.Abs(v) > 50 || i >= len(m.mean) && v > 4 {
				return true
			}
		}
		return false
	}
	z, value := descend(len(free), enough, func(z, grad []float64) float64 {
		expand(z)
		if wall() {
			return math.Inf(1)
		}
		value := d.likelihood(m, full, g, restricted)
		for k := range grad {
			grad[k] = 0
			for i, at := range free {
				grad[k] -= back.At(i, k) * g[at]
			}
		}
		if math.IsNaN(value) || math.IsNaN(norm(grad)) {
			return math.Inf(1)
		}
		return -value
	})
	if math.IsInf(value, 1) {
		return peak{}, errStuck
	}
	expand(z)
	return peak{slices.Clone(full), -value}, nil
}

// whitening is a matrix whose columns are steps of one standard error each, independent of each other.
func (d *data) whitening(m model, at []float64, free []int) *mat.TriDense {
	info := d.information(m, d.state(m, at))
	n := len(free)
	whole := mat.NewSymDense(n, nil)
	for i, a := range free {
		for k, b := range free {
			if a < len(m.mean) && b < len(m.mean) {
				whole.SetSym(i, k, info.At(a, b))
			}
		}
		if a >= len(m.mean) {
			whole.SetSym(i, i, 2*float64(len(d.features)))
		}
		whole.SetSym(i, i, whole.At(i, i)*(1+1e-10)+1e-6)
	}
	all := make([]int, n)
	for i := range all {
		all[i] = i
	}
	return whiten(whole, all)
}

// whiten is whitening for the rows and columns of a Hessian that are free.
func whiten(hessian *mat.SymDense, free []int) *mat.TriDense {
	n := len(free)
	whole := mat.NewSymDense(n, nil)
	for i, a := range free {
		for k, b := range free {
			whole.SetSym(i, k, hessian.At(a, b))
		}
	}
	var c mat.Cholesky
	out := mat.NewTriDense(n, mat.Upper, nil)
	if !c.Factorize(whole) {
		for i := range n {
			out.SetTri(i, i, 1e-3)
		}
		return out
	}
	c.UTo(out)
	inverse := mat.NewTriDense(n, mat.Upper, nil)
	if inverse.InverseTri(out) != nil {
		return out
	}
	return inverse
}

// curvature is the Hessian h and the covariance of all parameters: the inverse of the negative Hessian of the restricted
// likelihood, by central differences of its gradient. Where a figure has no curvature its variance is
// infinite.
func (d *data) curvature(m model, at peak) (h, cov *mat.SymDense) {
	n := m.size()
	info := d.information(m, d.state(m, at.at))
	h = mat.NewSymDense(n, nil)
	g := [2][]float64{make([]float64, n), make([]float64, n)}
	raw := mat.NewDense(n, n, nil)
	for i := range n {
		step := 1e-3
		if i < len(m.mean) {
			step = 1e-2 / math.Sqrt(max(info.At(i, i), 1e-6))
		}
		for k, sign := range []float64{1, -1} {
			p := slices.Clone(at.at)
			p[i] += sign * step
			d.likelihood(m, p, g[k], true)
		}
		for k := range n {
			raw.Set(i, k, -(g[0][k]-g[1][k])/(2*step))
		}
	}
	for i := range n {
		for k := range n {
			h.SetSym(i, k, (raw.At(i, k)+raw.At(k, i))/2)
		}
	}
	// A spread on its floor has no curvature: it is then taken as known.
	for i := len(m.mean); i < n; i++ {
		if h.At(i, i) < 1e-3 {
			for k := range n {
				h.SetSym(i, k, 0)
			}
			h.SetSym(i, i, 1e-6)
		}
	}
	var c mat.Cholesky
	out := mat.NewSymDense(n, nil)
	if !c.Factorize(h) || c.InverseTo(out) != nil {
		for i := range n {
			v := 1.0
			if i < len(m.mean) {
				v = 1 / max(info.At(i, i), 1e-12)
			}
			out.SetSym(i, i, v)
			for k := range n {
				h.SetSym(i, k, 0)
			}
			h.SetSym(i, i, 1/v)
		}
	}
	return h, out
}

// freedom is the features less the figures that are no spreads, at least 1.
func (d *data) freedom(m model) float64 {
	return max(1, float64(len(d.features)-len(m.mean)-count(m.drops)-count(m.push)))
}

// intervals fills in the figures of the result.
func (d *data) intervals(m model, best peak, out *Result) {
	hessian, cov := d.curvature(m, best)
	n := d.freedom(m)
	t := distuv.StudentsT{Mu: 0, Sigma: 1, Nu: n}.Quantile(0.975)
	level := n * math.Log1p(t*t/n)
	spread := distuv.ChiSquared{K: 1}.Quantile(0.95) * (1 + 1/(3*n))
	for i := range m.size() {
		f := Figure{Term: m.term(i), Value: best.at[i], SE: math.Sqrt(cov.At(i, i))}
		goal := math.Sqrt(level)
		if i == m.scatterAt() || i == m.repeatAt() {
			goal = math.Sqrt(spread)
		}
		f.Low, f.High = d.end(m, best, hessian, cov, i, -goal), d.end(m, best, hessian, cov, i, goal)
		if i >= len(m.mean) {
			f.Low, f.High = math.Exp(f.Low), math.Exp(f.High)
			f.Value = math.Exp(f.Value)
			switch i {
			case m.scatterAt():
				f.Value = math.Hypot(f.Value, d.scale)
				f.High = math.Hypot(f.High, d.scale)
			case m.repeatAt():
				f.Value = math.Hypot(f.Value, d.leastRepeat)
				f.High = math.Hypot(f.High, d.leastRepeat)
			}
			f.SE *= f.Value
			if f.Low < d.scale {
				f.Low = 0
			}
		}
		out.Figures = append(out.Figures, f)
	}
	k := len(m.mean)
	for i := range k {
		out.mean = append(out.mean, m.term(i))
		line := make([]float64, k)
		for j := range k {
			line[j] = cov.At(i, j)
		}
		out.covariance = append(out.covariance, line)
	}
}

// lowestLog is where the search for the lower end of a spread ends: far under its floor.
var lowestLog = math.Log(leastSpread / 20)

// end finds where the signed root of twice the fall of the profile is the goal. It is nearly straight
// in the parameter, so the secant from the peak converges in a few steps. The lower end of a spread
// may not exist: then it is far under the floor. An end that is not found within a metre is infinite.
func (d *data) end(m model, best peak, hessian, cov *mat.SymDense, i int, goal float64) float64 {
	se := math.Sqrt(cov.At(i, i))
	spread := i >= len(m.mean)
	if spread {
		se = min(se, 1)
	}
	move := math.Copysign(min(max(math.Abs(goal)*se, 1e-5), 2), goal)
	low, high := 0.0, math.Inf(1) // sizes of moves with less and more fall than wanted
	from := slices.Clone(best.at)
	last := 0.0
	for range 40 {
		if spread && best.at[i]+move < lowestLog {
			move = lowestLog - best.at[i]
		}
		if spread && best.at[i]+move > 3.9 {
			return math.Inf(1)
		}
		if math.Abs(move) > 45 {
			return math.Inf(int(math.Copysign(1, goal)))
		}
		for k := range from {
			lean := 0.0
			if cov.At(i, i) > 0 {
				lean = cov.At(k, i) / cov.At(i, i)
			}
			if k >= len(m.mean) {
				lean = max(-3, min(3, lean))
			}
			from[k] += lean * (move - last)
		}
		from[i] = best.at[i] + move
		last = move
		at, err := d.climb(m, true, from, i, hessian)
		if err != nil {
			return math.Inf(int(math.Copysign(1, goal)))
		}
		copy(from, at.at)
		fall := math.Sqrt(max(0, 2*(best.value-at.value)))
		if math.Abs(fall-math.Abs(goal)) < 5e-4*math.Abs(goal) {
			break
		}
		if fall < math.Abs(goal) {
			if spread && goal < 0 && move <= lowestLog-best.at[i] {
				return lowestLog
			}
			low = math.Abs(move)
		} else {
			high = math.Abs(move)
		}
		next := 2 * math.Abs(move)
		if fall > 1e-3*math.Abs(goal) {
			next = math.Abs(move) * min(2.5, math.Abs(goal)/fall)
		}
		if !(next > low && next < high) {
			next = (low + high) / 2
			if math.IsInf(high, 1) {
				next = 1.5 * low
			}
		}
		if high-low < 1e-9 {
			break
		}
		move = math.Copysign(next, goal)
	}
	return best.at[i] + move
}
