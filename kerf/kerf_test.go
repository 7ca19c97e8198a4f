package kerf

import (
	"errors"
	"fmt"
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"pinwright/parts/outline"
)

func pt(x, y float64) outline.Point { return outline.Point{X: x, Y: y} }

// Closed forms: circles change their radius and nothing else; a convex outline grows by Steiner's
// formula, area + perimeter d + pi d^2.
func TestClosedForms(t *testing.T) {
	const w = 0.18
	d := w / 2
	for _, c := range []struct {
		name string
		r    outline.Region
	}{
		{"disc with a hole", outline.Region{Outer: outline.Circle(pt(3, 4), 20), Holes: []outline.Outline{outline.CircleHole(pt(5, 5), 4)}}},
		{"bar", outline.Region{Outer: outline.Capsule(pt(0, 0), pt(50, 10), 9), Holes: []outline.Outline{outline.CircleHole(pt(0, 0), 2.25), outline.CircleHole(pt(50, 10), 2.25)}}},
		{"rectangle", outline.Region{Outer: outline.Rectangle(pt(0, 0), pt(60, 20))}},
		{"slot", outline.Region{Outer: outline.Rectangle(pt(-30, -20), pt(60, 20)), Holes: []outline.Outline{outline.Capsule(pt(0, 0), pt(20, 0), 3).Reverse()}}},
	} {
		names := make([]string, len(c.r.Holes))
		cut, err := Compensate(c.name, c.r, names, Beam{w})
		if err != nil {
			t.Errorf("%s: %v", c.name, err)
			continue
		}
		want := c.r.Outer.Area() + c.r.Outer.Length()*d + math.Pi*d*d
		if got := cut.Outside.Area(); math.Abs(got-want) > 1e-9*want {
			t.Errorf("%s: outside %v, want %v", c.name, got, want)
		}
		for i, h := range c.r.Holes {
			want := h.Area() + h.Length()*d - math.Pi*d*d // both areas are negative
			if got := cut.Inside[i].Area(); math.Abs(got-want) > 1e-9*math.Abs(want) {
				t.Errorf("%s: inside %d is %v, want %v", c.name, i, got, want)
			}
			centre, radius, round := h.AsCircle()
			if c2, r2, still := cut.Inside[i].AsCircle(); round && (!still || c2.Dist(centre) > 1e-12 || math.Abs(r2-(radius-d)) > 1e-12) {
				t.Errorf("%s: a round hole of radius %v becomes %v, %v, %v", c.name, radius, c2, r2, still)
			}
		}
	}
}

func TestNoBeamNoChange(t *testing.T) {
	r := outline.Region{Outer: outline.Rectangle(pt(0, 0), pt(9, 9)), Holes: []outline.Outline{outline.CircleHole(pt(4, 4), 0.01)}}
	cut, err := Compensate("a", r, []string{"h"}, Beam{})
	if err != nil || fmt.Sprint(cut.Region()) != fmt.Sprint(r) {
		t.Errorf("%v, %v", cut, err)
	}
	back, err := Finished(cut, Beam{})
	if err != nil || fmt.Sprint(back) != fmt.Sprint(r) {
		t.Errorf("%v, %v", back, err)
	}
}

