package stack

import (
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"

	"pinwright/parts/job"
	"pinwright/parts/outline"
)

// pair is two links on neighbouring planes through A, sheets measured 3 mm (2.9 to 3.1).
func pair(pins ...job.Pin) job.Job {
	return jobOf([]at{
		{name: "crank", stock: "s", plane: 1, pins: []string{"A", "B"}},
		{name: "coupler", stock: "s", plane: 2, pins: []string{"A", "C"}},
	}, pins, nil, sheet("s", 3.05, 3))
}

// A sleeve in the coupler, M4, sleeve 6 mm outside. By hand:
//
//	coupler at most 3.1, least play 0.1, sleeve 0.05 off: 3.25 long
//	play: 3.20 - 3.1 = 0.10 to 3.30 - 2.9 = 0.40; 0.25 nominal
//	root-sum-square: sqrt(0.05^2 + 0.1^2) = 0.1118: 0.138 to 0.362
//	stack: 3 x 0.8 + 3 + 3.25 = 8.65; most: 3 x 0.9 + 3.1 + 3.30 = 9.1; least: 3 x 0.7 + 2.9 + 3.20 = 8.2
//	root-sum-square: sqrt(3 x 0.1^2 + 0.1^2 + 0.05^2) = sqrt(0.0425) = 0.2062: 8.444 to 8.856
//	bolt: 9.1 + 5.0 + 2 x 0.7 = 15.5: M4x16 (at least 15.65)
func TestSleeve(t *testing.T) {
	pin := bolt("A", "M4")
	pin.Kind, pin.Sleeve, pin.Seats, pin.Fit = job.SleevePin, 6, []string{"coupler"}, "running"
	k := build(t, pair(pin))[0]
	if got, want := brief(k), "socket head | ISO 7089 4 | crank | ISO 7089 4 | coupler | sleeve for M4, outside 6 mm | ISO 7089 4 | DIN 985 M4 : ISO 4762 M4x16"; got != want {
		t.Errorf("%s\n want %s", got, want)
	}
	if len(k.Turning) != 1 || k.Play != 0 {
		t.Fatalf("%+v, play %g", k.Turning, k.Play)
	}
	close := func(a, b float64) bool { return math.Abs(a-b) < 5e-4 }
	if p := k.Turning[0].Play; !near(p.Least, 0.1) || !near(p.Nominal, 0.25) || !near(p.Most, 0.4) || !close(p.LikelyLeast, 0.1382) || !close(p.LikelyMost, 0.3618) {
		t.Errorf("play %+v", p)
	}
	if b := k.Budget; !near(b.Least, 8.2) || !near(b.Nominal, 8.65) || !near(b.Most, 9.1) || !close(b.LikelyLeast, 8.4438) || !close(b.LikelyMost, 8.8562) {
		t.Errorf("budget %+v", b)
	}
	if !near(k.Through.Need, 15.5) {
		t.Errorf("need %g", k.Through.Need)
	}
	// The sleeve stands 0.25 over the coupler: the plane above begins so much higher.
	e := k.Elements[5]
	if e.Kind != SleeveElement || !near(e.Thickness, 3.25) || !near(e.From, 3.8) || !near(e.To, 7.05) || e.Diameter != 6 {
		t.Errorf("%+v", e)
	}
}

// Sheets that are not measured spread so far (ISO 7823-1) that a sleeve leaves more play than is usual:
// that is said, and refused when less is demanded.
func TestSleevePlayDemanded(t *testing.T) {
	pin := bolt("A", "M4")
	pin.Kind, pin.Sleeve, pin.Seats, pin.Fit = job.SleevePin, 6, []string{"coupler"}, "running"
	j := pair(pin)
	j.Stock = []job.Stock{sheet("s", 3, 0)}
	k := build(t, j)[0]
	if notes := strings.Join(k.Notes, "\n"); !strings.Contains(notes, "may have more play than the 0.4 mm wanted: measure its sheet") {
		t.Errorf("%s", notes)
	}
	j.Pins[0].Play = [2]float64{0.1, 0.3}
	if _, err := Build(j); err == nil || !strings.Contains(err.Error(), "more than the 0.3 mm asked for; measure the sheet and say measured, or say play: [0.1mm, ") {
		t.Errorf("%v", err)
	}
	// Measured, the worst case is 0.1 to 0.4 and the root-sum-square comes to 0.36: 0.37 can be had.
	j.Stock = []job.Stock{sheet("s", 3.05, 3)}
	j.Pins[0].Play = [2]float64{0.1, 0.37}
	build(t, j)
}

