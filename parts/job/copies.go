package job

import (
	"strconv"
	"strings"
)

// copies reads the copies and counts them out; one without a name when there are none.
func (r *reader) copies(v *value) []Copy {
	if v == nil {
		return []Copy{{}}
	}
	var out []Copy
	taken := map[string]bool{}
	for i, c := range v.each() {
		count := int(c.get("count").numberOr(1))
		name := c.get("name").textOr("")
		if !c.has("name") && (len(v.items) > 1 || count > 1) {
			r.fail(c.at, "write name: left", "copy %d has no name, and there are several", i+1)
			continue
		}
		phases := make([]float64, count)
		if p := c.get("phase"); p != nil {
			switch {
			case p.form.kind == aList:
				if c.get("count") != nil && !c.get("count").ok() {
					break
				}
				if len(p.items) != count && p.sound {
					r.fail(p.at, "give a phase for each copy, or one for all", "%s: %s for %s", nameOr(name, "copy"), counted(len(p.items), "phase"), counted(count, "copy"))
					break
				}
				for k, item := range p.items {
					phases[k] = item.numberOr(0)
				}
			default:
				for k := range phases {
					phases[k] = p.numberOr(0)
				}
			}
		}
		for k := range count {
			full := name
			if count > 1 {
				full = name + "-" + strconv.Itoa(k+1)
			}
			if taken[strings.ToLower(full)] && (name != "" || !c.has("name")) {
				at := c.at
				if c.has("name") {
					at = c.get("name").at
				}
				r.fail(at, "give each copy a name of its own", "copy %s is named twice", full)
				break
			}
			taken[strings.ToLower(full)] = true
			out = append(out, Copy{Name: full, Phase: phases[k], Mirror: c.get("mirror").isTrue()})
			r.places["copies."+full] = c.at.Position
		}
		if name != "" {
			r.places["copies."+name] = c.at.Position
		}
	}
	return out
}
