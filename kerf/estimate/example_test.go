package estimate_test

import (
	"fmt"

	"pinwright/kerf/estimate"
	"pinwright/kerf/reading"
)

func ExampleFit() {
	var rs []reading.Reading
	for i, size := range []float64{4.21, 4.19, 4.22, 4.20, 4.18, 4.23, 4.20} {
		rs = append(rs, reading.Measured(fmt.Sprint("H", i), reading.Hole, 4, size, 0.01))
	}
	rs = append(rs, reading.Tried("P1", 3.7, 3.97, reading.No), reading.Tried("P2", 3.85, 3.97, reading.Turns))
	r, err := estimate.Fit(rs)
	if err != nil {
		fmt.Println(err)
		return
	}
	for _, f := range r.Figures {
		fmt.Printf("%s %.3f (%.2f to %.2f)\n", f.Term, f.Value, f.Low, f.High)
	}
	_, err = estimate.Fit(rs[:1])
	fmt.Println(err)
	// Output:
	// kerf 0.204 (0.19 to 0.22)
	// scatter 0.017 (0.01 to 0.03)
	// 1 feature tells a kerf of about 0.21 mm and nothing of how sure that is
	//   cut 4 more: five are enough for a first scatter, fifteen for a dependable one
	//   different ones: the same one read again tells of the calliper, not of the laser
}
