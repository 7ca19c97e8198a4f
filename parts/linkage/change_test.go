package linkage

import (
	"math"
	"testing"
)

// TestParallelogram: a change-point linkage goes on without a jump through its flat positions, and
// its third crank is recognised as saying nothing new.
func TestParallelogram(t *testing.T) {
	l, _ := load(t, "parallelogram.json")
	m, err := New(l)
	if err != nil {
		t.Fatal(err)
	}
	if m.gruebler != 0 || m.rankMobility(m.start.p) != 1 {
		t.Errorf("mobility %d by counting and %d by rank, want 0 and 1", m.gruebler, m.rankMobility(m.start.p))
	}
	for _, steps := range []int{1, 2, 4, 7, 36, 37, 360, 1001} {
		c, err := m.Cycle(steps, nil)
		if err != nil {
			t.Fatal(steps, err)
		}
		for _, p := range c.Positions {
			a, b := p.Places[3], p.Places[4]
			if d := dist(b, Point{X: a.X + 60, Y: a.Y}); d > 1e-6 { // 1e-6 at the flat position itself, where a side step costs nothing in length
				t.Fatalf("%d steps: at %g deg the platform is %g mm off being level", steps, deg(p.Angle), d)
			}
			if d := dist(p.Speeds[3], p.Speeds[4]); d > 1e-3 { // in line itself the speed is that of 1e-5 radians before
				t.Fatalf("%d steps: at %g deg the speeds differ by %g", steps, deg(p.Angle), d)
			}
		}
		if x := c.Closure(); x > 1e-10 {
			t.Errorf("%d steps: closure %g", steps, x)
		}
		if len(c.Changes) != 2 {
			t.Fatalf("%d steps: change points %v, want two", steps, c.Changes)
		}
		near(t, "first change point", deg(c.Changes[0].Angle), 180, 1e-4)
		near(t, "second change point", deg(c.Changes[1].Angle), 360, 1e-4)
	}
	r, err := m.Analyse(Options{Steps: 90})
	if err != nil {
		t.Fatal(err)
	}
	if len(r.Surplus) != 1 || r.Surplus[0] != "third" {
		t.Errorf("surplus links %v, want [third]", r.Surplus)
	}
	flips := 0
	for _, g := range r.Set.Toggles {
		if g.Kind == Flip {
			flips++
		}
	}
	if flips != 2 {
		t.Errorf("toggles %+v, want two change points", r.Set.Toggles)
	}

	// A third crank of another length cannot turn.
	l.Links[2].Lengths[0].MM = 25.01
	m, err = New(l)
	if err != nil {
		t.Fatal(err)
	}
	_, err = m.Cycle(36, nil)
	e, ok := err.(*MobilityError)
	if !ok || e.Mobility != 0 {
		t.Fatalf("got %v, want a mobility error", err)
	}
	near(t, "stretch", e.Stretch, 0.01, 1e-9)
}

// TestNearMiss: a hair off the parallelogram the linkage has no change point and must keep its side,
// although it whips through the nearly flat position.
func TestNearMiss(t *testing.T) {
	for _, off := range []float64{1e-2, 1e-4, 1e-6} {
		// Crank shortest by off: a Grashof crank-rocker that passes close by the flat position.
		l := fourBar(30-off, 60, 30, 60, 1)
		l.Drive.From, l.Drive.To = math.Pi/2, math.Pi/2+2*math.Pi
		l.Joints[3].Near = pt(60, 30)
		m, err := New(l)
		if err != nil {
			t.Fatal(err)
		}
		c, err := m.Cycle(45, nil)
		if err != nil {
			t.Fatal(off, err)
		}
		if len(c.Changes) != 0 {
			t.Errorf("%g mm off: change points %v, want none", off, c.Changes)
		}
		side := 0.0
		for _, p := range c.Positions {
			s := cross(sub(p.Places[1], p.Places[2]), sub(p.Places[3], p.Places[2]))
			if s*side < 0 {
				t.Fatalf("%g mm off: changed sides at %g deg", off, deg(p.Angle))
			}
			side = s
		}
		// The rocker of a crank-rocker never passes the ground line.
		for _, p := range c.Positions {
			if p.Places[3].Y < 0 {
				t.Fatalf("%g mm off: the rocker turned through at %g deg", off, deg(p.Angle))
			}
		}
	}
}

