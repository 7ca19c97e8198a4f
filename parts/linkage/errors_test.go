package linkage

import (
	"errors"
	"math"
	"strings"
	"testing"
)

// TestBrokenLinkages: what a maker reads when a linkage is wrong.
func TestBrokenLinkages(t *testing.T) {
	full := Drive{Link: "crank", To: 2 * math.Pi, Full: true}
	base := func() Linkage {
		return Linkage{
			Joints: []Joint{{Name: "O", Ground: ground(0, 0)}, {Name: "D", Ground: ground(100, 0)}, {Name: "A", Near: pt(40, 0)}, {Name: "B", Near: pt(137, 71)}},
			Links:  []Link{bar2("crank", "O", "A", 40), bar2("coupler", "A", "B", 120), bar2("rocker", "D", "B", 80)},
			Drive:  full,
		}
	}
	for _, c := range []struct {
		name string
		make func(*Linkage)
		want []string // all of them, in one error
	}{
		{"empty", func(l *Linkage) { *l = Linkage{} }, []string{"linkage is empty"}},
		{"nameless joint", func(l *Linkage) { l.Joints[3].Name = "" }, []string{"joint 4 has no name", "link coupler: there is no joint B"}},
		{"joint twice", func(l *Linkage) { l.Joints[3].Name = "A" }, []string{"joint A is there twice"}},
		{"near nowhere", func(l *Linkage) { l.Joints[3].Near = pt(math.NaN(), 0) }, []string{"joint B: near is not a place"}},
		{"ground nowhere", func(l *Linkage) { l.Joints[0].Ground = ground(math.Inf(1), 0) }, []string{"joint O: ground (+Inf, 0) is not a place"}},
		{"no ground", func(l *Linkage) { l.Joints[0].Ground, l.Joints[1].Ground = nil, nil }, []string{"no joint is ground", "drive: link crank has no ground pin"}},
		{"range of no length", func(l *Linkage) { l.Joints[1].Ground.Range = &Range{From: Point{X: 100}, To: Point{X: 100}} }, []string{"joint D: its range has no length"}},
		{"set off its range", func(l *Linkage) {
			l.Joints[1].Ground.Range = &Range{From: Point{X: 90, Y: 5}, To: Point{X: 110, Y: 5}}
		}, []string{"joint D: it is set at (100, 0), 5 mm off its range: set it on the range"}},
		{"range with nonsense", func(l *Linkage) { l.Joints[1].Ground.Range = &Range{Radius: math.NaN()} }, []string{"joint D: its range has a figure that is no number"}},
		{"nameless link", func(l *Linkage) { l.Links[1].Name = "" }, []string{"link 2 has no name"}},
		{"link twice", func(l *Linkage) { l.Links[1].Name = "rocker" }, []string{"link rocker is there twice"}},
		{"one pin", func(l *Linkage) { l.Links[1].Pins = []string{"A"} }, []string{"link coupler: it has 1 pins: a link wants at least two"}},
		{"pin twice", func(l *Linkage) { l.Links[1].Pins = []string{"A", "A"} }, []string{"link coupler: pin A is there twice"}},
		{"unknown pin", func(l *Linkage) { l.Links[1].Pins[1] = "Z" }, []string{"link coupler: there is no joint Z"}},
		{"two ground pins", func(l *Linkage) { l.Links[1].Pins = []string{"O", "D"} }, []string{"link coupler: O and D are both ground, so it cannot move"}},
		{"length to a stranger", func(l *Linkage) { l.Links[1].Lengths[0].B = "D" }, []string{"link coupler: length A-D: D is not one of its pins (A, B)"}},
		{"length to itself", func(l *Linkage) { l.Links[1].Lengths[0].B = "A" }, []string{"link coupler: length A-A is from a pin to itself"}},
		{"length of nothing", func(l *Linkage) { l.Links[1].Lengths[0].MM = 0 }, []string{"link coupler: length A-B is 0 mm: it must be more than 0"}},
		{"negative length", func(l *Linkage) { l.Links[1].Lengths[0].MM = -3 }, []string{"length A-B is -3 mm: it must be more than 0"}},
		{"length beyond reason", func(l *Linkage) { l.Links[1].Lengths[0].MM = 2e6 }, []string{"length A-B is 2000000 mm: a length is from 0.001 mm"}},
		{"length twice", func(l *Linkage) { l.Links[1].Lengths = append(l.Links[1].Lengths, Length{"B", "A", 121}) }, []string{"length B-A is given twice, 120 mm and 121 mm: keep one"}},
		{"no lengths", func(l *Linkage) { l.Links[1].Lengths = nil }, []string{"link coupler: 2 pins want 1 lengths to fix the shape, 0 given"}},
		{"loose joint", func(l *Linkage) { l.Joints = append(l.Joints, Joint{Name: "P"}) }, []string{"joint P is in no link"}},
		{"no triangle", func(l *Linkage) {
			l.Joints = append(l.Joints, Joint{Name: "P"})
			l.Links[1] = tri("coupler", "A", "B", "P", 120, 50, 60)
		}, []string{"link coupler: lengths P-A 60 mm, P-B 50 mm and A-B 120 mm make no triangle: A-B is 10 mm longer than the other two together"}},
		{"four pins, five lengths in the wrong places", func(l *Linkage) {
			l.Joints = append(l.Joints, Joint{Name: "P"}, Joint{Name: "Q"})
			l.Links[1] = Link{Name: "coupler", Pins: []string{"A", "B", "P", "Q"}, Lengths: []Length{{"A", "B", 120}, {"A", "P", 70}, {"B", "P", 70}, {"A", "Q", 60}}}
		}, []string{"link coupler: 4 pins want 5 lengths to fix the shape, 4 given"}},
		{"redundant length that is wrong", func(l *Linkage) {
			l.Joints = append(l.Joints, Joint{Name: "P"}, Joint{Name: "Q"})
			l.Links[1] = Link{Name: "coupler", Pins: []string{"A", "B", "P", "Q"}, Lengths: []Length{
				{"A", "B", 120}, {"A", "P", 100}, {"B", "P", 100}, {"A", "Q", 100}, {"B", "Q", 100}, {"P", "Q", 155},
			}}
		}, []string{"link coupler: length Q-P 155 mm does not agree with the others, which make it 160 mm"}},
		{"no drive", func(l *Linkage) { l.Drive.Link = "" }, []string{"drive: no link is driven"}},
		{"unknown drive", func(l *Linkage) { l.Drive.Link = "motor" }, []string{"drive: there is no link motor"}},
		{"drive without ground", func(l *Linkage) { l.Drive.Link = "coupler" }, []string{"drive: link coupler has no ground pin to turn about"}},
		{"drive of nothing", func(l *Linkage) { l.Drive = Drive{Link: "crank", From: 1, To: 1} }, []string{"drive: it turns from 57.2958 deg to 57.2958 deg, which is nothing"}},
		{"drive of two turns", func(l *Linkage) { l.Drive = Drive{Link: "crank", To: 13} }, []string{"at most a full turn is solved"}},
		{"drive to nowhere", func(l *Linkage) { l.Drive.To = math.NaN() }, []string{"drive: its angles are not numbers"}},
		{"trace of a stranger", func(l *Linkage) { l.Trace = []string{"Z", "O", "B", "B"} }, []string{"trace: there is no joint Z", "trace: joint O is ground", "trace: joint B is there twice"}},
		{"never closes", func(l *Linkage) { l.Links[1].Lengths[0].MM = 20; l.Links[2].Lengths[0].MM = 20 }, []string{"joint B: coupler and rocker do not meet at drive angle 0 deg, short by 20 mm", "closes at no drive angle that was tried"}},
		{"closes elsewhere", func(l *Linkage) { l.Links[1].Lengths[0].MM = 250 }, []string{"joint B: coupler and rocker do not meet at drive angle 0 deg, short by 110 mm at 0 deg (A and D are only 60 mm apart there, coupler and rocker cannot fold below 170 mm); it closes at no drive angle"}},
		{"too free", func(l *Linkage) {
			l.Joints = append(l.Joints, Joint{Name: "C"})
			l.Links[2] = bar2("rocker", "C", "B", 80)
			l.Links = append(l.Links, bar2("last", "D", "C", 30))
		}, []string{"mobility is 2, wanted 1: joints B and C are still free with the drive held: add a link there"}},
		{"hanging bar", func(l *Linkage) {
			l.Joints = append(l.Joints, Joint{Name: "P"})
			l.Links = append(l.Links, bar2("tail", "B", "P", 30))
		}, []string{"mobility is 2, wanted 1: joint P is still free with the drive held"}},
		{"locked", func(l *Linkage) {
			l.Joints = append(l.Joints, Joint{Name: "G", Ground: ground(50, 90)})
			l.Links = append(l.Links, bar2("strut", "G", "B", 90))
		}, []string{"mobility is 0, wanted 1: coupler, rocker and strut hold each other twice, and strut would have to stretch by"}},
		{"free here, locked there", func(l *Linkage) {
			l.Joints = append(l.Joints, Joint{Name: "G", Ground: ground(50, 90)}, Joint{Name: "P"})
			l.Links = append(l.Links, tri("strut", "G", "B", "P", 90, 30, 80), bar2("tail", "A", "P", 30))
			l.Joints = append(l.Joints, Joint{Name: "Q"})
			l.Links = append(l.Links, bar2("end", "P", "Q", 10))
		}, []string{"joint Q is still free", "hold each other twice"}},
		{"stops half-way", func(l *Linkage) { l.Links[2].Lengths[0].MM = 50 }, []string{
			"joint B: coupler and rocker do not meet at drive angle 0 deg, short by 10 mm at 0 deg (A and D are only 60 mm apart there, coupler and rocker cannot fold below 70 mm); it closes from 33.1229 deg to 326.8771 deg: drive it there or change a length",
		}},
		{"starts in line", func(l *Linkage) {
			*l = fourBar(40, 60, 40, 60, 1)
			l.Drive = full
		}, []string{"joint B: coupler and rocker lie in line at the start of the drive, 0 deg", "start the drive a little earlier or later"}},
		{"does not come back", func(l *Linkage) {
			*l = fourBar(40, 60, 60, 40, 1) // a kite: its rocker turns half while the crank turns once
			l.Joints[3].Near = pt(98, 15)
		}, []string{"joint B: after a full turn it is", "change to another assembly at drive angle 360 deg"}},
		{"pivots come together at a step", func(l *Linkage) {
			*l = fourBar(40, 60, 60, 40, 1)
			l.Joints[3].Near = pt(98, 15)
			l.Drive = Drive{Link: "crank", From: math.Pi, To: 3 * math.Pi}
		}, []string{"joint B: coupler and rocker do not meet at drive angle 360 deg (A and D come together there, so that B may swing about them)"}},
		{"range too long", func(l *Linkage) { l.Joints[1].Ground.Range = &Range{From: Point{X: 100}, To: Point{X: 240}} }, []string{
			"pivot D works only from (100, 0) to (160, 0) of its range: shorten the range to that; beyond: joint B: coupler and rocker do not meet",
		}},
	} {
		t.Run(c.name, func(t *testing.T) {
			l := base()
			c.make(&l)
			r, err := Analyse(l, Options{Steps: 72})
			if err == nil {
				t.Fatalf("no error; report %+v", r)
			}
			for _, w := range c.want {
				if !strings.Contains(err.Error(), w) {
					t.Errorf("got  %v\nwant %s", err, w)
				}
			}
		})
	}
}

