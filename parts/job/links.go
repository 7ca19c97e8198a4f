package job

import (
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
		j.Links = append(j.Links, r.rules(&drafts[i], drafts, d, j))
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
		if slices.Contains(dr.pins, known) {
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
				if !slices.Contains(dr.pins, end.text) {
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
		if slices.ContainsFunc(drafts, func(d draft) bool { return slices.Contains(d.pins, joint.Name) }) {
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

// rules reads how a link is built.
func (r *reader) rules(dr *draft, drafts []draft, d defaults, j *Job) Link {
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
	if v.has("plane") {
		r.planeSound[dr.name] = v.get("plane").ok()
	} else {
		l.PlaneFree = true
	}
	r.shape(&l, dr, j)
	l.Foot = r.foot(dr, drafts)
	l.Bores = r.bores(dr)
	return l
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
				if slices.Contains(a.pins, p) {
					r.fail(b.v.get("plane").at, "give one of them another plane", "links %s and %s share joint %s and both lie on plane %d", a.name, b.name, p, j.Links[i].Plane)
					break
				}
			}
		}
	}
}
