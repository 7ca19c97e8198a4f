package parts

import (
	"math"

	"pinwright/parts/job"
	"pinwright/parts/outline"
)

// passing is the way that a bent bar leaves between itself and the obstacles it goes round, mm.
const passing = 1

// bent is a bar of even width along a curved middle line: one arc through both pins and the point
// that lies Bend to the left of the middle between them; or, round obstacles, the tightest string from
// pin to pin that leaves all of them on one side, the shorter way.
func (k *maker) bent(l job.Link, discs []outline.Disc) (outline.Outline, bool) {
	path := "linkage.links." + l.Name
	half := l.Width / 2
	if half == 0 {
		half = min(discs[0].Radius, discs[1].Radius)
	}
	var line outline.Path
	inner := math.Inf(1) // tightest radius of the bar's inside
	if len(l.Around) > 0 {
		var ok bool
		if line, ok = k.string(l, discs, half); !ok {
			return nil, false
		}
		for _, o := range l.Around {
			inner = min(inner, o.Radius+passing)
		}
	} else {
		a, b := discs[0].Centre, discs[1].Centre
		line = outline.Path{{Point: a, Bulge: -2 * l.Bend / b.Dist(a)}, {Point: b}}
		if tightest := line.Segments()[0].Radius(); tightest <= half {
			k.fail(path+".bend", "bend it less, or make it narrower than "+millimetres(2*tightest)+" mm",
				"link %s: a bend of %s mm gives a middle line of radius %s mm, too tight for a bar %s mm wide",
				l.Name, millimetres(l.Bend), millimetres(tightest), millimetres(2*half))
			return nil, false
		}
		inner = line.Segments()[0].Radius() - half
	}
	rs := outline.Stroke(line, half)
	plain := true
	for _, d := range discs {
		if d.Radius != half {
			plain = false
			rs = append(rs, outline.Region{Outer: outline.Circle(d.Centre, d.Radius)})
		}
	}
	if !plain {
		rs = outline.RoundInside(outline.Union(rs...), fillet(l, min(half, inner)))
	}
	if len(rs) != 1 || len(rs[0].Holes) > 0 {
		k.fail(path, "bend it less, or make it narrower", "link %s: the bent bar, %s mm wide, runs into itself", l.Name, millimetres(2*half))
		return nil, false
	}
	for i, o := range l.Around {
		gap := outline.Between(rs[0], outline.Region{Outer: outline.Circle(o.Centre, o.Radius)})
		if gap.Distance < passing-1e-6 {
			k.fail(path+".around", "move or shrink the obstacle, or make the ends of the bar narrower",
				"link %s: the bar comes to %s mm from obstacle %d at %s; it wants %s mm", l.Name, millimetres(gap.Distance), i+1, place(o.Centre), millimetres(passing))
			return nil, false
		}
	}
	return rs[0].Outer, true
}

// string finds the middle line round the obstacles.
//
//  1. The obstacles grown by the passing way and half the bar; none may cover a pin.
//  2. On either side: the hull of the pins and of the grown obstacles that the line runs into, until it
//     runs into none; the part of the hull on that side is the line.
//  3. The shorter of the two.
func (k *maker) string(l job.Link, discs []outline.Disc, half float64) (outline.Path, bool) {
	path := "linkage.links." + l.Name + ".around"
	a, b := discs[0].Centre, discs[1].Centre
	var grown []outline.Disc
	for i, o := range l.Around {
		g := outline.Disc{Centre: o.Centre, Radius: o.Radius + passing + half}
		for _, d := range discs {
			if short := o.Radius + passing + max(half, d.Radius) - d.Centre.Dist(o.Centre); short > 1e-9 {
				k.fail(path, "move the obstacle away from the pin, or take it out", "link %s: obstacle %d at %s lies in the end of the bar at %s, by %s mm",
					l.Name, i+1, place(o.Centre), place(d.Centre), millimetres(short))
				return nil, false
			}
		}
		grown = append(grown, g)
	}
	var best outline.Path
	for _, left := range []bool{true, false} {
		if p := taut(a, b, grown, left); p != nil && (best == nil || p.Length() < best.Length()-1e-9) {
			best = p
		}
	}
	if best == nil {
		k.fail(path, "move the obstacles, or make the bar narrower", "link %s: a bar %s mm wide finds no way round the obstacles", l.Name, millimetres(2*half))
		return nil, false
	}
	return best, true
}

// taut is the shortest line from a to b that leaves the discs on its right (left is true: it passes
// them on their left, going from a to b) or on its left; nil if a pin is walled in.
func taut(a, b outline.Point, discs []outline.Disc, left bool) outline.Path {
	taken := make([]bool, len(discs))
	for {
		hull := []outline.Disc{{Centre: a}, {Centre: b}}
		for i, d := range discs {
			if taken[i] {
				hull = append(hull, d)
			}
		}
		line := outline.Path{{Point: a}, {Point: b}}
		if len(hull) > 2 {
			if line = side(outline.Hull(hull...), a, b, left); line == nil {
				return nil
			}
		}
		more := false
		for i, d := range discs {
			if !taken[i] && line.Nearest(d.Centre).Distance < d.Radius-1e-9 {
				taken[i], more = true, true
			}
		}
		if !more {
			return line
		}
	}
}

// side cuts a convex outline at two of its corners: from b round to a counter-clockwise is the left
// side, turned about so that it runs from a to b; from a round to b is the right one. Nil if one of the
// points is no corner of it.
func side(hull outline.Outline, a, b outline.Point, left bool) outline.Path {
	from, to := a, b
	if left {
		from, to = b, a
	}
	start := -1
	for i, v := range hull {
		if v.Dist(from) < 1e-9 {
			start = i
		}
	}
	if start < 0 {
		return nil
	}
	var line outline.Path
	for i := range hull {
		v := hull[(start+i)%len(hull)]
		line = append(line, v)
		if i > 0 && v.Dist(to) < 1e-9 {
			line[0].Point, line[i].Point = from, to
			line[i].Bulge = 0
			if left {
				return line.Reverse()
			}
			return line
		}
	}
	return nil
}
