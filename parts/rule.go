package parts

import (
	"math"

	"pinwright/parts/job"
)

// rule is what a sheet's material and thickness ask for round holes.
type rule struct {
	name string  // "3 mm cast acrylic", for messages
	web  float64 // least material between two cuts, mm
}

// hole returns the radius of material that a pin's hole or a bearing seat wants about its centre, and
// the one below which it is refused, mm.
func (r rule) hole(h Hole) (wanted, least float64) {
	d := h.Diameter
	if h.Kind == BearingSeat {
		return r.wall(d / 2)
	}
	return max(2*d, d/2+r.web), max(1.5*d, d/2+r.web)
}

// bore is the same for a hole whose form the maker gives: the wall is taken from its outermost point.
func (r rule) bore(b job.Bore) (wanted, least float64) {
	switch b.Kind {
	case job.HexagonBore:
		return r.wall(b.Across / math.Sqrt(3))
	case job.HubBore:
		return r.wall((b.Circle + b.Hole) / 2)
	}
	return r.wall(b.Diameter / 2)
}

// wall is for holes that no pin bears against on one side: wanted are two webs or half the hole's
// radius, refused is less than a web. Common practice, no source.
func (r rule) wall(radius float64) (wanted, least float64) {
	return radius + max(2*r.web, radius/2), radius + r.web
}
