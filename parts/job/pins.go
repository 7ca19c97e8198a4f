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
	if standard != nil && standard.has("clamp") {
		r.fail(standard.get("clamp").at, "name the joint: A: {bolt: M4, clamp: crank}", "pins default: one link can't be clamped at all joints")
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
		if links := carried[name]; len(links) == 1 && !r.isGround(name, j) && !e.value.has("rod-end") {
			r.fail(e.at, "take it out; a pen hole is foot: {at: "+name+", radius: 9mm, pen: 5mm} on the link", "pins: joint %s is on link %s alone: it carries no pin", name, links[0])
			continue
		}
		own[name] = e.value
	}
	var out []Pin
	var without []string
	for _, joint := range j.Linkage.Joints {
		links := carried[joint.Name]
		if len(links) == 0 || len(links) == 1 && joint.Ground == nil && !own[joint.Name].has("rod-end") {
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
	case v.has("sleeve"):
		return SleevePin
	case v.has("clamp"):
		return ClampPin
	case v.has("rod-end"):
		return RodEndPin
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
		if !r.oneKind(v, whose) {
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
		for _, key := range []string{"head", "nut", "excess"} {
			if own.has(key) && own.has("shaft") {
				r.fail(own.get(key).at, "take it out", "%s: a plain shaft has no %s", where, key)
			}
		}
	} else {
		p.Head, p.Nut = pick("head").textOr("socket"), pick("nut").textOr("lock")
		p.Excess = pick("excess").numberOr(0)
		if own.has("retain") {
			r.fail(own.get("retain").at, "take it out", "%s: only a plain shaft is kept by collars or rings", where)
		}
	}
	p.Washer = pick("washer").textOr("normal")
	p.Play = r.play(own, pick("play"), p.Kind, whose(pick("play")))
	if b := pick("bolt"); b == nil && (p.Kind == SleevePin || p.Kind == ClampPin || p.Kind == RodEndPin) {
		r.fail(at, "say bolt: M4 too", "%s: %s is said, and not the bolt", where, p.Kind)
		return p
	}
	switch p.Kind {
	case SleevePin:
		p.Bolt = r.bolt(pick("bolt"))
		p.Sleeve = pick("sleeve").numberOr(0)
		p.Fit = r.shaftFit(fit, whose(fit), "running")
		p.Seats = r.seats(own, links, joint, where, at, j)
	case ClampPin:
		p.Bolt = r.bolt(pick("bolt"))
		p.Fit = r.boltFit(fit, p.Bolt, whose(fit))
		p.Clamped = r.known(own.get("clamp"), r.onJoint(links, joint, j), "link", where)
	case RodEndPin:
		p.Bolt = r.bolt(pick("bolt"))
		p.Fit = r.boltFit(fit, p.Bolt, whose(fit))
		p.RodEnd = Side(pick("rod-end").textOr(""))
	case ShaftPin:
		p.Shaft = pick("shaft").numberOr(0)
		p.Retain = Retainer(pick("retain").textOr(""))
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
	if p.Kind != BearingPin && p.Kind != SleevePin && own.has("in") {
		r.fail(own.get("in").at, "take it out", "%s: only a bearing or a sleeve sits in a link", where)
	}
	if own.has("nut") && p.Nut == "none" && (p.Kind == SleevePin || p.Kind == ClampPin || p.Kind == RodEndPin) {
		r.fail(own.get("nut").at, "take it out", "%s: without a nut nothing is clamped", where)
	}
	return p
}

// oneKind checks that what makes a kind of pin is said of one kind alone.
func (r *reader) oneKind(v *value, whose func(*value) string) bool {
	if v == nil {
		return true
	}
	var said []string
	for _, key := range []string{"shaft", "bearing", "sleeve", "clamp", "rod-end"} {
		if v.has(key) {
			said = append(said, key)
		}
	}
	if len(said) > 1 {
		r.fail(v.get(said[1]).at, "keep one of them", "%s: %s and %s exclude each other", whose(v), said[0], said[1])
		return false
	}
	return true
}

// play reads the least and the greatest play wanted; both 0 when nothing is said.
func (r *reader) play(own, v *value, kind PinKind, where string) [2]float64 {
	if !v.ok() {
		return [2]float64{}
	}
	if kind == BearingPin || kind == RodEndPin {
		if own.has("play") {
			r.fail(v.at, "take it out", "%s: the bolt of a %s is tightened and has no play", where, kind)
		}
		return [2]float64{}
	}
	items := v.each()
	if len(items) != 2 || !items[0].ok() || !items[1].ok() {
		return [2]float64{}
	}
	least, most := items[0].number, items[1].number
	if least >= most {
		r.fail(v.at, playAdvice, "%s: play from %s to %s mm: the least must be under the greatest", where, figure(least), figure(most))
		return [2]float64{}
	}
	return [2]float64{least, most}
}

// onJoint are the links and the frame plates at a joint.
func (r *reader) onJoint(links []string, joint string, j *Job) []string {
	possible := slices.Clone(links)
	if j.Frame != nil && r.isGround(joint, j) {
		for _, plate := range j.Frame.Plates {
			if slices.Contains(plate.Pivots, joint) {
				possible = append(possible, plate.Name)
			}
		}
	}
	return possible
}

// seats are the parts that the bearing is pressed into, or that turn on the sleeve.
func (r *reader) seats(own *value, links []string, joint, where string, at spot, j *Job) []string {
	in := own.get("in")
	if in == nil {
		if own != nil && len(links) > 0 {
			r.fail(at, "write in: ["+links[len(links)-1]+"]", "%s: which link the %s sits in is not said", where, pinWhat(own))
		}
		return nil
	}
	possible := r.onJoint(links, joint, j)
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

// pinWhat names what sits in a link.
func pinWhat(own *value) string {
	if pinKind(own) == SleevePin {
		return "sleeve"
	}
	return "bearing"
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
