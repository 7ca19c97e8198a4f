package export

import (
	"math"

	"pinwright/parts/outline"
)

// Piece is all that the beam does for one part, in the part's frame.
type Piece struct {
	Part    string
	Outside outline.Outline
	Inside  []outline.Outline
	Marks   []outline.Path
}

// Place returns the steps of a piece that lies on a sheet as t says: engraving, inside cuts, the
// outside cut. A piece that is turned over would have its marks in mirror writing; the caller does
// not turn marked parts over.
func (p Piece) Place(t outline.Transform) []Step {
	steps := make([]Step, 0, len(p.Marks)+len(p.Inside)+1)
	for _, m := range p.Marks {
		steps = append(steps, Step{Op: Engrave, Part: p.Part, Open: outline.Path(settled(m.Transform(t)))})
	}
	for _, h := range p.Inside {
		steps = append(steps, Step{Op: CutInside, Part: p.Part, Closed: outline.Outline(settled(h.Transform(t)))})
	}
	return append(steps, Step{Op: CutOutside, Part: p.Part, Closed: outline.Outline(settled(p.Outside.Transform(t)))})
}

// settled rounds vertices in place.
func settled(run []outline.Vertex) []outline.Vertex {
	round := func(v float64) float64 { return math.Round(v*1e9)/1e9 + 0 } // no negative zero
	for i, v := range run {
		run[i] = outline.Vertex{Point: outline.Point{X: round(v.X), Y: round(v.Y)}, Bulge: math.Round(v.Bulge*1e12) / 1e12}
	}
	return run
}
