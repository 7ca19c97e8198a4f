package stack

import (
	"fmt"
	"math"

	"pinwright/parts/hardware"
	"pinwright/parts/job"
)

// below is how far the kit reaches under its lowest member: head and washer, or collar and washer.
func (f *fitting) below() float64 {
	if f.pin.Kind != job.ShaftPin {
		below := f.screw.HeadHeight + f.washerThickness()
		if f.rodEnd != nil && f.pin.RodEnd == job.HeadSide {
			below += f.rodEnd.Width + f.washerThickness()
		}
		return below
	}
	if f.members[0].held {
		return 0
	}
	c, err := f.keeper()
	if err != nil {
		return 0 // the kit reports it
	}
	return c.Thickness + f.washerThickness() + f.play()[1]
}

// keeper is what keeps a shaft where it is: a set collar or a push-on ring.
func (f *fitting) keeper() (Element, error) {
	if f.pin.Retain == job.RingRetainer {
		r, err := hardware.PushRingFor(f.pin.Shaft)
		return Element{Kind: CollarElement, What: r.Designation(), Thickness: r.Height, Diameter: r.Outside}, err
	}
	c, err := hardware.CollarFor(f.pin.Shaft)
	return Element{Kind: CollarElement, What: c.Designation(), Thickness: c.Width, Diameter: c.Outside}, err
}

// play is the least and the greatest axial play wanted.
func (f *fitting) play() [2]float64 {
	switch {
	case f.pin.Play[1] > 0:
		return f.pin.Play
	case f.pin.Kind == job.SleevePin:
		return [2]float64{LeastPlay, SleevePlay}
	}
	return [2]float64{LeastPlay, EndPlay}
}

// pile is a kit being stacked from bottom to top.
type pile struct {
	kit Kit
	z   float64 // height reached

	firstNut float64 // least length of what is between the head and the nut next to it
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
	b.squares += (most - least) * (most - least) / 4
}

// close ends a budget: the play counts in the greatest sum alone.
func (b *Budget) close(play float64) {
	middle, likely := (b.Least+b.Most)/2, math.Sqrt(b.squares)
	*b = Budget{
		Least: tidy(b.Least), Nominal: tidy(b.Nominal), Most: tidy(b.Most + play),
		LikelyLeast: tidy(middle - likely), LikelyMost: tidy(middle + likely + play),
	}
}

func (k *Kit) close() {
	k.Play = tidy(k.Play)
	k.Budget.close(k.Play)
}

// tidy takes away what sums of decimal figures gather in binary, 1e-9 mm.
func tidy(v float64) float64 { return math.Round(v*1e9) / 1e9 }

// kit stacks the kit of a pin whose members all have their heights.
func (p *plan) kit(f *fitting) (Kit, error) {
	pl := pile{firstNut: math.Inf(1), kit: Kit{Joint: f.pin.Joint, Pin: f.pin, Open: f.open, Notes: f.notes}}
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
			fl, err := f.between(i, p.from[below.plane], z)
			if err != nil {
				return fault(p.job, pinKey(p.job, f.pin.Joint), err.Error(), "")
			}
			if tube := p.job.Spacers.Tube; tube > 0 && fl.spacer > tube {
				return fault(p.job, "spacers", fmt.Sprintf("joint %s: its spacer of %g mm is longer than the tube of %g mm", f.pin.Joint, fl.spacer, tube), "get longer tube, or bring the planes nearer")
			}
			if f.jamUnder(i) && f.jamFirst() {
				pl.putJam(f)
			}
			p.filling(f, pl, fl)
			if f.jamUnder(i) && !f.jamFirst() {
				pl.putJam(f)
			}
		}
		pl.z = z
		pl.put(Element{Kind: PartElement, Part: m.name, Thickness: m.thickness})
		least, most := m.limits()
		if m.seat != nil {
			pl.z = z + m.bottom()
			pl.put(Element{Kind: BearingElement, What: m.seat.Designation, Part: m.name, Thickness: m.seat.Width, Diameter: max(m.seat.Outside, m.seat.Flange)})
		}
		if m.sleeve > 0 {
			pl.z = z
			pl.put(Element{Kind: SleeveElement, What: sleeveName(f), Part: m.name, Thickness: m.sleeve, Diameter: f.pin.Sleeve})
			pl.kit.Turning = append(pl.kit.Turning, Turning{m.name, m.ends()})
		}
		pl.kit.Budget.add(least, m.top()-m.bottom(), most)
	}
	return nil
}

// sleeveName is what a sleeve is asked for by.
func sleeveName(f *fitting) string {
	return fmt.Sprintf("sleeve for %s, outside %g mm", f.size, f.pin.Sleeve)
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
		if f.spacer < f.usual-slack {
			what += fmt.Sprintf(", outside %.3g mm", f.spacer)
		}
		pl.put(Element{Kind: SpacerElement, What: what, Thickness: fl.spacer, Diameter: f.spacer})
		pl.kit.Budget.add(fl.spacer-SpacerTolerance, fl.spacer, fl.spacer+SpacerTolerance)
		for range fl.washers - 1 {
			pl.washer(f)
		}
	}
	pl.kit.Play += fl.play
}
