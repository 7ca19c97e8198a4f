package outline

import (
	"math"
	"math/rand/v2"
	"testing"
)

// Closed forms: Young and Budynas, Roark's Formulas for Stress and Strain, appendix "Properties of a plane
// area" (from memory; the semicircle, quarter circle and triangle are in any mechanics handbook).
func TestMomentsOfHandbookShapes(t *testing.T) {
	const pi = math.Pi
	r := 6.0
	half := Outline{{Point{0, -r}, 1}, {Point: Point{0, r}}}
	m := half.Moments()
	near(t, "half disc: centroid", m.Centroid.X, 4*r/(3*pi), 1e-12)
	near(t, "half disc: about its axis", m.Ixx, pi*math.Pow(r, 4)/8, 1e-10)
	near(t, "half disc: across", m.Iyy, (pi/8-8/(9*pi))*math.Pow(r, 4), 1e-10)
	quarter := Outline{{Point{0, 0}, 0}, {Point{r, 0}, math.Tan(pi / 8)}, {Point: Point{0, r}}}
	m = quarter.Moments()
	near(t, "quarter disc: Ixx", m.Ixx, (pi/16-4/(9*pi))*math.Pow(r, 4), 1e-10)
	near(t, "quarter disc: Ixy", m.Ixy, (1.0/8-4/(9*pi))*math.Pow(r, 4), 1e-10)
	b, h := 9.0, 4.0
	m = Polygon(Point{0, 0}, Point{b, 0}, Point{0, h}).Moments()
	near(t, "triangle: Ixx", m.Ixx, b*h*h*h/36, 1e-10)
	near(t, "triangle: Iyy", m.Iyy, h*b*b*b/36, 1e-10)
	near(t, "triangle: Ixy", m.Ixy, -b*b*h*h/72, 1e-10)
	// Ring sector of half angle a about the x axis: centroid 2/3 sin a / a (R^3-r^3)/(R^2-r^2).
	R, q, a := 20.0, 14.0, 0.8
	sector := Outline{
		{Polar(R, -a), math.Tan(a / 2)},
		{Polar(R, a), 0},
		{Polar(q, a), -math.Tan(a / 2)},
		{Polar(q, -a), 0},
	}
	m = sector.Moments()
	near(t, "ring sector: area", m.Area, a*(R*R-q*q), 1e-10)
	near(t, "ring sector: centroid", m.Centroid.X, 2*math.Sin(a)/(3*a)*(R*R*R-q*q*q)/(R*R-q*q), 1e-11)
	near(t, "ring sector: Ixx", m.Ixx, (math.Pow(R, 4)-math.Pow(q, 4))/8*(2*a-math.Sin(2*a)), 1e-8)
	// A plate with a hole: subtract, and shift by Steiner's theorem.
	plate := Region{Outer: Rectangle(Point{0, 0}, Point{30, 20}), Holes: []Outline{CircleHole(Point{20, 12}, 4)}}
	m = plate.Moments()
	A, H := 600.0, 16*pi
	cx, cy := (A*15-H*20)/(A-H), (A*10-H*12)/(A-H)
	near(t, "plate: area", m.Area, A-H, 1e-11)
	near(t, "plate: cx", m.Centroid.X, cx, 1e-11)
	near(t, "plate: cy", m.Centroid.Y, cy, 1e-11)
	near(t, "plate: Ixx", m.Ixx, 30*8000.0/12+A*(10-cy)*(10-cy)-pi*256/4-H*(12-cy)*(12-cy), 1e-8)
	near(t, "plate: Ixy", m.Ixy, A*(15-cx)*(10-cy)-H*(20-cx)*(12-cy), 1e-8)
}

