// Package linkage solves planar pin-jointed linkages of one degree of freedom: positions through the
// whole cycle, mobility, assembly, toggles, branch jumps, transmission angles and foot paths.
//
// Lengths are millimetres, angles radians. The package knows no thickness, no material and no file.
//
// New checks a Linkage, takes it apart into Assur groups and puts it together at the start of its
// drive; Mechanism.Cycle solves it over the drive, for one setting of its adjustable pivots; a Cycle
// gives places, speeds, placements of links, paths, transmission angles,
// toggles and sensitivities. Analyse does all of that once and returns a Report. Recover finds
// lengths in a table of joint places.
package linkage

import "pinwright/parts/outline"

// Point is a place in the plane of the linkage, mm.
type Point = outline.Point

// Linkage is joints, links and the order they were named in; everything about it refers to names.
type Linkage struct {
	Joints []Joint
	Links  []Link
	Drive  Drive
	Trace  []string // joints whose path is wanted, in order
}

// Joint is a place where links meet, or a traced point of a single link.
type Joint struct {
	Name   string
	Ground *Ground // nil for a moving joint
	Near   *Point  // rough place at the start of the drive: tells which way a loop closes
}

// Ground is a pivot in the frame: fixed (At) or adjustable along a line or an arc.
type Ground struct {
	At    Point // where it is set
	Range *Range
}

// Range is the way along which an adjustable pivot can be set: a straight line From-To, or, when
// Radius > 0, an arc about Centre from angle Start to angle End (End > Start: counter-clockwise).
type Range struct {
	From, To   Point
	Centre     Point
	Radius     float64
	Start, End float64
}

// Link is a rigid body through two or more pins.
//
// With two pins Lengths holds one distance. With n pins it holds the distances that fix the shape,
// 2n-3 of them, in any order; redundant ones are checked. Which of the two mirrored shapes is meant
// follows from the joints' Near places (or is free when the pins lie on one line).
type Link struct {
	Name    string
	Pins    []string
	Lengths []Length
}

// Length is the distance between two pins of one link, mm.
type Length struct {
	A, B string
	MM   float64
}

// Drive turns Link about its ground pin. The angle is that of the line from the ground pin to the
// link's next pin, from the x axis, counter-clockwise. From 0 To 2 pi is a full turn.
type Drive struct {
	Link     string
	From, To float64
	Full     bool
}
