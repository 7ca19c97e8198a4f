package stack

import (
	"cmp"
	"fmt"
	"math"
	"slices"
	"strings"

	"pinwright/parts/hardware"
	"pinwright/parts/job"
)

// LineKind is the shelf on which a thing lies.
type LineKind string

// The kinds of line.
const (
	ScrewLine      LineKind = "bolt"
	NutLine        LineKind = "nut"
	WasherLine     LineKind = "washer"
	SpacerLine     LineKind = "spacer"
	BearingLine    LineKind = "bearing"
	ShaftLine      LineKind = "shaft"
	CollarLine     LineKind = "collar"
	SleeveLine     LineKind = "sleeve"
	TubeLine       LineKind = "tube"
	StandoffLine   LineKind = "standoff"
	RodEndLine     LineKind = "rod end"
	ConsumableLine LineKind = "consumable"
)

// shelf is the order of the list.
var shelf = []LineKind{ScrewLine, NutLine, WasherLine, SpacerLine, SleeveLine, StandoffLine, TubeLine, BearingLine, RodEndLine, ShaftLine, CollarLine, ConsumableLine}

// Line is one thing to buy or to cut to length.
type Line struct {
	Kind        LineKind
	Designation string
	Length      float64 // mm; 0 where a length means nothing or is not known
	Diameter    float64 // nominal size, by which the list is sorted, mm
	Outside     float64 // of spacers, sleeves and tube, mm; 0: of no matter
	Need        int     // built in
	Spare       int
	Buy         int
	Pack        int      // pieces in a pack; 0: sold or cut singly
	Packs       int      // packs to buy; 0 likewise
	Mass        float64  // of what is built in, g, an estimate; 0: not known
	Joints      []string // where it is used, in the order of the pins; "mount", "hub", "frame"
	Note        string
}

// packs are the sizes of packs. Common practice, no source.
var packSizes = []int{10, 25, 50, 100}

// packed gives the fewest packs of one size that hold so many pieces, and of the sizes that need as few
// the smallest.
func packed(pieces int) (size, count int) {
	for _, s := range packSizes {
		if n := (pieces + s - 1) / s; count == 0 || n < count {
			size, count = s, n
		}
	}
	return size, count
}

// spare is what is bought on top of a need: the percentage, rounded up, and at least so many.
func spare(need int, s job.Spare) int {
	return max(0, s.Least, int(math.Ceil(float64(need)*s.Percent/100-slack)))
}

