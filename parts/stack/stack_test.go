package stack

import (
	"errors"
	"fmt"
	"math"
	"path/filepath"
	"slices"
	"strings"
	"testing"

	"pinwright/parts/job"
)

func near(a, b float64) bool { return math.Abs(a-b) < 1e-9 }

// brief writes a kit as one line, from below.
func brief(k Kit) string {
	var words []string
	for _, e := range k.Elements {
		name := e.What
		if e.Kind == PartElement {
			name = e.Part
		}
		if e.Kind == SpacerElement {
			name = fmt.Sprintf("spacer %g", e.Thickness)
		}
		words = append(words, name)
	}
	return strings.Join(words, " | ") + " : " + k.Through.Designation
}

func build(t *testing.T, j job.Job) []Kit {
	t.Helper()
	kits, err := Build(j)
	if err != nil {
		t.Fatal(err)
	}
	return kits
}

// Two links of measured 3 mm acrylic on neighbouring planes, M4. By hand:
//
//	most: 2 x (3.1) + 3 washers x 0.9 + 0.2 play           =  9.1
//	nut DIN 985 M4 5.0, two pitches of 0.7                  =  6.4
//	need 15.5: M4x16 may be 15.65 long (js15): M4x16
//
// and with M4 at sheets that are not measured (ISO 7823-1: 3.7 at most): 7.4 + 2.7 + 0.2 + 6.4 = 16.7:
// M4x20. Screw table, washers and nuts: 2+ places.
func TestTwoLinks(t *testing.T) {
	links := []at{{name: "crank", stock: "s", plane: 1, pins: []string{"A", "B"}}, {name: "coupler", stock: "s", plane: 2, pins: []string{"A", "C"}}}
	k := build(t, jobOf(links, []job.Pin{bolt("A", "M4")}, nil, sheet("s", 3.05, 3)))[0]
	if got, want := brief(k), "socket head | ISO 7089 4 | crank | ISO 7089 4 | coupler | ISO 7089 4 | DIN 985 M4 : ISO 4762 M4x16"; got != want {
		t.Errorf("%s\n want %s", got, want)
	}
	if !near(k.Through.Need, 15.5) || !near(k.Budget.Most, 9.1) || !near(k.Budget.Nominal, 8.4) || !near(k.Budget.Least, 7.9) {
		t.Errorf("need %g, budget %+v", k.Through.Need, k.Budget)
	}
	// Heights: crank 0 to 3, washer to 3.8, coupler to 6.8, washer to 7.6, play to 7.8, nut to 12.8; the
	// head's face is at -0.8, the tip at 15.2, 2.4 past the nut.
	last := k.Elements[len(k.Elements)-1]
	if !near(last.From, 7.8) || !near(last.To, 12.8) || !near(k.Through.From, -0.8) || !near(k.Through.To, 15.2) || !near(k.Through.Past, 2.4) {
		t.Errorf("nut %g to %g, bolt %+v", last.From, last.To, k.Through)
	}
	k = build(t, jobOf(links, []job.Pin{bolt("A", "M4")}, nil, sheet("s", 3, 0)))[0]
	if !near(k.Through.Need, 16.7) || k.Through.Length != 20 {
		t.Errorf("not measured: need %g, length %g", k.Through.Need, k.Through.Length)
	}
}

// Published checks of grip length, computed there without play: three 3 mm plies, two ISO 7089 M3
// washers, DIN 985 M3 and two pitches need 15.0 (16); at cast acrylic's 3.7 and washers of 0.55 17.2 (20).
func TestGripLength(t *testing.T) {
	links := []at{{name: "a", stock: "s", plane: 1, pins: []string{"A", "B"}}}
	f, err := fitOut(jobOf(links, nil, nil, sheet("s", 3, 0)), bolt("A", "M3"))
	if err != nil {
		t.Fatal(err)
	}
	for _, c := range []struct{ stack, need, want float64 }{
		{3*3 + 2*0.5, 15.0, 16},
		{3*3.7 + 2*0.55, 17.2, 20},
	} {
		through, err := f.choose(Budget{Least: c.stack, Nominal: c.stack, Most: c.stack}, c.stack, 0)
		if err != nil || !near(through.Need, c.need) || through.Length != c.want {
			t.Errorf("stack of %g: need %g, length %g, want %g and %g (%v)", c.stack, through.Need, through.Length, c.need, c.want, err)
		}
	}
}

