package linkage

import (
	"encoding/json"
	"math"
	"testing"
)

type expected struct {
	Stride   float64 `json:"stride_mm"`
	Lift     float64 `json:"lift_mm"`
	Extremes map[string]struct {
		X, Y, CrankDeg float64
		Deg            float64 `json:"crank_deg"`
	}
	Stance []struct {
		Fraction float64 `json:"band_fraction"`
		Band     float64 `json:"band_mm"`
		X        float64 `json:"x_length_mm"`
		Duty     float64
	}
	Points []struct {
		Deg  float64 `json:"crank_deg"`
		X, Y float64
	}
	Transmission map[string]struct{ Min, Max float64 } `json:"transmission_deg"`
	Straight     struct {
		Length, Deviation float64
		Peak              float64    `json:"deviation_peak_to_peak"`
		Percent           float64    `json:"deviation_percent_of_length"`
		OverCrank         float64    `json:"length_over_crank"`
		Deg               [2]float64 `json:"crank_deg"`
	} `json:"straight_part"`
	At40 struct {
		Coupler float64 `json:"coupler_deg"`
		Rocker  float64 `json:"rocker_deg"`
	} `json:"angles_at_40_deg"`
	LineX       float64 `json:"line_x"`
	Arm         float64
	HalfCoupler float64 `json:"half_coupler"`
	HalfGround  float64 `json:"half_ground"`
}

// TestPublishedLegs compares with values from two independent solvers (in the files, with the source
// of the lengths).
func TestPublishedLegs(t *testing.T) {
	for _, file := range []string{"jansen.json", "chebyshev.json", "fourbar.json"} {
		t.Run(file, func(t *testing.T) {
			l, p := load(t, file)
			var want expected
			if err := json.Unmarshal(p.Expect, &want); err != nil {
				t.Fatal(err)
			}
			c := cycleOf(t, l, 360)
			foot := l.Trace[0]
			path := c.Path(foot)
			if len(want.Points) != 12 {
				t.Fatal("points missing in the file")
			}
			for _, q := range want.Points {
				if d := dist(path[int(q.Deg)], Point{X: q.X, Y: q.Y}); d > 1e-10 {
					t.Errorf("at %g deg %g mm off", q.Deg, d)
				}
			}
			var bands []float64
			for _, s := range want.Stance {
				bands = append(bands, s.Fraction)
			}
			got, _ := c.FootPath(foot, bands)
			near(t, "stride", got.Stride, want.Stride, 1e-6)
			near(t, "lift", got.Lift, want.Lift, 1e-6)
			for name, e := range map[string]Extreme{"x_min": got.XMin, "x_max": got.XMax, "y_min": got.YMin, "y_max": got.YMax} {
				// Beside an extreme the other coordinate and the angle are only as good as the
				// square root of the search that found it: 1e-5 there.
				w := want.Extremes[name]
				near(t, name+" x", e.X, w.X, 1e-5)
				near(t, name+" y", e.Y, w.Y, 1e-5)
				near(t, name+" angle", math.Mod(deg(e.Angle), 360), w.Deg, 1e-5)
				if name[0] == 'x' {
					near(t, name, e.X, w.X, 1e-6)
				} else {
					near(t, name, e.Y, w.Y, 1e-6)
				}
			}
			for i, s := range got.Stance {
				w := want.Stance[i]
				near(t, "band", s.Height, w.Band, 1e-6)
				near(t, "duty", s.Duty, w.Duty, 1.0/180)
				near(t, "stance length", s.Length, w.X, 2.5)
				if s.Length < w.X-1e-6 {
					t.Errorf("stance length %g is less than the sampled %g", s.Length, w.X)
				}
			}
			for _, tr := range c.Transmissions() {
				w, ok := want.Transmission[tr.Pins[0]+"-"+tr.Pins[1]+"-"+tr.Pins[2]]
				if !ok {
					t.Errorf("no value for %v", tr.Pins)
					continue
				}
				if deg(tr.Min) > w.Min+1e-9 || deg(tr.Max) < w.Max-1e-9 {
					t.Errorf("%v: %g to %g deg, sampled %g to %g", tr.Pins, deg(tr.Min), deg(tr.Max), w.Min, w.Max)
				}
				near(t, "transmission min", deg(tr.Min), w.Min, 0.02)
				near(t, "transmission max", deg(tr.Max), w.Max, 0.02)
			}
		})
	}
}

func near(t *testing.T, what string, got, want, tol float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tol) {
		t.Errorf("%s: got %.12g, want %.12g within %g", what, got, want, tol)
	}
}

