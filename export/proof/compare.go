package proof

import (
	"fmt"
	"math"

	"pinwright/export/manifest"
	"pinwright/parts/outline"
)

// compare measures a piece against the part it should be.
func (l *ledger) compare(s *scene, part manifest.Part, index int) {
	p := &s.parts[index]
	line := s.cuts[p.outside].line
	f := lay(part, p, motionOf(part.Place))
	if f.out > 0 {
		other := part.Place
		other.Flip = !other.Flip
		if g := lay(part, p, motionOf(other)); g.out == 0 {
			l.fail(shapes, Finding{
				File: s.file, Line: line, Part: part.Name, What: "lies with the wrong side up",
				Do: "turn it over: its mark would be on the wrong face",
			})
			f = g
		}
	}

	l.openings(s, part, p, f, line)
	l.lengths(s, part, p, f, line)
	l.edge(s, part, "", line, part.Outside, p.measure, p.edge, f)
	l.feet(s, part, p, f, line)
	for i, h := range part.Holes {
		if f.pairs[i] < 0 {
			continue
		}
		o := p.holes[f.pairs[i]]
		at := s.cuts[o.inside].line
		if h.Diameter > 0 {
			l.diameter(s, part, h, o, at)
			l.middle(s, part, h.Name, at, f.motion.Apply(outline.Point(h.Centre)), o.centre())
			continue
		}
		l.edge(s, part, h.Name, at, h.Measure, o.measure, o.edge, f)
	}
}

// openings compares the number of holes and names those without a partner.
func (l *ledger) openings(s *scene, part manifest.Part, p *piece, f fit, line int) {
	used := map[int]bool{}
	for i, h := range part.Holes {
		if f.pairs[i] >= 0 {
			used[f.pairs[i]] = true
			continue
		}
		l.fail(holeCount, Finding{
			File: s.file, Line: line, Part: part.Name, Hole: h.Name, What: "is missing",
			Expected: spot(f.motion.Apply(outline.Point(h.Centre))), Do: "write the files anew",
		})
	}
	for i, o := range p.holes {
		if !used[i] {
			c := s.cuts[o.inside]
			l.fail(holeCount, Finding{
				File: s.file, Line: c.line, Part: part.Name, What: "a hole too many " + around(c.box), Do: "take it away",
			})
		}
	}
}

// lengths compares the distances between joints with those of the linkage.
func (l *ledger) lengths(s *scene, part manifest.Part, p *piece, f fit, line int) {
	for _, length := range part.Lengths {
		a, okA := p.joint(part, length.A, f)
		b, okB := p.joint(part, length.B, f)
		l.count(distances, 1)
		if !okA || !okB {
			l.fail(distances, Finding{
				File: s.file, Line: line, Part: part.Name,
				What:     fmt.Sprintf("the distance %s-%s cannot be measured: a hole or toe is not there", length.A, length.B),
				Expected: millimetres(length.MM), Do: "write the files anew",
			})
			continue
		}
		found := a.Dist(b)
		off := math.Abs(found - length.MM)
		l.error(distances, off, limit, part.Name+" "+length.A+"-"+length.B)
		if !(off <= limit) {
			l.fail(distances, Finding{
				File: s.file, Line: line, Part: part.Name,
				What:     fmt.Sprintf("%s-%s differs from the linkage by %s", length.A, length.B, millimetres(off)),
				Expected: millimetres(length.MM), Found: millimetres(found),
				Do: "the linkage would run another way: write the files anew",
			})
		}
	}
}

// joint finds the place of a joint on a piece: the centre of its hole, or of its toe's arc.
func (p *piece) joint(part manifest.Part, name string, f fit) (outline.Point, bool) {
	if i, ok := part.HoleAt(name); ok {
		if f.pairs[i] < 0 {
			return outline.Point{}, false
		}
		o := p.holes[f.pairs[i]]
		if o.circle != nil {
			return o.circle.Centre, true
		}
		h := part.Holes[i]
		// A round bore with a flat has its centre in its arc, and not where its area has its middle.
		if outline.Point(h.Centre).Dist(outline.Point(h.Measure.Middle)) > limit {
			at, _, ok := arcCentre(o.edge, f.motion.Apply(outline.Point(h.Centre)), arcReach)
			return at, ok
		}
		return o.centre(), true
	}
	if i, ok := part.FootAt(name); ok {
		at, _, ok := arcCentre(p.edge, f.motion.Apply(outline.Point(part.Feet[i].Centre)), arcReach)
		return at, ok
	}
	return outline.Point{}, false
}

