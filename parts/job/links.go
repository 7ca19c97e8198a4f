package job

import (
	"math"
	"slices"

	"pinwright/parts/linkage"
	"pinwright/parts/outline"
)

// draft is a link in the making.
type draft struct {
	name    string
	v       *value // nil for a link that only the table names
	at      spot
	pins    []string
	meant   map[string]string // misspelt joints, and what they were taken for
	lengths []stated          // as given: link, then table
	sound   bool              // pins and lengths are right so far: what follows from them may be checked
}

// stated is a length and where it is said.
type stated struct {
	a, b string
	mm   float64
	at   spot
	from string // "this file" or "the table", for messages
}

func (s stated) pair() string { return s.a + "-" + s.b }

func (s stated) joins(a, b string) bool {
	return s.a == a && s.b == b || s.a == b && s.b == a
}

// linkage reads joints, links, drive and trace, and the build rules of the links.
//
//  1. Joints as listed; with a cycle table, moving joints of its columns too.
//  2. Pins of each link: as stated, or the places' names, or those of the table.
//  3. Lengths: stated, from places, from the table, from the cycle; each pair once, agreeing.
//  4. What must hold between them: rigid, closing triangles, one drive on a ground pin, planes.
func (r *reader) linkage(v *value, d defaults, j *Job) {
	joints := r.joints(v.get("joints"))
	rows, tableSound := r.lengthTable(v.get("table"))
	cyc := r.cycle(v.get("cycle"))
	drafts := r.drafts(v.get("links"), rows)
	if cyc != nil {
		joints = r.jointsOfCycle(joints, cyc, drafts)
	}
	var names []string
	tableSound = tableSound && (v.get("table") == nil || v.get("table").ok())
	if v.has("cycle") && cyc == nil {
		joints = joinedByPins(joints, drafts)
	}
	names = names[:0]
	for i := range joints {
		names = append(names, joints[i].Name)
	}
	pinsSound := tableSound && (v.get("cycle") == nil || cyc != nil) && v.get("links").isWhole() && v.get("joints").isWhole()
	for i := range drafts {
		dr := &drafts[i]
		r.pinsOf(dr, names, rows, tableSound)
		r.placeNames(dr)
		pinsSound = pinsSound && dr.sound
		r.lengthsOf(dr, rows, cyc, tableSound && (cyc != nil || !v.has("cycle")))
		j.Linkage.Links = append(j.Linkage.Links, linkage.Link{Name: dr.name, Pins: dr.pins, Lengths: lengthsMM(dr.lengths)})
	}
	j.Linkage.Joints = joints
	if pinsSound {
		r.unused(v, joints, drafts, cyc)
	}
	r.drive(v.get("links"), drafts, joints, j)
	seen := map[string]bool{}
	for _, t := range v.get("trace").each() {
		name := r.known(t, names, "joint", "trace")
		if name == "" {
			continue
		}
		if seen[name] {
			r.fail(t.at, "keep one of them", "trace names joint %s twice", name)
			continue
		}
		seen[name] = true
		j.Linkage.Trace = append(j.Linkage.Trace, name)
	}
	for i := range drafts {
		j.Links = append(j.Links, r.build1(&drafts[i], drafts, d, j))
	}
	r.planeClashes(drafts, j)
}

// joints reads the joints in the order of the file.
func (r *reader) joints(v *value) []linkage.Joint {
	var out []linkage.Joint
	for _, e := range v.all() {
		joint := linkage.Joint{Name: e.name}
		if e.name == "default" {
			r.fail(e.at, "call it something else", "a joint can't be called default: in pins that word stands for all joints")
		}
		g, near := e.value.get("ground"), e.value.get("near")
		if g != nil && near != nil {
			r.fail(near.at, "keep ground for a pivot in the frame, near for a moving joint", "joint %s is ground and near at once", e.name)
		}
		if g != nil {
			joint.Ground = r.groundOf(g)
			r.groundAt[e.name] = joint.Ground.At
			if g.ok() {
				for _, other := range out {
					if other.Ground != nil && r.fixedAt(other, joint) {
						r.fail(g.at, "make them one joint", "joints %s and %s are at the same place", other.Name, joint.Name)
						break
					}
				}
			}
		} else if near.ok() {
			p := pointOf(near)
			joint.Near = &p
		}
		out = append(out, joint)
	}
	return out
}

