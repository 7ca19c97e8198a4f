package outline

import (
	"math"
	"math/rand/v2"
	"testing"
)

// The support function says everything about a convex shape: in every direction the hull must reach exactly as
// far as the furthest disc.
func TestHullSupport(t *testing.T) {
	for seed := range uint64(300) {
		r := rand.New(rand.NewPCG(seed, 12))
		var discs []Disc
		for range 1 + r.IntN(12) {
			d := Disc{Point{float64(r.IntN(9)), float64(r.IntN(9))}, float64(r.IntN(4))}
			if seed%2 == 0 {
				d = Disc{Point{r.Float64() * 50, r.Float64() * 50}, r.Float64() * 10}
			}
			discs = append(discs, d)
		}
		o := Hull(discs...)
		if o == nil {
			// Only points on a line enclose nothing.
			for _, d := range discs {
				if d.Radius > 0 {
					t.Fatalf("seed %d: no hull of %v", seed, discs)
				}
			}
			continue
		}
		if err := o.Validate(); err != nil {
			t.Fatalf("seed %d: %v of %v", seed, err, discs)
		}
		for i := range o {
			c, d := o.curve(i), o.curve((i+1)%len(o))
			if c.k < 0 || c.u.Cross(d.t) < -1e-7 {
				t.Fatalf("seed %d: not convex at vertex %d: %v", seed, i+1, o)
			}
		}
		for range 40 {
			a := r.Float64() * 2 * math.Pi
			if r.IntN(2) == 0 {
				a = float64(r.IntN(8)) * math.Pi / 4
			}
			want := math.Inf(-1)
			for _, d := range discs {
				want = max(want, d.Centre.Dot(Polar(1, a))+d.Radius)
			}
			near(t, "support", o.Transform(Place(-a, false, Point{})).Bounds().Max.X, want, 1e-9)
		}
	}
	if Hull() != nil || Hull(Disc{}) != nil || Hull(Disc{Point{math.NaN(), 0}, 1}) != nil || Hull(Disc{Point{}, -1}) != nil {
		t.Error("a hull of nothing")
	}
	if _, r, ok := Hull(Disc{Point{1, 2}, 3}, Disc{Point{1, 2}, 3}).AsCircle(); !ok || r != 3 {
		t.Error("two equal discs are no circle")
	}
}

func TestArcSlotLimits(t *testing.T) {
	for _, c := range []struct {
		radius, from, to, half float64
		ok                     bool
	}{
		{20, 0, 1, 3, true},
		{20, 1, 0, 3, true},
		{20, 0, 0, 3, true}, // a round hole
		{20, 0, 5.9, 3, true},
		{20, 0, 6.1, 3, false}, // the ends meet
		{20, 0, 7, 3, false},
		{3, 0, 1, 3, false}, // the inner arc would vanish
		{20, 0, 1, 0, false},
		{20, 0, math.NaN(), 1, false},
	} {
		o := ArcSlot(Point{5, 6}, c.radius, c.from, c.to, c.half)
		if (o != nil) != c.ok {
			t.Errorf("%+v: %v", c, o)
			continue
		}
		if o == nil {
			continue
		}
		if err := o.Validate(); err != nil {
			t.Errorf("%+v: %v", c, err)
		}
		near(t, "area", o.Area(), math.Abs(c.to-c.from)*c.radius*2*c.half+math.Pi*c.half*c.half, 1e-9)
		// The same by the stroke of its middle line.
		if s := Stroke(Arc(Point{5, 6}, c.radius, c.from, c.to), c.half); len(s) != 1 || HausdorffDistance(s[0].Outer, o) > 1e-9 {
			t.Errorf("%+v: stroke %v, slot %v", c, s, o)
		}
	}
}

