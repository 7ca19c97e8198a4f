package picture

import (
	"fmt"
	"math"
)

// Kit is what is stacked on one pin.
type Kit struct {
	Name   string // "A"
	Text   string // below the name: "ISO 4762 M4 x 20", or ""
	Pieces []Piece
}

// Piece is one thing of a kit, round the pin's axis. From and To are heights along the axis, mm, From
// below To; all kits of a picture count from the same level.
type Piece struct {
	Kind     PieceKind
	Name     string // shown beside it, but for a shank; "" shows nothing
	From, To float64
	Outer    float64 // diameter, mm; of a part the width that is drawn
	Inner    float64 // diameter of its hole, mm; 0: solid
	Tint     int     // of a part: which of the tints it is drawn in
	Step     int     // of the assembly, in which it goes on: shown in the exploded view; 0: none
}

// PieceKind says how a piece is drawn.
type PieceKind int

// The kinds of piece.
const (
	PartPiece   PieceKind = iota // in its tint
	ShankPiece                   // the bolt or shaft itself: drawn behind the others
	HeadPiece                    // head of a bolt
	NutPiece                     // nut
	WasherPiece                  // washer
	SpacerPiece                  // spacer or sleeve
	SeatPiece                    // bearing
)

// Level is the height of a plane.
type Level struct {
	Name     string // "plane 1"
	From, To float64
}

// stack is the shank of a kit and what is clamped on it.
type stack struct {
	shank    Piece
	from, to float64 // from the face under the head, or the lowest thing, to the nut, or the highest
	nutTo    float64 // upper end of the nuts; to where there is none
	past     float64 // shank beyond that, mm; negative when it ends within
}

func (s stack) nuts() bool { return s.nutTo > s.to }

// stackOf finds the stack; false for a kit without a shank or with nothing on it.
func stackOf(k Kit) (stack, bool) {
	var s stack
	shank, head := false, false
	low, high := math.Inf(1), math.Inf(-1)
	nutLow, nutHigh := math.Inf(1), math.Inf(-1)
	for _, p := range k.Pieces {
		switch p.Kind {
		case ShankPiece:
			s.shank, shank = p, true
		case HeadPiece:
			head = true
		case NutPiece:
			nutLow, nutHigh = min(nutLow, p.From), max(nutHigh, p.To)
		default:
			low, high = min(low, p.From), max(high, p.To)
		}
	}
	if !shank || !(high > low) {
		return s, false
	}
	if head {
		low = s.shank.From
	}
	s.from, s.to, s.nutTo = low, high, high
	if nutHigh > nutLow {
		s.to, s.nutTo = nutLow, nutHigh
	}
	s.past = s.shank.To - s.nutTo
	if math.Abs(s.past) < 1e-6 {
		s.past = 0
	}
	return s, s.to > s.from
}

// sound tells what is wrong with a kit.
func (k Kit) sound() error {
	for _, p := range k.Pieces {
		if !(p.To >= p.From && p.Outer > 0 && p.Inner >= 0 && p.Inner <= p.Outer) || math.IsInf(p.To-p.From, 0) || math.IsInf(p.Outer, 0) ||
			p.Kind < PartPiece || p.Kind > SeatPiece {
			return fmt.Errorf("pin kit %s: %s from %g to %g mm, diameter %g and %g, cannot be drawn", k.Name, p.Name, p.From, p.To, p.Outer, p.Inner)
		}
	}
	return nil
}