// A crank's pin: the bolt is clamped to the crank by a thin nut (ISO 4035 M4, 1.95 to 2.2). By hand:
//
//	washer, crank, washer, thin nut, washer, coupler, washer: 4 x 0.8 + 3 + 2.2 + 3 = 11.4
//	most: 4 x 0.9 + 3.1 + 2.2 + 3.1 + 0.2 play = 12.2; least: 4 x 0.7 + 2.9 + 1.95 + 2.9 = 10.55
//	bolt: 12.2 + 6.4 = 18.6: M4x20
func TestClampFirst(t *testing.T) {
	pin := bolt("A", "M4")
	pin.Kind, pin.Clamped = job.ClampPin, "crank"
	j := pair(pin)
	k := build(t, j)[0]
	if got, want := brief(k), "socket head | ISO 7089 4 | crank | ISO 7089 4 | ISO 4035 M4 | ISO 7089 4 | coupler | ISO 7089 4 | DIN 985 M4 : ISO 4762 M4x20"; got != want {
		t.Errorf("%s\n want %s", got, want)
	}
	if b := k.Budget; !near(b.Least, 10.55) || !near(b.Nominal, 11.4) || !near(b.Most, 12.2) || !near(k.Through.Need, 18.6) || !near(k.Play, 0.2) {
		t.Errorf("%+v, need %g, play %g", b, k.Through.Need, k.Play)
	}
	levels, _ := Levels(j)
	if gap := levels[1].From - levels[0].To; !near(gap, 0.8+2.2+0.8) {
		t.Errorf("gap %g", gap)
	}
	if notes := strings.Join(k.Notes, "\n"); !strings.Contains(notes, "Clamp crank between the head and the thin nut") {
		t.Errorf("%s", notes)
	}
}

// And to the coupler, the last: head, washer, crank, washer, play, thin nut, washer, coupler, washer, nut.
func TestClampLast(t *testing.T) {
	pin := bolt("A", "M4")
	pin.Kind, pin.Clamped, pin.Play = job.ClampPin, "coupler", [2]float64{0.1, 0.3}
	j := pair(pin)
	k := build(t, j)[0]
	if got, want := brief(k), "socket head | ISO 7089 4 | crank | ISO 7089 4 | ISO 4035 M4 | ISO 7089 4 | coupler | ISO 7089 4 | DIN 985 M4 : ISO 4762 M4x20"; got != want {
		t.Errorf("%s\n want %s", got, want)
	}
	nut := k.Elements[4]
	if !near(nut.From, 3+0.8+0.3) || !near(k.Play, 0.3) || !near(k.Budget.Most, 4*0.9+3.1+2.2+3.1+0.3) {
		t.Errorf("%+v, play %g, budget %+v", nut, k.Play, k.Budget)
	}
}

