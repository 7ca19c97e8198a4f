package picture_test

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"pinwright/export"
	"pinwright/export/internal/sample"
	"pinwright/export/picture"
	"pinwright/parts/outline"
)

func ExampleLayout() {
	s := export.Sheet{Name: "clear3-1", Title: "clear3, sheet 1 of 1", Width: 300, Height: 100, Steps: []export.Step{
		{Op: export.CutInside, Part: "crank", Closed: outline.CircleHole(outline.Point{X: 20, Y: 20}, 2.16)},
		{Op: export.CutOutside, Part: "crank", Closed: outline.Circle(outline.Point{X: 20, Y: 20}, 10)},
	}}
	p, err := picture.Layout(s, 150.6, 200)
	if err != nil {
		panic(err)
	}
	for _, l := range labels(p) {
		fmt.Println(l.Text)
	}
	// Output:
	// clear3, sheet 1 of 1
	// 300 x 100 mm, drawn 1 : 2
	// 1
	// engraved
	// inside cut
	// outside cut
	// 1 crank
}

func ExampleSideView() {
	p, err := picture.SideView([]picture.Kit{{
		Name: "A", Text: "ISO 4762 M4 x 16",
		Pieces: []picture.Piece{
			{Kind: picture.HeadPiece, Name: "head", From: -4.8, To: -0.8, Outer: 7},
			{Kind: picture.ShankPiece, From: -0.8, To: 15.2, Outer: 4},
			{Kind: picture.WasherPiece, Name: "washer", From: -0.8, To: 0, Outer: 9, Inner: 4.3},
			{Kind: picture.PartPiece, Name: "crank", From: 0, To: 2.85, Outer: 13.5, Inner: 4.5},
		},
	}}, []picture.Level{{Name: "plane 1", From: 0, To: 2.85}}, 174, 240)
	if err != nil {
		panic(err)
	}
	for _, l := range labels(p) {
		fmt.Println(l.Text)
	}
	// Output:
	// drawn 5 : 1
	// plane 1
	// head, 4 mm
	// washer, 0.8 mm
	// crank, 2.85 mm
	// A
	// ISO 4762 M4 x 16
	// 3.65
	// 12.35
	// 16
}

func labels(p picture.Picture) []picture.Label {
	var out []picture.Label
	for _, item := range p.Items {
		if l, ok := item.(picture.Label); ok {
			out = append(out, l)
		}
	}
	return out
}

// Every part is drawn at the scale that is said, and its number lies on its material.
func TestLayout(t *testing.T) {
	s := sample.Sheet()
	p, err := picture.Layout(s, 174, 240)
	if err != nil {
		t.Fatal(err)
	}
	if err := p.Check(); err != nil {
		t.Fatal(err)
	}
	scale := (174 - 0.6) / s.Width
	if got := labels(p)[1].Text; got != fmt.Sprintf("300 x 200 mm, drawn 1 : %.2f", 1/scale) {
		t.Errorf("%q", got)
	}
	shapes := map[string]picture.Shape{}
	for _, item := range p.Items {
		if shape, ok := item.(picture.Shape); ok && shape.Title != "" {
			shapes[shape.Title] = shape
		}
	}
	sheet := shapes["sheet clear3-1"].Closed[0].Bounds()
	if math.Abs(sheet.Width()-s.Width*scale) > 1e-9 || math.Abs(sheet.Height()-s.Height*scale) > 1e-9 {
		t.Errorf("the sheet is %g x %g", sheet.Width(), sheet.Height())
	}
	numbers := map[string]outline.Point{}
	legend := map[string]string{}
	for _, l := range labels(p) {
		if l.Bold && len(l.Text) <= 2 {
			numbers[l.Text] = outline.Point{X: l.At.X, Y: l.At.Y + 0.36*l.Size}
		}
		if number, name, ok := strings.Cut(l.Text, " "); ok {
			legend[name] = number
		}
		if l.At.X < 0 || l.At.X > p.Width || l.At.Y < 0 || l.At.Y > p.Height {
			t.Errorf("%q at %v is off the picture", l.Text, l.At)
		}
	}
	for _, step := range s.Steps {
		shape, ok := shapes[step.Part]
		if !ok {
			t.Fatalf("%s is not drawn", step.Part)
		}
		if step.Op != export.CutOutside {
			continue
		}
		want, got := step.Closed.Bounds(), shape.Closed[0].Bounds()
		if math.Abs(got.Min.X-sheet.Min.X-want.Min.X*scale) > 1e-9 || math.Abs(got.Max.Y-sheet.Min.Y-want.Max.Y*scale) > 1e-9 {
			t.Errorf("%s at %v, want %v", step.Part, got, want)
		}
		at := numbers[legend[step.Part]]
		for i, o := range shape.Closed {
			if in := o.Locate(at) == outline.Inside; in != (i == 0) || o.Nearest(at).Distance < 0.5 {
				t.Errorf("the number of %s is at %v, %.2f mm from cut %d", step.Part, at, o.Nearest(at).Distance, i)
			}
		}
	}
}