// A nearly flat arc has a radius of kilometres and is as exact as a line: its area is 2/3 sagitta chord.
func TestNearlyFlatArcs(t *testing.T) {
	for _, bulge := range []float64{1e-5, 1e-7, 1e-9, 1e-11} {
		flat := Rectangle(Point{300, 200}, Point{400, 250})
		flat[0].Bulge = bulge
		sagitta := 50 * bulge
		near(t, "area", flat.Area(), 5000+2.0/3*sagitta*100, 1e-11)
		near(t, "moments' area", flat.Moments().Area, 5000+2.0/3*sagitta*100, 1e-9)
		near(t, "low", flat.Bounds().Min.Y, 200-sagitta, 1e-11)
		near(t, "nearest", flat.Nearest(Point{350, 190}).Distance, 10-sagitta, 1e-11)
		up := reg(Rectangle(Point{340, 100}, Point{360, 240}))
		got := Intersection(reg(flat), up)
		// The mean of 1-(x/50)^2 over the middle 20 mm is 1-1/75.
		near(t, "cut out", Area(got), 20*40+20*sagitta*(1-1.0/75), 1e-7)
		grown := Offset(reg(flat), 1)
		near(t, "grown", Area(grown), flat.Area()+flat.Length()+math.Pi, 1e-7)
	}
}

func TestTransformKeepsMeasures(t *testing.T) {
	r := rand.New(rand.NewPCG(1, 2))
	for range 50 {
		for _, reg := range randomShape(t, r, general) {
			m := Place(r.Float64()*7, r.IntN(2) == 0, Point{r.Float64() * 100, r.Float64() * 100})
			moved := reg.Transform(m)
			near(t, "area", moved.Area(), reg.Area(), 1e-9)
			near(t, "length", moved.Length(), reg.Length(), 1e-9)
			a, b := reg.Moments(), moved.Moments()
			near(t, "centroid", m.Apply(a.Centroid).Dist(b.Centroid), 0, 1e-9)
			near(t, "polar moment", a.Ixx+a.Iyy, b.Ixx+b.Iyy, 1e-7)
			if moved.Outer.Area() < 0 {
				t.Error("outer outline runs clockwise after a mirroring motion")
			}
			back := moved.Transform(m.Inverse())
			near(t, "there and back", HausdorffDistance(back.Outer, reg.Outer), 0, 1e-9)
		}
	}
}

func TestReverse(t *testing.T) {
	o := Outline{{Point{0, 0}, 0.5}, {Point{10, 0}, 0}, {Point{10, 10}, -0.25}}
	r := o.Reverse()
	near(t, "area", r.Area(), -o.Area(), 1e-12)
	near(t, "length", r.Length(), o.Length(), 1e-12)
	if r[0].Point != o[0].Point {
		t.Errorf("reversed starts at %v", r[0])
	}
	if rr := r.Reverse(); len(rr) != len(o) || rr[0] != o[0] || rr[1] != o[1] || rr[2] != o[2] {
		t.Errorf("reversed twice: %v", rr)
	}
	p := Path{{Point{0, 0}, 0.5}, {Point{10, 0}, 0}, {Point{10, 10}, 7}}
	q := p.Reverse()
	near(t, "path", q.Length(), p.Length(), 1e-12)
	if q[0].Point != p[2].Point || q[1].Bulge != -0.5 || q[2].Bulge != 0 {
		t.Errorf("reversed path: %v", q)
	}
}

