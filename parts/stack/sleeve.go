package stack

import (
	"errors"
	"fmt"
	"math"
	"slices"
)

const (
	// leastWall is the thinnest wall of a sleeve, mm (common practice, no source).
	leastWall = 0.5

	// overSleeve is how much wider than the sleeve its washers must be, mm: half of it bears on either
	// side (judgement, no source).
	overSleeve = 1.0

	// sleeveStep is the step of the lengths of sleeves, mm.
	sleeveStep = 0.05
)

// sleeves gives every part that turns its sleeve: so much longer than the thickest that the part may be
// that even the shortest sleeve leaves the least play.
func (f *fitting) sleeves() error {
	if f.nut == nil {
		return errors.New("a sleeve is clamped by a nut: say nut: lock")
	}
	outside, bolt := f.pin.Sleeve, f.diameter()
	if !(outside >= bolt+2*leastWall) {
		return fmt.Errorf("a sleeve of %g mm outside over bolt %s of %g mm leaves a wall of %.2f mm: take a sleeve of at least %g mm, or a thinner bolt",
			outside, f.size, bolt, (outside-bolt)/2, bolt+2*leastWall)
	}
	if f.washer == nil || f.washer.Outside < outside+overSleeve {
		what := "without washers"
		if f.washer != nil {
			what = fmt.Sprintf("with washer %s of %g mm", f.washer.Designation(), f.washer.Outside)
		}
		return fmt.Errorf("%s nothing keeps the links on a sleeve of %g mm: say washer: large, or take a sleeve of at most the washer less %g mm", what, outside, overSleeve)
	}
	if len(f.pin.Seats) == 0 {
		return errors.New("no part is named that turns on the sleeve")
	}
	for _, seat := range f.pin.Seats {
		i := slices.IndexFunc(f.members, func(m member) bool { return m.name == seat })
		if i < 0 {
			return fmt.Errorf("%s is to turn on the sleeve, and is not on this joint", seat)
		}
		m := &f.members[i]
		m.sleeve = tidy(math.Ceil((m.most+f.play()[0]+SleeveTolerance)/sleeveStep-slack) * sleeveStep)
		if p := m.ends(); f.pin.Play[1] > 0 && p.LikelyMost > f.pin.Play[1]+slack {
			return fmt.Errorf("%s may be %.2f to %.2f mm thick, so that a sleeve of %g mm leaves %.2f to %.2f mm of play (%.2f to %.2f mm by root-sum-square): more than the %g mm asked for; measure the sheet and say measured, or say play: [%gmm, %gmm]",
				m.name, m.least, m.most, m.sleeve, p.Least, p.Most, p.LikelyLeast, p.LikelyMost, f.pin.Play[1], f.play()[0], math.Ceil(p.Most*10-slack)/10)
		}
	}
	return f.oneBody(func(m member) bool { return m.sleeve > 0 }, "sleeve")
}

// ends is the play of a part on its sleeve.
func (m member) ends() Budget {
	var b Budget
	b.add(m.sleeve-SleeveTolerance, m.sleeve, m.sleeve+SleeveTolerance)
	b.add(-m.most, -m.thickness, -m.least)
	b.close(0)
	return b
}
