package proof_test

import (
	"bytes"
	"crypto/sha256"
	"encoding/hex"
	"encoding/json"
	"math"
	"os"
	"path/filepath"
	"strings"
	"testing"
	"testing/fstest"

	"pgregory.net/rapid"

	"pinwright/export"
	"pinwright/export/dxf"
	"pinwright/export/manifest"
	"pinwright/export/proof"
	"pinwright/parts/outline"
)

func TestSoundSheetPasses(t *testing.T) {
	r := check(t, demo().write(t, false, nil))
	if !r.OK {
		t.Fatal(printed(t, r))
	}
	if r.Parts != 7 || r.Holes != 3*2+2*3+1+3 || r.Drawings != 1 {
		t.Errorf("%d parts, %d holes, %d drawings", r.Parts, r.Holes, r.Drawings)
	}
	for _, c := range r.Checks {
		if c.Compared == 0 {
			t.Errorf("%s compared nothing", c.Name)
		}
		if (c.Name == "centre distances" || c.Name == "hole diameters") && (c.Figure == nil || c.Figure.Value > 1e-9) {
			t.Errorf("%s: %+v", c.Name, c.Figure)
		}
	}
}

// The distances of the demo sheet by hand: parts 20 mm apart with ends of radius 7 and paths 0.1 mm
// outside leave 5.8 mm, less 0.2 mm of beam; the left end lies 20 - 7.1 mm from the edge.
func TestFiguresAreTheRealOnes(t *testing.T) {
	r := newRun(100, 60,
		placed{bar("a", 40), outline.Place(0, false, pt(20, 20))},
		placed{bar("b", 40), outline.Place(0, false, pt(20, 40))})
	report := check(t, r.write(t, false, nil))
	if !report.OK {
		t.Fatal(printed(t, report))
	}
	for name, want := range map[string]float64{
		"web":       20 - 14 - 2*kerfWidth,
		"walls":     7 - 2.25,
		"margin":    20 - 7 - kerfWidth,
		"engraving": 8 - 2.15, // the mark's left end is at x = 8, y from -1 to 1, the hole's path at 2.15
	} {
		for _, c := range report.Checks {
			if c.Name == name && (c.Figure == nil || math.Abs(c.Figure.Value-want) > 1e-9) {
				t.Errorf("%s: %+v, want %g", name, c.Figure, want)
			}
		}
	}
}

// A web and a margin kept to the last bit are kept; a micrometre and a bit less are not.
func TestLimitsAreExact(t *testing.T) {
	for _, c := range []struct {
		less float64
		ok   bool
	}{{0, true}, {-1e-9, true}, {2e-6, false}} {
		low := marginMM + 7 + kerfWidth - c.less
		next := low + 14 + 2*kerfWidth + webWidth
		for name, r := range map[string]run{
			"web":    newRun(100, 60, placed{bar("a", 40), outline.Place(0, false, pt(20, low+c.less))}, placed{bar("b", 40), outline.Place(0, false, pt(20, next))}),
			"margin": newRun(100, 60, placed{bar("a", 40), outline.Place(0, false, pt(20, low))}),
		} {
			if report := check(t, r.write(t, false, nil)); report.OK != c.ok {
				t.Errorf("%s less by %g:\n%s", name, c.less, printed(t, report))
			}
		}
	}
}

// A bore with a flat has its centre in its arc, and a toe in its arc too.
func TestLengthToABoreWithAFlatAndToAToe(t *testing.T) {
	m := model{
		name: "crank", outside: rounded(9, pt(0, 0), pt(50, 0)),
		lengths: []manifest.Length{{A: "O", B: "A", MM: 30}, {A: "O", B: "P", MM: 50}, {A: "A", B: "P", MM: 20}},
		feet:    []manifest.Foot{{Joint: "P", Centre: manifest.Point{X: 50}, Radius: 9}},
	}.flatted("O", 3, 2.5).bore("A", pt(30, 0), 4.5)
	at := outline.Place(0.7, true, pt(80, 80))
	report := check(t, newRun(120, 120, placed{m, at}).write(t, false, nil))
	if !report.OK || report.Checks[6].Compared != 3 {
		t.Error(printed(t, report))
	}
	m.lengths[0].MM, m.lengths[2].MM, m.feet[0].Radius = 30.01, 20.01, 9.01
	text := printed(t, check(t, newRun(120, 120, placed{m, at}).write(t, false, nil)))
	for _, want := range []string{
		"crank: O-A differs from the linkage by 0.0100 mm (expected 30.0100 mm, found 30.0000 mm)",
		"crank: A-P differs from the linkage by 0.0100 mm",
		"crank: the toe at P is not as it should be near (41.8, 47.8) (expected a radius of 9.0100 mm, found 9.0000 mm)",
	} {
		if !strings.Contains(text, want) {
			t.Errorf("no %q in\n%s", want, text)
		}
	}
}

