package job_test

import (
	"fmt"

	"pinwright/parts/job"
)

// A job file in, a complete job out; or everything that is wrong with it, each with its place.
func Example() {
	text := `job: four-bar
units: {length: mm, angle: deg}
linkage:
  joints:
    O: {ground: [0, 0]}
    D: {ground: [80, 0]}
    A: {near: [25, 0]}
    B: {near: [59, 61]}
  links:
    crank: {pins: [O, A], length: 1in, drive: full-turn, plane: 1}
    coupler: {pins: [A, B], length: 70, plane: 2}
    rocker: {pins: [D, B], length: 65, plane: 3}
pins:
  default: {bolt: M4, fit: medium}
stock:
  clear3: {material: cast acrylic, thickness: 3, sheet: [600, 400], margin: 5, kerf: 0.18}
`
	j, err := job.Parse("four-bar.yaml", []byte(text), nil)
	if err != nil {
		fmt.Println(err)
		return
	}
	for i, link := range j.Linkage.Links {
		fmt.Printf("%s: %.1f mm on plane %d, %s of %s\n", link.Name, link.Lengths[0].MM, j.Links[i].Plane, j.Links[i].Shape, j.Links[i].Stock)
	}
	fmt.Println("coupler:", j.At("linkage.links.coupler.length"))
	// Output:
	// crank: 25.4 mm on plane 1, crank-arm of clear3
	// coupler: 70.0 mm on plane 2, bar of clear3
	// rocker: 65.0 mm on plane 3, bar of clear3
	// coupler: four-bar.yaml:11:37
}

func ExampleErrors() {
	_, err := job.Parse("rake.yaml", []byte("jobb: rake\nunits: {length: millimeter}\n"), nil)
	fmt.Println(err)
	// Output:
	// rake.yaml:1:1: unknown key jobb in the job file
	//   jobb: rake
	//   ^^^^
	//   did you mean job?
	//
	// rake.yaml:1:1: the job file has no linkage
	//   jobb: rake
	//   ^
	//
	// rake.yaml:1:1: the job file has no stock
	//   jobb: rake
	//   ^
	//   write stock: {clear3: {material: cast acrylic, thickness: 3mm, sheet: [600mm, 400mm], margin: 5mm, kerf: ...}}
	//
	// rake.yaml:2:17: length: unknown millimeter
	//   units: {length: millimeter}
	//                   ^^^^^^^^^^
	//   write mm
}
