package interference

import (
	"math"
	"testing"

	"pinwright/parts/linkage"
	"pinwright/parts/outline"
)

// fourBar is the example of R. L. Norton, Design of Machinery (a 40, b 120, c 80, d 100).
func fourBar(drift *linkage.Range) linkage.Linkage {
	return linkage.Linkage{
		Joints: []linkage.Joint{
			{Name: "O", Ground: &linkage.Ground{}},
			{Name: "D", Ground: &linkage.Ground{At: Point{X: 100}, Range: drift}},
			{Name: "A", Near: &Point{X: 40}},
			{Name: "B", Near: &Point{X: 120, Y: 80}},
		},
		Links: []linkage.Link{
			{Name: "crank", Pins: []string{"O", "A"}, Lengths: []linkage.Length{{A: "O", B: "A", MM: 40}}},
			{Name: "coupler", Pins: []string{"A", "B"}, Lengths: []linkage.Length{{A: "A", B: "B", MM: 120}}},
			{Name: "rocker", Pins: []string{"D", "B"}, Lengths: []linkage.Length{{A: "D", B: "B", MM: 80}}},
		},
		Drive: linkage.Drive{Link: "crank", From: 0, To: 2 * math.Pi, Full: true},
	}
}

func newSpace(t testing.TB, l linkage.Linkage) (*Space, *linkage.Mechanism) {
	t.Helper()
	m, err := linkage.New(l)
	if err != nil {
		t.Fatal(err)
	}
	s, err := NewSpace(m)
	if err != nil {
		t.Fatal(err)
	}
	return s, m
}

func bar(length, radius float64) outline.Region {
	return outline.Region{Outer: outline.Capsule(Point{}, Point{X: length}, radius)}
}

func pin(radius float64) outline.Region {
	return outline.Region{Outer: outline.Circle(Point{}, radius)}
}

// The smallest gap between the crank's bar and a fixed disc has a closed form: the bar is a capsule
// whose axis sweeps the disc of radius 40 about O.
func TestSmallestAgainstClosedForm(t *testing.T) {
	s, _ := newSpace(t, fourBar(nil))
	crank := Body{Name: "crank", Carrier: OnLink, Of: "crank", Region: bar(40, 6)}
	post := Body{Name: "post", Region: outline.Region{Outer: outline.Circle(Point{X: 0, Y: 70}, 9)}}
	g, err := s.Smallest(crank, post, Options{Accuracy: 1e-4, Limit: 50, Boxes: 5000})
	if err != nil {
		t.Fatal(err)
	}
	const want = 70 - 40 - 6 - 9
	if g.MM < want-1e-9 || g.MM > want+1e-4 {
		t.Errorf("gap %.6f, closed form %d", g.MM, want)
	}
	if deg := g.Angle * 180 / math.Pi; math.Abs(deg-90) > 1 {
		t.Errorf("gap at %.2f deg, want 90", deg)
	}
}

// Brute force over many positions never finds a gap below the certified one, and comes near it.
func TestSmallestAgainstBruteForce(t *testing.T) {
	l := fourBar(nil)
	s, m := newSpace(t, l)
	bodies := []Body{
		{Name: "crank", Carrier: OnLink, Of: "crank", Region: bar(40, 5)},
		{Name: "coupler", Carrier: OnLink, Of: "coupler", Region: bar(120, 5)},
		{Name: "rocker", Carrier: OnLink, Of: "rocker", Region: bar(80, 5)},
		{Name: "pin O", Region: pin(4)},
		{Name: "pin D", Region: outline.Region{Outer: outline.Circle(Point{X: 100}, 4)}},
		{Name: "pin B", Carrier: OnJoint, Of: "B", Region: pin(4)},
	}
	const steps = 7200
	c, err := m.Cycle(steps, nil)
	if err != nil {
		t.Fatal(err)
	}
	place := func(b Body, p linkage.Position) outline.Region {
		switch b.Carrier {
		case OnLink:
			return b.Region.Transform(m.Placement(b.Of, p))
		case OnJoint:
			j, _ := m.Joint(b.Of)
			return b.Region.Transform(outline.Place(0, false, p.Places[j]))
		}
		return b.Region
	}
	for _, pair := range [][2]int{{0, 2}, {1, 3}, {1, 4}, {0, 4}, {0, 5}, {2, 3}} {
		a, b := bodies[pair[0]], bodies[pair[1]]
		g, err := s.Smallest(a, b, Options{Accuracy: 1e-3, Limit: 200, Boxes: 20000})
		if err != nil {
			t.Errorf("%v", err)
			continue
		}
		brute, at := math.Inf(1), 0.0
		for _, p := range c.Positions {
			if d := outline.Between(place(a, p), place(b, p)).Distance; d < brute {
				brute, at = d, p.Angle
			}
		}
		t.Logf("%s / %s: %.4f at %.2f in %d boxes (brute %.4f at %.2f)", a.Name, b.Name, g.MM, g.Angle, g.Boxes, brute, at)
		if g.MM-g.Error > brute+1e-9 {
			t.Errorf("%s / %s: certified at least %.5f, brute force found %.5f at %.3f", a.Name, b.Name, g.MM-g.Error, brute, at)
		}
		if g.MM > brute+1e-3 {
			t.Errorf("%s / %s: smallest %.5f, brute force %.5f", a.Name, b.Name, g.MM, brute)
		}
	}
}
