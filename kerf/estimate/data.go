package estimate

import (
	"fmt"
	"math"
	"strconv"

	"pinwright/kerf/reading"
)

// Places of the mean's terms in a row of the design.
const (
	kerfAt = iota
	holesAt
	diameterAt
	axisAt
	taperAt
	meanTerms
)

var meanNames = [meanTerms]Term{Kerf, Holes, Diameter, Axis, Taper}

// bound names the threshold that is added to an end of an interval.
type bound int8

const (
	fixed bound = iota
	drops       // + the clearance from which pins drop
	push        // - how much too thick a pin can be pushed in
)

// row is one reading: lies between low and high, less what was drawn.
type row struct {
	x         [meanTerms]float64
	tight     bool // the tight side governs, whichever it is: the taper counts by its size
	low, high float64
	at        [2]bound // of low and high
	exact     bool
	answer    reading.Answer
	line      int
}

// feature is what one thing on the coupon was read as.
type feature struct {
	name string
	rows []row
	root float64 // square root of the count: how the scatter of several bars adds up
}

// data is readings in the form that the likelihood wants.
type data struct {
	features        []feature
	centre          float64
	smallest        float64
	largest         float64
	repeated        bool
	holes, straight int
	axes            map[reading.Axis]int
	sides           map[reading.Side]int
	diameters       map[float64]bool
	answers         map[reading.Answer]int
	measured        int // readings with two ends
	below, above    int // readings with an upper and with a lower end
	hermite, panel  rule
	scale           float64 // least spread that is told apart from none, mm
	leastRepeat     float64
	coarsest        float64                  // widest calliper interval
	kept            map[momentsKey][]moments // for these features
}

// leastSpread is the smallest standard deviation, mm, that is distinguished from none.
const leastSpread = 5e-4

func newData(readings []reading.Reading) (*data, error) {
	d := &data{kept: map[momentsKey][]moments{}, axes: map[reading.Axis]int{}, sides: map[reading.Side]int{}, diameters: map[float64]bool{}, answers: map[reading.Answer]int{}, hermite: hermite(7), panel: legendre(8), scale: leastSpread}
	if len(readings) == 0 {
		return nil, TooFewError{Says: "no readings", Advice: []string{"cut the coupon and fill in its table"}}
	}
	if cs := reading.Contradictions(readings); len(cs) > 0 {
		a, b := readings[cs[0].A], readings[cs[0].B]
		return nil, fmt.Errorf("%s: the pin of %s mm %s and the thicker one of %s mm %s: try both again", a.Feature, mm(a.Pin), a.Answer, mm(b.Pin), b.Answer)
	}
	inverse, holes := 0.0, 0
	by := map[string]int{}
	for _, r := range readings {
		if err := sound(r); err != nil {
			return nil, err
		}
		if _, seen := by[r.Feature]; !seen {
			by[r.Feature] = len(d.features)
			d.features = append(d.features, feature{name: r.Feature, root: math.Sqrt(float64(r.Count))})
			if r.Kind == reading.Hole {
				inverse += 1 / r.Drawn
				holes++
			}
		} else {
			d.repeated = true
		}
		if r.Kind == reading.Hole {
			if d.smallest == 0 || r.Drawn < d.smallest {
				d.smallest = r.Drawn
			}
			d.largest = max(d.largest, r.Drawn)
			d.diameters[r.Drawn] = true
			d.holes++
		} else {
			d.straight++
		}
		d.axes[r.Axis]++
		d.sides[r.Side]++
		d.answers[r.Answer]++
	}
	if holes > 0 {
		d.centre = float64(holes) / inverse
	}
	for _, r := range readings {
		f := &d.features[by[r.Feature]]
		if len(f.rows) > 0 && f.root != math.Sqrt(float64(r.Count)) {
			return nil, fmt.Errorf("%s: measured with different counts", r.Feature)
		}
		f.rows = append(f.rows, d.row(r))
	}
	for _, f := range d.features {
		for _, r := range f.rows {
			// Turning pins and pushed ones have a second end only when a threshold is estimated.
			if !math.IsInf(r.low, -1) && r.answer != reading.Push {
				d.above++
			}
			if !math.IsInf(r.high, 1) && r.answer != reading.Turns {
				d.below++
			}
			if r.answer == reading.NoAnswer && !math.IsInf(r.high-r.low, 1) {
				d.measured++
				if r.high-r.low < 0.05 {
					d.coarsest = max(d.coarsest, r.high-r.low)
				}
			}
		}
	}
	// A calliper does not repeat better than it rounds, the standard deviation of rounding; nor does a
	// hand that tries pins by less than two micrometres.
	d.leastRepeat = max(d.scale, d.coarsest/math.Sqrt(12))
	if d.coarsest == 0 && d.measured < len(readings) {
		d.leastRepeat = 2e-3
	}
	if d.above == 0 || d.below == 0 {
		what, cure := "loose", "try thicker pins, until some do not go"
		if d.above == 0 {
			what, cure = "tight", "try thinner pins, until some go"
		}
		return nil, TooFewError{Says: "every reading says only that the holes are " + what + ": there is no other end to the kerf", Advice: []string{cure, "or measure some with a calliper"}}
	}
	return d, nil
}

