// Package estimate finds what a laser does from readings of a coupon: kerf, how holes differ from
// straight cuts, difference between the axes, taper and scatter, by maximum likelihood.
//
// The model. The finished size of a feature, in the middle of the sheet, is
//
//	hole:  drawn + kerf + holes + diameter (D/drawn - 1)
//	slot:  drawn + kerf
//	bar:   drawn - kerf                              (count of them side by side: count times that)
//
// with half the axis difference added to the kerf along x and taken off along y, and half the taper
// added to an opening at the top and taken off at the bottom (to a bar the other way round). D is the
// harmonic mean of the holes that were drawn, so holes is what a hole of that size has on top. Every feature scatters
// normally about this (scatter), and every reading about its feature (repeat), the latter only where
// features were read more than once; else scatter holds both. A pin goes by its clearance c at the
// tight side: no < -push <= push < 0 <= turns < drops <= drops; the two thresholds are estimated where
// both answers beside them occur.
package estimate

import (
	"pinwright/kerf/reading"
)

// Term names a figure of the model.
type Term string

// The terms, in the order in which they are given out.
const (
	Kerf     Term = "kerf"     // full width, mm
	Holes    Term = "holes"    // what holes have on top, mm
	Diameter Term = "diameter" // more of it in smaller holes, mm
	Axis     Term = "axis"     // kerf along x less kerf along y, mm
	Taper    Term = "taper"    // opening at the top less at the bottom, mm
	Scatter  Term = "scatter"  // standard deviation from feature to feature, mm
	Repeat   Term = "repeat"   // standard deviation from reading to reading of one feature, mm
	DropsAt  Term = "drops"    // clearance from which pins drop, mm
	PushAt   Term = "push"     // how much too thick a pin can still be pushed in, mm
)

// Figure is an estimate. Low and High are the ends of its 95 % interval by profile likelihood. The
// interval of a spread may begin at 0.
type Figure struct {
	Term      Term
	Value     float64
	SE        float64 // standard error from the curvature of the likelihood; of spreads and thresholds by the delta rule
	Low, High float64
}

// Result is what readings tell.
type Result struct {
	Figures  []Figure    // in the order of the terms; only those that the data ask for
	Dropped  []Rejection // terms that the data could tell and did not ask for
	Centre   float64     // D of the model, mm; 0 without holes
	Smallest float64     // drawn size of the smallest hole, mm; 0 without holes
	Largest  float64
	Readings int
	Features int
	Freedom  float64 // features less figures (spreads not counted)
	LogLike  float64 // at the maximum of the likelihood of the chosen model
	AICc     float64
	Outliers []Outlier
	Advice   []string // what to cut or measure next, most useful first; empty when nothing is wanted

	covariance [][]float64 // of the mean's figures
	mean       []Term      // of the covariance
}

// Rejection is a term that was tried and left out, with the AICc that the model would have with it
// less the one without: the term had to win at least Gain.
type Rejection struct {
	Term Term
	AICc float64
}

// Gain is how much a term must lower AICc to stay. Two is about the 5 % level of the likelihood-ratio
// test of one figure.
const Gain = 2.0

// Outlier is a feature that does not fit the others.
type Outlier struct {
	Feature string
	Line    int     // in the table of readings, 0: not from a table
	Off     float64 // how far, in standard deviations of the others
	Chance  float64 // of something as far off anywhere among the features
}

// Figure gives a figure by its term; ok is false when the model does not have it.
func (r Result) Figure(t Term) (Figure, bool) {
	for _, f := range r.Figures {
		if f.Term == t {
			return f, true
		}
	}
	return Figure{Term: t}, false
}

// Covariance of two of the mean's figures, mm2; 0 when the model lacks one.
func (r Result) Covariance(a, b Term) float64 {
	i, k := -1, -1
	for n, t := range r.mean {
		if t == a {
			i = n
		}
		if t == b {
			k = n
		}
	}
	if i < 0 || k < 0 {
		return 0
	}
	return r.covariance[i][k]
}

// TooFewError is the error of readings that tell too little, with what they do tell and what to do.
type TooFewError struct {
	Says   string
	Advice []string
}

// Error says what is missing and what to do.
func (e TooFewError) Error() string {
	out := e.Says
	for _, a := range e.Advice {
		out += "\n  " + a
	}
	return out
}

// Fit estimates the model from readings:
//
//  1. The model is taken as rich as the readings could tell. While there is a term whose loss raises
//     AICc by less than Gain, the least of them goes. AICc counts features, not readings.
//  2. The figures of the chosen model are those that maximise the restricted likelihood: the
//     likelihood with the log determinant of the mean's information taken off (Patterson and Thompson,
//     Biometrika 58, 1971; Cox and Reid, J. R. Statist. Soc. B 49, 1987), which for exact readings is
//     least squares with the unbiased variance.
//  3. Intervals are where the profile of the restricted likelihood has fallen by n/2 log(1 + t2/n), t the 97.5 %
//     point of Student with n = Freedom, which for exact readings is the t interval; for spreads by half of
//     3.84 (1 + 1/(3n)), Bartlett's correction of the normal variance.
//  4. The feature furthest off is left out, the rest fitted again, and if it is then less likely than
//     5 % among all features it is named an outlier; so on until none is. Outliers are named, not removed.
//
// The effect of features on several readings is integrated out by Gauss quadrature. Time: proportional
// to the readings, some 0.3 ms each where features are read several times, else a tenth of it. The
// intervals are those of the chosen model; that it was chosen by the same data is not in them.
func Fit(readings []reading.Reading) (Result, error) {
	d, err := newData(readings)
	if err != nil {
		return Result{}, err
	}
	full := d.richest()
	if n := len(d.features); n < 3 {
		return Result{}, d.tooFew(full)
	}
	m, dropped := d.choose(full)
	like, err := d.maximise(m, false, nil)
	if err != nil {
		return Result{}, err
	}
	best, err := d.maximise(m, true, like.at)
	if err != nil {
		return Result{}, err
	}
	out := Result{
		Dropped: dropped, Centre: d.centre, Smallest: d.smallest, Largest: d.largest, Readings: len(readings),
		Features: len(d.features), Freedom: d.freedom(m), LogLike: like.value, AICc: d.aicc(m, like.value),
	}
	d.intervals(m, best, &out)
	d.outliers(m, best, &out)
	d.advise(m, &out)
	if k := out.Figures[0]; k.High < 0 {
		return out, TooFewError{Says: "the kerf comes out negative (" + mm(k.Value) + " mm)", Advice: []string{
			"are drawn and measured exchanged? Holes come out larger than drawn, bars smaller",
			"or was the file compensated before it was cut? drawn is the way of the beam's centre",
		}}
	}
	return out, nil
}
