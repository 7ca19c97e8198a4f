package manifest_test

import (
	"bytes"
	"math"
	"reflect"
	"strings"
	"testing"

	"pinwright/export/manifest"
	"pinwright/parts"
	"pinwright/parts/linkage"
	"pinwright/parts/outline"
)

var hash = strings.Repeat("0123456789abcdef", 4)

// box is a measure about a place on the x axis.
func box(area, perimeter, x float64) manifest.Measure {
	return manifest.Measure{
		Area: area, Perimeter: perimeter, Middle: manifest.Point{X: x}, Low: manifest.Point{X: x - 1, Y: -1}, High: manifest.Point{X: x + 1, Y: 1},
	}
}

// sample is a run of one sheet with one bar.
func sample() manifest.Manifest {
	return manifest.Manifest{
		Format: manifest.Format, Program: "pinwright test",
		Job:     manifest.Job{Name: "demo", Title: "a < b & c", SHA256: hash},
		Linkage: manifest.Linkage{Joints: 2, Links: 2, Mobility: 1, Drive: manifest.Drive{Link: "bar", To: 360, Full: true}},
		Stock: []manifest.Stock{{
			Name: "clear3", Material: "cast acrylic", Thickness: 3, Measured: 2.85, Margin: 5, Web: 3, Kerf: 0.18, MarkClear: 0.5,
		}},
		Sheets: []manifest.Sheet{{Name: "clear3-1", Drawing: "clear3-1.dxf", Stock: "clear3", Width: 600, Height: 300, Parts: 1, Fill: 0.01}},
		Parts: []manifest.Part{{
			Name: "bar", Link: "bar", Stock: "clear3", Sheet: "clear3-1", Place: manifest.Placement{Turn: 90, X: 20, Y: 20},
			Mark: manifest.Mark{Text: "BAR", Strokes: 9, Length: 31.5}, Area: 730, Mass: 2.4,
			Outside: box(754, 144, 25),
			Holes: []manifest.Hole{
				{Name: "A", Kind: "pin", Joint: "A", Diameter: 4.5, Measure: box(15.9, 14.1, 0)},
				{
					Name: "B", Kind: "pin", Joint: "B", Centre: manifest.Point{X: 50}, Diameter: 1.0 / 3,
					Measure: box(15.9, 14.1, 50),
				},
			},
			Lengths: []manifest.Length{{A: "A", B: "B", MM: 50}},
		}},
		Files:    []manifest.File{{Name: "clear3-1.dxf", Size: 12345, SHA256: hash}},
		Cautions: []string{"Laser fumes: extract them."},
	}
}

func encode(t testing.TB, m manifest.Manifest) string {
	t.Helper()
	var buf bytes.Buffer
	if err := manifest.Encode(&buf, m); err != nil {
		t.Fatal(err)
	}
	return buf.String()
}

func TestRoundTrip(t *testing.T) {
	text := encode(t, sample())
	back, err := manifest.Decode(strings.NewReader(text))
	if err != nil {
		t.Fatal(err)
	}
	if again := encode(t, back); again != text {
		t.Errorf("written again it differs:\n%s", again)
	}
	if back.Parts[0].Holes[1].Diameter != 0.333333333 || !reflect.DeepEqual(back.Job, sample().Job) {
		t.Errorf("%+v", back)
	}
	if strings.Contains(text, "null") || !strings.Contains(text, "a < b & c") {
		t.Errorf("null or escapes in\n%s", text)
	}
}

func TestEncodeLeavesTheCallersValueAlone(t *testing.T) {
	m := sample()
	encode(t, m)
	if !reflect.DeepEqual(m, sample()) {
		t.Error("Encode changed its argument")
	}
}