// A rod end on M5 beyond the coupler (ISO 12240-4: ball 8, eye 6; from memory):
//
//	3 washers of 1.0, 3, 8: 14; most: 3.3 + 3.1 + 8 = 14.4; least: 2.7 + 2.9 + 7.88 = 13.48
//	bolt: 14.4 + 5.0 + 2 x 0.8 = 21.0: M5x25
//
// Its eye, 3 mm to its face, meets the washer's rim, 5 mm out and 4 mm off, when 4 cos a - 5 sin a = 3: at
// acos(3/sqrt(41)) - atan(5/4) = 62.06 - 51.34 = 10.7 degrees.
func TestRodEnd(t *testing.T) {
	pin := bolt("C", "M5")
	pin.Kind, pin.RodEnd = job.RodEndPin, job.NutSide
	j := pair(pin)
	k := build(t, j)[0]
	if got, want := brief(k), "socket head | ISO 7089 5 | coupler | ISO 7089 5 | rod end, bore 5 mm | ISO 7089 5 | DIN 985 M5 : ISO 4762 M5x25"; got != want {
		t.Errorf("%s\n want %s", got, want)
	}
	if b := k.Budget; !near(b.Least, 13.48) || !near(b.Nominal, 14) || !near(b.Most, 14.4) || !near(k.Through.Need, 21) || k.Play != 0 {
		t.Errorf("%+v, need %g", b, k.Through.Need)
	}
	if notes := strings.Join(k.Notes, "\n"); !strings.Contains(notes, "tilts by up to 10 degrees each way") {
		t.Errorf("%s", notes)
	}
	j.Pins[0].RodEnd = job.HeadSide
	k = build(t, j)[0]
	if got, want := brief(k), "socket head | ISO 7089 5 | rod end, bore 5 mm | ISO 7089 5 | coupler | ISO 7089 5 | DIN 985 M5 : ISO 4762 M5x25"; got != want {
		t.Errorf("%s\n want %s", got, want)
	}
}

// A shaft with push-on rings (from memory: 13 x 2 for 6 mm) and the play that is asked:
//
//	2 ring, 0.4, 1.6, 3, 1.6, 3, 1.6, 0.4, 2 = 15.6
func TestPushRings(t *testing.T) {
	pin := job.Pin{Joint: "A", Kind: job.ShaftPin, Shaft: 6, Fit: "running", Washer: "normal", Retain: job.RingRetainer, Play: [2]float64{0.2, 0.4}}
	j := pair(pin)
	k := build(t, j)[0]
	ring := "push-on ring for 6 mm shaft"
	if got, want := brief(k), ring+" | ISO 7089 6 | crank | ISO 7089 6 | coupler | ISO 7089 6 | "+ring+" : shaft 6 mm"; got != want {
		t.Errorf("%s\n want %s", got, want)
	}
	if !near(k.Through.Length, 15.6) || !near(k.Play, 0.8) {
		t.Errorf("%g mm, play %g", k.Through.Length, k.Play)
	}
	i := slices.IndexFunc(List(j, []Kit{k}), func(l Line) bool { return l.Designation == ring && l.Need == 2 && l.Mass > 0 })
	if i < 0 {
		t.Error("no rings on the list")
	}
}

// Washers under the nut take up the length of a bolt. Two links of 3 mm on M4 need 15.5: M4x16 is 0.5 too
// long. Two of 4 mm need 2 x 4.1 + 3 x 0.9 + 0.2 + 6.4 = 17.5: M4x20 is 2.5 too long, and every further
// washer takes 0.9 of that: 1.6, 0.7; the third would need 20.2.
func TestExcess(t *testing.T) {
	for _, c := range []struct {
		thick, excess float64
		washers       int
		length, left  float64
	}{
		{3, 0.5, 0, 16, 0.5},
		{4, 0, 0, 20, 2.5},
		{4, 2, 1, 20, 1.6},
		{4, 0.7, 2, 20, 0.7},
		{4, 0.5, -1, 0, 0},
	} {
		pin := bolt("A", "M4")
		pin.Excess = c.excess
		j := pair(pin)
		j.Stock = []job.Stock{sheet("s", c.thick+0.05, c.thick)}
		kits, err := Build(j)
		if c.washers < 0 {
			if err == nil || !strings.Contains(err.Error(), "is more than the excess of 0.5 mm; 4 washers under the nut do not help: say excess: 3mm") {
				t.Errorf("%v", err)
			}
			continue
		}
		if err != nil {
			t.Fatal(err)
		}
		k := kits[0]
		if k.Washers != c.washers || k.Through.Length != c.length || !near(k.Through.Excess, c.left) {
			t.Errorf("%+v: %d washers, %g mm, %g too long", c, k.Washers, k.Through.Length, k.Through.Excess)
		}
		n := 0
		for _, e := range k.Elements {
			if e.Kind == WasherElement {
				n++
			}
		}
		if n != 3+c.washers {
			t.Errorf("%+v: %s", c, brief(k))
		}
	}
}

