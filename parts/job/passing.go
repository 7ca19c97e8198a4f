package job

import (
	"fmt"
	"math"

	"pinwright/parts/hardware"
)

// Least bores that a pin goes into, against its nominal diameter.
const (
	// tapped is the least bore of a bolt without a nut, which may cut its thread there, over its
	// diameter: the minor diameter of ISO 68-1 coarse threads is 0.75 d (M2) to 0.83 d (M10).
	tapped = 0.75
	// forced is how much less than the shaft a bore may be, mm: what a press into sheet takes
	// (judgement, no source).
	forced = 0.2
	// covered is how much wider than a bore its washer must be, mm: half of it bears on either side
	// (judgement, no source).
	covered = 1.0
)

// passing checks that what a joint carries goes through the bores that links have there instead of
// the hole that the pin asks for.
func (r *reader) passing(links *value, j *Job) {
	for _, l := range j.Links {
		for _, b := range l.Bores {
			v := links.get(l.Name).get("bores").get(b.Joint)
			for _, p := range j.Pins {
				if p.Joint == b.Joint && v.ok() {
					r.goesThrough(b, p, v)
				}
			}
		}
	}
}

func (r *reader) goesThrough(b Bore, p Pin, v *value) {
	wide, key := b.Diameter, string(b.Kind)
	switch b.Kind {
	case HexagonBore:
		wide = b.Across
	case HubBore:
		key = "hub, centre"
	}
	what, thick, least := "", 0.0, 0.0
	if p.Kind == ShaftPin {
		thick, least = p.Shaft, p.Shaft-forced
		what = fmt.Sprintf("the shaft of %s mm", figure(thick))
	} else {
		d, known := boltDiameter(p.Bolt)
		if !known {
			return
		}
		thick, least = d, d
		what = fmt.Sprintf("bolt %s of %s mm", p.Bolt, figure(d))
		if p.Nut == "none" {
			least = tapped * d
		}
	}
	if wide > 0 && thick > 0 && wide < least {
		r.fail(v.at, fmt.Sprintf("%s: at least %s mm, or another pin at %s", key, figure(thick), b.Joint),
			"bore %s: %s does not go through %s mm", b.Joint, what, figure(wide))
	}
	r.isCovered(b, p, v)
}

// isCovered checks that washers and heads do not fall through a round bore for a bolt.
func (r *reader) isCovered(b Bore, p Pin, v *value) {
	if b.Kind != RoundBore || p.Kind == ShaftPin {
		return
	}
	wide, what := 0.0, "washer"
	if w, err := hardware.WasherFor(hardware.WasherKind(p.Washer), p.Bolt); err == nil {
		wide = w.Outside
	} else if s, err := hardware.ScrewFor(hardware.Head(p.Head), p.Bolt); err == nil {
		wide, what = s.HeadDiameter, "head"
	}
	if most := math.Round(10*(wide-covered)) / 10; wide > 0 && b.Diameter > most {
		r.fail(v.at, fmt.Sprintf("round: at most %s mm, or larger washers at %s, or a bearing", figure(most), b.Joint),
			"bore %s: the %s of %s is %s mm wide and does not cover a bore of %s mm", b.Joint, what, p.Bolt, figure(wide), figure(b.Diameter))
	}
}