// A frame of two plates, an empty plane, a spacer. M4, sheets measured 3 (links) and 4 (plates):
//
//	plane 0 back 0 to 4; plane 1 empty; plane 2 link; plane 3 front.
//	gap from 0 to 2: 1 x 4 + 2 x 0.8 = 5.6; the heads of bolts that begin on plane 2 would want 4.8 + 0.5,
//	which is less.
//	link 9.6 to 12.6; front 13.4 to 17.4; spacer 5.6 - 1.6 = 4.
//	most: 4.1 + 3.1 + 4.1 + 4.1 (spacer) + 5 x 0.9 + 0.2 = 20.1; nut and pitches 6.4: 26.5, so 30.
func TestFrame(t *testing.T) {
	frame := &job.Frame{Stock: "f", Plates: []job.FramePlate{{Name: "back", Plane: 0, Pivots: []string{"G"}}, {Name: "front", Plane: 3, Pivots: []string{"G"}}}}
	links := []at{{name: "rocker", stock: "s", plane: 2, pins: []string{"G", "B"}}}
	j := jobOf(links, []job.Pin{bolt("G", "M4")}, frame, sheet("s", 3, 3), sheet("f", 4, 4))
	k := build(t, j)[0]
	if got, want := brief(k), "socket head | ISO 7089 4 | back | ISO 7089 4 | spacer 4 | ISO 7089 4 | rocker | ISO 7089 4 | front | ISO 7089 4 | DIN 985 M4 : ISO 4762 M4x30"; got != want {
		t.Errorf("%s\n want %s", got, want)
	}
	levels, err := Levels(j)
	want := []Level{{0, 0, 4, false}, {1, 4.8, 8.8, true}, {2, 9.6, 12.6, false}, {3, 13.4, 17.4, false}}
	if err != nil || !slices.Equal(levels, want) {
		t.Errorf("%v, want %v (%v)", levels, want, err)
	}
	if d, err := Between(j, "front", "back"); err != nil || !near(d, 9.4) {
		t.Errorf("between the plates %g, want 9.4 (%v)", d, err)
	}
	if _, err := Between(j, "front", "side"); err == nil {
		t.Error("a plate that is not there")
	}
}

// An empty plane makes room for the nut that ends below it: washer 0.8, play 0.2, nut 5.0, and what
// the bolt sticks out; RunningGap on top.
func TestRoomForNuts(t *testing.T) {
	links := []at{
		{name: "a", stock: "s", plane: 1, pins: []string{"A", "B"}},
		{name: "b", stock: "s", plane: 2, pins: []string{"A", "C"}},
		{name: "c", stock: "s", plane: 4, pins: []string{"C", "D"}},
	}
	j := jobOf(links, []job.Pin{bolt("A", "M4"), bolt("C", "M4")}, nil, sheet("s", 2.1, 2))
	kits := build(t, j)
	levels, err := Levels(j)
	if err != nil {
		t.Fatal(err)
	}
	if room := levels[3].From - kits[0].Through.To; room < RunningGap-1e-9 || room > RunningGap+0.11 {
		t.Errorf("%g mm above the tip of A, levels %v", room, levels)
	}
}

// And for the head that begins above it: 4.0 and a washer of 0.8 (ISO 4762, 4 public tables agree), more
// than the 2 + 2 x 0.8 of the empty plane.
func TestRoomForHeads(t *testing.T) {
	frame := &job.Frame{Stock: "s", Plates: []job.FramePlate{{Name: "back", Plane: 0, Pivots: []string{"G"}}}}
	links := []at{
		{name: "a", stock: "s", plane: 2, pins: []string{"G", "A"}},
		{name: "b", stock: "s", plane: 3, pins: []string{"A", "B"}},
	}
	levels, err := Levels(jobOf(links, []job.Pin{bolt("A", "M4"), bolt("G", "M4")}, frame, sheet("s", 2.1, 2)))
	if err != nil || !near(levels[2].From-levels[0].To, 5.3) {
		t.Errorf("%v, want 5.3 mm over the empty plane (%v)", levels, err)
	}
}