// Corners that the beam cannot enter are round in the finished part, and nothing else differs: by closed
// form for an L (one concave right angle) with a hexagon for a nut in it.
func TestCornersThatTheBeamCannotEnter(t *testing.T) {
	const h = kerfWidth / 2
	ell := outline.Polygon(pt(0, 0), pt(40, 0), pt(40, 15), pt(15, 15), pt(15, 50), pt(0, 50))
	var corners []outline.Point
	for i := range 6 {
		corners = append(corners, pt(7, 7).Add(outline.Polar(4, float64(i)*math.Pi/3)))
	}
	beam := func(o outline.Outline, by float64) outline.Outline {
		edges := outline.OffsetOutline(o, by)
		if len(edges) != 1 {
			t.Fatalf("%d contours", len(edges))
		}
		return edges[0]
	}
	outside := shape{cut: beam(ell, h)}
	outside.left = beam(outside.cut, -h)
	nut := shape{cut: beam(outline.Polygon(corners...), -h)}
	nut.left = beam(nut.cut, h)

	side := 4.0
	for _, c := range []struct {
		name            string
		left            outline.Outline
		area, perimeter float64
	}{
		{"L", outside.left, 40*15 + 15*35 + (1-math.Pi/4)*h*h, 180 - (2-math.Pi/2)*h},
		{"hexagon", nut.left, 1.5*math.Sqrt(3)*side*side - 6*(math.Tan(math.Pi/6)-math.Pi/6)*h*h, 6*side - 12*(math.Tan(math.Pi/6)-math.Pi/6)*h},
	} {
		m := manifest.MeasureOutline(c.left)
		if math.Abs(m.Area-c.area) > 1e-9 || math.Abs(m.Perimeter-c.perimeter) > 1e-9 {
			t.Errorf("%s: %+v, want area %g, perimeter %g", c.name, m, c.area, c.perimeter)
		}
	}

	m := model{name: "ell", outside: outside}
	m.holes = []manifest.Hole{{Name: "nut", Kind: "shaft", Joint: "O", Centre: manifest.Point{X: 7, Y: 7}}}
	m.shapes = []shape{nut}
	m = m.bore("A", pt(7, 42), 4.5)
	m.lengths = []manifest.Length{{A: "O", B: "A", MM: 35}}
	for _, at := range []outline.Transform{shift(20, 20), outline.Place(2.2, false, pt(70, 60)), outline.Place(-0.4, true, pt(60, 40))} {
		if report := check(t, newRun(140, 140, placed{m, at}).write(t, false, nil)); !report.OK {
			t.Error(printed(t, report))
		}
	}
}

// When the shop compensates, the drawing has the finished sizes.
func TestByShop(t *testing.T) {
	r := demo()
	r.manifest.Stock[0].ByShop = true
	if report := check(t, r.write(t, false, nil)); report.OK {
		t.Error("paths with compensation pass as finished sizes")
	}
	r = newRun(100, 60)
	r.manifest.Stock[0].ByShop = true
	r.manifest.Sheets[0].Parts = 1
	m := bar("a", 40)
	r.add(placed{m, shift(20, 20)})
	for i := range r.sheet.Steps {
		switch s := &r.sheet.Steps[i]; s.Op {
		case export.CutInside:
			centre, _, _ := s.Closed.AsCircle()
			s.Closed = outline.CircleHole(centre, 2.25)
		case export.CutOutside:
			s.Closed = m.outside.path(0).Transform(shift(20, 20))
		}
	}
	if report := check(t, r.write(t, false, nil)); !report.OK {
		t.Error(printed(t, report))
	}
}

