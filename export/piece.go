package export

import "pinwright/parts/outline"

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
		steps = append(steps, Step{Op: Engrave, Part: p.Part, Open: m.Transform(t)})
	}
	for _, h := range p.Inside {
		steps = append(steps, Step{Op: CutInside, Part: p.Part, Closed: h.Transform(t)})
	}
	return append(steps, Step{Op: CutOutside, Part: p.Part, Closed: p.Outside.Transform(t)})
}
