package kerf

import (
	"errors"
	"fmt"

	"pinwright/parts/outline"
)

// Finished runs the beam along the paths and returns the part that falls out: the inverse of
// Compensate but for sharp inside corners, which come out with the beam's radius. The holes are in the
// order of the cut's inside paths.
//
// An error if the beam leaves no part or several, or if two cuts run into each other.
func Finished(c Cut, b Beam) (outline.Region, error) {
	if err := b.usable(); err != nil {
		return outline.Region{}, err
	}
	if err := c.Region().Validate(); err != nil {
		return outline.Region{}, fmt.Errorf("the paths are no cut: %w", err)
	}
	if b.Width == 0 {
		return c.Region(), nil
	}
	var errs []error
	var r outline.Region
	switch left := run(c.Outside, b); len(left) {
	case 0:
		errs = append(errs, errors.New("nothing is left: the part is narrower than the beam"))
	case 1:
		r.Outer = left[0]
	default:
		errs = append(errs, fmt.Errorf("the part falls into %d pieces, one of them at (%s, %s)", len(left),
			millimetres(left[1].Bounds().Centre().X), millimetres(left[1].Bounds().Centre().Y)))
	}
	for i, p := range c.Inside {
		left := run(p, b)
		if len(left) != 1 {
			errs = append(errs, fmt.Errorf("inside path %d leaves %d outlines: it comes within a beam's width of itself", i+1, len(left)))
			continue
		}
		r.Holes = append(r.Holes, left[0])
	}
	if len(errs) > 0 {
		return outline.Region{}, errors.Join(errs...)
	}
	if err := r.Validate(); err != nil {
		return outline.Region{}, fmt.Errorf("two cuts run into each other: %w", err)
	}
	return r, nil
}