// TestNarrowGap: a loop that is open over a few hundredths of a degree is found, however coarse the
// steps.
func TestNarrowGap(t *testing.T) {
	l := fourBar(30, 60, 30, 60-1e-6, 1) // 1e-6 mm too short a ground: coupler and rocker reach past each other nowhere but at 180 deg
	l.Links[1].Lengths[0].MM = 60 - 2e-6
	l.Drive = Drive{Link: "crank", From: math.Pi / 2, To: 3 * math.Pi / 2}
	l.Joints[3].Near = pt(60, 30)
	m, err := New(l)
	if err != nil {
		t.Fatal(err)
	}
	for _, steps := range []int{2, 3, 50} {
		_, err = m.Cycle(steps, nil)
		e, ok := err.(*LoopError)
		if !ok {
			t.Fatalf("%d steps: got %v, want a loop that does not close", steps, err)
		}
		// |AD| = 90 - 2e-6 by the law of cosines; the sine's smallness costs digits.
		d, r := 60-1e-6, 90-2e-6
		want := math.Acos((30*30 + d*d - r*r) / (2 * 30 * d))
		near(t, "stops at", e.Angle, want, 1e-6)
	}
}

// TestDoubledLinks: plies of the same link, bars and plates, say nothing new; a ply that differs is
// found.
func TestDoubledLinks(t *testing.T) {
	l, _ := load(t, "jansen.json")
	for _, n := range []int{0, 2, 3} { // crank, a rod, a plate
		k := l.Links[n]
		k.Name += "-back"
		l.Links = append(l.Links, k)
	}
	plate := &l.Links[len(l.Links)-1]
	plate.Lengths = append([]Length(nil), plate.Lengths...)
	m, err := New(l)
	if err != nil {
		t.Fatal(err)
	}
	r, err := m.Analyse(Options{Steps: 72})
	if err != nil {
		t.Fatal(err)
	}
	if len(r.Surplus) != 3 || r.Mobility != 1 || r.Gruebler >= 1 || r.Set.Closure > 1e-10 {
		t.Errorf("surplus %v, mobility %d by rank and %d by counting, closure %g", r.Surplus, r.Mobility, r.Gruebler, r.Set.Closure)
	}
	plate.Lengths[0].MM += 0.2
	if _, err = Analyse(l, Options{Steps: 72}); err == nil {
		t.Error("a ply that is 0.2 mm longer goes through")
	}
}

func TestDeadEnd(t *testing.T) {
	l, _ := load(t, "fourbar.json")
	l.Links[2].Lengths[0].MM = 50
	low := math.Acos((40*40 + 100*100 - 70*70) / (2 * 40 * 100.0))
	l.Drive = Drive{Link: "crank", From: math.Pi, To: low} // driven backwards into the dead end
	m, err := New(l)
	if err != nil {
		t.Fatal(err)
	}
	c, err := m.Cycle(50, nil)
	if err != nil {
		t.Fatal(err)
	}
	g := c.Toggles()
	if n := len(g); n == 0 || g[n-1].Kind != DeadEnd || g[n-1].Joint != "B" || math.Abs(g[n-1].Angle-low) > 1e-12 {
		t.Errorf("toggles %+v, want a dead end of B at %g", g, low)
	}
}

// TestReversals: the rocker of a crank-rocker turns back where crank and coupler are in line, which
// the law of cosines gives.
func TestReversals(t *testing.T) {
	l, _ := load(t, "fourbar.json")
	c := cycleOf(t, l, 50)
	var got []float64
	for _, g := range c.Toggles() {
		if g.Kind == Reversal && g.Joint == "D" {
			got = append(got, g.Angle)
		}
	}
	in := func(ob float64) float64 { return math.Acos((ob*ob + 100*100 - 80*80) / (2 * ob * 100)) }
	want := []float64{in(120 + 40), math.Pi + in(120-40)}
	if len(got) != 2 {
		t.Fatalf("reversals at %v, want two", got)
	}
	for i := range want {
		near(t, "reversal", got[i], want[i], 1e-10)
	}
}
