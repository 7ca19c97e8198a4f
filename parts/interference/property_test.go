package interference

import (
	"math"
	"testing"

	"pgregory.net/rapid"

	"pinwright/parts/linkage"
	"pinwright/parts/outline"
)

// crankRocker draws a four-bar whose crank turns all the way round (Grashof), and its bodies.
func crankRocker(r *rapid.T) linkage.Linkage {
	a := rapid.Float64Range(5, 30).Draw(r, "a")
	b := a + rapid.Float64Range(5, 100).Draw(r, "b")
	c := a + rapid.Float64Range(5, 100).Draw(r, "c")
	lo, hi := math.Abs(b-c)+a, b+c-a
	d := lo + (hi-lo)*rapid.Float64Range(0.05, 0.95).Draw(r, "d")
	return linkage.Linkage{
		Joints: []linkage.Joint{{Name: "O", Ground: &linkage.Ground{}}, {Name: "D", Ground: &linkage.Ground{At: Point{X: d}}}, {Name: "A"}, {Name: "B", Near: &Point{X: d, Y: c}}},
		Links: []linkage.Link{
			{Name: "crank", Pins: []string{"O", "A"}, Lengths: []linkage.Length{{A: "O", B: "A", MM: a}}},
			{Name: "coupler", Pins: []string{"A", "B"}, Lengths: []linkage.Length{{A: "A", B: "B", MM: b}}},
			{Name: "rocker", Pins: []string{"D", "B"}, Lengths: []linkage.Length{{A: "D", B: "B", MM: c}}},
		},
		Drive: linkage.Drive{Link: "crank", From: 0.3, To: 0.3 + 2*math.Pi, Full: true},
	}
}

// anyBody draws a body of any form on any carrier: bars, bent bars, stars, plates with a window.
func anyBody(r *rapid.T, name string) Body {
	b := Body{Name: name}
	size := rapid.Float64Range(1, 20).Draw(r, name+" size")
	at := Point{X: rapid.Float64Range(-40, 90).Draw(r, name+" x"), Y: rapid.Float64Range(-40, 40).Draw(r, name+" y")}
	switch rapid.IntRange(0, 2).Draw(r, name+" carrier") {
	case 0:
	case 1:
		b.Carrier, b.Of = OnLink, rapid.SampledFrom([]string{"crank", "coupler", "rocker"}).Draw(r, name+" of")
	default:
		b.Carrier, b.Of = OnJoint, rapid.SampledFrom([]string{"O", "A", "B", "D"}).Draw(r, name+" of")
		at = Point{}
	}
	switch rapid.IntRange(0, 4).Draw(r, name+" form") {
	case 0:
		b.Region.Outer = outline.Circle(at, size)
	case 1:
		b.Region.Outer = outline.Capsule(at, at.Add(Point{X: 3 * size, Y: size}), size/2)
	case 2:
		b.Region.Outer = outline.ArcSlot(at, 3*size, 0.2, 2.4, size/2)
	case 3:
		var pts []Point
		for i := range 10 {
			pts = append(pts, at.Add(outline.Polar(size*(1+float64(i%2)), 2*math.Pi*float64(i)/10)))
		}
		b.Region.Outer = outline.Polygon(pts...)
	default:
		b.Region.Outer = outline.Circle(at, 3*size)
		b.Region.Holes = []outline.Outline{outline.CircleHole(at, 2.5*size)}
	}
	return b
}

