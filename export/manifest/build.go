package manifest

import (
	"errors"
	"fmt"
	"math"

	"pinwright/kerf"
	"pinwright/parts"
	"pinwright/parts/linkage"
	"pinwright/parts/outline"
)

// MeasureOutline takes the measures of a contour, of whichever orientation.
func MeasureOutline(o outline.Outline) Measure {
	m := o.Moments()
	return Measure{Area: math.Abs(m.Area), Perimeter: o.Length(), Middle: Point(m.Centroid)}
}

// NewPart states what a part must measure when it is cut with a beam: its holes, its outside and its
// mark. Where it lies, its area, mass, feet and lengths are the caller's to add (see LinkLengths and
// PivotLengths). The measures are those that the beam leaves, so they are taken of the finished region
// made from the cut path.
func NewPart(p parts.Part, beam kerf.Beam) (Part, error) {
	return Part{}, errors.New("x")
}

// LinkLengths lists the lengths of a link between those of its joints that the part shows, in the
// order of the link's lengths.
func LinkLengths(l linkage.Link, p Part) []Length {
	var out []Length
	for _, length := range l.Lengths {
		if p.Shows(length.A) && p.Shows(length.B) {
			out = append(out, Length{A: length.A, B: length.B, MM: length.MM})
		}
	}
	return out
}

// PivotLengths lists the distances between the fixed ground joints that the part shows, each pair
// once, in the order of the linkage's joints. An adjustable pivot has no distance of its own.
func PivotLengths(l linkage.Linkage, p Part) []Length {
	var out []Length
	for i, a := range l.Joints {
		for _, b := range l.Joints[i+1:] {
			if a.Ground == nil || b.Ground == nil || a.Ground.Range != nil || b.Ground.Range != nil {
				continue
			}
			if p.Shows(a.Name) && p.Shows(b.Name) {
				d := a.Ground.At.Dist(b.Ground.At)
				out = append(out, Length{A: a.Name, B: b.Name, MM: d})
			}
		}
	}
	return out
}

// PlacementOf is a motion as the manifest states it.
func PlacementOf(t outline.Transform) Placement {
	return Placement{Flip: t.Mirror, Turn: t.Angle() * 180 / math.Pi, X: t.Move.X, Y: t.Move.Y}
}

var _ = fmt.Sprint
