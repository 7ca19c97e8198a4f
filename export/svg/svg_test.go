package svg_test

import (
	"bytes"
	"encoding/xml"
	"errors"
	"fmt"
	"image"
	"image/png"
	"math"
	"os"
	"path/filepath"
	"regexp"
	"runtime"
	"strconv"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"pinwright/export"
	"pinwright/export/internal/sample"
	"pinwright/export/picture"
	"pinwright/export/svg"
	"pinwright/parts/outline"
)

func ExampleWrite() {
	err := svg.Write(os.Stdout, export.Sheet{
		Name: "clear3-1", Title: "clear3, sheet 1 of 1", Width: 60, Height: 20,
		Steps: []export.Step{
			{Op: export.CutInside, Part: "crank", Closed: outline.CircleHole(outline.Point{X: 10, Y: 12}, 2.16)},
			{Op: export.CutOutside, Part: "crank", Closed: sample.Bar(10, 12, 35, 12, 0)},
		},
	}, svg.Options{})
	if err != nil {
		panic(err)
	}
	// Output:
	// <?xml version="1.0" encoding="UTF-8"?>
	// <svg xmlns="http://www.w3.org/2000/svg" version="1.1" width="60mm" height="20mm" viewBox="0 0 60 20">
	// <title>clear3, sheet 1 of 1</title>
	// <desc>Cutting paths of sheet clear3-1, 60 x 20 mm, at 1:1.</desc>
	// <g id="cut-inside" fill="none" stroke="#b85a0b" stroke-width="0.1" stroke-linecap="round" stroke-linejoin="round">
	// <circle cx="10" cy="8" r="2.16"><title>crank</title></circle>
	// </g>
	// <g id="cut-outside" fill="none" stroke="#143670" stroke-width="0.1" stroke-linecap="round" stroke-linejoin="round">
	// <path d="M10 14L45 14A6 6 0 0 0 51 8A6 6 0 0 0 45 2L10 2A6 6 0 0 0 4 8A6 6 0 0 0 10 14Z"><title>crank</title></path>
	// </g>
	// </svg>
}

func TestGroupsFollowTheWork(t *testing.T) {
	c := outline.Circle(outline.Point{X: 5, Y: 5}, 2)
	s := export.Sheet{Name: "a", Width: 10, Height: 10, Steps: []export.Step{
		{Op: export.CutInside, Closed: c}, {Op: export.CutOutside, Closed: c}, {Op: export.CutInside, Closed: c}, {Op: export.CutInside, Closed: c},
	}}
	var b bytes.Buffer
	if err := svg.Write(&b, s, svg.Options{Dashes: true, Line: 0.2}); err != nil {
		t.Fatal(err)
	}
	got := regexp.MustCompile(`<g id="[^"]*"|<circle|</g>|stroke-dasharray="[^"]*"|stroke-width="[^"]*"`).FindAllString(b.String(), -1)
	want := `[<g id="cut-inside" stroke-width="0.2" stroke-dasharray="2.4 0.9" <circle </g> <g id="cut-outside" stroke-width="0.2" <circle </g> <g id="cut-inside-2" stroke-width="0.2" stroke-dasharray="2.4 0.9" <circle <circle </g>]`
	if fmt.Sprint(got) != want {
		t.Errorf("got  %v\nwant %s", got, want)
	}
}

func TestErrors(t *testing.T) {
	good := export.Sheet{Name: "a", Width: 10, Height: 10}
	if err := svg.Write(&bytes.Buffer{}, export.Sheet{Name: "a"}, svg.Options{}); err == nil || err.Error() != "svg: sheet a: a size of 0 x 0 mm cannot be drawn" {
		t.Errorf("got %v", err)
	}
	if err := svg.Write(&bytes.Buffer{}, good, svg.Options{Line: math.NaN()}); err == nil {
		t.Error("a line of no width is drawn")
	}
	full := errors.New("disk full")
	if err := svg.Write(failing{full}, good, svg.Options{}); !errors.Is(err, full) {
		t.Errorf("got %v", err)
	}
	if err := svg.WritePicture(&bytes.Buffer{}, picture.Picture{}); err == nil {
		t.Error("a picture without a size is drawn")
	}
}

type failing struct{ err error }

func (f failing) Write([]byte) (int, error) { return 0, f.err }

