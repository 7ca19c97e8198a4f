// Package reading is what was measured on a coupon: calliper values, pin gauges, and answers such as
// 'the 4 mm bolt turns in it', read strictly from a table.
//
// Lengths are millimetres. What was drawn is always the way of the beam's centre, as it went to the
// laser: a hole comes out larger by the kerf, a bar smaller.
package reading

// Kind is the form of what was measured.
type Kind string

// The kinds.
const (
	Hole Kind = "hole" // round; drawn is its diameter
	Slot Kind = "slot" // drawn is its width
	Bar  Kind = "bar"  // drawn is its width; several side by side are measured at once by their Count
)

// Axis is the direction in which a size was taken, in the coordinates of the laser.
type Axis string

// The axes.
const (
	AnyAxis Axis = ""
	X       Axis = "x"
	Y       Axis = "y"
)

// Side is the face of the sheet at which a size was taken; the top is where the beam goes in.
type Side string

// The sides. Without one a calliper value is taken as that of the middle of the sheet, and a pin or
// gauge that goes through as held by the tight side.
const (
	Through Side = ""
	Top     Side = "top"
	Bottom  Side = "bottom"
)

// Answer is how a pin goes into a hole, tried by hand.
type Answer string

// The answers, from loose to tight.
const (
	NoAnswer Answer = ""
	Drops    Answer = "drops" // falls through by its own weight
	Turns    Answer = "turns" // stays, and turns with two fingers
	Push     Answer = "push"  // goes in when pushed by hand and sits fast
	No       Answer = "no"    // does not go in by hand
)

// Looseness ranks the answers: 0 for no up to 3 for drops, -1 for none.
func (a Answer) Looseness() int {
	switch a {
	case No:
		return 0
	case Push:
		return 1
	case Turns:
		return 2
	case Drops:
		return 3
	}
	return -1
}

// Reading is one thing measured once. Either Answer says how the pin goes, or the size lies between
// Least and Most; they are equal where no rounding is to be reckoned with. Least may be -Inf and Most
// +Inf (a gauge of one size), not both.
type Reading struct {
	Feature string // which one on the coupon: readings of the same feature have the same name
	Kind    Kind
	Drawn   float64 // mm
	Count   int     // bars side by side, else 1
	Axis    Axis
	Side    Side
	Least   float64 // mm
	Most    float64 // mm
	Pin     float64 // diameter of the pin that was tried, mm; 0: none
	Answer  Answer
	Line    int // in the table, from 1; 0: not from a table
}

// Measured makes the reading of an instrument that rounds to a resolution, mm; 0: it does not round.
func Measured(feature string, k Kind, drawn, size, resolution float64) Reading {
	return Reading{Feature: feature, Kind: k, Drawn: drawn, Count: 1, Least: size - resolution/2, Most: size + resolution/2}
}

// Tried makes the reading of a pin tried in a hole.
func Tried(feature string, drawn, pin float64, a Answer) Reading {
	return Reading{Feature: feature, Kind: Hole, Drawn: drawn, Count: 1, Pin: pin, Answer: a}
}

// Sheet is a table of readings.
type Sheet struct {
	File      string
	Material  string  // "" when the table does not say
	Thickness float64 // measured, mm; 0 when the table does not say
	Laser     string
	Date      string // YYYY-MM-DD, as written in the table
	Readings  []Reading
	Blank     int // rows in which nothing was filled in
}
