package parts

import (
	"math"

	"pinwright/parts/job"
	"pinwright/parts/outline"
)

// seat is a joint on a part and what is cut there.
type seat struct {
	joint  string
	at     outline.Point
	holes  []drilling // about the joint as origin; empty for a traced point without a pen
	path   string     // key path of what asks for the holes
	wanted float64    // radius of material round the joint by the edge rule, mm; 0 without holes
	least  float64    // radius below which it is refused, mm
	round  bool       // the material follows the hole even where the width is given: bores, bearing seats
	toe    float64    // radius of a foot, mm; 0: none
	cover  float64    // radius that a washer or head hides, mm
}

// seats returns what is cut at the joints of a link, in the order of its pins. Directions of bores
// point along the angle zero at the joint axis and along the x axis elsewhere.
func (k *maker) seats(l job.Link, pins []string, frame []outline.Point, axis string, zero float64) []seat {
	r := k.rule(l.Stock)
	out := make([]seat, len(pins))
	for i, joint := range pins {
		s := seat{joint: joint, at: frame[i], path: "pins." + joint}
		direction := 0.0
		if joint == axis {
			direction = zero
		}
		if b := boreAt(l, joint); b != nil {
			s.holes = bore(*b, direction)
			s.path = "linkage.links." + l.Name + ".bores." + joint
			s.round = true
			s.wanted, s.least = r.bore(*b)
		} else if p := k.pin(joint); p != nil {
			h, err := holeFor(*p, l.Name, false)
			if err != nil {
				k.fail(s.path, "", "link %s: %v", l.Name, err)
				continue
			}
			s.holes = []drilling{h}
			s.cover = coverOf(*p, h.hole)
			s.round = h.hole.Kind == BearingSeat
			s.wanted, s.least = r.hole(h.hole)
		}
		if f := l.Foot; f != nil && f.At == joint {
			s.toe = f.Radius
			if f.Pen > 0 && len(s.holes) == 0 {
				s.holes = []drilling{round("pen", PenHole, joint, outline.Point{}, f.Pen)}
				s.least = f.Pen/2 + r.web
				s.path = "linkage.links." + l.Name + ".foot"
				if s.toe < s.least {
					k.fail(s.path, "make the toe at least "+upTo(s.least)+" mm, or the pen thinner",
						"link %s: the pen hole (%s mm) leaves %s mm of the toe of radius %s mm; %s wants %s mm",
						l.Name, millimetres(f.Pen), millimetres(s.toe-f.Pen/2), millimetres(s.toe), r.name, millimetres(r.web))
				}
			} else if s.toe < s.least {
				k.fail("linkage.links."+l.Name+".foot", "make the toe at least "+upTo(s.least)+" mm",
					"link %s: hole %s (%s mm) wants %s mm to the edge in %s, the toe of radius %s mm leaves less",
					l.Name, joint, millimetres(s.diameter()), millimetres(s.least), r.name, millimetres(s.toe))
			}
		}
		out[i] = s
	}
	return out
}

// diameter is that of the main hole, mm; its narrowest width when it is not round.
func (s seat) diameter() float64 {
	if len(s.holes) == 0 {
		return 0
	}
	return s.holes[0].hole.Width
}

func boreAt(l job.Link, joint string) *job.Bore {
	for i := range l.Bores {
		if l.Bores[i].Joint == joint {
			return &l.Bores[i]
		}
	}
	return nil
}

// radii returns the radius of material round every seat, mm: the toe of a foot, else half the width
// when one is given, else what the edge rule asks for. A bore or bearing seat that wants more than
// half the width gets it. A joint without a hole follows the slimmest of the others.
func (k *maker) radii(l job.Link, seats []seat) []float64 {
	r := k.rule(l.Stock)
	slim := math.Inf(1)
	for _, s := range seats {
		if len(s.holes) > 0 && s.toe == 0 {
			slim = min(slim, s.wanted)
		}
	}
	if math.IsInf(slim, 1) {
		slim = 2 * r.wide
	}
	out := make([]float64, len(seats))
	for i, s := range seats {
		switch {
		case s.toe > 0:
			out[i] = s.toe
		case l.Width > 0:
			out[i] = l.Width / 2
			if s.round {
				out[i] = max(out[i], s.wanted)
			}
			if out[i] < s.least-1e-9 {
				k.fail("linkage.links."+l.Name+".width", "widen it to "+upTo(2*s.wanted)+" mm, at the least "+upTo(2*s.least)+" mm, or leave the width out",
					"link %s: hole %s (%s mm) leaves %s mm to the edge; %s wants %s mm",
					l.Name, s.joint, millimetres(s.diameter()), millimetres(out[i]-s.diameter()/2), r.name, millimetres(s.least-s.diameter()/2))
			}
		case len(s.holes) > 0:
			out[i] = s.wanted
		default:
			out[i] = slim
		}
	}
	return out
}