// List sums up the hardware of all kits, and what the frame and the hubs ask for: one line for every
// thing, bolts first, each shelf by size and length.
func List(j job.Job, kits []Kit) []Line {
	var lines []Line
	add := func(l Line, joint string) {
		i := slices.IndexFunc(lines, func(o Line) bool {
			return o.Kind == l.Kind && o.Designation == l.Designation && math.Abs(o.Length-l.Length) < 0.005
		})
		if i < 0 {
			i = len(lines)
			lines = append(lines, l)
		} else {
			lines[i].Need += l.Need
			lines[i].Mass += l.Mass
			if l.Note != "" && !strings.Contains(lines[i].Note, l.Note) {
				lines[i].Note = strings.TrimPrefix(lines[i].Note+"; "+l.Note, "; ")
			}
		}
		if !slices.Contains(lines[i].Joints, joint) {
			lines[i].Joints = append(lines[i].Joints, joint)
		}
	}
	for _, k := range kits {
		add(throughLine(k), k.Joint)
		for _, e := range k.Elements {
			if l, ok := elementLine(j, k, e); ok {
				add(l, k.Joint)
			}
		}
		if rubs(j, k) {
			add(Line{Kind: ConsumableLine, Designation: "washers of low friction", Note: "thin ones of nylon or PTFE, or a dry lubricant: acrylic rubs on acrylic there"}, k.Joint)
		}
		if (k.Pin.Kind == job.BoltPin || k.Pin.Kind == job.ClampPin) && (k.Pin.Nut == "plain" || k.Pin.Nut == "thin") {
			add(Line{Kind: ConsumableLine, Designation: "thread lock, medium", Note: "one small bottle, for axles without locknut"}, k.Joint)
		}
	}
	for _, l := range extras(j) {
		add(l, l.Joints[0])
	}
	for _, l := range standoffLines(j) {
		add(l, "frame")
	}
	for i := range lines {
		l := &lines[i]
		if l.Kind == ConsumableLine {
			l.Need, l.Buy = 1, 1
			continue
		}
		l.Spare = spare(l.Need, j.Spare)
		l.Buy = l.Need + l.Spare
		if l.Kind == ScrewLine || l.Kind == NutLine || l.Kind == WasherLine || l.Kind == SpacerLine && j.Spacers.Stock {
			l.Pack, l.Packs = packed(l.Buy)
		}
	}
	// Build has seen that every piece is shorter than the tube.
	if tubes, err := Tubes(j, lines); err == nil {
		for _, t := range tubes {
			lines = append(lines, tubeLine(t))
		}
	}
	slices.SortStableFunc(lines, func(a, b Line) int {
		return cmp.Or(
			cmp.Compare(slices.Index(shelf, a.Kind), slices.Index(shelf, b.Kind)),
			cmp.Compare(a.Diameter, b.Diameter),
			cmp.Compare(a.Length, b.Length),
			cmp.Compare(a.Designation, b.Designation),
		)
	})
	return lines
}

// throughLine is the bolt or shaft of a kit.
func throughLine(k Kit) Line {
	l := Line{Kind: ScrewLine, Designation: k.Through.Designation, Length: k.Through.Length, Diameter: k.Through.Diameter, Need: 1}
	if k.Pin.Kind == job.ShaftPin {
		l.Kind = ShaftLine
		l.Mass = hardware.ShaftMass(k.Through.Diameter, k.Through.Length)
		l.Note = "cut to length; leave it out where a motor's shaft takes its place"
	} else if s, err := hardware.ScrewFor(hardware.Head(k.Pin.Head), k.Pin.Bolt); err == nil && k.Through.Length > 0 {
		l.Mass = s.Mass(k.Through.Length)
	}
	if k.Through.Length == 0 {
		l.Note = fmt.Sprintf("at least %.1f mm long", math.Ceil(k.Through.Need*10-slack)/10)
		if k.Open {
			l.Note += " and as much longer as your frame is thick"
		} else {
			l.Note += "; no inch lengths in the catalogue"
		}
	}
	return l
}

// standoffLines are the standoffs of all copies with their screws and washers: a washer under every head,
// and those that lie on the standoffs.
func standoffLines(j job.Job) []Line {
	if j.Frame == nil || j.Frame.Standoffs == nil {
		return nil
	}
	s, err := Standoffs(j)
	if err != nil || s == nil {
		return nil
	}
	n := max(1, len(j.Copies)) * len(s.At)
	d, _ := hardware.BoltDiameter(j.Frame.Standoffs.Bolt) // looked up before
	var out []Line
	for i := range s.Screws {
		out = append(out, Line{
			Kind: ScrewLine, Designation: s.Screws[i], Length: s.Lengths[i], Diameter: d, Need: n, Mass: float64(n) * s.screwMass[i],
		})
	}
	return append(out,
		Line{Kind: WasherLine, Designation: s.Washer, Diameter: d, Need: (2 + s.Washers) * n, Mass: float64((2+s.Washers)*n) * s.washerMass},
		Line{Kind: StandoffLine, Designation: s.Designation, Length: s.Length, Diameter: d, Need: n, Mass: float64(n) * s.mass, Note: "thread in both ends"},
	)
}