// A part drawn alone is held to the same lengths, without a sheet round it.
func TestPartDrawnAlone(t *testing.T) {
	alone := func(length float64) fstest.MapFS {
		r := demo()
		folder := r.write(t, false, nil)
		m := bar("rocker", length)
		single := newRun(100, 20, placed{m, shift(7.1, 7.1)})
		var buf bytes.Buffer
		if err := dxf.Write(&buf, single.sheet, dxf.Options{}); err != nil {
			t.Fatal(err)
		}
		folder["parts/rocker.dxf"] = &fstest.MapFile{Data: buf.Bytes()}
		sum := sha256.Sum256(buf.Bytes())
		back, err := manifest.Decode(bytes.NewReader(folder[manifest.Name].Data))
		if err != nil {
			t.Fatal(err)
		}
		back.Parts[2].Drawing = "parts/rocker.dxf"
		back.Files = append(back.Files, manifest.File{Name: "parts/rocker.dxf", Size: int64(buf.Len()), SHA256: hex.EncodeToString(sum[:])})
		var text bytes.Buffer
		if err := manifest.Encode(&text, back); err != nil {
			t.Fatal(err)
		}
		folder[manifest.Name].Data = text.Bytes()
		return folder
	}
	if r := check(t, alone(80)); !r.OK || r.Drawings != 1 || r.Singles != 1 || r.Parts != 7 {
		t.Error(printed(t, r))
	}
	if text := printed(t, check(t, alone(80.01))); !strings.Contains(text, "parts/rocker.dxf:") || !strings.Contains(text, "rocker: A-B differs from the linkage by 0.0100 mm") {
		t.Error(text)
	}
}

func TestWithoutManifest(t *testing.T) {
	_, err := proof.Check(fstest.MapFS{})
	if err == nil || err.Error() != "proof: there is no manifest.json here: give the folder that the files were written to" {
		t.Errorf("got %v", err)
	}
	_, err = proof.Check(fstest.MapFS{manifest.Name: {Data: []byte("{")}})
	if err == nil || !strings.Contains(err.Error(), "proof: manifest: line 1, column 2: the file is cut short") {
		t.Errorf("got %v", err)
	}
	if _, err = proof.CheckDir(filepath.Join(t.TempDir(), "nowhere")); err == nil {
		t.Error("a folder that is not there passes")
	}
}

func TestCheckDir(t *testing.T) {
	dir := t.TempDir()
	for name, f := range demo().write(t, false, nil) {
		if err := os.WriteFile(filepath.Join(dir, name), f.Data, 0o600); err != nil {
			t.Fatal(err)
		}
	}
	r, err := proof.CheckDir(dir)
	if err != nil || !r.OK {
		t.Errorf("%v\n%s", err, printed(t, r))
	}
	if _, err := proof.CheckDir(filepath.Join(dir, manifest.Name)); err == nil || !strings.Contains(err.Error(), "is not a folder") {
		t.Errorf("got %v", err)
	}
}

func TestReportAsJSON(t *testing.T) {
	r := demo()
	r.sheet.Steps[crankA] = ring(20, 20, 2.152)
	report := check(t, r.write(t, false, nil))
	data, err := json.Marshal(report)
	if err != nil {
		t.Fatal(err)
	}
	var back proof.Report
	if err := json.Unmarshal(data, &back); err != nil {
		t.Fatal(err)
	}
	f := back.Checks[7].Findings[0]
	if back.OK || f.Part != "left.crank" || f.Hole != "A" || f.Expected != "finished 4.5000 mm" || f.Line == 0 {
		t.Errorf("%s", data)
	}
	if strings.Contains(string(data), "null") {
		t.Errorf("null in %s", data)
	}
}

func TestSameFolderSameReport(t *testing.T) {
	r := demo()
	moved(&r.sheet.Steps[crankB], shift(0.3, 0.2))
	folder := r.write(t, false, nil)
	if a, b := printed(t, check(t, folder)), printed(t, check(t, folder)); a != b {
		t.Errorf("two reports:\n%s\n%s", a, b)
	}
}

