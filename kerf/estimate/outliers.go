package estimate

import (
	"math"
	"slices"

	"gonum.org/v1/gonum/stat/distuv"
)

// mostOutliers is how many are looked for: more of them are not outliers but another laser.
const mostOutliers = 5

// outlierChance is how unlikely the furthest of all features must be.
const outlierChance = 0.05

// outliers names the features that do not fit the others.
func (d *data) outliers(m model, best peak, out *Result) {
	rest := *d
	rest.kept = map[momentsKey][]moments{}
	rest.features = slices.Clone(d.features)
	at := best
	for range mostOutliers {
		if len(rest.features) < max(5, m.size()+3) {
			return
		}
		worst, least := -1, math.Inf(1)
		s := rest.state(m, at.at)
		for i := range rest.features {
			if c := rest.tail(m, s, &rest.features[i], math.Inf(1)); c < least {
				worst, least = i, c
			}
		}
		// Far from suspect by the common fit, a feature does not become so by being left out:
		// studentised residuals grow by sqrt((n-1)/(n-r2)), which for r2 < 3 is little.
		if least > 0.15 {
			return
		}
		f := rest.features[worst]
		less := rest
		less.kept = map[momentsKey][]moments{}
		less.features = slices.Delete(slices.Clone(rest.features), worst, worst+1)
		if !less.tells(m) {
			return
		}
		fresh, err := less.maximise(m, true, at.at)
		if err != nil {
			return
		}
		s = less.state(m, fresh.at)
		// The mean of the others is not known exactly either: its variance joins the feature's.
		n := less.freedom(m)
		own := math.Sqrt(1 + less.leverage(m, s, &f))
		wide := s
		wide.scatter *= own
		wide.repeat *= own
		chance := less.tail(m, wide, &f, n)
		all := 1 - math.Pow(1-chance, float64(len(rest.features)))
		if all > outlierChance {
			return
		}
		out.Outliers = append(out.Outliers, Outlier{
			Feature: f.name, Line: f.rows[0].line, Chance: all,
			Off: distuv.UnitNormal.Quantile(1 - max(chance, 1e-300)/2),
		})
		rest, at = less, fresh
	}
}

// leverage is the variance of the mean at a feature's first reading over the variance of the reading.
func (d *data) leverage(m model, s state, f *feature) float64 {
	x := make([]float64, len(m.mean))
	for i, t := range m.mean {
		x[i] = f.rows[0].design(t, s)
	}
	v := f.root*f.root*s.scatter*s.scatter + s.repeat*s.repeat
	q, ok := quadratic(d.information(m, s), x)
	if !ok {
		return 0
	}
	return q / v
}

// tail is the chance of a feature being at least as far off, on either side, as the one of its
// readings that is furthest; n are the degrees of freedom of the spread.
func (d *data) tail(m model, s state, f *feature, n float64) float64 {
	least := 1.0
	spread := math.Hypot(f.root*s.scatter, s.repeat)
	for i := range f.rows {
		low, high := f.rows[i].ends(m, s)
		c := f.rows[i].centre(m, s)
		for _, z := range []float64{(low - c) / spread, (c - high) / spread} {
			if z > 0 {
				least = min(least, 2*above(z, n))
			}
		}
	}
	return min(1, least*float64(len(f.rows)))
}

// above is the upper tail of Student's distribution, of the normal one for infinite n.
func above(z, n float64) float64 {
	if math.IsInf(n, 1) {
		return upper(z)
	}
	return distuv.StudentsT{Mu: 0, Sigma: 1, Nu: n}.CDF(-z)
}
