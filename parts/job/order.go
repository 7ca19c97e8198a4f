package job

import "slices"

// PlanesGiven tells whether the plane of every link and frame plate is given or found.
func (j Job) PlanesGiven() bool {
	free := slices.ContainsFunc(j.Links, func(l Link) bool { return l.PlaneFree })
	if j.Frame != nil {
		free = free || slices.ContainsFunc(j.Frame.Plates, func(p FramePlate) bool { return p.PlaneFree })
	}
	return !free
}

// lying is a link or plate as far as planes go.
type lying struct {
	name  string
	v     *value
	plane *int // nil when none is given
}

// order reads what lies on the same plane as what, and in front of what.
func (r *reader) order(v *value, j *Job) {
	var all []lying
	var names []string
	add := func(name string, v *value, plane int) {
		l := lying{name: name, v: v}
		if v.get("plane").ok() {
			l.plane = &plane
		}
		all, names = append(all, l), append(names, name)
	}
	for _, l := range j.Links {
		add(l.Name, v.get("linkage").get("links").get(l.Name), l.Plane)
	}
	if j.Frame != nil {
		for _, p := range j.Frame.Plates {
			add(p.Name, v.get("frame").get("plates").get(p.Name), p.Plane)
		}
	}
	for i, l := range all {
		if i < len(j.Links) {
			if k := r.other(l.v.get("same-plane-as"), "same-plane-as", l.name, names); k >= 0 {
				j.Links[i].SameAs = names[k]
				if b := all[k]; l.plane != nil && b.plane != nil && *l.plane != *b.plane {
					r.fail(l.v.get("same-plane-as").at, "take it out, or one of the planes", "%s is to lie on the same plane as %s, and is on plane %d, not %d", l.name, b.name, *l.plane, *b.plane)
				}
			}
			j.Links[i].InFrontOf = r.inFront(l, all, names)
		} else {
			j.Frame.Plates[i-len(j.Links)].InFrontOf = r.inFront(l, all, names)
		}
	}
}

// other finds the link or plate that is named; -1 when there is none.
func (r *reader) other(v *value, key, name string, names []string) int {
	if !v.ok() {
		return -1
	}
	known := r.known(v, names, "link or plate", name+": "+key)
	if known == name {
		r.fail(v.at, "name another link or plate", "%s: %s names %s itself", name, key, name)
		return -1
	}
	return slices.Index(names, known)
}

// inFront reads the links and plates that lie behind one.
func (r *reader) inFront(l lying, all []lying, names []string) []string {
	v := l.v.get("in-front-of")
	list := v.each()
	if v.ok() && len(list) == 0 {
		list = []*value{v}
	}
	var out []string
	for _, x := range list {
		k := r.other(x, "in-front-of", l.name, names)
		switch {
		case k < 0:
			continue
		case slices.Contains(out, names[k]):
			r.fail(x.at, "keep one of them", "%s: in-front-of names %s twice", l.name, names[k])
			continue
		}
		if b := all[k]; l.plane != nil && b.plane != nil && *l.plane <= *b.plane {
			r.fail(x.at, "take it out, or one of the planes", "%s is to lie in front of %s, and is on plane %d, not above plane %d", l.name, b.name, *l.plane, *b.plane)
		}
		out = append(out, names[k])
	}
	return out
}
