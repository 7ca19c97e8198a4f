package proof

import (
	"bytes"
	"errors"
	"math"
	"strconv"

	"pinwright/export"
	"pinwright/export/dxf"
	"pinwright/parts/outline"
)

// cut is one closed path of the beam.
type cut struct {
	inside bool
	path   outline.Outline // counter-clockwise
	circle *outline.Disc
	box    outline.Box
	area   float64
	turn   int   // place in the order of work
	line   int   // in the file
	within []int // the cuts it lies in, smallest first
	part   int   // the found part it belongs to, -1: none
}

// stroke is one engraved path.
type stroke struct {
	path outline.Path
	box  outline.Box
	turn int
	line int
}

// scene is one drawing taken apart.
type scene struct {
	task
	cuts    []cut
	strokes []stroke
	parts   []piece
	marks   []marking // of the parts
}

// drawing checks one drawing and returns how many parts and holes it found.
func (l *ledger) drawing(t task, data []byte) (parts, holes int) {
	l.count(drawings, 1)
	d, err := dxf.Read(bytes.NewReader(data))
	if err != nil {
		f := Finding{File: t.file, What: err.Error(), Do: "write the files anew"}
		var at *dxf.Error
		if errors.As(err, &at) {
			f.Line, f.What = at.Line, at.What
		}
		l.fail(drawings, f)
		l.fail(partCount, Finding{
			File: t.file, What: "cannot be looked at", Expected: plural(len(t.expected), "part"), Do: "write the files anew",
		})
		return 0, 0
	}
	l.header(t, d)
	s := &scene{task: t}
	l.contours(s, d)
	l.doubled(s)
	s.nest()
	l.order(s)
	l.finish(s)
	l.engraving(s)
	l.match(s)
	l.gaps(s)
	l.margin(s)
	for _, p := range s.parts {
		holes += len(p.holes)
	}
	return len(s.parts), holes
}

// header checks the units, and that everything drawn is on a layer that says what to do.
func (l *ledger) header(t task, d dxf.Drawing) {
	if d.Units != dxf.Millimetre {
		l.fail(drawings, Finding{
			File: t.file, What: "the unit of the drawing is wrong", Expected: "millimetres ($INSUNITS 4)",
			Found: d.Units.String(), Do: "it would be cut at another size: write the files anew",
		})
	}
	for _, layer := range d.Layers {
		if _, work := dxf.OperationOf(layer.Name); work && layer.Off {
			l.fail(drawings, Finding{
				File: t.file, Line: layer.Line, What: "layer " + layer.Name + " is switched off",
				Do: "switch it on, or its paths are not cut",
			})
		}
	}
	unknown := map[string]int{}
	var names []string
	line := map[string]int{}
	for _, e := range d.Entities {
		if _, work := dxf.OperationOf(e.Layer); work || e.Layer == dxf.LayerEdge {
			continue
		}
		if unknown[e.Layer]++; unknown[e.Layer] == 1 {
			names = append(names, e.Layer)
			line[e.Layer] = e.Line
		}
	}
	for _, name := range names {
		l.fail(drawings, Finding{
			File: t.file, Line: line[name], What: "layer " + strconv.Quote(name) + " says nothing to the beam",
			Expected: dxf.LayerEngrave + ", " + dxf.LayerInside + " or " + dxf.LayerOutside,
			Found:    plural(unknown[name], "entity on it"), Do: "put it on the layer it belongs to, or take it away",
		})
	}
	for _, o := range d.Others {
		l.fail(drawings, Finding{
			File: t.file, Line: o.Line, What: o.Type + " on layer " + strconv.Quote(o.Layer) + ": " + o.Why,
			Do: "take it away, or draw it with lines, arcs, circles or polylines",
		})
	}
}