// Two sizes of bolt across one gap: M6 wants 1.6, which two M4 washers fill; M5 with washers of 1.0
// leaves 0.6, so that the gap becomes 3.2: two of M6, three of M5 (0.2 play).
func TestMixedWashers(t *testing.T) {
	links := []at{{name: "a", stock: "s", plane: 1, pins: []string{"A", "B"}}, {name: "b", stock: "s", plane: 2, pins: []string{"A", "B"}}}
	for _, c := range []struct {
		one, other string
		gap        float64
		count      [2]int
	}{
		{"M6", "M4", 1.6, [2]int{1, 2}},
		{"M6", "M5", 3.2, [2]int{2, 3}},
		{"M4", "M3", 0.8, [2]int{1, 1}},
	} {
		j := jobOf(links, []job.Pin{bolt("A", c.one), bolt("B", c.other)}, nil, sheet("s", 3.1, 3))
		kits := build(t, j)
		levels, _ := Levels(j)
		if gap := levels[1].From - levels[0].To; !near(gap, c.gap) {
			t.Errorf("%s and %s: gap %g, want %g", c.one, c.other, gap, c.gap)
		}
		for i, k := range kits {
			n := 0
			for _, e := range k.Elements {
				if e.Kind == WasherElement && e.From >= levels[0].To-1e-9 && e.To <= levels[1].From+1e-9 {
					n++
				}
			}
			if n != c.count[i] {
				t.Errorf("%s and %s: %d washers, want %d", c.one, c.other, n, c.count[i])
			}
		}
	}
}

// A 624 (5 mm wide, ISO 15) in a 3 mm link stands 2 mm proud: the gap above is 2 mm and a washer. The
// bolt is tightened: no play. Its washer ISO 7089 4, 9 mm, is inside 13 - 0.3 (13 - 4) = 10.3 mm.
func TestBearing(t *testing.T) {
	links := []at{{name: "rocker", stock: "s", plane: 1, pins: []string{"A", "B"}}, {name: "coupler", stock: "s", plane: 2, pins: []string{"A", "C"}}}
	pin := bolt("A", "M4")
	pin.Kind, pin.Bearing, pin.Seats, pin.Fit = job.BearingPin, "624", []string{"rocker"}, "press"
	j := jobOf(links, []job.Pin{pin}, nil, sheet("s", 3.1, 3))
	k := build(t, j)[0]
	if got, want := brief(k), "socket head | ISO 7089 4 | rocker | 624 | ISO 7089 4 | coupler | ISO 7089 4 | DIN 985 M4 : ISO 4762 M4x20"; got != want {
		t.Errorf("%s\n want %s", got, want)
	}
	levels, _ := Levels(j)
	if !near(levels[1].From, 5.8) || k.Play != 0 {
		t.Errorf("levels %v, play %g", levels, k.Play)
	}
	// 5 + 3.1 + 3 x 0.9, nut 5, 2 pitches: 17.2
	if !near(k.Through.Need, 17.2) {
		t.Errorf("need %g", k.Through.Need)
	}
	// A flange (F624: 15 x 1, 1 place) lies below the link, the head below the flange.
	pin.Bearing = "F624"
	k = build(t, jobOf(links, []job.Pin{pin}, nil, sheet("s", 3.1, 3)))[0]
	if e := k.Elements[3]; e.Kind != BearingElement || e.From != -1 || e.To != 4 || e.Diameter != 15 {
		t.Errorf("%+v", e)
	}
	// A washer of M5 is 10 mm wide and MR105's outer ring begins at about 8.5: that is said.
	pin.Bearing, pin.Bolt = "MR105", "M5"
	k = build(t, jobOf(links, []job.Pin{pin}, nil, sheet("s", 3.1, 3)))[0]
	if notes := strings.Join(k.Notes, "\n"); !strings.Contains(notes, "may rub on the outer ring") || !strings.Contains(notes, "MR105ZZ is 4 mm wide") {
		t.Errorf("%s", notes)
	}
}

