// Package parts makes flat parts from a solved linkage: outlines at finished size with the holes that
// the pins ask for and an engraved mark.
package parts

import "pinwright/parts/outline"

// Part is one flat part at finished size, in its own frame: for a link the first pin is the origin
// and the second lies on the positive x axis; for a frame plate the frame is the linkage's.
// A part of a mirrored copy is mirrored already.
type Part struct {
	Name   string // unique in the job: "left-1.crank"
	Link   string // link, frame plate or cross member that it is
	Copy   string
	Stock  string
	Plane  int
	Region outline.Region
	Holes  []Hole // what the region's holes are, in the order of Region.Holes
	Mark   Mark
}

// HoleKind says what a hole is for.
type HoleKind string

// The kinds of hole.
const (
	PinHole     HoleKind = "pin"     // a pin goes through
	BearingSeat HoleKind = "bearing" // a bearing sits in it
	ShaftBore   HoleKind = "shaft"   // a shaft, round or D, or a hexagon
	PivotSlot   HoleKind = "slot"    // an adjustable pivot moves along it
	TabSlot     HoleKind = "tab"     // a tab pushes into it
	BoltHole    HoleKind = "bolt"    // screws (hub circle, mounting)
	Window      HoleKind = "window"  // lightening
	PenHole     HoleKind = "pen"     // a pen traces the path
)

// Hole is one hole of a part.
type Hole struct {
	Name     string // "B", "O bolt 2 of 4", "window 1"
	Kind     HoleKind
	Joint    string // the joint it sits on, or ""
	Centre   outline.Point
	Diameter float64 // finished, mm; 0 when it is not round
	Width    float64 // narrowest way across, mm: the diameter of a round one; 0 for a window
}

// Mark is what is engraved: single strokes, and the text they spell.
type Mark struct {
	Text    string
	Strokes []outline.Path
}
