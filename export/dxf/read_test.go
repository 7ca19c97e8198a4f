package dxf_test

import (
	"bytes"
	"errors"
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"pinwright/export"
	"pinwright/export/dxf"
	"pinwright/parts/outline"
)

func read(t testing.TB, data []byte) dxf.Drawing {
	t.Helper()
	d, err := dxf.Read(bytes.NewReader(data))
	if err != nil {
		t.Fatal(err)
	}
	return d
}

func TestReadWhatWasWritten(t *testing.T) {
	d := read(t, write(t, link(), dxf.Options{SheetEdge: true}))
	if d.Version != "AC1015" || d.Units != dxf.Millimetre || !d.Metric || len(d.Others) > 0 {
		t.Errorf("%+v", d)
	}
	if d.Limits.Max != (outline.Point{X: 120, Y: 60}) || d.Extents.Max != (outline.Point{X: 120, Y: 60}) {
		t.Errorf("limits %v, extents %v", d.Limits, d.Extents)
	}
	var names []string
	for _, l := range d.Layers {
		names = append(names, l.Name)
		if l.Off {
			t.Errorf("layer %s is off", l.Name)
		}
	}
	if got := strings.Join(names, " "); got != "0 ENGRAVE CUT-INSIDE CUT-OUTSIDE SHEET-EDGE" {
		t.Errorf("layers %s", got)
	}
	var kinds []string
	for _, e := range d.Entities {
		kinds = append(kinds, e.Layer+" "+e.Type)
	}
	want := "SHEET-EDGE LWPOLYLINE, ENGRAVE LINE, ENGRAVE LWPOLYLINE, CUT-INSIDE CIRCLE, CUT-INSIDE CIRCLE, CUT-OUTSIDE LWPOLYLINE"
	if got := strings.Join(kinds, ", "); got != want {
		t.Errorf("entities %s", got)
	}
}

// Whatever numbers a sheet has, they come back bit for bit, in the order of the work.
func TestRoundTripIsExact(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		number := rapid.Float64Range(-1e4, 1e4)
		vertex := rapid.Custom(func(t *rapid.T) outline.Vertex {
			bulge := rapid.OneOf(rapid.Just(0.0), rapid.Float64Range(-20, 20), rapid.SampledFrom([]float64{1, -1, 1e-300, math.Tan(math.Pi / 8)})).Draw(t, "bulge")
			return at(number.Draw(t, "x"), number.Draw(t, "y"), bulge)
		})
		s := export.Sheet{Name: "random", Width: 600, Height: 400}
		for range rapid.IntRange(0, 8).Draw(t, "steps") {
			vertices := rapid.SliceOfN(vertex, 2, 9).Draw(t, "vertices")
			switch op := export.Operation(rapid.IntRange(0, 2).Draw(t, "operation")); {
			case op == export.Engrave:
				vertices[len(vertices)-1].Bulge = 0 // has no meaning and is not written
				s.Steps = append(s.Steps, export.Step{Op: op, Open: vertices})
			default:
				s.Steps = append(s.Steps, export.Step{Op: op, Closed: vertices})
			}
		}
		var buf bytes.Buffer
		if err := dxf.Write(&buf, s, dxf.Options{}); err != nil {
			t.Fatal(err)
		}
		d, err := dxf.Read(&buf)
		if err != nil {
			t.Fatal(err)
		}
		if len(d.Entities) != len(s.Steps) {
			t.Fatalf("%d entities of %d steps", len(d.Entities), len(s.Steps))
		}
		for i, step := range s.Steps {
			e := d.Entities[i]
			if e.Layer != dxf.LayerOf(step.Op) {
				t.Fatalf("step %d on layer %s", i, e.Layer)
			}
			if centre, radius, ok := step.Closed.AsCircle(); ok {
				if e.Circle == nil || *e.Circle != (outline.Disc{Centre: centre, Radius: radius}) {
					t.Fatalf("step %d: circle %v, want %v", i, e.Circle, centre)
				}
				continue
			}
			same(t, i, step.Closed, e.Closed)
			same(t, i, step.Open, e.Open)
		}
	})
}

func same(t *rapid.T, step int, want, got []outline.Vertex) {
	if len(want) != len(got) {
		t.Fatalf("step %d: %d vertices, want %d", step, len(got), len(want))
	}
	for j := range want {
		if want[j] != got[j] {
			t.Fatalf("step %d, vertex %d: %v, want %v", step, j, got[j], want[j])
		}
	}
}

