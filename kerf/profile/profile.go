// Package profile is what a laser does to one material of one thickness, as a small file: the figures
// that readings of a coupon gave, and how sure they are.
package profile

import (
	"fmt"
	"math"
	"strings"

	"pinwright/kerf/estimate"
	"pinwright/kerf/reading"
	"pinwright/parts/material"
)

// Profile is what a laser does to a sheet. Lengths are mm.
type Profile struct {
	Material  string
	Thickness float64 // measured
	Laser     string  // "" when not said
	Date      string  // YYYY-MM-DD, as the maker gave it; "" when not said
	Readings  int
	Features  int
	Freedom   float64 // degrees of freedom of the spreads
	Centre    float64 // size of hole at which the figure holes is stated; 0 without holes
	Smallest  float64 // drawn sizes that were read; 0 without holes
	Largest   float64
	Figures   []estimate.Figure // kerf and scatter at least
	// Covariance of the figures that are no spreads or thresholds, in their order, mm2.
	Covariance [][]float64
}

// meanTerms are the terms of which the covariance is kept.
var meanTerms = []estimate.Term{estimate.Kerf, estimate.Holes, estimate.Diameter, estimate.Axis, estimate.Taper}

// allTerms are the terms in the order in which they are written.
var allTerms = append(append([]estimate.Term{}, meanTerms...), estimate.Scatter, estimate.Repeat, estimate.DropsAt, estimate.PushAt)

// Of makes the profile of a sheet of readings and what they told.
func Of(s reading.Sheet, r estimate.Result) Profile {
	p := Profile{
		Material: s.Material, Thickness: s.Thickness, Laser: s.Laser, Date: s.Date, Readings: r.Readings, Features: r.Features,
		Freedom: r.Freedom, Centre: r.Centre, Smallest: r.Smallest, Largest: r.Largest, Figures: r.Figures,
	}
	terms := p.terms()
	for _, a := range terms {
		var row []float64
		for _, b := range terms {
			row = append(row, r.Covariance(a, b))
		}
		p.Covariance = append(p.Covariance, row)
	}
	return p
}

// terms of the covariance.
func (p Profile) terms() []estimate.Term {
	var out []estimate.Term
	for _, t := range meanTerms {
		if _, ok := p.figure(t); ok {
			out = append(out, t)
		}
	}
	return out
}

func (p Profile) figure(t estimate.Term) (estimate.Figure, bool) {
	for _, f := range p.Figures {
		if f.Term == t {
			return f, true
		}
	}
	return estimate.Figure{}, false
}

// Value of a figure; 0 when the profile does not have it.
func (p Profile) Value(t estimate.Term) float64 {
	f, _ := p.figure(t)
	return f.Value
}

// Sizes of a hole through the thickness, mm.
type Sizes struct {
	Middle, Top, Bottom float64
	Scatter             float64 // standard deviation from hole to hole
	Doubt               float64 // standard error of the middle, from the figures of the profile
}

// Tight is the narrow end.
func (s Sizes) Tight() float64 { return min(s.Top, s.Bottom) }

// Wide is the wide end.
func (s Sizes) Wide() float64 { return max(s.Top, s.Bottom) }

// Spread joins scatter and doubt: the standard deviation with which a hole to be cut is foreseen.
func (s Sizes) Spread() float64 { return math.Hypot(s.Scatter, s.Doubt) }

// Finished foresees the hole that comes of a circle drawn, mm, the way of the beam's centre.
func (p Profile) Finished(drawn float64) Sizes {
	weight := map[estimate.Term]float64{estimate.Kerf: 1, estimate.Holes: 1}
	if drawn > 0 {
		weight[estimate.Diameter] = p.Centre/drawn - 1
	}
	s := Sizes{Middle: drawn, Scatter: p.Value(estimate.Scatter)}
	terms := p.terms()
	variance := 0.0
	for i, a := range terms {
		s.Middle += weight[a] * p.Value(a)
		for k, b := range terms {
			variance += weight[a] * weight[b] * p.Covariance[i][k]
		}
	}
	s.Doubt = math.Sqrt(max(0, variance))
	taper := p.Value(estimate.Taper)
	s.Top, s.Bottom = s.Middle+taper/2, s.Middle-taper/2
	return s
}

// Draw is the inverse of the middle of Finished: the circle to draw, the way of the beam's centre, so
// that the hole is of a size in the middle of the sheet, mm. An error when no circle gives it.
func (p Profile) Draw(finished float64) (float64, error) {
	// drawn + a + c (D/drawn - 1) = finished is a quadratic; the larger root is the hole, the other
	// one a pinprick that is all burn.
	c := p.Value(estimate.Diameter)
	b := finished - p.Value(estimate.Kerf) - p.Value(estimate.Holes) + c
	root := b*b - 4*c*p.Centre
	drawn := b
	if c != 0 {
		drawn = (b + math.Sqrt(max(0, root))) / 2
	}
	if !(drawn > 0) || root < 0 {
		return 0, fmt.Errorf("a hole of %s mm cannot be cut: the beam alone makes a larger one", mm(finished))
	}
	return drawn, nil
}

// How far thicknesses may differ. Kerf goes about with the root of the thickness in published values,
// so a tenth of the thickness is a twentieth of the kerf, less than the scatter. Judgement, no source.
const (
	sameThickness = 0.1
	nearThickness = 0.3
)

// Suits tells whether the profile may be used for a sheet: an error for another material or a
// thickness that is more than 30 % off, a warning in words for one that is more than 10 % off.
func (p Profile) Suits(name string, thickness float64) (warning string, err error) {
	if known(name) != known(p.Material) {
		return "", fmt.Errorf("the profile is of %s, the sheet is %s: cut a coupon of it", p.Material, name)
	}
	off := math.Abs(thickness-p.Thickness) / p.Thickness
	switch {
	case math.IsNaN(off) || off > nearThickness+1e-9:
		return "", fmt.Errorf("the profile is of %s mm %s, the sheet has %s mm: cut a coupon of it", mm(p.Thickness), p.Material, mm(thickness))
	case off > sameThickness+1e-9:
		return fmt.Sprintf("the profile is of %s mm %s, the sheet has %s mm: kerf and taper differ somewhat", mm(p.Thickness), p.Material, mm(thickness)), nil
	}
	return "", nil
}

// Covers is a warning in words when a hole drawn is far outside those that were read, else "".
func (p Profile) Covers(drawn float64) string {
	switch {
	case p.Largest == 0:
		return "the profile was made without holes: they come out larger than straight cuts tell"
	case drawn < 0.75*p.Smallest:
		return fmt.Sprintf("a hole drawn %s mm is smaller than all that were read (%s mm): small holes come out larger", mm(drawn), mm(p.Smallest))
	case drawn > 2*p.Largest:
		return fmt.Sprintf("a hole drawn %s mm is larger than all that were read (%s mm)", mm(drawn), mm(p.Largest))
	}
	return ""
}

// known is the name of the catalogue for a material, or the name itself in small letters.
func known(name string) string {
	if m, err := material.Lookup(name); err == nil {
		return m.Name
	}
	return strings.ToLower(strings.TrimSpace(name))
}

// mm writes a length to a micrometre, without zeros at the end.
func mm(v float64) string {
	return strings.TrimSuffix(strings.TrimRight(fmt.Sprintf("%.3f", v), "0"), ".")
}
