package linkage

import (
	"fmt"
	"math"
	"testing"

	"pgregory.net/rapid"
)

// fourBar has its ground pins at (0, 0) and (d, 0) and a third coupler pin.
func fourBar(a, b, c, d, open float64) Linkage {
	return Linkage{
		Joints: []Joint{{Name: "O", Ground: ground(0, 0)}, {Name: "D", Ground: ground(d, 0)}, {Name: "A"}, {Name: "B", Near: pt(d, open*c)}},
		Links:  []Link{bar2("crank", "O", "A", a), bar2("coupler", "A", "B", b), bar2("rocker", "D", "B", c)},
		Drive:  Drive{Link: "crank", From: 0.3, To: 0.3 + 2*math.Pi, Full: true},
	}
}

// TestRandomGrashofFourBars compares with the closed form of the rocker angle (Freudenstein's
// equation solved by the half-angle tangent, as in any textbook of mechanisms).
func TestRandomGrashofFourBars(t *testing.T) {
	rapid.Check(t, func(r *rapid.T) {
		a := rapid.Float64Range(5, 30).Draw(r, "a")
		b := a + rapid.Float64Range(5, 100).Draw(r, "b")
		c := a + rapid.Float64Range(5, 100).Draw(r, "c")
		// crank-rocker: a shortest, a + longest < the other two
		lo, hi := math.Abs(b-c)+a, b+c-a
		d := lo + (hi-lo)*rapid.Float64Range(0.05, 0.95).Draw(r, "d")
		side := rapid.SampledFrom([]float64{1, -1}).Draw(r, "side")
		m, err := New(fourBar(a, b, c, d, side))
		if err != nil {
			r.Fatal(err)
		}
		cy, err := m.Cycle(rapid.IntRange(1, 90).Draw(r, "steps"), nil)
		if err != nil {
			r.Fatal(err)
		}
		if x := cy.Closure(); x > 1e-10 {
			r.Fatalf("closure %g", x)
		}
		k1, k2, k3 := d/a, d/c, (a*a-b*b+c*c+d*d)/(2*a*c)
		for _, p := range cy.Positions {
			s, co := math.Sincos(p.Angle)
			qa, qb, qc := co-k1-k2*co+k3, -2*s, k1-(k2+1)*co+k3
			root := math.Sqrt(qb*qb - 4*qa*qc)
			best := math.Inf(1)
			for _, sign := range []float64{1, -1} {
				th := 2 * math.Atan2(-qb+sign*root, 2*qa)
				best = math.Min(best, dist(p.Places[3], Point{X: d + c*math.Cos(th), Y: c * math.Sin(th)}))
			}
			if !(best < 1e-8) {
				r.Fatalf("at %g the rocker is %g mm off the closed form", p.Angle, best)
			}
			// The dyad keeps its side through the whole turn.
			if cross(sub(p.Places[1], p.Places[2]), sub(p.Places[3], p.Places[2]))*side < 0 {
				r.Fatalf("branch changed at %g", p.Angle)
			}
		}
	})
}

// randomSixBar hangs a second dyad on the coupler of a crank-rocker and a fixed pivot; its lengths are
// taken from a drawn place, so that it closes at the start.
func randomSixBar(r *rapid.T) Linkage {
	draw := func(lo, hi float64, name string) float64 { return rapid.Float64Range(lo, hi).Draw(r, name) }
	a := draw(8, 15, "a")
	l := fourBar(a, draw(50, 60, "b"), draw(50, 60, "c"), draw(60, 70, "d"), 1)
	q := Point{X: draw(-40, 10, "qx"), Y: draw(60, 120, "qy")}
	l.Joints = append(l.Joints, Joint{Name: "P", Near: pt(20, 60)},
		Joint{Name: "Q", Ground: &Ground{At: q}}, Joint{Name: "R", Near: pt(q.X+30, q.Y+60)}, Joint{Name: "T", Near: pt(q.X+60, q.Y+60)})
	b := l.Links[1].Lengths[0].MM
	l.Links[1] = tri("coupler", "A", "B", "P", b, draw(40, 50, "bp"), draw(40, 50, "ap"))
	l.Links = append(l.Links, bar2("arm", "Q", "R", draw(110, 130, "qr")), tri("strut", "P", "R", "T", draw(100, 120, "pr"), 40, 100))
	l.Trace = []string{"T"}
	return l
}

