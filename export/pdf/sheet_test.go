package pdf_test

import (
	"bytes"
	"encoding/xml"
	"errors"
	"fmt"
	"math"
	"os"
	"path/filepath"
	"regexp"
	"runtime"
	"strconv"
	"strings"
	"testing"
	"time"

	"pgregory.net/rapid"

	"pinwright/export"
	"pinwright/export/internal/sample"
	"pinwright/export/pdf"
	"pinwright/parts/outline"
)

// units is PDF's: 72 to the inch of 25.4 mm.
const units = 72 / 25.4

func write(t interface{ Fatal(...any) }, sheets ...export.Sheet) []byte {
	var b bytes.Buffer
	if err := pdf.WriteSheets(&b, sheets, pdf.Options{}); err != nil {
		t.Fatal(err)
	}
	return b.Bytes()
}

func save(t testing.TB, data []byte) string {
	t.Helper()
	name := filepath.Join(t.TempDir(), "a.pdf")
	if err := os.WriteFile(name, data, 0o666); err != nil {
		t.Fatal(err)
	}
	return name
}

func ExampleWriteSheet() {
	var b bytes.Buffer
	err := pdf.WriteSheet(&b, export.Sheet{
		Name: "clear3-1", Width: 60, Height: 20,
		Steps: []export.Step{{Op: export.CutOutside, Part: "crank", Closed: sample.Bar(10, 12, 35, 12, 0)}},
	}, pdf.Options{})
	if err != nil {
		panic(err)
	}
	s := b.String()
	i := strings.Index(s, "/OC /cut-outside")
	fmt.Println(regexp.MustCompile(`/MediaBox \[[^]]*\]`).FindString(s))
	fmt.Println(strings.Join(strings.SplitN(s[i:], "\n", 7)[:6], "\n"))
	// Output:
	// /MediaBox [0 0 170.07874 56.692913]
	// /OC /cut-outside BDC
	// 0.0784 0.2118 0.4392 RG
	// 10 6 m
	// 45 6 l
	// 45.787931 6 46.568147 6.155195 47.296101 6.456723 c
	// 48.024054 6.758251 48.685489 7.200208 49.242641 7.757359 c
}

// compare holds what a file draws against the sheet: curves within limit mm, both ways.
func compare(t interface{ Fatalf(string, ...any) }, s export.Sheet, p page, limit float64) {
	if math.Abs(p.width-s.Width*units) > 1e-6 || math.Abs(p.height-s.Height*units) > 1e-6 {
		t.Fatalf("the page is %g x %g, want %g x %g", p.width, p.height, s.Width*units, s.Height*units)
	}
	if len(p.paths) != len(s.Steps) {
		t.Fatalf("%d paths for %d steps", len(p.paths), len(s.Steps))
	}
	for i, step := range s.Steps {
		drawn := p.paths[i]
		if want := "/OC/" + step.Op.String(); drawn.layer != want {
			t.Fatalf("step %d is on layer %s, want %s", i, drawn.layer, want)
		}
		segments := step.Closed.Segments()
		if step.Op == export.Engrave {
			segments = step.Open.Segments()
		}
		length := 0.0
		for _, c := range drawn.pieces {
			const n = 12
			last := c.at(0)
			for k := 1; k <= n; k++ {
				q := c.at(float64(k) / n)
				if away := nearest(segments, q.Scale(1/units)); !(away <= limit) {
					t.Fatalf("step %d: %.7f mm off the plan", i, away)
				}
				length += q.Dist(last) / units
				last = q
			}
		}
		planned := 0.0
		for _, g := range segments {
			planned += g.Length()
		}
		// Chords of a twelfth of 45 degrees are shorter than the arc by 1.8e-4 of it at most.
		if length < planned*(1-2e-4)-1e-4 || length > planned+1e-4*float64(1+len(segments)) {
			t.Fatalf("step %d: %.6f mm drawn, %.6f planned", i, length, planned)
		}
	}
}

func nearest(segments []outline.Segment, p outline.Point) float64 {
	d := math.Inf(1)
	for _, s := range segments {
		d = min(d, s.Nearest(p).Distance)
	}
	return d
}

// A hundredth of a micrometre for the cubics, and the last of six decimals.
const planned = 1.3e-5

func TestCurvesFromTheFile(t *testing.T) {
	check := func(t interface {
		Fatal(...any)
		Fatalf(string, ...any)
	}, sheets ...export.Sheet,
	) {
		pages, err := readPages(write(t, sheets...))
		if err != nil {
			t.Fatal(err)
		}
		if len(pages) != len(sheets) {
			t.Fatalf("%d pages for %d sheets", len(pages), len(sheets))
		}
		for i, s := range sheets {
			compare(t, s, pages[i], planned)
		}
	}
	check(t, sample.Sheet())
	rapid.Check(t, func(t *rapid.T) {
		check(t, rapid.SliceOfN(sample.AnySheet(), 1, 3).Draw(t, "sheets")...)
	})
}

