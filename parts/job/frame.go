package job

import (
	"slices"

	"pinwright/parts/linkage"
	"pinwright/parts/outline"
)

// frame reads the frame; nil when there is none.
func (r *reader) frame(v *value, d defaults, j *Job) *Frame {
	if v == nil {
		return nil
	}
	f := &Frame{
		Stock: r.stockName(v.get("stock"), "frame", v.at, d, j.Stock),
		Width: v.get("width").numberOr(0),
	}
	var ground []string
	for _, joint := range j.Linkage.Joints {
		if joint.Ground != nil {
			ground = append(ground, joint.Name)
		}
	}
	planes := map[int]string{}
	for _, e := range v.get("plates").all() {
		plate := FramePlate{Name: e.name, Plane: int(e.value.get("plane").numberOr(0)), PlaneFree: !e.value.has("plane")}
		if other, taken := planes[plate.Plane]; taken && e.value.get("plane").ok() {
			r.fail(e.value.get("plane").at, "put one of them on a free plane", "plates %s and %s both lie on plane %d", other, e.name, plate.Plane)
		} else if e.value.get("plane").ok() {
			planes[plate.Plane] = e.name
		}
		for _, l := range j.Links {
			if sameName(l.Name, e.name) {
				r.fail(e.at, "give the plate a name of its own", "plate %s has the name of a link", e.name)
			}
		}
		wanted := ground
		if list := e.value.get("pivots"); list != nil {
			wanted = nil
			seen := map[string]bool{}
			for _, p := range list.each() {
				if !p.ok() {
					continue
				}
				name := r.known(p, ground, "ground joint", "plate "+e.name)
				if name == "" {
					continue
				}
				if seen[name] {
					r.fail(p.at, "keep one of them", "plate %s names pivot %s twice", e.name, name)
				}
				seen[name] = true
			}
			for _, g := range ground {
				if seen[g] {
					wanted = append(wanted, g)
				}
			}
		}
		plate.Pivots = wanted
		f.Plates = append(f.Plates, plate)
		if e.value.get("plane").ok() {
			r.plateClash(plate, e.value.get("plane").at, j)
		}
	}
	f.Mount = r.mount(v.get("mount"))
	for _, c := range v.get("cross").each() {
		f.Cross = append(f.Cross, CrossMember{
			At:        pointOf(c.get("at")),
			Angle:     c.get("angle").numberOr(0),
			Width:     c.get("width").numberOr(0),
			Tabs:      int(c.get("tabs").numberOr(2)),
			Stock:     r.crossStock(c.get("stock"), f.Stock, j.Stock),
			Clearance: c.get("clearance").numberOr(0.1),
		})
	}
	if len(f.Cross) > 0 && len(f.Plates) == 1 {
		r.fail(v.get("cross").at, "add a plate, or take the cross members out", "cross members stand between two frame plates, and there is one")
	}
	f.Standoffs = r.standoffs(v.get("standoffs"), f)
	return f
}

// plateClash reports a link on the plane of a plate that carries one of its pivots.
func (r *reader) plateClash(plate FramePlate, at spot, j *Job) {
	for i, l := range j.Linkage.Links {
		if j.Links[i].Plane != plate.Plane || !r.planeSound[l.Name] {
			continue
		}
		for _, p := range plate.Pivots {
			if slices.Contains(l.Pins, p) {
				r.fail(at, "give one of them another plane", "plate %s and link %s share joint %s and both lie on plane %d", plate.Name, l.Name, p, plate.Plane)
				break
			}
		}
	}
}

func (r *reader) crossStock(v *value, frameStock string, stock []Stock) string {
	if v == nil {
		return frameStock
	}
	return r.known(v, stockNames(stock), "stock", "")
}

func (r *reader) mount(v *value) *Mount {
	if v == nil {
		return nil
	}
	m := &Mount{Diameter: v.get("diameter").numberOr(0), Bolt: v.get("bolt").textOr(""), Fit: v.get("fit").textOr("")}
	seen := map[outline.Point]bool{}
	for _, h := range v.get("holes").each() {
		if !h.ok() {
			continue
		}
		p := pointOf(h)
		if seen[p] {
			r.fail(h.at, "keep one of them", "mount: there are two holes at [%s, %s]", figure(p.X), figure(p.Y))
		}
		seen[p] = true
		m.At = append(m.At, p)
	}
	switch {
	case !v.has("bolt") && !v.has("diameter"):
		r.fail(v.at, "say bolt: M4, or diameter: 4.5mm", "mount has neither bolt nor diameter")
	case v.has("diameter") && v.has("fit"):
		r.fail(v.get("fit").at, "take the fit out, or say bolt instead of diameter", "mount has a diameter: there is nothing to fit")
	case v.has("bolt"):
		m.Bolt = r.bolt(v.get("bolt"))
		m.Fit = r.boltFit(v.get("fit"), m.Bolt, "")
	}
	return m
}

// pointOf gives the place, the origin when it is not sound.
func pointOf(v *value) linkage.Point {
	if !v.ok() {
		return linkage.Point{}
	}
	return linkage.Point{X: v.x, Y: v.y}
}
