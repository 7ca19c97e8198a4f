// Package interference proves that bodies on a moving linkage keep clear of each other: through the
// whole drive and over the whole range of every adjustable pivot, certified by motion bounds and not
// by samples alone.
//
// Plan:
//
//  1. The state of the mechanism depends on a few parameters: the drive's angle and the setting of
//     every adjustable pivot. Together they fill a box.
//  2. At the middle of a box the positions are solved exactly (Newton), and so are the velocities of
//     every joint with respect to every parameter. How far a joint can stray from that linear motion
//     anywhere in the box is bounded by a fixed point argument (see motion.go); no sampling is
//     involved.
//  3. From the joints follows, for every body, a bound on how far any of its points can come towards
//     another body within the box. Gap at the middle minus that bound is a lower bound of the gap in
//     the box; the gap at the middle is an upper bound of the smallest.
//  4. Boxes are halved, the most doubtful first, until the upper and the lower bound of the smallest
//     gap agree to the accuracy asked for (branch and bound).
//
// Lengths are millimetres, angles radians.
package interference

import "pinwright/parts/outline"

// Point is a place in the plane, mm.
type Point = outline.Point

// Carrier says what a body moves with.
type Carrier int

// The carriers.
const (
	OnGround Carrier = iota // does not move; the body is in the linkage's coordinates
	OnLink                  // moves with a link; the body is in the link's frame
	OnJoint                 // moves with a joint without turning; the body is about the joint
)

// Body is a solid disc-like thing: a region of the plane between two heights.
type Body struct {
	Name    string
	Carrier Carrier
	Of      string // name of the link or joint
	Region  outline.Region
	Low, Up float64 // heights it fills, mm
}

// Gap is the smallest distance between two bodies over the whole motion.
type Gap struct {
	A, B     int       // indices of the bodies
	MM       float64   // smallest distance found; negative: they overlap, and by about so much
	Error    float64   // the true smallest distance lies between MM-Error and MM
	Angle    float64   // drive angle at which MM occurs, radians
	Settings []float64 // place of each adjustable pivot at which MM occurs, 0 to 1
	At       Point     // where, in the linkage's coordinates
	Boxes    int       // boxes looked at: the cost
}
