package interference

import (
	"fmt"
	"math"
	"slices"

	"pinwright/parts/outline"
)

// carried is a body with what the search asks of it again and again. Region and all that is made of
// it are as on its copy: mirrored where that is.
type carried struct {
	Body
	index   int // of link or joint
	edges   outline.Edges
	corners [4]Point // of a box round it
	centre  Point
	radius  float64
	hull    []outline.Disc // their hull holds the body
	disc    bool           // a disc about the joint that carries it
}

func (s *Space) carry(b Body) (carried, error) {
	c := carried{Body: b}
	switch b.Carrier {
	case OnLink:
		i, ok := s.m.link[b.Of]
		if !ok {
			return c, fmt.Errorf("body %s moves with link %s, which is not there", b.Name, b.Of)
		}
		c.index = i
	case OnJoint:
		i, ok := s.m.index[b.Of]
		if !ok {
			return c, fmt.Errorf("body %s moves with joint %s, which is not there", b.Name, b.Of)
		}
		c.index = i
	case OnGround:
	default:
		return c, fmt.Errorf("body %s moves with nothing that is known (carrier %d)", b.Name, b.Carrier)
	}
	if b.Copy.Mirror {
		// A link's frame has its second pin on the x axis: it is mirrored to the other side of that.
		flip := outline.Place(0, true, Point{})
		if b.Carrier == OnLink {
			flip = outline.Place(math.Pi, true, Point{})
		}
		c.Region = b.Region.Transform(flip)
	}
	box := c.Region.Bounds()
	if box.Empty() || !(math.Abs(box.Min.X)+math.Abs(box.Min.Y)+math.Abs(box.Max.X)+math.Abs(box.Max.Y) < math.Inf(1)) {
		return c, fmt.Errorf("body %s has no outline, or one that is not finite", b.Name)
	}
	c.edges = outline.EdgesOf(c.Region)
	c.corners = [4]Point{box.Min, {X: box.Max.X, Y: box.Min.Y}, box.Max, {X: box.Min.X, Y: box.Max.Y}}
	c.centre = box.Min.Add(box.Max).Scale(0.5)
	c.radius = box.Max.Sub(box.Min).Len() / 2
	c.hull = hullDiscs(c.Region.Outer)
	if at, r, ok := c.Region.Outer.AsCircle(); ok {
		c.centre, c.radius = at, r
		c.disc = b.Carrier == OnJoint && at.Len() < 1e-9
	}
	return c, nil
}

// hullDiscs returns discs (or points, of radius 0) whose convex hull holds an outline and is hardly
// larger than the hull of the outline. Its corners and its arcs that turn left span the hull. The full
// disc of an arc is taken if it lies within the outline, as at the ends of bars; other arcs are held by
// tangents, which stick out by hullSlack at most (more for arcs of more than hullTangents tangents).
func hullDiscs(o outline.Outline) []outline.Disc {
	edges := outline.EdgesOf(outline.Region{Outer: o})
	var out []outline.Disc
	for _, g := range o.Segments() {
		out = append(out, outline.Disc{Centre: g.A})
		if g.IsLine() || g.Bulge < 0 {
			continue
		}
		c, r := g.Centre(), g.Radius()
		if edges.Depth(c) >= r-1e-9 {
			out = append(out, outline.Disc{Centre: c, Radius: r})
			continue
		}
		// Tangents at both ends of a piece of the sweep w meet r/cos(w/2) from the centre.
		n := math.Ceil(g.Sweep() / (2 * math.Acos(r/(r+hullSlack))))
		n = math.Max(math.Min(n, hullTangents), math.Ceil(g.Sweep()/2))
		from, w := g.A.Sub(c).Angle(), g.Sweep()/n
		for i := range int(n) {
			out = append(out, outline.Disc{Centre: c.Add(outline.Polar(r/math.Cos(w/2), from+(float64(i)+0.5)*w))})
		}
	}
	// The same disc comes once; a point within a disc says nothing.
	var few []outline.Disc
	for i, d := range out {
		held := slices.ContainsFunc(few, func(e outline.Disc) bool { return e.Centre.Dist(d.Centre)+d.Radius <= e.Radius+1e-12 })
		for _, e := range out[i+1:] {
			held = held || e.Radius > d.Radius && e.Centre.Dist(d.Centre)+d.Radius <= e.Radius
		}
		if !held {
			few = append(few, d)
		}
	}
	return few
}

const (
	hullSlack    = 1e-3 // mm
	hullTangents = 64
)

// place returns the motion of a body at a pose of its copy.
func (s *Space) place(p pose, b carried) outline.Transform {
	switch b.Carrier {
	case OnLink:
		return s.m.placement(p.at, b.index)
	case OnJoint:
		return outline.Place(0, false, p.at[b.index])
	}
	return outline.Place(0, false, b.Copy.At)
}

// rigid tells whether two bodies never move against each other: both stand on the ground, or both move
// with one link of one copy, as its own pins do when they are discs.
func (s *Space) rigid(a, b carried) bool {
	still := func(c carried) bool {
		return c.Carrier == OnGround || c.Carrier == OnJoint && s.m.ground[c.index].fixed && s.m.ground[c.index].moving == nil
	}
	if still(a) && still(b) {
		return true
	}
	if a.Copy != b.Copy {
		return false
	}
	for i, l := range s.m.links {
		with := func(c carried) bool {
			return c.Carrier == OnLink && c.index == i || c.disc && slices.Contains(l.pins, c.index)
		}
		if with(a) && with(b) {
			return true
		}
	}
	return false
}
