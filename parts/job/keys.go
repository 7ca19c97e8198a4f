package job

import (
	"math"
	"slices"
	"strings"
)

// The one table of the job file's keys. The reader checks by it, the schema is written from it, so
// the two can't differ. Bounds are set far outside of what a shop does: they catch slips of unit and
// of the decimal point.

const (
	unitAdvice  = "write units: {length: mm, angle: deg}"
	kerfAdvice  = "kerf is the FULL width that the beam takes away (not the loss on one side): cut a square in this sheet, measure it, and write what is missing; most lasers take 0.1 to 0.3 mm"
	planeAdvice = "state plane: 1 or another whole number, the level in the side view, or leave it out: it is found; links that share a joint lie on different planes"
	pinAdvice   = "say bolt: M4, or bearing: 624, or shaft: 6mm"
	playAdvice  = "say the least and the greatest, play: [0.1mm, 0.3mm]"
)

var jobForm = table("the job file",
	key{name: "job", need: true, form: name(fileName), about: "Name of the job. It names files: letters, digits, hyphens.", advice: "write job: my-mechanism", slips: []string{"name"}},
	key{name: "title", form: text, about: "What it is, in a line of your own words."},
	key{name: "units", form: unitsForm, about: "Units of bare numbers. Without it every number carries its own unit (3mm, 0.25in, 15deg).", slips: []string{"unit"}},
	key{name: "defaults", form: defaultsForm, about: "What links take that don't say otherwise.", slips: []string{"default"}},
	key{name: "linkage", need: true, form: linkageForm, about: "The solved linkage: joints, links, drive.", slips: []string{"mechanism"}},
	key{name: "frame", form: frameForm, about: "The ground as plates with the ground pivots in them. Leave it out when the pivots are somebody else's.", slips: []string{"ground", "base", "chassis"}},
	key{name: "copies", form: listOf(copyForm), about: "How often the linkage is built, at which phase, which of them mirrored. Without it: once."},
	key{name: "body", form: bodyForm, about: "The machine that the copies stand on, one above the other along their shafts, which turn together. Without it: nothing is said about how they stand."},
	key{name: "pins", form: pinsForm, about: "What goes through each joint; default is for all joints that are not named.", advice: "write pins: {default: {bolt: M4, fit: medium}}", slips: []string{"bolts", "hardware"}},
	key{name: "spacers", form: spacersForm, about: "Where spacers and sleeves come from. Left out: cut from tube, without a plan of the cuts.", slips: []string{"spacer", "tube"}},
	key{name: "spare", form: spareForm, about: "Hardware bought on top."},
	key{name: "stock", need: true, form: stocksForm, about: "The sheets on the shelf, each kind by a name of your choice.", advice: "write stock: {clear3: {material: cast acrylic, thickness: 3mm, sheet: [600mm, 400mm], margin: 5mm, kerf: ...}}", slips: []string{"sheets", "materials"}},
)

var unitsForm = table("units",
	key{name: "length", form: choice(unitNames(length)...), about: "Unit of bare lengths.", advice: unitAdvice},
	key{name: "angle", form: choice(unitNames(angle)...), about: "Unit of bare angles.", advice: unitAdvice},
)

var (
	inFrontKey = key{name: "in-front-of", form: either(name(fileName), listOf(name(fileName))), about: "Links and frame plates that must lie on lower planes; nuts are in front, heads behind.", slips: []string{"above", "before"}}
	stockKey   = key{name: "stock", form: name(fileName), about: "Which of the stock it is cut from.", slips: []string{"material", "sheet"}}
	widthKey   = key{name: "width", form: positive(500), about: "Width across bars and arms. Left out: the least that the edge rule allows."}
	filletKey  = key{name: "fillet", form: between(length, 0, 200), about: "Radius of inside corners."}
	rimKey     = key{name: "rim", form: positive(100), about: "Material left round lightening windows. Left out: by the edge rule."}
)

var defaultsForm = table("defaults", stockKey, widthKey, filletKey, rimKey)

var linkageForm = table("linkage",
	key{name: "joints", need: true, form: named(jointName, jointForm), about: "Places where links meet, and traced points.", advice: "write joints: {O: {ground: [0, 0]}, A: {near: [20, 0]}}"},
	key{name: "links", need: true, form: named(fileName, linkForm), about: "The rigid bodies, and how each is built.", advice: "write links: {crank: {pins: [O, A], length: 20mm, drive: full-turn, plane: 1}}", slips: []string{"bars"}},
	key{name: "trace", form: listOf(name(jointName)), about: "Joints whose path is wanted.", slips: []string{"path"}},
	key{name: "table", form: text, about: "CSV file of lengths with the columns link, from, to, length; beside this file."},
	key{name: "cycle", form: cycleForm, about: "CSV file of joint coordinates through the cycle, from which lengths are recovered."},
)

