package linkage

import (
	"errors"
	"fmt"
	"math"
)

// PinDistance is the distance between two pins of a link over samples of a motion.
type PinDistance struct {
	Link, A, B     string
	Mean, Min, Max float64 // mm
	MinAt, MaxAt   int     // samples, from 0
}

// Distances measures the distance between every two pins of every link over samples of the motion;
// samples[k] holds the places of the joints in the order of their names. The order is that of the
// links and their pins. Pins that are not among the joints are an error, as are samples of another
// length.
func Distances(links []Link, joints []string, samples [][]Point) ([]PinDistance, error) {
	at := map[string]int{}
	for i, n := range joints {
		at[n] = i
	}
	var errs []error
	if len(samples) == 0 {
		errs = append(errs, errors.New("joint table: it has no samples"))
	}
	for k, s := range samples {
		if len(s) != len(joints) {
			errs = append(errs, fmt.Errorf("joint table: sample %d has %d places for %d joints", k+1, len(s), len(joints)))
			continue
		}
		for i, p := range s {
			if !finitePoint(p) {
				errs = append(errs, fmt.Errorf("joint table: sample %d: joint %s has no place", k+1, joints[i]))
			}
		}
	}
	for _, l := range links {
		for _, p := range l.Pins {
			if _, ok := at[p]; !ok {
				errs = append(errs, fmt.Errorf("link %s: joint %s is not in the table of joints", l.Name, p))
			}
		}
	}
	if err := errors.Join(errs...); err != nil {
		return nil, err
	}
	var out []PinDistance
	for _, l := range links {
		for j := range l.Pins {
			for i := range j {
				a, b := at[l.Pins[i]], at[l.Pins[j]]
				d := PinDistance{Link: l.Name, A: l.Pins[i], B: l.Pins[j], Min: math.Inf(1), Max: math.Inf(-1)}
				for k, s := range samples {
					x := dist(s[a], s[b])
					d.Mean += x / float64(len(samples))
					if x < d.Min {
						d.Min, d.MinAt = x, k
					}
					if x > d.Max {
						d.Max, d.MaxAt = x, k
					}
				}
				out = append(out, d)
			}
		}
	}
	return out, nil
}

// Recover finds the lengths of links from a table of joint places through the cycle. The links give
// names and pins; the result has their lengths, 2n-3 for n pins: the first two pins and from each
// further pin to these. A distance that varies by more than tol (mm) is a *StretchError, all of them
// joined; three pins that lie on one line within tol come out exactly so.
func Recover(links []Link, joints []string, samples [][]Point, tol float64) ([]Link, error) {
	all, err := Distances(links, joints, samples)
	if err != nil {
		return nil, err
	}
	var errs []error
	mean := map[[3]string]float64{}
	for _, d := range all {
		mean[[3]string{d.Link, d.A, d.B}] = d.Mean
		if !(d.Max-d.Min <= tol) {
			errs = append(errs, &StretchError{Link: d.Link, A: d.A, B: d.B, Mean: d.Mean, Min: d.Min, Max: d.Max, MinAt: d.MinAt, MaxAt: d.MaxAt, Tolerance: tol})
		}
	}
	if err := errors.Join(errs...); err != nil {
		return nil, err
	}
	out := make([]Link, len(links))
	for i, l := range links {
		l.Pins = append([]string(nil), l.Pins...)
		l.Lengths = nil
		if len(l.Pins) >= 2 {
			a, b := l.Pins[0], l.Pins[1]
			ab := mean[[3]string{l.Name, a, b}]
			l.Lengths = append(l.Lengths, Length{a, b, ab})
			for _, p := range l.Pins[2:] {
				ap, bp := straighten(ab, mean[[3]string{l.Name, a, p}], mean[[3]string{l.Name, b, p}], tol)
				l.Lengths = append(l.Lengths, Length{a, p, ap}, Length{b, p, bp})
			}
		}
		out[i] = l
	}
	return out, nil
}

// straighten returns the two lengths of a pin from the ends of ab, made to lie on its line when they
// nearly do.
func straighten(ab, ap, bp, tol float64) (float64, float64) {
	switch {
	case math.Abs(ab+bp-ap) <= tol:
		x := (ab + bp + ap) / 2 // beyond b
		return x, x - ab
	case math.Abs(ab+ap-bp) <= tol:
		x := (ab + ap + bp) / 2 // behind a
		return x - ab, x
	case math.Abs(ap+bp-ab) <= tol:
		x := (ap + ab - bp) / 2 // between
		return x, ab - x
	}
	return ap, bp
}
