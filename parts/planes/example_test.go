package planes_test

import (
	"fmt"

	"pinwright/parts/planes"
)

// A four-bar on a frame plate: the coupler sweeps across the crank's pivot O, so it must not lie between crank
// and plate.
func Example() {
	const plate, crank, coupler, rocker = 0, 1, 2, 3
	problem := planes.Problem{
		Bodies: []planes.Body{{Name: "plate", Thickness: 5}, {Name: "crank", Thickness: 3}, {Name: "coupler", Thickness: 3}, {Name: "rocker", Thickness: 3}},
		Pins: []planes.Pin{
			{Name: "O", Members: []int{plate, crank}, Loaded: true},
			{Name: "A", Members: []int{crank, coupler}, Loaded: true, Below: 4.8, Above: 6},
			{Name: "B", Members: []int{coupler, rocker}, Loaded: true, Below: 4.8, Above: 6},
			{Name: "C", Members: []int{rocker, plate}, Loaded: true, Below: 4.8, Above: 6},
		},
		Apart:  []planes.Apart{{A: plate, B: coupler, Near: planes.Near{MM: -4}}},
		Swept:  []planes.Swept{{Pin: 0, Body: coupler, Near: planes.Near{MM: -4.5, Angle: 1.6}}},
		Washer: 0.8, Clear: 0.5, First: 1,
	}
	answer, err := planes.Solve(problem)
	if err != nil {
		fmt.Println(err)
		return
	}
	for i, plane := range answer.Planes {
		fmt.Println(problem.Bodies[i].Name, plane)
	}
	fmt.Printf("%d planes, pins %.1f mm together, proven: %v\n", answer.Cost.Planes, answer.Cost.Length, answer.Proven)

	problem.Demands = []planes.Demand{{Kind: planes.InFrontOf, A: coupler, B: plate}, {Kind: planes.InFrontOf, A: crank, B: coupler}}
	_, err = planes.Solve(problem)
	fmt.Println(err)
	// Output:
	// plate 1
	// crank 2
	// coupler 3
	// rocker 2
	// 3 planes, pins 31.2 mm together, proven: true
	// no planes fit: coupler is to lie in front of plate, and crank is to lie in front of coupler, and coupler cannot lie between the parts on O, whose spacers it sweeps across (gap -4.5 mm at 92 deg)
	//   take in-front-of: plate of coupler out; or take in-front-of: coupler of crank out; or bend coupler by 5.0 mm to pass O, or make its spacers and the part slimmer by as much
}