// A motor's shaft that is fast in the crank ends flush with it; where the last part turns freely there
// are washer and collar (DIN 705, from memory: 12 x 8 for 6 mm).
func TestShaft(t *testing.T) {
	frame := &job.Frame{Stock: "s", Plates: []job.FramePlate{{Name: "back", Plane: 0, Pivots: []string{"G"}}}}
	flat := []job.Bore{{Joint: "G", Kind: job.DBore, Diameter: 6, Flat: 5.5}}
	links := []at{{name: "crank", stock: "s", plane: 1, pins: []string{"G", "A"}, bores: flat}}
	pin := job.Pin{Joint: "G", Kind: job.ShaftPin, Shaft: 6, Fit: "running", Washer: "normal"}
	for _, c := range []struct {
		fit, want string
		length    float64
	}{
		// 8 collar, 0.2 play, 1.6 washer, 3, 1.6 washer, 3
		{"running", "shaft collar for 6 mm shaft | ISO 7089 6 | back | ISO 7089 6 | crank : shaft 6 mm", 17.4},
		// The fit holds the crank; in the frame the shaft turns all the same.
		{"push", "shaft collar for 6 mm shaft | ISO 7089 6 | back | ISO 7089 6 | crank : shaft 6 mm", 17.4},
	} {
		pin.Fit = c.fit
		k := build(t, jobOf(links, []job.Pin{pin}, frame, sheet("s", 3.1, 3)))[0]
		if got := brief(k); got != c.want || !near(k.Through.Length, c.length) {
			t.Errorf("%s: %s, %g mm\n want %s, %g mm", c.fit, got, k.Through.Length, c.want, c.length)
		}
	}
	two := append([]at{{name: "other", stock: "s", plane: 2, pins: []string{"G", "B"}}}, links...)
	pin.Fit = "press"
	if _, err := Build(jobOf(two, []job.Pin{pin}, frame, sheet("s", 3.1, 3))); err == nil || !strings.Contains(err.Error(), "both fast on the shaft") {
		t.Errorf("two links fast on one shaft: %v", err)
	}
	links[0].bores = nil
	pin.Fit = "running"
	k := build(t, jobOf(links, []job.Pin{pin}, frame, sheet("s", 3.1, 3)))[0]
	if n := len(k.Elements); k.Elements[0].Kind != CollarElement || k.Elements[n-1].Kind != CollarElement {
		t.Errorf("%s", brief(k))
	}
}

// Inch bolts: the list carries what is needed, since the catalogue has no inch lengths. #8 (4.166 mm)
// is stacked as M5: 3.1 + 3.1 + 3 x 1.1 + 0.2 + 5.0 + 2 x 0.8 = 16.3.
func TestInch(t *testing.T) {
	links := []at{{name: "a", stock: "s", plane: 1, pins: []string{"A", "B"}}, {name: "b", stock: "s", plane: 2, pins: []string{"A", "C"}}}
	pin := bolt("A", "#8")
	pin.Fit = "normal"
	j := jobOf(links, []job.Pin{pin}, nil, sheet("s", 3.1, 3))
	kits := build(t, j)
	if got, want := brief(kits[0]), "socket head | normal washer for #8 | a | normal washer for #8 | b | normal washer for #8 | lock nut #8 : socket head screw #8"; got != want {
		t.Errorf("%s\n want %s", got, want)
	}
	lines := List(j, kits)
	if l := lines[0]; l.Length != 0 || l.Note != "at least 16.3 mm long; no inch lengths in the catalogue" {
		t.Errorf("%+v", l)
	}
}

// A ground pivot without a frame goes on into something that the job does not hold.
func TestOpen(t *testing.T) {
	links := []at{{name: "rocker", stock: "s", plane: 1, pins: []string{"G", "B"}}}
	j := jobOf(links, []job.Pin{bolt("G", "M4")}, nil, sheet("s", 3.1, 3))
	kits := build(t, j)
	if k := kits[0]; !k.Open || k.Through.Length != 0 || k.Through.Designation != "ISO 4762 M4" {
		t.Errorf("%+v", k.Through)
	}
	// 3.1 + 2 x 0.9 + 0.2 + 5 + 1.4 = 11.5
	if got, want := List(j, kits)[0].Note, "at least 11.5 mm long and as much longer as your frame is thick"; got != want {
		t.Errorf("%q, want %q", got, want)
	}
}

// Hexagon bolts have a shank where the length and the stack allow it: ISO 4014 M4 from 25 with 14 mm of
// thread, else ISO 4017.
func TestHexagon(t *testing.T) {
	pin := bolt("A", "M4")
	pin.Head = "hexagon"
	for _, c := range []struct {
		thick float64
		want  string
	}{{3, "ISO 4017 M4x16"}, {6, "ISO 4014 M4x25"}} {
		links := []at{{name: "a", stock: "s", plane: 1, pins: []string{"A", "B"}}, {name: "b", stock: "s", plane: 2, pins: []string{"A", "C"}}}
		k := build(t, jobOf(links, []job.Pin{pin}, nil, sheet("s", c.thick+0.1, c.thick)))[0]
		if k.Through.Designation != c.want {
			t.Errorf("%g mm: %s, want %s", c.thick, k.Through.Designation, c.want)
		}
	}
}

