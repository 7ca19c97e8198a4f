package job

import (
	"slices"
	"strings"

	"pinwright/parts/outline"
)

// What a tube is taken for when the job does not say. Common practice, no source.
const (
	usualTube = 1000.0 // mm
	usualSaw  = 1.5    // mm, a hacksaw
)

// spacers reads where spacers and sleeves come from.
func (r *reader) spacers(v *value) Spacers {
	if v == nil {
		return Spacers{}
	}
	s := Spacers{Stock: v.get("from").textOr("tube") == "stock"}
	if s.Stock {
		for _, key := range []string{"tube", "saw"} {
			if v.has(key) {
				r.fail(v.get(key).at, "take it out, or say from: tube", "spacers: those of stock lengths are not cut, so there is no %s", key)
			}
		}
	} else {
		s.Tube, s.Saw = v.get("tube").numberOr(usualTube), v.get("saw").numberOr(usualSaw)
		if v.has("lengths") {
			r.fail(v.get("lengths").at, "say from: stock, or take them out", "spacers: stock lengths are given, and the spacers are cut from tube")
		}
	}
	for _, item := range v.get("lengths").each() {
		if !item.ok() {
			continue
		}
		if slices.Contains(s.Lengths, item.number) {
			r.fail(item.at, "keep one of them", "spacers: the length %s mm stands there twice", figure(item.number))
			continue
		}
		s.Lengths = append(s.Lengths, item.number)
	}
	slices.Sort(s.Lengths)
	return s
}

// standoffs reads what keeps the frame plates apart.
func (r *reader) standoffs(v *value, f *Frame) *Standoffs {
	if v == nil {
		return nil
	}
	s := &Standoffs{Head: v.get("head").textOr("socket"), Round: v.get("form").textOr("hexagon") == "round"}
	seen := map[outline.Point]bool{}
	for _, h := range v.get("at").each() {
		if !h.ok() {
			continue
		}
		p := pointOf(h)
		if seen[p] {
			r.fail(h.at, "keep one of them", "standoffs: there are two at [%s, %s]", figure(p.X), figure(p.Y))
		}
		seen[p] = true
		s.At = append(s.At, p)
	}
	if v.has("bolt") {
		s.Bolt = r.bolt(v.get("bolt"))
		if s.Bolt != "" && !strings.HasPrefix(s.Bolt, "M") {
			r.fail(v.get("bolt").at, "say bolt: M3 or bolt: M4", "standoffs: %s is an inch size, and the catalogue holds metric standoffs", s.Bolt)
			s.Bolt = ""
		}
	}
	s.Fit = r.boltFit(v.get("fit"), s.Bolt, "standoffs")
	if len(f.Plates) < 2 {
		r.fail(v.at, "add a plate, or take the standoffs out", "standoffs stand between two frame plates, and there is one")
	}
	return s
}
