package estimate

import (
	"math"
	"slices"
)

// descend finds a minimum of a smooth function of n variables from the origin, by the quasi-Newton
// method of Broyden, Fletcher, Goldfarb and Shanno (Nocedal and Wright, Numerical Optimization,
// algorithm 6.1) with the unit matrix as first guess: the caller sees to it that this is a good one.
// Steps are halved until they descend enough (Armijo), and doubled while the slope along them stays
// steep. It ends when the gradient is under smallGradient or the gain of three steps running is small.
//
// f returns the value and fills in the gradient. A value of +Inf is a wall.
func descend(n int, smallGradient float64, f func(z, grad []float64) float64) (z []float64, value float64) {
	z = make([]float64, n)
	g := make([]float64, n)
	value = f(z, g)
	if math.IsInf(value, 1) || math.IsNaN(value) {
		return z, math.Inf(1)
	}
	h := make([][]float64, n)
	for i := range h {
		h[i] = make([]float64, n)
		h[i][i] = 1
	}
	step, next, gNext := make([]float64, n), make([]float64, n), make([]float64, n)
	still := 0
	for range 200 {
		if norm(g) < smallGradient {
			break
		}
		for i := range step {
			step[i] = -dot(h[i], g)
		}
		slope := dot(step, g)
		if !(slope < 0) {
			for i := range h {
				clear(h[i])
				h[i][i] = 1
				step[i] = -g[i]
			}
			slope = dot(step, g)
		}
		if l := norm(step); l > longest {
			for i := range step {
				step[i] *= longest / l
			}
			slope *= longest / l
		}
		t, fresh := 1.0, 0.0
		found := false
		for range 12 {
			for i := range z {
				next[i] = z[i] + t*step[i]
			}
			fresh = f(next, gNext)
			if fresh <= value+1e-4*t*slope {
				found = true
				break
			}
			t /= 2
		}
		if !found {
			break
		}
		for range 6 {
			if t < 1 || dot(gNext, step) > 0.9*slope {
				break
			}
			further, gFurther := make([]float64, n), make([]float64, n)
			for i := range z {
				further[i] = z[i] + 2*t*step[i]
			}
			v := f(further, gFurther)
			if !(v < fresh) {
				break
			}
			t *= 2
			fresh = v
			copy(next, further)
			copy(gNext, gFurther)
		}
		s, y := make([]float64, n), make([]float64, n)
		for i := range s {
			s[i], y[i] = next[i]-z[i], gNext[i]-g[i]
		}
		if sy := dot(s, y); sy > 1e-12*norm(s)*norm(y) {
			update(h, s, y, sy)
		}
		if value-fresh < smallGain {
			still++
		} else {
			still = 0
		}
		value = fresh
		z, next = next, z
		g, gNext = gNext, g
		if still == 3 {
			break
		}
	}
	return slices.Clone(z), value
}

// When descend is done, in units of the log likelihood, where one tenth is of no consequence.
const (
	smallGain = 1e-8
	longest   = 20 // standard errors in one step
)

// update is the inverse update of the method: h becomes (1 - s y'/sy) h (1 - y s'/sy) + s s'/sy.
func update(h [][]float64, s, y []float64, sy float64) {
	hy := make([]float64, len(s))
	for i := range hy {
		hy[i] = dot(h[i], y)
	}
	c := (1 + dot(y, hy)/sy) / sy
	for i := range h {
		for k := range h {
			h[i][k] += c*s[i]*s[k] - (hy[i]*s[k]+s[i]*hy[k])/sy
		}
	}
}

func dot(a, b []float64) float64 {
	sum := 0.0
	for i := range a {
		sum += a[i] * b[i]
	}
	return sum
}

func norm(a []float64) float64 { return math.Sqrt(dot(a, a)) }
