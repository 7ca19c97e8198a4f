package dxf_test

import (
	"bytes"
	"fmt"
	"strings"

	"pinwright/export"
	"pinwright/export/dxf"
	"pinwright/parts/outline"
)

// A washer, written and read back: the hole first, then the outside.
func Example() {
	ring := func(r float64) outline.Outline {
		return outline.Outline{
			{Point: outline.Point{X: 10 - r, Y: 10}, Bulge: 1}, {Point: outline.Point{X: 10 + r, Y: 10}, Bulge: 1},
		}
	}
	sheet := export.Sheet{Name: "washer", Width: 20, Height: 20, Steps: []export.Step{
		{Op: export.CutInside, Part: "washer", Closed: ring(2.15)},
		{Op: export.CutOutside, Part: "washer", Closed: ring(4.5)},
	}}
	var file bytes.Buffer
	if err := dxf.Write(&file, sheet, dxf.Options{}); err != nil {
		fmt.Println(err)
		return
	}
	d, err := dxf.Read(&file)
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Println(d.Version, "in", d.Units)
	for _, e := range d.Entities {
		fmt.Printf("%s %s at %v, radius %.2f\n", e.Layer, e.Type, e.Circle.Centre, e.Circle.Radius)
	}
	// Output:
	// AC1015 in millimetres
	// CUT-INSIDE CIRCLE at {10 10}, radius 2.15
	// CUT-OUTSIDE CIRCLE at {10 10}, radius 4.50
}

// A file that is no sound drawing is refused with the line.
func ExampleRead_error() {
	_, err := dxf.Read(strings.NewReader("0\nSECTION\n2\nENTITIES\n0\nLINE\n8\nCUT-INSIDE\n10\n12,5\n"))
	fmt.Println(err)
	// Output:
	// line 10: "12,5" is not a number (group code 10)
}