// The thread of a socket screw M4x30 begins 10 mm under the head (20 mm of thread, ISO 4762); the shank is
// sure for 10 - 5 x 0.7 = 6.5 mm. A link of 5 mm over a washer of 0.8 ends at 5.8 and turns on it.
func TestTurnsOnShank(t *testing.T) {
	s, err := fitOut(pair(), bolt("A", "M4"))
	if err != nil {
		t.Fatal(err)
	}
	for _, c := range []struct {
		least, most, top float64
		want             float64
	}{
		{15, 17, 5.8, 30},   // needs 23.4: 25 would do, 30 carries it on its shank
		{15, 17, 7, 25},     // its shank is too short: the shorter screw
		{9, 17, 5.8, 25},    // on the thinnest stack the nut would stop on the shank of 30
		{15, 12.5, 5.8, 20}, // needs 18.9: the next, 25, has no shank
	} {
		through, err := s.choose(Budget{Least: c.least, Nominal: c.least, Most: c.most}, c.least, c.top)
		if err != nil || through.Length != c.want {
			t.Errorf("%+v: %g (%v)", c, through.Length, err)
		}
	}
}

// How far a nut is turned back: 0.15 mm of 0.7 are 77 degrees, 0.2 mm of 0.8 90.
func TestTurnBack(t *testing.T) {
	for _, c := range []struct {
		size string
		play [2]float64
		want string
	}{{"M4", [2]float64{}, "about 80 degrees"}, {"M5", [2]float64{0.1, 0.3}, "about 90 degrees"}} {
		pin := bolt("A", c.size)
		pin.Play = c.play
		if k := build(t, pair(pin))[0]; !strings.Contains(k.Notes[0], c.want) {
			t.Errorf("%s: %s", c.size, k.Notes)
		}
	}
}

// Spacers of stock lengths. Planes 1 and 3 with an empty one between: sheets of 3 and two gaps of 0.8 are 4.6
// apart. A stock length of 3 and two washers fill it exactly. Planes 1 and 5 are three sheets and four gaps apart,
// 12.2: with none but 10 the gap grows to 12.4, which three washers of 0.8 fill up.
func TestStockSpacers(t *testing.T) {
	links := []at{{name: "a", stock: "s", plane: 1, pins: []string{"A", "B"}}, {name: "b", stock: "s", plane: 3, pins: []string{"A", "C"}}}
	for _, c := range []struct {
		lengths []float64
		upper   int
		want    float64
		gap     float64
	}{{nil, 3, 3, 4.6}, {[]float64{10}, 5, 10, 12.4}, {[]float64{2, 3}, 3, 3, 4.6}} {
		links[1].plane = c.upper
		j := jobOf(links, []job.Pin{bolt("A", "M4")}, nil, sheet("s", 3.05, 3))
		j.Spacers = job.Spacers{Stock: true, Lengths: c.lengths}
		k := build(t, j)[0]
		levels, _ := Levels(j)
		i := slices.IndexFunc(k.Elements, func(e Element) bool { return e.Kind == SpacerElement })
		if i < 0 || k.Elements[i].Thickness != c.want || !near(levels[len(levels)-1].From-levels[0].To, c.gap) {
			t.Errorf("%v: %s, levels %v", c.lengths, brief(k), levels)
		}
		if l := List(j, []Kit{k}); !slices.ContainsFunc(l, func(l Line) bool {
			return l.Kind == SpacerLine && l.Packs == 1 && strings.HasPrefix(l.Note, "stock length")
		}) {
			t.Errorf("%+v", l)
		}
	}
	// Two pins whose gaps differ by 1 mm (a bearing stands proud by so much) and one length of spacer
	// without washers: no height suits both.
	bearing := bolt("B", "M4")
	bearing.Kind, bearing.Bearing, bearing.Seats, bearing.Washer = job.BearingPin, "MR104ZZ", []string{"a"}, "none"
	plain := bolt("A", "M4")
	plain.Washer = "none"
	links[1].pins, links[1].plane = []string{"A", "B"}, 3
	j := jobOf(links, []job.Pin{plain, bearing}, nil, sheet("s", 3.05, 3))
	j.Spacers = job.Spacers{Stock: true, Lengths: []float64{10}}
	if _, err := Build(j); err == nil || !strings.Contains(err.Error(), "which no stock length of spacer fills") || !strings.Contains(err.Error(), "say spacers: {from: tube}, or which lengths you can get") {
		t.Errorf("%v", err)
	}
	// A tube that is shorter than the spacer.
	j = jobOf(links, []job.Pin{bolt("A", "M4")}, nil, sheet("s", 3.05, 3))
	j.Spacers = job.Spacers{Tube: 2.5, Saw: 1}
	if _, err := Build(j); err == nil || !strings.Contains(err.Error(), "joint A: its spacer of 3 mm is longer than the tube of 2.5 mm: get longer tube") {
		t.Errorf("%v", err)
	}
}