// elementLine is the line of an element; false for parts and heads.
func elementLine(j job.Job, k Kit, e Element) (Line, bool) {
	l := Line{Designation: e.What, Diameter: k.Through.Diameter, Need: 1}
	size := k.Pin.Bolt
	if k.Pin.Kind == job.ShaftPin {
		size = fmt.Sprintf("M%g", k.Pin.Shaft)
	}
	switch e.Kind {
	case WasherElement:
		l.Kind = WasherLine
		for _, series := range []hardware.WasherKind{hardware.NormalWasher, hardware.SmallWasher, hardware.LargeWasher} {
			if w, err := hardware.WasherFor(series, size); err == nil && w.Designation() == e.What {
				l.Mass = w.Mass()
			}
		}
	case NutElement:
		l.Kind = NutLine
		for _, kind := range []hardware.NutKind{hardware.NutKind(k.Pin.Nut), hardware.ThinNut} {
			if n, err := hardware.NutFor(kind, size); err == nil && n.Designation() == e.What {
				l.Mass = n.Mass()
			}
		}
	case SpacerElement:
		l.Kind, l.Length, l.Outside = SpacerLine, e.Thickness, e.Diameter
		l.Mass = hardware.TubeMass(k.Through.Diameter, e.Diameter, e.Thickness)
		l.Note = fmt.Sprintf("cut from tube, outside about %g mm, ends square", e.Diameter)
		if j.Spacers.Stock {
			l.Note = fmt.Sprintf("stock length, outside about %g mm", e.Diameter)
		}
	case SleeveElement:
		l.Kind, l.Length, l.Outside = SleeveLine, e.Thickness, e.Diameter
		l.Mass = hardware.TubeMass(k.Through.Diameter, e.Diameter, e.Thickness)
		l.Note = "cut from tube, filed to length"
	case RodEndElement:
		l.Kind = RodEndLine
		if r, err := hardware.RodEndFor(k.Through.Diameter); err == nil {
			l.Mass = r.Mass()
			l.Note = fmt.Sprintf("ball %g mm wide, eye %g mm; from memory: measure it", r.Width, r.Outside)
		}
	case BearingElement:
		l.Kind = BearingLine
		if b, err := hardware.BearingFor(e.What); err == nil {
			l.Diameter, l.Mass = b.Bore, b.Mass()
			l.Note = fmt.Sprintf("%g x %g x %g mm", b.Bore, b.Outside, b.Width)
		}
	case CollarElement:
		l.Kind = CollarLine
		if c, err := hardware.CollarFor(k.Pin.Shaft); err == nil && c.Designation() == e.What {
			l.Mass = c.Mass()
		}
		if r, err := hardware.PushRingFor(k.Pin.Shaft); err == nil && r.Designation() == e.What {
			l.Mass = r.Mass()
		}
	default:
		return Line{}, false
	}
	return l, true
}

// extras are the screws that belong to no pin: of the frame's mounting holes and of hubs.
func extras(j job.Job) []Line {
	copies := max(1, len(j.Copies))
	var out []Line
	if j.Frame != nil && j.Frame.Mount != nil && j.Frame.Mount.Bolt != "" {
		m := j.Frame.Mount
		d, err := hardware.BoltDiameter(m.Bolt)
		if err == nil && len(m.At) > 0 {
			out = append(out, Line{
				Kind: ScrewLine, Designation: "screw " + m.Bolt, Diameter: d, Need: copies * len(m.At), Joints: []string{"mount"},
				Note: "one for each mounting hole; length by what the frame is screwed to",
			})
		}
	}
	for _, l := range j.Links {
		for _, b := range l.Bores {
			if b.Kind == job.HubBore && b.Bolts > 0 {
				out = append(out, Line{
					Kind: ScrewLine, Designation: fmt.Sprintf("screw for a hole of %g mm", b.Hole), Diameter: b.Hole,
					Need: copies * b.Bolts, Joints: []string{"hub"}, Note: "size and length by the hub",
				})
			}
		}
	}
	return out
}
