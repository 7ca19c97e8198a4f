package job

import "math"

// shape chooses the form of a part when none is stated, and refuses one that does not fit the pins
// or the keys beside it.
func (r *reader) shape(l *Link, dr *draft, j *Job) {
	v := dr.v
	straight := inLine(dr)
	stated := v.get("shape")
	switch {
	case stated.ok():
		l.Shape = Shape(stated.text)
	case stated != nil:
		return
	case v.has("bend") || v.has("around"):
		l.Shape = Bent
	case v.has("waist"):
		l.Shape = Waisted
	case len(dr.pins) == 2 && v.has("drive"):
		l.Shape = CrankArm
	case straight:
		l.Shape = Bar
	default:
		l.Shape = Plate
	}
	if dr.sound {
		at := dr.at
		if stated != nil {
			at = stated.at
		}
		n := len(dr.pins)
		switch l.Shape {
		case Bar:
			if !straight {
				r.fail(at, "write shape: plate or shape: spider", "link %s: a bar is straight, but its pins %s are not on one line", l.Name, allOf(dr.pins))
			}
		case Waisted, Bent, CrankArm:
			if n != 2 {
				r.fail(at, "write shape: "+otherShape(straight), "link %s: a %s part has two pins, here are %d", l.Name, l.Shape, n)
			}
		case Plate, Spider:
			if n == 2 {
				r.fail(at, "write shape: bar", "link %s: a %s wants three pins or more, here are two", l.Name, l.Shape)
			}
		}
	}
	only := func(key string, fits bool, whose string) {
		if v.has(key) && !fits {
			r.fail(v.get(key).at, "take it out, or write shape: "+whose, "link %s: %s is for shape %s, this link is a %s", l.Name, key, whose, l.Shape)
		}
	}
	only("waist", l.Shape == Waisted, string(Waisted))
	only("bend", l.Shape == Bent, string(Bent))
	only("around", l.Shape == Bent, string(Bent))
	if l.PhaseMark {
		only("phase-mark", l.Shape == CrankArm || l.Shape == DiscForm, string(CrankArm))
	}
	switch {
	case l.Shape == Waisted && v.get("waist") == nil:
		r.fail(dr.at, "write waist: 10mm", "link %s is waisted, but has no waist", l.Name)
	case l.Shape == Waisted && v.get("waist").ok() && l.Width > 0 && l.Waist >= l.Width:
		r.fail(v.get("waist").at, "make the waist narrower, or take shape: bar", "link %s: a waist of %s mm is no narrower than the width of %s mm", l.Name, figure(l.Waist), figure(l.Width))
	case l.Shape == Bent && v.has("bend") && v.has("around"):
		r.fail(v.get("bend").at, "keep one of them", "link %s: bend says how far the bar goes aside, around what it goes round; both at once may differ", l.Name)
	case l.Shape == Bent && !v.has("bend") && !v.has("around"):
		r.fail(dr.at, "write bend: 12mm, or around: [{at: [x, y], radius: 8mm}]", "link %s is bent, but neither bend nor around is said", l.Name)
	case l.Shape == Bent && v.get("bend").ok() && l.Bend == 0:
		r.fail(v.get("bend").at, "write shape: bar", "link %s: a bend of 0 is a straight bar", l.Name)
	}
	if l.Windows && (l.Shape == DiscForm || l.Shape == CrankArm) {
		r.fail(v.get("windows").at, "take the windows out, or choose shape: "+otherShape(straight), "link %s: a %s has no room for windows", l.Name, l.Shape)
	}
	if v.has("rim") && !l.Windows && (v.get("windows") == nil || v.get("windows").ok()) {
		r.fail(v.get("rim").at, "add windows: true, or take the rim out", "link %s: rim is what stays round windows, and there are none", l.Name)
	}
}

func otherShape(straight bool) string {
	if straight {
		return string(Bar)
	}
	return string(Plate)
}

// inLine tells whether the pins of a link lie on one line, as far as triples with all three lengths
// given tell. A triple that misses the line by less than a thousandth of a millimetre is in line:
// that is rounding of the lengths.
func inLine(dr *draft) bool {
	n := len(dr.pins)
	if n <= 2 {
		return true
	}
	length := func(a, b string) (float64, bool) {
		for _, s := range dr.lengths {
			if s.joins(a, b) {
				return s.mm, true
			}
		}
		return 0, false
	}
	straight := true
	for i := range n {
		for k := range i {
			for m := range k {
				a, okA := length(dr.pins[i], dr.pins[k])
				b, okB := length(dr.pins[k], dr.pins[m])
				c, okC := length(dr.pins[i], dr.pins[m])
				if okA && okB && okC && height(a, b, c) > 1e-3 {
					straight = false
				}
			}
		}
	}
	return straight
}

// height is that of a triangle on its longest side: the way by which three pins miss one line. 0 when
// the sides close no triangle. Area by Kahan's form of Heron's formula, which is exact for needles.
func height(a, b, c float64) float64 {
	if a < b {
		a, b = b, a
	}
	if a < c {
		a, c = c, a
	}
	if b < c {
		b, c = c, b
	}
	if a == 0 {
		return 0
	}
	square := (a + (b + c)) * (c - (a - b)) * (c + (a - b)) * (a + (b - c))
	if square <= 0 {
		return 0
	}
	return math.Sqrt(square) / 2 / a
}
