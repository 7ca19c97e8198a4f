// Package sample has sheets and pin kits for the tests of the writers. All of it is invented.
package sample

import (
	"fmt"
	"math"

	"pgregory.net/rapid"

	"pinwright/export"
	"pinwright/export/picture"
	"pinwright/parts/outline"
)

// Bar is the outline of a straight bar of length l between pins and width w, the first pin at (x, y),
// turned by angle: two lines and two half turns.
func Bar(x, y, l, w, angle float64) outline.Outline {
	t := outline.Place(angle, false, outline.Point{X: x, Y: y})
	at := func(px, py, bulge float64) outline.Vertex {
		return outline.Vertex{Point: t.Apply(outline.Point{X: px, Y: py}), Bulge: bulge}
	}
	return outline.Outline{at(0, -w/2, 0), at(l, -w/2, 1), at(l, w/2, 0), at(0, w/2, 1)}
}

// Sheet is a sheet of bars, a disc with a smaller part in its window, and a form with inside corners.
func Sheet() export.Sheet {
	s := export.Sheet{Name: "clear3-1", Title: "clear3: cast acrylic 3 mm, sheet 1 of 2", Width: 300, Height: 200}
	add := func(op export.Operation, part string, o outline.Outline) {
		s.Steps = append(s.Steps, export.Step{Op: op, Part: part, Closed: o})
	}
	mark := func(part string, x, y float64) {
		at := func(dx, dy float64) outline.Vertex { return outline.Vertex{Point: outline.Point{X: x + dx, Y: y + dy}} }
		s.Steps = append(s.Steps,
			export.Step{Op: export.Engrave, Part: part, Open: outline.Path{at(0, 4), at(0, 0), at(2.4, 0)}},
			export.Step{Op: export.Engrave, Part: part, Open: outline.Path{
				{Point: outline.Point{X: x + 5.4, Y: y + 3.4}, Bulge: 0.6},
				{Point: outline.Point{X: x + 4.2, Y: y + 2}, Bulge: -0.6},
				{Point: outline.Point{X: x + 3, Y: y + 0.6}},
			}})
	}
	for i := range 5 {
		part := fmt.Sprintf("left-1.link-%d", i+1)
		x, y, l := 12.0, 14+19*float64(i), 60+9*float64(i)
		mark(part, x+l/2, y-2)
		add(export.CutInside, part, outline.CircleHole(outline.Point{X: x, Y: y}, 2.16))
		add(export.CutInside, part, outline.CircleHole(outline.Point{X: x + l, Y: y}, 2.16))
		add(export.CutOutside, part, Bar(x, y, l, 13.5, 0))
	}
	mark("left-1.crank", 180, 128)
	add(export.CutInside, "left-1.crank", outline.CircleHole(outline.Point{X: 215, Y: 130}, 27))
	add(export.CutOutside, "left-1.crank", outline.Circle(outline.Point{X: 215, Y: 130}, 42))
	add(export.CutInside, "right-1.hub", outline.CircleHole(outline.Point{X: 205, Y: 130}, 3.2))
	add(export.CutOutside, "right-1.hub", Bar(205, 130, 20, 14, math.Pi/6))
	p := func(x, y, bulge float64) outline.Vertex {
		return outline.Vertex{Point: outline.Point{X: x, Y: y}, Bulge: bulge}
	}
	mark("frame.left", 30, 160)
	add(export.CutInside, "frame.left", outline.CircleHole(outline.Point{X: 24, Y: 140}, 4))
	add(export.CutOutside, "frame.left", outline.Outline{
		p(16, 132, 0.41421356237309503), p(32, 132, -0.2), p(70, 152, 0), p(110, 152, 1), p(110, 176, 0), p(20, 172, 0.3), p(16, 168, 0),
	})
	return s
}

// Kits is two pin kits on three planes.
func Kits() ([]picture.Kit, []picture.Level) {
	levels := []picture.Level{{Name: "plane 1", From: 0, To: 2.85}, {Name: "plane 2", From: 3.35, To: 6.2}, {Name: "plane 3", From: 6.7, To: 9.55}}
	kit := func(name string, top float64) picture.Kit {
		k := picture.Kit{Name: name, Text: "ISO 4762 M4 x 20"}
		add := func(kind picture.PieceKind, what string, from, to, outer, inner float64) {
			k.Pieces = append(k.Pieces, picture.Piece{Kind: kind, Name: what, From: from, To: to, Outer: outer, Inner: inner})
		}
		add(picture.HeadPiece, "head", -4.8, -0.8, 7, 0)
		add(picture.ShankPiece, "M4", -0.8, 19.2, 4, 0)
		add(picture.WasherPiece, "washer ISO 7089 M4", -0.8, 0, 9, 4.3)
		add(picture.PartPiece, "crank", 0, 2.85, 13.5, 4.5)
		add(picture.WasherPiece, "washer", 2.85, 3.35, 9, 4.3)
		add(picture.PartPiece, "coupler", 3.35, 6.2, 13.5, 4.5)
		if top > 7 {
			add(picture.WasherPiece, "washer", 6.2, 6.7, 9, 4.3)
			add(picture.PartPiece, "plate", 6.7, 9.55, 13.5, 4.5)
		}
		add(picture.WasherPiece, "washer", top, top+0.8, 9, 4.3)
		add(picture.NutPiece, "locknut DIN 985 M4", top+0.8, top+5.8, 7, 4)
		return k
	}
	return []picture.Kit{kit("A", 9.55), kit("B", 6.2), kit("C", 9.55)}, levels
}

// AnySheet draws sheets of bars, circles and wild closed runs of lines and arcs, in any order of
// operations.
func AnySheet() *rapid.Generator[export.Sheet] {
	return rapid.Custom(func(t *rapid.T) export.Sheet {
		s := export.Sheet{Name: "s", Width: rapid.Float64Range(10, 2000).Draw(t, "width"), Height: rapid.Float64Range(10, 2000).Draw(t, "height")}
		point := func() outline.Point {
			return outline.Point{X: rapid.Float64Range(0, s.Width).Draw(t, "x"), Y: rapid.Float64Range(0, s.Height).Draw(t, "y")}
		}
		bulge := rapid.OneOf(rapid.Just(0.0), rapid.Just(1.0), rapid.Just(-1.0), rapid.Float64Range(-1.2, 1.2), rapid.Float64Range(-1e-6, 1e-6),
			rapid.Float64Range(0.999999, 1.000001), rapid.Float64Range(-8, 8))
		for range rapid.IntRange(0, 6).Draw(t, "steps") {
			step := export.Step{Op: rapid.SampledFrom(export.Operations()).Draw(t, "op"), Part: rapid.SampledFrom([]string{"a", "b<&\"", ""}).Draw(t, "part")}
			var run []outline.Vertex
			switch {
			case step.Op != export.Engrave && rapid.Bool().Draw(t, "circle"):
				run = outline.Circle(point(), rapid.Float64Range(0.5, 500).Draw(t, "radius"))
			default:
				for range rapid.IntRange(2, 7).Draw(t, "vertices") {
					run = append(run, outline.Vertex{Point: point(), Bulge: bulge.Draw(t, "bulge")})
				}
			}
			if step.Op == export.Engrave {
				step.Open = run
			} else {
				step.Closed = run
			}
			s.Steps = append(s.Steps, step)
		}
		return s
	})
}
