package interference

import (
	"math"
	"testing"

	"pinwright/parts/outline"
)

// Copies at other phases and mirrored ones, against brute force with package linkage: while the shaft
// turns by t, a copy stands at phase+t and a mirrored one, in its mirror, at phase-t.
func TestCopiesAgainstBruteForce(t *testing.T) {
	s, m := newSpace(t, load(t, "klann.json"))
	half := 0.02 * s.m.size
	bodies := bodiesOf(m, half)
	const steps = 1440
	c, err := m.Cycle(steps, nil)
	if err != nil {
		t.Fatal(err)
	}
	copies := [][2]Copy{
		{{}, {Phase: math.Pi}},
		{{}, {Phase: math.Pi / 2, Mirror: true}},
		{{Phase: 1, Mirror: true, At: Point{X: 20, Y: 7}}, {Phase: -2 * math.Pi / 3}},
		{{Phase: 1, Mirror: true}, {Phase: 1, Mirror: true}},
	}
	turned := func(x Copy, k int) int {
		f := (x.Phase - s.m.from) / (2 * math.Pi) * steps
		at := s.m.from/(2*math.Pi)*steps + float64(k)
		if x.Mirror {
			at = -at
		}
		return ((int(math.Round(f+at)) % steps) + steps) % steps
	}
	compared := 0
	for _, pair := range copies {
		for i, a := range bodies {
			for k, b := range bodies {
				if (i+2*k)%7 != 0 || pair[0] == pair[1] && !apartFrom(m, a, b) {
					continue
				}
				a.Copy, b.Copy = pair[0], pair[1]
				g, err := s.Smallest(a, b, Options{Accuracy: 1e-2, Limit: 10 * half, Boxes: 20000})
				if err != nil {
					t.Fatal(err)
				}
				least := math.Inf(1)
				for k := range steps {
					pa, pb := c.Positions[turned(a.Copy, k)], c.Positions[turned(b.Copy, k)]
					least = math.Min(least, outline.Between(put(m, a, pa), put(m, b, pb)).Distance)
				}
				if g.MM >= 10*half {
					least = math.Min(least, g.MM+g.Error)
				} else {
					compared++
				}
				// Phases off the grid of brute force are met to half a step: a few hundredths of a radian mm.
				slip := 10 * s.m.size * math.Pi / steps
				if g.MM-g.Error > least+slip || g.MM < least-slip {
					t.Errorf("%+v %s / %+v %s: %.4f (error %.4f), brute force %.4f", a.Copy, a.Name, b.Copy, b.Name, g.MM, g.Error, least)
				}
			}
		}
	}
	if compared < 10 {
		t.Errorf("only %d pairs compared", compared)
	}
}

// Cranks on one shaft keep their angle: the discs at their tips are apart by the chord, whatever the drive.
func TestCranksOfOneShaft(t *testing.T) {
	s, _ := newSpace(t, fourBar(nil))
	tip := Body{Name: "tip", Carrier: OnJoint, Of: "A", Region: pin(4)}
	other := tip
	other.Copy = Copy{Phase: math.Pi / 2}
	g, err := s.Smallest(tip, other, Options{Accuracy: 1e-3, Limit: 100, Boxes: 5000})
	if err != nil {
		t.Fatal(err)
	}
	if want := 40*math.Sqrt2 - 8; math.Abs(g.MM-want) > 1e-6 {
		t.Errorf("gap %.7f, closed form %.7f", g.MM, want)
	}
	// A mirrored copy's crank turns with the shaft as well: its direction is pi - phase + t.
	other.Copy = Copy{Phase: math.Pi / 3, Mirror: true}
	if g, err = s.Smallest(tip, other, Options{Accuracy: 1e-3, Limit: 100, Boxes: 5000}); err != nil {
		t.Fatal(err)
	}
	if want := 2*40*math.Sin(math.Pi/3) - 8; math.Abs(g.MM-want) > 1e-6 {
		t.Errorf("mirrored: gap %.7f, closed form %.7f", g.MM, want)
	}
	// A drive that does not turn all the way round has no phases.
	l := fourBar(nil)
	l.Drive.Full, l.Drive.To = false, 1
	s, _ = newSpace(t, l)
	if _, err := s.Smallest(tip, other, Options{Accuracy: 1e-2, Limit: 10, Boxes: 100}); err == nil {
		t.Error("phases of a partial drive are taken")
	}
}
