package proof_test

import (
	"bytes"
	"crypto/sha256"
	"encoding/hex"
	"math"
	"strings"
	"testing/fstest"

	"pinwright/export"
	"pinwright/export/dxf"
	"pinwright/export/manifest"
	"pinwright/export/proof"
	"pinwright/parts/outline"
)

// The contours here are made by closed form and not by the geometry under proof: the rounded hull of
// convex corners, whose parallel at distance d is the hull with a radius larger by d.

// tester is what the helpers need of a test, a benchmark or a property.
type tester interface {
	Helper()
	Fatal(...any)
}

// hull is the contour round discs of one radius at the corners of a convex polygon (counter-clockwise),
// at two points (a bar) or one (a disc).
func hull(radius float64, corners ...outline.Point) outline.Outline {
	if len(corners) == 1 {
		c := corners[0]
		return outline.Outline{
			{Point: outline.Point{X: c.X - radius, Y: c.Y}, Bulge: 1}, {Point: outline.Point{X: c.X + radius, Y: c.Y}, Bulge: 1},
		}
	}
	var o outline.Outline
	n := len(corners)
	for i, c := range corners {
		before, after := c.Sub(corners[(i+n-1)%n]).Unit(), corners[(i+1)%n].Sub(c).Unit()
		turn := math.Atan2(before.Cross(after), before.Dot(after))
		if turn <= 0 {
			turn += 2 * math.Pi // the end of a bar: half a turn
		}
		o = append(o,
			outline.Vertex{Point: c.Sub(before.Left().Scale(radius)), Bulge: math.Tan(turn / 4)},
			outline.Vertex{Point: c.Sub(after.Left().Scale(radius))})
	}
	return o
}

// steiner is the area and perimeter of a hull by Steiner's formula: A + P r + pi r2 and P + 2 pi r.
func steiner(radius float64, corners ...outline.Point) (area, perimeter float64) {
	for i, c := range corners {
		next := corners[(i+1)%len(corners)]
		area += c.Cross(next) / 2
		perimeter += c.Dist(next)
	}
	return area + perimeter*radius + math.Pi*radius*radius, perimeter + 2*math.Pi*radius
}

// shape is a contour of a part by its corners and its finished radius, or by what the beam leaves and
// the path for it.
type shape struct {
	radius  float64
	corners []outline.Point

	left, cut outline.Outline
}

// rounded is the shape round corners.
func rounded(radius float64, corners ...outline.Point) shape {
	return shape{radius: radius, corners: corners}
}

func pt(x, y float64) outline.Point { return outline.Point{X: x, Y: y} }

func (h shape) path(by float64) outline.Outline {
	if h.cut != nil {
		return h.cut
	}
	return hull(h.radius+by, h.corners...)
}

func (h shape) measure() manifest.Measure {
	if h.left != nil {
		return manifest.MeasureOutline(h.left)
	}
	area, perimeter := steiner(h.radius, h.corners...)
	m := manifest.MeasureOutline(hull(h.radius, h.corners...))
	m.Area, m.Perimeter = area, perimeter
	return m
}

// model is a part for the tests.
type model struct {
	name    string
	outside shape
	holes   []manifest.Hole // Measure is filled in
	shapes  []shape         // of the holes
	marks   []outline.Path
	lengths []manifest.Length
	feet    []manifest.Foot
}

// bore adds a round hole at a joint.
func (m model) bore(joint string, at outline.Point, diameter float64) model {
	m.holes = append(m.holes[:len(m.holes):len(m.holes)], manifest.Hole{
		Name: joint, Kind: "pin", Joint: joint, Centre: manifest.Point(at), Diameter: diameter,
	})
	m.shapes = append(m.shapes[:len(m.shapes):len(m.shapes)], rounded(diameter/2, at))
	return m
}

// window adds a window.
func (m model) window(s shape) model {
	m.holes = append(m.holes[:len(m.holes):len(m.holes)], manifest.Hole{
		Name: "window 1", Kind: "window", Centre: s.measure().Middle,
	})
	m.shapes = append(m.shapes[:len(m.shapes):len(m.shapes)], s)
	return m
}

