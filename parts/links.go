package parts

import (
	"math"
	"slices"

	"pinwright/parts/job"
	"pinwright/parts/outline"
)

// link makes one link of one copy.
func (k *maker) link(c job.Copy, i int) {
	l := k.job.Links[i]
	pins := k.job.Linkage.Links[i].Pins
	frame := k.linkage.LinkFrame(l.Name)
	if len(frame) != len(pins) || len(frame) < 2 {
		k.fail("linkage.links."+l.Name, "", "link %s: the linkage gives no places for its pins", l.Name)
		return
	}
	axis, zero := k.axis(c, l.Name, pins, frame)
	path := "linkage.links." + l.Name
	// The region is made as drawn and mirrored afterwards, so the direction is mirrored beforehand.
	drawn := zero
	if c.Mirror {
		drawn = -zero
	}
	before := k.faults
	seats := k.seats(l, pins, frame, axis, drawn)
	if k.faults > before {
		return
	}
	outer, ok := k.body(l, seats)
	if !ok || k.faults > before {
		return
	}
	var drills []drilling
	var n note
	n.path = path
	for _, s := range seats {
		at := outline.Place(0, false, s.at)
		for _, d := range s.holes {
			d.hole.Centre = at.Apply(d.hole.Centre)
			d.shape = d.shape.Transform(at)
			drills = append(drills, d)
		}
		if s.cover > 0 {
			n.covers = append(n.covers, outline.Disc{Centre: s.at, Radius: s.cover})
		}
	}
	if l.Windows {
		n.window = k.windows(l, seats)
	}
	p := Part{Name: partName(c, l.Name), Link: l.Name, Copy: c.Name, Stock: l.Stock, Plane: l.Plane}
	p.Region.Outer = outer
	for _, d := range drills {
		p.Region.Holes = append(p.Region.Holes, d.shape)
		p.Holes = append(p.Holes, d.hole)
	}
	if l.PhaseMark {
		n.phase = degrees(c.Phase)
		if line, ok := k.phaseLine(p.Region, seats, pins, axis, drawn, l); ok {
			n.lines = append(n.lines, line)
		}
	}
	if !k.sound(p, path) {
		return
	}
	if c.Mirror {
		p, n = mirror(p, n, mirrored())
	}
	k.parts = append(k.parts, p)
	k.notes = append(k.notes, n)
}

// axis returns the ground joint about which a driven link turns and the direction that points along
// the linkage's x axis when the job's drive is at angle 0, in the frame of the part as it is built;
// "" and 0 for other links.
//
// In a copy with phase f the line from the axis to the link's next pin then points to f; in a mirrored
// copy to pi - f, since the whole linkage is mirrored about its y axis.
func (k *maker) axis(c job.Copy, link string, pins []string, frame []outline.Point) (string, float64) {
	if k.job.Linkage.Drive.Link != link {
		return "", 0
	}
	for i, joint := range pins {
		for _, g := range k.job.Linkage.Joints {
			if g.Name != joint || g.Ground == nil {
				continue
			}
			arm := frame[(i+1)%len(frame)].Sub(frame[i]).Angle()
			if c.Mirror {
				return joint, -arm - (math.Pi - c.Phase)
			}
			return joint, arm - c.Phase
		}
	}
	return "", 0
}

// windows is what the windows of a link keep to: the given rim or twice the web, and the material
// that the edge rule wants round the holes.
func (k *maker) windows(l job.Link, seats []seat) *windows {
	r := k.rule(l.Stock)
	w := &windows{rim: l.Rim, corner: max(2, r.web/2)}
	if w.rim == 0 {
		w.rim = 2 * r.wide
	}
	if w.rim < r.web {
		k.fail("linkage.links."+l.Name+".rim", "make the rim at least "+upTo(r.web)+" mm",
			"link %s: a rim of %s mm is less than the %s mm that %s wants", l.Name, millimetres(w.rim), millimetres(r.web), r.name)
		w.rim = r.web
	}
	for _, s := range seats {
		if len(s.holes) > 0 {
			w.joints = append(w.joints, outline.Disc{Centre: s.at, Radius: max(s.wanted, s.least, s.cover)})
		}
	}
	return w
}

// mirror moves a part and its note by a mirroring motion.
func mirror(p Part, n note, t outline.Transform) (Part, note) {
	p.Region = p.Region.Transform(t)
	p.Holes = slices.Clone(p.Holes)
	for i := range p.Holes {
		p.Holes[i].Centre = t.Apply(p.Holes[i].Centre)
	}
	n.lines = slices.Clone(n.lines)
	for i := range n.lines {
		n.lines[i] = n.lines[i].Transform(t)
	}
	n.covers = slices.Clone(n.covers)
	for i := range n.covers {
		n.covers[i].Centre = t.Apply(n.covers[i].Centre)
	}
	if n.window != nil {
		w := *n.window
		w.joints = slices.Clone(w.joints)
		for i := range w.joints {
			w.joints[i].Centre = t.Apply(w.joints[i].Centre)
		}
		n.window = &w
	}
	return p, n
}
