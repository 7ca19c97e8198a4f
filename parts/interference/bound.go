package interference

import (
	"math"

	"pinwright/parts/outline"
)

// field returns the velocity of the body's point that is at q, by parameter k.
func (s *Space) field(p pose, b carried, q Point, k int) Point {
	switch b.Carrier {
	case OnLink:
		pins := s.m.links[b.index].pins
		base := p.at[pins[1]].Sub(p.at[pins[0]])
		va, vb := p.vel[k][pins[0]], p.vel[k][pins[1]]
		spin := base.Left().Dot(vb.Sub(va)) / base.Dot(base)
		return va.Add(q.Sub(p.at[pins[0]]).Left().Scale(spin))
	case OnJoint:
		return p.vel[k][b.index]
	}
	return Point{}
}

// stray bounds how far the body's point that is at q may stray from the linear motion: with the first
// pins A and B it stays at A + f (B-A) + g left(B-A), whatever the motion.
func (s *Space) stray(p pose, b carried, q Point) float64 {
	switch b.Carrier {
	case OnLink:
		pins := s.m.links[b.index].pins
		base := p.at[pins[1]].Sub(p.at[pins[0]])
		d := q.Sub(p.at[pins[0]])
		f := d.Dot(base) / base.Dot(base)
		g := base.Left().Dot(d) / base.Dot(base)
		return math.Hypot(1-f, g)*p.rho[pins[0]] + math.Hypot(f, g)*p.rho[pins[1]]
	case OnJoint:
		return p.rho[b.index]
	}
	return 0
}

// approach bounds how much nearer two bodies can come within the box than at its middle.
//
// Seen from body b, a point q of a is displaced by e_a(q) - e_b(q), both motions being affine in
// the place. The length of that is convex in q, so its greatest value over a is at a corner of a box
// round a. The same holds with the bodies exchanged; the smaller bound counts.
func (s *Space) approach(pa, pb pose, half []float64, a, b carried, ta, tb outline.Transform) float64 {
	if pa.loose || pb.loose {
		return math.Inf(1)
	}
	bound := func(of carried, t outline.Transform) float64 {
		worst := 0.0
		for _, c := range of.corners {
			q := t.Apply(c)
			d := s.stray(pa, a, q) + s.stray(pb, b, q)
			for k := range half {
				d += s.field(pa, a, q, k).Sub(s.field(pb, b, q, k)).Len() * half[k]
			}
			worst = math.Max(worst, d)
		}
		return worst
	}
	return math.Min(bound(a, ta), bound(b, tb))
}

// apart is a lower bound of the gap in the box, of second order where approach is of first: n is a
// unit vector from a to b, and a line square to n parts them. Useless (small or negative) if none does.
//
// Let the hull of discs with centres q and radii r hold b. Seen from a, which in the box is displaced
// by e_a and turned by R, a centre is displaced by R^-1 w, w = e_b(q) - e_a(q), and the turned hull is
// still that of the displaced discs. So along n it is at
//
//	n.q - r + n.w + n.(R^-1 - 1) w  >=  n.q - r - sum |n.V| h - strays - |R - 1| |w|
//
// at least, while a ends at the greatest n.p of its own hull. |R - 1| is the change of a link's base
// over its length. At a smooth smallest gap n.V is 0 at every q that matters.
func (s *Space) apart(pa, pb pose, half []float64, a, b carried, ta, tb outline.Transform, n Point) float64 {
	end := math.Inf(-1)
	for _, d := range a.hull {
		end = math.Max(end, n.Dot(ta.Apply(d.Centre))+d.Radius)
	}
	turn := s.turn(pa, half, a)
	least := math.Inf(1)
	for _, d := range b.hull {
		q := tb.Apply(d.Centre)
		stray := s.stray(pa, a, q) + s.stray(pb, b, q)
		along, whole := stray, stray
		for k := range half {
			v := s.field(pb, b, q, k).Sub(s.field(pa, a, q, k))
			along += math.Abs(n.Dot(v)) * half[k]
			whole += v.Len() * half[k]
		}
		least = math.Min(least, n.Dot(q)-d.Radius-along-turn*whole)
	}
	return least - end
}

// turn bounds |R - 1| of a body's turn R within the box.
func (s *Space) turn(p pose, half []float64, b carried) float64 {
	if b.Carrier != OnLink {
		return 0
	}
	link := s.m.links[b.index]
	i, k := link.pins[0], link.pins[1]
	chord := p.rho[i] + p.rho[k]
	for q := range half {
		chord += p.vel[q][i].Sub(p.vel[q][k]).Len() * half[q]
	}
	return chord / link.length
}