// TestTransmissionClosedForm: the pivots of a dyad that hangs on the crank are furthest apart and
// nearest when the crank lies along its ground line, so the law of cosines gives the extremes.
func TestTransmissionClosedForm(t *testing.T) {
	l, _ := load(t, "jansen.json")
	c := cycleOf(t, l, 90)
	ob := math.Hypot(38, 7.8)
	for _, tr := range c.Transmissions()[:2] {
		a, b := 50.0, 41.5
		if tr.Joint == "D" {
			a, b = 61.9, 39.3
		}
		angle := func(d float64) float64 { return math.Acos((a*a + b*b - d*d) / (2 * a * b)) }
		near(t, tr.Joint+" min", tr.Min, angle(ob-15), 1e-12)
		near(t, tr.Joint+" max", tr.Max, angle(ob+15), 1e-12)
		line := math.Atan2(-7.8, -38)
		near(t, tr.Joint+" min at", tr.MinAt, line+2*math.Pi, 1e-9)
		near(t, tr.Joint+" max at", tr.MaxAt, line+math.Pi, 1e-9)
	}
}

// TestFourBarFreudenstein: F. Freudenstein's equation (An analytical approach to the design of
// four-link mechanisms, 1954) holds at every step, and the book's angles come out.
func TestFourBarFreudenstein(t *testing.T) {
	l, p := load(t, "fourbar.json")
	var want expected
	if err := json.Unmarshal(p.Expect, &want); err != nil {
		t.Fatal(err)
	}
	c := cycleOf(t, l, 720)
	a, b, cc, d := 40.0, 120.0, 80.0, 100.0
	k1, k2, k3 := d/a, d/cc, (a*a-b*b+cc*cc+d*d)/(2*a*cc)
	at := func(p Position) (coupler, rocker float64) {
		A, B := p.Places[2], p.Places[3]
		return math.Atan2(B.Y-A.Y, B.X-A.X), math.Atan2(B.Y, B.X-d)
	}
	for _, p := range c.Positions {
		_, t4 := at(p)
		if r := k1*math.Cos(t4) - k2*math.Cos(p.Angle) + k3 - math.Cos(p.Angle-t4); math.Abs(r) > 1e-13 {
			t.Fatalf("at %g deg Freudenstein's equation is off by %g", deg(p.Angle), r)
		}
	}
	t3, t4 := at(c.Positions[80])
	near(t, "coupler at 40 deg", deg(t3), want.At40.Coupler, 1e-10)
	near(t, "rocker at 40 deg", deg(t4), want.At40.Rocker, 1e-10)
	near(t, "coupler as printed", deg(t3), 20.298, 5e-4)
	near(t, "rocker as printed", deg(t4), 57.325, 5e-4)
}

// straightness returns the length of the path between two drive angles and its deviation.
func straightness(t *testing.T, c *Cycle, joint string, from, to float64) (length, peak float64) {
	t.Helper()
	j, _ := c.m.Joint(joint)
	lo, hi := math.Inf(1), math.Inf(-1)
	var ends [2]Point
	for k := 0; k <= 600; k++ {
		p, err := c.At(rad(from + (to-from)*float64(k)/600))
		if err != nil {
			t.Fatal(err)
		}
		q := p.Places[j]
		lo, hi = math.Min(lo, q.Y), math.Max(hi, q.Y)
		if k == 0 {
			ends[0] = q
		}
		ends[1] = q
	}
	return math.Abs(ends[1].X - ends[0].X), hi - lo
}

func TestStraightLines(t *testing.T) {
	l, p := load(t, "chebyshev.json")
	var want expected
	if err := json.Unmarshal(p.Expect, &want); err != nil {
		t.Fatal(err)
	}
	length, peak := straightness(t, cycleOf(t, l, 360), "P", 90, 270)
	near(t, "Chebyshev's length", length, want.Straight.Length, 1e-9)
	near(t, "Chebyshev's deviation", peak, want.Straight.Peak, 1e-4)

	l, p = load(t, "hoeken.json")
	want = expected{}
	if err := json.Unmarshal(p.Expect, &want); err != nil {
		t.Fatal(err)
	}
	length, peak = straightness(t, cycleOf(t, l, 360), "P", want.Straight.Deg[0], want.Straight.Deg[1])
	near(t, "Hoeken's length in cranks", length/20, want.Straight.OverCrank, 5e-4)
	near(t, "Hoeken's deviation, percent", 100*peak/length, want.Straight.Percent, 5e-5)
}