var jointForm = table("joint",
	key{name: "ground", form: groundForm, about: "The joint is a pivot in the frame: [x, y], or adjustable along a line or an arc.", slips: []string{"fixed", "at", "pivot"}},
	key{name: "near", form: place, about: "Roughly where the moving joint is at the start of the drive: it tells which way the loop closes.", slips: []string{"guess", "start"}},
)

var groundForm = either(
	place,
	form{
		kind: aTable, noun: "arc of the pivot",
		keys: []key{
			{name: "centre", need: true, form: place, about: "Centre of the arc."},
			{name: "radius", need: true, form: positive(farthest), about: "Radius of the arc."},
			{name: "from", need: true, form: turn, about: "Angle at which the arc begins."},
			{name: "to", need: true, form: turn, about: "Angle at which it ends, counter-clockwise from its beginning.", advice: "the arc runs counter-clockwise: to is greater than from"},
			{name: "at", form: turn, about: "Angle at which the pivot is set. Left out: the middle."},
		},
	},
	form{
		kind: aTable, noun: "line of the pivot",
		keys: []key{
			{name: "from", need: true, form: place, about: "One end of the line."},
			{name: "to", need: true, form: place, about: "The other end."},
			{name: "at", form: place, about: "Where the pivot is set, on the line. Left out: the middle."},
		},
	},
)

var cycleForm = table("cycle",
	key{name: "file", need: true, form: text, about: "CSV file: a column drive (angle, may be absent) and columns A.x, A.y for each joint; a row for each position."},
	key{name: "tolerance", form: positive(10), about: "By how much a link's length may differ between rows. Left out: 0.01 mm."},
)

var linkForm = table("link",
	key{name: "pins", form: form{kind: aList, item: &jointNameForm, least: 1, most: 24}, about: "Joints on the link. The first is its origin, the second lies on its x axis.", advice: "write pins: [A, B]", slips: []string{"joints", "between"}},
	key{name: "length", form: positive(5000), about: "Distance of the two pins."},
	key{name: "lengths", form: named(pairName, positive(5000)), about: "Distances of pairs of pins, {A-B: 50, B-C: 40}: for n pins 2n-3 of them."},
	key{name: "at", form: named(jointName, place), about: "Places of the pins in a frame of the link's own, instead of lengths.", slips: []string{"places"}},
	key{name: "drive", form: either(choice("full-turn"), driveForm), about: "This link is driven: full-turn, or between two angles. One link of the job has it."},
	key{name: "plane", form: whole(-99, 99), about: "Level in the side view on which the link lies. Left out: it is found.", advice: planeAdvice, slips: []string{"layer", "level", "z"}},
	key{name: "same-plane-as", form: name(fileName), about: "Link or frame plate on whose plane the link must lie."},
	inFrontKey,
	key{name: "shape", form: choice(shapeNames()...), about: "Form of the part. Left out: bar for pins on a line, crank-arm for a driven link of two pins, else plate.", slips: []string{"form", "type"}},
	stockKey,
	widthKey,
	key{name: "waist", form: positive(500), about: "Width at the waist of a waisted bar."},
	key{name: "bend", form: between(length, -1000, 1000), about: "How far the middle of a bent bar lies off its line: positive to the left, going from first to last pin."},
	key{name: "around", form: listOf(obstacleForm), about: "Obstacles that a bent bar goes round, in the link's frame (first pin at [0, 0], second on the x axis).", slips: []string{"obstacles", "avoid"}},
	filletKey,
	key{name: "foot", form: footForm, about: "Rounded toe at a traced joint.", slips: []string{"toe"}},
	key{name: "windows", form: truth, about: "Lightening windows, as the edge distance allows.", slips: []string{"holes", "lightening"}},
	rimKey,
	key{name: "bores", form: named(jointName, boreForm), about: "Holes that differ from what the pin asks for, by joint.", slips: []string{"bore"}},
	key{name: "phase-mark", form: truth, about: "Engraves the direction of the crank on a disc or crank arm.", slips: []string{"mark"}},
)

var jointNameForm = name(jointName)

