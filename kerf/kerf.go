// Package kerf turns finished sizes into cut paths: what the beam takes away, and how a path is
// moved so that the part comes out right.
package kerf

import "pinwright/parts/outline"

// Beam is what a laser takes from one material and thickness.
type Beam struct {
	Width float64 // full width of the cut, mm; 0 when the shop compensates itself
}

// Cut is the way of the beam's centre for one part.
type Cut struct {
	Outside outline.Outline   // counter-clockwise
	Inside  []outline.Outline // clockwise, in the order of the region's holes
}