// drawing is a small drawing as an editing program of the old school leaves it: R12, no handles.
func drawing(entities ...string) string {
	return "  0\nSECTION\n  2\nENTITIES\n" + tagged(entities...) + "  0\nENDSEC\n  0\nEOF\n"
}

// tagged turns "0 LINE", "8 CUT" into lines of code and value.
func tagged(pairs ...string) string {
	var b strings.Builder
	for _, p := range pairs {
		code, value, _ := strings.Cut(p, " ")
		b.WriteString(code + "\n" + value + "\n")
	}
	return b.String()
}

func TestReadEditedEntities(t *testing.T) {
	text := drawing(
		"0 LINE", "8 A", "10 1", "20 2", "30 0", "11 3", "21 4", "31 0.0",
		"0 ARC", "5 2F", "330 1F", "100 AcDbEntity", "8 A", "62 3", "100 AcDbCircle", "10 0", "20 0", "40 2", "100 AcDbArc", "50 350", "51 10",
		"0 ARC", "8 A", "10 0", "20 0", "40 1", "50 0", "51 270",
		"0 POLYLINE", "8 B", "66 1", "70 1", "10 0", "20 0", "30 0",
		"0 VERTEX", "8 B", "10 0", "20 0", "42 1",
		"0 VERTEX", "8 B", "10 5", "20 0", "0 SEQEND", "8 B",
		"0 CIRCLE", "8 B", "10 7", "20 8", "40 2.5", "102 {ACAD_REACTORS", "330 1", "102 }", "1001 SOMEONE", "1000 a remark",
		"999 a comment",
	)
	d := read(t, []byte(strings.ReplaceAll(text, "\n", "\r\n")))
	if len(d.Others) > 0 || len(d.Entities) != 5 {
		t.Fatalf("%+v", d)
	}
	if d.Units != dxf.Unitless || d.Version != "" {
		t.Errorf("a drawing without header has units %v, version %q", d.Units, d.Version)
	}
	arc := d.Entities[1]
	// An arc of 20 degrees about the origin from -10 degrees: its ends, and the bulge tan 5 degrees.
	if len(arc.Open) != 2 || arc.Colour != 3 ||
		math.Abs(arc.Open[0].X-2*math.Cos(math.Pi/18)) > 1e-14 || math.Abs(arc.Open[0].Y+2*math.Sin(math.Pi/18)) > 1e-14 ||
		math.Abs(arc.Open[0].Bulge-math.Tan(math.Pi/36)) > 1e-14 {
		t.Errorf("arc %+v", arc)
	}
	if wide := d.Entities[2].Open; len(wide) != 3 || math.Abs(wide[2].Y+1) > 1e-14 {
		t.Errorf("an arc of 270 degrees: %v", wide)
	}
	if p := d.Entities[3]; p.Closed == nil || p.Closed[0].Bulge != 1 || p.Closed[1].X != 5 || p.Layer != "B" {
		t.Errorf("polyline %+v", p)
	}
	if c := d.Entities[4].Circle; c == nil || *c != (outline.Disc{Centre: outline.Point{X: 7, Y: 8}, Radius: 2.5}) {
		t.Errorf("circle %+v", d.Entities[4])
	}
}

