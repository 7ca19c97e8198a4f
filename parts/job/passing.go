package job

import "fmt"

// Least bores that a pin goes into, against its nominal diameter.
const (
	// tapped is the least bore of a bolt without a nut, which may cut its thread there, over its
	// diameter: the minor diameter of ISO 68-1 coarse threads is 0.75 d (M2) to 0.83 d (M10).
	tapped = 0.75
	// forced is how much less than the shaft a bore may be, mm: what a press into sheet takes
	// (judgement, no source).
	forced = 0.2
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
}
