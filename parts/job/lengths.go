package job

import (
	"math"
	"slices"
	"strings"

	"pinwright/parts/linkage"
)

// lengthsOf collects the lengths of a link from where they are stated, and checks that they are
// between its pins, agree, close triangles and fix its shape.
func (r *reader) lengthsOf(dr *draft, rows []lengthRow, cyc *cycleTable, tablesSound bool) {
	v, where := dr.v, "link "+dr.name
	broken := v.get("length") != nil && !v.get("length").ok() || v.has("lengths") && !v.get("lengths").isWhole()
	ways := 0
	for _, k := range []string{"length", "lengths", "at"} {
		if v.has(k) {
			ways++
		}
	}
	if ways > 1 {
		r.fail(dr.at, "keep one of length, lengths and at", "%s gives its lengths in %d ways", where, ways)
		dr.sound = false
		return
	}
	if l := v.get("length"); l != nil && dr.sound {
		switch {
		case len(dr.pins) != 2:
			r.fail(l.at, "write lengths: {"+suggestPairs(dr.pins, nil)+"}", "%s has %d pins: one length does not fix it", where, len(dr.pins))
			broken = true
		case l.ok():
			r.state(dr, stated{dr.pins[0], dr.pins[1], l.number, l.at, "length"})
		}
	}
	for _, e := range v.get("lengths").all() {
		if !e.value.ok() {
			broken = true
		}
		a, b, _ := strings.Cut(e.name, "-")
		if !pairName.form.MatchString(e.name) || !dr.sound {
			continue
		}
		if m := dr.meant[a]; m != "" {
			a = m
		}
		if m := dr.meant[b]; m != "" {
			b = m
		}
		if a == b {
			r.fail(e.at, "name two different pins", "%s: %s is a pin and itself", where, e.name)
			broken = true
			continue
		}
		missing := false
		for _, end := range []string{a, b} {
			if !slices.Contains(dr.pins, end) {
				hint := meant(end, dr.pins)
				if hint == "" {
					hint = "add it to the pins, or take the length out"
				}
				r.fail(e.at, hint, "%s: length %s, but %s is not one of its pins %s", where, e.name, end, allOf(dr.pins))
				missing = true
			}
		}
		if missing {
			broken = true
			continue
		}
		if e.value.ok() {
			r.state(dr, stated{a, b, e.value.number, e.value.at, "lengths"})
		}
	}
	broken = r.lengthsFromPlaces(dr) || broken
	broken = r.lengthsFromTable(dr, rows) || broken
	if dr.sound && !broken && cyc != nil {
		r.lengthsFromCycle(dr, cyc)
	}
	if !dr.sound || broken || !tablesSound {
		dr.sound = false
		return
	}
	r.triangles(dr)
	if missing := missingPairs(dr.pins, dr.lengths); len(missing) > 0 {
		n := len(dr.pins)
		if n == 2 {
			r.fail(dr.at, "write length: 50mm", "%s has no length", where)
		} else {
			r.fail(dr.at, "give the distance"+plural(len(missing))+" "+allOf(missing)+", or other pairs that fix the shape",
				"%s has %d pins, so %d lengths fix its shape (2n - 3); %s missing", where, n, 2*n-3, counted(len(missing), "length")+isAre(len(missing)))
		}
		dr.sound = false
	}
}

// sameLength is how far two statements of one length may differ, mm.
const sameLength = 1e-6

// state adds a length; one that is stated already must agree.
func (r *reader) state(dr *draft, s stated) {
	for _, old := range dr.lengths {
		if !old.joins(s.a, s.b) {
			continue
		}
		if math.Abs(old.mm-s.mm) > sameLength {
			r.fail(s.at, "keep the right one", "link %s: %s is %s mm here, but %s mm in %s, line %d", dr.name, s.pair(), figure(s.mm), figure(old.mm), old.at.File, old.at.Line)
		} else if old.from == s.from {
			r.fail(s.at, "keep one of them", "link %s: %s is stated twice, first in %s, line %d", dr.name, s.pair(), old.at.File, old.at.Line)
		}
		return
	}
	dr.lengths = append(dr.lengths, s)
	r.places["linkage.links."+dr.name+".lengths."+s.pair()] = s.at.Position
	r.places["linkage.links."+dr.name+".lengths."+s.b+"-"+s.a] = s.at.Position
}

// lengthsFromPlaces gives the distances of all pairs of placed pins: all of them, so that the form is
// fixed but for its mirror image, however many pins there are. It tells whether they are wrong.
func (r *reader) lengthsFromPlaces(dr *draft) (broken bool) {
	at := dr.v.get("at")
	if at == nil {
		return false
	}
	if !at.ok() || !dr.sound {
		return true
	}
	places := map[string]linkage.Point{}
	spots := map[string]spot{}
	for _, e := range at.all() {
		if !e.value.ok() {
			return true
		}
		if !slices.Contains(dr.pins, e.name) {
			r.fail(e.at, "add it to the pins, or take the place out", "link %s: a place for %s, which is not one of its pins %s", dr.name, e.name, allOf(dr.pins))
			return true
		}
		places[e.name], spots[e.name] = pointOf(e.value), e.value.at
	}
	for i, b := range dr.pins {
		if _, ok := places[b]; !ok {
			r.fail(at.at, "write "+b+": [x, y] too", "link %s: at has no place for pin %s", dr.name, b)
			return true
		}
		for _, a := range dr.pins[:i] {
			pa, pb := places[a], places[b]
			d := pa.Dist(pb)
			if d == 0 {
				r.fail(spots[b], "move one of them, or make them one joint", "link %s: pins %s and %s are at the same place", dr.name, a, b)
				return true
			}
			r.state(dr, stated{a, b, d, spots[b], "at"})
		}
	}
	return false
}