func TestReadReportsWhatItDoesNotRead(t *testing.T) {
	line := func(more ...string) []string {
		return append([]string{"0 LINE", "8 L", "10 0", "20 0", "11 1", "21 0"}, more...)
	}
	for name, c := range map[string]struct {
		entities []string
		why      string
	}{
		"text":         {[]string{"0 TEXT", "8 L", "1 hello", "10 0", "20 0", "40 3"}, "not a line, arc, circle or polyline"},
		"spline":       {[]string{"0 SPLINE", "8 L", "70 8", "10 0", "20 0"}, "not a line, arc, circle or polyline"},
		"block":        {[]string{"0 INSERT", "8 L", "2 THING", "10 0", "20 0"}, "not a line, arc, circle or polyline"},
		"in space":     {line("30 1"), "leaves the plane of the sheet"},
		"thick":        {line("39 2"), "has a thickness"},
		"on its back":  {line("210 0", "220 0", "230 -1"), "lies on its back (extrusion)"},
		"on the paper": {line("67 1"), "on the paper, not in the model"},
		"invisible":    {line("60 1"), "invisible"},
		"wide":         {[]string{"0 LWPOLYLINE", "8 L", "90 2", "70 1", "43 0.5", "10 0", "20 0", "10 1", "20 0"}, "has a width"},
		"fitted curve": {[]string{"0 POLYLINE", "8 L", "66 1", "70 5", "0 VERTEX", "8 L", "10 0", "20 0", "0 SEQEND"}, "a fitted curve, a mesh or a polyline in space"},
	} {
		t.Run(name, func(t *testing.T) {
			d := read(t, []byte(drawing(c.entities...)))
			if len(d.Entities) > 0 || len(d.Others) != 1 || d.Others[0].Why != c.why || d.Others[0].Layer != "L" || d.Others[0].Line != 5 {
				t.Errorf("%+v", d)
			}
		})
	}
}

func TestReadRefuses(t *testing.T) {
	sound := string(write(t, link(), dxf.Options{}))
	for name, c := range map[string]struct{ text, want string }{
		"nothing":             {" \n", "line 1: the file is empty"},
		"garbage":             {"\x00\x01\x02 hello\nworld\n", `line 1: "\x00\x01\x02 hello" is not a group code`},
		"binary":              {"AutoCAD Binary DXF\r\n\x1a\x00", "line 1: this is a binary DXF; save it as ASCII DXF"},
		"another format":      {"<svg/>\n", `line 1: "<svg/>" is not a group code`},
		"cut short":           {sound[:len(sound)/2], "cut short"},
		"without EOF":         {strings.TrimSuffix(sound, "  0\nEOF\n"), "the file ends without EOF: it is cut short"},
		"more after EOF":      {sound + "  0\nLINE\n", "something follows EOF"},
		"no entities":         {"0\nEOF\n", "the drawing has no ENTITIES section"},
		"a section twice":     {strings.TrimSuffix(drawing(), "  0\nEOF\n") + drawing(), `section "ENTITIES" is there twice`},
		"unknown version":     {strings.Replace(sound, "AC1015", "AC1099", 1), `line 8: version "AC1099" is not known`},
		"unended section":     {"0\nSECTION\n2\nENTITIES\n0\nEOF\n", "line 6: the entities do not end before EOF"},
		"no layer":            {drawing("0 LINE", "10 0", "20 0", "11 1", "21 0"), "line 5: a LINE without a layer"},
		"no end":              {drawing("0 LINE", "8 A", "10 0", "20 0", "11 1"), "line 5: a LINE without group code 21"},
		"not a number":        {drawing("0 LINE", "8 A", "10 zero"), `line 10: "zero" is not a number (group code 10)`},
		"NaN":                 {drawing("0 LINE", "8 A", "10 NaN"), `line 10: "NaN" is not a number (group code 10)`},
		"hexadecimal":         {drawing("0 LINE", "8 A", "10 0x1p3"), "is not a number"},
		"far away":            {drawing("0 LINE", "8 A", "10 1e9"), "line 10: 1e+09 is beyond 1e+06 (group code 10)"},
		"twice the same":      {drawing("0 LINE", "8 A", "10 1", "10 2"), "line 11: group code 10 twice in the LINE of line 5"},
		"foreign code":        {drawing("0 LINE", "8 A", "40 1"), "line 9: group code 40 does not belong in a LINE"},
		"no radius":           {drawing("0 CIRCLE", "8 A", "10 1", "20 0", "40 0"), "line 5: a circle of radius 0"},
		"negative radius":     {drawing("0 ARC", "8 A", "10 1", "20 0", "40 -1", "50 0", "51 9"), "line 5: an arc of radius -1"},
		"wrong count":         {drawing("0 LWPOLYLINE", "8 A", "90 3", "10 0", "20 0", "10 1", "20 0"), "line 5: the LWPOLYLINE says it has 3 vertices and has 2"},
		"one vertex":          {drawing("0 LWPOLYLINE", "8 A", "90 1", "10 0", "20 0"), "line 5: an LWPOLYLINE of 1 vertices"},
		"x without y":         {drawing("0 LWPOLYLINE", "8 A", "10 0", "10 1"), "line 11: a vertex without its y"},
		"last without y":      {drawing("0 LWPOLYLINE", "8 A", "10 0", "20 0", "10 1"), "line 5: the last vertex of the LWPOLYLINE has no y"},
		"y without x":         {drawing("0 LWPOLYLINE", "8 A", "20 0"), "line 9: a y without its x"},
		"bulge first":         {drawing("0 LWPOLYLINE", "8 A", "42 1"), "line 9: a bulge before the first vertex"},
		"vertex alone":        {drawing("0 VERTEX", "8 A"), "line 6: VERTEX outside a POLYLINE"},
		"polyline unfinished": {drawing("0 POLYLINE", "8 A", "0 VERTEX", "8 A", "10 0", "20 0"), "the POLYLINE of line 5 has no SEQEND"},
		"group unfinished":    {drawing("0 LINE", "8 A", "102 {X"), "the LINE of line 5 has an unfinished group"},
		"long line":           {strings.Repeat("9", 5000) + "\n", "line 1: a line of 5000 characters; 4096 are allowed"},
	} {
		t.Run(name, func(t *testing.T) {
			_, err := dxf.Read(strings.NewReader(c.text))
			var at *dxf.Error
			if !errors.As(err, &at) || at.Line < 1 || !strings.Contains(err.Error(), c.want) {
				t.Errorf("got %v, want %q", err, c.want)
			}
		})
	}
}

