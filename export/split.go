package export

import (
	"math"

	"pinwright/parts/outline"
)

// Split returns the segments with every arc halved, and halved again, until fine says that the piece is
// short enough. The curve stays the same; lines and their order too.
func Split(segments []outline.Segment, fine func(outline.Segment) bool) []outline.Segment {
	out := make([]outline.Segment, 0, 4*len(segments))
	for _, s := range segments {
		out = halve(out, s, fine, 0)
	}
	return out
}

// deepest bounds the halving: 2^16 pieces of an arc are more than any file wants.
const deepest = 16

func halve(out []outline.Segment, s outline.Segment, fine func(outline.Segment) bool, depth int) []outline.Segment {
	if s.IsLine() || depth == deepest || fine(s) {
		return append(out, s)
	}
	middle := s.At(0.5)
	half := s.Bulge / (1 + math.Sqrt(1+s.Bulge*s.Bulge)) // tan(atan(b)/2)
	out = halve(out, outline.Segment{A: s.A, B: middle, Bulge: half}, fine, depth+1)
	return halve(out, outline.Segment{A: middle, B: s.B, Bulge: half}, fine, depth+1)
}
