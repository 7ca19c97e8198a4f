package job

import "slices"

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
			if other.name != dr.name && slices.Contains(other.pins, f.At) {
				r.fail(v.get("pen").at, "trace a joint of this link alone", "foot of link %s: joint %s carries a pin (link %s is on it too), so there is no room for a pen", dr.name, f.At, other.name)
				break
			}
		}
	}
	return f
}