var driveForm = table("drive",
	key{name: "from", need: true, form: turn, about: "Angle of the driven link at the start, from the x axis, counter-clockwise."},
	key{name: "to", need: true, form: turn, about: "Angle at the end.", advice: "the drive runs counter-clockwise, at most one turn: to is greater than from"},
)

var obstacleForm = table("obstacle",
	key{name: "at", need: true, form: place, about: "Middle of the obstacle.", slips: []string{"centre"}},
	key{name: "radius", need: true, form: positive(1000), about: "Radius to keep clear of."},
)

var footForm = table("foot",
	key{name: "at", need: true, form: name(jointName), about: "Joint under the toe.", slips: []string{"joint"}},
	key{name: "radius", need: true, form: positive(500), about: "Radius of the toe."},
	key{name: "pen", form: positive(50), about: "Diameter of a hole for a pen on the traced point."},
)

var boreForm = form{
	kind: aTable, noun: "bore", exactly: []string{"round", "d", "hexagon", "hub"},
	keys: []key{
		{name: "round", form: positive(300), about: "Diameter of a round hole, finished.", slips: []string{"diameter"}},
		{name: "d", form: positive(300), about: "Diameter of a round hole with one flat, finished; flat says how deep."},
		{name: "flat", form: positive(300), about: "From the flat to the far side of the circle.", advice: "a 6 mm motor shaft is usually {d: 6, flat: 5.5}: measure it"},
		{name: "hexagon", form: positive(300), about: "Across flats of a hexagon pocket.", slips: []string{"hex"}},
		{name: "hub", form: hubForm, about: "Centre hole and a circle of bolt holes."},
	},
}

var hubForm = table("hub",
	key{name: "bolts", need: true, form: whole(2, 60), about: "Number of bolt holes."},
	key{name: "circle", need: true, form: positive(500), about: "Diameter of the bolt circle."},
	key{name: "hole", need: true, form: positive(100), about: "Diameter of the bolt holes, finished."},
	key{name: "centre", need: true, form: positive(300), about: "Diameter of the centre hole, finished."},
)

var frameForm = table("frame",
	key{name: "stock", form: name(fileName), about: "Which of the stock the plates are cut from."},
	key{name: "width", form: positive(500), about: "Width of the rim round the pivots. Left out: by the edge rule."},
	key{name: "plates", need: true, form: named(fileName, plateForm), about: "The plates, by name.", advice: "write plates: {front: {plane: 0}}"},
	key{name: "mount", form: mountForm, about: "Holes by which the frame is screwed to something."},
	key{name: "cross", form: listOf(crossForm), about: "Plates that stand between the frame plates, with tabs in slots."},
	key{name: "standoffs", form: standoffsForm, about: "Bolts with thread in both ends that keep the lowest and the highest plate apart.", slips: []string{"spacers", "pillars"}},
)

var plateForm = table("plate",
	key{name: "plane", form: whole(-99, 99), about: "Level in the side view on which the plate lies. Left out: it is found.", advice: planeAdvice, slips: []string{"layer", "level", "z"}},
	inFrontKey,
	key{name: "pivots", form: listOf(name(jointName)), about: "Ground joints that it carries. Left out: all.", slips: []string{"pins", "joints"}},
)

var mountForm = table("mount",
	key{name: "holes", need: true, form: listOf(place), about: "Places of the holes, in the linkage's coordinates.", slips: []string{"at"}},
	key{name: "bolt", form: text, about: "Bolt that goes through: M4, \"#8\", 1/4."},
	key{name: "fit", form: text, about: "Fit of the bolt: fine, medium, coarse (ISO 273), close, normal, loose (ASME B18.2.8)."},
	key{name: "diameter", form: positive(100), about: "Diameter of the holes, finished, instead of bolt and fit."},
)

var crossForm = table("cross member",
	key{name: "at", need: true, form: place, about: "Middle of its foot on the frame plates, in the linkage's coordinates."},
	key{name: "width", need: true, form: positive(2000), about: "Width of the member, along the frame plate."},
	key{name: "angle", form: turn, about: "Direction of its width on the frame plate. Left out: 0."},
	key{name: "tabs", form: whole(1, 20), about: "Tabs on each side. Left out: 2."},
	key{name: "stock", form: name(fileName), about: "Which of the stock it is cut from. Left out: the frame's."},
	key{name: "clearance", form: between(length, -1, 2), about: "Slot minus measured thickness; negative presses. Left out: 0.1 mm."},
)

