package interference

import (
	"math"
	"runtime"
	"testing"

	"pinwright/parts/linkage"
	"pinwright/parts/outline"
)

// bruteSteps is how many positions brute force looks at.
const bruteSteps = 7200

// brute returns the smallest distance of two bodies over the positions of a cycle.
func brute(m *linkage.Mechanism, c *linkage.Cycle, a, b Body) (least, at float64) {
	least = math.Inf(1)
	for _, p := range c.Positions {
		if d := outline.Between(put(m, a, p), put(m, b, p)).Distance; d < least {
			least, at = d, p.Angle
		}
	}
	return least, at
}

// agrees compares a certified gap with brute force, which can't find less, and can't find much more
// either: between two positions of it nothing moves far.
func agrees(t *testing.T, a, b Body, g Gap, least, at, step float64) {
	t.Helper()
	if g.MM-g.Error > least+1e-9 {
		t.Errorf("%s / %s: certified at least %.6f, brute force found %.6f at %.4f", a.Name, b.Name, g.MM-g.Error, least, at)
	}
	if g.MM > least+g.Error+1e-9 {
		t.Errorf("%s / %s: smallest %.6f (error %.6f), brute force found %.6f at %.4f", a.Name, b.Name, g.MM, g.Error, least, at)
	}
	if g.MM < least-step {
		t.Errorf("%s / %s: smallest %.6f, brute force finds no less than %.6f", a.Name, b.Name, g.MM, least)
	}
}

// Jansen's and Klann's legs, a six-bar that no dyads solve and Peaucellier's eight links: the certified
// gap of every pair without a common pin agrees with brute force.
func TestPublishedAgainstBruteForce(t *testing.T) {
	for _, file := range []string{"jansen.json", "klann.json", "stephenson.json", "peaucellier.json"} {
		s, m := newSpace(t, load(t, file))
		half := 0.02 * s.m.size
		steps := bruteSteps
		if testing.Short() {
			steps /= 20
		}
		c, err := m.Cycle(steps, nil)
		if err != nil {
			t.Fatal(err)
		}
		bodies := bodiesOf(m, half)
		var pairs [][2]Body
		for i, a := range bodies {
			for _, b := range bodies[i+1:] {
				if apartFrom(m, a, b) {
					pairs = append(pairs, [2]Body{a, b})
				}
			}
		}
		limit := 6 * half
		gaps, err := s.All(pairs, Options{Accuracy: 1e-3, Limit: limit, Boxes: 20000})
		if err != nil {
			t.Fatal(err)
		}
		// Nothing on these linkages moves faster than some lengths of the longest link a turn.
		step := 10 * s.m.size * 2 * math.Pi / float64(steps)
		compared := 0
		for i, p := range pairs {
			if i%3 != 0 && gaps[i].MM > half { // the near ones, and some of the rest
				continue
			}
			least, at := brute(m, c, p[0], p[1])
			compared++
			g := gaps[i]
			if g.MM >= limit {
				least = math.Min(least, limit+g.Error)
			}
			agrees(t, p[0], p[1], g, least, at, step)
		}
		if compared < 5 {
			t.Errorf("%s: only %d pairs compared", file, compared)
		}
	}
}

// The way of the joints between two positions, sampled densely with package linkage: none strays from the
// linear motion further than the bound.
func TestStrayBound(t *testing.T) {
	for _, file := range []string{"jansen.json", "klann.json", "stephenson.json", "watt.json", "parallelogram.json"} {
		s, m := newSpace(t, load(t, file))
		c, err := m.Cycle(720, nil)
		if err != nil {
			t.Fatal(err)
		}
		bound := 0
		for k := range 24 {
			for _, half := range []float64{0.1, 0.03, 0.003, 1e-4} {
				mid := s.m.from + half + (s.m.to-s.m.from-2*half)*float64(k)/23
				p, err := s.pose([]float64{mid}, []float64{half})
				if err != nil {
					t.Fatal(err)
				}
				if p.loose {
					continue
				}
				bound++
				for i := range 41 {
					d := half * (float64(i) - 20) / 20
					q, err := c.At(mid + d)
					if err != nil {
						t.Fatal(err)
					}
					for j := range q.Places {
						stray := q.Places[j].Sub(p.at[j]).Sub(p.vel[0][j].Scale(d)).Len()
						if stray > p.rho[j] {
							t.Fatalf("%s: joint %d strays %g at %g+%g, bound %g", file, j, stray, mid, d, p.rho[j])
						}
					}
				}
				// The bound is of second order: not lax by more than a factor.
				if half == 1e-4 {
					for j, r := range p.rho {
						if r > 1e-3 {
							t.Errorf("%s: bound of joint %d is %g in a box of 1e-4", file, j, r)
						}
					}
				}
			}
		}
		if bound < 24*2 {
			t.Errorf("%s: only %d of %d boxes have a bound", file, bound, 24*4)
		}
	}
}