// Standoffs between plates measured 4 mm on planes 0 and 3, a rocker of 3 mm between on plane 2: the plates are
// 9.4 mm apart by the planes (TestFrame). M3 standoffs come in 8 and 10, their washers are 0.5.
//
//	8 + 3 x 0.5 = 9.5: the upper screw goes through 3 washers on the standoff and one under its head: 4.1 +
//	4 x 0.55 + 3 = 9.3, M3x10, in by up to 10 - 3.9 - 4 x 0.45 = 4.3 of 4: no room (nor at 0.8 diameters: 8.7)
//	10 + 0: the pin would have 0.6 over its washer, too much play; with two washers 0.8 more: 10.2
//	10 + 1 x 0.5 = 10.5: two washers and 0.3 of play in the pin
//	screws: 4.1 + 0.55 + 3 = 7.65, M3x8 (7.71 at least), in by 8 - 3.9 - 0.45 = 3.65 of 5; the upper one with a washer
//	more 8.2, M3x10 in by 10 - 3.9 - 0.9 = 5.2: no room; at 0.8 diameters 7.6: M3x8
func TestStandoffs(t *testing.T) {
	frame := &job.Frame{Stock: "f", Plates: []job.FramePlate{{Name: "back", Plane: 0, Pivots: []string{"G"}}, {Name: "front", Plane: 3, Pivots: []string{"G"}}}}
	frame.Standoffs = &job.Standoffs{At: []outline.Point{{X: 10}, {X: 20}}, Bolt: "M3", Fit: "medium"}
	links := []at{{name: "rocker", stock: "s", plane: 2, pins: []string{"G", "B"}}}
	j := jobOf(links, []job.Pin{bolt("G", "M4")}, frame, sheet("s", 3.05, 3), sheet("f", 4.05, 4))
	s, err := Standoffs(j)
	if err != nil {
		t.Fatal(err)
	}
	if s.Length != 10 || s.Washers != 1 || !near(s.From, 4) || !near(s.To, 14.5) || s.Screws != [2]string{"ISO 4762 M3x8", "ISO 4762 M3x8"} {
		t.Errorf("%+v", s)
	}
	if d, err := Between(j, "back", "front"); err != nil || !near(d, 10.5) {
		t.Errorf("%g mm between the plates (%v)", d, err)
	}
	if k := build(t, j)[0]; !near(k.Play, EndPlay+0.3) {
		t.Errorf("play %g: %s", k.Play, brief(k))
	}
	// The front plate two planes higher.
	frame.Plates[1].Plane = 5
	if s, err = Standoffs(j); err != nil {
		t.Fatal(err)
	}
	levels, _ := Levels(j)
	apart := levels[len(levels)-1].From - 4
	if !near(s.To-s.From, apart) || !near(s.Length+float64(s.Washers)*0.5, apart) || s.Designation != "hexagon standoff M3" {
		t.Errorf("%+v, the plates are %g mm apart", s, apart)
	}
	checkKits(t, j, build(t, j), levels)
	checkList(t, j, build(t, j))
	// A size that there is not, and a third plate.
	frame.Standoffs.Bolt = "M10"
	if _, err := Build(j); err == nil || !strings.Contains(err.Error(), `unknown standoff "M10"`) {
		t.Errorf("%v", err)
	}
	frame.Plates = append(frame.Plates, job.FramePlate{Name: "far", Plane: 9})
	if _, err := Build(j); err == nil || !strings.Contains(err.Error(), "the frame has 3: take cross members instead") {
		t.Errorf("%v", err)
	}
}

