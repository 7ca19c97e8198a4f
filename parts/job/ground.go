package job

import (
	"math"

	"pinwright/parts/linkage"
	"pinwright/parts/outline"
)

// groundOf reads a pivot. One that is not sound comes back with an empty range, so that nothing is
// concluded from its place.
func (r *reader) groundOf(v *value) *linkage.Ground {
	if v.form.kind != aTable {
		if !v.ok() {
			return &linkage.Ground{Range: &linkage.Range{}}
		}
		return &linkage.Ground{At: pointOf(v)}
	}
	if v.has("centre") {
		return r.arcPivot(v)
	}
	return r.linePivot(v)
}

func (r *reader) linePivot(v *value) *linkage.Ground {
	from, to := v.get("from"), v.get("to")
	if !from.ok() || !to.ok() {
		return &linkage.Ground{Range: &linkage.Range{}}
	}
	a, b := pointOf(from), pointOf(to)
	run := a.Dist(b)
	if run == 0 {
		r.fail(to.at, "give two different places, or ground: [x, y] for a fixed pivot", "from and to are the same place")
		return &linkage.Ground{At: a, Range: &linkage.Range{From: a, To: b}}
	}
	at := a.Lerp(b, 0.5)
	if set := v.get("at"); set.ok() {
		at = pointOf(set)
		along, off := at.Sub(a).Dot(b.Sub(a).Unit()), math.Abs(aside(a, b, at))
		switch {
		case off > onLine:
			r.fail(set.at, "give a place between from and to, or leave at out for the middle", "at lies %s mm off the line", figure(off))
		case along < -onLine || along > run+onLine:
			r.fail(set.at, "give a place between from and to, or leave at out for the middle", "at lies %s mm beyond the end of the line", figure(math.Max(-along, along-run)))
		}
	}
	return &linkage.Ground{At: at, Range: &linkage.Range{From: a, To: b}}
}

// onLine is how far a place may lie off its line and still be meant on it, mm: the rounding of
// coordinates written with three places.
const onLine = 0.002

func (r *reader) arcPivot(v *value) *linkage.Ground {
	from, to, radius, centre := v.get("from"), v.get("to"), v.get("radius"), v.get("centre")
	if !from.ok() || !to.ok() || !radius.ok() || !centre.ok() {
		return &linkage.Ground{Range: &linkage.Range{}}
	}
	if to.number <= from.number || to.number-from.number > fullTurn {
		r.fail(to.at, "the arc runs counter-clockwise, at most one turn: to is greater than from", "the arc goes from %s to %s deg", degrees(from.number), degrees(to.number))
	}
	set := (from.number + to.number) / 2
	if at := v.get("at"); at.ok() {
		set = at.number
		if set < from.number-1e-9 || set > to.number+1e-9 {
			r.fail(at.at, "give an angle between from and to, or leave at out for the middle", "at: %s deg is not on the arc from %s to %s deg", degrees(set), degrees(from.number), degrees(to.number))
		}
	}
	c := pointOf(centre)
	return &linkage.Ground{
		At:    c.Add(outline.Polar(radius.number, set)),
		Range: &linkage.Range{Centre: c, Radius: radius.number, Start: from.number, End: to.number},
	}
}
