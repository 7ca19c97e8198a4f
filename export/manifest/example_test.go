package manifest_test

import (
	"bytes"
	"fmt"
	"strings"

	"pinwright/export/manifest"
	"pinwright/parts"
	"pinwright/parts/linkage"
	"pinwright/parts/outline"
)

// A bar between two pins: what it must measure goes into the record of the run, and is read from it.
func Example() {
	bar := parts.Part{
		Name: "left-1.rocker", Link: "rocker", Copy: "left-1", Stock: "clear3", Plane: 3,
		Region: outline.Region{
			Outer: outline.Capsule(outline.Point{}, outline.Point{X: 50}, 7),
			Holes: []outline.Outline{
				outline.CircleHole(outline.Point{}, 2.25), outline.CircleHole(outline.Point{X: 50}, 2.15),
			},
		},
		Holes: []parts.Hole{
			{Name: "C", Kind: parts.PinHole, Joint: "C", Diameter: 4.5},
			{Name: "B", Kind: parts.PinHole, Joint: "B", Centre: outline.Point{X: 50}, Diameter: 4.3},
		},
		Mark: parts.Mark{Text: "ROCKER L1"},
	}
	// The beam reaches every corner of a bar, so what it leaves is the region itself.
	part, err := manifest.NewPart(bar, bar.Region)
	if err != nil {
		fmt.Println(err)
		return
	}
	part.Sheet = "clear3-1"
	part.Place = manifest.PlacementOf(outline.Place(0, false, outline.Point{X: 20, Y: 20}))
	part.Lengths = manifest.LinkLengths(linkage.Link{Name: "rocker", Lengths: []linkage.Length{{A: "C", B: "B", MM: 50}}}, part)

	digest := strings.Repeat("0", 64)
	var file bytes.Buffer
	err = manifest.Encode(&file, manifest.Manifest{
		Format: manifest.Format, Program: "pinwright", Job: manifest.Job{Name: "sand-rake", SHA256: digest},
		Stock:  []manifest.Stock{{Name: "clear3", Thickness: 3, Measured: 2.85, Margin: 5, Web: 3, Kerf: 0.18}},
		Sheets: []manifest.Sheet{{Name: "clear3-1", Drawing: "clear3-1.dxf", Stock: "clear3", Width: 600, Height: 300, Parts: 1}},
		Parts:  []manifest.Part{part},
		Files:  []manifest.File{{Name: "clear3-1.dxf", Size: 4711, SHA256: digest}},
	})
	if err != nil {
		fmt.Println(err)
		return
	}
	m, err := manifest.Decode(&file)
	if err != nil {
		fmt.Println(err)
		return
	}
	for _, p := range m.Parts {
		fmt.Printf("%s on %s: %.1f mm2\n", p.Name, p.Sheet, p.Area)
		for _, h := range p.Holes {
			fmt.Printf("  hole %s: %g mm\n", h.Name, h.Diameter)
		}
		for _, l := range p.Lengths {
			fmt.Printf("  %s-%s: %g mm\n", l.A, l.B, l.MM)
		}
	}
	// Output:
	// left-1.rocker on clear3-1: 823.5 mm2
	//   hole C: 4.5 mm
	//   hole B: 4.3 mm
	//   C-B: 50 mm
}

func ExampleDecode_error() {
	_, err := manifest.Decode(strings.NewReader("{\n  \"format\": 1,\n  \"job\": {\"name\": 7}\n}\n"))
	fmt.Println(err)
	// Output:
	// manifest: line 3, column 20: job.name cannot be a number
}
