package stack

import (
	"fmt"
	"slices"

	"pinwright/parts/job"
)

// Build stacks the kit of every pin of every copy: copies in their order, within a copy the pins in
// theirs. What is wrong with the joints is reported for all of them at once (errors.Join).
func Build(j job.Job) ([]Kit, error) {
	p, err := newPlan(j)
	if err != nil {
		return nil, err
	}
	copies := j.Copies
	if len(copies) == 0 {
		copies = []job.Copy{{}}
	}
	var out []Kit
	for _, c := range copies {
		for _, k := range p.kits {
			k.Copy = c.Name
			k.Elements = slices.Clone(k.Elements)
			k.Notes = slices.Clone(k.Notes)
			out = append(out, k)
		}
	}
	return out, nil
}

// Levels gives the height of every plane from the lowest to the highest with a part on it, empty ones
// between included, from bottom to top. They are the same for all copies. Errors are those of Build.
func Levels(j job.Job) ([]Level, error) {
	p, err := newPlan(j)
	if err != nil {
		return nil, err
	}
	return p.levels, nil
}

// Between gives the clear distance between two plates of the frame, mm: from the upper face of one to
// the lower face of the other, which is how long a cross member is between its tabs.
func Between(j job.Job, lower, upper string) (float64, error) {
	p, err := newPlan(j)
	if err != nil {
		return 0, err
	}
	plate := func(name string) (int, error) {
		if j.Frame != nil {
			for _, f := range j.Frame.Plates {
				if f.Name == name {
					return f.Plane, nil
				}
			}
		}
		return 0, fmt.Errorf("the frame has no plate %q", name)
	}
	a, err := plate(lower)
	if err != nil {
		return 0, err
	}
	b, err := plate(upper)
	if err != nil {
		return 0, err
	}
	s, ok := stockNamed(j, j.Frame.Stock)
	if !ok {
		return 0, fmt.Errorf("the frame is cut from stock %q, which the job does not have", j.Frame.Stock)
	}
	if a > b {
		a, b = b, a
	}
	if a == b {
		return 0, fmt.Errorf("plates %s and %s lie on one plane", lower, upper)
	}
	return tidy(p.from[b] - p.from[a] - s.Measured), nil
}
