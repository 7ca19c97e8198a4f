package picture

import (
	"fmt"
	"slices"
)

// apart is the gap between the pieces of an exploded kit, mm of paper.
const apart = 2.4

// Exploded draws pin kits pulled apart along their pins, as they are put together: the bolt or shaft at the
// bottom, above it one piece after the other with the number of its step in a circle and its name.
// Pictures are no higher than height (but for a single kit that is higher by itself), all at one scale,
// which is chosen as for SideView.
func Exploded(kits []Kit, width, height float64) ([]Picture, error) {
	v, err := newSide(kits, nil, width, height, explode)
	if err != nil {
		return nil, fmt.Errorf("exploded view: %w", err)
	}
	return v.pages(height), nil
}

// explode pulls a kit apart, from height 0 upwards: the lowest heads and the shanks stay together, the
// others follow in the order of their heights, a part before what sits in it.
func explode(k Kit, scale float64) Kit {
	gap := apart / scale
	out := Kit{Name: k.Name, Text: k.Text}
	z := 0.0
	put := func(p Piece) {
		p.To, p.From = z+p.To-p.From, z
		z = p.To
		out.Pieces = append(out.Pieces, p)
	}
	for _, kind := range []PieceKind{HeadPiece, ShankPiece} {
		for _, p := range k.Pieces {
			if p.Kind == kind {
				put(p)
			}
		}
	}
	var rest []Piece
	for _, p := range k.Pieces {
		if p.Kind != HeadPiece && p.Kind != ShankPiece {
			rest = append(rest, p)
		}
	}
	slices.SortStableFunc(rest, func(a, b Piece) int {
		switch {
		case a.From < b.From:
			return -1
		case a.From > b.From:
			return 1
		}
		return 0
	})
	for _, p := range rest {
		if len(out.Pieces) > 0 {
			z += gap
		}
		put(p)
	}
	return out
}
