// Package interference proves that bodies on a moving linkage keep clear of each other: through the
// whole drive and over the whole range of every adjustable pivot, certified by motion bounds and not
// by samples alone. The bodies may be on two copies of the linkage, at different phases of one shaft.
//
// Plan:
//
//  1. The state of the mechanism depends on a few parameters: the drive's angle and the setting of
//     every adjustable pivot. Together they fill a box.
//  2. At the middle of a box the positions are solved exactly (Newton), and so are the velocities of
//     every joint with respect to every parameter. How far a joint can stray from that linear motion
//     anywhere in the box is bounded by a fixed point argument (pose.go); no sampling is involved.
//  3. From the joints follows, for every body, a bound on how far any of its points can come towards
//     another body within the box (bound.go). Gap at the middle minus that bound is a lower bound of
//     the gap in the box; the gap at the middle is an upper bound of the smallest.
//  4. Boxes are halved, the most doubtful first, until the upper and the lower bound of the smallest
//     gap agree to the accuracy asked for (branch and bound, gap.go).
//
// What is taken from elsewhere and not proven here: that the linkage stays on the branch which package
// linkage follows, and that surplus links (which fit only by their exact lengths) go on fitting. Lengths
// are held to 1e-9 mm; rounding is allowed for in the bounds of the motion.
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

// Copy says which built copy of the linkage a body is on. The zero value is the linkage itself.
//
// All copies are driven together, through one shaft or through shafts that turn the same way: while
// the zero copy's drive angle goes from 0 to t, that of a copy goes from Phase to Phase+t, and that of
// a mirrored copy, whose angles are counted in its own mirror, to Phase-t.
type Copy struct {
	Phase  float64 // drive angle ahead of the zero copy's
	Mirror bool    // x turned to -x
	At     Point   // where the origin of the linkage's coordinates lies
}

// Body is a solid thing seen from above: a region of the plane that moves with something.
type Body struct {
	Name    string
	Carrier Carrier
	Of      string         // name of the link or joint
	Region  outline.Region // as on a copy that is not mirrored
	Low, Up float64        // heights it fills, mm; for the caller
	Copy    Copy
}

// Gap is the smallest distance between two bodies over the whole motion.
type Gap struct {
	MM       float64   // smallest distance found; 0 or less: they touch or overlap, see Options.Depth
	Error    float64   // the true smallest distance lies between MM-Error and MM
	Angle    float64   // drive angle of the zero copy at which MM occurs, radians
	Settings []float64 // place of each adjustable pivot at which MM occurs, 0 to 1, in the order of the joints; with two copies those of the first body's, then those of the second's
	At       Point     // where, in the coordinates of the zero copy
	Boxes    int       // boxes looked at: the cost
}

// Options says how exact the answer must be.
type Options struct {
	Accuracy float64 // mm; the smallest gap is wanted to this
	Share    float64 // and to this share of itself: 0.02 leaves a gap of 5 mm open by another 0.1 mm
	Limit    float64 // mm; pairs that never come closer are not looked at further: their gap is given as Limit
	Enough   float64 // mm; the search ends at the first position with a gap below this, and the answer says so with an Error as large as MM
	Boxes    int     // at most so many boxes a pair
	Depth    bool    // for pairs that touch MM is minus the depth, see below; without it 0, and Angle is any place where they touch

	// The depth of an overlap is the diameter of the largest disc that fits into what both cover, at the
	// worst position: both bodies would have to be slimmer by half of it. It is found to Accuracy or a
	// twentieth of a millimetre or of itself, whichever is more, or as well as some hundred boxes allow:
	// Error tells.
}
