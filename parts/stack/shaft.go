package stack

import (
	"fmt"
	"math"
)

// shaftKit stacks a kit on a plain shaft. Where the outermost part is fast on the shaft, the shaft ends
// flush with it; where it is not, a washer and a set collar keep it on.
func (p *plan) shaftKit(f *fitting, pl *pile) error {
	first, last := f.members[0], f.members[len(f.members)-1]
	var collar Element
	if !first.held || !last.held {
		var err error
		if collar, err = f.keeper(); err != nil {
			return fault(p.job, pinKey(p.job, f.pin.Joint), fmt.Sprintf("joint %s: %v", f.pin.Joint, err),
				"take a fit that holds the shaft (push, press), a bore with a flat, or a shaft that there are collars for")
		}
	}
	ring := func() { pl.put(collar) }
	from := pl.z
	if !first.held {
		ring()
		pl.z += f.play()[1]
		pl.washer(f)
	}
	if err := p.parts(f, pl); err != nil {
		return err
	}
	if !last.held {
		pl.washer(f)
		pl.z += f.play()[1]
		ring()
		pl.kit.Play += f.play()[1]
	}
	if !first.held {
		pl.kit.Play += f.play()[1]
	}
	pl.kit.close()
	length := math.Floor((pl.z-from)*10+slack) / 10
	pl.kit.Through = Through{
		Designation: fmt.Sprintf("shaft %g mm", f.pin.Shaft),
		Diameter:    f.pin.Shaft,
		Length:      length,
		Need:        tidy(pl.z - from),
		Excess:      tidy(length - (pl.z - from)),
		From:        from,
		To:          tidy(from + length),
	}
	if f.open {
		pl.kit.Through.Length, pl.kit.Through.Excess = 0, 0
	}
	return nil
}