// Every path of the file is read as the SVG recommendation says and held against the plan.
func TestCurvesFromTheFile(t *testing.T) {
	check := func(t interface{ Fatalf(string, ...any) }, s export.Sheet) {
		var b bytes.Buffer
		if err := svg.Write(&b, s, svg.Options{}); err != nil {
			t.Fatalf("%v", err)
		}
		d, err := read(b.Bytes())
		if err != nil {
			t.Fatalf("%v\n%s", err, b.Bytes())
		}
		if len(d.paths) != len(s.Steps) {
			t.Fatalf("%d paths for %d steps", len(d.paths), len(s.Steps))
		}
		for i, step := range s.Steps {
			segments := step.Closed.Segments()
			if step.Op == export.Engrave {
				segments = step.Open.Segments()
			}
			if d.parts[i] != step.Part || !strings.HasPrefix(d.groups[i], step.Op.String()) {
				t.Fatalf("step %d is %s of %q, want %v of %q", i, d.groups[i], d.parts[i], step.Op, step.Part)
			}
			// The digits allow 1e-5; arcs (or pieces of them) no higher than 1e-4 over their chord are lines.
			limit := 1e-5
			for _, g := range segments {
				if math.Abs(g.Bulge)*g.A.Dist(g.B)/2 < 1.01e-4 || g.A.Dist(g.B) < 0.01 {
					limit = 1.1e-4
				}
			}
			// Both ways: what is drawn is planned, and what is planned is drawn.
			length := 0.0
			for _, p := range d.paths[i] {
				for k := 0; k <= 8; k++ {
					if away := nearest(segments, p.at(float64(k)/8, s.Height)); away > limit {
						t.Fatalf("step %d: %.7f mm off the plan", i, away)
					}
				}
				length += p.length()
			}
			planned := 0.0
			for _, g := range segments {
				planned += g.Length()
			}
			if math.Abs(length-planned) > limit*(1+float64(len(segments)))*4 {
				t.Fatalf("step %d: %.6f mm drawn, %.6f planned", i, length, planned)
			}
		}
	}
	check(t, sample.Sheet())
	rapid.Check(t, func(t *rapid.T) { check(t, sample.AnySheet().Draw(t, "sheet")) })
}

func nearest(segments []outline.Segment, p outline.Point) float64 {
	d := math.Inf(1)
	for _, s := range segments {
		d = min(d, s.Nearest(p).Distance)
	}
	return d
}

// piece is a line, or an arc by centre and angles (start, and sweep towards +y, which is downwards).
type piece struct {
	ax, ay, bx, by              float64
	arc                         bool
	cx, cy, radius, start, turn float64
}

// at returns a point, turned over into the sheet's frame.
func (p piece) at(t, height float64) outline.Point {
	if !p.arc {
		return outline.Point{X: p.ax + t*(p.bx-p.ax), Y: height - p.ay - t*(p.by-p.ay)}
	}
	s, c := math.Sincos(p.start + t*p.turn)
	return outline.Point{X: p.cx + p.radius*c, Y: height - p.cy - p.radius*s}
}

func (p piece) length() float64 {
	if !p.arc {
		return math.Hypot(p.bx-p.ax, p.by-p.ay)
	}
	return math.Abs(p.turn) * p.radius
}

type drawing struct {
	paths         [][]piece
	groups, parts []string
}

// read takes the file apart with encoding/xml.
func read(data []byte) (drawing, error) {
	var root struct {
		Groups []struct {
			ID    string `xml:"id,attr"`
			Items []struct {
				XMLName xml.Name
				D       string  `xml:"d,attr"`
				CX      float64 `xml:"cx,attr"`
				CY      float64 `xml:"cy,attr"`
				R       float64 `xml:"r,attr"`
				Title   string  `xml:"title"`
			} `xml:",any"`
		} `xml:"g"`
	}
	var d drawing
	if err := xml.Unmarshal(data, &root); err != nil {
		return d, err
	}
	for _, g := range root.Groups {
		for _, item := range g.Items {
			var path []piece
			if item.XMLName.Local == "circle" {
				path = []piece{{arc: true, cx: item.CX, cy: item.CY, radius: item.R, turn: 2 * math.Pi}}
			} else {
				var err error
				if path, err = readPath(item.D); err != nil {
					return d, err
				}
			}
			d.paths, d.groups, d.parts = append(d.paths, path), append(d.groups, g.ID), append(d.parts, item.Title)
		}
	}
	return d, nil
}

