package assembly_test

import (
	"fmt"
	"math"

	"pinwright/parts"
	"pinwright/parts/assembly"
	"pinwright/parts/job"
	"pinwright/parts/linkage"
	"pinwright/parts/stack"
)

// What touches in a job as it would be built, and which bend helps?
func Example() {
	j, err := job.Read("testdata/fourbar.yaml")
	if err != nil {
		fmt.Println(err)
		return
	}
	j.Copies, j.Body = []job.Copy{{}}, nil // one of it
	m, _ := linkage.New(j.Linkage)
	levels, _ := stack.Levels(j)
	kits, _ := stack.Build(j)
	var faces []parts.Level
	for _, l := range levels {
		faces = append(faces, parts.Level{Plane: l.Plane, Low: l.From, Up: l.To})
	}
	list, err := parts.Make(j, m, faces)
	if err != nil {
		fmt.Println(err)
		return
	}
	gaps, err := assembly.Gaps(j, m, list, kits, levels)
	if err != nil {
		fmt.Println(err)
		return
	}
	for _, g := range gaps {
		if g.MM > 0 {
			break
		}
		fmt.Printf("%s and %s: %.1f mm at %.0f deg\n", g.A, g.B, g.MM, g.Angle*180/math.Pi)
	}
	bend, ok, err := assembly.FindBend(j, m, list, kits, levels, "rocker")
	fmt.Printf("bend %.1f mm: %v %v\n", bend.MM, ok, err)
	// Output:
	// rocker and cross member 1: -1.9 mm at 34 deg
	// bend 3.0 mm: true <nil>
}
