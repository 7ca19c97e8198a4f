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

// The kinds of line, in the order of the list.
const (
	ScrewLine      LineKind = "bolt"
	NutLine        LineKind = "nut"
	WasherLine     LineKind = "washer"
	SpacerLine     LineKind = "spacer"
	BearingLine    LineKind = "bearing"
	ShaftLine      LineKind = "shaft"
	CollarLine     LineKind = "collar"
	ConsumableLine LineKind = "consumable"
)

var shelf = []LineKind{ScrewLine, NutLine, WasherLine, SpacerLine, BearingLine, ShaftLine, CollarLine, ConsumableLine}

// Line is one thing to buy or to cut to length.
type Line struct {
	Kind        LineKind
	Designation string
	Length      float64 // mm; 0 where a length means nothing or is not known
	Diameter    float64 // nominal size, by which the list is sorted, mm
	Need        int     // built in
	Spare       int
	Buy         int
	Pack        int      // pieces in a pack; 0: sold or cut singly
	Packs       int      // packs to buy; 0 likewise
	Mass        float64  // of what is built in, g, an estimate; 0: not known
	Joints      []string // where it is used, in the order of the pins; "mount", "hub"
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
			return o.Kind == l.Kind && o.Designation == l.Designation && math.Abs(o.Length-l.Length) < 0.05
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
			if l, ok := elementLine(k, e); ok {
				add(l, k.Joint)
			}
		}
		if k.Pin.Kind == job.BoltPin && (k.Pin.Nut == "plain" || k.Pin.Nut == "thin") {
			add(Line{Kind: ConsumableLine, Designation: "thread lock, medium", Note: "one small bottle, for axles without locknut"}, k.Joint)
		}
	}
	for _, l := range extras(j) {
		add(l, l.Joints[0])
	}
	for i := range lines {
		l := &lines[i]
		if l.Kind == ConsumableLine {
			l.Need, l.Buy = 1, 1
			continue
		}
		l.Spare = spare(l.Need, j.Spare)
		l.Buy = l.Need + l.Spare
		if l.Kind == ScrewLine || l.Kind == NutLine || l.Kind == WasherLine {
			l.Pack, l.Packs = packed(l.Buy)
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

// elementLine is the line of an element; false for parts and heads.
func elementLine(k Kit, e Element) (Line, bool) {
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
		if n, err := hardware.NutFor(hardware.NutKind(k.Pin.Nut), size); err == nil {
			l.Mass = n.Mass()
		}
	case SpacerElement:
		l.Kind, l.Length = SpacerLine, e.Thickness
		l.Note = fmt.Sprintf("cut from tube, outside about %g mm, ends square", e.Diameter)
	case BearingElement:
		l.Kind = BearingLine
		if b, err := hardware.BearingFor(e.What); err == nil {
			l.Diameter, l.Mass = b.Bore, b.Mass()
			l.Note = fmt.Sprintf("%g x %g x %g mm", b.Bore, b.Outside, b.Width)
		}
	case CollarElement:
		l.Kind = CollarLine
		if c, err := hardware.CollarFor(k.Pin.Shaft); err == nil {
			l.Mass = c.Mass()
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
