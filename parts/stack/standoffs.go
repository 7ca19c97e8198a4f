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
	Screws      [2]string       // designations, the lower one first; each has a washer under its head
	Lengths     [2]float64      // standard lengths of the screws, mm
	From, To    float64         // heights of the inner faces of the two plates
	Head        float64         // how far screw head and washer stand out of a plate, mm
	HeadWide    float64         // diameter of the head, or of the washer where that is wider, mm

	mass, washerMass float64
	screwMass        [2]float64
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
	heights   []height
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
	if err := p.measure(); err != nil {
		return fail(err, "")
	}
	return &p, nil
}

// height is what a stock length and washers come to, with the screws that suit it.
type height struct {
	length       float64
	washers      int
	lower, upper float64 // lengths of the screws
}

// measure finds the heights that can be had.
func (p *pillar) measure() error {
	var first error
	for n := range mostShims + 1 {
		for _, l := range p.size.Lengths {
			lower, err := p.screwLength(l, 0)
			upper := lower
			if err == nil && n > 0 {
				upper, err = p.screwLength(l, n)
			}
			if err == nil {
				p.heights = append(p.heights, height{l, n, lower, upper})
			} else if first == nil {
				first = err
			}
		}
	}
	if len(p.heights) == 0 {
		return first
	}
	return nil
}

// mostShims is how many washers may lie on a standoff.
const mostShims = 4

// reach gives the height that comes to a distance or as little over it as may be, the fewest washers first
// among equals, and by how much it is over.
func (p *pillar) reach(distance float64) (best height, over float64, ok bool) {
	over = math.Inf(1)
	for _, h := range p.heights {
		if o := tidy(h.length + float64(h.washers)*p.washer.Thickness - distance); o >= -slack && o < over-slack {
			best, over, ok = h, max(0, o), true
		}
	}
	return best, over, ok
}

// widen gives the smallest gap under the upper plate, not under one, that the standoffs and all pins can
// fill. The lower plate ends at a height, and the gap begins at another.
func (p *pillar) widen(gap, plateTop, gapBottom float64, crossings []crossing) (float64, error) {
	first := tidy(gapBottom + gap - plateTop)
	for range mostTries {
		_, over, ok := p.reach(gapBottom + gap - plateTop)
		if !ok {
			break
		}
		if over <= slack {
			return tidy(gap), nil
		}
		gap = smallestGap(gap+over, crossings)
	}
	return gap, fmt.Errorf("the plates stand %.2f mm apart or more, and no stock length of standoff %s (%s mm) with up to %d washers of %g mm comes to a height that the pins can fill too and has room for its screws: take another size, another plane for one of the plates, or cross members",
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
	h, over, ok := p.reach(to - from)
	if !ok || over > slack || to <= from {
		return nil, fmt.Errorf("no stock length of standoff %s fills %.2f mm", p.size.Size, to-from)
	}
	l, lower, upper := h.length, h.lower, h.upper
	s := &Standoff{
		At: slices.Clone(p.rules.At), Length: l, Diameter: p.size.Across * 2 / math.Sqrt(3),
		Designation: "hexagon standoff " + p.size.Size, Washer: p.washer.Designation(), Washers: h.washers,
		Screws: [2]string{p.screw.Designation(lower), p.screw.Designation(upper)}, Lengths: [2]float64{lower, upper},
		From: from, To: to,
		Head: p.screw.HeadHeight + p.washer.Thickness, HeadWide: max(p.screw.HeadDiameter, p.washer.Outside),
		mass: p.size.Mass(l, p.rules.Round), screwMass: [2]float64{p.screw.Mass(lower), p.screw.Mass(upper)}, washerMass: p.washer.Mass(),
	}
	if p.rules.Round {
		s.Designation, s.Diameter = "round standoff "+p.size.Size, p.size.Across
	}
	return s, nil
}

// leastEngaged is how far a screw must go into a standoff, over its diameter (common practice, no source:
// one diameter in steel, where it can be).
const leastEngaged = 0.8

// screwLength gives the length of a screw through head washer, plate and the washers that lie on the
// standoff: in by its diameter, at least by leastEngaged of it, and never so deep that it meets the end
// of the thread or the other screw.
func (p *pillar) screwLength(standoff float64, shims int) (float64, error) {
	depth := p.size.Depth(standoff)
	_, least, most := thickness(p.sheet)
	thin := least + float64(1+shims)*p.washer.Least
	thick := most + float64(1+shims)*p.washer.Most
	var first error
	for _, in := range []float64{1, leastEngaged} {
		length, err := p.screw.SureLength(thick + in*p.screw.Diameter)
		if err != nil {
			return 0, err
		}
		if length-thin <= depth+slack {
			return length, nil
		}
		if first == nil {
			first = fmt.Errorf("screw %s goes up to %.1f mm into a standoff %s of %g mm, and there is room for %.1f mm: take another size, or thicker plates",
				p.screw.Designation(length), length-thin, p.size.Size, standoff, depth)
		}
	}
	return 0, first
}
