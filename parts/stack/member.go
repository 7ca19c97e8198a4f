package stack

import (
	"fmt"
	"slices"

	"pinwright/parts/hardware"
	"pinwright/parts/job"
	"pinwright/parts/material"
)

// member is a part on a pin.
type member struct {
	name        string
	plate       bool // of the frame
	plane       int
	thickness   float64 // as measured
	least, most float64 // of the thickness
	material    string
	held        bool // fast on the shaft
	seat        *hardware.Bearing
	sleeve      float64 // length of the sleeve on which it turns, mm; 0: none
	clamped     bool    // the bolt is clamped to it
}

// bottom and top are where the stack on the pin meets the member, over the slab's lower face: those of
// the bearing where there is one. A bearing is pressed in flush with the lower face; a flange lies
// below it.
func (m member) bottom() float64 {
	if m.seat != nil && m.seat.Flange > 0 {
		return -m.seat.FlangeWidth
	}
	return 0
}

func (m member) top() float64 {
	if m.sleeve > 0 {
		return m.sleeve
	}
	if m.seat != nil {
		return m.bottom() + m.seat.Width
	}
	return m.thickness
}

// range of what the member takes of the pin.
func (m member) limits() (least, most float64) {
	if m.seat != nil {
		return m.seat.Width - bearingNarrow, m.seat.Width
	}
	if m.sleeve > 0 {
		return m.sleeve - SleeveTolerance, m.sleeve + SleeveTolerance
	}
	return m.least, m.most
}

// bearingNarrow is how much narrower than its nominal width a ring may be: ISO 492 class Normal,
// 0/-120 um (2+ places).
const bearingNarrow = 0.12

// thickness gives a stock's measured thickness and its limits: MeasuredTolerance round a measurement,
// else what the standard of the material allows.
func thickness(s job.Stock) (measured, least, most float64) {
	if s.Measured != s.Thickness {
		return s.Measured, s.Measured - MeasuredTolerance, s.Measured + MeasuredTolerance
	}
	m, err := material.Lookup(s.Material)
	if err != nil {
		// The material is refused or unknown: somebody else says so.
		return s.Measured, s.Measured - MeasuredTolerance, s.Measured + MeasuredTolerance
	}
	least, most, _ = m.Thickness(s.Thickness)
	return s.Measured, least, most
}

func stockNamed(j job.Job, name string) (job.Stock, bool) {
	i := slices.IndexFunc(j.Stock, func(s job.Stock) bool { return s.Name == name })
	if i < 0 {
		return job.Stock{}, false
	}
	return j.Stock[i], true
}

// members are the parts that a pin goes through, by plane. Two on one plane are an error.
func members(j job.Job, pin job.Pin) ([]member, error) {
	var out []member
	add := func(name, stock string, plane int, plate bool) error {
		s, ok := stockNamed(j, stock)
		if !ok {
			return fmt.Errorf("joint %s: %s is cut from stock %q, which the job does not have", pin.Joint, name, stock)
		}
		m := member{name: name, plate: plate, plane: plane, material: s.Material}
		m.thickness, m.least, m.most = thickness(s)
		if !(m.thickness > 0) {
			return fmt.Errorf("joint %s: %s is %g mm thick", pin.Joint, name, m.thickness)
		}
		out = append(out, m)
		return nil
	}
	for i, l := range j.Linkage.Links {
		if !slices.Contains(l.Pins, pin.Joint) {
			continue
		}
		if i >= len(j.Links) {
			return nil, fmt.Errorf("joint %s: link %s has no build rules", pin.Joint, l.Name)
		}
		rules := j.Links[i]
		if err := add(l.Name, rules.Stock, rules.Plane, false); err != nil {
			return nil, err
		}
		out[len(out)-1].held = slices.ContainsFunc(rules.Bores, func(b job.Bore) bool {
			return b.Joint == pin.Joint && b.Kind != job.RoundBore
		})
	}
	if j.Frame != nil {
		for _, p := range j.Frame.Plates {
			if !slices.Contains(p.Pivots, pin.Joint) {
				continue
			}
			if err := add(p.Name, j.Frame.Stock, p.Plane, true); err != nil {
				return nil, err
			}
		}
	}
	slices.SortStableFunc(out, func(a, b member) int { return a.plane - b.plane })
	for i := 1; i < len(out); i++ {
		if a, b := out[i-1], out[i]; a.plane == b.plane {
			return nil, fault(j, "linkage.links."+b.name+".plane",
				fmt.Sprintf("joint %s: %s and %s both lie on plane %d", pin.Joint, a.name, b.name, a.plane),
				"give one of them another plane")
		}
	}
	return out, nil
}