// What cannot be.
func TestKindsRefused(t *testing.T) {
	three := []at{
		{name: "crank", stock: "s", plane: 1, pins: []string{"A", "B"}},
		{name: "coupler", stock: "s", plane: 2, pins: []string{"A", "C"}},
		{name: "leg", stock: "s", plane: 3, pins: []string{"A", "D"}},
	}
	sleeve := func(f func(*job.Pin)) job.Pin {
		p := bolt("A", "M4")
		p.Kind, p.Sleeve, p.Seats, p.Fit = job.SleevePin, 6, []string{"coupler", "leg"}, "running"
		f(&p)
		return p
	}
	clamp := func(f func(*job.Pin)) job.Pin {
		p := bolt("A", "M4")
		p.Kind, p.Clamped = job.ClampPin, "crank"
		f(&p)
		return p
	}
	rod := func(f func(*job.Pin)) job.Pin {
		p := bolt("D", "M5")
		p.Kind, p.RodEnd = job.RodEndPin, job.NutSide
		f(&p)
		return p
	}
	bearing := func(name, washer, in string) job.Pin {
		p := bolt("D", "M4")
		p.Kind, p.Bearing, p.Seats, p.Washer = job.BearingPin, name, []string{in}, washer
		return p
	}
	for _, c := range []struct {
		pin  job.Pin
		want string
	}{
		{sleeve(func(p *job.Pin) { p.Seats = p.Seats[:1] }), "joint A: the bolt clamps crank and leg together, and they could not turn on each other: give one of them a sleeve too (in: [coupler, leg])"},
		{sleeve(func(p *job.Pin) { p.Sleeve = 4.5 }), "leaves a wall of 0.25 mm: take a sleeve of at least 5 mm"},
		{sleeve(func(p *job.Pin) { p.Sleeve = 8.5 }), "with washer ISO 7089 4 of 9 mm nothing keeps the links on a sleeve of 8.5 mm: say washer: large"},
		{sleeve(func(p *job.Pin) { p.Washer = "none" }), "without washers nothing keeps the links on a sleeve"},
		{sleeve(func(p *job.Pin) { p.Nut = "none" }), "a sleeve is clamped by a nut: say nut: lock"},
		{sleeve(func(p *job.Pin) { p.Seats = nil }), "no part is named that turns on the sleeve"},
		{sleeve(func(p *job.Pin) { p.Seats = []string{"rocker"} }), "rocker is to turn on the sleeve, and is not on this joint"},
		{clamp(func(p *job.Pin) { p.Clamped = "coupler" }), "coupler lies between crank and leg, and no nut can be reached there"},
		{clamp(func(p *job.Pin) { p.Clamped = "rocker" }), "the bolt is to be clamped to rocker, which is not on this joint"},
		{clamp(func(p *job.Pin) { p.Nut = "none" }), "a bolt is clamped to a link by nuts"},
		{clamp(func(p *job.Pin) { p.Joint, p.Clamped = "B", "crank" }), "the bolt is clamped to crank, and nothing turns on it"},
		{rod(func(p *job.Pin) { p.RodEnd = "" }), `the side of the rod end is ""`},
		{rod(func(p *job.Pin) { p.Bolt = "M2" }), "unknown rod end for a bolt of"},
		{rod(func(p *job.Pin) { p.Bolt = "#8" }), "rod end for bolt #8"},
		{rod(func(p *job.Pin) { p.Nut = "none" }), "the ball of a rod end is clamped by a nut"},
		{rod(func(p *job.Pin) { p.Washer = "none" }), "the eye of the rod end rubs on the link"},
		{rod(func(p *job.Pin) { p.Joint = "A" }), "could not turn on each other"},
		// 2 mm of sheet hold 40 % of a 624 (5 mm, ISO 15).
		{bearing("624", "small", "leg"), "bearing 624 is 5 mm wide and leg 2 mm thick: the seat holds 40 % of the ring, and it wants half: take a thinner bearing of that bore (604)"},
	} {
		stock := sheet("s", 3.05, 3)
		if c.pin.Kind == job.BearingPin {
			stock = sheet("s", 2.05, 2)
		}
		_, err := Build(jobOf(three, []job.Pin{c.pin}, nil, stock))
		if err == nil || !strings.Contains(err.Error(), c.want) {
			t.Errorf("%v\n want %s", err, c.want)
		}
	}
	// A 684 (2.5 mm wide, 9 mm outside, ISO 15) in 6 mm of sheet: a large washer (12 mm) does not go into its
	// hole; the washer is exchanged for a small one (8 mm), which does.
	j := jobOf(three, []job.Pin{bearing("684", "large", "leg")}, nil, sheet("s", 6.05, 6))
	if k := build(t, j)[0]; !strings.Contains(brief(k), "ISO 7092 4") {
		t.Errorf("%s", brief(k))
	}
	// MR74 (7 mm outside, 2 mm wide): even the small one does not.
	j.Pins[0].Bearing = "MR74"
	if _, err := Build(j); err == nil || !strings.Contains(err.Error(), "does not go into its hole of 7 mm") {
		t.Errorf("%v", err)
	}
}