// Random parts, anyhow turned and turned over, pass; with one of them spoilt, they do not.
func TestRandomSheets(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		var parts []placed
		n := rapid.IntRange(1, 6).Draw(t, "parts")
		for i := range n {
			name := string(rune('a' + i))
			var m model
			if rapid.Bool().Draw(t, "ternary") {
				bc := rapid.Float64Range(30, 60).Draw(t, "bc")
				bd := rapid.Float64Range(30, 60).Draw(t, "bd")
				cd := rapid.Float64Range(math.Abs(bc-bd)+20, bc+bd-12).Draw(t, "cd")
				m = ternary(name, rapid.Bool().Draw(t, "mirror"), bc, bd, cd)
				m.marks = nil
			} else {
				m = bar(name, rapid.Float64Range(25, 60).Draw(t, "length"))
			}
			angle := rapid.Float64Range(-math.Pi, math.Pi).Draw(t, "angle")
			at := outline.Place(angle, rapid.Bool().Draw(t, "flip"), pt(float64(100+180*(i%3)), float64(100+180*(i/3))))
			parts = append(parts, placed{m, at})
		}
		r := newRun(600, 400, parts...)
		if report := check(t, r.write(t, false, nil)); !report.OK {
			t.Fatal(printed(t, report))
		}
		step := rapid.IntRange(0, len(r.sheet.Steps)-1).Draw(t, "step")
		s := &r.sheet.Steps[step]
		angle := rapid.Float64Range(-math.Pi, math.Pi).Draw(t, "direction")
		switch by := outline.Polar(0.01, angle); {
		case s.Op == export.Engrave:
			s.Open = append(outline.Path{{Point: s.Open[0].Add(pt(0.02, 0))}}, s.Open...)
		case s.Op == export.CutInside:
			centre, radius, _ := s.Closed.AsCircle()
			if rapid.Bool().Draw(t, "move") {
				s.Closed = outline.CircleHole(centre.Add(by.Scale(5)), radius)
			} else {
				s.Closed = outline.CircleHole(centre, radius+0.001)
			}
		default:
			i := rapid.IntRange(0, len(s.Closed)-1).Draw(t, "corner")
			s.Closed[i].Point = s.Closed[i].Add(by)
		}
		if report := check(t, r.write(t, false, nil)); report.OK {
			t.Fatalf("step %d was spoilt, and it passes:\n%s", step, printed(t, report))
		}
	})
}

// Whatever is done to a drawing's text, the proof comes to an end, and it does not pass a drawing whose
// contours are not those that were written.
func FuzzProof(f *testing.F) {
	base := newRun(100, 60, placed{bar("crank", 30), shift(20, 20)})
	text := string(base.write(f, false, nil)["clear3-1.dxf"].Data)
	meant, err := dxf.Read(strings.NewReader(text))
	if err != nil {
		f.Fatal(err)
	}
	body := strings.Index(text, "ENTITIES")
	f.Add(body+40, 0, "")
	f.Add(body+400, 3, "7")
	f.Add(body, 200, "\n  0\nLINE\n")
	f.Fuzz(func(t *testing.T, at, drop int, insert string) {
		at = max(0, min(at, len(text)))
		drop = max(0, min(drop, len(text)-at))
		edited := text[:at] + insert + text[at+drop:]
		report := check(t, base.write(t, true, func(string) string { return edited }))
		if !report.OK {
			return
		}
		got, err := dxf.Read(strings.NewReader(edited))
		if err != nil {
			t.Fatalf("passes, and cannot be read: %v", err)
		}
		var cuts int
		for _, e := range got.Entities {
			if op, work := dxf.OperationOf(e.Layer); work && op != export.Engrave {
				cuts++
				if !known(meant, e) {
					t.Fatalf("passes with %+v", e)
				}
			}
		}
		if cuts != 3 {
			t.Fatalf("passes with %d cuts", cuts)
		}
	})
}

// known says whether a drawing has a cut on the same layer whose bounds are those of e, to the
// tolerance of the proof.
func known(d dxf.Drawing, e dxf.Entity) bool {
	const near = 0.003
	a := e.Closed.Bounds()
	for _, k := range d.Entities {
		b := k.Closed.Bounds()
		if k.Layer == e.Layer && a.Min.Dist(b.Min) < near && a.Max.Dist(b.Max) < near {
			return true
		}
	}
	return false
}