func TestDecodeRefuses(t *testing.T) {
	sound := encode(t, sample())
	change := func(old, new string) string {
		if !strings.Contains(sound, old) {
			t.Fatalf("no %q in the sample", old)
		}
		return strings.Replace(sound, old, new, 1)
	}
	for name, c := range map[string]struct{ text, want string }{
		"nothing":             {"", "manifest: line 1, column 1: the file is cut short"},
		"garbage":             {"\x7fELF", "manifest: line 1, column 2: invalid character"},
		"cut short":           {sound[:200], "the file is cut short"},
		"more behind":         {sound + "{}", "something follows the end"},
		"unknown key":         {change(`"kerf"`, `"curf"`), `manifest: unknown key "curf"`},
		"key twice":           {change(`"kerf": 0.18`, `"kerf": 0.2, "Kerf": 0.18`), `key "Kerf" stands twice`},
		"wrong type":          {change(`"kerf": 0.18`, `"kerf": "0.18"`), "stock.kerf cannot be a string"},
		"another format":      {change(`"format": 1`, `"format": 2`), "format 2; this program reads format 1"},
		"no name":             {change(`"name": "demo"`, `"name": ""`), "the job has no name"},
		"short hash":          {change(`"sha256": "0123`, `"sha256": "123`), "is not a SHA-256 of 64 lower-case hexadecimal digits"},
		"path out of folder":  {change(`"name": "clear3-1.dxf"`, `"name": "../clear3-1.dxf"`), `file "../clear3-1.dxf": a name in the folder of the run is wanted`},
		"drawing not listed":  {change(`"drawing": "clear3-1.dxf"`, `"drawing": "x.dxf"`), `sheet clear3-1: its drawing "x.dxf" is not among the files`},
		"negative kerf":       {change(`"kerf": 0.18`, `"kerf": -0.18`), "stock clear3: margin, web, kerf and mark_clear: -0.18"},
		"no thickness":        {change(`"thickness": 3`, `"thickness": 0`), "stock clear3: thickness is 0"},
		"unknown stock":       {change(`"stock": "clear3",`+"\n"+`      "width"`, `"stock": "ply",`+"\n"+`      "width"`), `sheet clear3-1: stock "ply" is not listed`},
		"unknown sheet":       {change(`"sheet": "clear3-1"`, `"sheet": "clear3-2"`), `part bar: sheet "clear3-2" is not listed`},
		"wrong count":         {change(`"parts": 1`, `"parts": 2`), "sheet clear3-1 says it carries 2 parts; 1 name it"},
		"hole twice":          {change(`"name": "B"`, `"name": "A"`), "hole of bar A is listed twice"},
		"length to nowhere":   {change(`"b": "B"`, `"b": "C"`), "part bar: length A-C: it has neither a hole nor a foot at C"},
		"length of nothing":   {change(`"mm": 50`, `"mm": 0`), "part bar: length A-B is 0"},
		"a hole without area": {change(`"area": 15.9`, `"area": 0`), "part bar: hole A: area is 0"},
		"a box inside out":    {change(`"x": -1`, `"x": 1.5`), "part bar: hole A: its box from (1.5, -1) to (1, 1) is empty"},
		"several things at once": {
			strings.Replace(change(`"mm": 50`, `"mm": -1`), `"parts": 1`, `"parts": 3`, 1), "part bar: length A-B is -1\nsheet clear3-1 says",
		},
	} {
		t.Run(name, func(t *testing.T) {
			_, err := manifest.Decode(strings.NewReader(c.text))
			if err == nil || !strings.Contains(err.Error(), c.want) {
				t.Errorf("got %v, want %q", err, c.want)
			}
		})
	}
}

func TestEncodeRefusesWhatIsNoNumber(t *testing.T) {
	m := sample()
	m.Parts[0].Mass = math.NaN()
	err := manifest.Encode(&bytes.Buffer{}, m)
	if err == nil || !strings.Contains(err.Error(), "part bar: mass: NaN") {
		t.Errorf("got %v", err)
	}
}

// A joint is the hole a pin goes through, not the bolts round it nor the slot it could move along.
func TestHoleAt(t *testing.T) {
	p := manifest.Part{
		Holes: []manifest.Hole{
			{Name: "hub 1 of 4", Kind: "bolt", Joint: "O"},
			{Name: "O", Kind: "shaft", Joint: "O"},
			{Name: "C", Kind: "slot", Joint: "C"},
			{Name: "window 1", Kind: "window"},
		},
		Feet: []manifest.Foot{{Joint: "P"}},
	}
	if i, ok := p.HoleAt("O"); !ok || i != 1 {
		t.Errorf("O is hole %d, %v", i, ok)
	}
	for joint, want := range map[string]bool{"O": true, "C": false, "": false, "P": true, "X": false} {
		if p.Shows(joint) != want {
			t.Errorf("shows %q: %v", joint, !want)
		}
	}
}

