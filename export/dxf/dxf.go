// Package dxf writes sheets as DXF drawings and reads drawings back, strictly.
//
// What is written is the ASCII form of AC1015 (R2000), millimetres, in the order of the work: one
// closed LWPOLYLINE with bulges for every outline, CIRCLE for a full circle, LINE or open
// LWPOLYLINE for an engraved stroke. The layer of an entity says what the beam does along it.
// Coordinates are written with as many digits as it takes to read the same number back, so that a
// drawing that was read is the drawing that was planned, bit for bit. No dates, names or random
// identifiers are inside: the same sheet gives the same bytes.
//
// The format is that of the published DXF Reference (group codes, handles, owners, the
// tables, blocks and objects that a complete drawing has).
package dxf

import (
	"strings"

	"pinwright/export"
)

// The layers. The first three are work for the beam, in the order in which a part is worked;
// LayerEdge is the outline of the sheet, for the eye only.
const (
	LayerEngrave = "ENGRAVE"
	LayerInside  = "CUT-INSIDE"
	LayerOutside = "CUT-OUTSIDE"
	LayerEdge    = "SHEET-EDGE"
)

// LayerOf returns the layer of an operation, its name in capitals, or "" for one that does not exist.
func LayerOf(op export.Operation) string {
	if !op.Valid() {
		return ""
	}
	return strings.ToUpper(op.String())
}

// OperationOf returns what the beam does on a layer; false for a layer that is not work (the edge
// of the sheet, or a layer that is not ours).
func OperationOf(layer string) (export.Operation, bool) {
	for _, op := range export.Operations() {
		if LayerOf(op) == layer {
			return op, true
		}
	}
	return 0, false
}

// Units is the unit of a drawing as its header states it ($INSUNITS).
type Units int

// The units that are told apart; a drawing may state any number.
const (
	Unitless   Units = 0
	Inch       Units = 1
	Millimetre Units = 4
)

// String names the unit.
func (u Units) String() string {
	names := map[Units]string{
		Unitless: "no unit", Inch: "inches", 2: "feet", Millimetre: "millimetres", 5: "centimetres", 6: "metres",
	}
	if s, ok := names[u]; ok {
		return s
	}
	return "unit number " + itoa(int(u))
}

// Options chooses the colours and extras of a drawing. The zero value is the usual drawing.
type Options struct {
	Engrave int // colour of the layers as index of the DXF palette, 1 to 255; 0: the default
	Inside  int
	Outside int
	Edge    int

	SheetEdge bool // also draw the edge of the sheet, on a layer that is not plotted
}

// The default colours of the layers, near to the looks of the operations: a green-blue, an
// orange-brown, a dark blue, and grey for the edge. They carry no meaning: the layer's name does.
const (
	DefaultEngrave = 124
	DefaultInside  = 34
	DefaultOutside = 174
	DefaultEdge    = 253
)