var command = regexp.MustCompile(`([MLAZ])([^MLAZ]*)`)

// readPath turns path data into pieces; arcs as the recommendation's notes on implementation give it
// (SVG 1.1, F.6.5: from end points to the centre).
func readPath(d string) ([]piece, error) {
	var pieces []piece
	var x, y, x0, y0 float64
	for _, c := range command.FindAllStringSubmatch(d, -1) {
		var v []float64
		for _, f := range strings.Fields(c[2]) {
			n, err := strconv.ParseFloat(f, 64)
			if err != nil {
				return nil, err
			}
			v = append(v, n)
		}
		p := piece{ax: x, ay: y}
		switch {
		case c[1] == "M" && len(v) == 2:
			x, y, x0, y0 = v[0], v[1], v[0], v[1]
			continue
		case c[1] == "L" && len(v) == 2:
			p.bx, p.by = v[0], v[1]
		case c[1] == "Z" && len(v) == 0:
			p.bx, p.by = x0, y0
		case c[1] == "A" && len(v) == 7:
			p.bx, p.by, p.arc = v[5], v[6], true
			large, sweep := v[3] == 1, v[4] == 1
			hx, hy := (x-p.bx)/2, (y-p.by)/2
			r := max(v[0], math.Hypot(hx, hy)) // F.6.6: a radius that is too small grows
			k := math.Sqrt(max(0, (r*r-hx*hx-hy*hy)/(hx*hx+hy*hy)))
			if large == sweep {
				k = -k
			}
			p.cx, p.cy, p.radius = k*hy+(x+p.bx)/2, -k*hx+(y+p.by)/2, r
			p.start = math.Atan2(y-p.cy, x-p.cx)
			p.turn = math.Atan2(p.by-p.cy, p.bx-p.cx) - p.start
			for sweep && p.turn < 0 {
				p.turn += 2 * math.Pi
			}
			for !sweep && p.turn > 0 {
				p.turn -= 2 * math.Pi
			}
		default:
			return nil, fmt.Errorf("%q with %d numbers", c[1], len(v))
		}
		x, y = p.bx, p.by
		pieces = append(pieces, p)
	}
	return pieces, nil
}

// An independent renderer draws the file at 10 pixels a millimetre: dark pixels lie on planned curves,
// and along planned curves the pixels are dark.
func TestRendered(t *testing.T) {
	s := sample.Sheet()
	dir := t.TempDir()
	in, out := filepath.Join(dir, "a.svg"), filepath.Join(dir, "a.png")
	var b bytes.Buffer
	if err := svg.Write(&b, s, svg.Options{}); err != nil {
		t.Fatal(err)
	}
	if err := os.WriteFile(in, b.Bytes(), 0o666); err != nil {
		t.Fatal(err)
	}
	const perMM = 10
	sample.Oracle(t, "rsvg-convert", "-d", "254", "-p", "254", "-b", "white", "-o", out, in)
	img := decode(t, out)
	if got, want := img.Bounds().Size(), (image.Point{X: 300 * perMM, Y: 200 * perMM}); got != want {
		t.Fatalf("%v pixels, want %v", got, want)
	}
	dark := func(x, y int) bool {
		r, g, b, _ := img.At(x, y).RGBA()
		return min(r, g, b) < 0xc000
	}
	var segments []outline.Segment
	for _, step := range s.Steps {
		segments = append(segments, step.Closed.Segments()...)
		segments = append(segments, step.Open.Segments()...)
	}
	boxes := make([]outline.Box, len(segments))
	for i, g := range segments {
		boxes[i] = g.Bounds().Grow(0.2)
	}
	inked := 0
	for y := range img.Bounds().Dy() {
		for x := range img.Bounds().Dx() {
			if !dark(x, y) {
				continue
			}
			inked++
			p := outline.Point{X: (float64(x) + 0.5) / perMM, Y: s.Height - (float64(y)+0.5)/perMM}
			near := false
			for i, g := range segments {
				// Half a line and half a pixel's diagonal.
				near = near || boxes[i].Contains(p) && g.Nearest(p).Distance < 0.05+0.071
			}
			if !near {
				t.Fatalf("ink at %.2f, %.2f mm where nothing is planned", p.X, p.Y)
			}
		}
	}
	if inked < 10000 {
		t.Fatalf("only %d pixels are inked", inked)
	}
	for _, g := range segments {
		for k := 1; k < 20; k++ {
			p := g.At(float64(k) / 20)
			x, y := int(p.X*perMM), int((s.Height-p.Y)*perMM)
			if !dark(x, y) && !dark(x-1, y) && !dark(x, y-1) && !dark(x+1, y) && !dark(x, y+1) {
				t.Fatalf("no ink at %.2f, %.2f mm", p.X, p.Y)
			}
		}
	}
}

