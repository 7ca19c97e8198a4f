package hardware

import (
	"fmt"
	"strings"
)

// Bearing is a deep groove ball bearing.
type Bearing struct {
	Designation string  // as asked for: "624", "MR105ZZ"
	Shielded    bool    // with shields or seals
	Bore        float64 // mm
	Outside     float64 // mm
	Width       float64 // mm
	Flange      float64 // diameter of the flange, mm; 0: none
	FlangeWidth float64 // of the shielded form, mm
	Other       float64 // width of the other form, shielded or open, mm; 0: there is none in the table
	Source      Source
}

// shields are the endings by which makers mark bearings with shields (ZZ, 2Z) or seals on both
// sides. Longest first.
var shields = []string{"-2RS1", "-2RSH", "-2RS", "2RS", "-2Z", "2Z", "-ZZ", "ZZ"}

func bearingOf(r *row) Bearing {
	return Bearing{
		Designation: r.text("designation"),
		Bore:        r.number("bore_d"),
		Outside:     r.number("outside_D"),
		Width:       r.number("width_B_open"),
		Other:       r.known("width_B_shielded"),
		Flange:      r.known("flange_D"),
		FlangeWidth: r.known("flange_w"),
		Source:      r.source("ISO 15"),
	}
}

// BearingFor gives a bearing by its designation. The bare number is the open form; with ZZ, 2Z or
// 2RS behind it the shielded or sealed one, which is wider in some small sizes (MR105: open 3 mm,
// MR105ZZ 4 mm).
func BearingFor(designation string) (Bearing, error) {
	c, err := read()
	if err != nil {
		return Bearing{}, err
	}
	bare, shielded := designation, false
	for _, ending := range shields {
		if rest, ok := strings.CutSuffix(designation, ending); ok {
			bare, shielded = rest, true
			break
		}
	}
	for _, b := range c.bearings {
		if b.Designation != bare {
			continue
		}
		b.Designation = designation
		if shielded {
			if b.Other == 0 {
				return Bearing{}, fmt.Errorf("bearing %s: the catalogue holds the open form %s alone", designation, bare)
			}
			b.Width, b.Other, b.Shielded = b.Other, b.Width, true
		}
		return b, nil
	}
	return Bearing{}, unknown("bearing", designation, Bearings())
}

// Bearings are the designations of the open forms, in the order of the table.
func Bearings() []string {
	c, err := read()
	if err != nil {
		return nil
	}
	var out []string
	for _, b := range c.bearings {
		out = append(out, b.Designation)
	}
	return out
}

// InnerRing is the diameter up to which a washer may touch the bearing without rubbing on its outer
// ring, mm: D - 0.3 (D - d). An estimate from the usual sizes of balls and shoulders; common
// practice, no source. The maker's drawing of the bearing decides.
func (b Bearing) InnerRing() float64 { return b.Outside - 0.3*(b.Outside-b.Bore) }

// ring is a row of the tolerances of bearings.
type ring struct {
	name         string
	over, incl   float64
	upper, lower float64 // mean diameter, micrometres
	source       Source
}

func ringOf(r *row) ring {
	return ring{
		name: r.text("ring"), over: r.number("over_mm"), incl: r.number("incl_mm"),
		upper: r.number("upper_um"), lower: r.number("lower_um"), source: r.source("ISO 492"),
	}
}

// OutsideLimits gives the deviations of the bearing's outside diameter, class Normal of ISO 492, mm.
func (b Bearing) OutsideLimits() (Zone, error) { return ringLimits("outer OD", b.Outside) }

// BoreLimits gives the deviations of the bearing's bore, class Normal of ISO 492, mm.
func (b Bearing) BoreLimits() (Zone, error) { return ringLimits("inner bore", b.Bore) }

func ringLimits(name string, diameter float64) (Zone, error) {
	c, err := read()
	if err != nil {
		return Zone{}, err
	}
	for _, r := range c.rings {
		if r.name == name && diameter > r.over && diameter <= r.incl {
			return Zone{Class: "Normal", Upper: r.upper / 1000, Lower: r.lower / 1000, Source: r.source}, nil
		}
	}
	return Zone{}, fmt.Errorf("ISO 492: no row for %s of %g mm", name, diameter)
}