func (r *reader) fixedAt(a, b linkage.Joint) bool {
	return a.Ground.Range == nil && b.Ground.Range == nil && a.Ground.At == b.Ground.At
}

// drafts lists the links: those of the file in their order, then those that only the table names.
func (r *reader) drafts(v *value, rows []lengthRow) []draft {
	var out []draft
	for _, e := range v.all() {
		out = append(out, draft{name: e.name, v: e.value, at: e.at, sound: e.value.sound, meant: map[string]string{}})
	}
	for _, row := range rows {
		if !slices.ContainsFunc(out, func(d draft) bool { return d.name == row.link }) {
			out = append(out, draft{name: row.link, at: row.linkAt, sound: true, meant: map[string]string{}})
			r.places["linkage.links."+row.link] = row.linkAt.Position
		}
	}
	return out
}

// pinsOf finds the pins of a link.
func (r *reader) pinsOf(dr *draft, joints []string, rows []lengthRow, tableSound bool) {
	add := func(name string, at spot) {
		v := &value{text: name, at: at, sound: true}
		known := r.known(v, joints, "joint", "link "+dr.name)
		if known == "" {
			dr.sound = false
			return
		}
		if known != name {
			dr.meant[name] = known
		}
		if contains(dr.pins, known) {
			if known == name {
				r.fail(at, "name each joint once", "link %s has pin %s twice", dr.name, name)
			}
			dr.sound = false
			return
		}
		dr.pins = append(dr.pins, known)
	}
	places := dr.v.get("at")
	switch {
	case dr.v.has("pins"):
		for _, p := range dr.v.get("pins").each() {
			if p.ok() {
				add(p.text, p.at)
			} else {
				dr.sound = false
			}
		}
		if !dr.v.get("pins").ok() {
			dr.sound = false
			return
		}
	case places != nil:
		for _, e := range places.all() {
			add(e.name, e.at)
		}
	default:
		for _, row := range rows {
			if row.link != dr.name {
				continue
			}
			for _, end := range []cell{row.from, row.to} {
				if !contains(dr.pins, end.text) {
					add(end.text, end.at)
				}
			}
		}
		if len(dr.pins) == 0 {
			if tableSound && dr.sound {
				r.fail(dr.at, "write pins: [A, B]", "link %s has no pins", dr.name)
			}
			dr.sound = false
		}
	}
	if dr.sound && len(dr.pins) == 1 {
		r.fail(dr.at, "a link joins two joints or more; a foot is a joint of its own, {near: [x, y]}", "link %s has one pin only, %s", dr.name, dr.pins[0])
		dr.sound = false
	}
}

// placeNames lets At find the pins of links that the table names.
func (r *reader) placeNames(dr *draft) {
	if _, ok := r.places["linkage.links."+dr.name+".pins"]; !ok {
		r.places["linkage.links."+dr.name+".pins"] = dr.at.Position
	}
}

// joinedByPins adds the joints that links name and the job does not list: with a cycle table that
// could not be read, they may be in it.
func joinedByPins(joints []linkage.Joint, drafts []draft) []linkage.Joint {
	for _, d := range drafts {
		for _, p := range d.v.get("pins").each() {
			if p.ok() && !slices.ContainsFunc(joints, func(j linkage.Joint) bool { return j.Name == p.text }) {
				joints = append(joints, linkage.Joint{Name: p.text})
			}
		}
	}
	return joints
}

// unused reports joints on no link.
func (r *reader) unused(v *value, joints []linkage.Joint, drafts []draft, cyc *cycleTable) {
	listed := v.get("joints")
	for _, joint := range joints {
		if slices.ContainsFunc(drafts, func(d draft) bool { return contains(d.pins, joint.Name) }) {
			continue
		}
		for _, e := range listed.all() {
			if e.name == joint.Name {
				r.fail(e.at, "take it out, or name it in the pins of a link", "joint %s is on no link", joint.Name)
			}
		}
	}
	if cyc == nil {
		return
	}
	for _, c := range cyc.columns {
		if !slices.ContainsFunc(joints, func(j linkage.Joint) bool { return j.Name == c.joint }) {
			r.fail(c.at, "take the column out, or name the joint in the pins of a link", "joint %s of the cycle is on no link", c.joint)
		}
	}
}