func TestBadInput(t *testing.T) {
	s := sheet("s", 3.1, 3)
	two := []at{{name: "crank", stock: "s", plane: 1, pins: []string{"A", "B"}}, {name: "coupler", stock: "s", plane: 2, pins: []string{"A", "B"}}}
	change := func(f func(*job.Pin)) job.Job {
		pin := bolt("A", "M4")
		f(&pin)
		return jobOf(two, []job.Pin{pin}, nil, s)
	}
	same := slices.Clone(two)
	same[1].plane = 1
	far := slices.Clone(two)
	far[1].plane = 40
	for _, c := range []struct {
		job  job.Job
		want string
	}{
		{jobOf(same, []job.Pin{bolt("A", "M4")}, nil, s), "joint A: crank and coupler both lie on plane 1: give one of them another plane"},
		{jobOf(far, []job.Pin{bolt("A", "M4")}, nil, s), "joint A: from crank (plane 1) to coupler (plane 40) the bolt needs 160.1 mm, and the longest ISO 4762 M4 is 40 mm: bring the planes nearer by 120.6 mm"},
		{jobOf(two, []job.Pin{bolt("A", "M4")}, nil), `cut from stock "s", which the job does not have`},
		{jobOf(two, []job.Pin{bolt("A", "M4")}, nil, sheet("s", -3, -3)), "crank is -3 mm thick"},
		{jobOf(two, []job.Pin{bolt("A", "M4")}, nil, sheet("s", 3, math.NaN())), "crank is NaN mm thick"},
		{jobOf(two, []job.Pin{bolt("Z", "M4")}, nil, s), "joint Z: it has a pin, and no link or plate is on it"},
		{change(func(p *job.Pin) { p.Bolt = "M7" }), "joint A: there is no socket head screw for M7"},
		{change(func(p *job.Pin) { p.Bolt = "#99" }), `joint A: unknown bolt "#99"`},
		{change(func(p *job.Pin) { p.Head = "cheese" }), `joint A: unknown head "cheese"`},
		{change(func(p *job.Pin) { p.Nut = "wing" }), `joint A: unknown nut "wing"`},
		{change(func(p *job.Pin) { p.Washer = "spring" }), `joint A: unknown washer "spring"`},
		{change(func(p *job.Pin) { p.Kind = job.BearingPin }), `joint A: unknown bearing ""`},
		{change(func(p *job.Pin) { p.Kind, p.Bearing = job.BearingPin, "624" }), "no part is named that the bearing sits in"},
		{change(func(p *job.Pin) { p.Kind, p.Bearing, p.Seats = job.BearingPin, "624", []string{"leg"} }), "sit in leg, which is not on this joint"},
		{change(func(p *job.Pin) { p.Kind, p.Bearing, p.Seats = job.BearingPin, "623", []string{"crank"} }), "bolt M4 of 4 mm does not go through the bore of bearing 623, 3 mm"},
		{change(func(p *job.Pin) { p.Kind, p.Shaft = job.ShaftPin, 0 }), "a shaft of 0 mm"},
		{change(func(p *job.Pin) { p.Kind, p.Shaft = job.ShaftPin, 12 }), "no normal washer goes on a shaft of 12 mm"},
		{change(func(p *job.Pin) { p.Kind, p.Shaft, p.Washer, p.Fit = job.ShaftPin, 7, "none", "running" }), "unknown collar for a shaft of"},
	} {
		kits, err := Build(c.job)
		if err == nil || !strings.Contains(err.Error(), c.want) || kits != nil {
			t.Errorf("%v\n want %s", err, c.want)
		}
	}
	// Three links on one bearing pin, one bearing: the other two would be clamped to each other.
	three := append(slices.Clone(two), at{name: "leg", stock: "s", plane: 3, pins: []string{"A"}})
	pin := bolt("A", "M4")
	pin.Kind, pin.Bearing, pin.Seats = job.BearingPin, "624", []string{"crank"}
	if _, err := Build(jobOf(three, []job.Pin{pin}, nil, s)); err == nil || !strings.Contains(err.Error(), "clamps coupler and leg together") {
		t.Errorf("%v", err)
	}
	// Everything at once.
	_, err := Build(jobOf(two, []job.Pin{bolt("A", "M7"), bolt("B", "M9")}, nil, s))
	if err == nil || !strings.Contains(err.Error(), "joint A") || !strings.Contains(err.Error(), "joint B") {
		t.Errorf("%v", err)
	}
	// Nothing at all is no error.
	if kits, err := Build(job.Job{}); err != nil || len(kits) != 0 {
		t.Errorf("%v %v", kits, err)
	}
	if levels, err := Levels(job.Job{}); err != nil || len(levels) != 0 {
		t.Errorf("%v %v", levels, err)
	}
}

