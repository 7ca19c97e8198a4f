package arrange

import (
	"fmt"
	"math"
	"slices"

	"pinwright/parts/job"
	"pinwright/parts/planes"
	"pinwright/parts/stack"
)

// pin is what the planes need to know of a pin.
type pin struct {
	joint   string
	members []int
	radius  [3]float64 // by zone: of the widest thing there
	below   float64
	above   float64
}

// slack swallows the rounding of sums in binary, mm.
const slack = 1e-6

// single is the job built once, not mirrored.
func single(j job.Job) job.Job {
	j.Copies = []job.Copy{{}}
	return j
}

// measurePin asks package stack what a pin carries: once with its parts on neighbouring planes, once far
// apart for what lies between them then. Far apart there may be no bolt; washers are what is wide then.
func measurePin(j job.Job, which int) (pin, error) {
	p := pin{joint: j.Pins[which].Joint}
	for i, l := range j.Linkage.Links {
		if slices.Contains(l.Pins, p.joint) {
			p.members = append(p.members, i)
		}
	}
	if j.Frame != nil {
		for i, f := range j.Frame.Plates {
			if slices.Contains(f.Pivots, p.joint) {
				p.members = append(p.members, len(j.Links)+i)
			}
		}
	}
	if len(p.members) == 0 {
		return p, fmt.Errorf("joint %s: it has a pin, and no link or plate is on it", p.joint)
	}
	kits, err := stack.Build(alone(j, which, p.members, 1))
	if err != nil {
		return p, err
	}
	kit := kits[0]
	bottom, top := ends(kit)
	p.measure(kit)
	for _, e := range things(kit) {
		p.below = math.Max(p.below, bottom-e.From)
		if e.Kind != "" { // the tip beyond the nut is thin: it counts when it is in the way
			p.above = math.Max(p.above, e.To-top)
		}
	}
	if kits, err := stack.Build(alone(j, which, p.members, 4)); err == nil {
		p.measure(kits[0])
	}
	return p, nil
}

// alone is the job with one pin, its parts the given number of planes apart.
func alone(j job.Job, which int, members []int, apart int) job.Job {
	on := make([]int, len(j.Links))
	if j.Frame != nil {
		on = make([]int, len(j.Links)+len(j.Frame.Plates))
	}
	for i, b := range members {
		on[b] = i * apart
	}
	j = placed(single(j), on)
	j.Pins = []job.Pin{j.Pins[which]}
	if j.Frame != nil {
		j.Frame.Standoffs = nil // their plates have no true places here; placed gave a frame of its own
	}
	return j
}

// measure enters the radii of what a kit carries.
func (p *pin) measure(kit stack.Kit) {
	bottom, top := ends(kit)
	for _, e := range things(kit) {
		if e.Kind == "" {
			continue
		}
		enter := func(z planes.Zone) { p.radius[z] = math.Max(p.radius[z], e.Diameter/2) }
		if e.To > bottom-axial && e.From < top+axial {
			enter(planes.Shank) // or so near to the faces of its outermost parts that it is in the way of others there
		}
		if e.From < bottom-slack {
			enter(planes.Head)
		}
		if e.To > top+slack {
			enter(planes.Nut)
		}
	}
}

// ends are the heights of the lowest and the highest face of the parts on a pin.
func ends(k stack.Kit) (bottom, top float64) {
	bottom, top = math.Inf(1), math.Inf(-1)
	for _, e := range k.Elements {
		if e.Kind == stack.PartElement {
			bottom, top = math.Min(bottom, e.From), math.Max(top, e.To)
		}
	}
	return bottom, top
}

// things are the round things of a kit, the bolt or shaft last and without a kind.
func things(k stack.Kit) []stack.Element {
	var out []stack.Element
	for _, e := range k.Elements {
		if e.Kind != stack.PartElement && e.Diameter > 0 && e.To > e.From {
			out = append(out, e)
		}
	}
	return append(out, stack.Element{Diameter: k.Through.Diameter, From: k.Through.From, To: k.Through.To})
}
