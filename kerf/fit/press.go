package fit

import (
	"fmt"
	"math"
	"strings"

	"pinwright/parts/material"
)

// Elastic is what the stress of a press fit needs to know of a material.
type Elastic struct {
	Modulus float64 // Young's, MPa
	Poisson float64
	Limit   float64 // hoop stress that may stand for good, MPa; 0: the theory does not hold for it
	Source  string
}

// steel is the ring of a bearing, or a dowel: handbook values, 2+ places.
var steel = Elastic{Modulus: 206000, Poisson: 0.3, Limit: 235, Source: "structural steel S235, EN 10025-2: yield 235 MPa"}

// elastic are the materials of the sheets, by their names in the catalogue of materials. The limits of
// plastics are a quarter (brittle) or a third of the lowest published tensile strength: a standing
// stress crazes and creeps long before it breaks. Judgement, no standard.
var elastic = []struct {
	name string
	Elastic
}{
	{"cast acrylic", Elastic{3000, 0.37, 15, "ISO 527: modulus 2800 to 3240 MPa, strength 61 to 75 MPa, data sheets, 2+ places; Poisson's ratio from memory; a quarter of the lowest: judgement"}},
	{"extruded acrylic", Elastic{3300, 0.37, 15, "strength 69 to 72 MPa, data sheets, 2+ places; Poisson's ratio from memory; it crazes sooner than cast: taken alike; judgement"}},
	{"POM", Elastic{2800, 0.35, 20, "strength 60 to 76 MPa, data sheets, 2+ places; Poisson's ratio from memory; a third of the lowest: judgement"}},
	{"mild steel", steel},
	{"stainless", Elastic{200000, 0.3, 200, "from memory: 1.4301, proof stress 210 to 230 MPa"}},
	{"aluminium", Elastic{69000, 0.33, 90, "from memory: soft sheet such as 5754 H111, proof stress 80 to 100 MPa"}},
}

// ElasticOf finds the figures of a sheet material; ok is false for those of which the theory of
// elastic rings does not hold (wood, board) or nothing is known.
func ElasticOf(name string) (Elastic, bool) {
	word := strings.ToLower(name)
	if m, err := material.Lookup(name); err == nil {
		word = strings.ToLower(m.Name)
	}
	for _, e := range elastic {
		if strings.HasPrefix(word, strings.ToLower(e.name)) {
			return e.Elastic, true
		}
	}
	return Elastic{}, false
}

// Press is a ring pressed into or a dowel pressed through a round hole.
type Press struct {
	Interference float64 // over the diameter, mm; 0 or less: it does not press
	Pressure     float64 // MPa
	Hoop         float64 // largest, at the bore of the sheet, MPa
	Limit        float64 // of the sheet's material, MPa
	Warning      string  // "" while the hoop stress is under its limit
}

// Lame gives the pressure and hoop stress of a press fit by the theory of thick rings (Lame and
// Clapeyron, 1833; any handbook of machine elements): diameter of the joint, bore of what is pressed
// in (0: solid), outside diameter of the material round the hole (+Inf: a wide plate), interference over
// the diameter, all mm.
//
// The ring of a bearing is elastic as well; as the sheet is plastic that hardly counts.
func Lame(diameter, bore, outside, interference float64, sheet, pin Elastic) (Press, error) {
	if !(diameter > 0) || bore < 0 || !(bore < diameter) || !(outside > diameter) || math.IsNaN(interference) || !(sheet.Modulus > 0) || !(pin.Modulus > 0) {
		return Press{}, fmt.Errorf("a press fit of diameter %v, bore %v, outside %v mm", diameter, bore, outside)
	}
	p := Press{Interference: interference, Limit: sheet.Limit}
	if interference <= 0 {
		return p, nil
	}
	ratio := diameter / outside // 0 in a wide plate
	hub := (1 + ratio*ratio) / (1 - ratio*ratio)
	inner := bore / diameter
	core := (1 + inner*inner) / (1 - inner*inner)
	p.Pressure = interference / diameter / ((hub+sheet.Poisson)/sheet.Modulus + (core-pin.Poisson)/pin.Modulus)
	p.Hoop = p.Pressure * hub
	if sheet.Limit > 0 && p.Hoop > sheet.Limit {
		most := interference * sheet.Limit / p.Hoop
		p.Warning = fmt.Sprintf("pressed by %s mm the rim of the hole stands under %.0f MPa, more than the %.0f MPa that it bears for good: it may crack; at most %s mm",
			mm(interference), p.Hoop, sheet.Limit, mm(math.Floor(most*1000)/1000))
	}
	return p, nil
}

// mm writes a length to a micrometre, without zeros at the end.
func mm(v float64) string {
	return strings.TrimSuffix(strings.TrimRight(fmt.Sprintf("%.3f", v), "0"), ".")
}