// An error carries its place when the job came from a file.
func TestErrorsHavePlaces(t *testing.T) {
	j, err := job.Read("testdata/arms.yaml")
	if err != nil {
		t.Fatal(err)
	}
	i := slices.IndexFunc(j.Links, func(l job.Link) bool { return l.Name == "rocker" })
	j.Links[i].Plane = 30
	_, err = Build(j)
	var placed job.Error
	if !errors.As(err, &placed) || placed.Line == 0 || !strings.Contains(placed.Source, "default:") {
		t.Errorf("%v", err) // C has no pin of its own
	}
	if !strings.Contains(err.Error(), "joint B: from coupler (plane 3)") || !strings.Contains(err.Error(), "  B: {bolt: M4, fit: fine}") {
		t.Errorf("%v", err)
	}
}

func TestFill(t *testing.T) {
	for _, c := range []struct {
		distance, washer float64
		want             filling
		ok               bool
	}{
		{0.8, 0.8, filling{washers: 1}, true},
		{1.1, 0.8, filling{washers: 1, play: 0.3}, true},
		{1.15, 0.8, filling{}, false},
		{2.4, 0.8, filling{washers: 3}, true},
		{3.6, 0.8, filling{washers: 2, spacer: 2}, true},
		{3.27, 0.8, filling{washers: 4, play: 0.07}, true},
		{12.37, 0.8, filling{washers: 2, spacer: 10.7, play: 0.07}, true},
		{0, 0, filling{}, true},
		{0.5, 0, filling{}, false},
		{2.05, 0, filling{spacer: 2, play: 0.05}, true},
		{0.3, 0.8, filling{}, false},
		{0, 0.8, filling{}, false},
		{-1, 0.8, filling{}, false},
	} {
		got, ok := fill(c.distance, c.washer)
		if ok != c.ok || ok && (got.washers != c.want.washers || !near(got.spacer, c.want.spacer) || !near(got.play, c.want.play)) {
			t.Errorf("%g with %g: %+v %v, want %+v %v", c.distance, c.washer, got, ok, c.want, c.ok)
		}
	}
}

// The jobs that come with the program have kits, and every copy its own.
func TestJobs(t *testing.T) {
	files, err := filepath.Glob("../../testdata/jobs/*.yaml")
	if err != nil || len(files) == 0 {
		t.Fatal("no jobs", err)
	}
	for _, file := range files {
		j, err := job.Read(file)
		if err != nil {
			t.Errorf("%s: %v", file, err)
			continue
		}
		for i := range j.Pins {
			if j.Name == "klann" && j.Pins[i].Joint == "U" {
				j.Pins[i].Bolt = "M6" // from plane 0 to 8 no M4 reaches
			}
		}
		kits, err := Build(j)
		if err != nil {
			t.Errorf("%s: %v", file, err)
			continue
		}
		if len(kits) != len(j.Copies)*len(j.Pins) {
			t.Errorf("%s: %d kits for %d copies of %d pins", file, len(kits), len(j.Copies), len(j.Pins))
		}
		levels, err := Levels(j)
		if err != nil {
			t.Fatal(err)
		}
		checkKits(t, j, kits, levels)
		checkList(t, j, kits)
	}
}

// Spacers follow the thickness of the sheets: where that was not measured, the kit says so.
func TestSpacersOfUnmeasuredSheets(t *testing.T) {
	for _, measured := range []float64{0, 3} {
		links := []at{{name: "a", stock: "s", plane: 1, pins: []string{"A", "B"}}, {name: "b", stock: "s", plane: 3, pins: []string{"A", "C"}}}
		k := build(t, jobOf(links, []job.Pin{bolt("A", "M4")}, nil, sheet("s", 3.1, measured)))[0]
		said := strings.Contains(strings.Join(k.Notes, " "), "measure them before cutting the spacers")
		if said != (measured == 0) {
			t.Errorf("measured %g: %q", measured, k.Notes)
		}
	}
}

// The kits of the eight-bar leg, both copies.
func BenchmarkKitsEightBar(b *testing.B) {
	j, err := job.Read("../../testdata/jobs/jansen.yaml")
	if err != nil {
		b.Fatal(err)
	}
	for b.Loop() {
		if _, err := Build(j); err != nil {
			b.Fatal(err)
		}
	}
}
