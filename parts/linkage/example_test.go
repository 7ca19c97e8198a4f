package linkage_test

import (
	"fmt"
	"math"

	"pinwright/parts/linkage"
)

func rod(name, a, b string, mm float64) linkage.Link {
	return linkage.Link{Name: name, Pins: []string{a, b}, Lengths: []linkage.Length{{A: a, B: b, MM: mm}}}
}

// A four-bar linkage with a traced point on its coupler, from lengths to report.
func Example() {
	l := linkage.Linkage{
		Joints: []linkage.Joint{
			{Name: "O", Ground: &linkage.Ground{At: linkage.Point{X: 0, Y: 0}}},
			{Name: "C", Ground: &linkage.Ground{At: linkage.Point{X: 40, Y: 0}}},
			{Name: "A"},
			{Name: "B", Near: &linkage.Point{X: 30, Y: 49}},
			{Name: "P"},
		},
		Links: []linkage.Link{
			rod("crank", "O", "A", 20),
			{Name: "coupler", Pins: []string{"A", "B", "P"}, Lengths: []linkage.Length{{A: "A", B: "B", MM: 50}, {A: "B", B: "P", MM: 50}, {A: "A", B: "P", MM: 100}}},
			rod("rocker", "C", "B", 50),
		},
		Drive: linkage.Drive{Link: "crank", To: 2 * math.Pi, Full: true},
		Trace: []string{"P"},
	}
	r, err := linkage.Analyse(l, linkage.Options{})
	if err != nil {
		fmt.Println(err)
		return
	}
	path := r.Set.Paths[0]
	fmt.Printf("mobility %d\n", r.Mobility)
	fmt.Printf("stride %.3f mm, lift %.3f mm\n", path.Stride, path.Lift)
	for _, t := range r.Set.Transmissions {
		fmt.Printf("transmission at %s from %.2f to %.2f deg\n", t.Joint, t.Min*180/math.Pi, t.Max*180/math.Pi)
	}
	// Output:
	// mobility 1
	// stride 94.072 mm, lift 17.980 mm
	// transmission at B from 23.07 to 73.74 deg
}

// The rigid motion of a link through the cycle, for drawing parts in place.
func ExampleCycle_Placement() {
	l := linkage.Linkage{
		Joints: []linkage.Joint{
			{Name: "O", Ground: &linkage.Ground{}},
			{Name: "D", Ground: &linkage.Ground{At: linkage.Point{X: 100}}},
			{Name: "A"},
			{Name: "B", Near: &linkage.Point{X: 137, Y: 71}},
		},
		Links: []linkage.Link{rod("crank", "O", "A", 40), rod("coupler", "A", "B", 120), rod("rocker", "D", "B", 80)},
		Drive: linkage.Drive{Link: "crank", To: 2 * math.Pi, Full: true},
	}
	m, err := linkage.New(l)
	if err != nil {
		fmt.Println(err)
		return
	}
	c, err := m.Cycle(9, nil) // every 40 degrees
	if err != nil {
		fmt.Println(err)
		return
	}
	t := c.Placement("coupler", 1)
	end := t.Apply(m.LinkFrame("coupler")[1])
	fmt.Printf("coupler at %.3f deg, its end at (%.3f, %.3f)\n", t.Angle()*180/math.Pi, end.X, end.Y)
	// Output:
	// coupler at 20.298 deg, its end at (143.190, 67.340)
}
