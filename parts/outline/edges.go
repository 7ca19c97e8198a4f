package outline

import "math"

// Edges is the outlines of a region made ready for many questions about places and distances: each
// answer costs a fraction of what Nearest and Locate take, which prepare the outlines anew. It does
// not change; several goroutines may ask.
type Edges struct{ s shape }

// EdgesOf prepares all outlines of the region.
func EdgesOf(r Region) Edges { return Edges{newShape(r.Outlines()...)} }

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