// A region with rounded inside corners comes back from the beam exactly; whether a point is left is
// also decided by the definition of a beam alone: no centre line is nearer than its radius.
func TestBeamGivesThePartBack(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		num := func(name string, low, high float64) float64 { return rapid.Float64Range(low, high).Draw(t, name) }
		w := num("beam", 0.05, 0.5)
		var shapes []outline.Region
		var holes []outline.Outline
		for i := range rapid.IntRange(2, 5).Draw(t, "pins") {
			at := pt(float64(i)*22, num("y", -25, 25))
			shapes = append(shapes,
				outline.Region{Outer: outline.Capsule(pt(40, 0), at, num("arm", 4, 7))},
				outline.Region{Outer: outline.Circle(at, num("boss", 7, 9))})
			switch rapid.IntRange(0, 2).Draw(t, "hole") {
			case 0:
				holes = append(holes, outline.CircleHole(at, num("r", 1, 4)))
			case 1:
				holes = append(holes, outline.Capsule(at, at.Add(pt(2, 1)), num("r", 1, 2.5)).Reverse())
			case 2:
				holes = append(holes, outline.Hull(outline.Disc{Centre: at, Radius: 1.5}, outline.Disc{Centre: at.Add(pt(1, 2)), Radius: num("r", 0.4, 1)}).Reverse())
			}
		}
		rs := outline.RoundInside(outline.Union(shapes...), 1)
		if len(rs) != 1 || len(rs[0].Holes) > 0 {
			t.Skip("not one part")
		}
		r := outline.Region{Outer: rs[0].Outer, Holes: holes}
		if r.Validate() != nil {
			t.Skip("holes meet")
		}
		cut, err := Compensate("part", r, make([]string, len(holes)), Beam{w})
		if err != nil {
			t.Fatal(err)
		}
		back, err := Finished(cut, Beam{w})
		if err != nil {
			t.Fatal(err)
		}
		for i, o := range r.Outlines() {
			if d := outline.HausdorffDistance(o, back.Outlines()[i]); d > 1e-6 {
				t.Fatalf("outline %d comes back %v away", i, d)
			}
		}
		region := cut.Region()
		for range 60 {
			p := pt(num("px", -20, 110), num("py", -40, 40))
			near := math.Inf(1)
			for _, o := range region.Outlines() {
				near = math.Min(near, o.Nearest(p).Distance)
			}
			if math.Abs(near-w/2) < 1e-6 {
				continue
			}
			left := region.Locate(p) == outline.Inside && near > w/2
			if got := back.Locate(p) == outline.Inside; got != left {
				t.Fatalf("%v: in the part %v, left by the beam %v", p, got, left)
			}
		}
	})
}

// A sharp inside corner comes out with the beam's radius: no more is lost than (sqrt 2 - 1) of it.
func TestSharpCorners(t *testing.T) {
	const w = 0.2
	r := outline.Region{Outer: outline.Rectangle(pt(0, 0), pt(30, 30)), Holes: []outline.Outline{outline.Rectangle(pt(10, 10), pt(20, 13)).Reverse()}}
	cut, err := Compensate("a", r, []string{"slot"}, Beam{w})
	if err != nil {
		t.Fatal(err)
	}
	if want := outline.Rectangle(pt(10.1, 10.1), pt(19.9, 12.9)); outline.HausdorffDistance(cut.Inside[0], want) > 1e-9 {
		t.Errorf("path %v", cut.Inside[0])
	}
	back, err := Finished(cut, Beam{w})
	if err != nil {
		t.Fatal(err)
	}
	if got, want := outline.HausdorffDistance(back.Holes[0], r.Holes[0]), (math.Sqrt2-1)*w/2; math.Abs(got-want) > 1e-6 {
		t.Errorf("corners are off by %v, want %v", got, want)
	}
	if got, want := -back.Holes[0].Area(), 30-(4-math.Pi)*w*w/4; math.Abs(got-want) > 1e-9 {
		t.Errorf("slot of %v mm2, want %v", got, want)
	}
}

func dumbbell(neck float64) outline.Outline {
	rs := outline.Union(
		outline.Region{Outer: outline.Circle(pt(0, 0), 3)}, outline.Region{Outer: outline.Circle(pt(12, 0), 3)},
		outline.Region{Outer: outline.Rectangle(pt(0, -neck/2), pt(12, neck/2))})
	return rs[0].Outer
}

