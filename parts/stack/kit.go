package stack

import (
	"errors"
	"fmt"
	"math"
	"slices"

	"pinwright/parts/hardware"
	"pinwright/parts/job"
)

// below is how far the kit reaches under its lowest member: head and washer, or collar and washer.
func (f *fitting) below() float64 {
	if f.pin.Kind != job.ShaftPin {
		return f.screw.HeadHeight + f.washerThickness()
	}
	if f.members[0].held {
		return 0
	}
	c, err := hardware.CollarFor(f.pin.Shaft)
	if err != nil {
		return 0 // the kit reports it
	}
	return c.Width + f.washerThickness() + EndPlay
}

// pile is a kit being stacked from bottom to top.
type pile struct {
	kit Kit
	z   float64 // height reached
}

func (p *pile) put(e Element) {
	e.From, e.To = tidy(p.z), tidy(p.z+e.Thickness)
	p.kit.Elements = append(p.kit.Elements, e)
	p.z = e.To
}

func (p *pile) washer(f *fitting) {
	if f.washer == nil {
		return
	}
	what := f.washer.Designation()
	if f.as != f.size {
		what = fmt.Sprintf("%s washer for %s", f.washer.Kind, f.size)
	}
	p.put(Element{Kind: WasherElement, What: what, Thickness: f.washer.Thickness, Diameter: f.washer.Outside})
	p.kit.Budget.add(f.washer.Least, f.washer.Thickness, f.washer.Most)
}

func (b *Budget) add(least, nominal, most float64) {
	b.Least += least
	b.Nominal += nominal
	b.Most += most
}

// close ends the budget: the play counts in the greatest stack alone.
func (k *Kit) close() {
	k.Play = tidy(k.Play)
	k.Budget = Budget{tidy(k.Budget.Least), tidy(k.Budget.Nominal), tidy(k.Budget.Most + k.Play)}
}

// tidy takes away what sums of decimal figures gather in binary, 1e-9 mm.
func tidy(v float64) float64 { return math.Round(v*1e9) / 1e9 }

// kit stacks the kit of a pin whose members all have their heights.
func (p *plan) kit(f *fitting) (Kit, error) {
	pl := pile{kit: Kit{Joint: f.pin.Joint, Pin: f.pin, Open: f.open, Notes: f.notes}}
	pl.z = p.from[f.members[0].plane] + f.members[0].bottom() - f.below()
	var err error
	if f.pin.Kind == job.ShaftPin {
		err = p.shaftKit(f, &pl)
	} else {
		err = p.boltKit(f, &pl)
	}
	p.remarks(f, &pl.kit)
	return pl.kit, err
}

// parts stacks the members of a pin and what lies between them.
func (p *plan) parts(f *fitting, pl *pile) error {
	for i, m := range f.members {
		z := p.from[m.plane]
		if i > 0 {
			below := f.members[i-1]
			fl, err := f.between(below, m, p.from[below.plane], z)
			if err != nil {
				return fault(p.job, pinKey(p.job, f.pin.Joint), err.Error(), "")
			}
			p.filling(f, pl, fl)
		}
		pl.z = z
		pl.put(Element{Kind: PartElement, Part: m.name, Thickness: m.thickness})
		least, most := m.limits()
		if m.seat != nil {
			pl.z = z + m.bottom()
			pl.put(Element{Kind: BearingElement, What: m.seat.Designation, Part: m.name, Thickness: m.seat.Width, Diameter: max(m.seat.Outside, m.seat.Flange)})
		}
		pl.kit.Budget.add(least, m.top()-m.bottom(), most)
	}
	return nil
}

// filling stacks what is between two members.
func (p *plan) filling(f *fitting, pl *pile, fl filling) {
	if fl.spacer == 0 {
		for range fl.washers {
			pl.washer(f)
		}
	} else {
		if fl.washers > 0 {
			pl.washer(f)
		}
		what := "spacer for " + f.size
		if f.pin.Kind == job.ShaftPin {
			what = fmt.Sprintf("spacer for %g mm shaft", f.pin.Shaft)
		}
		pl.put(Element{Kind: SpacerElement, What: what, Thickness: fl.spacer, Diameter: f.spacer})
		pl.kit.Budget.add(fl.spacer-SpacerTolerance, fl.spacer, fl.spacer+SpacerTolerance)
		if fl.washers > 1 {
			pl.washer(f)
		}
	}
	pl.kit.Play += fl.play
}