func TestSegmentView(t *testing.T) {
	s := Segment{Point{0, 0}, Point{10, 0}, 1} // half circle below the chord
	near(t, "length", s.Length(), 5*math.Pi, 1e-13)
	near(t, "radius", s.Radius(), 5, 1e-13)
	near(t, "middle", s.At(0.5).Dist(Point{5, -5}), 0, 1e-13)
	near(t, "centre", s.Centre().Dist(Point{5, 0}), 0, 1e-13)
	near(t, "tangent", s.Tangent(0.5).Dist(Point{1, 0}), 0, 1e-13)
	near(t, "first tangent", s.Tangent(0).Dist(Point{0, -1}), 0, 1e-13)
	n := s.Nearest(Point{5, 3})
	near(t, "nearest", n.Distance, math.Sqrt(34), 1e-13)
	n = s.Nearest(Point{5, -7})
	near(t, "nearest", n.Distance, 2, 1e-13)
	if !math.IsInf(Segment{Point{0, 0}, Point{1, 0}, 0}.Radius(), 1) {
		t.Error("a line has a radius")
	}
	for _, c := range []struct {
		a, b Segment
		want []Point
	}{
		{Segment{Point{0, 0}, Point{10, 10}, 0}, Segment{Point{0, 10}, Point{10, 0}, 0}, []Point{{5, 5}}},
		{Segment{Point{-10, -3}, Point{20, -3}, 0}, s, []Point{{1, -3}, {9, -3}}},
		{Segment{Point{-10, -5}, Point{20, -5}, 0}, s, []Point{{5, -5}}},
		{Segment{Point{-10, -6}, Point{20, -6}, 0}, s, nil},
		{s, s.Reverse(), []Point{{0, 0}, {10, 0}}},
		{Segment{Point{0, 0}, Point{10, 0}, 0}, Segment{Point{4, 0}, Point{20, 0}, 0}, []Point{{4, 0}, {10, 0}}},
		{Segment{Point{0, 0}, Point{10, 0}, 0}, Segment{Point{10, 0}, Point{20, 0}, 0}, []Point{{10, 0}}},
		{s, Segment{Point{0, -10}, Point{10, -10}, -1}, []Point{{5, -5}}}, // half circle above, touching
		{s, Segment{Point{0, -8}, Point{10, -8}, -1}, []Point{{2, -4}, {8, -4}}},
	} {
		got := c.a.Intersect(c.b)
		if len(got) != len(c.want) {
			t.Errorf("%v and %v meet at %v, want %v", c.a, c.b, got, c.want)
			continue
		}
		for i := range got {
			near(t, "meeting point", got[i].Dist(c.want[i]), 0, 1e-9)
		}
	}
}

// Nearest and SegmentDistance against a fine scan of both segments.
func TestDistanceAgainstScan(t *testing.T) {
	r := rand.New(rand.NewPCG(5, 6))
	segment := func() Segment {
		s := Segment{A: Point{r.Float64() * 10, r.Float64() * 10}, B: Point{r.Float64() * 10, r.Float64() * 10}}
		if r.IntN(2) == 0 {
			s.Bulge = r.Float64()*4 - 2
		}
		return s
	}
	for range 300 {
		a, b := segment(), segment()
		got := SegmentDistance(a, b)
		near(t, "ends", got.A.Dist(got.B), got.Distance, 1e-9)
		near(t, "A on the first", a.Nearest(got.A).Distance, 0, 1e-9)
		near(t, "B on the second", b.Nearest(got.B).Distance, 0, 1e-9)
		const n = 400
		best := math.Inf(1)
		for i := range n + 1 {
			best = min(best, b.Nearest(a.At(float64(i)/n)).Distance)
		}
		if got.Distance > best+1e-9 || got.Distance < best-a.Length()/n {
			t.Errorf("distance of %v and %v is %g, the scan says %g", a, b, got.Distance, best)
		}
		p := Point{r.Float64()*30 - 10, r.Float64()*30 - 10}
		near1, scan := a.Nearest(p).Distance, math.Inf(1)
		for i := range n + 1 {
			scan = min(scan, a.At(float64(i)/n).Dist(p))
		}
		if near1 > scan+1e-9 || near1 < scan-a.Length()/n {
			t.Errorf("distance of %v from %v is %g, the scan says %g", p, a, near1, scan)
		}
	}
}