// sound refuses what no table lets through.
func sound(r reading.Reading) error {
	bad := func(v float64) bool { return math.IsNaN(v) || math.IsInf(v, 0) || v <= 0 || v > 1e5 }
	switch {
	case r.Kind != reading.Hole && r.Kind != reading.Slot && r.Kind != reading.Bar:
		return fmt.Errorf("%s: unknown kind %q", r.Feature, r.Kind)
	case bad(r.Drawn):
		return fmt.Errorf("%s: drawn %v mm", r.Feature, r.Drawn)
	case r.Count < 1 || r.Count > 1 && r.Kind != reading.Bar:
		return fmt.Errorf("%s: %d of them measured at once", r.Feature, r.Count)
	case r.Answer != reading.NoAnswer && (r.Kind != reading.Hole || r.Answer.Looseness() < 0 || bad(r.Pin)):
		return fmt.Errorf("%s: a pin of %v mm in a %s: %q", r.Feature, r.Pin, r.Kind, r.Answer)
	case r.Answer == reading.NoAnswer && (!(r.Least <= r.Most) || math.IsInf(r.Least, 1) || math.IsInf(r.Most, -1) || math.IsInf(r.Least, -1) && math.IsInf(r.Most, 1)):
		return fmt.Errorf("%s: between %v and %v mm", r.Feature, r.Least, r.Most)
	}
	return nil
}

// row states a reading by the model.
func (d *data) row(r reading.Reading) row {
	n := float64(r.Count)
	out := row{low: r.Least - n*r.Drawn, high: r.Most - n*r.Drawn, exact: r.Least == r.Most, answer: r.Answer, line: r.Line}
	sign := 1.0
	if r.Kind == reading.Bar {
		sign = -n
	}
	out.x[kerfAt] = sign
	if r.Kind == reading.Hole {
		out.x[holesAt] = 1
		out.x[diameterAt] = d.centre/r.Drawn - 1
	}
	switch r.Axis {
	case reading.X:
		out.x[axisAt] = sign / 2
	case reading.Y:
		out.x[axisAt] = -sign / 2
	}
	gauge := r.Answer != reading.NoAnswer || math.IsInf(r.Most-r.Least, 1) || r.Most-r.Least > 0.05
	switch {
	case r.Side == reading.Top:
		out.x[taperAt] = sign / 2
	case r.Side == reading.Bottom:
		out.x[taperAt] = -sign / 2
	case gauge && r.Kind != reading.Bar:
		out.tight, out.x[taperAt] = true, -0.5
	}
	if r.Answer != reading.NoAnswer {
		c := r.Pin - r.Drawn
		out.low, out.high, out.exact = math.Inf(-1), math.Inf(1), false
		switch r.Answer {
		case reading.Drops:
			out.low, out.at[0] = c, drops
		case reading.Turns:
			out.low, out.high, out.at[1] = c, c, drops
		case reading.Push:
			out.low, out.high, out.at[0] = c, c, push
		case reading.No:
			out.high, out.at[1] = c, push
		}
	}
	return out
}

// mm writes a length to a micrometre, without zeros at the end.
func mm(v float64) string {
	v = math.Round(v*1000) / 1000
	if v == 0 {
		v = 0 // no minus
	}
	return strconv.FormatFloat(v, 'f', -1, 64)
}