func bar(name string, length float64) model {
	m := model{
		name: name, outside: rounded(7, pt(0, 0), pt(length, 0)),
		marks:   []outline.Path{{{Point: pt(8, -1)}, {Point: pt(8, 1)}, {Point: pt(9, 1)}}, {{Point: pt(11, -1)}, {Point: pt(12, 0.5)}}},
		lengths: []manifest.Length{{A: "A", B: "B", MM: length}},
	}
	return m.bore("A", pt(0, 0), 4.5).bore("B", pt(length, 0), 4.5)
}

// ternary is a plate through B, C and D of the linkage's lengths, hand side up.
func ternary(name string, mirror bool, bc, bd, cd float64) model {
	x := (bc*bc + bd*bd - cd*cd) / (2 * bc)
	d := pt(x, math.Sqrt(bd*bd-x*x))
	corners := []outline.Point{pt(0, 0), pt(bc, 0), d}
	if mirror {
		d.Y = -d.Y
		corners = []outline.Point{pt(0, 0), d, pt(bc, 0)}
	}
	up := d.Y / math.Abs(d.Y)
	m := model{
		name: name, outside: rounded(9, corners...),
		marks:   []outline.Path{{{Point: pt(10, 2*up)}, {Point: pt(13, 2*up), Bulge: 0.5}, {Point: pt(15, 4*up)}}},
		lengths: []manifest.Length{{A: "B", B: "C", MM: bc}, {A: "B", B: "D", MM: bd}, {A: "C", B: "D", MM: cd}},
	}
	return m.bore("B", pt(0, 0), 4.5).bore("C", pt(bc, 0), 4.5).bore("D", d, 13)
}

// frame is a plate of the frame with a window large enough for a small part.
func frame() model {
	m := model{name: "frame", outside: rounded(8, pt(0, 0), pt(60, 0), pt(60, 50), pt(0, 50))}
	m.lengths = []manifest.Length{{A: "O", B: "P", MM: 60}}
	return m.bore("O", pt(0, 0), 6).bore("P", pt(60, 0), 6).window(rounded(3, pt(10, 10), pt(50, 10), pt(50, 40), pt(10, 40)))
}

// disc is a round part that fits into the frame's window.
func disc() model {
	return model{name: "disc", outside: rounded(8, pt(0, 0))}.bore("A", pt(0, 0), 4.5)
}

// flatted adds a round bore about the origin with a flat at x = flat, by closed form: the beam runs
// half a kerf inside, and leaves its own radius in the two corners.
func (m model) flatted(joint string, radius, flat float64) model {
	const h = kerfWidth / 2
	corner := pt(flat-h, math.Sqrt((radius-h)*(radius-h)-(flat-h)*(flat-h)))
	down := pt(corner.X, -corner.Y)
	angle := corner.Angle()
	far := math.Tan((2*math.Pi - 2*angle) / 4)
	bend := math.Tan(angle / 4)
	s := shape{
		cut: outline.Outline{{Point: corner, Bulge: far}, {Point: down}},
		left: outline.Outline{
			{Point: corner.Add(outline.Polar(h, angle)), Bulge: far},
			{Point: down.Add(outline.Polar(h, -angle)), Bulge: bend},
			{Point: down.Add(pt(h, 0))},
			{Point: corner.Add(pt(h, 0)), Bulge: bend},
		},
	}
	m.holes = append(m.holes[:len(m.holes):len(m.holes)], manifest.Hole{Name: joint, Kind: "shaft", Joint: joint})
	m.shapes = append(m.shapes[:len(m.shapes):len(m.shapes)], s)
	return m
}

const (
	kerfWidth = 0.2
	webWidth  = 3.0
	marginMM  = 5.0
)

// placed is a model and where it lies.
type placed struct {
	model
	at outline.Transform
}

// run is a folder of files that was just written, before and after somebody has been at it.
type run struct {
	manifest manifest.Manifest
	sheet    export.Sheet
}

// newRun lays parts on one sheet in the order given. Of each part: marks, holes, outside.
func newRun(width, height float64, parts ...placed) run {
	r := run{
		sheet: export.Sheet{Name: "clear3-1", Width: width, Height: height},
		manifest: manifest.Manifest{
			Format: manifest.Format, Program: "pinwright test", Job: manifest.Job{Name: "demo"},
			Stock: []manifest.Stock{{
				Name: "clear3", Material: "cast acrylic", Thickness: 3, Measured: 3,
				Margin: marginMM, Web: webWidth, Kerf: kerfWidth, MarkClear: 0.5,
			}},
			Sheets: []manifest.Sheet{{
				Name: "clear3-1", Drawing: "clear3-1.dxf", Stock: "clear3", Width: width, Height: height, Parts: len(parts),
			}},
		},
	}
	for _, p := range parts {
		r.add(p)
	}
	return r
}