func TestOverlapAndContains(t *testing.T) {
	a := Region{Outer: square(0, 0, 10)}
	for _, c := range []struct {
		b             Region
		tol           float64
		overlap, hold bool
	}{
		{Region{Outer: square(10, 0, 10)}, 0, false, false},
		{Region{Outer: square(9.9, 0, 10)}, 0, true, false},
		{Region{Outer: square(9.9, 0, 10)}, 0.11, false, false},
		{Region{Outer: square(9.9, 0, 10)}, 0.09, true, false},
		{Region{Outer: square(2, 2, 3)}, 0, true, true},
		{Region{Outer: square(0, 0, 3)}, 0, true, true},
		{a, 0, true, true},
		{Region{Outer: square(30, 0, 10)}, 0, false, false},
		{Region{Outer: square(-5, -5, 20)}, 0, true, false},
		{Region{Outer: square(-5, -5, 20), Holes: []Outline{square(-1, -1, 12).Reverse()}}, 0, false, false},
		{Region{Outer: square(-5, -5, 20), Holes: []Outline{square(0, 0, 10).Reverse()}}, 0, false, false},
		{Region{Outer: square(-5, -5, 20), Holes: []Outline{square(1, -1, 12).Reverse()}}, 0, true, false},
		{Region{}, 0, false, true},
	} {
		if got := Overlap(a, c.b, c.tol); got != c.overlap {
			t.Errorf("Overlap with %v, %g = %v", c.b, c.tol, got)
		}
		if got := Contains(a, c.b); got != c.hold {
			t.Errorf("Contains %v = %v", c.b, got)
		}
	}
}

func TestHausdorff(t *testing.T) {
	c := Circle(Point{}, 10)
	for _, x := range []struct {
		name string
		a, b Outline
		want float64
	}{
		{"itself", c, c, 0},
		{"itself, turned", c, c.Transform(Place(1, false, Point{})), 0},
		{"concentric", c, Circle(Point{}, 12.5), 2.5},
		{"moved", c, Circle(Point{3, 4}, 10), 5},
		{"a hair", c, Circle(Point{0, 0}, 10+1e-7), 1e-7},
		{"squares", square(0, 0, 10), square(-1, -1, 12), math.Sqrt2},
		{"square and circle", square(-5, -5, 10), Circle(Point{}, 5), 5*math.Sqrt2 - 5},
		{"a bump", square(0, 0, 10), Outline{{Point{0, 0}, 0}, {Point{10, 0}, 0.2}, {Point{10, 10}, 0}, {Point{0, 10}, 0}}, 1},
		{"offset", gear(40), Offset(reg(gear(40)), 0.05)[0].Outer, 0},
	} {
		got := HausdorffDistance(x.a, x.b)
		if x.name == "offset" {
			// Round corners are at 0.05, trimmed ones further.
			if got < 0.05-1e-9 || got > 0.2 {
				t.Errorf("%s: %g", x.name, got)
			}
			continue
		}
		if got < x.want-1e-12 || got > x.want*(1+1e-6)+1.1e-10 {
			t.Errorf("%s: %.12g, want %.12g", x.name, got, x.want)
		}
	}
	if !math.IsInf(HausdorffDistance(c, nil), 1) || HausdorffDistance(nil, nil) != 0 {
		t.Error("empty outlines")
	}
	// Never less than a scan says, on random pairs.
	r := rand.New(rand.NewPCG(3, 4))
	for range 30 {
		a, b := randomPiece(r, general).Outer, randomPiece(r, general).Outer
		got, scan := HausdorffDistance(a, b), 0.0
		for _, p := range [2][2]Outline{{a, b}, {b, a}} {
			for _, s := range p[0].Segments() {
				for i := range 50 {
					scan = max(scan, p[1].Nearest(s.At(float64(i)/50)).Distance)
				}
			}
		}
		if got < scan-1e-9 || got > scan+0.3 {
			t.Errorf("Hausdorff distance %g, the scan says %g", got, scan)
		}
	}
}

