package linkage

import (
	"math"
	"testing"
)

// TestTriad solves a linkage that two circles do not, and compares with an independent search: the
// platform on its two arms is a four-bar whose angle is varied until the driven rod fits.
func TestTriad(t *testing.T) {
	l, _ := load(t, "stephenson.json")
	c := cycleOf(t, l, 180)
	m := c.m
	g := m.Groups()
	if len(g) != 2 || g[1].Dyad || len(g[1].Links) != 4 {
		t.Fatalf("groups %+v: want the crank and one block of four links", g)
	}
	if got := m.rankMobility(m.start.p); got != 1 || m.gruebler != 1 {
		t.Errorf("mobility %d by rank, %d by counting, want 1", got, m.gruebler)
	}
	idx := func(n string) int { i, _ := m.Joint(n); return i }
	G, H, A, P, Q, R := idx("G"), idx("H"), idx("A"), idx("P"), idx("Q"), idx("R")
	shape := m.LinkFrame("platform")
	for _, pos := range c.Positions[:180] {
		pl := pos.Places
		// Side of the arms' dyad, from the solution; everything else by the search.
		side := math.Copysign(1, cross(sub(pl[H], pl[P]), sub(pl[Q], pl[P])))
		platform := func(arm float64) (r Point, ok bool) {
			p := Point{X: pl[G].X + 60*math.Cos(arm), Y: pl[G].Y + 60*math.Sin(arm)}
			d := sub(pl[H], p)
			n := norm(d)
			x := (75*75 - 66*66 + n*n) / (2 * n)
			if 75*75 < x*x {
				return r, false
			}
			h := side * math.Sqrt(75*75-x*x)
			q := Point{X: p.X + (x*d.X-h*d.Y)/n, Y: p.Y + (x*d.Y+h*d.X)/n}
			u := Point{X: (q.X - p.X) / 75, Y: (q.Y - p.Y) / 75}
			return Point{X: p.X + shape[2].X*u.X - shape[2].Y*u.Y, Y: p.Y + shape[2].X*u.Y + shape[2].Y*u.X}, true
		}
		miss := func(arm float64) (float64, bool) {
			r, ok := platform(arm)
			return dist(r, pl[A]) - 98, ok
		}
		best := math.Inf(1)
		const scan = 2000
		for k := range scan {
			a, b := 2*math.Pi*float64(k)/scan, 2*math.Pi*float64(k+1)/scan
			fa, oka := miss(a)
			fb, okb := miss(b)
			if !oka || !okb || fa*fb > 0 {
				continue
			}
			for range 60 {
				mid := (a + b) / 2
				if f, _ := miss(mid); f*fa > 0 {
					a = mid
				} else {
					b = mid
				}
			}
			r, _ := platform(a)
			best = math.Min(best, dist(r, pl[R]))
		}
		if !(best < 1e-9) {
			t.Fatalf("at %g deg no assembly of the search is nearer than %g mm", deg(pos.Angle), best)
		}
	}
	// Motion without jumps: the trapezoid of the speeds gives the way to a small part of it.
	for k := 1; k < len(c.Positions); k++ {
		a, b := c.Positions[k-1], c.Positions[k]
		for j := range a.Places {
			way := sub(b.Places[j], a.Places[j])
			mean := Point{X: (a.Speeds[j].X + b.Speeds[j].X) / 2, Y: (a.Speeds[j].Y + b.Speeds[j].Y) / 2}
			if e := dist(way, Point{X: mean.X * (b.Angle - a.Angle), Y: mean.Y * (b.Angle - a.Angle)}); e > 1e-3 {
				t.Fatalf("joint %s jumps by %g mm at step %d", m.jointNames[j], e, k)
			}
		}
	}
}