func TestWhatTheBeamCannotMake(t *testing.T) {
	plate := outline.Rectangle(pt(-20, -20), pt(40, 20))
	notched := func(width float64) outline.Outline {
		return outline.Difference([]outline.Region{{Outer: plate}}, []outline.Region{{Outer: outline.Rectangle(pt(5, 0), pt(5+width, 30))}})[0].Outer
	}
	pocket := outline.Difference([]outline.Region{{Outer: plate}}, outline.Union(
		outline.Region{Outer: outline.Circle(pt(5, 0), 5)}, outline.Region{Outer: outline.Rectangle(pt(4.95, 0), pt(5.05, 30))}))[0].Outer
	for _, c := range []struct {
		name  string
		outer outline.Outline
		hole  outline.Outline
		beam  float64
		want  []string
	}{
		{"thin slot", plate, outline.Rectangle(pt(0, 0), pt(10, 0.15)), 0.18, []string{"coupler: tab 1 at (5, 0.07", "is 0.15 mm wide, the beam takes 0.18 mm: make it at least 0.2 mm"}},
		{"pin prick", plate, outline.Circle(pt(1, 2), 0.05), 0.2, []string{"coupler: tab 1 at (1, 2) is 0.1 mm wide"}},
		{"neck", plate, dumbbell(0.1), 0.2, []string{"coupler: tab 1 at (", "is narrower than the beam (0.1 mm, the beam takes 0.2 mm): its path falls into pieces"}},
		{"slit in the edge", notched(0.1), nil, 0.2, []string{"coupler: outside at (5", "0.1 mm, the beam takes 0.2 mm", "does not go into it"}},
		{"pocket behind a slit", pocket, nil, 0.2, []string{"coupler: outside at (", "its path closes on itself", "0.1 mm"}},
	} {
		r := outline.Region{Outer: c.outer}
		var names []string
		if c.hole != nil {
			r.Holes, names = []outline.Outline{c.hole.Reverse()}, []string{"tab 1"}
		}
		_, err := Compensate("coupler", r, names, Beam{c.beam})
		if err == nil {
			t.Errorf("%s: no error", c.name)
			continue
		}
		for _, w := range c.want {
			if !strings.Contains(err.Error(), w) {
				t.Errorf("%s: %q lacks %q", c.name, err, w)
			}
		}
		var e *Error
		if !errors.As(err, &e) || e.Part != "coupler" || e.Beam != c.beam || !(e.Size < c.beam) || !(e.Size > 0) {
			t.Errorf("%s: %+v", c.name, e)
		}
	}
	// The same at a width that the beam does make.
	for _, o := range []outline.Outline{notched(0.3)} {
		if _, err := Compensate("coupler", outline.Region{Outer: o}, nil, Beam{0.2}); err != nil {
			t.Error(err)
		}
	}
	if _, err := Compensate("coupler", outline.Region{Outer: plate, Holes: []outline.Outline{dumbbell(0.3).Reverse()}}, []string{"x"}, Beam{0.2}); err != nil {
		t.Error(err)
	}
}

func TestAllFeaturesAtOnce(t *testing.T) {
	r := outline.Region{Outer: outline.Rectangle(pt(0, 0), pt(30, 30)), Holes: []outline.Outline{outline.CircleHole(pt(5, 5), 0.05), outline.CircleHole(pt(15, 5), 3), outline.CircleHole(pt(25, 5), 0.04)}}
	_, err := Compensate("plate", r, []string{"A", "B", "C"}, Beam{0.2})
	if err == nil || strings.Count(err.Error(), "\n") != 1 || !strings.Contains(err.Error(), "plate: A") || !strings.Contains(err.Error(), "plate: C") {
		t.Errorf("%v", err)
	}
}

