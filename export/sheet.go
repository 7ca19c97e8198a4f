// Package export holds what every cut file is drawn from: a sheet with its cuts in the order in
// which they are made. The writers are in the packages below it; none of them decides anything.
package export

import "pinwright/parts/outline"

// Operation is what the laser does along a path.
type Operation int

// The operations, in the order in which a sheet is worked.
const (
	Engrave Operation = iota
	CutInside
	CutOutside
)

// Sheet is one drawing: a sheet of stock, or a single part on its own (then the size is the part's).
// The origin is the lower left corner, x to the right, y up.
type Sheet struct {
	Name          string  // file name without extension
	Title         string  // for the eye: stock, thickness, number of the sheet
	Width, Height float64 // mm
	Steps         []Step  // in the order of the work
}

// Step is one path of the beam.
type Step struct {
	Op     Operation
	Part   string          // name of the part it belongs to
	Closed outline.Outline // set for cuts
	Open   outline.Path    // set for engraving
}