// TestWhereTheLoopStops: a four-bar that is not Grashof stops where coupler and rocker are in line,
// which the law of cosines gives.
func TestWhereTheLoopStops(t *testing.T) {
	l, _ := load(t, "fourbar.json")
	l.Links[2].Lengths[0].MM = 50 // rocker
	l.Drive.From = rad(40)        // the crank's tip must be within 170 of D, and not within 70
	l.Drive.To = rad(400)
	m, err := New(l)
	if err != nil {
		t.Fatal(err)
	}
	_, err = m.Cycle(100, nil)
	var e *LoopError
	if !errors.As(err, &e) {
		t.Fatal(err)
	}
	low := math.Acos((40*40 + 100*100 - 70*70) / (2 * 40 * 100.0)) // |AD| = 70: the rocker folds onto the coupler
	if len(e.Ranges) != 1 {
		t.Fatalf("ranges %v", e.Ranges)
	}
	near(t, "stops going back", e.Ranges[0].From, low, 1e-6)
	near(t, "stops going on", e.Ranges[0].To, 2*math.Pi-low, 1e-6)
	if e.Joint != "B" || e.Short < 9.9 || e.Short > 10+1e-9 { // crank along the ground line: |AD| = 60
		t.Errorf("joint %s short by %g, want B and 10", e.Joint, e.Short)
	}
}

