package job

import (
	"slices"
	"strings"
)

// pins gives every joint that carries one its pin: a joint of two links or more, and a ground joint.
func (r *reader) pins(v *value, top spot, j *Job) []Pin {
	carried := map[string][]string{} // joint to the links on it
	for _, l := range j.Linkage.Links {
		for _, p := range l.Pins {
			carried[p] = append(carried[p], l.Name)
		}
	}
	var names []string
	for _, joint := range j.Linkage.Joints {
		names = append(names, joint.Name)
	}
	standard := v.get("default")
	if standard != nil && standard.has("in") {
		r.fail(standard.get("in").at, "name the joint: B: {bearing: 624, in: [rocker]}", "pins default: one list of links can't be right for all joints")
	}
	own := map[string]*value{}
	for _, e := range v.all() {
		if e.name == "default" {
			continue
		}
		name := r.known(&value{text: e.name, at: e.at, sound: true}, names, "joint", "pins")
		if name == "" {
			continue
		}
		if links := carried[name]; len(links) == 1 && !r.isGround(name, j) {
			r.fail(e.at, "take it out; a pen hole is foot: {at: "+name+", radius: 9mm, pen: 5mm} on the link", "pins: joint %s is on link %s alone: it carries no pin", name, links[0])
			continue
		}
		own[name] = e.value
	}
	var out []Pin
	var without []string
	for _, joint := range j.Linkage.Joints {
		links := carried[joint.Name]
		if len(links) == 0 || len(links) == 1 && joint.Ground == nil {
			continue
		}
		if own[joint.Name] == nil && standard == nil {
			without = append(without, joint.Name)
			continue
		}
		at := v.at
		if o := own[joint.Name]; o != nil {
			at = o.at
		}
		out = append(out, r.pin(joint.Name, own[joint.Name], standard, links, at, j))
	}
	if len(without) > 0 && (v == nil || v.isWhole()) {
		at := top
		if v != nil {
			at = v.at
		}
		r.fail(at, "write pins: {default: {bolt: M4, fit: medium}}", "no pin is given for joint%s %s", plural(len(without)), allOf(without))
	}
	if standard != nil && len(own) == len(out) && len(out) > 0 {
		// Every joint has its own: the default is checked all the same.
		r.pin("default", nil, standard, nil, standard.at, j)
	}
	return out
}

func (r *reader) isGround(joint string, j *Job) bool {
	for _, other := range j.Linkage.Joints {
		if other.Name == joint {
			return other.Ground != nil
		}
	}
	return false
}

// pinKinds are the keys that tell the kind of a pin.
func pinKind(v *value) PinKind {
	switch {
	case v.has("bearing"):
		return BearingPin
	case v.has("shaft"):
		return ShaftPin
	case v.has("bolt"):
		return BoltPin
	}
	return ""
}

// pin puts together what a joint says itself and what the default says. The fit and clearance of the
// default are taken by pins of the default's own kind only: a medium bolt hole is no bearing seat.
func (r *reader) pin(joint string, own, standard *value, links []string, at spot, j *Job) Pin {
	where := "pin " + joint
	whose := func(v *value) string { // errors in the default are told once, not for every joint
		if v != nil && v.within(standard) {
			return "pins default"
		}
		return where
	}
	p := Pin{Joint: joint, Kind: pinKind(own)}
	if p.Kind == "" {
		p.Kind = pinKind(standard)
	}
	for _, v := range []*value{own, standard} {
		if v != nil && v.has("shaft") && (v.has("bolt") || v.has("bearing")) {
			r.fail(v.at, "keep one of them", "%s: shaft excludes bolt and bearing", whose(v))
			return p
		}
		if v != nil && v.has("fit") && v.has("clearance") {
			r.fail(v.get("clearance").at, "keep one of them", "%s: fit and clearance exclude each other", whose(v))
		}
	}
	if p.Kind == "" {
		if own == nil {
			r.fail(standard.at, pinAdvice, "pins default: neither bolt, bearing nor shaft is said")
		} else {
			r.fail(at, pinAdvice, "%s: neither bolt, bearing nor shaft is said", where)
		}
		return p
	}
	pick := func(key string) *value {
		if own.has(key) {
			return own.get(key)
		}
		return standard.get(key)
	}
	fit := own.get("fit")
	clearance := own.get("clearance")
	if fit == nil && clearance == nil && pinKind(standard) == p.Kind {
		fit, clearance = standard.get("fit"), standard.get("clearance")
	}
	if clearance.ok() {
		c := clearance.number
		p.Clearance = &c
	}
	if p.Kind == ShaftPin {
		for _, key := range []string{"head", "nut"} {
			if own.has(key) && own.has("shaft") {
				r.fail(own.get(key).at, "take it out", "%s: a plain shaft has no %s", where, key)
			}
		}
	} else {
		p.Head, p.Nut = pick("head").textOr("socket"), pick("nut").textOr("lock")
	}
	p.Washer = pick("washer").textOr("normal")
	switch p.Kind {
	case ShaftPin:
		p.Shaft = pick("shaft").numberOr(0)
		p.Fit = r.shaftFit(fit, whose(fit), "running")
	case BearingPin:
		p.Bearing = r.bearing(pick("bearing"))
		p.Fit = r.shaftFit(fit, whose(fit), "press")
		p.Bolt = r.bearingBolt(own, standard, p.Bearing, where)
		p.Seats = r.seats(own, links, joint, where, at, j)
	default:
		bolt := pick("bolt")
		p.Bolt = r.bolt(bolt)
		p.Fit = r.boltFit(fit, p.Bolt, whose(fit))
	}
	if p.Clearance != nil {
		p.Fit = ""
	}
	if p.Kind != BearingPin && own.has("in") {
		r.fail(own.get("in").at, "take it out", "%s: only a bearing sits in a link", where)
	}
	return p
}