func (r *run) add(p placed) {
	part := manifest.Part{
		Name: p.name, Link: p.name, Stock: "clear3", Sheet: "clear3-1", Place: manifest.PlacementOf(p.at),
		Outside: p.outside.measure(), Lengths: p.lengths, Feet: p.feet,
	}
	part.Area = part.Outside.Area
	for i, h := range p.holes {
		h.Measure = p.shapes[i].measure()
		part.Area -= h.Measure.Area
		part.Holes = append(part.Holes, h)
	}
	part.Mark = manifest.Mark{Text: strings.ToUpper(p.name), Strokes: len(p.marks)}
	for _, m := range p.marks {
		part.Mark.Length += m.Length()
		r.sheet.Steps = append(r.sheet.Steps, export.Step{Op: export.Engrave, Part: p.name, Open: m.Transform(p.at)})
	}
	for _, s := range p.shapes {
		r.sheet.Steps = append(r.sheet.Steps, export.Step{
			Op: export.CutInside, Part: p.name, Closed: s.path(-kerfWidth / 2).Transform(p.at).Reverse(),
		})
	}
	r.sheet.Steps = append(r.sheet.Steps, export.Step{
		Op: export.CutOutside, Part: p.name, Closed: p.outside.path(kerfWidth / 2).Transform(p.at),
	})
	r.manifest.Parts = append(r.manifest.Parts, part)
}

// write gives the folder with its manifest. edit, when not nil, changes the drawing's text after it
// was listed, unless fix is set: then the manifest is brought in line, so that the hash says nothing.
func (r run) write(t tester, fix bool, edit func(string) string) fstest.MapFS {
	t.Helper()
	var buf bytes.Buffer
	if err := dxf.Write(&buf, r.sheet, dxf.Options{}); err != nil {
		t.Fatal(err)
	}
	data := buf.Bytes()
	list := func(data []byte) {
		sum := sha256.Sum256(data)
		r.manifest.Files = []manifest.File{{Name: "clear3-1.dxf", Size: int64(len(data)), SHA256: hex.EncodeToString(sum[:])}}
	}
	list(data)
	if edit != nil {
		data = []byte(edit(string(data)))
		if fix {
			list(data)
		}
	}
	var text bytes.Buffer
	if err := manifest.Encode(&text, r.manifest); err != nil {
		t.Fatal(err)
	}
	return fstest.MapFS{
		"clear3-1.dxf": {Data: data},
		manifest.Name:  {Data: text.Bytes()},
	}
}

// demo is the sheet that most tests spoil: bars, a pair of mirrored plates, a frame plate with a disc
// in its window. The disc is worked before the window goes.
func demo() run {
	turn := func(degrees float64, flip bool, x, y float64) outline.Transform {
		return outline.Place(degrees*math.Pi/180, flip, pt(x, y))
	}
	return newRun(260, 150,
		placed{bar("left.crank", 30), turn(0, false, 20, 20)},
		placed{bar("right.crank", 30), turn(180, false, 50, 40)},
		placed{bar("rocker", 80), turn(37, false, 20, 62)},
		placed{ternary("left.plate", false, 41.5, 40.1, 55.8), turn(0, false, 150, 20)},
		placed{ternary("right.plate", true, 41.5, 40.1, 55.8), turn(0, false, 85, 65)},
		placed{disc(), turn(0, false, 195, 108)},
		placed{frame(), turn(0, false, 165, 85)},
	)
}

func check(t tester, fsys fstest.MapFS) proof.Report {
	t.Helper()
	r, err := proof.Check(fsys)
	if err != nil {
		t.Fatal(err)
	}
	return r
}

// printed is a report as people see it.
func printed(t tester, r proof.Report) string {
	t.Helper()
	var b strings.Builder
	if err := r.Write(&b); err != nil {
		t.Fatal(err)
	}
	return b.String()
}