// feet compares the radius of every toe.
func (l *ledger) feet(s *scene, part manifest.Part, p *piece, f fit, line int) {
	for _, foot := range part.Feet {
		l.count(shapes, 1)
		at := f.motion.Apply(outline.Point(foot.Centre))
		_, radius, ok := arcCentre(p.edge, at, arcReach)
		if ok && math.Abs(radius-foot.Radius) <= limit {
			continue
		}
		found := "no arc about its place"
		if ok {
			found = millimetres(radius)
		}
		l.fail(shapes, Finding{
			File: s.file, Line: line, Part: part.Name, What: "the toe at " + foot.Joint + " is not as it should be " + near(at),
			Expected: "a radius of " + millimetres(foot.Radius), Found: found, Do: "write the files anew",
		})
	}
}

// arcReach is how far from its place the centre of an arc is looked for, mm: farther than any error
// worth a figure, nearer than the next arc of a part.
const arcReach = 0.5

// diameter compares a round hole with its fit.
func (l *ledger) diameter(s *scene, part manifest.Part, h manifest.Hole, o opening, line int) {
	l.count(diameters, 1)
	if o.circle == nil {
		l.fail(diameters, Finding{
			File: s.file, Line: line, Part: part.Name, Hole: h.Name, What: "is not round",
			Expected: "a circle of " + millimetres(h.Diameter), Do: "write the files anew",
		})
		return
	}
	found := 2 * o.circle.Radius
	off := math.Abs(found - h.Diameter)
	l.error(diameters, off, limit, part.Name+" "+h.Name)
	if !(off <= limit) {
		what := "is too small by " + millimetres(off)
		if found > h.Diameter {
			what = "is too large by " + millimetres(off)
		}
		l.fail(diameters, Finding{
			File: s.file, Line: line, Part: part.Name, Hole: h.Name, What: what,
			Expected: "finished " + millimetres(h.Diameter), Found: millimetres(found),
			Do: "its pin would not fit as asked: write the files anew",
		})
	}
}

// edge compares a contour's area, perimeter and middle, and which way it is turned; hole is "" for the
// outside.
func (l *ledger) edge(s *scene, part manifest.Part, hole string, line int, want, have manifest.Measure, o outline.Outline, f fit) {
	l.count(shapes, 1)
	off := edgeError(want, have)
	name := part.Name + " " + hole
	if hole == "" {
		name = part.Name + " outside"
	}
	l.error(shapes, off, edgeLimit, name)
	if !(off <= edgeLimit) {
		what := "the outside has another shape"
		if hole != "" {
			what = "has another shape"
		}
		l.fail(shapes, Finding{
			File: s.file, Line: line, Part: part.Name, Hole: hole, What: what,
			Expected: fmt.Sprintf("%.4f mm2, %.4f mm round", want.Area, want.Perimeter),
			Found:    fmt.Sprintf("%.4f mm2, %.4f mm round", have.Area, have.Perimeter),
			Do:       "write the files anew",
		})
		return
	}
	middle := f.motion.Apply(outline.Point(want.Middle))
	l.middle(s, part, hole, line, middle, outline.Point(have.Middle))
	if off := boxError(want, o, f); off > limit && middle.Dist(outline.Point(have.Middle)) <= limit {
		what := "the outside is turned against the holes"
		if hole != "" {
			what = "is turned in its part"
		}
		l.fail(shapes, Finding{
			File: s.file, Line: line, Part: part.Name, Hole: hole, What: what,
			Expected: "a box of " + size(want.High.X-want.Low.X, want.High.Y-want.Low.Y),
			Found:    "sides that differ by up to " + millimetres(off), Do: "write the files anew",
		})
	}
}

func size(width, height float64) string { return fmt.Sprintf("%.4f x %.4f mm", width, height) }

// middle compares where a contour is in its part.
func (l *ledger) middle(s *scene, part manifest.Part, hole string, line int, want, have outline.Point) {
	off := want.Dist(have)
	if off <= limit {
		return
	}
	what := "the outside is moved against the holes by "
	if hole != "" {
		what = "is moved in its part by "
	}
	l.fail(shapes, Finding{
		File: s.file, Line: line, Part: part.Name, Hole: hole, What: what + millimetres(off),
		Expected: fmt.Sprintf("(%.4f, %.4f)", want.X, want.Y), Found: fmt.Sprintf("(%.4f, %.4f)", have.X, have.Y),
		Do: "write the files anew",
	})
}