// A third crank keeps a parallelogram from flipping where it lies in line; so does, for the search, that
// opposite sides are equal as vectors: brute force over the whole turn, both points in line included.
func TestParallelogram(t *testing.T) {
	s, m := newSpace(t, load(t, "parallelogram.json"))
	if !s.m.surplus() || len(s.m.parallel) == 0 {
		t.Fatalf("surplus %v, parallelograms %d", s.m.surplus(), len(s.m.parallel))
	}
	bodies := bodiesOf(m, 1)
	c, err := m.Cycle(bruteSteps, nil)
	if err != nil {
		t.Fatal(err)
	}
	step := 4 * s.m.size * 2 * math.Pi / bruteSteps
	for i, a := range bodies {
		for _, b := range bodies[i+1:] {
			if !apartFrom(m, a, b) {
				continue
			}
			g, err := s.Smallest(a, b, Options{Accuracy: 1e-2, Limit: 1000, Boxes: 20000})
			if err != nil {
				t.Fatal(err)
			}
			least, at := brute(m, c, a, b)
			agrees(t, a, b, g, least, at, step)
		}
	}
}

// Two adjustable pivots, one on a line and one on an arc: brute force over drive and settings.
func TestAdjustableAgainstBruteForce(t *testing.T) {
	for _, drift := range []*linkage.Range{
		{From: Point{X: 94, Y: -8}, To: Point{X: 104, Y: 12}},
		{Centre: Point{X: 80}, Radius: 22, Start: -0.4, End: 0.5},
	} {
		l := fourBar(drift)
		l.Joints[1].Ground.At = drift.Place(0.5)
		s, m := newSpace(t, l)
		bodies := bodiesOf(m, 5)
		bodies = append(bodies, Body{Name: "post", Region: outline.Region{Outer: outline.Circle(Point{X: 60, Y: -48}, 6)}})
		const settings, steps = 21, 360
		var cycles []*linkage.Cycle
		for k := range settings {
			c, err := m.Cycle(steps, linkage.Setting{"D": float64(k) / (settings - 1)})
			if err != nil {
				t.Fatal(err)
			}
			cycles = append(cycles, c)
		}
		compared := 0
		for i, a := range bodies {
			for _, b := range bodies[i+1:] {
				if b.Carrier != OnGround && !apartFrom(m, a, b) {
					continue
				}
				g, err := s.Smallest(a, b, Options{Accuracy: 0.01, Limit: 30, Boxes: 50000})
				if err != nil {
					t.Fatal(err)
				}
				least := math.Inf(1)
				for _, c := range cycles {
					d, _ := brute(m, c, a, b)
					least = math.Min(least, d)
				}
				if g.MM >= 30 {
					least = math.Min(least, 30+g.Error)
				} else {
					compared++
				}
				// The grid is coarse: brute force can be this far above the true smallest.
				agrees(t, a, b, Gap{MM: g.MM, Error: g.Error + 1}, least, 0, 1.5)
				if g.MM-g.Error > least+1e-9 {
					t.Errorf("%s / %s: certified at least %.5f, brute force found %.5f", a.Name, b.Name, g.MM-g.Error, least)
				}
			}
		}
		if compared < 3 {
			t.Errorf("only %d pairs compared", compared)
		}
	}
}