// contours takes the cuts and strokes from the drawing.
func (l *ledger) contours(s *scene, d dxf.Drawing) {
	for i, e := range d.Entities {
		op, work := dxf.OperationOf(e.Layer)
		if !work {
			continue
		}
		if op == export.Engrave {
			path := e.Open
			if e.Closed != nil {
				path = append(outline.Path(e.Closed), e.Closed[0])
			}
			s.strokes = append(s.strokes, stroke{path: path, box: path.Bounds(), turn: i, line: e.Line})
			continue
		}
		l.count(contours, 1)
		if e.Closed == nil {
			gap := e.Open[0].Dist(e.Open[len(e.Open)-1].Point)
			l.fail(contours, Finding{
				File: s.file, Line: e.Line, What: "an open " + e.Type + " on layer " + e.Layer + " " + around(e.Open.Bounds()),
				Found: "ends " + millimetres(gap) + " apart", Do: "make each cut one closed polyline or circle",
			})
			continue
		}
		c := cut{inside: op == export.CutInside, path: e.Closed, circle: e.Circle, turn: i, line: e.Line, part: -1}
		if c.circle == nil {
			c.circle = circle(e.Closed)
		}
		c.box = c.path.Bounds()
		c.area = c.path.Area()
		if c.area < 0 {
			c.path, c.area = c.path.Reverse(), -c.area
		}
		if why := unsound(c.path); why != "" {
			l.fail(contours, Finding{
				File: s.file, Line: e.Line, What: "a cut " + around(c.box) + " that " + why,
				Do: "draw it as one plain loop, or take it away",
			})
			continue
		}
		s.cuts = append(s.cuts, c)
	}
}

// doubled finds cuts that are made twice and drops the second, so that it is reported once and not as
// a hole too many, a web too small and an order upset besides.
func (l *ledger) doubled(s *scene) {
	l.count(doubled, len(s.cuts))
	var kept []cut
	seen := map[[2]int64][]int{} // by lower left corner, on a grid
	for _, c := range s.cuts {
		cell := [2]int64{int64(math.Floor(c.box.Min.X)), int64(math.Floor(c.box.Min.Y))}
		twin := -1
		for dx := int64(-1); dx <= 1; dx++ {
			for dy := int64(-1); dy <= 1; dy++ {
				for _, j := range seen[[2]int64{cell[0] + dx, cell[1] + dy}] {
					if alike(c, kept[j]) {
						twin = j
					}
				}
			}
		}
		if twin >= 0 {
			l.fail(doubled, Finding{
				File: s.file, Line: c.line, What: "the cut of line " + strconv.Itoa(kept[twin].line) + " " + around(c.box) + " is made twice",
				Do: "take one of the two away",
			})
			continue
		}
		seen[cell] = append(seen[cell], len(kept))
		kept = append(kept, c)
	}
	s.cuts = kept
}

// alike says whether two cuts run along the same contour.
func alike(a, b cut) bool {
	near := func(x, y float64) bool { return math.Abs(x-y) <= limit }
	if !near(a.box.Min.X, b.box.Min.X) || !near(a.box.Min.Y, b.box.Min.Y) ||
		!near(a.box.Max.X, b.box.Max.X) || !near(a.box.Max.Y, b.box.Max.Y) {
		return false
	}
	return math.Abs(a.area-b.area) <= limit*a.path.Length()
}

// circle is the disc that a contour goes round, nil when it is not a circle.
func circle(o outline.Outline) *outline.Disc {
	centre, radius, ok := o.AsCircle()
	if !ok {
		return nil
	}
	return &outline.Disc{Centre: centre, Radius: radius}
}

// around says where a box lies, for an eye on the drawing.
func around(b outline.Box) string {
	return near(b.Centre())
}

func near(p outline.Point) string { return "near " + spot(p) }

// spot is a place on the sheet to the tenth of a millimetre.
func spot(p outline.Point) string {
	return "(" + strconv.FormatFloat(p.X, 'f', 1, 64) + ", " + strconv.FormatFloat(p.Y, 'f', 1, 64) + ")"
}
