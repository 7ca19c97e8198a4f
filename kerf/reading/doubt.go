package reading

import (
	"fmt"
	"math"

	"pinwright/kerf"
)

// mostOff is how far a size may be from what was drawn, mm, and still be believed: the widest beam
// that is believed, and as much again for a burnt edge.
const mostOff = 2 * kerf.Widest

// size is what a reading says of the size, roughly.
func (r Reading) size() float64 {
	switch {
	case r.Answer != NoAnswer:
		return r.Pin
	case math.IsInf(r.Least, -1):
		return r.Most
	case math.IsInf(r.Most, 1):
		return r.Least
	}
	return (r.Least + r.Most) / 2
}

// doubt looks for readings that cannot be: units mixed up, the same feature drawn twice differently,
// answers that contradict each other.
func (t *table) doubt() {
	readings := t.sheet.Readings
	first := map[string]int{}
	large, small := 0, 0
	for _, r := range readings {
		switch unitSlip(r) {
		case 1:
			large++
		case -1:
			small++
		}
	}
	told := false
	for i, r := range readings {
		at := t.places[i]
		want := r.Drawn * float64(r.Count)
		if k, seen := first[r.Feature]; !seen {
			first[r.Feature] = i
		} else if o := readings[k]; o.Drawn != r.Drawn || o.Kind != r.Kind || o.Count != r.Count {
			t.fail(at[0], "give every feature its own name", "%s is a %s drawn %s mm here and a %s drawn %s mm in line %d", r.Feature, r.Kind, mm(r.Drawn), o.Kind, mm(o.Drawn), o.Line)
			continue
		}
		slip := unitSlip(r)
		switch {
		case slip != 0 && max(large, small) > len(readings)/2 && max(large, small) > 1:
			if told {
				continue
			}
			told = true
			which, n := "large", large
			if slip < 0 {
				which, n = "small", small
			}
			t.fail(at[1], "inches and millimetres are mixed up: is the unit in the heading right (_mm, _in)?",
				"%d of %d readings are 25.4 times too %s, this one %s mm where %s mm was drawn", n, len(readings), which, mm(r.size()), mm(want))
		case slip > 0:
			t.fail(at[1], fmt.Sprintf("inches and millimetres are mixed up: %s / 25.4 = %s", mm(r.size()), mm(r.size()/inch)),
				"%s: %s mm is 25.4 times too large where %s mm was drawn", r.Feature, mm(r.size()), mm(want))
		case slip < 0:
			t.fail(at[1], fmt.Sprintf("inches and millimetres are mixed up: %s in = %s mm", mm4(r.size()), mm(r.size()*inch)),
				"%s: %s mm is 25.4 times too small where %s mm was drawn", r.Feature, mm4(r.size()), mm(want))
		case math.Abs(r.size()-want) > mostOff*float64(r.Count):
			what := "reading"
			if r.Answer != NoAnswer {
				what = "pin"
			}
			t.fail(at[1], "measure again, or look whether the point is in the right place", "%s: a %s of %s mm where %s mm was drawn: no laser is so far off", r.Feature, what, mm(r.size()), mm(want))
		}
	}
	if len(t.errs) > 0 {
		return
	}
	for _, c := range Contradictions(readings) {
		t.fail(t.places[c.B][1], "try both again, or measure the pins", "%s", c.says(readings))
	}
}

// mm4 writes a length in inches.
func mm4(v float64) string { return fmt.Sprintf("%.4f", v) }

// unitSlip is 1 for a reading that is 25.4 times too large, -1 for one as much too small: nearer, in
// ratio, to that than to what was drawn, and within what the kerf can do of it.
func unitSlip(r Reading) int {
	want := r.Drawn * float64(r.Count)
	near := func(size float64) bool { return math.Abs(size-want) < 0.15*want+0.3*float64(r.Count) }
	switch size := r.size(); {
	case near(size):
		return 0
	case near(size / inch):
		return 1
	case near(size * inch):
		return -1
	}
	return 0
}

// Contradiction is two answers that cannot both be: in the same hole, from the same side, the pin of
// reading B is thicker than that of reading A and goes more easily.
type Contradiction struct{ A, B int }

func (c Contradiction) says(rs []Reading) string {
	a, b := rs[c.A], rs[c.B]
	return fmt.Sprintf("%s: the pin of %s mm: %s, but in line %d the thinner one of %s mm: %s", b.Feature, mm(b.Pin), b.Answer, a.Line, mm(a.Pin), a.Answer)
}

// Contradictions finds the answers that cannot both be, by the order of the readings.
func Contradictions(rs []Reading) []Contradiction {
	type place struct {
		feature string
		side    Side
	}
	by := map[place][]int{}
	var out []Contradiction
	for i, r := range rs {
		if r.Answer == NoAnswer {
			continue
		}
		at := place{r.Feature, r.Side}
		for _, k := range by[at] {
			o := rs[k]
			switch {
			case r.Pin > o.Pin && r.Answer.Looseness() > o.Answer.Looseness():
				out = append(out, Contradiction{k, i})
			case r.Pin < o.Pin && r.Answer.Looseness() < o.Answer.Looseness():
				out = append(out, Contradiction{i, k})
			}
		}
		by[at] = append(by[at], i)
	}
	return out
}
