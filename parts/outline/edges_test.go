package outline

import (
	"math"
	"testing"
)

// The prepared edges say the same as the outlines themselves.
func TestEdgesAgree(t *testing.T) {
	r := Region{
		Outer: Hull(Disc{Point{0, 0}, 8}, Disc{Point{40, 0}, 5}, Disc{Point{20, 30}, 6}),
		Holes: []Outline{CircleHole(Point{0, 0}, 3), CircleHole(Point{20, 10}, 4)},
	}
	e := EdgesOf(r)
	for x := -12.0; x < 50; x += 1.3 {
		for y := -12.0; y < 40; y += 1.7 {
			p := Point{x, y}
			want := math.Inf(1)
			for _, o := range r.Outlines() {
				want = math.Min(want, o.Nearest(p).Distance)
			}
			if got := e.Nearest(p).Distance; got != want {
				t.Fatalf("%v: nearest %v, want %v", p, got, want)
			}
			if r.Locate(p) == Outside {
				want = -want
			}
			if got := e.Depth(p); got != want {
				t.Fatalf("%v: depth %v, want %v", p, got, want)
			}
		}
	}
	o := Rectangle(Point{60, 0}, Point{70, 10})
	if got, want := e.Distance(o).Distance, OutlineDistance(r.Outer, o).Distance; got != want {
		t.Errorf("distance %v, want %v", got, want)
	}
	if d := EdgesOf(Region{}).Nearest(Point{}).Distance; !math.IsInf(d, 1) {
		t.Errorf("no edges are %v away", d)
	}
}
