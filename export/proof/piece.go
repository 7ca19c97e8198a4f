package proof

import (
	"math"
	"strconv"

	"pinwright/export/dxf"
	"pinwright/export/manifest"
	"pinwright/parts/outline"
)

// piece is a part that falls out of the sheet.
type piece struct {
	outside int // index of its cut
	edge    outline.Outline
	measure manifest.Measure // of the edge
	holes   []opening
}

// opening is a hole of a piece, finished.
type opening struct {
	inside  int // index of its cut
	edge    outline.Outline
	circle  *outline.Disc // nil: not round
	measure manifest.Measure
}

// centre is where the opening is: the middle of a circle, else of its area.
func (o opening) centre() outline.Point {
	if o.circle != nil {
		return o.circle.Centre
	}
	return outline.Point(o.measure.Middle)
}

// finish runs the beam along the cuts and gathers the parts that fall out, in the order of the work.
func (l *ledger) finish(s *scene) {
	half := s.stock.Beam() / 2
	for i := range s.cuts {
		c := &s.cuts[i]
		if c.inside {
			continue
		}
		if len(c.within) > 0 && !s.cuts[c.within[0]].inside {
			l.fail(partCount, Finding{
				File: s.file, Line: c.line,
				What: "a part " + around(c.box) + " lies on the part of line " + plain(s.cuts[c.within[0]].line),
				Do:   "one of the two would be cut in pieces: move it to free material",
			})
			continue
		}
		edge, ok := moved(c, -half)
		if !ok {
			l.fail(partCount, Finding{
				File: s.file, Line: c.line, What: "an outside cut " + around(c.box) + " of which the beam leaves no single part",
				Found: "a beam " + millimetres(2*half) + " wide", Do: "take it away, or widen it",
			})
			continue
		}
		c.part = len(s.parts)
		s.parts = append(s.parts, piece{outside: i, edge: edge, measure: manifest.MeasureOutline(edge)})
	}
	for i := range s.cuts {
		c := &s.cuts[i]
		if !c.inside {
			continue
		}
		if len(c.within) == 0 || s.cuts[c.within[0]].inside || s.cuts[c.within[0]].part < 0 {
			l.fail(holeCount, Finding{
				File: s.file, Line: c.line, What: "a hole " + around(c.box) + " that is in no part",
				Do: "take it away, or put it on layer " + dxf.LayerOutside + " if it is a part",
			})
			continue
		}
		edge, ok := moved(c, half)
		if !ok {
			l.fail(holeCount, Finding{
				File: s.file, Line: c.line, What: "a hole " + around(c.box) + " that the beam does not leave in one piece",
				Do: "draw it as one plain contour",
			})
			continue
		}
		c.part = s.cuts[c.within[0]].part
		o := opening{inside: i, edge: edge, circle: circle(edge), measure: manifest.MeasureOutline(edge)}
		s.parts[c.part].holes = append(s.parts[c.part].holes, o)
	}
}

// moved is the edge that the beam leaves at distance by outside the path, negative: inside it. False
// when that is not one contour. Each contour is moved by itself, unlike in kerf.Finished, which wants a
// sound part: of an edited one, what is still sound is to be measured too.
func moved(c *cut, by float64) (outline.Outline, bool) {
	if by == 0 {
		return c.path, true
	}
	if c.circle != nil {
		radius := c.circle.Radius + by
		return outline.Circle(c.circle.Centre, radius), radius > 0
	}
	edges := outline.OffsetOutline(c.path, by)
	if len(edges) != 1 || !(edges[0].Area() > 0) {
		return nil, false
	}
	return edges[0], true
}

// arcCentre finds the arc of a contour whose centre is nearest to a place, and its radius. False when
// none is within reach.
func arcCentre(o outline.Outline, place outline.Point, reach float64) (centre outline.Point, radius float64, ok bool) {
	best := reach
	for _, arc := range o.Segments() {
		if math.Abs(arc.Sweep()) < 0.01 { // flatter than that, a centre is guesswork
			continue
		}
		if d := arc.Centre().Dist(place); d < best {
			best, centre, radius, ok = d, arc.Centre(), arc.Radius(), true
		}
	}
	return centre, radius, ok
}

func plain(n int) string { return strconv.Itoa(n) }
