package outline

import (
	"errors"
	"fmt"
	"math"
)

// Fault is what is wrong with an outline or region, and where.
type Fault struct {
	Kind FaultKind
	At   Point  // where, as far as it has a place
	Text string // the whole finding, for the eye
}

// FaultKind is a kind of fault.
type FaultKind int

// The kinds of fault.
const (
	FaultNumber    FaultKind = iota // a coordinate or bulge that is no number or too large
	FaultTooFew                     // nothing enclosed
	FaultNoLength                   // a segment shorter than the tolerance
	FaultCrossing                   // segments cross
	FaultAlong                      // segments run along each other within the tolerance
	FaultTouching                   // segments touch without crossing: a web or gap of no width
	FaultDirection                  // runs the wrong way round
	FaultPlace                      // a hole outside its outer outline or within another hole
)

// Error returns the finding.
func (f *Fault) Error() string { return f.Text }

func fault(kind FaultKind, at Point, format string, args ...any) *Fault {
	return &Fault{Kind: kind, At: at, Text: fmt.Sprintf(format, args...)}
}

// Touching says whether an error of Validate is only about places where outlines touch: the exact result
// of an operation can have such places, but a part must not.
func Touching(err error) bool {
	var f *Fault
	return errors.As(err, &f) && f.Kind == FaultTouching
}

// Validate returns a *Fault naming the first thing that is wrong with the outline, or nil: numbers, segments
// without length, nothing enclosed, segments that cross or touch. Crossings are reported before touches.
// Either direction is right.
func (o Outline) Validate() error {
	if f := o.numbers(); f != nil {
		return f
	}
	if f := contacts([]Outline{o}); f != nil {
		return f
	}
	return nil
}

// numbers checks everything that can be seen segment by segment.
func (o Outline) numbers() *Fault {
	for i, v := range o {
		if !v.finite() || !(math.Abs(v.Bulge) <= largestBulge) {
			return fault(FaultNumber, Point{}, "vertex %d (%g, %g, bulge %g) is not a usable number: coordinates up to %g mm, bulges up to %g",
				i, v.X, v.Y, v.Bulge, float64(largestCoordinate), float64(largestBulge))
		}
	}
	if len(o) < 2 {
		return fault(FaultTooFew, Point{}, "an outline of %d vertices encloses nothing", len(o))
	}
	tol := toleranceFor(o.Bounds())
	for i := range o {
		if c := o.curve(i); c.a.Dist(c.b) <= tol {
			return fault(FaultNoLength, c.a, "segment %d at %v has no length", i, c.a)
		}
	}
	if math.Abs(o.Area()) <= tol*o.Length() {
		return fault(FaultTooFew, o[0].Point, "the outline at %v encloses nothing", o[0].Point)
	}
	return nil
}

// Validate returns a *Fault naming the first thing that is wrong with the region, or nil: what
// Outline.Validate finds, an outer outline that runs clockwise, a hole that runs counter-clockwise, holes
// that meet each other or the outer outline, a hole outside the outer outline or within another one.
func (r Region) Validate() error {
	all := r.Outlines()
	name := func(i int) string {
		if i == 0 {
			return "outer outline"
		}
		return fmt.Sprintf("hole %d", i)
	}
	if len(r.Outer) == 0 {
		return fault(FaultTooFew, Point{}, "the region has no outer outline")
	}
	for i, o := range all {
		if f := o.numbers(); f != nil {
			f.Text = name(i) + ": " + f.Text
			return f
		}
		if (o.Area() > 0) != (i == 0) {
			turn := "clockwise; an outer outline runs counter-clockwise"
			if i > 0 {
				turn = "counter-clockwise; a hole runs clockwise"
			}
			return fault(FaultDirection, o[0].Point, "%s at %v runs %s", name(i), o[0].Point, turn)
		}
	}
	touch := contacts(all)
	if touch != nil && touch.Kind != FaultTouching {
		return touch
	}
	for i, h := range r.Holes {
		if !holeIn(h, r.Outer) {
			return fault(FaultPlace, h[0].Point, "hole %d at %v lies outside the outer outline", i+1, h[0].Point)
		}
		for j, k := range r.Holes {
			if i != j && k.Bounds().ContainsBox(h.Bounds()) && holeIn(h, k) {
				return fault(FaultPlace, h[0].Point, "hole %d at %v lies within hole %d", i+1, h[0].Point, j+1)
			}
		}
	}
	if touch != nil {
		return touch
	}
	return nil
}

