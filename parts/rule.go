package parts

import (
	"math"

	"pinwright/parts/job"
	"pinwright/parts/material"
)

// rule is what a sheet's material asks for round its holes; thickness is as measured.
type rule struct {
	material  material.Material
	thickness float64
	name      string  // "3 mm cast acrylic", for messages
	web       float64 // least material between two cuts, mm; less is refused
	wide      float64 // the same as it is wanted
}

// rule is that of a stock.
func (k *maker) rule(stock string) rule {
	s := k.stock(stock)
	m, err := material.Lookup(s.Material)
	if err != nil {
		k.fail("stock."+s.Name+".material", "", "stock %s: %v", s.Name, err)
	}
	web := m.Web(s.Thickness)
	return rule{
		material: m, thickness: s.Thickness, name: millimetres(s.Thickness) + " mm " + s.Material,
		web: web.Refuse, wide: web.Want,
	}
}

// hole returns the radius of material that a hole wants about its centre, and the one below which it
// is refused, mm: by the material's edge rule for a hole that a pin bears against, by its rim for a
// bearing seat.
func (r rule) hole(h Hole) (wanted, least float64) {
	if h.Kind == BearingSeat {
		return r.wall(h.Diameter / 2)
	}
	d := r.material.EdgeDistance(r.thickness, h.Diameter)
	return d.Want, d.Refuse
}

// bore is the same for a hole whose form the maker gives, from its outermost point: it carries its load
// all round.
func (r rule) bore(b job.Bore) (wanted, least float64) {
	switch b.Kind {
	case job.HexagonBore:
		return r.wall(b.Across / math.Sqrt(3))
	case job.HubBore:
		return r.wall((b.Circle + b.Hole) / 2)
	}
	return r.wall(b.Diameter / 2)
}

func (r rule) wall(radius float64) (wanted, least float64) {
	d := r.material.Rim(r.thickness, 2*radius)
	return radius + d.Want, radius + d.Refuse
}

// between is the least material between a pin's hole and another one, mm; 0 for holes that no pin
// bears against.
func (r rule) between(h Hole) float64 {
	if h.Kind != PinHole || h.Diameter == 0 {
		return 0
	}
	return r.material.EdgeDistance(r.thickness, h.Diameter).Refuse - h.Diameter/2
}
