package linkage

import (
	"errors"
	"math"
	"strings"
	"testing"
)

func adjustable(t testing.TB) Linkage {
	l, _ := load(t, "chebyshev.json")
	l.Joints[1].Ground.Range = &Range{From: Point{X: 40, Y: -2}, To: Point{X: 40, Y: 3}}
	return l
}

// TestAdjustablePivot: a setting gives the same motion as a linkage built with the pivot there.
func TestAdjustablePivot(t *testing.T) {
	m, err := New(adjustable(t))
	if err != nil {
		t.Fatal(err)
	}
	for _, s := range []float64{0, 0.25, 0.4, 1} {
		c, err := m.Cycle(45, Setting{"C": s})
		if err != nil {
			t.Fatal(err)
		}
		l, _ := load(t, "chebyshev.json")
		l.Joints[1].Ground.At = Point{X: 40, Y: -2 + 5*s}
		d := cycleOf(t, l, 45)
		for k, p := range c.Positions {
			if !samePlaces(p.Places, d.Positions[k].Places, 1e-10) {
				t.Fatalf("setting %g differs at step %d", s, k)
			}
		}
	}
	r, err := m.Analyse(Options{Settings: 5, Steps: 90})
	if err != nil {
		t.Fatal(err)
	}
	if len(r.Settings) != 5 {
		t.Fatalf("%d settings reported, want 5", len(r.Settings))
	}
	for i, s := range r.Settings {
		if s.Err != nil || len(s.Paths) != 1 || s.Closure > 1e-10 {
			t.Errorf("setting %d: %+v", i, s)
		}
		if want := float64(i) / 4; s.Setting["C"] != want {
			t.Errorf("setting %d is %v, want %g", i, s.Setting, want)
		}
	}
	// The set place is at 0.4 of the range.
	set, _ := m.Cycle(90, Setting{"C": 0.4})
	p, _ := set.FootPath("P", nil)
	near(t, "stride as set", r.Set.Paths[0].Stride, p.Stride, 1e-10)

	for s, want := range map[string]string{"Z": "no joint Z", "O": "O is not an adjustable pivot"} {
		if _, err := m.Cycle(9, Setting{s: 0.5}); err == nil || !strings.Contains(err.Error(), want) {
			t.Errorf("got %v, want %s", err, want)
		}
	}
	if _, err := m.Cycle(9, Setting{"C": 1.5}); err == nil || !strings.Contains(err.Error(), "outside 0 to 1") {
		t.Errorf("got %v", err)
	}
}

// TestAdjustableTriad carries a block along the range of its pivot.
func TestAdjustableTriad(t *testing.T) {
	l, _ := load(t, "stephenson.json")
	l.Joints[1].Ground.Range = &Range{Centre: Point{}, Radius: 10, Start: math.Pi, End: 2 * math.Pi}
	l.Joints[1].Ground.At = Point{X: 10}
	l.Joints[1].Ground.Range.Centre = Point{}
	l.Links[2].Lengths[0].MM = 60
	m, err := New(l)
	if err != nil {
		t.Fatal(err)
	}
	for _, s := range []float64{0, 0.3, 0.8, 1} {
		c, err := m.Cycle(36, Setting{"G": s})
		if err != nil {
			t.Fatal(err)
		}
		if x := c.Closure(); x > 1e-10 {
			t.Errorf("closure %g", x)
		}
		g, _ := m.Joint("G")
		want := Point{X: 10 * math.Cos(math.Pi*(1+s)), Y: 10 * math.Sin(math.Pi*(1+s))}
		if d := dist(c.Positions[0].Places[g], want); d > 1e-12 {
			t.Errorf("pivot is %g mm off its setting", d)
		}
	}
}

// TestGapInRange: both ends of a range work and the middle does not; the check between them tells.
func TestGapInRange(t *testing.T) {
	l, _ := load(t, "fourbar.json")
	// D on a line past O: near the middle the ground is too short for the crank to turn.
	l.Joints[1].Ground.Range = &Range{From: Point{X: 100}, To: Point{X: -100, Y: 1}}
	_, err := Analyse(l, Options{Settings: 2, Steps: 36})
	if err == nil || !strings.Contains(err.Error(), "pivot D works only from (100, 0) to (80,") {
		t.Errorf("got %v", err)
	}
}

// TestNarrowGapInRange: the range dips below the shortest ground over a fortieth of its length.
func TestNarrowGapInRange(t *testing.T) {
	l, _ := load(t, "fourbar.json")
	l.Joints[1].Ground = &Ground{At: Point{X: 79.99, Y: 70}, Range: &Range{From: Point{X: 79.99, Y: -50}, To: Point{X: 79.99, Y: 70}}}
	l.Joints[3].Near, l.Joints[4].Near = nil, nil
	r, err := Analyse(l, Options{Settings: 2, Steps: 36})
	var e *RangeError
	if !errors.As(err, &e) {
		t.Fatalf("got %v", err)
	}
	near(t, "lower end that works", e.A.Y, math.Sqrt(80*80-79.99*79.99), 1e-3)
	near(t, "upper end", e.B.Y, 70, 1e-9)
	if len(r.Settings) != 2 || r.Settings[0].Err != nil || r.Settings[1].Err != nil {
		t.Errorf("settings %+v: both ends work", r.Settings)
	}
}

func TestRange(t *testing.T) {
	line := Range{From: Point{X: 1}, To: Point{X: 5, Y: 3}}
	arc := Range{Centre: Point{X: 1, Y: 2}, Radius: 4, Start: -1, End: 2}
	for _, r := range []Range{line, arc} {
		for _, u := range []float64{0, 0.2, 0.5, 1} {
			got, away := r.Nearest(r.Place(u))
			near(t, "parameter", got, u, 1e-12)
			near(t, "away", away, 0, 1e-12)
		}
	}
	near(t, "length of the line", line.Length(), 5, 1e-12)
	near(t, "length of the arc", arc.Length(), 12, 1e-12)
	if u, away := arc.Nearest(Point{X: 1 + 6*math.Cos(2.2), Y: 2 + 6*math.Sin(2.2)}); u != 1 || away < 2 {
		t.Errorf("beyond the arc's end: %g, %g", u, away)
	}
}