// A post that the crank's tooth reaches at one crank angle only, between two positions of a grid of
// half a degree that leaves it a gap.
func TestPlantedClash(t *testing.T) {
	s, m := newSpace(t, fourBar(nil))
	tooth := Body{Name: "tooth", Carrier: OnLink, Of: "crank", Region: outline.Region{Outer: outline.Polygon(Point{X: 38, Y: -0.05}, Point{X: 70, Y: -0.001}, Point{X: 70, Y: 0.001}, Point{X: 38, Y: 0.05})}}
	for k := range 20 {
		angle := 2 * math.Pi * (float64(37*k) + 0.5) / 720
		post := Body{Name: "post", Region: outline.Region{Outer: outline.Circle(outline.Polar(70.199, angle), 0.2)}}
		c, err := m.Cycle(720, nil)
		if err != nil {
			t.Fatal(err)
		}
		if least, _ := brute(m, c, tooth, post); least < 0.1 {
			t.Fatalf("the grid sees it: %g", least)
		}
		g, err := s.Smallest(tooth, post, Options{Accuracy: 1e-4, Limit: 10, Boxes: 20000, Depth: true})
		if err != nil {
			t.Fatal(err)
		}
		if g.MM > 1e-3 || math.Abs(g.Angle-angle) > 1e-3 {
			t.Errorf("planted at %.5f: gap %.5f at %.5f", angle, g.MM, g.Angle)
		}
	}
}

// The answers are the same for one processor and for many, and whoever asks first.
func TestSameForAnyProcessors(t *testing.T) {
	var first []Gap
	for i, n := range []int{1, 7} {
		old := runtime.GOMAXPROCS(n)
		s, m := newSpace(t, load(t, "jansen.json"))
		bodies := bodiesOf(m, 3)
		var pairs [][2]Body
		for i, a := range bodies {
			for _, b := range bodies[i+1:] {
				pairs = append(pairs, [2]Body{a, b})
			}
		}
		if i == 1 { // warm up in another order
			if _, err := s.All(pairs[len(pairs)/2:], Options{Accuracy: 0.01, Limit: 5, Boxes: 1000}); err != nil {
				t.Fatal(err)
			}
		}
		gaps, err := s.All(pairs, Options{Accuracy: 0.01, Share: 0.05, Limit: 10, Boxes: 20000})
		runtime.GOMAXPROCS(old)
		if err != nil {
			t.Fatal(err)
		}
		if i == 0 {
			first = gaps
			continue
		}
		for k := range gaps {
			if gaps[k].MM != first[k].MM || gaps[k].Angle != first[k].Angle || gaps[k].Boxes != first[k].Boxes {
				t.Fatalf("pair %d: %v and %v", k, first[k], gaps[k])
			}
		}
	}
}

// A parallelogram of two cranks passes its change points as one, by its opposite sides: the discs at its
// moving joints keep the distance of the ground pins. One crossed over (an antiparallelogram) cannot be
// followed where it lies in line, which is said and not glossed over.
func TestParallelogramOfTwoCranks(t *testing.T) {
	l := fourBar(nil)
	l.Links[1].Lengths[0].MM, l.Links[2].Lengths[0].MM = 100, 40
	l.Drive.From, l.Drive.To = 0.3, 0.3+2*math.Pi
	l.Joints[2].Near, l.Joints[3].Near = &Point{X: 38, Y: 12}, &Point{X: 138, Y: 12}
	tip := Body{Name: "tip", Carrier: OnJoint, Of: "A", Region: pin(4)}
	bar := Body{Name: "rocker", Carrier: OnLink, Of: "rocker", Region: bar(40, 5)}
	o := Options{Accuracy: 1e-2, Limit: 1000, Boxes: 20000}
	s, m := newSpace(t, l)
	g, err := s.Smallest(tip, bar, o)
	if err != nil {
		t.Fatal(err)
	}
	// The bars stay parallel; where they lie in line the tip is at 40 and the rocker begins at 100.
	if want := 100 - 40 - 4 - 5.0; math.Abs(g.MM-want) > 2*o.Accuracy {
		t.Errorf("gap %.4f, closed form %.4f", g.MM, want)
	}
	if c, err := m.Cycle(36, nil); err != nil || len(c.Changes) == 0 {
		t.Errorf("no change points: %v", err)
	}
	l.Joints[3].Near = &Point{X: 80, Y: -35}
	if m, err := linkage.New(l); err == nil {
		if s, err := NewSpace(m); err == nil {
			if g, err := s.Smallest(tip, bar, o); err == nil {
				t.Errorf("crossed over: gap %+v is said to be certain", g)
			} else {
				t.Log(err)
			}
		}
	}
}
