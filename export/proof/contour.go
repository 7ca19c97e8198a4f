package proof

import (
	"errors"
	"math"

	"pinwright/parts/outline"
)

// unsound says what keeps a contour from being a cut, "" when nothing does.
func unsound(o outline.Outline) string {
	var fault *outline.Fault
	// Clean joins what an editing program may have split; that is no harm.
	if !errors.As(o.Clean().Validate(), &fault) {
		return ""
	}
	switch fault.Kind {
	case outline.FaultCrossing:
		return "crosses itself " + near(fault.At)
	case outline.FaultTouching:
		return "touches itself " + near(fault.At)
	case outline.FaultTooFew:
		return "encloses nothing"
	}
	return fault.Text
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
