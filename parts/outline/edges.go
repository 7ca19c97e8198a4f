package outline

import "math"

// Edges is the outlines of a region made ready for many questions about places and distances: each
// answer costs a fraction of what Nearest, Locate and Between take, which prepare the outlines anew. It
// does not change, nor must the region; several goroutines may ask.
type Edges struct {
	s shape
	r Region
}

// EdgesOf prepares all outlines of the region.
func EdgesOf(r Region) Edges { return Edges{newShape(r.Outlines()...), r} }

// Bounds returns the smallest box with all edges in it.
func (e Edges) Bounds() Box { return e.s.box }

// Nearest returns the shortest way from the edges (its A) to p (its B). Infinite for no edges.
func (e Edges) Nearest(p Point) Nearest {
	best := Nearest{Distance: math.Inf(1), B: p}
	for i := range e.s.curves {
		if e.s.boxes[i].pointDistance2(p) >= best.Distance*best.Distance {
			continue
		}
		if f, d := e.s.curves[i].nearest(p); d < best.Distance {
			best.Distance, best.A = d, f
		}
	}
	return best
}

// Depth returns the signed distance of p from the edges, mm: positive in the material, negative
// outside and in a hole.
func (e Edges) Depth(p Point) float64 {
	d := e.Nearest(p).Distance
	if winding(e.s.curves, p) > 0 {
		return d
	}
	return -d
}

// Distance returns the shortest way from an edge (its A) to the outline (its B). Infinite if one is
// empty.
func (e Edges) Distance(o Outline) Nearest {
	t := newShape(o)
	best := Nearest{Distance: math.Inf(1)}
	e.s.distance(&t, &best)
	return best
}

// Between is the function Between for prepared regions: 0 if they touch or overlap, also if one lies
// within the material of the other.
func (e Edges) Between(f Edges) Nearest {
	n, _ := e.Closer(f, math.Inf(1))
	return n
}

// Closer returns the shortest way between the regions as Between does, if it is shorter than limit
// (mm); ok is false, and the distance limit, if it is not. Regions that are further apart cost little
// more than a look at their boxes.
func (e Edges) Closer(f Edges, limit float64) (n Nearest, ok bool) {
	best := Nearest{Distance: limit}
	e.s.distance(&f.s, &best)
	if best.Distance == 0 || !e.s.box.Intersects(f.s.box) {
		return best, best.Distance < limit
	}
	// The curves are apart: either the regions are, or one lies wholly in the other's material.
	if p := e.s.curves[0].a; winding(f.s.curves, p) > 0 {
		return Nearest{A: p, B: p}, 0 < limit
	}
	if p := f.s.curves[0].a; winding(e.s.curves, p) > 0 {
		return Nearest{A: p, B: p}, 0 < limit
	}
	return best, best.Distance < limit
}