func decode(t *testing.T, name string) image.Image {
	t.Helper()
	f, err := os.Open(name)
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	img, err := png.Decode(f)
	if err != nil {
		t.Fatal(err)
	}
	return img
}

func TestPictureIsRendered(t *testing.T) {
	kits, levels := sample.Kits()
	side, err := picture.SideView(kits, levels, 180, 240)
	if err != nil {
		t.Fatal(err)
	}
	layout, err := picture.Layout(sample.Sheet(), 180, 240)
	if err != nil {
		t.Fatal(err)
	}
	for _, pic := range []picture.Picture{side, layout} {
		dir := t.TempDir()
		in, out := filepath.Join(dir, "a.svg"), filepath.Join(dir, "a.png")
		var b bytes.Buffer
		if err := svg.WritePicture(&b, pic); err != nil {
			t.Fatal(err)
		}
		if err := os.WriteFile(in, b.Bytes(), 0o666); err != nil {
			t.Fatal(err)
		}
		sample.Oracle(t, "rsvg-convert", "-d", "127", "-p", "127", "-o", out, in)
		img := decode(t, out)
		colours := map[[3]uint32]bool{}
		for y := 0; y < img.Bounds().Dy(); y += 3 {
			for x := 0; x < img.Bounds().Dx(); x += 3 {
				r, g, b, _ := img.At(x, y).RGBA()
				colours[[3]uint32{r, g, b}] = true
			}
		}
		if math.Abs(float64(img.Bounds().Dx())-pic.Width*5) > 1 || len(colours) < 8 {
			t.Errorf("%s: %v, %d colours", pic.Title, img.Bounds(), len(colours))
		}
	}
}

func TestSameBytes(t *testing.T) {
	write := func() []byte {
		var b bytes.Buffer
		if err := svg.Write(&b, sample.Sheet(), svg.Options{}); err != nil {
			t.Fatal(err)
		}
		layout, err := picture.Layout(sample.Sheet(), 170, 240)
		if err != nil {
			t.Fatal(err)
		}
		if err := svg.WritePicture(&b, layout); err != nil {
			t.Fatal(err)
		}
		return b.Bytes()
	}
	defer runtime.GOMAXPROCS(runtime.GOMAXPROCS(1))
	one := write()
	runtime.GOMAXPROCS(2)
	if !bytes.Equal(one, write()) {
		t.Error("the bytes differ")
	}
}

// Names go into the file as they are, whatever they hold.
func TestNamesAreEscaped(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		name := rapid.String().Draw(t, "name")
		s := export.Sheet{Name: name, Title: name, Width: 10, Height: 10, Steps: []export.Step{
			{Op: export.CutOutside, Part: name, Closed: outline.Circle(outline.Point{X: 5, Y: 5}, 2)},
		}}
		var b bytes.Buffer
		if err := svg.Write(&b, s, svg.Options{}); err != nil {
			t.Fatal(err)
		}
		d, err := read(b.Bytes())
		if err != nil {
			t.Fatal(err)
		}
		if !strings.ContainsFunc(name, func(r rune) bool { return r < ' ' || r >= 0xfffe }) && d.parts[0] != name {
			t.Fatalf("%q came back as %q", name, d.parts[0])
		}
	})
}

func BenchmarkWriteSheet(b *testing.B) {
	s := sample.Sheet()
	var buf bytes.Buffer
	for b.Loop() {
		buf.Reset()
		if err := svg.Write(&buf, s, svg.Options{}); err != nil {
			b.Fatal(err)
		}
	}
}