func TestThin(t *testing.T) {
	neck := Union(Region{Outer: square(0, 0, 20)}, Region{Outer: square(40, 0, 20)}, Region{Outer: Rectangle(Point{15, 9}, Point{45, 11})})
	for _, c := range []struct {
		name  string
		r     Region
		width float64
		want  []Point
	}{
		{"neck", one(t, neck), 2.5, []Point{{30, 10}}},
		{"neck wide enough", one(t, neck), 1.9, nil},
		{"square", Region{Outer: square(0, 0, 20)}, 15, nil},
		{"thin square", Region{Outer: square(0, 0, 20)}, 21, []Point{{10, 10}}},
		{"chamfered", Region{Outer: Polygon(Point{1, 0}, Point{19, 0}, Point{20, 1}, Point{20, 20}, Point{0, 20}, Point{0, 1})}, 5, nil},
		{"rounded", one(t, RoundOutside(reg(square(0, 0, 20)), 1)), 5, nil},
		{"equilateral triangle", Region{Outer: Polygon(Point{0, 0}, Point{20, 0}, Point{10, 17.33})}, 5, nil},
		{"web to the edge", Region{Outer: square(0, 0, 20), Holes: []Outline{CircleHole(Point{5, 10}, 4)}}, 2, []Point{{0.5, 10}}},
		{"web between holes", Region{Outer: square(0, 0, 30), Holes: []Outline{CircleHole(Point{10, 15}, 4), CircleHole(Point{19, 15}, 4)}}, 2, []Point{{14.5, 15}}},
		{"narrow bar", Region{Outer: Capsule(Point{0, 0}, Point{30, 0}, 2)}, 5, []Point{{0, 0}, {15, 0}, {30, 0}}},
		{"wide bar", Region{Outer: Capsule(Point{0, 0}, Point{30, 0}, 2)}, 3.9, nil},
		{"small disc", Region{Outer: Circle(Point{3, 4}, 2)}, 5, []Point{{3, 4}}},
		{"waist", one(t, Difference(reg(square(0, 0, 30)), append(reg(Circle(Point{15, 0}, 14)), reg(Circle(Point{15, 30}, 14))...))), 3, []Point{{15, 15}, {0.5, 0}, {29.5, 0}, {0.5, 30}, {29.5, 30}}},
		{"nothing", Region{}, 5, nil},
	} {
		got := Thin(c.r, c.width)
		ok := len(got) == len(c.want)
		for i := range c.want {
			found := false
			for _, p := range got {
				found = found || p.Dist(c.want[i]) < 1e-6
			}
			ok = ok && found
		}
		if !ok {
			t.Errorf("%s: %v, want %v", c.name, got, c.want)
		}
	}
}

func TestFlattenSides(t *testing.T) {
	shapes := []Outline{
		Circle(Point{1, 2}, 10),
		CircleHole(Point{1, 2}, 10),
		Capsule(Point{0, 0}, Point{20, 7}, 4),
		ArcSlot(Point{0, 0}, 20, 0.2, 3, 3),
		{{Point{0, 0}, 0.3}, {Point{20, 0}, -0.3}, {Point{20, 20}, 0}, {Point{0, 20}, -0.2}},
	}
	r := rand.New(rand.NewPCG(8, 9))
	for range 20 {
		for _, x := range randomShape(t, r, general) {
			shapes = append(shapes, x.Outlines()...)
		}
	}
	for k, o := range shapes {
		for _, chord := range []float64{0.5, 0.05, 0.001} {
			for _, side := range []Side{Inscribed, Within, Around} {
				p := Polygon(Flatten(o, chord, side)...)
				if (p.Area() > 0) != (o.Area() > 0) {
					t.Fatalf("shape %d: flattening turned it round", k)
				}
				if d := HausdorffDistance(p, o); d > chord+1e-9 {
					t.Errorf("shape %d, side %d: strays by %g, allowed %g", k, side, d, chord)
				}
				if chord > 0.01 {
					continue
				}
				if err := p.Validate(); err != nil && !Touching(err) {
					t.Fatalf("shape %d, side %d, chord %g: %v", k, side, chord, err)
				}
				in, out := reg(abs(p)), reg(abs(o))
				if side == Around {
					in, out = out, in
				}
				if side != Inscribed {
					if rest := Area(Difference(in, out)); rest > 1e-8 {
						t.Errorf("shape %d, side %d: sticks out by %g mm2", k, side, rest)
					}
				}
			}
		}
	}
	// The material's side, with a hole.
	ring := Region{Outer: Circle(Point{}, 10), Holes: []Outline{CircleHole(Point{}, 4)}}
	w, a := FlattenRegion(ring, 0.01, Within), FlattenRegion(ring, 0.01, Around)
	area := func(ps [][]Point) float64 {
		s := 0.0
		for _, p := range ps {
			s += Polygon(p...).Area()
		}
		return s
	}
	if !(area(w) < ring.Area() && ring.Area() < area(a)) || area(a)-area(w) > 0.04*ring.Length() {
		t.Errorf("within %g, exact %g, around %g", area(w), ring.Area(), area(a))
	}
}

