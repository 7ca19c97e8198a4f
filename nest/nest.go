// Package nest lays cut paths on sheets: what goes where, on which sheet, turned and flipped how.
// It knows outlines, sheets and distances, and nothing of bolts or linkages.
package nest

import "pinwright/parts/outline"

// Item is one shape to be cut, Quantity times.
type Item struct {
	Name     string
	Shape    outline.Region // the cut path: centre line of the beam, windows as holes, in the item's own frame
	Quantity int
	Stock    string    // only sheets of this stock may carry it
	Angles   []float64 // allowed turns, radians; nil: any
	Flip     bool      // may be turned over
}

// Stock is a kind of sheet on the shelf.
type Stock struct {
	Name          string
	Width, Height float64 // mm
	Quantity      int
	Margin        float64 // material left between a cut and the sheet's edge, mm
	Web           float64 // material left between two cuts, mm
	Kerf          float64 // full width of the beam, mm: cut paths keep Web+Kerf from each other and Margin+Kerf/2 from the edge
}

// Placement is one copy of an item on a sheet.
type Placement struct {
	Item  int // index into the items
	Copy  int // 0 to Quantity-1
	Sheet int // index into Layout.Sheets
	At    outline.Transform
}

// Sheet is one sheet in use.
type Sheet struct {
	Stock int     // index into the stock
	Fill  float64 // area of the parts over area of the sheet, 0 to 1
}

// Layout is the answer: every placement in order of item, then copy; and what found no room.
type Layout struct {
	Sheets     []Sheet
	Placements []Placement
	Left       []Leftover
}

// Leftover is an item of which some copies found no room, and why.
type Leftover struct {
	Item   int
	Copies int
	Sheets int // sheets to add to the item's stock for all that found no room on it, not only this item; 0: not known
	Why    string
}
