package outline

import "math"

// Hull returns the outline of the smallest convex shape around the discs, counter-clockwise: arcs of
// the discs and the tangent lines between them. Discs of radius 0 are points; discs with a negative
// radius or numbers that are none do not count. Empty if the hull has no area.
//
// Plan (gift wrapping, O(n h) for h discs on the hull):
//
//  1. Leave out discs that lie in another one, of equal ones the later.
//  2. The support of a disc in the direction of the normal n is centre.n + r; the hull's is the largest.
//     Start with the disc that has it for n pointing down.
//  3. Turn n counter-clockwise. Disc j takes over from disc i at the outer tangent of both, where their
//     supports are equal: cos(angle between n and cj-ci) = (ri-rj)/|cj-ci|. Take the j that comes first,
//     of several at once the one furthest along.
//  4. Stop when the normal has turned once.
func Hull(discs ...Disc) Outline {
	kept := outerDiscs(discs)
	switch len(kept) {
	case 0:
		return nil
	case 1:
		return Circle(kept[0].Centre, kept[0].Radius)
	}
	first := 0
	for i, d := range kept {
		f := kept[first]
		low, best := d.Centre.Y-d.Radius, f.Centre.Y-f.Radius
		if low < best || low == best && d.Centre.X < f.Centre.X {
			first = i
		}
	}
	type span struct {
		disc     int
		from, to float64 // angle of the normal
	}
	const start = -math.Pi / 2
	// Normals closer than this are the same tangent: rounding of acos and atan2 near their ends.
	const same = 1e-12
	var spans []span
	cur, angle := first, start
	for range 2*len(kept) + 2 {
		next, best, ahead := -1, math.Inf(1), 0.0
		for j, d := range kept {
			if j == cur {
				continue
			}
			way := d.Centre.Sub(kept[cur].Centre)
			l := way.Len()
			ratio := max(-1, min(1, (kept[cur].Radius-d.Radius)/l))
			turn := way.Angle() - math.Acos(ratio) - angle
			turn -= 2 * math.Pi * math.Floor(turn/(2*math.Pi))
			if turn > 2*math.Pi-same {
				turn = 0
			}
			// Of tangents in the same direction the furthest along wins.
			reach := l * math.Sqrt(max(0, 1-ratio*ratio))
			if turn < best-same || turn < best+same && reach > ahead {
				next, best, ahead = j, turn, reach
			}
		}
		to := min(angle+best, start+2*math.Pi)
		spans = append(spans, span{cur, angle, to})
		if angle+best >= start+2*math.Pi-same {
			break
		}
		cur, angle = next, angle+best
	}
	var o Outline
	for _, s := range spans {
		d := kept[s.disc]
		a := d.Centre.Add(Polar(d.Radius, s.from))
		sweep := s.to - s.from
		if d.Radius*sweep > 0 {
			o = append(o, Vertex{a, math.Tan(sweep / 4)})
			if sweep > math.Pi {
				o[len(o)-1].Bulge = math.Tan(sweep / 8)
				o = append(o, Vertex{d.Centre.Add(Polar(d.Radius, (s.from+s.to)/2)), math.Tan(sweep / 8)})
			}
		}
		o = append(o, Vertex{Point: d.Centre.Add(Polar(d.Radius, s.to))})
	}
	o = o.Clean()
	if o.Area() <= tolerance*o.Length() {
		return nil
	}
	return o
}

// outerDiscs returns the discs that do not lie inside another one.
func outerDiscs(discs []Disc) []Disc {
	usable := func(d Disc) bool { return d.Centre.finite() && d.Radius >= 0 && d.Radius <= largestCoordinate }
	var kept []Disc
	for i, d := range discs {
		if !usable(d) {
			continue
		}
		inside := false
		for j, e := range discs {
			if i == j || !usable(e) {
				continue
			}
			gap := d.Centre.Dist(e.Centre) + d.Radius - e.Radius
			back := d.Centre.Dist(e.Centre) + e.Radius - d.Radius
			// Equal discs lie in each other: the first stays.
			if gap <= tolerance && (back > tolerance || j < i) {
				inside = true
				break
			}
		}
		if !inside {
			kept = append(kept, d)
		}
	}
	return kept
}