func TestBeamsNobodyHas(t *testing.T) {
	r := outline.Region{Outer: outline.Rectangle(pt(0, 0), pt(30, 30))}
	for _, w := range []float64{-0.1, math.NaN(), math.Inf(1), math.Inf(-1), 25, 1.6} {
		if _, err := Compensate("plate", r, nil, Beam{w}); err == nil || !strings.HasPrefix(err.Error(), "plate: the kerf is") {
			t.Errorf("%v: %v", w, err)
		}
		if _, err := Finished(Cut{Outside: r.Outer}, Beam{w}); err == nil {
			t.Errorf("%v: taken", w)
		}
	}
	if _, err := Compensate("plate", r, []string{"A"}, Beam{0.2}); err == nil {
		t.Error("a name without a hole is taken")
	}
	if _, err := Compensate("plate", outline.Region{}, nil, Beam{0.2}); err == nil {
		t.Error("nothing is cut")
	}
}

func TestFinishedRefuses(t *testing.T) {
	bar := outline.Rectangle(pt(0, 0), pt(30, 10))
	for _, c := range []struct {
		name string
		cut  Cut
		want string
	}{
		{"nothing", Cut{}, "no cut"},
		{"a sliver", Cut{Outside: outline.Rectangle(pt(0, 0), pt(30, 0.1))}, "nothing is left"},
		{"two pieces", Cut{Outside: dumbbell(0.1)}, "2 pieces"},
		{"holes that meet", Cut{Outside: bar, Inside: []outline.Outline{outline.CircleHole(pt(8, 5), 2), outline.CircleHole(pt(12.1, 5), 2)}}, "run into each other"},
		{"a hole at the edge", Cut{Outside: bar, Inside: []outline.Outline{outline.CircleHole(pt(8, 2.1), 2)}}, "run into each other"},
	} {
		if _, err := Finished(c.cut, Beam{0.2}); err == nil || !strings.Contains(err.Error(), c.want) {
			t.Errorf("%s: %v", c.name, err)
		}
	}
}

func ExampleCompensate() {
	bar := outline.Region{
		Outer: outline.Capsule(pt(0, 0), pt(50, 0), 9),
		Holes: []outline.Outline{outline.CircleHole(pt(0, 0), 2.25), outline.CircleHole(pt(50, 0), 2.25)},
	}
	cut, err := Compensate("rocker", bar, []string{"C", "B"}, Beam{Width: 0.2})
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("outside %.1f mm wide\n", cut.Outside.Bounds().Height())
	for _, o := range cut.Inside {
		centre, radius, _ := o.AsCircle()
		fmt.Printf("circle of %.2f mm at %v\n", 2*radius, centre)
	}
	_, err = Compensate("rocker", bar, []string{"C", "B"}, Beam{Width: 18})
	fmt.Println(err)
	// Output:
	// outside 18.2 mm wide
	// circle of 4.30 mm at {0 0}
	// circle of 4.30 mm at {50 0}
	// rocker: the kerf is 18 mm: no laser takes more than 1.5 mm; write the full width of the cut
}

func ExampleFinished() {
	cut := Cut{Outside: outline.Circle(pt(0, 0), 10.1), Inside: []outline.Outline{outline.CircleHole(pt(0, 0), 2.9)}}
	part, err := Finished(cut, Beam{Width: 0.2})
	if err != nil {
		fmt.Println(err)
		return
	}
	_, bore, _ := part.Holes[0].AsCircle()
	fmt.Printf("%.2f mm across, bore %.2f mm\n", part.Outer.Bounds().Width(), 2*bore)
	// Output: 20.00 mm across, bore 6.00 mm
}

func BenchmarkCompensateACoupler(b *testing.B) {
	r := outline.Region{Outer: outline.Capsule(pt(0, 0), pt(100, 0), 9), Holes: []outline.Outline{outline.CircleHole(pt(0, 0), 2.25), outline.CircleHole(pt(50, 0), 2.25), outline.CircleHole(pt(100, 0), 2.25)}}
	names := []string{"A", "B", "P"}
	for b.Loop() {
		if _, err := Compensate("coupler", r, names, Beam{0.18}); err != nil {
			b.Fatal(err)
		}
	}
}