// boltKit stacks a kit on a bolt and chooses the bolt.
func (p *plan) boltKit(f *fitting, pl *pile) error {
	pl.put(Element{Kind: HeadElement, What: string(f.screw.Head) + " head", Thickness: f.screw.HeadHeight, Diameter: f.screw.HeadDiameter})
	face := pl.z
	pl.washer(f)
	if err := p.parts(f, pl); err != nil {
		return err
	}
	if f.nut != nil {
		pl.washer(f)
		if f.turns() {
			pl.kit.Play += EndPlay
			pl.z += EndPlay
		}
	}
	pl.kit.close()
	nutFace := pl.z
	if f.nut != nil {
		what := f.nut.Designation()
		if f.as != f.size {
			what = fmt.Sprintf("%s nut %s", f.nut.Kind, f.size)
		}
		pl.put(Element{Kind: NutElement, What: what, Thickness: f.nut.Height, Diameter: f.nut.Corners})
	}
	through, err := f.choose(pl.kit.Budget)
	if err != nil {
		var long hardware.TooShortError
		placed := fault(p.job, pinKey(p.job, f.pin.Joint), err.Error(), "")
		if errors.As(err, &long) {
			return &LongError{f.pin.Joint, placed}
		}
		return placed
	}
	through.From, through.To = tidy(face), tidy(face+max(through.Length, math.Ceil(through.Need*10-slack)/10))
	if f.nut != nil {
		through.Past = tidy(through.To - nutFace - f.nut.Height)
	}
	pl.kit.Through = through
	return nil
}

// turns tells whether links turn on the bolt itself. With a bearing the bolt is tightened.
func (f *fitting) turns() bool { return f.pin.Kind == job.BoltPin }

// shaftKit stacks a kit on a plain shaft. Where the outermost part is fast on the shaft, the shaft ends
// flush with it; where it is not, a washer and a set collar keep it on.
func (p *plan) shaftKit(f *fitting, pl *pile) error {
	first, last := f.members[0], f.members[len(f.members)-1]
	var collar hardware.Collar
	if !first.held || !last.held {
		var err error
		if collar, err = hardware.CollarFor(f.pin.Shaft); err != nil {
			return fault(p.job, pinKey(p.job, f.pin.Joint), fmt.Sprintf("joint %s: %v", f.pin.Joint, err),
				"take a fit that holds the shaft (push, press), a bore with a flat, or a shaft that there are collars for")
		}
	}
	ring := func() {
		pl.put(Element{Kind: CollarElement, What: collar.Designation(), Thickness: collar.Width, Diameter: collar.Outside})
	}
	from := pl.z
	if !first.held {
		ring()
		pl.z += EndPlay
		pl.washer(f)
	}
	if err := p.parts(f, pl); err != nil {
		return err
	}
	if !last.held {
		pl.washer(f)
		pl.z += EndPlay
		ring()
		pl.kit.Play += EndPlay
	}
	if !first.held {
		pl.kit.Play += EndPlay
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

// remarks are what the assembler ought to know of a kit.
func (p *plan) remarks(f *fitting, k *Kit) {
	note := func(format string, args ...any) { k.Notes = append(k.Notes, fmt.Sprintf(format, args...)) }
	if f.pin.Kind != job.ShaftPin {
		switch {
		case f.nut == nil:
			note("No nut: the bolt holds by a thread in %s, or by what it is screwed into.", f.members[len(f.members)-1].name)
		case f.turns() && f.nut.Kind != hardware.LockNut:
			note("A %s nut on an axle works loose: lock it with a second one or with thread lock, leaving %g mm of play.", f.nut.Kind, EndPlay)
		case f.turns():
			note("Tighten the nut and turn it back until the links move freely: about %g mm of play.", EndPlay)
		}
		if g := f.screw.Grip(k.Through.Length); f.turns() && k.Through.Length > 0 && g == 0 {
			note("The bolt is threaded to the head: the links turn on thread.")
		}
	}
	if p.spacersUnsure(f, k) {
		note("The sheets between are taken at their nominal thickness: measure them before cutting the spacers, and say measured.")
	}
	if f.open {
		note("The frame is not in the job: add its thickness to the length.")
	}
	if f.movable {
		note("Adjustable pivot: when it is set, clamp it so that it does not creep in its slot.")
	}
	if f.pin.Kind == job.BearingPin && k.Play > slack {
		note("The bolt closes %.2f mm of gaps when it clamps the inner rings.", k.Play)
	}
	if f.washer == nil && len(f.members) > 1 {
		note("No washers: the parts rub on each other.")
	}
}

// spacersUnsure tells whether a kit has a spacer whose length follows a thickness that was not measured.
func (p *plan) spacersUnsure(f *fitting, k *Kit) bool {
	if !slices.ContainsFunc(k.Elements, func(e Element) bool { return e.Kind == SpacerElement }) {
		return false
	}
	first, last := f.members[0].plane, f.members[len(f.members)-1].plane
	return slices.ContainsFunc(p.planes, func(plane int) bool {
		return first <= plane && plane <= last && p.unsure[plane]
	})
}
