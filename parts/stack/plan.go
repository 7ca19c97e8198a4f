package stack

import (
	"errors"
	"fmt"
	"slices"

	"pinwright/parts/job"
)

// plan is the side view being built, from bottom to top.
type plan struct {
	job      job.Job
	fittings []fitting
	slabs    map[int]float64 // plane to thickness
	planes   []int           // with parts, ascending
	unsure   map[int]bool    // planes whose sheets are not all measured
	from     map[int]float64 // height of the lower face
	levels   []Level
	pillar   *pillar
	standoff *Standoff
	kits     []Kit // one for every fitting, in their order; of one copy
}

// newPlan does steps 1 to 4 of the package's plan.
func newPlan(j job.Job) (*plan, error) {
	p := &plan{job: j, slabs: map[int]float64{}, unsure: map[int]bool{}, from: map[int]float64{}}
	var errs []error
	for _, pin := range j.Pins {
		f, err := fitOut(j, pin)
		if err != nil {
			errs = append(errs, err)
			continue
		}
		p.fittings = append(p.fittings, f)
	}
	var err error
	if p.pillar, err = findPillar(j); err != nil {
		errs = append(errs, err)
	}
	if len(errs) > 0 {
		return nil, errors.Join(errs...)
	}
	p.lay()
	p.kits = make([]Kit, len(p.fittings))
	for i, plane := range p.planes {
		if i > 0 {
			if err := p.gap(p.planes[i-1], plane); err != nil {
				return nil, fault(j, "frame.standoffs", fmt.Sprintf("standoffs: %v", err), "")
			}
		}
		p.levels = append(p.levels, Level{Plane: plane, From: p.from[plane], To: tidy(p.from[plane] + p.slabs[plane])})
		for k := range p.fittings {
			f := &p.fittings[k]
			if f.members[len(f.members)-1].plane != plane {
				continue
			}
			kit, err := p.kit(f)
			if err != nil {
				errs = append(errs, err)
			}
			p.kits[k] = kit
		}
	}
	if p.pillar != nil {
		from := tidy(p.from[p.pillar.low] + p.pillar.sheet.Measured)
		if p.standoff, err = p.pillar.stand(from, p.from[p.pillar.high]); err != nil {
			errs = append(errs, fault(j, "frame.standoffs", fmt.Sprintf("standoffs: %v", err), ""))
		}
	}
	return p, errors.Join(errs...)
}

// lay finds the planes with parts on them and how thick they are.
func (p *plan) lay() {
	put := func(plane int, stock string) {
		if s, ok := stockNamed(p.job, stock); ok {
			if _, known := p.slabs[plane]; !known {
				p.planes = append(p.planes, plane)
			}
			p.slabs[plane] = max(p.slabs[plane], s.Measured)
			p.unsure[plane] = p.unsure[plane] || s.Measured == s.Thickness
		}
	}
	for _, l := range p.job.Links {
		put(l.Plane, l.Stock)
	}
	if p.job.Frame != nil {
		for _, plate := range p.job.Frame.Plates {
			put(plate.Plane, p.job.Frame.Stock)
		}
	}
	slices.Sort(p.planes)
}

// levelTop is the height reached so far.
func (p *plan) levelTop() float64 {
	if len(p.levels) == 0 {
		return 0
	}
	return p.levels[len(p.levels)-1].To
}

// gap finds where the next plane with parts begins, and lays the empty planes between.
func (p *plan) gap(lower, upper int) error {
	empty := upper - lower - 1
	washer := p.widestWasher(lower, upper)
	least := washer
	if empty > 0 {
		t := max(p.slabs[lower], p.slabs[upper])
		least = max(float64(empty)*t+float64(empty+1)*washer, p.roomAbove(lower), p.roomBelow(upper))
	}
	crossings := p.crossings(lower, upper)
	gap := smallestGap(least, crossings)
	top := p.levelTop()
	if p.pillar != nil && p.pillar.high == upper {
		var err error
		if gap, err = p.pillar.widen(gap, p.from[p.pillar.low]+p.pillar.sheet.Measured, top, crossings); err != nil {
			return err
		}
	}
	if empty > 0 {
		each := (gap - float64(empty+1)*washer) / float64(empty)
		for i := range empty {
			from := top + washer + float64(i)*(each+washer)
			p.levels = append(p.levels, Level{Plane: lower + 1 + i, From: tidy(from), To: tidy(from + each), Empty: true})
		}
	}
	p.from[upper] = tidy(top + gap)
	return nil
}

// widestWasher is the thickest washer of the pins with parts on both planes; of all pins when there is
// no such pin, and at least RunningGap then.
func (p *plan) widestWasher(lower, upper int) float64 {
	across := 0.0
	found := false
	for i := range p.fittings {
		f := &p.fittings[i]
		if _, _, ok := f.neighbours(lower, upper); ok {
			across, found = max(across, f.washerThickness()), true
		}
	}
	if found {
		return across
	}
	widest := RunningGap
	for i := range p.fittings {
		widest = max(widest, p.fittings[i].washerThickness())
	}
	return widest
}

// neighbours gives the members of a pin on two planes when nothing of it lies between them.
func (f *fitting) neighbours(lower, upper int) (a, b member, ok bool) {
	for i := 1; i < len(f.members); i++ {
		if f.members[i-1].plane == lower && f.members[i].plane == upper {
			return f.members[i-1], f.members[i], true
		}
	}
	return member{}, member{}, false
}

// crossings are the pins with a part on a plane and the part below it on the plane before or on one
// further down: the gap decides whether what is between the two can be filled.
func (p *plan) crossings(lower, upper int) []crossing {
	var out []crossing
	for i := range p.fittings {
		f := &p.fittings[i]
		for k := 1; k < len(f.members); k++ {
			if a, b := f.members[k-1], f.members[k]; a.plane <= lower && b.plane == upper {
				below := p.from[lower] + p.slabs[lower] - p.from[a.plane]
				out = append(out, crossing{f.washerThickness(), below - a.top() + b.bottom() - f.jamHeight(k), f.stock})
			}
		}
	}
	return out
}

// roomAbove is what the pins that end on a plane need above it, RunningGap included. Their kits are
// stacked already.
func (p *plan) roomAbove(plane int) float64 {
	room := 0.0
	for i, f := range p.fittings {
		if f.members[len(f.members)-1].plane == plane {
			room = max(room, p.kits[i].upperEnd()-p.from[plane]-p.slabs[plane]+RunningGap)
		}
	}
	return room
}

// roomBelow is what the pins that begin on a plane need below it, RunningGap included.
func (p *plan) roomBelow(plane int) float64 {
	room := 0.0
	for i := range p.fittings {
		f := &p.fittings[i]
		if f.members[0].plane == plane {
			room = max(room, f.below()-f.members[0].bottom()+RunningGap)
		}
	}
	return room
}

// upperEnd is the height of the highest thing of a kit.
func (k Kit) upperEnd() float64 {
	top := k.Through.To
	for _, e := range k.Elements {
		top = max(top, e.To)
	}
	return top
}
