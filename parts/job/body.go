package job

import (
	"slices"

	"pinwright/parts/outline"
)

// Body is the machine that the copies stand on: one above the other in the side view, on one shaft or
// on shafts side by side, which all turn together and the same way.
type Body struct {
	Order   []int           // indices of Copies, from the lowest up
	Spacing float64         // height from one copy to the next, mm; 0: the least at which they never touch
	Shafts  []outline.Point // by copy, in the order of Copies: where the origin of its linkage lies
}

// body reads the body.
func (r *reader) body(v *value, j *Job) *Body {
	if v == nil {
		return nil
	}
	b := &Body{Spacing: v.get("spacing").numberOr(0), Shafts: make([]outline.Point, len(j.Copies))}
	var names []string
	for _, c := range j.Copies {
		names = append(names, c.Name)
	}
	if len(j.Copies) < 2 {
		r.fail(v.at, "write copies, or take body out", "a body for one copy: there is nothing to stand apart")
		return b
	}
	for i := range j.Copies {
		b.Order = append(b.Order, i)
	}
	if o := v.get("order"); o.ok() {
		b.Order = nil
		for _, item := range o.each() {
			if !item.ok() {
				return b
			}
			i := slices.Index(names, r.known(item, names, "copy", "body"))
			switch {
			case i < 0:
				return b
			case slices.Contains(b.Order, i):
				r.fail(item.at, "keep one of them", "body: copy %s stands in the order twice", names[i])
				return b
			}
			b.Order = append(b.Order, i)
		}
		for i, n := range names {
			if !slices.Contains(b.Order, i) {
				r.fail(o.at, "name all copies, from the lowest up", "body: copy %s is missing in the order", n)
			}
		}
	}
	for _, e := range v.get("shafts").all() {
		i := slices.Index(names, r.known(&value{text: e.name, at: e.at, sound: true}, names, "copy", "body"))
		if i >= 0 && e.value.ok() {
			b.Shafts[i] = outline.Point{X: e.value.x, Y: e.value.y}
		}
	}
	return b
}
