// Package kerf turns finished sizes into cut paths: what the beam takes away, and how a path is
// moved so that the part comes out right.
package kerf

import (
	"errors"
	"fmt"
	"math"
	"strconv"

	"pinwright/parts/outline"
)

// Beam is what a laser takes from one material and thickness.
type Beam struct {
	Width float64 // full width of the cut, mm; 0 when the shop compensates itself
}

// Widest is the widest beam that is believed, mm: no laser comes near it (published values go from
// 0.08 to 0.45 mm), so a larger number is a slip of the pen.
const Widest = 1.5

// Cut is the way of the beam's centre for one part.
type Cut struct {
	Outside outline.Outline   // counter-clockwise
	Inside  []outline.Outline // clockwise, in the order of the region's holes
}

// Region returns the cut as a region: what lies between the centre lines.
func (c Cut) Region() outline.Region { return outline.Region{Outer: c.Outside, Holes: c.Inside} }

// Error is a feature of a part that the beam cannot make.
type Error struct {
	Part    string
	Feature string        // "outside", or the name of the hole
	At      outline.Point // where, in the part's frame
	Size    float64       // of the feature, mm: how wide it is
	Beam    float64       // width of the beam, mm
	what    string
}

// Error says what, where, by how much and what to do.
func (e *Error) Error() string {
	return fmt.Sprintf("%s: %s at (%s, %s) %s", e.Part, e.Feature, millimetres(e.At.X), millimetres(e.At.Y), e.what)
}

// usable refuses a beam of no believable width.
func (b Beam) usable() error {
	switch {
	case math.IsNaN(b.Width) || math.IsInf(b.Width, 0):
		return errors.New("the kerf is not a number: measure the full width of the cut, in mm")
	case b.Width < 0:
		return fmt.Errorf("the kerf is %s mm: the full width of the cut is not negative", millimetres(b.Width))
	case b.Width > Widest:
		return fmt.Errorf("the kerf is %s mm: no laser takes more than %s mm; write the full width of the cut", millimetres(b.Width), millimetres(Widest))
	}
	return nil
}

// millimetres writes a length to a micrometre, without zeros at the end.
func millimetres(v float64) string {
	v = math.Round(v*1000) / 1000
	if v == 0 {
		v = 0 // no minus
	}
	return strconv.FormatFloat(v, 'f', -1, 64)
}
