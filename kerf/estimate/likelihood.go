package estimate

import (
	"math"
	"slices"
	"sync"

	"gonum.org/v1/gonum/mat"
)

// model is which figures are estimated. A parameter vector holds the mean's terms in their order, then
// the logs of scatter, repeat, drops and push, as far as they are there.
type model struct {
	mean   []int // places of the terms
	repeat bool
	drops  bool
	push   bool
}

func (m model) size() int { return len(m.mean) + 1 + count(m.repeat) + count(m.drops) + count(m.push) }

func count(b bool) int {
	if b {
		return 1
	}
	return 0
}

// places in the parameter vector; -1 when absent.
func (m model) scatterAt() int { return len(m.mean) }
func (m model) repeatAt() int  { return place(m.repeat, len(m.mean)+1) }
func (m model) dropsAt() int   { return place(m.drops, len(m.mean)+1+count(m.repeat)) }
func (m model) pushAt() int {
	return place(m.push, len(m.mean)+1+count(m.repeat)+count(m.drops))
}

func place(there bool, at int) int {
	if there {
		return at
	}
	return -1
}

// term names the parameter at a place.
func (m model) term(i int) Term {
	switch i {
	case m.scatterAt():
		return Scatter
	case m.repeatAt():
		return Repeat
	case m.dropsAt():
		return DropsAt
	case m.pushAt():
		return PushAt
	}
	return meanNames[m.mean[i]]
}

// state is a parameter vector spelled out.
type state struct {
	mean            [meanTerms]float64
	scatter, repeat float64
	drops, push     float64
}

// state spells a vector out. Spreads are softly kept from falling under what can be told from none:
// the floor is added in squares.
func (d *data) state(m model, p []float64) state {
	var s state
	for i, t := range m.mean {
		s.mean[t] = p[i]
	}
	s.scatter = math.Hypot(d.scale, math.Exp(p[m.scatterAt()]))
	if m.repeat {
		s.repeat = math.Hypot(d.leastRepeat, math.Exp(p[m.repeatAt()]))
	}
	if m.drops {
		s.drops = math.Exp(p[m.dropsAt()])
	}
	if m.push {
		s.push = math.Exp(p[m.pushAt()])
	}
	return s
}

// ends of a row under a state.
func (r row) ends(m model, s state) (low, high float64) {
	low, high = r.low, r.high
	switch {
	case r.answer == "":
	case r.answer == "turns" && !m.drops:
		high = math.Inf(1)
	case r.answer == "push" && !m.push:
		low = math.Inf(-1)
	default:
		low, high = low+s.shift(r.at[0]), high+s.shift(r.at[1])
	}
	return low, high
}

func (s state) shift(b bound) float64 {
	switch b {
	case drops:
		return s.drops
	case push:
		return -s.push
	}
	return 0
}

// design is a row of the design; the taper of what the tight side governs goes by its size.
func (r row) design(t int, s state) float64 {
	if t == taperAt && r.tight && s.mean[taperAt] < 0 {
		return -r.x[t]
	}
	return r.x[t]
}

// centre is the mean of a row.
func (r row) centre(m model, s state) float64 {
	sum := 0.0
	for _, t := range m.mean {
		sum += r.design(t, s) * s.mean[t]
	}
	return sum
}

// likelihood is the log likelihood at p; grad, unless nil, is filled with its gradient. restricted
// takes half the log determinant of the mean's information off.
func (d *data) likelihood(m model, p, grad []float64, restricted bool) float64 {
	s := d.state(m, p)
	// Features are summed in chunks of a fixed size, in their order, however many of them run at once.
	g := make([]float64, len(p))
	chunks := (len(d.features) + chunk - 1) / chunk
	parts := make([]part, chunks)
	work := func(c int) {
		parts[c].slopes = make([]float64, len(p))
		for i := c * chunk; i < min((c+1)*chunk, len(d.features)); i++ {
			if f := &d.features[i]; len(f.rows) == 1 {
				parts[c].sum += d.single(m, s, f, parts[c].slopes)
			} else {
				parts[c].sum += d.several(m, s, f, parts[c].slopes)
			}
		}
	}
	if d.repeated && chunks > 1 {
		var all sync.WaitGroup
		for c := range chunks {
			all.Go(func() { work(c) })
		}
		all.Wait()
	} else {
		for c := range chunks {
			work(c)
		}
	}
	sum := 0.0
	for _, c := range parts {
		sum += c.sum
		for i, v := range c.slopes {
			g[i] += v
		}
	}
	// The floors under the spreads: d spread / d log.
	if at := m.scatterAt(); true {
		e := math.Exp(2 * p[at])
		g[at] *= e / s.scatter
	}
	if at := m.repeatAt(); at >= 0 {
		e := math.Exp(2 * p[at])
		g[at] *= e / s.repeat
	}
	if at := m.dropsAt(); at >= 0 {
		g[at] *= s.drops
	}
	if at := m.pushAt(); at >= 0 {
		g[at] *= s.push
	}
	if restricted {
		sum -= d.determinant(m, s) / 2
		for _, at := range []int{m.scatterAt(), m.repeatAt()} {
			if at < 0 {
				continue
			}
			const h = 1e-5
			q := slices.Clone(p)
			q[at] = p[at] + h
			up := d.determinant(m, d.state(m, q))
			q[at] = p[at] - h
			g[at] -= (up - d.determinant(m, d.state(m, q))) / (4 * h)
		}
	}
	if grad != nil {
		copy(grad, g)
	}
	return sum
}

