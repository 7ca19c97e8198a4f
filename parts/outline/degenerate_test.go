package outline

import (
	"math"
	"testing"
)

func reg(outer Outline, holes ...Outline) []Region {
	return []Region{{Outer: outer, Holes: holes}}
}

func square(x, y, w float64) Outline { return Rectangle(Point{x, y}, Point{x + w, y + w}) }

// halfDisc is the right half of a disc, closed by its diameter.
func halfDisc(c Point, r float64) Outline {
	return Outline{{Point{c.X, c.Y - r}, 1}, {Point: Point{c.X, c.Y + r}}}
}

// Degenerate pairs: what they have in common is a whole edge, an arc, a vertex, everything or nothing. The
// expected areas are exact; counts are regions, holes and vertices of the union.
func TestBooleansDegenerate(t *testing.T) {
	const pi = math.Pi
	disc := Circle(Point{0, 0}, 5)
	ring := reg(Circle(Point{0, 0}, 5), CircleHole(Point{0, 0}, 3))
	for _, c := range []struct {
		name                        string
		a, b                        []Region
		union, common, less         float64
		regions, holes, unionVertex int
	}{
		{"same square", reg(square(0, 0, 10)), reg(square(0, 0, 10)), 100, 100, 0, 1, 0, 4},
		{"same square, other start", reg(square(0, 0, 10)), reg(Polygon(Point{10, 10}, Point{0, 10}, Point{0, 0}, Point{10, 0})), 100, 100, 0, 1, 0, 4},
		{"same circle", reg(disc), reg(disc), 25 * pi, 25 * pi, 0, 1, 0, 2},
		{"same circle, turned", reg(disc), reg(disc.Transform(Place(0.7, false, Point{}))), 25 * pi, 25 * pi, 0, 1, 0, 2},
		{"same circle, mirrored", reg(disc), reg(disc.Transform(Place(0, true, Point{}))), 25 * pi, 25 * pi, 0, 1, 0, 2},
		{"shared edge", reg(square(0, 0, 10)), reg(square(10, 0, 10)), 200, 0, 100, 1, 0, 4},
		{"part of an edge shared", reg(square(0, 0, 10)), reg(square(10, 3, 4)), 116, 0, 100, 1, 0, 8},
		{"shared corner", reg(square(0, 0, 10)), reg(square(10, 10, 10)), 200, 0, 100, 2, 0, 8},
		{"corner on edge", reg(square(0, 0, 10)), reg(Polygon(Point{10, 5}, Point{15, 0}, Point{15, 10})), 125, 0, 100, 2, 0, 7},
		{"inside, sharing an edge", reg(square(0, 0, 10)), reg(square(0, 3, 4)), 100, 16, 84, 1, 0, 4},
		{"inside, sharing two edges", reg(square(0, 0, 10)), reg(square(0, 0, 4)), 100, 16, 84, 1, 0, 4},
		{"inside, sharing a corner", reg(square(0, 0, 10)), reg(Polygon(Point{0, 0}, Point{5, 2}, Point{2, 5})), 100, 10.5, 89.5, 1, 0, 4},
		{"inside", reg(square(0, 0, 10)), reg(square(3, 3, 4)), 100, 16, 84, 1, 0, 4},
		{"apart", reg(square(0, 0, 10)), reg(square(30, 3, 4)), 116, 0, 100, 2, 0, 8},
		{"circles touch outside", reg(disc), reg(Circle(Point{8, 0}, 3)), 34 * pi, 0, 25 * pi, 2, 0, 4},
		{"circles touch outside, turned", reg(disc), reg(Circle(Polar(8, 0.3), 3)), 34 * pi, 0, 25 * pi, 2, 0, 4},
		{"circles touch inside", reg(disc), reg(Circle(Point{2, 0}, 3)), 25 * pi, 9 * pi, 16 * pi, 1, 0, 2},
		{"circles touch inside, turned", reg(disc), reg(Circle(Polar(2, 1.1), 3)), 25 * pi, 9 * pi, 16 * pi, 1, 0, 2},
		{"concentric", reg(disc), reg(Circle(Point{}, 3)), 25 * pi, 9 * pi, 16 * pi, 1, 0, 2},
		{"disc in the hole of its own ring", ring, reg(Circle(Point{}, 3)), 25 * pi, 0, 16 * pi, 1, 0, 2},
		{"disc touching in the ring's hole", ring, reg(Circle(Point{1, 0}, 2)), 20 * pi, 0, 16 * pi, 2, 1, 6},
		{"line tangent to circle", reg(disc), reg(Rectangle(Point{-9, 5}, Point{9, 7})), 25*pi + 36, 0, 25 * pi, 2, 0, 6},
		{"square around circle", reg(square(-5, -5, 10)), reg(disc), 100, 25 * pi, 100 - 25*pi, 1, 0, 4},
		{"two halves of a disc", reg(halfDisc(Point{}, 5)), reg(halfDisc(Point{}, 5).Transform(Place(math.Pi, false, Point{}))), 25 * pi, 0, 12.5 * pi, 1, 0, 2},
		{"half and whole disc", reg(disc), reg(halfDisc(Point{}, 5)), 25 * pi, 12.5 * pi, 12.5 * pi, 1, 0, 2},
		{"arcs partly shared", reg(halfDisc(Point{}, 5)), reg(halfDisc(Point{}, 5).Transform(Place(math.Pi/2, false, Point{}))), 18.75 * pi, 6.25 * pi, 6.25 * pi, 1, 0, 3},
		{"capsule and its end", reg(Capsule(Point{}, Point{20, 0}, 5)), reg(Circle(Point{20, 0}, 5)), 200 + 25*pi, 25 * pi, 200, 1, 0, 4},
		{"capsules with a common end", reg(Capsule(Point{}, Point{20, 0}, 5)), reg(Capsule(Point{}, Point{-20, 0}, 5)), 400 + 25*pi, 25 * pi, 200, 1, 0, 4},
		{"nothing and a square", nil, reg(square(0, 0, 10)), 100, 0, 0, 1, 0, 4},
		{"an outline of no area", reg(Polygon(Point{0, 0}, Point{10, 0})), reg(square(0, 0, 10)), 100, 0, 0, 1, 0, 4},
		{"a wrong-way square", reg(square(0, 0, 10).Reverse()), reg(square(5, 0, 10)), 150, 50, 50, 1, 0, 4},
		{"not a number", reg(Polygon(Point{0, 0}, Point{math.NaN(), 0}, Point{5, 5})), reg(square(0, 0, 10)), 100, 0, 0, 1, 0, 4},
		{"a square with a vertex twice", reg(Polygon(Point{0, 0}, Point{10, 0}, Point{10, 0}, Point{10, 10}, Point{0, 10})), reg(square(5, 0, 10)), 150, 50, 50, 1, 0, 4},
		{"a hair apart", reg(square(0, 0, 10)), reg(square(10+1e-12, 0, 10)), 200, 0, 100, 1, 0, 4},
		{"a hair over", reg(square(0, 0, 10)), reg(square(10-1e-12, 0, 10)), 200, 0, 100, 1, 0, 4},
		{"bow tie counts where it runs counter-clockwise", reg(Polygon(Point{0, 0}, Point{4, 4}, Point{4, 0}, Point{0, 4})), reg(square(20, 0, 1)), 5, 0, 4, 2, 0, 7},
	} {
		t.Run(c.name, func(t *testing.T) {
			u := Union(append(append([]Region(nil), c.a...), c.b...)...)
			i, d := Intersection(c.a, c.b), Difference(c.a, c.b)
			for _, rs := range [][]Region{u, i, d} {
				valid(t, c.name, rs, onLattice)
			}
			near(t, "union", Area(u), c.union, 1e-8)
			near(t, "intersection", Area(i), c.common, 1e-8)
			near(t, "difference", Area(d), c.less, 1e-8)
			holes, vertices := 0, 0
			for _, r := range u {
				holes += len(r.Holes)
				for _, o := range r.Outlines() {
					vertices += len(o)
				}
			}
			if len(u) != c.regions || holes != c.holes || vertices != c.unionVertex {
				t.Errorf("union has %d regions, %d holes, %d vertices, want %d, %d, %d: %v", len(u), holes, vertices, c.regions, c.holes, c.unionVertex, u)
			}
			// The same far from the origin, turned and mirrored.
			for _, m := range []Transform{Place(0.3, false, Point{1234.5, -765.4}), Place(2, true, Point{-20, 3})} {
				a, b := TransformAll(c.a, m), TransformAll(c.b, m)
				near(t, "moved union", Area(Union(append(append([]Region(nil), a...), b...)...)), c.union, 1e-6)
				near(t, "moved intersection", Area(Intersection(a, b)), c.common, 1e-6)
				near(t, "moved difference", Area(Difference(a, b)), c.less, 1e-6)
			}
		})
	}
}