func BenchmarkTriadSixBar(b *testing.B) {
	l, _ := load(b, "stephenson.json")
	m, err := New(l)
	if err != nil {
		b.Fatal(err)
	}
	w := newWalker(m.prog.clone(), m.start)
	const steps = 360
	b.ReportAllocs()
	b.ResetTimer()
	turn := 0.0
	for range b.N {
		for k := 1; k <= steps; k++ {
			w.to(turn + 2*math.Pi*float64(k)/steps)
		}
		turn += 2 * math.Pi
	}
	b.ReportMetric(float64(b.N*steps)/b.Elapsed().Seconds(), "steps/s")
}

func BenchmarkAssembleEightBarLeg(b *testing.B) {
	l, _ := load(b, "jansen.json")
	for range b.N {
		if _, err := New(l); err != nil {
			b.Fatal(err)
		}
	}
}

func BenchmarkAnalyseEightBarLeg(b *testing.B) {
	l, _ := load(b, "jansen.json")
	for range b.N {
		if _, err := Analyse(l, Options{}); err != nil {
			b.Fatal(err)
		}
	}
}

// TestDrivenFromElsewhere: the same six-bar driven by an arm instead of the crank is all dyads; both
// ways of solving it give the same places.
func TestDrivenFromElsewhere(t *testing.T) {
	l, _ := load(t, "stephenson.json")
	triad := cycleOf(t, l, 90)
	m := triad.m
	at := func(n string) int { i, _ := m.Joint(n); return i }
	O, G, A, P := at("O"), at("G"), at("A"), at("P")
	start := triad.Positions[30].Places
	d := l
	d.Joints = append([]Joint(nil), l.Joints...)
	for i := range d.Joints {
		if d.Joints[i].Ground == nil {
			p := start[i]
			d.Joints[i].Near = &p
		}
	}
	angle := func(p []Point, from, to int) float64 {
		return math.Atan2(p[to].Y-p[from].Y, p[to].X-p[from].X)
	}
	d.Drive = Drive{Link: "left-arm", From: angle(start, G, P), To: angle(triad.Positions[38].Places, G, P)}
	dyads := cycleOf(t, d, 20)
	for _, g := range dyads.m.Groups()[1:] {
		if !g.Dyad {
			t.Fatalf("groups %+v, want dyads", dyads.m.Groups())
		}
	}
	for _, p := range dyads.Positions {
		crank := angle(p.Places, O, A)
		if crank < 0 {
			crank += 2 * math.Pi
		}
		q, err := triad.At(crank)
		if err != nil {
			t.Fatal(err)
		}
		if !samePlaces(p.Places, q.Places, 1e-8) {
			t.Fatalf("at crank %g deg the two differ: %v and %v", deg(crank), p.Places, q.Places)
		}
	}
	c := triad.Conditions()
	if len(c) != 1 || !(c[0].Least > 0.01 && c[0].Least < 2) {
		t.Errorf("conditions %+v", c)
	}
}

// TestTriadStops: a block that does not close names its links and where.
func TestTriadStops(t *testing.T) {
	l, _ := load(t, "stephenson.json")
	l.Links[0].Lengths[0].MM = 60
	l.Links[1].Lengths[0].MM = 140
	for i := range l.Joints {
		if l.Joints[i].Name == "A" {
			l.Joints[i].Near = pt(250, 60)
		}
	}
	m, err := New(l)
	if err != nil {
		t.Fatal(err)
	}
	_, err = m.Cycle(90, nil)
	e, ok := err.(*LoopError)
	if !ok {
		t.Fatalf("got %v, want a loop that does not close", err)
	}
	if len(e.Links) != 4 || e.Joint == "" || !(e.Short > 1) || len(e.Ranges) != 1 || !(e.Ranges[0].From < 0 && e.Ranges[0].To > 0) {
		t.Errorf("%v (%+v)", e, *e)
	}
	// The linkage does close up to there, and not beyond.
	l.Drive = Drive{Link: "crank", To: e.Ranges[0].To - 1e-4}
	if m, err = New(l); err != nil {
		t.Fatal(err)
	}
	if _, err = m.Cycle(20, nil); err != nil {
		t.Error(err)
	}
}
