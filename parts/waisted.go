package parts

import (
	"math"

	"pinwright/parts/job"
	"pinwright/parts/outline"
)

// waisted draws a bar in between its ends: each side is one arc that touches both end circles and
// comes to half the waist from the axis at its deepest; with a fillet smaller than that arc, two arcs
// of the fillet's radius and a neck of the waist's width between them.
//
// The arc of radius p has its centre at (x, p + w/2); touching the circles of radii a and b at a
// distance L apart means x^2 = (a - w/2)(2p + a + w/2) and (L-x)^2 = (b - w/2)(2p + b + w/2). The sum of
// the two roots grows with p: bisection until it is L.
func (k *maker) waisted(l job.Link, discs []outline.Disc) (outline.Outline, bool) {
	a, b := discs[0].Radius, discs[1].Radius
	half, length := l.Waist/2, discs[1].Centre.Dist(discs[0].Centre)
	path := "linkage.links." + l.Name + ".waist"
	if half >= min(a, b) {
		k.fail(path, "make the waist less than "+millimetres(2*min(a, b))+" mm, or take shape: bar",
			"link %s: a waist of %s mm is no narrower than its ends, %s mm and %s mm", l.Name, millimetres(l.Waist), millimetres(2*a), millimetres(2*b))
		return nil, false
	}
	reach := func(p float64) float64 {
		return math.Sqrt((a-half)*(2*p+a+half)) + math.Sqrt((b-half)*(2*p+b+half))
	}
	if reach(0) >= length {
		k.fail(path, "take shape: bar, or lengthen the link to more than "+upTo(reach(0))+" mm",
			"link %s: its ends of %s mm and %s mm meet before the bar is drawn in to %s mm", l.Name, millimetres(2*a), millimetres(2*b), millimetres(l.Waist))
		return nil, false
	}
	low, high := 0.0, 1.0
	for reach(high) < length {
		high *= 2
	}
	for range 200 {
		if middle := (low + high) / 2; reach(middle) < length {
			low = middle
		} else {
			high = middle
		}
	}
	p, neck := low, 0.0
	if l.Fillet > 0 && l.Fillet < p {
		p, neck = l.Fillet, length-reach(l.Fillet)
	}
	// Upper side from right to left; the lower one is its mirror image.
	x := math.Sqrt((a - half) * (2*p + a + half))
	left, right := outline.Point{X: x, Y: p + half}, outline.Point{X: x + neck, Y: p + half}
	touchA := left.Scale(a / (a + p))
	end := outline.Point{X: length}
	touchB := end.Add(right.Sub(end).Scale(b / (b + p)))
	flip := func(q outline.Point) outline.Point { return outline.Point{X: q.X, Y: -q.Y} }
	deep := func(c outline.Point) outline.Point { return outline.Point{X: c.X, Y: half} }
	o := outline.Outline{
		{Point: flip(touchA), Bulge: arc(flip(left), flip(touchA), flip(deep(left)), false)},
		{Point: flip(deep(left))},
		{Point: flip(deep(right)), Bulge: arc(flip(right), flip(deep(right)), flip(touchB), false)},
		{Point: flip(touchB), Bulge: arc(end, flip(touchB), touchB, true)},
		{Point: touchB, Bulge: arc(right, touchB, deep(right), false)},
		{Point: deep(right)},
		{Point: deep(left), Bulge: arc(left, deep(left), touchA, false)},
		{Point: touchA, Bulge: arc(outline.Point{}, touchA, flip(touchA), true)},
	}
	return o.Clean(), true
}

// arc is the bulge of the arc about centre from one point to the other.
func arc(centre, from, to outline.Point, counterClockwise bool) float64 {
	u, v := from.Sub(centre), to.Sub(centre)
	sweep := math.Atan2(u.Cross(v), u.Dot(v))
	if counterClockwise && sweep < 0 {
		sweep += 2 * math.Pi
	}
	if !counterClockwise && sweep > 0 {
		sweep -= 2 * math.Pi
	}
	return math.Tan(sweep / 4)
}
