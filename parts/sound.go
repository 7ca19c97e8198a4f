package parts

import (
	"pinwright/parts/outline"
)

// sound checks a part against the least web between any two cuts, and tells what is too close: two
// holes, a hole and the edge, the outer outline and itself. A pin's hole also keeps the edge distance
// of the material from other holes: it is as weak towards them as towards the edge.
func (k *maker) sound(p Part, path string) bool {
	r := k.rule(p.Stock)
	ok := true
	outer := outline.Region{Outer: p.Region.Outer}
	for i, h := range p.Holes {
		shape := p.Region.Holes[i]
		if len(shape) == 0 {
			k.fail(path, "", "%s: %s comes out empty", p.Link, h.called())
			return false
		}
		edge := outline.OutlineDistance(outer.Outer, shape).Distance
		if outer.Locate(shape[0].Point) != outline.Inside || edge == 0 {
			k.fail(path, "widen the part there, or move the hole", "%s: %s at %s breaks through the edge", p.Link, h.called(), place(h.Centre))
			ok = false
		} else if edge < r.web-1e-6 {
			k.fail(path, "widen the part there by "+upTo(r.web-edge)+" mm", "%s: %s at %s leaves %s mm to the edge; %s wants %s mm",
				p.Link, h.called(), place(h.Centre), millimetres(edge), r.name, millimetres(r.web))
			ok = false
		}
		for m := range i {
			other, with := p.Region.Holes[m], p.Holes[m]
			gap := outline.OutlineDistance(other, shape).Distance
			want := max(r.web, r.between(h), r.between(with))
			if gap == 0 || other.Locate(shape[0].Point) != outline.Outside || shape.Locate(other[0].Point) != outline.Outside {
				k.fail(path, "move them apart, or make them smaller", "%s: %s at %s and %s at %s run into each other",
					p.Link, with.called(), place(with.Centre), h.called(), place(h.Centre))
				ok = false
			} else if gap < want-1e-6 {
				k.fail(path, "move them apart by "+upTo(want-gap)+" mm, or make them smaller", "%s: %s mm is left between %s at %s and %s at %s; %s wants %s mm",
					p.Link, millimetres(gap), with.called(), place(with.Centre), h.called(), place(h.Centre), r.name, millimetres(want))
				ok = false
			}
		}
	}
	for _, n := range outline.ThinPlaces(outer, r.web-1e-6) {
		k.fail(path, "widen it there by "+upTo(r.web-n.Distance)+" mm", "%s: the part is %s mm wide at %s; %s wants %s mm",
			p.Link, millimetres(n.Distance), place(n.A.Lerp(n.B, 0.5)), r.name, millimetres(r.web))
		ok = false
	}
	if ok {
		if err := p.Region.Validate(); err != nil {
			k.fail(path, "", "%s: its outline is not sound: %v", p.Link, err)
			ok = false
		}
	}
	return ok
}

// called names a hole in a sentence.
func (h Hole) called() string {
	switch h.Kind {
	case PinHole, ShaftBore, BearingSeat:
		return "hole " + h.Name
	}
	return h.Name
}