func TestRandomSixBars(t *testing.T) {
	turned := 0
	rapid.Check(t, func(r *rapid.T) {
		l := randomSixBar(r)
		m, err := New(l)
		if err != nil {
			r.Skip(err)
		}
		c, err := m.Cycle(90, nil)
		if err != nil {
			if _, ok := err.(*LoopError); !ok {
				r.Fatal(err)
			}
			r.Skip(err)
		}
		turned++
		if x := c.Closure(); x > 1e-10 {
			r.Fatalf("closure %g", x)
		}

		// Speeds against differences of places.
		k := rapid.IntRange(0, 89).Draw(r, "at")
		p := c.Positions[k]
		const h = 1e-5
		before, e1 := c.At(p.Angle - h)
		after, e2 := c.At(p.Angle + h)
		if k > 0 && e1 == nil && e2 == nil {
			for j := range p.Places {
				d := Point{X: (after.Places[j].X - before.Places[j].X) / (2 * h), Y: (after.Places[j].Y - before.Places[j].Y) / (2 * h)}
				if dist(d, p.Speeds[j]) > 1e-4*(1+norm(d)) {
					r.Fatalf("joint %d: speed %v, differences say %v", j, p.Speeds[j], d)
				}
			}
		}

		// A mirrored linkage (x to -x) driven the other way moves as the mirror image.
		mir := mirrored(l)
		mm, err := New(mir)
		if err != nil {
			r.Fatal(err)
		}
		mc, err := mm.Cycle(90, nil)
		if err != nil {
			r.Fatal(err)
		}
		for k := range c.Positions {
			for j, q := range c.Positions[k].Places {
				if dist(mc.Positions[k].Places[j], Point{X: -q.X, Y: q.Y}) > 1e-9 {
					r.Fatalf("mirror image differs at step %d joint %d", k, j)
				}
			}
		}

		// Driven back it goes through the same places.
		back := l
		back.Drive.To = back.Drive.From - 2*math.Pi
		bm, err := New(back)
		if err != nil {
			r.Fatal(err)
		}
		bc, err := bm.Cycle(90, nil)
		if err != nil {
			r.Fatal(err)
		}
		for k := range c.Positions {
			if !samePlaces(c.Positions[k].Places, bc.Positions[(90-k)%90].Places, 1e-9) {
				r.Fatalf("forward and back differ at step %d", k)
			}
		}

		// Placements carry every link's own frame onto its joints.
		for i, link := range l.Links {
			tr := c.Placement(link.Name, k)
			for n, q := range m.LinkFrame(link.Name) {
				if d := dist(tr.Apply(q), p.Places[m.pins[i][n]]); d > 1e-10 {
					r.Fatalf("link %s pin %d is %g mm from its joint", link.Name, n, d)
				}
			}
		}
	})
	if turned < 10 {
		t.Errorf("only %d of the random linkages turned: the test says little", turned)
	}
}

func mirrored(l Linkage) Linkage {
	m := l
	m.Joints = nil
	for _, j := range l.Joints {
		if j.Ground != nil {
			j.Ground = ground(-j.Ground.At.X, j.Ground.At.Y)
		}
		if j.Near != nil {
			j.Near = pt(-j.Near.X, j.Near.Y)
		}
		m.Joints = append(m.Joints, j)
	}
	m.Drive.From, m.Drive.To = math.Pi-l.Drive.From, math.Pi-l.Drive.To
	return m
}