func TestErrors(t *testing.T) {
	s := sample.Sheet()
	kits, levels := sample.Kits()
	bad := []picture.Kit{{Name: "A", Pieces: []picture.Piece{{Name: "washer", From: 1, To: 0, Outer: 9}}}}
	for want, err := range map[string]error{
		"layout of clear3-1: 20 x 200 mm of paper are too little":                        second(picture.Layout(s, 20, 200)),
		"sheet : a size of 0 x 0 mm cannot be drawn":                                     second(picture.Layout(export.Sheet{}, 200, 200)),
		"side view: there is no pin kit to draw":                                         second(picture.SideView(nil, levels, 170, 240)),
		"side view: 10 x 240 mm of paper are too little":                                 second(picture.SideView(kits, levels, 10, 240)),
		"side view: pin kit A: washer from 1 to 0 mm, diameter 9 and 0, cannot be drawn": second(picture.SideView(bad, levels, 170, 240)),
		"side view: plane 9 from NaN to 1 mm cannot be drawn":                            second(picture.SideView(kits, []picture.Level{{Name: "plane 9", From: math.NaN(), To: 1}}, 170, 240)),
		"side view: the pin kits have no height":                                         second(picture.SideView([]picture.Kit{{}}, nil, 170, 240)),
		`picture "x": item 1 has a number that is none`:                                  picture.Picture{Title: "x", Width: 1, Height: 1, Items: []picture.Item{picture.Label{}}}.Check(),
		`picture "x": item 2 has a number that is none`:                                  picture.Picture{Title: "x", Width: 1, Height: 1, Items: []picture.Item{picture.Shape{}, picture.Shape{Line: math.NaN()}}}.Check(),
		`picture "x": a size of 0 x 1 mm cannot be drawn`:                                picture.Picture{Title: "x", Height: 1}.Check(),
	} {
		if err == nil || err.Error() != want {
			t.Errorf("got  %v\nwant %s", err, want)
		}
	}
}

func second(_ picture.Picture, err error) error { return err }

// Whatever lies on a sheet, the picture can be written or the error says why not.
func TestAnyLayout(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := sample.AnySheet().Draw(t, "sheet")
		p, err := picture.Layout(s, rapid.Float64Range(31, 400).Draw(t, "width"), rapid.Float64Range(60, 400).Draw(t, "height"))
		if err != nil {
			return
		}
		if err := p.Check(); err != nil {
			t.Fatal(err)
		}
	})
}