// What stands in the block of the model is drawn by other programs, so it must not be passed over.
func TestReadSeesIntoTheModelBlock(t *testing.T) {
	sound := string(write(t, link(), dxf.Options{}))
	hidden := strings.Replace(sound, "  0\nENDBLK\n", tagged("0 CIRCLE", "8 CUT-INSIDE", "10 1", "20 1", "40 1")+"  0\nENDBLK\n", 1)
	d := read(t, []byte(hidden))
	if len(d.Others) != 1 || d.Others[0].Why != "stands in a block" {
		t.Errorf("%+v", d.Others)
	}
}

func TestReadLayersSwitchedOff(t *testing.T) {
	sound := string(write(t, link(), dxf.Options{}))
	off := strings.Replace(sound, "CUT-INSIDE\n 70\n0\n 62\n34\n", "CUT-INSIDE\n 70\n0\n 62\n-34\n", 1)
	off = strings.Replace(off, "CUT-OUTSIDE\n 70\n0\n", "CUT-OUTSIDE\n 70\n1\n", 1)
	d := read(t, []byte(off))
	if !d.Layers[2].Off || d.Layers[2].Colour != 34 || !d.Layers[3].Off || d.Layers[1].Off {
		t.Errorf("%+v", d.Layers)
	}
}

func FuzzRead(f *testing.F) {
	f.Add(write(f, link(), dxf.Options{}))
	f.Add([]byte(drawing("0 ARC", "8 A", "10 0", "20 0", "40 2", "50 350", "51 10")))
	f.Add([]byte(drawing("0 POLYLINE", "8 B", "70 1", "0 VERTEX", "8 B", "10 0", "20 0", "42 1", "0 SEQEND")))
	f.Fuzz(func(t *testing.T, data []byte) {
		d, err := dxf.Read(bytes.NewReader(data))
		if err != nil {
			var at *dxf.Error
			if !errors.As(err, &at) || at.Line < 1 {
				t.Errorf("an error without its place: %v", err)
			}
			return
		}
		for _, e := range d.Entities {
			if (e.Closed == nil) == (e.Open == nil) || e.Layer == "" || e.Line < 1 {
				t.Errorf("%+v", e)
			}
			for _, v := range append(append([]outline.Vertex{}, e.Closed...), e.Open...) {
				if math.IsNaN(v.X+v.Y+v.Bulge) || math.IsInf(v.X+v.Y+v.Bulge, 0) {
					t.Errorf("%+v", e)
				}
			}
		}
	})
}

func BenchmarkReadSheetOf500Parts(b *testing.B) {
	s := link()
	for range 499 {
		s.Steps = append(s.Steps, link().Steps...)
	}
	data := write(b, s, dxf.Options{})
	b.SetBytes(int64(len(data)))
	b.ReportAllocs()
	for b.Loop() {
		if _, err := dxf.Read(bytes.NewReader(data)); err != nil {
			b.Fatal(err)
		}
	}
}
