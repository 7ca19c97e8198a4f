package stack

import (
	"fmt"
	"math"
	"slices"

	"pinwright/parts/hardware"
	"pinwright/parts/job"
	"pinwright/parts/outline"
)

// Standoff is what keeps the lowest and the highest plate of the frame apart: at every place the same.
// Washers fill what a stock length leaves; the planes are laid so that nothing is left over.
type Standoff struct {
	At          []outline.Point // in the linkage's coordinates
	Designation string          // "hexagon standoff M3"
	Length      float64         // stock length, mm
	Diameter    float64         // outside, largest, mm
	Washer      string          // designation
	Washers     int             // between the standoff and the upper plate
	Screw       string          // designation; one from either side, each with a washer under its head
	ScrewLength float64         // standard length, mm
	From, To    float64         // heights of the inner faces of the two plates
	Head        float64         // how far screw head and washer stand out of a plate, mm
	HeadWide    float64         // diameter of the head, or of the washer where that is wider, mm

	mass, screwMass, washerMass float64
}

// Standoffs gives the standoffs of the frame, nil when it has none. Errors are those of Build.
func Standoffs(j job.Job) (*Standoff, error) {
	p, err := newPlan(j)
	if err != nil {
		return nil, err
	}
	return p.standoff, nil
}

// pillar is what is looked up of the standoffs before the planes are laid.
type pillar struct {
	rules     job.Standoffs
	size      hardware.Standoff
	screw     hardware.Screw
	washer    hardware.Washer
	sheet     job.Stock
	low, high int // planes of the plates
}

// findPillar looks up the standoffs; nil when there are none.
func findPillar(j job.Job) (*pillar, error) {
	if j.Frame == nil || j.Frame.Standoffs == nil || len(j.Frame.Standoffs.At) == 0 {
		return nil, nil
	}
	fail := func(err error, hint string) (*pillar, error) {
		return nil, fault(j, "frame.standoffs", fmt.Sprintf("standoffs: %v", err), hint)
	}
	p := pillar{rules: *j.Frame.Standoffs}
	planes := []int{}
	for _, f := range j.Frame.Plates {
		planes = append(planes, f.Plane)
	}
	slices.Sort(planes)
	switch {
	case len(planes) < 2:
		return fail(fmt.Errorf("they stand between two plates, and the frame has %d", len(planes)), "add a plate")
	case len(planes) > 2:
		return fail(fmt.Errorf("they stand between two plates, and the frame has %d", len(planes)), "take cross members instead")
	}
	p.low, p.high = planes[0], planes[1]
	var ok bool
	if p.sheet, ok = stockNamed(j, j.Frame.Stock); !ok {
		return fail(fmt.Errorf("the frame is cut from stock %q, which the job does not have", j.Frame.Stock), "")
	}
	var err error
	if p.size, err = hardware.StandoffFor(p.rules.Bolt); err != nil {
		return fail(err, "")
	}
	head := p.rules.Head
	if head == "" {
		head = string(hardware.Socket)
	}
	if p.screw, err = hardware.ScrewFor(hardware.Head(head), p.rules.Bolt); err != nil {
		return fail(err, "")
	}
	if p.washer, err = hardware.WasherFor(hardware.NormalWasher, p.rules.Bolt); err != nil {
		return fail(err, "")
	}
	return &p, nil
}

// mostShims is how many washers may lie on a standoff.
const mostShims = 4

// reach gives the stock length and the washers that come to a distance or as little over it as may be,
// the fewest washers first among equals, and by how much they are over.
func (p *pillar) reach(distance float64) (length float64, washers int, over float64, ok bool) {
	over = math.Inf(1)
	for n := range mostShims + 1 {
		for _, l := range p.size.Lengths {
			if o := tidy(l + float64(n)*p.washer.Thickness - distance); o >= -slack && o < over-slack {
				length, washers, over, ok = l, n, max(0, o), true
			}
		}
	}
	return length, washers, over, ok
}

// widen gives the smallest gap under the upper plate, not under one, that the standoffs and all pins can
// fill. The lower plate ends at a height, and the gap begins at another.
func (p *pillar) widen(gap, plateTop, gapBottom float64, crossings []crossing) (float64, error) {
	first := tidy(gapBottom + gap - plateTop)
	for range mostTries {
		_, _, over, ok := p.reach(gapBottom + gap - plateTop)
		if !ok {
			break
		}
		if over <= slack {
			return tidy(gap), nil
		}
		gap = smallestGap(gap+over, crossings)
	}
	return gap, fmt.Errorf("the plates stand %.2f mm apart or more, and no stock length of standoff %s (%s mm) with up to %d washers of %g mm comes to a height that the pins can fill too: take another size, another plane for one of the plates, or cross members",
		first, p.size.Size, lengthsInWords(p.size.Lengths), mostShims, p.washer.Thickness)
}

// mostTries ends the search for a height that suits standoffs and pins: every try rises by up to the
// step of the stock lengths.
const mostTries = 200

func lengthsInWords(lengths []float64) string {
	return fmt.Sprintf("%g to %g", lengths[0], lengths[len(lengths)-1])
}

// stand makes the standoffs between two heights.
func (p *pillar) stand(from, to float64) (*Standoff, error) {
	l, n, over, ok := p.reach(to - from)
	if !ok || over > slack {
		return nil, fmt.Errorf("no stock length of standoff %s fills %.2f mm", p.size.Size, to-from)
	}
	// The screw goes through washer and plate, and in by its diameter, or what there is of thread.
	depth := p.size.Depth(l)
	_, least, most := thickness(p.sheet)
	need := most + p.washer.Most + min(p.screw.Diameter, depth)
	length, err := p.screw.SureLength(need)
	if err != nil {
		return nil, err
	}
	// The washers on the standoff lie between it and the plate, and take of the upper screw.
	if n > 0 {
		if length, err = p.screw.SureLength(need + float64(n)*p.washer.Most); err != nil {
			return nil, err
		}
	}
	if in := length - least - p.washer.Least; in > depth+slack {
		return nil, fmt.Errorf("screw %s goes %.1f mm into a standoff of %g mm, and there is room for %.1f mm: take a larger frame spacing or another size",
			p.screw.Designation(length), in, l, depth)
	}
	s := &Standoff{
		At: slices.Clone(p.rules.At), Length: l, Diameter: p.size.Across * 2 / math.Sqrt(3),
		Designation: "hexagon standoff " + p.size.Size, Washer: p.washer.Designation(), Washers: n,
		Screw: p.screw.Designation(length), ScrewLength: length, From: from, To: to,
		Head: p.screw.HeadHeight + p.washer.Thickness, HeadWide: max(p.screw.HeadDiameter, p.washer.Outside),
		mass: p.size.Mass(l, p.rules.Round), screwMass: p.screw.Mass(length), washerMass: p.washer.Mass(),
	}
	if p.rules.Round {
		s.Designation, s.Diameter = "round standoff "+p.size.Size, p.size.Across
	}
	return s, nil
}
