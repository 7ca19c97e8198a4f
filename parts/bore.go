package parts

import (
	"fmt"
	"math"

	"pinwright/parts/job"
	"pinwright/parts/outline"
)

// drilling is one hole about a joint, with the joint at the origin.
type drilling struct {
	hole  Hole
	shape outline.Outline // clockwise
}

// round is a round hole.
func round(name string, kind HoleKind, joint string, at outline.Point, diameter float64) drilling {
	return drilling{
		Hole{Name: name, Kind: kind, Joint: joint, Centre: at, Diameter: diameter, Width: diameter},
		outline.CircleHole(at, diameter/2),
	}
}

// bore returns the holes of a bore whose form the maker gives, about the origin; its direction points
// along the angle zero. The hub's centre hole comes first.
func bore(b job.Bore, zero float64) []drilling {
	hole := Hole{Name: b.Joint, Kind: ShaftBore, Joint: b.Joint}
	switch b.Kind {
	case job.RoundBore:
		return []drilling{round(b.Joint, ShaftBore, b.Joint, outline.Point{}, b.Diameter)}
	case job.DBore:
		hole.Width = b.Flat
		return []drilling{{hole, dShape(b.Diameter/2, b.Flat-b.Diameter/2, zero)}}
	case job.HexagonBore:
		hole.Width = b.Across
		return []drilling{{hole, hexagon(b.Across, zero)}}
	case job.HubBore:
		out := []drilling{round(b.Joint, ShaftBore, b.Joint, outline.Point{}, b.Diameter)}
		for i := range b.Bolts {
			at := outline.Polar(b.Circle/2, zero+2*math.Pi*float64(i)/float64(b.Bolts))
			name := fmt.Sprintf("%s bolt %d of %d", b.Joint, i+1, b.Bolts)
			out = append(out, round(name, BoltHole, b.Joint, at, b.Hole))
		}
		return out
	}
	return nil
}

// dShape is a circle with one flat at the distance h from its centre, in the direction zero; clockwise.
func dShape(radius, h, zero float64) outline.Outline {
	half := math.Acos(max(-1, min(1, h/radius)))
	arc := outline.Arc(outline.Point{}, radius, zero+half, zero+2*math.Pi-half)
	return outline.Outline(arc).Reverse().Clean()
}

// hexagon has a flat square to the direction zero; clockwise.
func hexagon(across, zero float64) outline.Outline {
	var pts []outline.Point
	for i := range 6 {
		pts = append(pts, outline.Polar(across/math.Sqrt(3), zero+math.Pi/6-math.Pi/3*float64(i)))
	}
	return outline.Polygon(pts...)
}
