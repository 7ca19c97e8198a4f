package proof

import (
	"math"

	"pinwright/parts/outline"
)

func crossing(o outline.Outline) (outline.Point, bool) { return outline.Point{}, false }

// strokeDistance is the shortest way between an engraved stroke and a cut.
func strokeDistance(p outline.Path, o outline.Outline) outline.Nearest {
	best := outline.Nearest{Distance: math.Inf(1)}
	cuts := o.Segments()
	for _, s := range p.Segments() {
		box := s.Bounds()
		for _, c := range cuts {
			if box.Distance(c.Bounds()) >= best.Distance {
				continue
			}
			if n := outline.SegmentDistance(s, c); n.Distance < best.Distance {
				best = n
			}
		}
	}
	return best
}