func TestDifferenceMakesHoles(t *testing.T) {
	plate := reg(square(0, 0, 100))
	var drills []Region
	for i := range 5 {
		for j := range 5 {
			drills = append(drills, Region{Outer: Circle(Point{10 + 20*float64(i), 10 + 20*float64(j)}, 3+float64(i)/10)})
		}
	}
	got := one(t, Difference(plate, drills))
	if len(got.Holes) != 25 {
		t.Fatalf("%d holes, want 25", len(got.Holes))
	}
	for k, h := range got.Holes {
		c, r, ok := h.AsCircle()
		if !ok {
			t.Fatalf("hole %d is no circle: %v", k, h)
		}
		// Every hole is one of the drills to the last digits.
		best := math.Inf(1)
		for _, d := range drills {
			dc, dr, _ := d.Outer.AsCircle()
			best = min(best, dc.Dist(c)+math.Abs(dr-r))
		}
		near(t, "hole against drill", best, 0, 1e-12)
		if h.Area() > 0 {
			t.Errorf("hole %d runs counter-clockwise", k)
		}
	}
}

// Offsets with closed forms, among them all that vanish, close, split and join.
func TestOffsetClosedForms(t *testing.T) {
	const pi = math.Pi
	frame := reg(square(0, 0, 20), square(5, 5, 10).Reverse())
	dumbbell := Union(Region{Outer: Circle(Point{-20, 0}, 8)}, Region{Outer: Circle(Point{20, 0}, 8)},
		Region{Outer: Rectangle(Point{-20, -2}, Point{20, 2})})
	// Where the neck joins, the shrunk disc of 5 mm has a tip between arcs of 3 mm about the corners P at
	// (sqrt 60, +-2) from its centre O: twice the triangle O P apex, less two sectors at P and one at O.
	apex := math.Sqrt(60) - math.Sqrt(5)
	atP := math.Acos((64 + 9 - apex*apex) / (2 * 8 * 3))
	tip := 2*apex - 9*atP - 25*math.Atan(2/math.Sqrt(60))
	// L of two 20 x 10 bars: outline area 300, length 80, five convex corners, one concave.
	ell := reg(Polygon(Point{0, 0}, Point{20, 0}, Point{20, 10}, Point{10, 10}, Point{10, 20}, Point{0, 20}))
	for _, c := range []struct {
		name           string
		in             []Region
		d              float64
		area           float64
		regions, holes int
	}{
		{"disc out", reg(Circle(Point{3, 4}, 5)), 2, 49 * pi, 1, 0},
		{"disc in", reg(Circle(Point{3, 4}, 5)), -2, 9 * pi, 1, 0},
		{"disc to nothing", reg(Circle(Point{3, 4}, 5)), -5, 0, 0, 0},
		{"disc beyond nothing", reg(Circle(Point{3, 4}, 5)), -7, 0, 0, 0},
		{"ring out", reg(Circle(Point{}, 9), CircleHole(Point{}, 4)), 1, (100 - 9) * pi, 1, 1},
		{"ring out, hole gone", reg(Circle(Point{}, 9), CircleHole(Point{}, 4)), 4, 169 * pi, 1, 0},
		{"ring out, hole long gone", reg(Circle(Point{}, 9), CircleHole(Point{}, 4)), 6, 225 * pi, 1, 0},
		{"ring in", reg(Circle(Point{}, 9), CircleHole(Point{}, 4)), -1, (64 - 25) * pi, 1, 1},
		{"ring to nothing", reg(Circle(Point{}, 9), CircleHole(Point{}, 4)), -2.5, 0, 0, 0},
		{"ring beyond nothing", reg(Circle(Point{}, 9), CircleHole(Point{}, 4)), -3, 0, 0, 0},
		{"square out", reg(square(0, 0, 10)), 2, 100 + 80 + 4*pi, 1, 0},
		{"square in", reg(square(0, 0, 10)), -2, 36, 1, 0},
		{"square to nothing", reg(square(0, 0, 10)), -5, 0, 0, 0},
		{"frame out", frame, 1, 400 + 80 + pi - 64, 1, 1},
		{"frame out, hole gone", frame, 5, 400 + 400 + 25*pi, 1, 0},
		{"frame in", frame, -1, 18*18 - (100 + 40 + pi), 1, 1},
		{"frame to its corners", frame, -2.5, 4 * (6.25 - 6.25*pi/4), 4, 0},
		{"frame to nothing", frame, -3.6, 0, 0, 0},
		{"capsule in to nothing", reg(Capsule(Point{}, Point{10, 0}, 3)), -3, 0, 0, 0},
		{"capsule in", reg(Capsule(Point{}, Point{10, 0}, 3)), -1, 40 + 4*pi, 1, 0},
		{"dumbbell splits", dumbbell, -3, 2 * (25*pi + tip), 2, 0},
		{"ell out", ell, 2, 300 + 160 + 5*pi - 4, 1, 0},
		{"ell in", ell, -2, 300 - 2*80 + 5*4 - pi, 1, 0},
		{"two discs join", append(reg(Circle(Point{-6, 0}, 5)), reg(Circle(Point{6, 0}, 5))...), 2, 2*49*pi - 2*(49*math.Acos(6.0/7)-6*math.Sqrt(13)), 1, 0},
		{"two discs touch", append(reg(Circle(Point{-6, 0}, 5)), reg(Circle(Point{6, 0}, 5))...), 1, 72 * pi, 2, 0},
		{"overlapping squares in", append(reg(square(0, 0, 10)), reg(square(5, 0, 10))...), -1, 13 * 8, 1, 0},
		{"slot of exactly twice d closes", reg(square(0, 0, 20), Rectangle(Point{5, 9}, Point{15, 11}).Reverse()), 1, 400 + 80 + pi, 1, 0},
		{"nothing", nil, 1, 0, 0, 0},
		{"no offset", reg(square(0, 0, 10)), 0, 100, 1, 0},
		{"half disc out", reg(halfDisc(Point{}, 5)), 1, 12.5*pi + (5*pi + 10) + pi, 1, 0},
		{"wrong way round", reg(square(0, 0, 10).Reverse()), 2, 100 + 80 + 4*pi, 1, 0},
		{"NaN", reg(square(0, 0, 10)), math.NaN(), 0, 0, 0},
		{"endless", reg(square(0, 0, 10)), math.Inf(1), 0, 0, 0},
		{"a square metre by half a micrometre", reg(square(0, 0, 1000)), 5e-4, 1e6 + 2 + pi*25e-8, 1, 0},
	} {
		t.Run(c.name, func(t *testing.T) {
			got := Offset(c.in, c.d)
			valid(t, c.name, got, onLattice)
			near(t, "area", Area(got), c.area, 1e-9*max(1, c.area/1000))
			holes := 0
			for _, r := range got {
				holes += len(r.Holes)
			}
			if len(got) != c.regions || holes != c.holes {
				t.Errorf("%d regions with %d holes, want %d with %d: %v", len(got), holes, c.regions, c.holes, got)
			}
		})
	}
}

