// Package assembly looks at the built mechanism as bodies in space and proves that nothing in it
// touches what it should pass: parts, heads, nuts, washers, spacers and shanks, through the whole
// drive and over the range of every adjustable pivot.
//
// Lengths and heights are millimetres, angles radians.
package assembly

import (
	"math"
	"slices"

	"pinwright/parts"
	"pinwright/parts/interference"
	"pinwright/parts/job"
	"pinwright/parts/linkage"
	"pinwright/parts/outline"
	"pinwright/parts/stack"
)

const (
	// axial is how far two bodies must be apart in height to count as passing each other without
	// touching: sheets are measured to a tenth, washers bend and links tilt in their play (common
	// practice, no source).
	axial = 0.25

	// contact is how far the heights of two parts that lie face to face may overlap by rounding.
	contact = 1e-6

	// accuracy is how exactly the smallest gaps are known, and share how much of a gap may be open
	// on top: only small ones matter to a hundredth.
	accuracy = 0.01
	share    = 0.05

	// interest is the distance up to which gaps are told; beyond it bodies have nothing to do with
	// each other.
	interest = 10

	// effort bounds the search for one pair.
	effort = 200000
)

// Gap is the smallest distance between two bodies that share a height, over the whole motion.
type Gap struct {
	A, B     string    // "coupler", "nut of A"
	MM       float64   // smallest distance; negative: they overlap, by so much
	Error    float64   // the true smallest distance is at most so much less than MM
	Angle    float64   // drive angle where it occurs
	Settings []float64 // places of the adjustable pivots where it occurs, 0 to 1, in the order of the joints
	At       outline.Point
	Low, Up  float64 // heights that they share
}

// Gaps returns the smallest gaps of all pairs of bodies that come nearer than some millimetres to each
// other, in the order of the smallest first. Of pairs that touch the gap is minus the depth of their
// overlap, see interference.Options.
//
// list and kits are those of one copy that is not mirrored; a mirrored copy moves as its mirror image
// and has the same gaps. It errs when the motion cannot be certified, as with surplus links.
func Gaps(j job.Job, m *linkage.Mechanism, list []parts.Part, kits []stack.Kit, levels []stack.Level) ([]Gap, error) {
	space, err := interference.NewSpace(m)
	if err != nil {
		return nil, err
	}
	things := append(ofParts(j, list, levels), ofKits(kits)...)
	var pairs [][2]interference.Body
	for i, a := range things {
		for _, b := range things[i+1:] {
			if meet(m.Linkage(), a, b) {
				pairs = append(pairs, [2]interference.Body{a.Body, b.Body})
			}
		}
	}
	gaps, err := space.All(pairs, interference.Options{Accuracy: accuracy, Share: share, Limit: interest, Boxes: effort, Depth: true})
	if err != nil {
		return nil, err
	}
	var out []Gap
	for i, g := range gaps {
		if g.MM >= interest {
			continue
		}
		a, b := pairs[i][0], pairs[i][1]
		out = append(out, Gap{
			A: a.Name, B: b.Name, MM: g.MM, Error: g.Error, Angle: g.Angle, Settings: g.Settings, At: g.At,
			Low: math.Max(a.Low, b.Low), Up: math.Min(a.Up, b.Up),
		})
	}
	slices.SortStableFunc(out, func(a, b Gap) int {
		switch {
		case a.MM < b.MM:
			return -1
		case a.MM > b.MM:
			return 1
		}
		return 0
	})
	return out, nil
}