// drive finds the one driven link.
func (r *reader) drive(links *value, drafts []draft, joints []linkage.Joint, j *Job) {
	var driven *draft
	allSound := links.isWhole()
	for i := range drafts {
		dr := &drafts[i]
		d := dr.v.get("drive")
		if d == nil {
			continue
		}
		if driven != nil {
			r.fail(d.at, "take one of them out", "links %s and %s are both driven; one drive moves the linkage", driven.name, dr.name)
			continue
		}
		driven = dr
		out := linkage.Drive{Link: dr.name, From: 0, To: fullTurn, Full: true}
		if d.form.kind == aTable {
			from, to := d.get("from"), d.get("to")
			out = linkage.Drive{Link: dr.name, From: from.numberOr(0), To: to.numberOr(0)}
			if from.ok() && to.ok() {
				switch run := to.number - from.number; {
				case run <= 0:
					r.fail(to.at, "the drive runs counter-clockwise: write from: "+degrees(to.number)+"deg, to: "+degrees(from.number)+"deg for the same way backwards, or add a turn to the end",
						"the drive goes from %s to %s deg", degrees(from.number), degrees(to.number))
				case run > fullTurn+1e-9:
					r.fail(to.at, "write drive: full-turn", "the drive goes %s deg, more than a turn", degrees(run))
				case run > fullTurn-1e-9:
					r.fail(d.at, "write drive: full-turn", "the drive goes a whole turn")
				}
			}
		}
		j.Linkage.Drive = out
		if !dr.sound {
			continue
		}
		var ground []string
		for _, p := range dr.pins {
			for _, joint := range joints {
				if joint.Name == p && joint.Ground != nil {
					ground = append(ground, p)
				}
			}
		}
		switch {
		case len(ground) == 0 && len(dr.pins) > 1:
			r.fail(d.at, "drive a link with a ground pivot, or give one of its joints ground: [x, y]", "link %s is driven, but none of its joints %s is a ground pivot", dr.name, allOf(dr.pins))
		case len(ground) > 1:
			r.fail(d.at, "leave it one ground pivot", "link %s is driven, but held by %d ground pivots, %s: it can't turn", dr.name, len(ground), allOf(ground))
		}
	}
	if driven == nil && allSound && len(drafts) > 0 {
		r.fail(links.at, "give the crank drive: full-turn, or drive: {from: 20deg, to: 160deg}", "no link is driven")
	}
}

// build1 reads how a link is built.
func (r *reader) build1(dr *draft, drafts []draft, d defaults, j *Job) Link {
	v := dr.v
	where := "link " + dr.name
	l := Link{
		Name:      dr.name,
		Plane:     int(v.get("plane").numberOr(0)),
		Width:     v.get("width").numberOr(d.width),
		Waist:     v.get("waist").numberOr(0),
		Bend:      v.get("bend").numberOr(0),
		Fillet:    v.get("fillet").numberOr(d.fillet),
		Windows:   v.get("windows").isTrue(),
		Rim:       v.get("rim").numberOr(d.rim),
		PhaseMark: v.get("phase-mark").isTrue(),
		Stock:     r.stockName(v.get("stock"), where, dr.at, d, j.Stock),
	}
	for _, a := range v.get("around").each() {
		l.Around = append(l.Around, outline.Disc{Centre: pointOf(a.get("at")), Radius: a.get("radius").numberOr(0)})
	}
	switch {
	case v == nil:
		r.fail(dr.at, "write "+dr.name+": {plane: 1} under links", "link %s of the table has no plane", dr.name)
	case !v.has("plane") && v.torn:
	case !v.has("plane"):
		r.fail(dr.at, planeAdvice, "link %s has no plane", dr.name)
	default:
		r.planeSound[dr.name] = v.get("plane").ok()
	}
	r.shape(&l, dr, j)
	l.Foot = r.foot(dr, drafts)
	l.Bores = r.bores(dr)
	return l
}

