package linkage

import (
	"errors"
	"strings"
	"testing"
)

func table(c *Cycle) (joints []string, samples [][]Point) {
	for _, j := range c.m.linkage.Joints {
		joints = append(joints, j.Name)
	}
	for _, p := range c.Positions {
		samples = append(samples, append([]Point(nil), p.Places...))
	}
	return joints, samples
}

// TestRecover: lengths come back from the joint places of a solved cycle, and solve to the same cycle.
func TestRecover(t *testing.T) {
	for _, file := range []string{"jansen.json", "chebyshev.json", "stephenson.json"} {
		l, _ := load(t, file)
		c := cycleOf(t, l, 48)
		joints, samples := table(c)
		links, err := Recover(l.Links, joints, samples, 1e-6)
		if err != nil {
			t.Fatal(err)
		}
		for i, k := range links {
			given := map[[2]string]float64{}
			for _, g := range l.Links[i].Lengths {
				given[[2]string{g.A, g.B}], given[[2]string{g.B, g.A}] = g.MM, g.MM
			}
			if len(k.Lengths) != 2*len(k.Pins)-3 {
				t.Errorf("%s: %d lengths", k.Name, len(k.Lengths))
			}
			for _, g := range k.Lengths {
				near(t, file+" "+g.A+"-"+g.B, g.MM, given[[2]string{g.A, g.B}], 1e-10)
			}
		}
		again := l
		again.Links = links
		d := cycleOf(t, again, 48)
		for k := range c.Positions {
			if !samePlaces(c.Positions[k].Places, d.Positions[k].Places, 1e-8) {
				t.Fatalf("%s: step %d differs", file, k)
			}
		}
	}
}

func TestRecoverRounded(t *testing.T) {
	l, _ := load(t, "chebyshev.json")
	c := cycleOf(t, l, 48)
	joints, samples := table(c)
	for _, s := range samples {
		for i := range s {
			s[i].X = float64(int(s[i].X*100)) / 100 // two decimals, cut off
		}
	}
	links, err := Recover(l.Links, joints, samples, 0.05)
	if err != nil {
		t.Fatal(err)
	}
	got := links[1].Lengths // A-B, A-P, B-P on one line
	near(t, "straight", got[0].MM+got[2].MM, got[1].MM, 1e-12)
}

func TestRecoverErrors(t *testing.T) {
	l, _ := load(t, "fourbar.json")
	c := cycleOf(t, l, 12)
	joints, samples := table(c)
	b, _ := c.m.Joint("B")
	samples[7][b].X += 0.3
	_, err := Recover(l.Links, joints, samples, 0.01)
	var e *StretchError
	if !errors.As(err, &e) || e.Link != "coupler" || e.MaxAt != 7 && e.MinAt != 7 {
		t.Fatalf("got %v", err)
	}
	if s := err.Error(); !strings.Contains(s, "link coupler: A-B is not constant: 120") || !strings.Contains(s, "with 0.01 mm allowed") || !strings.Contains(s, "link rocker: D-B") {
		t.Error(s)
	}
	for want, f := range map[string]func() error{
		"it has no samples":                       func() error { _, err := Recover(l.Links, joints, nil, 1); return err },
		"sample 1 has 1 places for 5 joints":      func() error { _, err := Recover(l.Links, joints, [][]Point{{{}}}, 1); return err },
		"link crank: joint A is not in the table": func() error { _, err := Recover(l.Links, []string{"O"}, [][]Point{{{}}}, 1); return err },
	} {
		if err := f(); err == nil || !strings.Contains(err.Error(), want) {
			t.Errorf("got %v, want %s", err, want)
		}
	}
}