// TestBellCrank: a driven link with an arm off its line; the near place of the arm's pin says to which
// side it stands.
func TestBellCrank(t *testing.T) {
	for _, side := range []float64{1, -1} {
		l := Linkage{
			Joints: []Joint{
				{Name: "O", Ground: ground(0, 0)},
				{Name: "D", Ground: ground(60, 0)},
				{Name: "E", Ground: ground(0, 70*side)},
				{Name: "A"},
				{Name: "K", Near: pt(0, 18*side)},
				{Name: "B", Near: pt(60, 40)},
				{Name: "C", Near: pt(40, 70*side)},
			},
			Links: []Link{
				tri("crank", "O", "A", "K", 20, math.Hypot(20, 15), 15),
				bar2("ab", "A", "B", 55), bar2("db", "D", "B", 45), bar2("kc", "K", "C", 60), bar2("ec", "E", "C", 40),
			},
			Drive: Drive{Link: "crank", From: 0, To: 2 * math.Pi, Full: true},
		}
		c := cycleOf(t, l, 60)
		for _, p := range c.Positions {
			want := Point{X: -15 * side * math.Sin(p.Angle), Y: 15 * side * math.Cos(p.Angle)}
			if d := dist(p.Places[4], want); d > 1e-12 {
				t.Fatalf("side %g at %g deg: the arm is at %v, want %v", side, deg(p.Angle), p.Places[4], want)
			}
			if w := c.m.Turn("crank", p); math.Abs(w-1) > 1e-12 {
				t.Fatalf("the crank turns at %g, want 1", w)
			}
		}
	}
}

// TestOrderDoesNotMatter: naming joints and links in another order gives the same motion.
func TestOrderDoesNotMatter(t *testing.T) {
	l, _ := load(t, "jansen.json")
	c := cycleOf(t, l, 60)
	r := l
	r.Joints, r.Links = nil, nil
	for i := range l.Joints {
		r.Joints = append(r.Joints, l.Joints[len(l.Joints)-1-i])
	}
	for i := range l.Links {
		k := l.Links[len(l.Links)-1-i]
		if k.Name != "crank" {
			p := append([]string(nil), k.Pins...)
			for a, b := 0, len(p)-1; a < b; a, b = a+1, b-1 {
				p[a], p[b] = p[b], p[a]
			}
			k.Pins = p
		}
		r.Links = append(r.Links, k)
	}
	d := cycleOf(t, r, 60)
	for k, q := range c.Path("foot") {
		if e := dist(q, d.Path("foot")[k]); e > 1e-10 {
			t.Fatalf("step %d: %g mm apart", k, e)
		}
	}
}

func FuzzNewAndSolve(f *testing.F) {
	f.Add([]byte{0, 4, 10, 20, 30, 40, 50, 60, 70, 80, 90, 100, 1, 2, 3, 0, 1, 2, 3, 1, 2, 0, 3})
	f.Add([]byte{8, 3, 3, 1, 4, 1, 5, 9, 2, 6, 5, 3, 5, 8, 9, 7, 9, 3, 2, 3, 8, 4, 6, 2, 6, 4, 3, 3, 8})
	f.Fuzz(func(t *testing.T, data []byte) {
		at := 0
		next := func() int {
			if at >= len(data) {
				return 0
			}
			at++
			return int(data[at-1])
		}
		var l Linkage
		n := 2 + next()%8
		for i := range n {
			j := Joint{Name: fmt.Sprintf("J%d", i)}
			if b := next(); b%3 == 0 || i == 0 {
				j.Ground = ground(float64(next()-128), float64(next()-128))
				if b%2 == 0 {
					j.Ground.Range = &Range{From: j.Ground.At, To: Point{X: float64(next()), Y: float64(next())}}
				}
			} else if b%3 == 1 {
				j.Near = pt(float64(next()-128), float64(next()-128))
			}
			l.Joints = append(l.Joints, j)
		}
		for i := range 1 + next()%8 {
			k := Link{Name: fmt.Sprintf("L%d", i)}
			for range 2 + next()%3 {
				k.Pins = append(k.Pins, fmt.Sprintf("J%d", next()%n))
			}
			for a := range k.Pins {
				for b := range a {
					if next()%7 > 0 {
						k.Lengths = append(k.Lengths, Length{k.Pins[a], k.Pins[b], float64(next())})
					}
				}
			}
			l.Links = append(l.Links, k)
		}
		l.Drive = Drive{Link: "L0", From: float64(next()) / 40, To: float64(next()) / 40, Full: next()%2 == 0}
		m, err := New(l)
		if err != nil {
			if err.Error() == "" {
				t.Error("error without words")
			}
			return
		}
		c, err := m.Cycle(8, nil)
		if err != nil {
			_ = err.Error()
			return
		}
		if x := c.Closure(); !(x <= 1e-9) {
			t.Errorf("closure %g", x)
		}
		c.Toggles()
	})
}