// Random four-bars with random bodies, hollow and toothed ones, bodies within windows: no position out of
// many has a gap below the certified one, and none of the gaps is made up.
func TestRandomFourBars(t *testing.T) {
	rapid.Check(t, func(r *rapid.T) {
		m, err := linkage.New(crankRocker(r))
		if err != nil {
			r.Fatal(err)
		}
		s, err := NewSpace(m)
		if err != nil {
			r.Fatal(err)
		}
		a, b := anyBody(r, "a"), anyBody(r, "b")
		o := Options{Accuracy: 0.02, Limit: 60, Boxes: 5000}
		g, err := s.Smallest(a, b, o)
		if err != nil {
			r.Skip(err) // a gap within a window that stays the same all the way costs too much
		}
		c, err := m.Cycle(180, nil)
		if err != nil {
			r.Fatal(err)
		}
		least, at := brute(m, c, a, b)
		if g.MM-g.Error > least+1e-9 {
			r.Fatalf("certified at least %.6f (%d boxes), %.6f at %.4f", g.MM-g.Error, g.Boxes, least, at)
		}
		if g.MM < o.Limit {
			p, err := c.At(g.Angle)
			if err != nil {
				r.Fatal(err)
			}
			if d := outline.Between(put(m, a, p), put(m, b, p)).Distance; math.Abs(d-g.MM) > 1e-6 {
				r.Fatalf("gap %.7f is said to be at %.5f, there it is %.7f", g.MM, g.Angle, d)
			}
		}
		// Enough: an early end is right about which side of the limit the gap is.
		e, err := s.Smallest(a, b, Options{Accuracy: 0.02, Limit: 5, Enough: 4, Boxes: 5000})
		if err != nil {
			r.Skip(err)
		}
		if (e.MM < 4) != (g.MM < 4) && math.Abs(g.MM-4) > 0.05 {
			r.Fatalf("enough at 4 says %.4f, the gap is %.4f", e.MM, g.MM)
		}
	})
}

// The gap is symmetric in the bodies, and the same on any copy of the linkage.
func TestSymmetric(t *testing.T) {
	rapid.Check(t, func(r *rapid.T) {
		m, err := linkage.New(crankRocker(r))
		if err != nil {
			r.Fatal(err)
		}
		s, err := NewSpace(m)
		if err != nil {
			r.Fatal(err)
		}
		a, b := anyBody(r, "a"), anyBody(r, "b")
		o := Options{Accuracy: 0.01, Limit: 30, Boxes: 5000}
		g, err := s.Smallest(a, b, o)
		if err != nil {
			r.Skip(err)
		}
		h, err := s.Smallest(b, a, o)
		if err != nil {
			r.Skip(err)
		}
		a.Copy = Copy{Phase: rapid.Float64Range(-4, 4).Draw(r, "phase"), Mirror: rapid.Bool().Draw(r, "mirror"), At: Point{X: 3, Y: -70}}
		b.Copy = a.Copy
		k, err := s.Smallest(a, b, o)
		if err != nil {
			r.Skip(err)
		}
		if math.Abs(g.MM-h.MM) > g.Error+h.Error || math.Abs(g.MM-k.MM) > g.Error+k.Error {
			r.Fatalf("gaps %.5f, %.5f (exchanged), %.5f (copy)", g.MM, h.MM, k.MM)
		}
	})
}

// FuzzSmallest asks odd questions: errors are allowed, panics and gaps above a sampled one are not.
func FuzzSmallest(f *testing.F) {
	f.Add(40.0, 120.0, 80.0, 100.0, 0.0, 6.28, 5.0, 10.0, 3.0, uint8(1), uint8(2))
	f.Add(50.0, 50.0, 50.0, 50.0, 0.1, 1.0, 1.0, 0.0, 0.0, uint8(0), uint8(1))
	f.Add(30.0, 60.0, 30.0, 60.0, 0.0, 6.3, 2.0, -1.0, 1e9, uint8(2), uint8(3))
	f.Fuzz(func(t *testing.T, a, b, c, d, from, to, size, x, y float64, one, two uint8) {
		l := fourBar(nil)
		l.Joints[1].Ground.At.X = d
		l.Links[0].Lengths[0].MM, l.Links[1].Lengths[0].MM, l.Links[2].Lengths[0].MM = a, b, c
		l.Drive = linkage.Drive{Link: "crank", From: from, To: to}
		m, err := linkage.New(l)
		if err != nil {
			return
		}
		s, err := NewSpace(m)
		if err != nil {
			return
		}
		body := func(k uint8) Body {
			r := outline.Region{Outer: outline.Circle(Point{X: x, Y: y}, size)}
			return Body{Carrier: Carrier(k % 4), Of: []string{"crank", "coupler", "A", "B", "none"}[k%5], Region: r, Copy: Copy{Phase: float64(k / 100)}}
		}
		p, q := body(one), body(two)
		g, err := s.Smallest(p, q, Options{Accuracy: 0.1, Limit: 20, Boxes: 500, Depth: true})
		if err != nil || p.Copy != q.Copy {
			return
		}
		cycle, err := m.Cycle(16, nil)
		if err != nil {
			return
		}
		if least, _ := brute(m, cycle, p, q); g.MM-g.Error > least+1e-6 {
			t.Fatalf("certified at least %g, found %g", g.MM-g.Error, least)
		}
	})
}