// foot reads the toe.
func (r *reader) foot(dr *draft, drafts []draft) *Foot {
	v := dr.v.get("foot")
	if !v.ok() {
		return nil
	}
	f := &Foot{Radius: v.get("radius").numberOr(0), Pen: v.get("pen").numberOr(0)}
	if dr.sound {
		f.At = r.known(v.get("at"), dr.pins, "pin", "foot of link "+dr.name)
	}
	if f.Pen > 0 && f.Radius > 0 && f.Pen >= 2*f.Radius {
		r.fail(v.get("pen").at, "make the foot larger or the pen thinner", "foot of link %s: a pen of %s mm leaves nothing of a toe of %s mm across", dr.name, figure(f.Pen), figure(2*f.Radius))
	}
	if f.Pen > 0 && f.At != "" {
		for _, other := range drafts {
			if other.name != dr.name && contains(other.pins, f.At) {
				r.fail(v.get("pen").at, "trace a joint of this link alone", "foot of link %s: joint %s carries a pin (link %s is on it too), so there is no room for a pen", dr.name, f.At, other.name)
				break
			}
		}
	}
	return f
}

// bores reads the holes that differ.
func (r *reader) bores(dr *draft) []Bore {
	var out []Bore
	for _, e := range dr.v.get("bores").all() {
		v := e.value
		if dr.sound && r.known(&value{text: e.name, at: e.at, sound: true}, dr.pins, "pin", "bores of link "+dr.name) != e.name {
			continue
		}
		if !v.ok() {
			continue
		}
		b := Bore{Joint: e.name}
		hub := v.get("hub")
		if v.has("flat") && !v.has("d") {
			r.fail(v.get("flat").at, "write d instead of the other key", "bore %s: flat goes with d, the diameter of a hole with a flat", e.name)
			continue
		}
		switch {
		case v.has("round"):
			b.Kind, b.Diameter = RoundBore, v.get("round").numberOr(0)
		case v.has("d"):
			b.Kind, b.Diameter, b.Flat = DBore, v.get("d").numberOr(0), v.get("flat").numberOr(0)
			flat := v.get("flat")
			switch {
			case flat == nil:
				r.fail(v.at, "say how far it is from the flat to the far side: {d: 6mm, flat: 5.5mm}", "bore %s has no flat", e.name)
			case flat.ok() && v.get("d").ok() && (b.Flat >= b.Diameter || b.Flat <= b.Diameter/2):
				r.fail(flat.at, "measure from the flat to the far side of the circle", "bore %s: flat %s mm is not between half and the whole of %s mm", e.name, figure(b.Flat), figure(b.Diameter))
			}
		case v.has("hexagon"):
			b.Kind, b.Across = HexagonBore, v.get("hexagon").numberOr(0)
		case v.has("hub"):
			b.Kind, b.Diameter = HubBore, hub.get("centre").numberOr(0)
			b.Bolts, b.Circle, b.Hole = int(hub.get("bolts").numberOr(0)), hub.get("circle").numberOr(0), hub.get("hole").numberOr(0)
			r.hub(b, hub)
		}
		out = append(out, b)
	}
	return out
}

// hub checks that the holes of a hub do not run into each other.
func (r *reader) hub(b Bore, v *value) {
	if b.Bolts < 2 || b.Circle == 0 || b.Hole == 0 || b.Diameter == 0 {
		return
	}
	if left := (b.Circle - b.Hole - b.Diameter) / 2; left <= 0 {
		r.fail(v.at, "make the circle larger than "+figure(b.Hole+b.Diameter)+" mm", "bore %s: the bolt holes run into the centre hole by %s mm", b.Joint, figure(-left))
		return
	}
	if left := b.Circle*math.Sin(math.Pi/float64(b.Bolts)) - b.Hole; left <= 0 {
		r.fail(v.at, "take fewer bolts or a larger circle", "bore %s: %d holes of %s mm on a circle of %s mm run into each other by %s mm", b.Joint, b.Bolts, figure(b.Hole), figure(b.Circle), figure(-left))
	}
}

// planeClashes reports links that share a joint and a plane.
func (r *reader) planeClashes(drafts []draft, j *Job) {
	for i := range drafts {
		for k := range i {
			a, b := &drafts[k], &drafts[i]
			if !r.planeSound[a.name] || !r.planeSound[b.name] || j.Links[i].Plane != j.Links[k].Plane {
				continue
			}
			for _, p := range b.pins {
				if contains(a.pins, p) {
					r.fail(b.v.get("plane").at, "give one of them another plane", "links %s and %s share joint %s and both lie on plane %d", a.name, b.name, p, j.Links[i].Plane)
					break
				}
			}
		}
	}
}