// lengthsFromTable adds the rows of the table that are about the link.
func (r *reader) lengthsFromTable(dr *draft, rows []lengthRow) (broken bool) {
	for _, row := range rows {
		if row.link != dr.name {
			continue
		}
		if !row.sound {
			broken = true
			continue
		}
		if !dr.sound {
			continue
		}
		missing := false
		for _, end := range []cell{row.from, row.to} {
			if !slices.Contains(dr.pins, end.text) {
				hint := meant(end.text, dr.pins)
				if hint == "" {
					hint = "add it to the pins of the link, or take the row out"
				}
				r.fail(end.at, hint, "link %s: %s is not one of its pins %s", dr.name, short(end.text), allOf(dr.pins))
				missing = true
			}
		}
		if missing {
			broken = true
			continue
		}
		r.state(dr, stated{row.from.text, row.to.text, row.mm, row.lengthAt, "the table"})
	}
	return broken
}

// triangles reports three lengths that close no triangle.
func (r *reader) triangles(dr *draft) {
	for i, s := range dr.lengths {
		for _, p := range dr.pins {
			if p == s.a || p == s.b {
				continue
			}
			var legs []stated
			for _, t := range dr.lengths {
				if t.joins(s.a, p) || t.joins(s.b, p) {
					legs = append(legs, t)
				}
			}
			if len(legs) == 2 && legs[0].mm+legs[1].mm < dr.lengths[i].mm-1e-9 {
				r.fail(s.at, "at most "+figure(legs[0].mm+legs[1].mm)+" mm, which puts the three on a line",
					"link %s: %s of %s mm is longer than %s and %s together, %s mm", dr.name, s.pair(), figure(s.mm), legs[0].pair(), legs[1].pair(), figure(legs[0].mm+legs[1].mm))
			}
		}
	}
}

// lengthsMM gives the lengths without their places.
func lengthsMM(from []stated) []linkage.Length {
	out := make([]linkage.Length, len(from))
	for i, s := range from {
		out[i] = linkage.Length{A: s.a, B: s.b, MM: s.mm}
	}
	return out
}

// suggestPairs writes the lengths that would fix pins whose pairs given are known, for a hint.
func suggestPairs(pins []string, given []stated) string {
	pairs := missingPairs(pins, given)
	for i := range pairs {
		pairs[i] += ": ..."
	}
	return strings.Join(pairs, ", ")
}

// missingPairs gives pairs of pins whose distances, with those given, fix the form of a link; none
// when those given fix it already.
//
// A set of distances fixes n points in general position exactly when it holds 2n-3 independent ones
// (Laman's theorem). Independence is found by the pebble game (Jacobs and Hendrickson, J. Comput.
// Phys. 137, 1997): every pin has two pebbles, a distance is independent when four can be gathered at
// its two ends, and then takes one. Pairs are tried in the order of the pins, those of neighbours
// first. Time: pins^2 searches over at most 2 pins distances.
func missingPairs(pins []string, given []stated) []string {
	g := pebbles{free: make([]int, len(pins)), to: make([][]int, len(pins))}
	for i := range g.free {
		g.free[i] = 2
	}
	independent := 0
	for _, s := range given {
		if g.add(slices.Index(pins, s.a), slices.Index(pins, s.b)) {
			independent++
		}
	}
	var missing []string
	for gap := 1; gap < len(pins); gap++ {
		for i := 0; i+gap < len(pins); i++ {
			if independent+len(missing) < 2*len(pins)-3 && g.add(i, i+gap) {
				missing = append(missing, pins[i]+"-"+pins[i+gap])
			}
		}
	}
	return missing
}

// pebbles is the state of the pebble game: free pebbles of each pin, and the distances that each
// pin's pebbles lie on, by their other end.
type pebbles struct {
	free []int
	to   [][]int
}

// add puts in the distance of pins a and b if it is independent of those that are in.
func (g *pebbles) add(a, b int) bool {
	if a < 0 || b < 0 || a == b {
		return false
	}
	for g.free[a] < 2 {
		if !g.fetch(a, b) {
			return false
		}
	}
	for g.free[b] < 2 {
		if !g.fetch(b, a) {
			return false
		}
	}
	g.free[a]--
	g.to[a] = append(g.to[a], b)
	return true
}

// fetch brings one free pebble to a pin along the distances, leaving those of the pin spared.
func (g *pebbles) fetch(to, spared int) bool {
	seen := make([]bool, len(g.free))
	seen[to], seen[spared] = true, true
	return g.walk(to, seen)
}

func (g *pebbles) walk(at int, seen []bool) bool {
	for i, next := range g.to[at] {
		if seen[next] {
			continue
		}
		seen[next] = true
		if g.free[next] == 0 && !g.walk(next, seen) {
			continue
		}
		// The distance turns round: its pebble comes from the other end now.
		g.free[next]--
		g.to[at] = slices.Delete(g.to[at], i, i+1)
		g.to[next] = append(g.to[next], at)
		g.free[at]++
		return true
	}
	return false
}