// The same through another program's reader: qpdf finds no fault, and the curves of the file that it
// writes are within a thousandth of a millimetre.
func TestQPDF(t *testing.T) {
	one, two := sample.Sheet(), sample.Sheet()
	two.Width, two.Height = 812.8, 457.2
	name := save(t, write(t, one, two))
	if out := string(sample.Oracle(t, "qpdf", "--check", name)); !strings.Contains(out, "No syntax or stream encoding errors found") {
		t.Errorf("qpdf: %s", out)
	}
	out := name + ".qdf"
	sample.Oracle(t, "qpdf", "--qdf", "--object-streams=disable", "--no-original-object-ids", name, out)
	data, err := os.ReadFile(out)
	if err != nil {
		t.Fatal(err)
	}
	pages, err := readPages(data)
	if err != nil {
		t.Fatal(err)
	}
	if len(pages) != 2 {
		t.Fatalf("%d pages", len(pages))
	}
	compare(t, one, pages[0], 0.001)
	compare(t, two, pages[1], 0.001)
}

func TestPageSize(t *testing.T) {
	for _, size := range [][2]float64{{600, 400}, {1219.2, 609.6}, {25.4, 12.7}, {5080, 10}} {
		name := save(t, write(t, export.Sheet{Name: "a", Width: size[0], Height: size[1]}))
		out := string(sample.Oracle(t, "pdfinfo", name))
		m := regexp.MustCompile(`Page size:\s+(\S+) x (\S+) pts`).FindStringSubmatch(out)
		if m == nil {
			t.Fatal(out)
		}
		for k := range 2 {
			v, err := strconv.ParseFloat(m[k+1], 64)
			if err != nil || math.Abs(v/units-size[k]) > 0.001 { // pdfinfo prints three decimals of a unit
				t.Errorf("%s units, want %g mm", m[k+1], size[k])
			}
		}
		if strings.Contains(out, "CreationDate") || strings.Contains(out, "ModDate") {
			t.Errorf("a date: %s", out)
		}
	}
}

// Poppler draws the page as SVG; each path's extent is that of the outline to 0.05 mm.
func TestExtents(t *testing.T) {
	s := sample.Sheet()
	name := save(t, write(t, s))
	out := name + ".svg"
	sample.Oracle(t, "pdftocairo", "-svg", "-noshrink", "-nocenter", name, out)
	data, err := os.ReadFile(out)
	if err != nil {
		t.Fatal(err)
	}
	var boxes []outline.Box
	dec := xml.NewDecoder(bytes.NewReader(data))
	for {
		token, err := dec.Token()
		if err != nil {
			break
		}
		e, ok := token.(xml.StartElement)
		if !ok || e.Name.Local != "path" {
			continue
		}
		attr := map[string]string{}
		for _, a := range e.Attr {
			attr[a.Name.Local] = a.Value
		}
		if !strings.Contains(attr["style"], "stroke-width") {
			continue
		}
		matrix := [6]float64{1, 0, 0, 1, 0, 0}
		if m := attr["transform"]; m != "" {
			for i, f := range strings.FieldsFunc(strings.TrimSuffix(strings.TrimPrefix(m, "matrix("), ")"), func(r rune) bool { return r == ',' || r == ' ' }) {
				if matrix[i], err = strconv.ParseFloat(f, 64); err != nil {
					t.Fatal(m)
				}
			}
		}
		box := outline.EmptyBox()
		var v []float64
		var at outline.Point
		flush := func() {
			var q []outline.Point
			for i := 0; i+1 < len(v); i += 2 {
				x, y := v[i], v[i+1]
				q = append(q, outline.Point{X: (matrix[0]*x + matrix[2]*y + matrix[4]) / units, Y: s.Height - (matrix[1]*x+matrix[3]*y+matrix[5])/units})
			}
			switch len(q) {
			case 1:
				box = box.Union(outline.BoxOf(q[0]))
				at = q[0]
			case 3:
				for k := range 9 {
					box = box.Union(outline.BoxOf(cubic{at, q[0], q[1], q[2]}.at(float64(k) / 8)))
				}
				at = q[2]
			}
			v = nil
		}
		for _, f := range strings.Fields(attr["d"]) {
			if n, err := strconv.ParseFloat(f, 64); err == nil {
				v = append(v, n)
				continue
			}
			flush()
		}
		flush()
		boxes = append(boxes, box)
	}
	if len(boxes) != len(s.Steps) {
		t.Fatalf("%d paths for %d steps", len(boxes), len(s.Steps))
	}
	for i, step := range s.Steps {
		want := outline.EmptyBox()
		for _, g := range append(step.Closed.Segments(), step.Open.Segments()...) {
			want = want.Union(g.Bounds())
		}
		if d := max(boxes[i].Min.Dist(want.Min), boxes[i].Max.Dist(want.Max)); d > 0.05 {
			t.Errorf("step %d: %v, want %v", i, boxes[i], want)
		}
	}
}

