package outline

import (
	"math"
	"testing"
)

func near(t *testing.T, what string, got, want, tol float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tol) {
		t.Errorf("%s: got %.15g, want %.15g (off by %.3g)", what, got, want, got-want)
	}
}

func TestCircleMeasures(t *testing.T) {
	c := Point{12.5, -7.25}
	o := Circle(c, 4.5)
	near(t, "area", o.Area(), math.Pi*4.5*4.5, 1e-12)
	near(t, "length", o.Length(), 2*math.Pi*4.5, 1e-12)
	b := o.Bounds()
	near(t, "left", b.Min.X, 8, 1e-12)
	near(t, "right", b.Max.X, 17, 1e-12)
	near(t, "low", b.Min.Y, -11.75, 1e-12)
	near(t, "high", b.Max.Y, -2.75, 1e-12)
	got, r, ok := o.AsCircle()
	if !ok || got != c || r != 4.5 {
		t.Errorf("AsCircle = %v %v %v", got, r, ok)
	}
	near(t, "hole's area", CircleHole(c, 4.5).Area(), -math.Pi*4.5*4.5, 1e-12)
}

func TestCapsuleAndSlot(t *testing.T) {
	o := Capsule(Point{0, 0}, Point{30, 40}, 5)
	near(t, "capsule area", o.Area(), 50*10+math.Pi*25, 1e-11)
	near(t, "capsule length", o.Length(), 2*50+2*math.Pi*5, 1e-11)
	if len(o) != 4 {
		t.Errorf("capsule has %d vertices, want 4: %v", len(o), o)
	}
	s := ArcSlot(Point{3, 4}, 20, 0.5, 2, 2)
	near(t, "slot area", s.Area(), 1.5*20*4+math.Pi*4, 1e-11)
	near(t, "slot length", s.Length(), 2*1.5*20+2*math.Pi*2, 1e-11)
}

func TestHullOfEqualDiscs(t *testing.T) {
	// Steiner: area = polygon + perimeter r + pi r^2, whatever the convex polygon.
	a, b, c := Point{0, 0}, Point{40, 0}, Point{10, 30}
	poly := Polygon(a, b, c)
	o := Hull(Disc{a, 6}, Disc{b, 6}, Disc{c, 6}, Disc{Point{15, 8}, 3})
	near(t, "area", o.Area(), poly.Area()+6*poly.Length()+math.Pi*36, 1e-10)
	near(t, "length", o.Length(), poly.Length()+2*math.Pi*6, 1e-10)
	// Hull of two unequal discs: closed form of the belt.
	R, r, L := 9.0, 4.0, 25.0
	o = Hull(Disc{Point{0, 0}, R}, Disc{Point{0, L}, r})
	be := math.Asin((R - r) / L)
	tl := math.Sqrt(L*L - (R-r)*(R-r))
	near(t, "belt", o.Length(), 2*tl+R*(math.Pi+2*be)+r*(math.Pi-2*be), 1e-11)
}

func TestLocateRectangleWithHole(t *testing.T) {
	r := Region{Outer: Rectangle(Point{0, 0}, Point{20, 10}), Holes: []Outline{CircleHole(Point{10, 5}, 3)}}
	for _, c := range []struct {
		p    Point
		want Location
	}{
		{Point{1, 1}, Inside},
		{Point{10, 5}, Outside},
		{Point{13, 5}, OnEdge},
		{Point{10, 8}, OnEdge},
		{Point{0, 5}, OnEdge},
		{Point{20, 10}, OnEdge},
		{Point{21, 5}, Outside},
		{Point{-1, 0}, Outside},
		{Point{-1, 10}, Outside},
		{Point{10, 8.001}, Inside},
		{Point{10, 7.999}, Outside},
	} {
		if got := r.Locate(c.p); got != c.want {
			t.Errorf("Locate(%v) = %v, want %v", c.p, got, c.want)
		}
	}
}

func TestBetweenRegions(t *testing.T) {
	d := func(x, y, r float64) Region { return Region{Outer: Circle(Point{x, y}, r)} }
	near(t, "discs", Between(d(0, 0, 3), d(10, 0, 4)).Distance, 3, 1e-13)
	near(t, "inside", Between(d(0, 0, 30), d(10, 0, 4)).Distance, 0, 0)
	near(t, "overlap", Between(d(0, 0, 7), d(10, 0, 4)).Distance, 0, 0)
	near(t, "curves", OutlineDistance(d(0, 0, 30).Outer, d(10, 0, 4).Outer).Distance, 16, 1e-13)
	ring := Region{Outer: Circle(Point{}, 50), Holes: []Outline{CircleHole(Point{}, 40)}}
	near(t, "in the hole", Between(ring, d(10, 0, 4)).Distance, 26, 1e-13)
	bar := Region{Outer: Rectangle(Point{-5, 60}, Point{5, 70})}
	near(t, "ring to bar", Between(ring, bar).Distance, 10, 1e-13)
}

func TestCleanMergesPieces(t *testing.T) {
	o := Outline{
		{Point{0, 0}, 0},
		{Point{5, 0}, 0},
		{Point{5, 0}, 0},
		{Point{10, 0}, 0},
		{Point{10, 10}, 0},
		{Point{0, 10}, 0},
		{Point{0, 3}, 0},
	}
	if got := o.Clean(); len(got) != 4 || got[0].Point != (Point{0, 0}) {
		t.Errorf("Clean = %v", got)
	}
	var c Outline
	for i := range 7 {
		c = append(c, Vertex{Point{3, 4}.Add(Polar(5, float64(i)*2*math.Pi/7)), math.Tan(2 * math.Pi / 28)})
	}
	ctr, r, ok := c.AsCircle()
	if !ok {
		t.Fatalf("seven arcs are no circle: %v", c.Clean())
	}
	near(t, "radius", r, 5, 1e-12)
	near(t, "centre", ctr.Dist(Point{3, 4}), 0, 1e-12)
}

func TestMomentsHandbook(t *testing.T) {
	// Rectangle b h^3/12; circle pi r^4/4 (any mechanics handbook).
	m := Region{Outer: Rectangle(Point{10, 20}, Point{16, 24})}.Moments()
	near(t, "Ixx", m.Ixx, 6*64.0/12, 1e-11)
	near(t, "Iyy", m.Iyy, 4*216.0/12, 1e-11)
	near(t, "Ixy", m.Ixy, 0, 1e-11)
	m = Region{Outer: Circle(Point{-30, 5}, 3)}.Moments()
	near(t, "disc Ixx", m.Ixx, math.Pi*81/4, 1e-11)
	near(t, "disc area", m.Area, math.Pi*9, 1e-12)
}