func TestOffsetCircleStaysCircle(t *testing.T) {
	for _, r := range []float64{0.4, 2.25, 10, 1000} {
		for _, d := range []float64{0.09, -0.09, 1.0 / 3, -0.377} {
			for _, c := range []Point{{0, 0}, {12.34, -5.678}, {333.3, 444.4}} {
				got := one(t, Offset(reg(Circle(c, r)), d))
				ctr, rad, ok := got.Outer.AsCircle()
				if !ok {
					t.Fatalf("offset %g of a circle of %g is no circle: %v", d, r, got.Outer)
				}
				near(t, "radius", rad, r+d, 1e-12)
				near(t, "centre", ctr.Dist(c), 0, 1e-12)
				hole := OffsetOutline(CircleHole(c, r), d)
				if len(hole) != 1 {
					t.Fatalf("hole: %v", hole)
				}
				_, rad, ok = hole[0].AsCircle()
				if !ok || hole[0].Area() > 0 {
					t.Fatalf("hole became %v", hole)
				}
				near(t, "hole's radius", rad, r-d, 1e-12)
			}
		}
	}
}

func TestRounding(t *testing.T) {
	const pi = math.Pi
	ell := reg(Polygon(Point{0, 0}, Point{20, 0}, Point{20, 10}, Point{10, 10}, Point{10, 20}, Point{0, 20}))
	in := one(t, RoundInside(ell, 3))
	near(t, "filleted ell", in.Area(), 300+9*(1-pi/4), 1e-9)
	if len(in.Outer) != 7 {
		t.Errorf("filleted ell has %d vertices, want 7", len(in.Outer))
	}
	out := one(t, RoundOutside(ell, 3))
	near(t, "rounded ell", out.Area(), 300-5*9*(1-pi/4), 1e-9)
	// A gap narrower than twice the radius closes; a neck thinner than that goes.
	u := reg(Polygon(Point{0, 0}, Point{20, 0}, Point{20, 20}, Point{12, 20}, Point{12, 5}, Point{8, 5}, Point{8, 20}, Point{0, 20}))
	closed := one(t, RoundInside(u, 2.5))
	if closed.Locate(Point{10, 12}) != Inside {
		t.Error("the gap of 4 mm stays open for a radius of 2.5 mm")
	}
	comb := Difference(reg(square(0, 0, 20)), reg(Rectangle(Point{-1, 9}, Point{18, 11})))
	if got := RoundOutside(comb, 1.01); len(got) != 2 {
		t.Errorf("a neck of 2 mm survives a radius of 1.01 mm: %v", got)
	}
	if got := RoundOutside(comb, 0.99); len(got) != 1 {
		t.Errorf("a neck of 2 mm does not survive a radius of 0.99 mm: %v", got)
	}
}