// chunk is how many features are summed in one go.
const chunk = 16

// part is what a chunk of features adds to the likelihood and its gradient.
type part struct {
	sum    float64
	slopes []float64
}

// collect adds the slopes of a row, with a weight, to the gradient by figures as they are (spreads
// and thresholds not yet by their logs). scatter and repeat are derivatives of the row's mean or
// spread by them.
func collect(m model, s state, r *row, sl slope, weight float64, g []float64) {
	for i, t := range m.mean {
		g[i] += weight * sl.mean * r.design(t, s)
	}
	if r.answer == "" {
		return
	}
	for e, b := range r.at {
		v := sl.low
		if e == 1 {
			v = sl.high
		}
		switch {
		case b == drops && m.drops:
			g[m.dropsAt()] += weight * v
		case b == push && m.push:
			g[m.pushAt()] -= weight * v
		}
	}
}

// slopes of a row about a mean.
func (r *row) slopes(m model, s state, mean, spread float64) slope {
	if r.exact {
		return density(r.low, mean, spread)
	}
	low, high := r.ends(m, s)
	return between(low, high, mean, spread)
}

// single is the log likelihood of a feature read once.
func (d *data) single(m model, s state, f *feature, g []float64) float64 {
	r := &f.rows[0]
	spread := math.Hypot(f.root*s.scatter, s.repeat)
	sl := r.slopes(m, s, r.centre(m, s), spread)
	collect(m, s, r, sl, 1, g)
	g[m.scatterAt()] += sl.spread * f.root * f.root * s.scatter / spread
	if m.repeat {
		g[m.repeatAt()] += sl.spread * s.repeat / spread
	}
	return sl.log
}

// several is the log likelihood of a feature read more than once: the integral over its own offset u,
// in standard deviations of the scatter. The integrand is log-concave.
//
//  1. Newton's method finds its peak.
//  2. Where a calliper value pins the feature down, the integrand is near normal: Gauss-Hermite about
//     the peak with its curvature (Naylor and Smith, Appl. Statist. 31, 1982).
//  3. Else it is the bell of u with soft steps at the ends of the readings: Gauss-Legendre between
//     the steps, each step a panel of its own.
func (d *data) several(m model, s state, f *feature, g []float64) float64 {
	n := len(f.rows)
	centre := make([]float64, n)
	for i := range f.rows {
		centre[i] = f.rows[i].centre(m, s)
	}
	step := f.root * s.scatter
	all := make([]slope, n)
	at := func(u float64) (value, first, second float64) {
		value, first, second = -u*u/2-logRoot2Pi, -u, -1
		for i := range f.rows {
			all[i] = f.rows[i].slopes(m, s, centre[i]+step*u, s.repeat)
			value += all[i].log
			first += step * all[i].mean
			second += step * step * all[i].bend
		}
		return value, first, second
	}
	// The peak of the exact readings alone is where the search begins.
	second, pinned := -1.0, false
	top, bottom := 0.0, 1.0
	for i := range f.rows {
		if w := f.rows[i].high - f.rows[i].low; f.rows[i].answer == "" && w < 6*s.repeat {
			pinned = true
			top += step * ((f.rows[i].low+f.rows[i].high)/2 - centre[i]) / (s.repeat * s.repeat)
			bottom += step * step / (s.repeat * s.repeat)
		}
	}
	peak := top / bottom
	low, high := -9.0, 9.0
	tries := 8 // enough to know about where it is
	if pinned {
		low, high, tries = -500, 500, 60
	}
	for range tries {
		_, first, bend := at(peak)
		second = bend
		if first > 0 {
			low = max(low, peak)
		} else {
			high = min(high, peak)
		}
		next := peak - first/bend
		if !(next > low && next < high) {
			next = (low + high) / 2
		}
		moved := math.Abs(next - peak)
		peak = next
		if moved*math.Sqrt(-bend) < 2e-3 {
			break
		}
	}
	var us, ws []float64
	if pinned {
		h := math.Sqrt2 / math.Sqrt(-second)
		for i, x := range d.hermite.x {
			us, ws = append(us, peak+h*x), append(ws, h*d.hermite.w[i])
		}
	} else {
		ends := []float64{-7, -4, -2, 0, 2, 4, 7}
		for i := range f.rows {
			lo, hi := f.rows[i].ends(m, s)
			for _, e := range []float64{lo, hi} {
				for _, side := range []float64{-4, 0, 4} {
					if u := (e - centre[i] + side*s.repeat) / step; u > -7 && u < 7 {
						ends = append(ends, u)
					}
				}
			}
		}
		slices.Sort(ends)
		// Panels narrower than two standard deviations of the steps resolve nothing more.
		kept := ends[:1]
		for _, e := range ends[1:] {
			if e-kept[len(kept)-1] >= 2*s.repeat/step {
				kept = append(kept, e)
			}
		}
		kept[len(kept)-1] = 7
		ends = kept
		// What lies beyond an end at which the log-concave integrand is negligible is less still.
		best, _, _ := at(peak)
		from, to := 0, len(ends)-1
		for from+1 < to && ends[from+1] < peak && best-value(at, ends[from+1]) > negligible {
			from++
		}
		for to-1 > from && ends[to-1] > peak && best-value(at, ends[to-1]) > negligible {
			to--
		}
		for i := from + 1; i <= to; i++ {
			a, b := ends[i-1], ends[i]
			if b-a < 1e-9 {
				continue
			}
			for k, x := range d.panel.x {
				us, ws = append(us, (a+b)/2+(b-a)/2*x), append(ws, (b-a)/2*d.panel.w[k])
			}
		}
	}
	most, _, _ := at(peak)
	total := 0.0
	own := make([]float64, len(g))
	for k, u := range us {
		value, _, _ := at(u)
		w := ws[k] * math.Exp(value-most)
		if w == 0 || math.IsNaN(w) {
			continue
		}
		total += w
		for i := range f.rows {
			collect(m, s, &f.rows[i], all[i], w, own)
			own[m.scatterAt()] += w * all[i].mean * f.root * u
			if m.repeat {
				own[m.repeatAt()] += w * all[i].spread
			}
		}
	}
	if !(total > 0) {
		return -1e9
	}
	for i := range g {
		g[i] += own[i] / total
	}
	return most + math.Log(total)
}

