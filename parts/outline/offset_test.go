package outline

import (
	"math"
	"testing"
)

func one(t *testing.T, rs []Region) Region {
	t.Helper()
	if len(rs) != 1 {
		t.Fatalf("got %d regions, want 1: %v", len(rs), rs)
	}
	return rs[0]
}

func TestOffsetSteiner(t *testing.T) {
	for _, o := range []Outline{
		Rectangle(Point{0, 0}, Point{20, 10}),
		Circle(Point{1, 2}, 7),
		Capsule(Point{0, 0}, Point{30, 4}, 5),
		Hull(Disc{Point{0, 0}, 5}, Disc{Point{30, 0}, 2}, Disc{Point{10, 20}, 0}),
	} {
		for _, d := range []float64{0.09, 1, 12.5} {
			r := one(t, Offset([]Region{{Outer: o}}, d))
			near(t, "area", r.Area(), o.Area()+d*o.Length()+math.Pi*d*d, 1e-9)
			near(t, "length", r.Length(), o.Length()+2*math.Pi*d, 1e-9)
			back := one(t, Offset([]Region{r}, -d))
			near(t, "back", back.Area(), o.Area(), 1e-9)
			if len(back.Outer) != len(o.Clean()) {
				t.Errorf("back has %d vertices, want %d\n%v\n%v", len(back.Outer), len(o), back.Outer, o)
			}
		}
	}
}

func TestUnionSquares(t *testing.T) {
	a := Region{Outer: Rectangle(Point{0, 0}, Point{10, 10})}
	b := Region{Outer: Rectangle(Point{5, 5}, Point{15, 15})}
	near(t, "union", Area(Union(a, b)), 175, 1e-12)
	near(t, "intersection", Area(Intersection([]Region{a}, []Region{b})), 25, 1e-12)
	near(t, "difference", Area(Difference([]Region{a}, []Region{b})), 75, 1e-12)
	if got := one(t, Union(a, b, a, b)); len(got.Outer) != 8 {
		t.Errorf("union has %d vertices, want 8", len(got.Outer))
	}
}