// Pieces are drawn as high and as far apart as they are, names do not run into one another.
func TestSideView(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		kits := rapid.SliceOfN(rapid.Custom(func(t *rapid.T) picture.Kit {
			k := picture.Kit{Name: "J", Text: "ISO 4762 M4 x 20"}
			at := 0.0
			for i := range rapid.IntRange(1, 12).Draw(t, "pieces") {
				p := picture.Piece{Kind: picture.PartPiece, Name: fmt.Sprint("piece ", i), From: at, Outer: rapid.Float64Range(5, 30).Draw(t, "outer"), Inner: 4}
				p.To = at + rapid.Float64Range(0.2, 12).Draw(t, "thickness")
				at = p.To
				k.Pieces = append(k.Pieces, p)
			}
			return k
		}), 1, 7).Draw(t, "kits")
		p, err := picture.SideView(kits, nil, 174, 247)
		if err != nil {
			t.Fatal(err)
		}
		if err := p.Check(); err != nil {
			t.Fatal(err)
		}
		var boxes []outline.Box
		for _, item := range p.Items {
			shape, ok := item.(picture.Shape)
			if !ok || len(shape.Closed) != 2 {
				continue
			}
			boxes = append(boxes, shape.Closed[0].Bounds().Union(shape.Closed[1].Bounds()))
		}
		i := 0
		scale := 0.0
		for _, k := range kits {
			for _, piece := range k.Pieces {
				if scale == 0 {
					scale = boxes[i].Width() / piece.Outer
				}
				if math.Abs(boxes[i].Width()-scale*piece.Outer) > 1e-9 || math.Abs(boxes[i].Height()-scale*(piece.To-piece.From)) > 1e-9 {
					t.Fatalf("%v drawn as %v at scale %g", piece, boxes[i], scale)
				}
				i++
			}
		}
		// Names of one kit stand at one x.
		columns := map[[2]float64][]float64{}
		row := 0.0
		for _, l := range labels(p) {
			if l.Text == "J" {
				row = l.At.Y
			}
			if strings.HasPrefix(l.Text, "piece") {
				key := [2]float64{l.At.X, row}
				columns[key] = append(columns[key], l.At.Y)
			}
		}
		for _, ys := range columns {
			for i := 1; i < len(ys); i++ {
				if ys[i]-ys[i-1] < 2.3*1.25-1e-9 {
					t.Fatalf("names at %v", ys)
				}
			}
		}
	})
}

// Pictures for pages are no higher than the page, at one scale, and hold every kit once.
func TestSideViews(t *testing.T) {
	three, levels := sample.Kits()
	var kits []picture.Kit
	for range 7 {
		kits = append(kits, three...)
	}
	pictures, err := picture.SideViews(kits, levels, 174, 180)
	if err != nil {
		t.Fatal(err)
	}
	names := 0
	for _, p := range pictures {
		if p.Height > 180 {
			t.Errorf("%g mm high", p.Height)
		}
		for i, l := range labels(p) {
			if i == 0 && l.Text != labels(pictures[0])[0].Text {
				t.Errorf("two scales: %s", l.Text)
			}
			if l.Text == "A" || l.Text == "B" || l.Text == "C" {
				names++
			}
		}
	}
	if names != 21 || len(pictures) < 2 {
		t.Errorf("%d kits on %d pictures", names, len(pictures))
	}
}

// The scale is read off: a part of 13.5 mm in a picture drawn 2 : 1 is 27 mm.
func TestSideViewScale(t *testing.T) {
	kits, levels := sample.Kits()
	p, err := picture.SideView(kits, levels, 174, 247)
	if err != nil {
		t.Fatal(err)
	}
	if got := labels(p)[0].Text; got != "drawn 2 : 1" {
		t.Fatalf("%q", got)
	}
	for _, item := range p.Items {
		if shape, ok := item.(picture.Shape); ok && shape.Title == "crank, 2.85 mm" {
			box := shape.Closed[0].Bounds().Union(shape.Closed[1].Bounds())
			if math.Abs(box.Width()-27) > 1e-9 || math.Abs(box.Height()-5.7) > 1e-9 {
				t.Errorf("drawn as %g x %g", box.Width(), box.Height())
			}
		}
	}
}

func BenchmarkLayout(b *testing.B) {
	s := sample.Sheet()
	for b.Loop() {
		if _, err := picture.Layout(s, 174, 240); err != nil {
			b.Fatal(err)
		}
	}
}