// moments are sums over the features of one count and number of readings, by which the information
// is quickly had for any spreads: rows is the sum of x x' over all readings, sums that of the features'
// summed rows.
type moments struct {
	n          int
	root       float64
	rows, sums *mat.SymDense
}

// gather sums the design up; it depends on the model and on the sign of the taper alone, and is kept.
func (d *data) gather(m model, s state) []moments {
	key := momentsKey{negative: s.mean[taperAt] < 0}
	for _, t := range m.mean {
		key.terms[t] = true
	}
	if got, ok := d.kept[key]; ok {
		return got
	}
	k := len(m.mean)
	var out []moments
	x, sum := mat.NewVecDense(k, nil), mat.NewVecDense(k, nil)
	for i := range d.features {
		f := &d.features[i]
		at := slices.IndexFunc(out, func(g moments) bool { return g.n == len(f.rows) && g.root == f.root })
		if at < 0 {
			at = len(out)
			out = append(out, moments{len(f.rows), f.root, mat.NewSymDense(k, nil), mat.NewSymDense(k, nil)})
		}
		sum.Zero()
		for r := range f.rows {
			for c, t := range m.mean {
				x.SetVec(c, f.rows[r].design(t, s))
			}
			sum.AddVec(sum, x)
			out[at].rows.SymRankOne(out[at].rows, 1, x)
		}
		out[at].sums.SymRankOne(out[at].sums, 1, sum)
	}
	d.kept[key] = out
	return out
}

// momentsKey is what moments depend on.
type momentsKey struct {
	terms    [meanTerms]bool
	negative bool
}

// negligible is how far under its peak the log of an integrand may be left out.
const negligible = 14

// value is the first result of a function that has three.
func value(f func(float64) (float64, float64, float64), u float64) float64 {
	v, _, _ := f(u)
	return v
}

// information is the mean's information were all readings exact: X' V^-1 X, V with the scatter common
// to a feature's readings, inverted in closed form (Sherman and Morrison).
func (d *data) information(m model, s state) *mat.SymDense {
	k := len(m.mean)
	out := mat.NewSymDense(k, nil)
	for _, g := range d.gather(m, s) {
		a, b := g.root*g.root*s.scatter*s.scatter, s.repeat*s.repeat
		if g.n == 1 || b == 0 {
			a, b = 0, a+b
		}
		w := a / (b * (b + float64(g.n)*a))
		for c := range k {
			for e := c; e < k; e++ {
				out.SetSym(c, e, out.At(c, e)+g.rows.At(c, e)/b-w*g.sums.At(c, e))
			}
		}
	}
	return out
}

// determinant is the log determinant of the information.
func (d *data) determinant(m model, s state) float64 {
	var c mat.Cholesky
	if !c.Factorize(d.information(m, s)) {
		return 0
	}
	return c.LogDet()
}
