package stack_test

import (
	"fmt"

	"pinwright/parts/job"
	"pinwright/parts/stack"
)

// A job in, what every pin carries and what is to be bought out.
func Example() {
	j, err := job.Read("testdata/arms.yaml")
	if err != nil {
		fmt.Println(err)
		return
	}
	kits, err := stack.Build(j)
	if err != nil {
		fmt.Println(err)
		return
	}
	k := kits[1] // joint C of the first copy
	fmt.Printf("%s, joint %s: %s\n", k.Copy, k.Joint, k.Through.Designation)
	for _, e := range k.Elements {
		fmt.Printf("%6.2f to %5.2f  %s %s%s\n", e.From, e.To, e.Kind, e.Part, e.What)
	}
	for _, l := range stack.List(j, kits)[:3] {
		fmt.Printf("%d x %s: buy %d\n", l.Need, l.Designation, l.Buy)
	}
	// Output:
	// left-1, joint C: ISO 4762 M4x40
	//  -4.80 to -0.80  head socket head
	//  -0.80 to  0.00  washer ISO 7089 4
	//   0.00 to  3.80  part back
	//   3.80 to  4.60  washer ISO 7089 4
	//   4.60 to 17.30  spacer spacer for M4
	//  17.30 to 18.10  washer ISO 7089 4
	//  18.10 to 20.95  part rocker
	//  20.95 to 21.75  washer ISO 7089 4
	//  21.75 to 25.55  part front
	//  25.55 to 26.35  washer ISO 7089 4
	//  26.55 to 31.55  nut DIN 985 M4
	// 8 x screw M4: buy 9
	// 8 x ISO 4762 M4x16: buy 9
	// 4 x ISO 4762 M4x40: buy 5
}