func TestLengths(t *testing.T) {
	p := sample().Parts[0]
	link := linkage.Link{Name: "bar", Pins: []string{"A", "B", "P"}, Lengths: []linkage.Length{
		{A: "A", B: "P", MM: 90}, {A: "B", B: "A", MM: 50}, {A: "B", B: "P", MM: 60},
	}}
	if got := manifest.LinkLengths(link, p); !reflect.DeepEqual(got, []manifest.Length{{A: "B", B: "A", MM: 50}}) {
		t.Errorf("%v: only A and B can be seen", got)
	}
	ground := func(x, y float64) *linkage.Ground { return &linkage.Ground{At: outline.Point{X: x, Y: y}} }
	adjustable := ground(1, 1)
	adjustable.Range = &linkage.Range{}
	l := linkage.Linkage{Joints: []linkage.Joint{
		{Name: "A", Ground: ground(0, 0)}, {Name: "M"}, {Name: "B", Ground: ground(3, 4)}, {Name: "C", Ground: adjustable},
	}}
	p.Holes = append(p.Holes, manifest.Hole{Name: "C", Kind: "pin", Joint: "C"})
	if got := manifest.PivotLengths(l, p); !reflect.DeepEqual(got, []manifest.Length{{A: "A", B: "B", MM: 5}}) {
		t.Errorf("%v", got)
	}
}

func TestNewPart(t *testing.T) {
	p := parts.Part{
		Name: "left.bar", Link: "bar", Copy: "left", Stock: "clear3", Plane: 2,
		Holes: []parts.Hole{{Name: "A", Kind: parts.PinHole, Joint: "A", Centre: outline.Point{X: 10}, Diameter: 4}},
		Mark:  parts.Mark{Text: "L", Strokes: []outline.Path{{{}, {Point: outline.Point{X: 3}}, {Point: outline.Point{X: 3, Y: 4}}}}},
	}
	region := outline.Region{
		Outer: outline.Rectangle(outline.Point{}, outline.Point{X: 20, Y: 10}),
		Holes: []outline.Outline{outline.CircleHole(outline.Point{X: 10}, 2)},
	}
	got, err := manifest.NewPart(p, region)
	if err != nil {
		t.Fatal(err)
	}
	// Rectangle and circle by their closed forms.
	if math.Abs(got.Outside.Area-200) > 1e-12 || got.Outside.Perimeter != 60 || got.Outside.Middle != (manifest.Point{X: 10, Y: 5}) ||
		got.Outside.Low != (manifest.Point{}) || got.Outside.High != (manifest.Point{X: 20, Y: 10}) {
		t.Errorf("outside %+v", got.Outside)
	}
	hole := got.Holes[0]
	if math.Abs(hole.Measure.Area-4*math.Pi) > 1e-12 || math.Abs(hole.Measure.Perimeter-4*math.Pi) > 1e-12 ||
		math.Abs(hole.Measure.Middle.X-10) > 1e-12 || hole.Kind != "pin" || hole.Diameter != 4 {
		t.Errorf("hole %+v", hole)
	}
	if math.Abs(got.Area-(200-4*math.Pi)) > 1e-12 || got.Mark != (manifest.Mark{Text: "L", Strokes: 1, Length: 7}) || got.Plane != 2 {
		t.Errorf("%+v", got)
	}
	region.Holes = nil
	if _, err := manifest.NewPart(p, region); err == nil || err.Error() != "left.bar: 1 holes are named, and the beam leaves 0" {
		t.Errorf("got %v", err)
	}
}

func TestPlacementOf(t *testing.T) {
	got := manifest.PlacementOf(outline.Place(math.Pi/2, true, outline.Point{X: 3, Y: 4}))
	if got != (manifest.Placement{Flip: true, Turn: 90, X: 3, Y: 4}) {
		t.Errorf("%+v", got)
	}
}

func FuzzDecode(f *testing.F) {
	f.Add([]byte(encode(f, sample())))
	f.Add([]byte(`{"format": 1, "parts": [{"holes": [{}]}]}`))
	f.Fuzz(func(t *testing.T, data []byte) {
		m, err := manifest.Decode(bytes.NewReader(data))
		if err != nil {
			return
		}
		if err := manifest.Encode(&bytes.Buffer{}, m); err != nil {
			t.Errorf("what was read cannot be written: %v", err)
		}
	})
}
