package proof_test

import (
	"fmt"
	"os"

	"pinwright/export/proof"
	"pinwright/parts/outline"
)

// Two bars on a sheet, as they were written.
func ExampleCheck() {
	sheet := newRun(100, 60,
		placed{bar("crank", 30), outline.Place(0, false, outline.Point{X: 20, Y: 20})},
		placed{bar("rocker", 60), outline.Place(0, false, outline.Point{X: 20, Y: 40})})
	report, err := proof.Check(sheet.write(panicker{}, false, nil))
	if err != nil {
		fmt.Println(err)
		return
	}
	if err := report.Write(os.Stdout); err != nil {
		fmt.Println(err)
	}
	// Output:
	// ok    files                  1 compared
	// ok    drawings               1 compared
	// ok    cuts closed            6 compared
	// ok    no cut twice           6 compared
	// ok    parts                  2 compared
	// ok    holes                  4 compared
	// ok    centre distances       2 compared, largest error under 0.000000001 mm (allowed 0.001) at crank A-B
	// ok    hole diameters         4 compared, largest error under 0.000000001 mm (allowed 0.001) at crank A
	// ok    shapes                 2 compared, largest error under 0.000000001 mm (allowed 0.00001) at crank outside
	// ok    walls                  4 compared, least 4.75 mm (wanted 0) at clear3-1.dxf near (20.0, 12.9)
	// ok    web                    1 compared, least 5.6 mm (wanted 3) at clear3-1.dxf near (20.0, 27.1)
	// ok    margin                 6 compared, least 12.8 mm (wanted 5) at clear3-1.dxf near (35.0, 20.0)
	// ok    order of work          4 compared
	// ok    engraving              4 compared, least 5.85 mm (wanted 0.5) at clear3-1.dxf near (28.0, 20.0)
	// proof of demo: 2 parts with 4 holes on 1 drawing agree with the linkage
}

// The same sheet after somebody widened a hole by 0.004 mm and moved another by 0.01 mm, and put the
// hashes right.
func ExampleCheck_edited() {
	sheet := newRun(100, 60,
		placed{bar("crank", 30), outline.Place(0, false, outline.Point{X: 20, Y: 20})},
		placed{bar("rocker", 60), outline.Place(0, false, outline.Point{X: 20, Y: 40})})
	sheet.sheet.Steps[2] = ring(20, 20, 2.152)
	sheet.sheet.Steps[8] = ring(80.01, 40, 2.15)
	report, err := proof.Check(sheet.write(panicker{}, false, nil))
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Println("sound:", report.OK)
	for _, check := range report.Checks {
		for _, finding := range check.Findings {
			fmt.Printf("%s: %s\n", check.Name, finding)
		}
	}
	// Output:
	// sound: false
	// centre distances: clear3-1.dxf:919: rocker: A-B differs from the linkage by 0.0100 mm (expected 60.0000 mm, found 60.0100 mm): the linkage would run another way: write the files anew
	// hole diameters: clear3-1.dxf:751: crank, hole A: is too large by 0.0040 mm (expected finished 4.5000 mm, found 4.5040 mm): its pin would not fit as asked: write the files anew
	// shapes: clear3-1.dxf:899: rocker, hole B: is moved in its part by 0.0100 mm (expected (80.0000, 40.0000), found (80.0100, 40.0000)): write the files anew
}

// panicker stands in for a test in an example.
type panicker struct{}

func (panicker) Helper()            {}
func (panicker) Fatal(about ...any) { panic(fmt.Sprint(about...)) }