var copyForm = table("copy",
	key{name: "name", form: name(fileName), about: "Name of the copy; copies of a count are called name-1, name-2."},
	key{name: "count", form: whole(1, 200), about: "How many. Left out: 1.", slips: []string{"number", "quantity"}},
	key{name: "phase", form: either(turn, listOf(turn)), about: "Angle of the drive ahead of the job's own, one for all or one for each.", slips: []string{"phases", "offset"}},
	key{name: "mirror", form: truth, about: "Built as the mirror image.", slips: []string{"mirrored", "flip"}},
)

var bodyForm = table("body",
	key{name: "order", form: listOf(name(fileName)), about: "Copies by name, from the lowest up. Left out: in their order."},
	key{name: "spacing", form: positive(5000), about: "Height from one copy to the next. Left out: the least at which they never touch, which the tool finds.", slips: []string{"distance", "pitch"}},
	key{name: "shafts", form: named(fileName, place), about: "Where the origin of a copy's linkage lies, by copy, seen along the shafts. Left out: [0, 0] for all, which is one shaft.", slips: []string{"at", "places"}},
)

var pinsForm = form{kind: aNamed, rule: jointName, item: &pinForm, least: 1}

var pinForm = table("pin",
	key{name: "bolt", form: text, about: "Bolt as axle: M4, \"#8\", 1/4. With bearing: the bolt through its bore.", advice: pinAdvice},
	key{name: "bearing", form: text, about: "Ball bearing pressed into a part: 624, MR105.", advice: pinAdvice},
	key{name: "in", form: listOf(name(fileName)), about: "Links (or frame plates) that the bearing or the sleeve sits in."},
	key{name: "sleeve", form: positive(100), about: "Outside diameter of a sleeve that the bolt clamps; the links of in turn on it.", slips: []string{"bush", "bushing", "tube"}},
	key{name: "clamp", form: name(fileName), about: "Link that the bolt is clamped to, between its head and a nut or between two nuts; the others turn on the bolt. It is the first or the last of the stack.", slips: []string{"clamped"}},
	key{name: "rod-end", form: choice(string(HeadSide), string(NutSide)), about: "The bolt clamps the ball of a rod end to the link, on the side of the head or of the nut: for arms that leave the plane.", slips: []string{"ball", "ball-joint", "rod end"}},
	key{name: "shaft", form: positive(100), about: "Diameter of a plain round shaft.", advice: pinAdvice},
	key{name: "retain", form: choice(string(CollarRetainer), string(RingRetainer)), about: "What keeps a shaft where it is: set collars or push-on rings. Left out: collar.", slips: []string{"retainer", "retained"}},
	key{name: "fit", form: text, about: "Bolts: fine, medium, coarse (ISO 273), close, normal, loose (ASME B18.2.8). Shafts and bearings: running, sliding, push, press, or a hole class such as H7 (ISO 286)."},
	key{name: "clearance", form: between(length, -1, 5), about: "Diametral clearance, instead of a fit; negative presses."},
	key{name: "head", form: choice("socket", "button", "hexagon"), about: "Head of the bolt. Left out: socket."},
	key{name: "nut", form: choice("lock", "plain", "thin", "none"), about: "Nut of the bolt. Left out: lock."},
	key{name: "washer", form: choice("normal", "small", "large", "none"), about: "Washers between the parts. Left out: normal.", slips: []string{"washers"}},
	key{name: "play", form: form{kind: aList, item: &playForm, least: 2, most: 2}, about: "Least and greatest axial play wanted. Left out: [0.1mm, 0.2mm], of a sleeve [0.1mm, 0.4mm]; nothing has play where a bearing's bolt is tightened.", advice: playAdvice, slips: []string{"end-play"}},
	key{name: "excess", form: positive(200), about: "How much longer than it must be the bolt may be; beyond, washers are put under its nut. Left out: 10 mm."},
)

var playForm = between(length, 0, 5)

var spacersForm = table("spacers",
	key{name: "from", form: choice("tube", "stock"), about: "tube: cut to length; stock: bought in the lengths of the shop alone. Left out: tube."},
	key{name: "lengths", form: listOf(positive(1000)), about: "The stock lengths that you can get. Left out: the usual ones."},
	key{name: "tube", form: positive(6500), about: "Length of a tube. Left out: 1000 mm.", slips: []string{"length"}},
	key{name: "saw", form: between(length, 0, 10), about: "Width that a cut of the saw takes away. Left out: 1.5 mm.", slips: []string{"kerf", "cut"}},
)

