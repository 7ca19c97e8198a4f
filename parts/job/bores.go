package job

import "math"

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
