package linkage

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

func TestShapes(t *testing.T) {
	for _, c := range []struct {
		name   string
		link   Link
		shapes int
		last   Point // of the last pin in the first shape; y by its size
	}{
		{"bar", bar2("l", "A", "B", 7), 1, Point{X: 7}},
		{"right triangle", tri("l", "A", "B", "P", 3, 5, 4), 2, Point{Y: 4}},
		{"beyond the second pin", tri("l", "A", "B", "P", 50, 50, 100), 1, Point{X: 100}},
		{"between", tri("l", "A", "B", "P", 100, 40, 60), 1, Point{X: 60}},
		{"behind the first pin", tri("l", "A", "B", "P", 50, 80, 30), 1, Point{X: -30}},
		{"on a line but for the third decimal", tri("l", "A", "B", "P", 66.667, 33.333, 33.333), 1, Point{X: 33.3335}},
		{"nearly on a line, and meant so", tri("l", "A", "B", "P", 50, math.Hypot(50, 0.1), math.Hypot(100, 0.1)), 2, Point{X: 100, Y: 0.1}},
		{"square without its first side", Link{Name: "l", Pins: []string{"A", "B", "C", "D"}, Lengths: []Length{
			{"A", "C", math.Sqrt2}, {"B", "C", 1}, {"D", "C", 1}, {"A", "D", 1}, {"B", "D", math.Sqrt2},
		}}, 4, Point{Y: 1}}, // B on either side of C-D, and the mirror images
		{"two pins never share a place", Link{Name: "l", Pins: []string{"A", "B", "C", "D"}, Lengths: []Length{
			{"A", "B", 10}, {"A", "C", 6}, {"B", "C", 6}, {"A", "D", 6}, {"B", "D", 6},
		}}, 2, Point{X: 5, Y: math.Sqrt(11)}},
		{"kite without a cross length", Link{Name: "l", Pins: []string{"A", "B", "C", "D"}, Lengths: []Length{
			{"A", "B", 10}, {"A", "C", 8}, {"B", "C", 8}, {"A", "D", 6}, {"B", "D", 6},
		}}, 4, Point{X: 5, Y: math.Sqrt(11)}},
	} {
		got, err := shapes(c.link)
		if err != nil {
			t.Errorf("%s: %v", c.name, err)
			continue
		}
		p := got[0][len(got[0])-1]
		if len(got) != c.shapes || dist(Point{X: p.X, Y: math.Abs(p.Y)}, c.last) > 1e-9 {
			t.Errorf("%s: %d shapes, last pin %v, want %d and %v", c.name, len(got), p, c.shapes, c.last)
		}
	}
}

// TestShapesOfRandomPlates: a plate with drawn holes comes back from its lengths.
func TestShapesOfRandomPlates(t *testing.T) {
	names := []string{"A", "B", "C", "D", "E", "F"}
	rapid.Check(t, func(r *rapid.T) {
		n := rapid.IntRange(3, 6).Draw(r, "pins")
		pts := make([]Point, n)
		for i := range pts {
			pts[i] = Point{X: rapid.Float64Range(-50, 50).Draw(r, "x"), Y: rapid.Float64Range(-50, 50).Draw(r, "y")}
			for j := range i {
				if dist(pts[i], pts[j]) < 1 {
					r.Skip("pins on one another")
				}
			}
		}
		l := Link{Name: "plate", Pins: names[:n]}
		for i := range pts {
			for j := range i {
				if i < 2 || j < 2 {
					l.Lengths = append(l.Lengths, Length{names[j], names[i], dist(pts[i], pts[j])})
				}
			}
		}
		all, err := shapes(l)
		if err != nil {
			r.Fatal(err)
		}
		want := inFrame(pts)
		best := math.Inf(1)
		for _, s := range all {
			worst := 0.0
			for i := range s {
				worst = math.Max(worst, dist(s[i], want[i]))
			}
			best = math.Min(best, worst)
		}
		// Within 1.5e-9 mm of slack a triple counts as straight, which moves a pin sideways by the
		// root of twice that times the length.
		if best > 2e-3 {
			r.Fatalf("no shape of %d is nearer than %g mm", len(all), best)
		}
		flat := false
		for i := 2; i < n; i++ {
			flat = flat || math.Abs(want[i].Y) < 0.5
		}
		if !flat && best > 1e-7 {
			r.Fatalf("no shape of %d is nearer than %g mm", len(all), best)
		}
	})
}