// The job with every kind of pin, from the file to the list.
func TestKindsFile(t *testing.T) {
	j, err := job.Read("../../testdata/jobs/kinds.yaml")
	if err != nil {
		t.Fatal(err)
	}
	kits := build(t, j)
	levels, err := Levels(j)
	if err != nil {
		t.Fatal(err)
	}
	checkKits(t, j, kits, levels)
	checkList(t, j, kits)
	kinds := map[job.PinKind]bool{}
	for _, k := range kits {
		kinds[k.Pin.Kind] = true
	}
	if len(kinds) != 5 {
		t.Errorf("%v", kinds)
	}
	// Washers M4 by hand: A 4 (head, either side of the thin nut, nut), B 4 (head, either side of the spacer, nut), each
	// twice; standoffs 4 with two heads each and what lies on them.
	s, err := Standoffs(j)
	if err != nil {
		t.Fatal(err)
	}
	lines := List(j, kits)
	i := slices.IndexFunc(lines, func(l Line) bool { return l.Designation == "ISO 7089 4" })
	if want := 2*(4+4) + 4*(2+s.Washers); lines[i].Need != want || fmt.Sprint(lines[i].Joints) != "[A B frame]" {
		t.Errorf("%+v, want %d", lines[i], want)
	}
}

// Acrylic that turns on acrylic wants something between: said once, with the joints.
func TestLowFriction(t *testing.T) {
	one, two := bolt("A", "M4"), bolt("B", "M4")
	one.Washer, two.Washer = "none", "none"
	links := []at{{name: "a", stock: "s", plane: 1, pins: []string{"A", "B"}}, {name: "b", stock: "s", plane: 2, pins: []string{"A", "B"}}}
	j := jobOf(links, []job.Pin{one, two}, nil, sheet("s", 3.05, 3))
	lines := List(j, build(t, j))
	if l := lines[len(lines)-1]; l.Designation != "washers of low friction" || l.Buy != 1 || !slices.Equal(l.Joints, []string{"A", "B"}) {
		t.Errorf("%+v", l)
	}
	j.Stock[0].Material = "birch plywood"
	for _, l := range List(j, build(t, j)) {
		if l.Kind == ConsumableLine {
			t.Errorf("%+v", l)
		}
	}
}
