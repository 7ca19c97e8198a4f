package material

import "math"

// EdgeRule says how far the CENTRE of a loaded hole must be from the edge, in diameters of the hole.
type EdgeRule struct {
	Factor float64 // wanted
	Refuse float64 // nothing nearer than this is accepted
	Source string
}

var (
	brittleEdge = EdgeRule{2, 1.5, "2 d, refused under 1.5 d: aircraft sheet metal practice taken over for brittle laser sheet; judgement, no standard"}
	plasticEdge = EdgeRule{2, 1.5, "2 d, refused under 1.5 d: aircraft sheet metal practice; judgement for tough plastics, no standard"}

	aluminiumEdge = EdgeRule{2, 1.5, "2 d, refused under 1.5 d: common practice among stress engineers; MIL-HDBK-5 gives bearing values for e/d of 2.0 and 1.5"}
	steelEdge     = EdgeRule{1.5, 1.2, "1.5 d: structural engineers' guidance for edges across the load; refused under 1.2 d, EN 1993-1-8 table 3.3, two public sheets"}
)

// webRule is the smallest web of a process, in thicknesses, and never under a width in mm.
type webRule struct {
	want, refuse float64 // x thickness
	floor        float64 // mm
	source       string
}

var (
	co2Web = webRule{
		1, 1, 1,
		"web of one thickness (published shop guidance, 1 place), never under 1 mm, the smallest detail that lasts (2+ places)",
	}
	fibreWeb = webRule{
		1, 0.7, 1,
		"web of one thickness, refused under 0.7 (published shop guidance, 2+ places), never under 1 mm",
	}
)

// Distance is a rule applied: what is wanted, under what it is refused, both in mm, and by which rule.
type Distance struct {
	Want, Refuse float64
	Source       string // of the rule that decides Want
}

// EdgeDistance gives how far the centre of a round hole that a pin loads must be from the edge of the
// part, and from the edge of another hole: by the edge rule of the material, and never so near that
// less than the smallest web is left between hole and edge.
func (m Material) EdgeDistance(thickness, hole float64) Distance {
	web := m.Web(thickness)
	d := Distance{Want: m.Edge.Factor * hole, Refuse: m.Edge.Refuse * hole, Source: m.Edge.Source}
	if by := hole/2 + web.Want; by > d.Want {
		d.Want, d.Source = by, web.Source
	}
	d.Refuse = max(d.Refuse, hole/2+web.Refuse)
	return d
}

// Web gives the smallest width of material between two cuts.
func (m Material) Web(thickness float64) Distance {
	w := m.web
	return Distance{
		Want:   max(w.want*thickness, w.floor),
		Refuse: max(w.refuse*thickness, w.floor),
		Source: w.source,
	}
}

// Rim gives the width of material round a large hole that carries its load on its whole outside, such
// as a bearing seat, from the edge of the hole to the edge of the part: a third of the hole, at least
// one and a half thicknesses; refused under a fifth of the hole or one smallest web. The edge rule,
// which is meant for bolts, would want a bar four seats wide. Judgement, no standard.
func (m Material) Rim(thickness, hole float64) Distance {
	web := m.Web(thickness)
	return Distance{
		Want:   math.Max(web.Want, math.Max(1.5*thickness, hole/3)),
		Refuse: math.Max(web.Refuse, hole/5),
		Source: "a third of the hole and 1.5 thicknesses, refused under a fifth of the hole; judgement, no standard",
	}
}

// SmallestHole gives the smallest hole that comes out well: one thickness. Refused is under half a
// thickness in CO2 work (common practice, no source), under 0.7 thicknesses in steel (published shop
// guidance, 2+ places).
func (m Material) SmallestHole(thickness float64) Distance {
	refuse, source := 0.5, "hole of one thickness, half of it as the least; common practice, no source"
	if m.web == fibreWeb {
		refuse, source = 0.7, "hole of one thickness, 0.7 of it as the least; published shop guidance, 2+ places"
	}
	return Distance{Want: thickness, Refuse: refuse * thickness, Source: source}
}

// EdgeDistance is Material.EdgeDistance by the name of the material.
func EdgeDistance(material string, thickness, hole float64) (Distance, error) {
	m, err := Lookup(material)
	if err != nil {
		return Distance{}, err
	}
	return m.EdgeDistance(thickness, hole), nil
}

// MinimumWeb is the wanted width of Material.Web by the name of the material, mm.
func MinimumWeb(material string, thickness float64) (float64, error) {
	m, err := Lookup(material)
	if err != nil {
		return 0, err
	}
	return m.Web(thickness).Want, nil
}
