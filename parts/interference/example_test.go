package interference_test

import (
	"fmt"
	"math"

	"pinwright/parts/interference"
	"pinwright/parts/linkage"
	"pinwright/parts/outline"
)

// How near does the coupler of a four-bar come to a post beside it, and where?
func Example() {
	pin := func(a, b string, mm float64) linkage.Link {
		return linkage.Link{Name: a + b, Pins: []string{a, b}, Lengths: []linkage.Length{{A: a, B: b, MM: mm}}}
	}
	m, err := linkage.New(linkage.Linkage{
		Joints: []linkage.Joint{
			{Name: "O", Ground: &linkage.Ground{}},
			{Name: "D", Ground: &linkage.Ground{At: linkage.Point{X: 100}}},
			{Name: "A", Near: &linkage.Point{X: 40}},
			{Name: "B", Near: &linkage.Point{X: 120, Y: 80}},
		},
		Links: []linkage.Link{pin("O", "A", 40), pin("A", "B", 120), pin("D", "B", 80)},
		Drive: linkage.Drive{Link: "OA", To: 2 * math.Pi, Full: true},
	})
	if err != nil {
		fmt.Println(err)
		return
	}
	space, err := interference.NewSpace(m)
	if err != nil {
		fmt.Println(err)
		return
	}
	coupler := interference.Body{
		Name: "coupler", Carrier: interference.OnLink, Of: "AB",
		Region: outline.Region{Outer: outline.Capsule(outline.Point{}, outline.Point{X: 120}, 6)},
	}
	post := interference.Body{Name: "post", Region: outline.Region{Outer: outline.Circle(outline.Point{X: 60, Y: 130}, 8)}}
	gap, err := space.Smallest(coupler, post, interference.Options{Accuracy: 0.001, Limit: 100, Boxes: 10000})
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("%.2f mm at %.0f deg, certain to %.3f mm\n", gap.MM, gap.Angle*180/math.Pi, gap.Error)
	// Output: 42.01 mm at 308 deg, certain to 0.001 mm
}
