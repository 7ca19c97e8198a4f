package dxf

import (
	"strconv"

	"pinwright/parts/outline"
)

// Drawing is what a file says, as it says it. Nothing is repaired.
type Drawing struct {
	Version  string      // $ACADVER
	Units    Units       // $INSUNITS; Unitless when the header does not say
	Metric   bool        // $MEASUREMENT is 1
	Extents  outline.Box // $EXTMIN to $EXTMAX; empty when the header does not say
	Limits   outline.Box // $LIMMIN to $LIMMAX; empty when the header does not say
	Layers   []Layer     // in the order of the file
	Entities []Entity    // in the order of the file, which is that of the work
	Others   []Other     // what is drawn but not understood, in the order of the file
}

// Layer is an entry of the layer table.
type Layer struct {
	Name   string
	Colour int  // index of the DXF palette
	Off    bool // switched off or frozen
	Line   int  // where in the file
}

// Entity is one contour: either Closed or Open is set.
type Entity struct {
	Type   string // LWPOLYLINE, CIRCLE, LINE, ARC, POLYLINE
	Layer  string
	Colour int             // index of the DXF palette; 256: as the layer
	Closed outline.Outline // circles run counter-clockwise, polylines as they are drawn
	Open   outline.Path
	Circle *outline.Disc // of a CIRCLE: the numbers as the file has them
	Line   int           // of the file, where the entity begins
}

// Other is something drawn that this package does not read: text, a spline, a block, a line that
// leaves the plane.
type Other struct {
	Type, Layer string
	Why         string // "not a line, arc, circle or polyline"
	Line        int
}

// Error is a file that is not a sound drawing.
type Error struct {
	Line int // counted from 1
	What string
}

// Error says the line and what is wrong there.
func (e *Error) Error() string { return "line " + strconv.Itoa(e.Line) + ": " + e.What }
