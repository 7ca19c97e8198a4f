package proof

import (
	"math"

	"pinwright/parts/outline"
)

// crossing looks for a place where a contour meets itself, other than from one segment to the next.
// O(n^2) boxes for n segments, of which few meet.
func crossing(o outline.Outline) (outline.Point, bool) {
	segments := o.Clean().Segments()
	boxes := make([]outline.Box, len(segments))
	for i, s := range segments {
		boxes[i] = s.Bounds()
	}
	for i, s := range segments {
		for j := i + 1; j < len(segments); j++ {
			if !boxes[i].Intersects(boxes[j]) {
				continue
			}
			for _, p := range s.Intersect(segments[j]) {
				follows := j == i+1 && p.Dist(s.B) <= gapSlack
				leads := i == 0 && j == len(segments)-1 && p.Dist(s.A) <= gapSlack
				if !follows && !leads {
					return p, true
				}
			}
		}
	}
	return outline.Point{}, false
}

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