// seats are the parts that the bearing is pressed into.
func (r *reader) seats(own *value, links []string, joint, where string, at spot, j *Job) []string {
	in := own.get("in")
	if in == nil {
		if own != nil && len(links) > 0 {
			r.fail(at, "write in: ["+links[len(links)-1]+"]", "%s: which link the bearing sits in is not said", where)
		}
		return nil
	}
	possible := append([]string{}, links...)
	if j.Frame != nil && r.isGround(joint, j) {
		for _, plate := range j.Frame.Plates {
			if slices.Contains(plate.Pivots, joint) {
				possible = append(possible, plate.Name)
			}
		}
	}
	var out []string
	for _, v := range in.each() {
		name := r.known(v, possible, "link", where)
		if name == "" {
			continue
		}
		if slices.Contains(out, name) {
			r.fail(v.at, "keep one of them", "%s: link %s is named twice", where, name)
			continue
		}
		out = append(out, name)
	}
	return out
}

// bearingBolt is the bolt through a bearing's bore: the pin's own, else the default's when it goes
// through, else the one that fills the bore.
func (r *reader) bearingBolt(own, standard *value, bearing, where string) string {
	bolt := own.get("bolt")
	if bolt == nil && standard.has("bearing") {
		bolt = standard.get("bolt")
	}
	bore, ok := bearingBore(bearing)
	if bolt != nil {
		name := r.bolt(bolt)
		if d, known := boltDiameter(name); ok && known && (d > bore || d < bore-1) {
			r.fail(bolt.at, "the bore wants "+boltFor(bore), "%s: bolt %s of %s mm in a bore of %s mm", where, name, figure(d), figure(bore))
		}
		return name
	}
	if !ok {
		return ""
	}
	fills := boltFor(bore)
	if fills == "" && bearing != "" {
		r.fail(own.get("bearing").at, "say bolt too: {bearing: "+bearing+", bolt: M4}", "%s: no bolt fills the bore of %s mm", where, figure(bore))
	}
	return fills
}

// bolt reads the designation of a bolt.
func (r *reader) bolt(v *value) string {
	if !v.ok() {
		return ""
	}
	if _, known := boltDiameter(v.text); known {
		return v.text
	}
	hint := meant(v.text, boltNames())
	if strings.HasPrefix(v.text, "m") {
		if _, known := boltDiameter("M" + v.text[1:]); known {
			hint = "write M" + v.text[1:]
		}
	}
	if _, known := boltDiameter("M" + v.text); known {
		hint = "write M" + v.text + " for the metric bolt"
	}
	if hint == "" {
		hint = "the bolts are " + allOf(boltNames())
	}
	r.fail(v.at, hint, "unknown bolt %s", short(v.text))
	return ""
}

func (r *reader) bearing(v *value) string {
	if !v.ok() {
		return ""
	}
	if _, known := bearingBore(v.text); known {
		return v.text
	}
	hint := meant(v.text, bearingNames())
	if hint == "" {
		hint = "the bearings are " + allOf(bearingNames())
	}
	r.fail(v.at, hint, "unknown bearing %s", short(v.text))
	return ""
}

var (
	metricFits = []string{"fine", "medium", "coarse"}
	inchFits   = []string{"close", "normal", "loose"}
	plainFits  = []string{"running", "sliding", "push", "press"}
)

// boltFit reads the class of a bolt hole: ISO 273 for metric bolts, ASME B18.2.8 for inch bolts; the
// middle class when none is stated.
func (r *reader) boltFit(v *value, bolt, where string) string {
	classes, other, standard := metricFits, inchFits, "ISO 273"
	if bolt != "" && !strings.HasPrefix(bolt, "M") {
		classes, other, standard = inchFits, metricFits, "ASME B18.2.8"
	}
	if v == nil {
		return classes[1]
	}
	if !v.ok() || bolt == "" || slices.Contains(classes, v.text) {
		return v.text
	}
	if where != "" {
		where += ": "
	}
	switch {
	case slices.Contains(other, v.text):
		for i := range other {
			if other[i] == v.text {
				r.fail(v.at, "write fit: "+classes[i], "%s%s is not a class of %s, by which bolt %s goes", where, v.text, standard, bolt)
			}
		}
	case slices.Contains(plainFits, v.text) || isHoleClass(v.text):
		r.fail(v.at, "write "+oneOf(classes)+", or clearance: 0.2mm", "%s%s is a fit of shafts and bearings; bolt %s goes by %s", where, v.text, bolt, standard)
	default:
		hint := meant(v.text, classes)
		if hint == "" {
			hint = "write " + oneOf(classes) + ", or clearance: 0.2mm"
		}
		r.fail(v.at, hint, "%sunknown fit %s", where, short(v.text))
	}
	return ""
}

// shaftFit reads the fit of a shaft in its hole or of a bearing in its seat.
func (r *reader) shaftFit(v *value, where, fallback string) string {
	if v == nil {
		return fallback
	}
	if !v.ok() || slices.Contains(plainFits, v.text) || isHoleClass(v.text) {
		return v.text
	}
	hint := meant(v.text, append(append([]string{}, plainFits...), "H7", "H8"))
	if hint == "" {
		hint = "write " + oneOf(plainFits) + ", a hole class such as H7, or clearance: 0.02mm"
	}
	if slices.Contains(metricFits, v.text) || slices.Contains(inchFits, v.text) {
		r.fail(v.at, "write "+oneOf(plainFits)+", a hole class such as H7, or clearance: 0.02mm", "%s: %s is a fit of bolts", where, v.text)
		return ""
	}
	r.fail(v.at, hint, "%s: unknown fit %s", where, short(v.text))
	return ""
}
