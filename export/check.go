package export

import (
	"fmt"
	"math"

	"pinwright/parts/outline"
)

// maxSize is the largest coordinate that a sheet may have, mm: a kilometre. It keeps every number
// within the digits that the files have for it.
const maxSize = 1e6

// maxBulge is where the geometry gives up: an arc so nearly full that its chord no longer fixes it.
const maxBulge = 1e6

// Check tells whether a sheet can be written: a size above zero, engraving as open paths of two or
// more points, cuts as outlines of two or more, and every coordinate a number no larger than a
// kilometre. The error names the sheet and the step.
func (s Sheet) Check() error {
	if !(s.Width > 0 && s.Height > 0 && s.Width <= maxSize && s.Height <= maxSize) {
		return fmt.Errorf("sheet %s: a size of %g x %g mm cannot be drawn", s.Name, s.Width, s.Height)
	}
	for i, step := range s.Steps {
		if err := step.check(); err != nil {
			return fmt.Errorf("sheet %s: step %d (%s): %w", s.Name, i+1, step.Part, err)
		}
	}
	return nil
}

func (s Step) check() error {
	run := []outline.Vertex(s.Closed)
	switch {
	case !s.Op.Valid():
		return fmt.Errorf("%v does not exist", s.Op)
	case s.Op == Engrave && (len(s.Closed) > 0 || len(s.Open) < 2):
		return fmt.Errorf("engraving is an open path of two or more points; this one has %d, and an outline of %d",
			len(s.Open), len(s.Closed))
	case s.Op == Engrave:
		run = s.Open
	case len(s.Open) > 0 || len(s.Closed) < 2:
		return fmt.Errorf("a cut is an outline of two or more points; this one has %d, and an open path of %d",
			len(s.Closed), len(s.Open))
	}
	for _, v := range run {
		if !(math.Abs(v.X) <= maxSize && math.Abs(v.Y) <= maxSize) || !(math.Abs(v.Bulge) <= maxBulge) {
			return fmt.Errorf("(%g, %g) with bulge %g cannot be drawn", v.X, v.Y, v.Bulge)
		}
	}
	return nil
}
