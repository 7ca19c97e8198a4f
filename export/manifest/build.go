package manifest

import (
	"fmt"
	"math"

	"pinwright/parts"
	"pinwright/parts/linkage"
	"pinwright/parts/outline"
)

// MeasureOutline takes the measures of a contour, of whichever orientation.
func MeasureOutline(o outline.Outline) Measure {
	m, box := o.Moments(), o.Bounds()
	return Measure{
		Area: math.Abs(m.Area), Perimeter: o.Length(), Middle: Point(m.Centroid), Low: Point(box.Min), High: Point(box.Max),
	}
}

// NewPart states what a part must measure when it is cut: its holes, its outside, its mark and its
// area. finished is what the beam leaves of it when it runs along the cut paths, in the part's frame,
// with the holes in the order of p.Holes: the part's region, but for corners that the beam cannot
// enter. Where the part lies, its mass, feet and lengths are the caller's to add (see PlacementOf,
// LinkLengths and PivotLengths).
//
// It is an error when the finished region has another number of holes than the part.
func NewPart(p parts.Part, finished outline.Region) (Part, error) {
	if len(finished.Holes) != len(p.Holes) {
		return Part{}, fmt.Errorf("%s: %d holes are named, and the beam leaves %d", p.Name, len(p.Holes), len(finished.Holes))
	}
	out := Part{
		Name: p.Name, Link: p.Link, Copy: p.Copy, Stock: p.Stock, Plane: p.Plane,
		Mark: Mark{Text: p.Mark.Text, Strokes: len(p.Mark.Strokes)},
		Area: finished.Area(), Outside: MeasureOutline(finished.Outer),
	}
	for _, s := range p.Mark.Strokes {
		out.Mark.Length += s.Length()
	}
	for i, h := range p.Holes {
		out.Holes = append(out.Holes, Hole{
			Name: h.Name, Kind: string(h.Kind), Joint: h.Joint, Centre: Point(h.Centre), Diameter: h.Diameter,
			Measure: MeasureOutline(finished.Holes[i]),
		})
	}
	return out, nil
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
