package hardware_test

import (
	"fmt"

	"pinwright/parts/hardware"
)

// The hole for a bolt on which a link turns, and for a bearing that is pressed in.
func Example() {
	for _, s := range []hardware.Spec{
		{Kind: hardware.Bolt, Size: "M4", Fit: "medium"},
		{Kind: hardware.BearingSeat, Size: "624", Fit: "press"},
		{Kind: hardware.Shaft, Diameter: 6, Fit: "running"},
	} {
		h, err := hardware.Hole(s)
		if err != nil {
			fmt.Println(err)
			return
		}
		fmt.Printf("%.3f mm: %s\n", h.Diameter, h.Rule)
	}
	_, err := hardware.ClearanceHole("M4", "medum")
	fmt.Println(err)
	// Output:
	// 4.500 mm: ISO 273:1979 medium
	// 12.986 mm: press: ISO 286 N7, middle of the zone
	// 6.019 mm: running: ISO 286 F8, middle of the zone
	// unknown class of clearance hole for M4 "medum": did you mean medium? (there is fine, medium, coarse)
}

// The shortest screw of the standard series that is long enough.
func ExampleScrewLength() {
	need := 3*3.0 + 2*0.5 + 4.0 + 2*0.5 // three plies, two washers, a locknut, two pitches
	length, err := hardware.ScrewLength("ISO 4762", "M3", need)
	fmt.Println(need, length, err)
	// Output: 15 16 <nil>
}
