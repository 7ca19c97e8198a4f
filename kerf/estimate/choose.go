package estimate

import (
	"fmt"
	"math"
	"slices"

	"gonum.org/v1/gonum/mat"

	"pinwright/kerf/reading"
)

// richest is the model with everything that the readings could tell at all.
func (d *data) richest() model {
	// Without repeated readings the two spreads are one.
	m := model{mean: []int{kerfAt}, repeat: d.repeated}
	if d.holes > 0 && d.straight > 0 {
		m.mean = append(m.mean, holesAt)
	}
	if d.largest >= leastRange*d.smallest && len(d.diameters) > 1 {
		m.mean = append(m.mean, diameterAt)
	}
	if d.axes[reading.X] > 0 && d.axes[reading.Y] > 0 {
		m.mean = append(m.mean, axisAt)
	}
	if d.sides[reading.Top] > 0 && d.sides[reading.Bottom] > 0 {
		m.mean = append(m.mean, taperAt)
	}
	// A threshold needs answers on both its sides, and something that holds the kerf from the other.
	a := d.answers
	m.drops = a[reading.Drops] > 0 && a[reading.Turns] > 0 && d.measured+a[reading.Push]+a[reading.No] > 0
	m.push = a[reading.Push] > 0 && a[reading.No] > 0 && d.measured+a[reading.Turns]+a[reading.Drops] > 0
	// Terms that the features cannot tell apart, or for which there are too few of them, go at once.
	for len(m.mean) > 1 && (!d.tells(m) || len(d.features) < m.size()+2) {
		m.mean = m.mean[:len(m.mean)-1]
	}
	return m
}

// leastRange is by how much the largest hole must exceed the smallest for a correction by diameter: a
// fine grading about one pin is no range of sizes, and its answers could not tell the two apart.
const leastRange = 1.3

// tells reports whether the columns of the design are independent.
func (d *data) tells(m model) bool {
	s := state{scatter: 1, repeat: 1}
	info := d.information(m, s)
	n := len(m.mean)
	for i := range n {
		if info.At(i, i) < 1e-9 {
			return false
		}
	}
	scaled := mat.NewSymDense(n, nil)
	for i := range n {
		for k := i; k < n; k++ {
			scaled.SetSym(i, k, info.At(i, k)/math.Sqrt(info.At(i, i)*info.At(k, k)))
		}
	}
	var c mat.Cholesky
	return c.Factorize(scaled) && c.Cond() < 1e6
}

// aicc is Akaike's criterion with the correction for few data of Hurvich and Tsai (Biometrika 76,
// 1989); infinite where there are too few features for it.
func (d *data) aicc(m model, like float64) float64 {
	n, k := float64(len(d.features)), float64(m.size())
	if n-k-1 <= 0 {
		return math.Inf(1)
	}
	return -2*like + 2*k + 2*k*(k+1)/(n-k-1)
}

// choose leaves out what does not earn its place, the least first.
func (d *data) choose(m model) (model, []Rejection) {
	var dropped []Rejection
	whole, err := d.maximise(m, false, nil)
	if err != nil {
		whole.value = math.Inf(-1)
	}
	for len(m.mean) > 1 {
		with := d.aicc(m, whole.value)
		best, bestAt := math.Inf(1), -1
		var bestPeak peak
		for i := 1; i < len(m.mean); i++ {
			less := m
			less.mean = slices.Delete(slices.Clone(m.mean), i, i+1)
			var from []float64
			if whole.at != nil {
				from = slices.Delete(slices.Clone(whole.at), i, i+1)
			}
			at, err := d.maximise(less, false, from)
			if err != nil {
				continue
			}
			if c := d.aicc(less, at.value); c < best {
				best, bestAt, bestPeak = c, i, at
			}
		}
		if bestAt < 0 || best-with >= Gain {
			break
		}
		dropped = append(dropped, Rejection{m.term(bestAt), with - best})
		m.mean = slices.Delete(slices.Clone(m.mean), bestAt, bestAt+1)
		whole = bestPeak
	}
	return m, dropped
}

// tooFew says what a handful of readings tells, and what to cut.
func (d *data) tooFew(m model) error {
	p := d.start(model{mean: []int{kerfAt}, repeat: m.repeat})
	n := len(d.features)
	what := "features tell"
	if n == 1 {
		what = "feature tells"
	}
	return TooFewError{
		Says: fmt.Sprintf("%d %s a kerf of about %s mm and nothing of how sure that is", n, what, mm(p[0])),
		Advice: []string{
			fmt.Sprintf("cut %d more: five are enough for a first scatter, fifteen for a dependable one", max(2, 5-n)),
			"different ones: the same one read again tells of the calliper, not of the laser",
		},
	}
}