func TestAmbiguity(t *testing.T) {
	l, _ := load(t, "fourbar.json")
	for i := range l.Joints {
		l.Joints[i].Near = nil
	}
	m, err := New(l)
	if err != nil {
		t.Fatal(err)
	}
	a := m.Ambiguity()
	if a == nil || a.Ways != 2 {
		t.Fatalf("ambiguity %v, want two ways", a)
	}
	if s := a.String(); !strings.Contains(s, "joint B was taken at") || !strings.Contains(s, "give it a near place") {
		t.Error(s)
	}
}

// TestNearMustDecide: a near place about half-way between two assemblies does not say which.
func TestNearMustDecide(t *testing.T) {
	for _, c := range []struct {
		y         float64
		ambiguous bool
	}{{5, true}, {40, false}} {
		l, _ := load(t, "fourbar.json")
		for i := range l.Joints {
			l.Joints[i].Near = nil
		}
		l.Joints[3].Near = pt(137, c.y) // the assemblies have B at (137, 71) and (137, -71)
		m, err := New(l)
		if err != nil {
			t.Fatal(err)
		}
		if got := m.Ambiguity() != nil; got != c.ambiguous {
			t.Errorf("near at y = %g: ambiguity %v, want %v", c.y, m.Ambiguity(), c.ambiguous)
		}
		if b := m.start.p[3]; b.Y < 0 {
			t.Errorf("near at y = %g: took %v", c.y, b)
		}
	}
}
