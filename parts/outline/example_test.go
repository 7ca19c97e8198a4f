package outline_test

import (
	"fmt"
	"math"

	"pinwright/parts/outline"
)

// A bar with two bolt holes, and the path that a beam of 0.18 mm takes to leave it at size.
func Example() {
	a, b := outline.Point{X: 0, Y: 0}, outline.Point{X: 50, Y: 0}
	bar := outline.Region{
		Outer: outline.Capsule(a, b, 6),
		Holes: []outline.Outline{outline.CircleHole(a, 2.25), outline.CircleHole(b, 2.25)},
	}
	cut := outline.Offset([]outline.Region{bar}, 0.09)[0]
	fmt.Println("length of the outer cut:", mm(cut.Outer.Length()))
	for _, h := range cut.Holes {
		c, r, ok := h.AsCircle()
		fmt.Println("hole at", c.X, c.Y, "diameter", mm(2*r), ok)
	}
	// Output:
	// length of the outer cut: 138.2646
	// hole at 0 0 diameter 4.32 true
	// hole at 50 0 diameter 4.32 true
}

func mm(x float64) float64 { return math.Round(x*1e4) / 1e4 }

func ExampleUnion() {
	// A spider of three arms, its inside corners rounded with 4 mm.
	hub := outline.Point{}
	var arms []outline.Region
	for i := range 3 {
		tip := outline.Polar(40, float64(i)*2*math.Pi/3)
		arms = append(arms, outline.Region{Outer: outline.Capsule(hub, tip, 6)})
	}
	spider := outline.RoundInside(outline.Union(arms...), 4)
	for _, s := range spider[0].Outer.Segments() {
		if s.IsLine() {
			fmt.Println("line of", mm(s.Length()))
		} else {
			fmt.Println("arc of radius", mm(s.Radius()), "turning by", mm(s.Sweep()*180/math.Pi))
		}
	}
	// Output:
	// line of 34.2265
	// arc of radius 4 turning by -60
	// line of 34.2265
	// arc of radius 6 turning by 180
	// line of 34.2265
	// arc of radius 4 turning by -60
	// line of 34.2265
	// arc of radius 6 turning by 180
	// line of 34.2265
	// arc of radius 4 turning by -60
	// line of 34.2265
	// arc of radius 6 turning by 180
}

func ExampleDifference() {
	plate := outline.Region{Outer: outline.Rectangle(outline.Point{}, outline.Point{X: 60, Y: 40})}
	slot := outline.Region{Outer: outline.ArcSlot(outline.Point{X: 30}, 25, math.Pi/4, 3*math.Pi/4, 2)}
	left := outline.Difference([]outline.Region{plate}, []outline.Region{slot})
	fmt.Println(len(left), "region,", len(left[0].Holes), "hole, area", mm(left[0].Area()))
	// Output:
	// 1 region, 1 hole, area 2230.354
}

func ExampleBetween() {
	a := outline.Region{Outer: outline.Circle(outline.Point{X: 0, Y: 0}, 10)}
	b := outline.Region{Outer: outline.Rectangle(outline.Point{X: 12, Y: -5}, outline.Point{X: 20, Y: 5})}
	n := outline.Between(a, b)
	fmt.Println(n.Distance, n.A, n.B)
	// Output:
	// 2 {10 0} {12 0}
}

func ExampleFlatten() {
	o := outline.Circle(outline.Point{}, 10)
	for _, side := range []outline.Side{outline.Inscribed, outline.Around} {
		p := outline.Polygon(outline.Flatten(o, 0.05, side)...)
		fmt.Println(len(p), "corners, area", mm(p.Area()), "of", mm(o.Area()))
	}
	// Output:
	// 32 corners, area 312.1445 of 314.1593
	// 34 corners, area 315.1725 of 314.1593
}

func ExampleThin() {
	// A hole too close to the edge.
	bar := outline.Region{
		Outer: outline.Capsule(outline.Point{}, outline.Point{X: 50}, 5),
		Holes: []outline.Outline{outline.CircleHole(outline.Point{X: 25, Y: 1}, 3)},
	}
	for _, n := range outline.ThinPlaces(bar, 1.5) {
		fmt.Printf("%.3f mm left between (%.1f, %.1f) and (%.1f, %.1f)\n", n.Distance, n.A.X, n.A.Y, n.B.X, n.B.Y)
	}
	// Output:
	// 1.000 mm left between (25.0, 5.0) and (25.0, 4.0)
}

func ExampleRegion_Moments() {
	bar := outline.Region{Outer: outline.Rectangle(outline.Point{}, outline.Point{X: 12, Y: 3})}
	m := bar.Moments()
	fmt.Println(mm(m.Area), m.Centroid, mm(m.Ixx), mm(m.Iyy))
	// Output:
	// 36 {6 1.5} 27 432
}