var standoffsForm = table("standoffs",
	key{name: "at", need: true, form: listOf(place), about: "Places, in the linkage's coordinates.", slips: []string{"holes"}},
	key{name: "bolt", need: true, form: text, about: "Size of their thread: M3, M4.", advice: "say bolt: M3"},
	key{name: "fit", form: text, about: "Fit of the screws in the plates: fine, medium, coarse (ISO 273). Left out: medium."},
	key{name: "head", form: choice("socket", "button", "hexagon"), about: "Head of the screws. Left out: socket."},
	key{name: "form", form: choice("hexagon", "round"), about: "Form of the standoffs. Left out: hexagon."},
)

var spareForm = table("spare",
	key{name: "percent", form: between(plain, 0, 500), about: "Per cent of each line, rounded up."},
	key{name: "least", form: whole(0, 1000), about: "At least so many of each line.", slips: []string{"min", "minimum"}},
)

var stocksForm = named(fileName, stockForm)

var stockForm = table("stock",
	key{name: "material", need: true, form: text, about: "What it is: cast acrylic, birch plywood, ...", advice: "write material: cast acrylic"},
	key{name: "thickness", need: true, form: positive(30), about: "Nominal thickness."},
	key{name: "measured", form: positive(35), about: "Thickness as measured. Left out: the nominal one."},
	key{name: "sheet", need: true, form: form{kind: aList, item: &sideForm, least: 2, most: 2}, about: "Width and height of a sheet.", slips: []string{"size"}},
	key{name: "quantity", form: whole(1, 10000), about: "Sheets on the shelf. Left out: 1.", slips: []string{"count", "number"}},
	key{name: "margin", need: true, form: between(length, 0, 500), about: "Material left between a cut and the sheet's edge.", advice: "margin is what stays between a cut and the sheet's edge: 5 mm holds most sheets", slips: []string{"border", "edge"}},
	key{name: "web", form: between(length, 0, 200), about: "Material left between two cuts. Left out: the thickness.", slips: []string{"gap", "spacing"}},
	key{name: "kerf", need: true, form: between(length, 0, 1.5), about: "FULL width that the beam takes away, not the loss on one side. Measured, never guessed.", advice: kerfAdvice},
	key{name: "compensated-by", form: choice("pinwright", "shop"), about: "Who moves the cut off the line by half the kerf: pinwright (paths are the beam's middle) or the shop (paths are finished size). Left out: pinwright."},
	key{name: "grain", form: choice(string(NoGrain), string(HalfTurn), string(Quarter), string(Fixed)), about: "How parts may be turned on the sheet: none (free), half-turn, quarter-turn, fixed. Left out: what the material wants, half-turn for wood with a grain."},
	key{name: "price", form: between(plain, 0, 1e6), about: "Price of a sheet, in your money.", slips: []string{"cost"}},
)

var sideForm = positive(5000)

func shapeNames() []string {
	var names []string
	for _, s := range []Shape{Bar, Waisted, Bent, Plate, Spider, DiscForm, CrankArm} {
		names = append(names, string(s))
	}
	return names
}

// keyPaths lists every key of a form with the way to it, free names as *: "stock.*.kerf". Sorted.
func keyPaths(f *form) []string {
	found := map[string]bool{}
	var visit func(f *form, path string)
	visit = func(f *form, path string) {
		for i := range f.keys {
			p := strings.TrimPrefix(path+"."+f.keys[i].name, ".")
			found[p] = true
			visit(&f.keys[i].form, p)
		}
		if f.item != nil {
			if f.kind == aNamed {
				path += ".*"
			}
			visit(f.item, path)
		}
		for i := range f.variants {
			visit(&f.variants[i], path)
		}
	}
	visit(f, "")
	paths := make([]string, 0, len(found))
	for p := range found {
		paths = append(paths, p)
	}
	slices.Sort(paths)
	return paths
}

// homeOf tells where a key belongs that was written in the wrong table: "stock.NAME"; "" when no
// table has it, or more than two have.
func homeOf(name string) string {
	var homes []string
	for _, p := range keyPaths(&jobForm) {
		home, last := "", p
		if dot := strings.LastIndexByte(p, '.'); dot >= 0 {
			home, last = p[:dot], p[dot+1:]
		}
		if last == name {
			if home == "" {
				home = "the top of the file"
			}
			homes = append(homes, strings.ReplaceAll(home, "*", "NAME"))
		}
	}
	if len(homes) > 2 {
		return ""
	}
	return oneOf(homes)
}

// fullTurn is the drive of a crank that goes all the way round.
const fullTurn = 2 * math.Pi