func TestHairlines(t *testing.T) {
	pages, err := readPages(write(t, sample.Sheet()))
	if err != nil {
		t.Fatal(err)
	}
	for _, p := range pages[0].paths {
		if mm := p.width / units; mm < 0.01 || mm > 0.0254 || p.dash != "" {
			t.Fatalf("a line of %g mm, dashes %q", mm, p.dash)
		}
	}
	var b bytes.Buffer
	if err := pdf.WriteSheet(&b, sample.Sheet(), pdf.Options{Line: 0.1, Dashes: true}); err != nil {
		t.Fatal(err)
	}
	if pages, err = readPages(b.Bytes()); err != nil {
		t.Fatal(err)
	}
	styles := map[string]bool{}
	for _, p := range pages[0].paths {
		styles[p.layer+" "+p.dash+" "+p.colour] = true
		if math.Abs(p.width/units-0.1) > 1e-9 {
			t.Fatalf("a line of %g mm", p.width/units)
		}
	}
	if len(styles) != 3 {
		t.Errorf("styles %v", styles)
	}
}

// What a reader is told: no scaling when printed, and a layer for every operation (ISO 32000-1, 12.2 and 8.11).
func TestCatalogue(t *testing.T) {
	data := string(write(t, sample.Sheet()))
	if !strings.Contains(data, "/PrintScaling /None") {
		t.Error("a print dialogue may scale the sheet")
	}
	layers := regexp.MustCompile(`(\d+) 0 obj\n<< /Type /OCG /Name <FEFF([0-9A-F]+)> >>`).FindAllStringSubmatch(data, -1)
	if len(layers) != 3 {
		t.Fatalf("layers %v", layers)
	}
	for i, op := range export.Operations() {
		name := ""
		for _, r := range op.String() {
			name += fmt.Sprintf("%04X", r)
		}
		if layers[i][2] != name || !strings.Contains(data, fmt.Sprintf("/%v %s 0 R", op, layers[i][1])) {
			t.Errorf("layer %v is %v", op, layers[i])
		}
	}
}

func TestErrors(t *testing.T) {
	for want, s := range map[string][]export.Sheet{
		"pdf: there is no sheet to write":                                                                               nil,
		"pdf: sheet a: a size of 0 x 0 mm cannot be drawn":                                                              {{Name: "a"}},
		"pdf: sheet a is 6000 x 2000 mm: a PDF page holds at most 5080 mm: use the DXF":                                 {{Name: "a", Width: 6000, Height: 2000}},
		"pdf: sheet b: step 1 (): engraving is an open path of two or more points; this one has 0, and an outline of 0": {{Name: "a", Width: 1, Height: 1}, {Name: "b", Width: 1, Height: 1, Steps: []export.Step{{}}}},
	} {
		if err := pdf.WriteSheets(&bytes.Buffer{}, s, pdf.Options{}); err == nil || err.Error() != want {
			t.Errorf("got  %v\nwant %s", err, want)
		}
	}
	err := pdf.WriteSheet(&bytes.Buffer{}, export.Sheet{Width: 1, Height: 5081}, pdf.Options{})
	if !errors.Is(err, pdf.ErrTooLarge) {
		t.Errorf("got %v", err)
	}
	if err := pdf.WriteSheet(&bytes.Buffer{}, export.Sheet{Width: 1, Height: 1}, pdf.Options{Line: -1}); err == nil {
		t.Error("a line of -1 mm is drawn")
	}
	full := errors.New("disk full")
	if err := pdf.WriteSheet(failing{full}, export.Sheet{Width: 1, Height: 1}, pdf.Options{}); !errors.Is(err, full) {
		t.Errorf("got %v", err)
	}
}

type failing struct{ err error }

func (f failing) Write([]byte) (int, error) { return 0, f.err }

// The pause is longer than the grain of a date in a PDF.
func TestSameBytes(t *testing.T) {
	defer runtime.GOMAXPROCS(runtime.GOMAXPROCS(1))
	sheet, paper := write(t, sample.Sheet()), papers(t, workshop(t))
	time.Sleep(1100 * time.Millisecond)
	runtime.GOMAXPROCS(2)
	if !bytes.Equal(sheet, write(t, sample.Sheet())) {
		t.Error("the bytes of a sheet differ")
	}
	if !bytes.Equal(paper, papers(t, workshop(t))) {
		t.Error("the bytes of the papers differ")
	}
}

func BenchmarkWriteSheet(b *testing.B) {
	s := sample.Sheet()
	var buf bytes.Buffer
	for b.Loop() {
		buf.Reset()
		if err := pdf.WriteSheet(&buf, s, pdf.Options{}); err != nil {
			b.Fatal(err)
		}
	}
}
