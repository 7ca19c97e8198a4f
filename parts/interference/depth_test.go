package interference

import (
	"math"
	"testing"

	"pinwright/parts/outline"
)

// The crank's tip sweeps into a disc by a depth of closed form: a capsule's end of radius 6 at 40 mm
// from O, a disc of radius 9 at 50: they cover 40+6 - (50-9) = 5 mm of the line between their middles,
// and that is the diameter of the largest disc in both.
func TestDepthAgainstClosedForm(t *testing.T) {
	s, _ := newSpace(t, fourBar(nil))
	crank := Body{Name: "crank", Carrier: OnLink, Of: "crank", Region: bar(40, 6)}
	// At an edge of the boxes that the search begins with: their middles see 4.6 only.
	const at = 15 * 2 * math.Pi / 48
	post := Body{Name: "post", Region: outline.Region{Outer: outline.Circle(outline.Polar(50, at), 9)}}
	o := Options{Accuracy: 0.01, Limit: 50, Boxes: 5000, Depth: true}
	g, err := s.Smallest(crank, post, o)
	if err != nil {
		t.Fatal(err)
	}
	if g.MM < -5-1e-9 || g.MM-g.Error > -5 || g.MM > -4.7 || math.Abs(g.Angle-at) > 0.05 {
		t.Errorf("depth %.4f (error %.4f) at %.4f, closed form 5 at %.4f", g.MM, g.Error, g.Angle, at)
	}
	// Bars that cross are as deep as the slimmer is wide.
	other := crank
	other.Copy = Copy{Phase: math.Pi / 2}
	other.Region = bar(40, 4)
	if g, err = s.Smallest(crank, other, o); err != nil {
		t.Fatal(err)
	}
	if g.MM < -8-1e-9 || g.MM > -8+0.05 {
		t.Errorf("depth %.4f of bars of 12 and 8 mm that cross, want 8", g.MM)
	}
	// Without asking, touching is 0.
	o.Depth = false
	if g, err = s.Smallest(crank, post, o); err != nil || g.MM != 0 {
		t.Errorf("gap %v, %v", g, err)
	}
}

// The depth over the cycle against brute force: at each position both bodies are shrunk by half of it, and
// they must just come apart.
func TestDepthAgainstOffsets(t *testing.T) {
	s, m := newSpace(t, load(t, "klann.json"))
	bodies := bodiesOf(m, 0.05*s.m.size)
	c, err := m.Cycle(180, nil)
	if err != nil {
		t.Fatal(err)
	}
	compared := 0
	for i, a := range bodies {
		for _, b := range bodies[i+1:] {
			if !apartFrom(m, a, b) {
				continue
			}
			g, err := s.Smallest(a, b, Options{Accuracy: 0.01, Limit: 1, Boxes: 20000, Depth: true})
			if err != nil {
				t.Fatal(err)
			}
			if g.MM >= 0 {
				continue
			}
			compared++
			deepest := 0.0
			for _, p := range c.Positions {
				ra, rb := put(m, a, p), put(m, b, p)
				if outline.Overlap(ra, rb, math.Max(deepest, 0.01)) {
					lo, hi := deepest, 0.2*s.m.size
					for hi-lo > 0.01 {
						if mid := (lo + hi) / 2; outline.Overlap(ra, rb, mid) {
							lo = mid
						} else {
							hi = mid
						}
					}
					deepest = lo
				}
			}
			if deepest > -g.MM+g.Error+0.02 {
				t.Errorf("%s / %s: depth %.3f (error %.3f), offsets find %.3f", a.Name, b.Name, -g.MM, g.Error, deepest)
			}
			if -g.MM > deepest+3 { // between two degrees
				t.Errorf("%s / %s: depth %.3f, offsets find no more than %.3f", a.Name, b.Name, -g.MM, deepest)
			}
		}
	}
	if compared < 4 {
		t.Errorf("only %d pairs compared", compared)
	}
}