// contacts returns the first crossing between segments of the outlines, else the first touch, else nil.
func contacts(os []Outline) *Fault {
	type place struct{ outline, segment int }
	var cs []curve
	var at []place
	var boxes []Box
	box := EmptyBox()
	for i, o := range os {
		for k := range o {
			c := o.curve(k)
			cs = append(cs, c)
			at = append(at, place{i, k})
			boxes = append(boxes, c.box())
			box = box.Union(c.box())
		}
	}
	tol := toleranceFor(box)
	name := func(i int32) string {
		p := at[i]
		switch {
		case len(os) == 1:
			return fmt.Sprintf("segment %d", p.segment)
		case p.outline == 0:
			return fmt.Sprintf("segment %d of the outer outline", p.segment)
		}
		return fmt.Sprintf("segment %d of hole %d", p.segment, p.outline)
	}
	var crossing, touching *Fault
	var first [2]int32
	report := func(f **Fault, kind FaultKind, i, j int32, p Point, what string) {
		if *f != nil && (first[0] < i || first[0] == i && first[1] <= j) {
			return
		}
		first = [2]int32{i, j}
		*f = fault(kind, p, "%s and %s %s at (%.6g, %.6g)", name(i), name(j), what, p.X, p.Y)
	}
	// walk returns the point at the distance l along the outline from the place s on curve i, backwards if l
	// is negative.
	walk := func(i int32, s, l float64) Point {
		pl := at[i]
		n := len(os[pl.outline])
		base, k := int(i)-pl.segment, pl.segment
		for range n {
			c := &cs[base+k]
			switch s += l; {
			case s > c.len:
				l, s = s-c.len, 0
				k = (k + 1) % n
			case s < 0:
				k = (k + n - 1) % n
				l, s = s, cs[base+k].len
			default:
				return c.at(s)
			}
		}
		return cs[i].at(s)
	}
	// reach returns how far from the place s on curve i the nearest corner of its outline is, other than one
	// at the place itself.
	reach := func(i int32, s float64) float64 {
		pl := at[i]
		n := len(os[pl.outline])
		base := int(i) - pl.segment
		before, after := s, cs[i].len-s
		if before <= 8*tol {
			before = cs[base+(pl.segment+n-1)%n].len
		}
		if after <= 8*tol {
			after = cs[base+(pl.segment+1)%n].len
		}
		return min(before, after)
	}
	// cross says whether the outlines through p, on the curves i and j, cross there: whether they alternate
	// round p, seen from a little way off.
	cross := func(i, j int32, p Point) bool {
		si, sj := cs[i].param(p), cs[j].param(p)
		// Small against what is near, but large against the tolerance.
		step := max(16*tol, min(reach(i, si), reach(j, sj))/4)
		back := walk(i, si, -step).Sub(p)
		turn := func(v Point) float64 {
			a := math.Atan2(back.Cross(v), back.Dot(v))
			if a < 0 {
				a += 2 * math.Pi
			}
			return a
		}
		on := turn(walk(i, si, step).Sub(p))
		x, y := turn(walk(j, sj, -step).Sub(p)), turn(walk(j, sj, step).Sub(p))
		same := 4 * tol / step // directions that close are one within the tolerance: a touch
		if math.Abs(x-on) < same || math.Abs(y-on) < same || min(x, 2*math.Pi-x) < same || min(y, 2*math.Pi-y) < same {
			return false
		}
		return (x < on) != (y < on)
	}
	sweepPairs(boxes, tol, func(i, j int32) {
		c, d := &cs[i], &cs[j]
		same := at[i].outline == at[j].outline
		n := len(os[at[i].outline])
		joined := same && (at[i].segment+1)%n == at[j].segment
		other := same && (at[j].segment+1)%n == at[i].segment
		if joined != other && (joined && turnsLittle(c, d) || other && turnsLittle(d, c)) {
			return
		}
		pts := commonPoints(c, d, tol)
		var rest []Point
		for _, p := range pts {
			if joined && p.Dist(c.b) <= 4*tol || other && p.Dist(c.a) <= 4*tol {
				continue
			}
			rest = append(rest, p)
		}
		// Two common points with nothing but the tolerance between: the curves run along each other.
		for k := 1; k < len(pts); k++ {
			s0, s1 := c.param(pts[k-1]), c.param(pts[k])
			m := c.at((s0 + s1) / 2)
			if _, ok := d.on(m, tol); ok && s1-s0 > longestTouch {
				report(&crossing, FaultAlong, i, j, m, "run along each other")
				return
			}
		}
		for _, p := range rest {
			if cross(i, j, p) {
				report(&crossing, FaultCrossing, i, j, p, "cross")
				return
			}
			if crossing == nil {
				report(&touching, FaultTouching, i, j, p, "touch")
			}
		}
	})
	if crossing != nil {
		return crossing
	}
	return touching
}
