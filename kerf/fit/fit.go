// Package fit tells how a pin goes into a hole that is still to be cut: the circle to draw, the hole
// that comes of it through the thickness, and the chances that it binds, fits or rattles.
//
// Lengths are mm. The tight end of the hole governs a pin that turns; in a press fit the tight end
// makes the stress and the wide end must still hold.
package fit

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/integrate/quad"
	"gonum.org/v1/gonum/stat/distuv"

	"pinwright/kerf/profile"
)

// Pin is what goes into a hole; its diameter is anywhere between two limits with the same chance,
// which for a lot of bought pins is the cautious assumption.
type Pin struct {
	Name        string
	Least, Most float64
	From        string // where the limits come from
}

// Window is the clearance, hole less pin, at which a fit is what was wanted: under Binds it binds,
// over Rattles it rattles. Negative clearances are interference.
type Window struct {
	Binds, Rattles float64
	Press          bool // the wide end must be under Rattles, not the tight one
	Rule           string
}

// Fit is a pin in a hole.
type Fit struct {
	Pin      Pin
	Window   Window
	Draw     float64       // circle to draw, the way of the beam's centre
	Wanted   float64       // finished size in the middle of the sheet that it is drawn for
	Sizes    profile.Sizes // foreseen
	Low      float64       // of the tight end: 97.5 % of holes are wider
	High     float64       // of the wide end: 97.5 % of holes are narrower
	Binds    float64       // chance, 0 to 1
	Fits     float64
	Rattles  float64
	Warnings []string
}

// In foresees a pin in a hole of a finished size in the middle of the sheet.
func In(p profile.Profile, pin Pin, w Window, finished float64) (Fit, error) {
	if err := usable(pin, w); err != nil {
		return Fit{}, err
	}
	drawn, err := p.Draw(finished)
	if err != nil {
		return Fit{}, fmt.Errorf("%s: %w", pin.Name, err)
	}
	f := Fit{Pin: pin, Window: w, Draw: drawn, Wanted: finished, Sizes: p.Finished(drawn)}
	if s := p.Covers(drawn); s != "" {
		f.Warnings = append(f.Warnings, s)
	}
	t := distuv.StudentsT{Mu: 0, Sigma: f.Sizes.Spread(), Nu: p.Freedom}
	f.Low, f.High = f.Sizes.Tight()+t.Quantile(0.025), f.Sizes.Wide()+t.Quantile(0.975)
	loose := f.Sizes.Tight()
	if w.Press {
		loose = f.Sizes.Wide()
	}
	f.Binds = under(f.Sizes.Tight(), t, pin, w.Binds)
	f.Rattles = max(0, 1-under(loose, t, pin, w.Rattles))
	f.Fits = max(0, 1-f.Binds-f.Rattles)
	return f, nil
}

// usable refuses pins and windows that cannot be.
func usable(pin Pin, w Window) error {
	switch {
	case !(pin.Least > 0) || !(pin.Most >= pin.Least) || math.IsInf(pin.Most, 0):
		return fmt.Errorf("%s: a pin of %v to %v mm", pin.Name, pin.Least, pin.Most)
	case !(w.Binds < w.Rattles):
		return fmt.Errorf("%s: it binds under %v mm clearance and rattles over %v mm: nothing fits", pin.Name, w.Binds, w.Rattles)
	}
	return nil
}

// pinPoints is how many diameters of the pin the chance is averaged over, by Gauss's rule: the
// integrand is smooth where the hole scatters, and a mean over the pin's own range where it does not.
const pinPoints = 32

// under is the chance that hole less pin is under a clearance. t is the distribution of the hole about
// its size, which is Student's for that the scatter was itself estimated.
func under(size float64, t distuv.StudentsT, pin Pin, clearance float64) float64 {
	if pin.Most == pin.Least {
		return t.CDF(pin.Least + clearance - size)
	}
	chance := func(d float64) float64 { return t.CDF(d + clearance - size) }
	return min(1, quad.Fixed(chance, pin.Least, pin.Most, pinPoints, quad.Legendre{}, 0)/(pin.Most-pin.Least))
}

// Best is the hole with the largest chance of the wanted fit, by golden section: the chance has one peak
// over the size of the hole.
func Best(p profile.Profile, pin Pin, w Window) (Fit, error) {
	if err := usable(pin, w); err != nil {
		return Fit{}, err
	}
	low, high := pin.Least+w.Binds-1, pin.Most+min(w.Rattles, w.Binds+5)+1
	low = max(low, 0.05)
	golden := (math.Sqrt(5) - 1) / 2
	// Where no hole can be drawn and where all chances are rounded to 0 and 1, the nearer to the
	// middle of the window is the better.
	score := func(d float64) float64 {
		f, err := In(p, pin, w, d)
		if err != nil {
			return -10 + d
		}
		return f.Fits - 1e-6*math.Abs(d-(pin.Least+pin.Most+w.Binds+min(w.Rattles, w.Binds+5))/2)
	}
	a, b := high-golden*(high-low), low+golden*(high-low)
	fa, fb := score(a), score(b)
	for high-low > 1e-5 {
		if fa < fb {
			low, a, fa = a, b, fb
			b = low + golden*(high-low)
			fb = score(b)
		} else {
			high, b, fb = b, a, fa
			a = high - golden*(high-low)
			fa = score(a)
		}
	}
	return In(p, pin, w, (low+high)/2)
}

// ForChance is the smallest hole, that is the one with the least play, that binds with no more than
// the chance left over by the wanted one: 0.95 asks for a hole of which one in twenty binds. Chances from
// 0.5 up to, not including, 1 can be asked for.
func ForChance(p profile.Profile, pin Pin, w Window, chance float64) (Fit, error) {
	if !(chance >= 0.5 && chance < 1) {
		return Fit{}, fmt.Errorf("%s: a chance of %v: ask for one from 0.5 to 0.999", pin.Name, chance)
	}
	if err := usable(pin, w); err != nil {
		return Fit{}, err
	}
	low, high := max(0.05, pin.Least+w.Binds-1), pin.Most+w.Binds+5
	for high-low > 1e-6 {
		middle := (low + high) / 2
		f, err := In(p, pin, w, middle)
		if err != nil || f.Binds > 1-chance {
			low = middle
		} else {
			high = middle
		}
	}
	f, err := In(p, pin, w, high)
	if err != nil {
		return Fit{}, err
	}
	if f.Binds > 1-chance+1e-9 {
		return Fit{}, fmt.Errorf("%s: no hole up to %.1f mm binds so seldom: the scatter is not known well enough, read more holes", pin.Name, high)
	}
	if f.Rattles > 1-chance {
		f.Warnings = append(f.Warnings, fmt.Sprintf("the price is play: %.0f %% of such holes rattle", 100*f.Rattles))
	}
	return f, nil
}