// TestWattCurve: the coupler's middle satisfies the polar equation of Watt's curve.
func TestWattCurve(t *testing.T) {
	l, p := load(t, "watt.json")
	var want expected
	if err := json.Unmarshal(p.Expect, &want); err != nil {
		t.Fatal(err)
	}
	c := cycleOf(t, l, 200)
	a, b, h := want.HalfGround, want.Arm, want.HalfCoupler
	for _, q := range c.Path("P") {
		r2 := q.X*q.X + q.Y*q.Y
		th := math.Atan2(q.Y, q.X)
		root := math.Sqrt(h*h - math.Pow(a*math.Cos(th), 2))
		e1 := b*b - math.Pow(a*math.Sin(th)+root, 2) - r2
		e2 := b*b - math.Pow(a*math.Sin(th)-root, 2) - r2
		if e := math.Min(math.Abs(e1), math.Abs(e2)); !(e < 1e-9*b*b) && r2 > 1e-6 {
			t.Fatalf("%v is off Watt's curve by %g", q, e)
		}
	}
}

func TestPeaucellierLine(t *testing.T) {
	l, p := load(t, "peaucellier.json")
	var want expected
	if err := json.Unmarshal(p.Expect, &want); err != nil {
		t.Fatal(err)
	}
	c := cycleOf(t, l, 500)
	lo, hi := math.Inf(1), math.Inf(-1)
	for _, q := range c.Path("P") {
		if math.Abs(q.X-want.LineX) > 1e-9 {
			t.Fatalf("%v is off the line x = %g by %g", q, want.LineX, q.X-want.LineX)
		}
		lo, hi = math.Min(lo, q.Y), math.Max(hi, q.Y)
	}
	if hi-lo < 100 {
		t.Errorf("the line is only %g mm long", hi-lo)
	}
	// The rhombus reaches its end where the pole and the far corner are 150 or 50 apart, which is
	// where |OA| = 150 or 50: beyond, the drive stops and the error says where.
	l.Drive.From, l.Drive.To = 0, rad(90)
	m, err := New(l)
	if err != nil {
		t.Fatal(err)
	}
	_, err = m.Cycle(90, nil)
	e, ok := err.(*LoopError)
	if !ok {
		t.Fatalf("got %v, want a loop that does not close", err)
	}
	near(t, "end of the drive", e.Angle, math.Acos(50*50/(2*30.0*30)-1), 1e-6) // |OA|^2 = 2 r^2 (1 + cos)
}

// BenchmarkCycleEightBarLeg is what a caller pays for a stored turn of 3600 positions.
func BenchmarkCycleEightBarLeg(b *testing.B) {
	l, _ := load(b, "jansen.json")
	m, err := New(l)
	if err != nil {
		b.Fatal(err)
	}
	b.ReportAllocs()
	for range b.N {
		if _, err := m.Cycle(3600, nil); err != nil {
			b.Fatal(err)
		}
	}
	b.ReportMetric(float64(b.N*3600)/b.Elapsed().Seconds(), "steps/s")
}

// BenchmarkEightBarLeg is the solver alone, places and speeds: the design asks for 500000 steps/s.
func BenchmarkEightBarLeg(b *testing.B) {
	l, _ := load(b, "jansen.json")
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

// TestKlann draws the leg with circles, independent of the solver's plan: pair by pair of two known
// points and two lengths, the side as at the start.
func TestKlann(t *testing.T) {
	l, _ := load(t, "klann.json")
	c := cycleOf(t, l, 120)
	if !c.Full || len(c.m.Groups()) != 3 {
		t.Errorf("groups %+v, want the crank and two dyads", c.m.Groups())
	}
	const O, L, U, M, C, D, E, F = 0, 1, 2, 3, 4, 5, 6, 7
	s := c.Positions[0].Places
	draw := func(a, b Point, ra, rb, side float64) Point {
		n := dist(a, b)
		cos := (ra*ra + n*n - rb*rb) / (2 * ra * n)
		th := math.Atan2(b.Y-a.Y, b.X-a.X) + math.Copysign(math.Acos(cos), side)
		return Point{X: a.X + ra*math.Cos(th), Y: a.Y + ra*math.Sin(th)}
	}
	side := func(a, b, p int) float64 { return cross(sub(s[b], s[a]), sub(s[p], s[a])) }
	for _, p := range c.Positions {
		m := Point{X: 26.8 * math.Cos(p.Angle), Y: 26.8 * math.Sin(p.Angle)}
		cc := draw(m, s[L], 68.2, 49, side(M, L, C))
		d := draw(m, cc, 128.8, 62.4, side(M, C, D))
		e := draw(d, s[U], 48.1, 98.6, side(D, U, E))
		f := draw(d, e, 235.6, 188.7, side(D, E, F))
		for j, want := range map[int]Point{M: m, C: cc, D: d, E: e, F: f} {
			if x := dist(p.Places[j], want); x > 1e-9 {
				t.Fatalf("at %g deg joint %s is %g mm off the drawing", deg(p.Angle), c.m.jointNames[j], x)
			}
		}
	}
	if s[O] != (Point{}) {
		t.Error("the crank's pivot moved")
	}
}