func TestStroke(t *testing.T) {
	const pi = math.Pi
	p := Path{{Point: Point{0, 0}}, {Point: Point{30, 0}}}
	near(t, "straight", Area(Stroke(p, 4)), 240+16*pi, 1e-10)
	arc := Arc(Point{1, 2}, 20, 0.3, 2)
	near(t, "arc", Area(Stroke(arc, 4)), 1.7*20*8+16*pi, 1e-9)
	ring := one(t, Stroke(Arc(Point{1, 2}, 20, 0, 2*pi), 4))
	near(t, "ring", ring.Area(), (24*24-16*16)*pi, 1e-9)
	if len(ring.Holes) != 1 {
		t.Errorf("a closed arc's stroke has %d holes, want 1", len(ring.Holes))
	}
	bend := Path{{Point: Point{0, 0}}, {Point: Point{30, 0}}, {Point: Point{30, 40}}}
	near(t, "bend", Area(Stroke(bend, 4)), 240+320+16*pi-16+4*pi, 1e-9)
	near(t, "dot", Area(Stroke(Path{{Point: Point{5, 5}}, {Point: Point{5, 5}}}, 2)), 4*pi, 1e-12)
	if Stroke(nil, 3) != nil || Stroke(p, 0) != nil || Stroke(p, math.NaN()) != nil {
		t.Error("a stroke of nothing is something")
	}
}
