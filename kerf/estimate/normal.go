package estimate

import (
	"math"

	"gonum.org/v1/gonum/integrate/quad"
	"gonum.org/v1/gonum/mat"
)

// slope is the log of a probability with what it depends on: the mean, the spread, the two ends.
type slope struct {
	log       float64
	mean      float64 // derivative by the mean
	bend      float64 // second derivative by the mean
	spread    float64
	low, high float64
}

const logRoot2Pi = 0.9189385332046727

// density is the log density at y of a normal variate.
func density(y, mean, s float64) slope {
	z := (y - mean) / s
	return slope{log: -z*z/2 - logRoot2Pi - math.Log(s), mean: z / s, bend: -1 / (s * s), spread: (z*z - 1) / s}
}

// between is the log probability that a normal variate lies between two ends, which may be infinite.
//
// Far out in a tail both ends are mirrored there, where the complementary error function keeps its
// digits; where even that is 0, the tail is that of its asymptotic series, first term.
func between(low, high, mean, s float64) slope {
	a, b := (low-mean)/s, (high-mean)/s
	if b-a < 1e-5 {
		out := density((low+high)/2, mean, s)
		out.log += math.Log(max(high-low, 1e-300))
		return out
	}
	switch {
	case a < -certain && b > certain:
		return slope{}
	case a < -certain && b > -certain:
		a = math.Inf(-1)
	case b > certain && a < certain:
		b = math.Inf(1)
	}
	if a+b > 0 || math.IsInf(b, 1) {
		// Mirror: the ends change places and signs.
		m := mirrored(-b, -a, s)
		m.mean, m.low, m.high = -m.mean, -m.high, -m.low
		return m
	}
	return mirrored(a, b, s)
}

// certain is how many standard deviations away an end does not count: 1e-12 of the variates lie beyond.
const certain = 7.0

// mirrored is between with the middle of the interval in the lower half.
func mirrored(a, b, s float64) slope {
	p := upper(-b)
	if !math.IsInf(a, -1) {
		p -= upper(-a)
	}
	if p < 1e-280 {
		h := b + 1/b // derivative of the log of the tail by b is -(b + 1/b)
		return slope{log: -b*b/2 - logRoot2Pi - math.Log(-b), mean: h / s, bend: -1 / (s * s), spread: b * h / s, high: -h / s}
	}
	fa, afa := 0.0, 0.0
	if !math.IsInf(a, -1) {
		fa = bell(a)
		afa = a * fa
	}
	fb, bfb := bell(b), b*bell(b)
	if math.IsInf(b, 1) {
		fb, bfb = 0, 0
	}
	out := slope{log: math.Log(p), mean: -(fb - fa) / (s * p), spread: -(bfb - afa) / (s * p), low: -fa / (s * p), high: fb / (s * p)}
	out.bend = -(bfb-afa)/(s*s*p) - out.mean*out.mean
	return out
}

// upper is the probability that a standard normal variate is above z.
func upper(z float64) float64 { return math.Erfc(z/math.Sqrt2) / 2 }

// bell is the standard normal density.
func bell(z float64) float64 { return math.Exp(-z*z/2 - logRoot2Pi) }

// rule is a Gauss rule.
type rule struct{ x, w []float64 }

// hermite is the rule for the weight exp(-x2), its weights already divided by it.
func hermite(n int) rule {
	r := rule{make([]float64, n), make([]float64, n)}
	quad.Hermite{}.FixedLocations(r.x, r.w, math.Inf(-1), math.Inf(1))
	for i := range r.w {
		r.w[i] *= math.Exp(r.x[i] * r.x[i])
	}
	return r
}

// legendre is the rule for the interval from -1 to 1.
func legendre(n int) rule {
	r := rule{make([]float64, n), make([]float64, n)}
	quad.Legendre{}.FixedLocations(r.x, r.w, -1, 1)
	return r
}

// quadratic is x' A^-1 x.
func quadratic(a *mat.SymDense, x []float64) (float64, bool) {
	var c mat.Cholesky
	if !c.Factorize(a) {
		return 0, false
	}
	v, out := mat.NewVecDense(len(x), x), mat.NewVecDense(len(x), nil)
	if c.SolveVecTo(out, v) != nil {
		return 0, false
	}
	return mat.Dot(v, out), true
}