func abs(o Outline) Outline {
	if o.Area() < 0 {
		return o.Reverse()
	}
	return o
}

func TestValidate(t *testing.T) {
	hole := CircleHole(Point{5, 5}, 2)
	for _, c := range []struct {
		name string
		r    Region
		kind FaultKind
		at   Point
	}{
		{"not a number", Region{Outer: Polygon(Point{0, 0}, Point{math.NaN(), 0}, Point{1, 1})}, FaultNumber, Point{}},
		{"endless", Region{Outer: Polygon(Point{0, 0}, Point{math.Inf(1), 0}, Point{1, 1})}, FaultNumber, Point{}},
		{"bulge", Region{Outer: Outline{{Point{0, 0}, math.Inf(1)}, {Point: Point{1, 0}}}}, FaultNumber, Point{}},
		{"one vertex", Region{Outer: Polygon(Point{0, 0})}, FaultTooFew, Point{}},
		{"empty", Region{}, FaultTooFew, Point{}},
		{"flat", Region{Outer: Polygon(Point{0, 0}, Point{5, 0})}, FaultTooFew, Point{0, 0}},
		{"double vertex", Region{Outer: Polygon(Point{0, 0}, Point{5, 0}, Point{5, 0}, Point{5, 5})}, FaultNoLength, Point{5, 0}},
		{"bow tie", Region{Outer: Polygon(Point{0, 0}, Point{4, 4}, Point{4, 0}, Point{0, 6})}, FaultCrossing, Point{2.4, 2.4}},
		{"arc through side", Region{Outer: Outline{{Point{0, 0}, 0}, {Point{10, 0}, 0}, {Point{10, 4}, -1}, {Point{0, 4}, 0}}}, FaultTouching, Point{}},
		{"clockwise", Region{Outer: square(0, 0, 10).Reverse()}, FaultDirection, Point{0, 0}},
		{"hole counter-clockwise", Region{Outer: square(0, 0, 10), Holes: []Outline{Circle(Point{5, 5}, 2)}}, FaultDirection, Point{5, 3}},
		{"hole outside", Region{Outer: square(20, 0, 10), Holes: []Outline{hole}}, FaultPlace, Point{5, 3}},
		{"hole in hole", Region{Outer: square(0, 0, 10), Holes: []Outline{hole, CircleHole(Point{5, 5}, 1)}}, FaultPlace, Point{5, 4}},
		{"hole over the edge", Region{Outer: square(4, 0, 10), Holes: []Outline{hole}}, FaultCrossing, Point{4, 0}},
		{"hole at the edge", Region{Outer: square(3, 0, 10), Holes: []Outline{hole}}, FaultTouching, Point{3, 5}},
		{"same hole twice", Region{Outer: square(0, 0, 10), Holes: []Outline{hole, hole}}, FaultAlong, Point{}},
	} {
		if c.name == "arc through side" {
			// The half circle of 5 mm dips below the bottom side and crosses it.
			c.kind = FaultCrossing
		}
		err := c.r.Validate()
		f, ok := err.(*Fault)
		if !ok {
			t.Errorf("%s: %v", c.name, err)
			continue
		}
		if f.Kind != c.kind {
			t.Errorf("%s: kind %d (%v), want %d", c.name, f.Kind, err, c.kind)
		}
		if c.at != (Point{}) && c.kind != FaultCrossing && f.At.Dist(c.at) > 1e-6 {
			t.Errorf("%s: at %v, want %v", c.name, f.At, c.at)
		}
	}
	for _, o := range []Outline{Circle(Point{}, 1), square(0, 0, 1), Capsule(Point{}, Point{1, 1}, 0.2), gear(100), gear(100).Reverse()} {
		if err := o.Validate(); err != nil {
			t.Errorf("%v: %v", o, err)
		}
	}
}
