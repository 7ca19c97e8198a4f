package parts

import (
	"fmt"
	"math"
	"slices"

	"pinwright/parts/hardware"
	"pinwright/parts/job"
	"pinwright/parts/linkage"
	"pinwright/parts/outline"
)

// frame makes the frame plates and the cross members of one copy.
func (k *maker) frame(c job.Copy) {
	f := k.job.Frame
	if f == nil {
		return
	}
	crosses := k.crosses(f)
	for _, plate := range f.Plates {
		k.plate(c, f, plate, crosses)
	}
	for _, x := range crosses {
		k.crossPart(c, x)
	}
}

// plate is the rounded hull of everything that the plate carries: pivots with their ranges, mounting
// holes, the slots of the cross members.
func (k *maker) plate(c job.Copy, f *job.Frame, plate job.FramePlate, crosses []cross) {
	path := "frame.plates." + plate.Name
	r := k.rule(f.Stock)
	var discs []outline.Disc
	n := note{path: path}
	p := Part{Name: partName(c, plate.Name), Link: plate.Name, Copy: c.Name, Stock: f.Stock, Plane: plate.Plane}
	add := func(d drilling) {
		p.Region.Holes = append(p.Region.Holes, d.shape)
		p.Holes = append(p.Holes, d.hole)
	}
	before := k.faults
	for _, joint := range plate.Pivots {
		g, pin := k.ground(joint), k.pin(joint)
		if g == nil || pin == nil {
			continue
		}
		d, err := holeFor(*pin, plate.Name, true)
		if err != nil {
			k.fail("pins."+joint, "", "%s: %v", plate.Name, err)
			continue
		}
		wanted, least := r.hole(d.hole)
		if f.Width > 0 {
			if wanted = d.hole.Diameter/2 + f.Width; wanted < least-1e-9 {
				k.fail("frame.width", "make it at least "+upTo(least-d.hole.Diameter/2)+" mm, or leave it out",
					"%s: hole %s (%s mm) leaves %s mm to the edge; %s wants %s mm", plate.Name, joint,
					millimetres(d.hole.Diameter), millimetres(f.Width), r.name, millimetres(least-d.hole.Diameter/2))
			}
		}
		way := sweep(*g)
		for _, at := range way.places {
			discs = append(discs, outline.Disc{Centre: at, Radius: wanted + way.sagitta})
			n.covers = append(n.covers, outline.Disc{Centre: at, Radius: coverOf(*pin, d.hole)})
		}
		if g.Range == nil {
			at := outline.Place(0, false, g.At)
			d.hole.Centre, d.shape = g.At, d.shape.Transform(at)
			add(d)
			continue
		}
		if d.hole.Kind == BearingSeat {
			k.fail("pins."+joint, "let the bearing sit in a link, or give the pivot one place",
				"%s: a bearing can't be pressed into a slot, and pivot %s is adjustable", plate.Name, joint)
			continue
		}
		slot := slotOf(*g.Range, d.hole.Diameter/2)
		if len(slot) == 0 {
			k.fail("linkage.joints."+joint, "shorten the arc, or take a thinner pin",
				"%s: the slot of pivot %s, %s mm wide, closes on itself: what is inside would fall out", plate.Name, joint, millimetres(d.hole.Diameter))
			continue
		}
		add(drilling{Hole{Name: joint, Kind: PivotSlot, Joint: joint, Centre: g.At, Width: d.hole.Diameter}, slot.Reverse()})
	}
	if f.Mount != nil {
		diameter, err := mountHole(*f.Mount)
		if err != nil {
			k.fail("frame.mount", "", "mount: %v", err)
		}
		for i, at := range f.Mount.At {
			if err != nil {
				break
			}
			d := round(fmt.Sprintf("mount %d", i+1), BoltHole, "", at, diameter)
			wanted, _ := r.hole(d.hole)
			discs = append(discs, outline.Disc{Centre: at, Radius: wanted})
			n.covers = append(n.covers, outline.Disc{Centre: at, Radius: diameter})
			add(d)
		}
	}
	if s := f.Standoffs; s != nil {
		size, err := hardware.BoltHole(s.Bolt, s.Fit)
		if err != nil {
			k.fail("frame.standoffs", "", "standoffs: %v", err)
		}
		for i, at := range s.At {
			if err != nil {
				break
			}
			d := round(fmt.Sprintf("standoff %d", i+1), BoltHole, "", at, size.Diameter)
			wanted, _ := r.hole(d.hole)
			discs = append(discs, outline.Disc{Centre: at, Radius: wanted})
			n.covers = append(n.covers, outline.Disc{Centre: at, Radius: size.Diameter})
			add(d)
		}
	}
	for _, x := range crosses {
		for _, d := range x.slots(plate.Plane) {
			add(d)
		}
		for _, at := range x.corners() {
			discs = append(discs, outline.Disc{Centre: at, Radius: 2 * r.wide})
		}
	}
	if k.faults > before {
		return
	}
	if len(discs) == 0 {
		k.fail(path, "give it a pivot, mounting holes or a cross member, or take it out", "plate %s carries nothing: it has no shape", plate.Name)
		return
	}
	p.Region.Outer = outline.Hull(discs...)
	if !k.sound(p, path) {
		return
	}
	if c.Mirror {
		p, n = mirror(p, n, outline.Place(0, true, outline.Point{}))
	}
	k.parts = append(k.parts, p)
	k.notes = append(k.notes, n)
}

// ground returns the ground pivot of a joint, nil if it has none.
func (k *maker) ground(joint string) *linkage.Ground {
	i := slices.IndexFunc(k.job.Linkage.Joints, func(j linkage.Joint) bool { return j.Name == joint })
	if i < 0 {
		return nil
	}
	return k.job.Linkage.Joints[i].Ground
}

// way is the places of a pivot along its range: every place of the range lies within the sagitta of
// the line between two of them.
type way struct {
	places  []outline.Point
	sagitta float64
}

// sweep lists places along the range of a pivot: the one, the two ends of a line, or points of an arc
// every 5 degrees or less.
func sweep(g linkage.Ground) way {
	switch {
	case g.Range == nil:
		return way{places: []outline.Point{g.At}}
	case !(g.Range.Radius > 0):
		return way{places: []outline.Point{g.Range.From, g.Range.To}}
	}
	turn := math.Abs(g.Range.End - g.Range.Start)
	steps := max(1, int(math.Ceil(turn/(5*math.Pi/180))))
	w := way{sagitta: g.Range.Radius * (1 - math.Cos(turn/float64(steps)/2))}
	for i := range steps + 1 {
		w.places = append(w.places, g.Range.Place(float64(i)/float64(steps)))
	}
	return w
}

// slotOf is the pin hole swept along the range of a pivot, counter-clockwise; empty if it would close
// on itself.
func slotOf(r linkage.Range, radius float64) outline.Outline {
	if r.Radius > 0 {
		return outline.ArcSlot(r.Centre, r.Radius, r.Start, r.End, radius)
	}
	return outline.Capsule(r.From, r.To, radius)
}