func TestBounds(t *testing.T) {
	r := rand.New(rand.NewPCG(2, 3))
	for range 500 {
		s := Segment{A: Point{r.Float64() * 10, r.Float64() * 10}, B: Point{r.Float64() * 10, r.Float64() * 10}}
		s.Bulge = (r.Float64()*2 - 1) * math.Pow(10, r.Float64()*5-4)
		b, scan := s.Bounds(), EmptyBox()
		const n = 2000
		for i := range n + 1 {
			scan.add(s.At(float64(i) / n))
		}
		// Between two points of the scan an arc rises at most by its sagitta.
		l := s.Length() / n
		rise := 1e-9 + l*l/s.Radius()
		if !b.Grow(1e-9).ContainsBox(scan) || !scan.Grow(rise).ContainsBox(b) {
			t.Errorf("bounds of %v are %v, the scan says %v", s, b, scan)
		}
	}
}

func TestBox(t *testing.T) {
	b := BoxOf(Point{1, 2}, Point{4, 6})
	near(t, "width", b.Width(), 3, 0)
	near(t, "height", b.Height(), 4, 0)
	near(t, "distance", b.Distance(BoxOf(Point{7, 10})), 5, 0)
	near(t, "distance of touching boxes", b.Distance(BoxOf(Point{4, 6})), 0, 0)
	e := EmptyBox()
	if !e.Empty() || b.Empty() || e.Width() != 0 || e.Intersects(b) || b.Union(e) != b || !b.ContainsBox(e) || b.Grow(-2).Empty() == false {
		t.Error("empty boxes")
	}
	if b.Centre() != (Point{2.5, 4}) || !b.Contains(Point{1, 6}) || b.Contains(Point{0.9, 6}) || b.Grow(1) != BoxOf(Point{0, 1}, Point{5, 7}) {
		t.Error("box of 3 by 4")
	}
	if got := b.Outline(); got.Area() != 12 || e.Outline() != nil {
		t.Errorf("outline of the box: %v", got)
	}
}

func TestPath(t *testing.T) {
	p := Arc(Point{1, 1}, 5, 0, 3*math.Pi/2)
	near(t, "length", p.Length(), 7.5*math.Pi, 1e-12)
	near(t, "nearest", p.Nearest(Point{1, 7}).Distance, 1, 1e-12)
	near(t, "nearest to the gap", p.Nearest(Point{7, -5}).Distance, math.Sqrt(37), 1e-12)
	m := p.Transform(Place(math.Pi/2, true, Point{10, 0}))
	near(t, "moved length", m.Length(), p.Length(), 1e-12)
	b := p.Bounds()
	near(t, "left", b.Min.X, -4, 1e-12)
	near(t, "right", b.Max.X, 6, 1e-12)
	pts := FlattenPath(p, 0.01)
	if pts[0] != p[0].Point || pts[len(pts)-1] != p[len(p)-1].Point {
		t.Errorf("flattened from %v to %v", pts[0], pts[len(pts)-1])
	}
	for i := 1; i < len(pts); i++ {
		near(t, "corner on the arc", pts[i].Dist(Point{1, 1}), 5, 1e-12)
		if d := pts[i].Lerp(pts[i-1], 0.5).Dist(Point{1, 1}); d < 5-0.01 {
			t.Errorf("a chord strays by %g", 5-d)
		}
	}
	if got := FlattenPath(nil, 1); got != nil {
		t.Errorf("flattened nothing: %v", got)
	}
}

// Place, Then and Inverse as they should be.
func TestTransforms(t *testing.T) {
	r := rand.New(rand.NewPCG(1, 9))
	draw := func() Transform {
		return Place(r.Float64()*7, r.IntN(2) == 0, Point{r.Float64() * 9, r.Float64() * 9})
	}
	for range 100 {
		a, b, p := draw(), draw(), Point{r.Float64() * 9, r.Float64() * 9}
		near(t, "then", a.Then(b).Apply(p).Dist(b.Apply(a.Apply(p))), 0, 1e-12)
		near(t, "inverse", a.Inverse().Apply(a.Apply(p)).Dist(p), 0, 1e-12)
	}
}
