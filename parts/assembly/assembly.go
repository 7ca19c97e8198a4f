// Package assembly looks at the built mechanism as bodies in space and proves that nothing in it
// touches what it should pass: parts, heads, nuts, washers, spacers and shanks, through the whole
// drive and over the range of every adjustable pivot.
//
// Lengths and heights are millimetres, angles radians.
package assembly

import (
	"fmt"
	"math"
	"slices"

	"pinwright/parts"
	"pinwright/parts/interference"
	"pinwright/parts/job"
	"pinwright/parts/linkage"
	"pinwright/parts/outline"
	"pinwright/parts/stack"
)

const (
	// axial is how far two bodies must be apart in height to count as passing each other without
	// touching: sheets are measured to a tenth, washers bend and links tilt in their play (common
	// practice, no source).
	axial = 0.25

	// accuracy is how exactly the smallest gaps are known, and share how much of a gap may be open
	// on top: only small ones matter to a hundredth.
	accuracy = 0.01
	share    = 0.05

	// interest is the distance up to which gaps are told; beyond it bodies have nothing to do with
	// each other.
	interest = 10

	// effort bounds the search for one pair.
	effort = 200000
)

// Gap is the smallest distance between two bodies that share a height, over the whole motion.
type Gap struct {
	A, B     string    // "coupler", "nut of A"
	MM       float64   // smallest distance; negative: they overlap, by so much
	Error    float64   // the true smallest distance is at most so much less than MM
	Angle    float64   // drive angle where it occurs
	Settings []float64 // places of the adjustable pivots where it occurs, 0 to 1, in the order of the joints
	At       outline.Point
	Low, Up  float64 // heights that they share
}

// thing is a body and what it belongs to.
type thing struct {
	interference.Body
	part   string   // link, frame plate or cross member; "" for what is on a pin
	joints []string // that a part has holes for
	joint  string   // of what is on a pin
}

// Gaps returns the smallest gaps of all pairs of bodies that come nearer than some millimetres to each
// other, in the order of the smallest first. Of pairs that touch the gap is minus the depth of their
// overlap, see interference.Options.
//
// list and kits are those of one copy that is not mirrored; a mirrored copy moves as its mirror image
// and has the same gaps. It errs when the motion cannot be certified, as with surplus links.
func Gaps(j job.Job, m *linkage.Mechanism, list []parts.Part, kits []stack.Kit, levels []stack.Level) ([]Gap, error) {
	space, err := interference.NewSpace(m)
	if err != nil {
		return nil, err
	}
	things := append(ofParts(j, list, levels), ofKits(kits)...)
	var pairs [][2]interference.Body
	for i, a := range things {
		for _, b := range things[i+1:] {
			if meet(m.Linkage(), a, b) {
				pairs = append(pairs, [2]interference.Body{a.Body, b.Body})
			}
		}
	}
	gaps, err := space.All(pairs, interference.Options{Accuracy: accuracy, Share: share, Limit: interest, Boxes: effort, Depth: true})
	if err != nil {
		return nil, err
	}
	var out []Gap
	for i, g := range gaps {
		if g.MM >= interest {
			continue
		}
		a, b := pairs[i][0], pairs[i][1]
		out = append(out, Gap{
			A: a.Name, B: b.Name, MM: g.MM, Error: g.Error, Angle: g.Angle, Settings: g.Settings, At: g.At,
			Low: math.Max(a.Low, b.Low), Up: math.Min(a.Up, b.Up),
		})
	}
	slices.SortStableFunc(out, func(a, b Gap) int {
		switch {
		case a.MM < b.MM:
			return -1
		case a.MM > b.MM:
			return 1
		}
		return 0
	})
	return out, nil
}

// meet tells whether two bodies could touch and should not: they share a height, are not one rigid
// thing, and neither is on a pin that goes through the other.
func meet(l linkage.Linkage, a, b thing) bool {
	if a.Low >= b.Up+axial || b.Low >= a.Up+axial {
		return false
	}
	switch {
	case a.part != "" && b.part != "":
		return a.Carrier != b.Carrier || a.Of != b.Of
	case a.part == "" && b.part == "":
		return a.joint != b.joint
	case a.part == "":
		a, b = b, a
	}
	if a.Carrier == interference.OnGround {
		return !a.carries(b.joint)
	}
	i := slices.IndexFunc(l.Links, func(k linkage.Link) bool { return k.Name == a.Of })
	return i < 0 || !slices.Contains(l.Links[i].Pins, b.joint)
}

// carries tells whether a frame plate has a hole for a joint.
func (t thing) carries(joint string) bool {
	return slices.Contains(t.joints, joint)
}

// ofParts makes bodies of links, frame plates and cross members.
func ofParts(j job.Job, list []parts.Part, levels []stack.Level) []thing {
	var out []thing
	for _, p := range list {
		level, ok := levelOf(levels, p.Plane)
		s := slices.IndexFunc(j.Stock, func(s job.Stock) bool { return s.Name == p.Stock })
		if !ok || s < 0 {
			continue
		}
		t := thing{part: p.Link}
		t.Body = interference.Body{Name: p.Link, Region: p.Region, Low: level.From, Up: level.From + j.Stock[s].Measured}
		for _, h := range p.Holes {
			if h.Joint != "" {
				t.joints = append(t.joints, h.Joint)
			}
		}
		if slices.ContainsFunc(j.Links, func(l job.Link) bool { return l.Name == p.Link }) {
			t.Carrier, t.Of = interference.OnLink, p.Link
			out = append(out, t)
			continue
		}
		if j.Frame != nil && slices.ContainsFunc(j.Frame.Plates, func(f job.FramePlate) bool { return f.Name == p.Link }) {
			out = append(out, t)
		}
	}
	return append(out, ofCrossMembers(j, levels)...)
}

// ofCrossMembers makes bodies of what stands between the outermost frame plates: seen from above, the
// width and the measured thickness of the member. Its height here reaches into the plates, which do
// not move against it.
func ofCrossMembers(j job.Job, levels []stack.Level) []thing {
	if j.Frame == nil || len(j.Frame.Plates) < 2 {
		return nil
	}
	low, high := math.Inf(1), math.Inf(-1)
	for _, p := range j.Frame.Plates {
		if l, ok := levelOf(levels, p.Plane); ok {
			low, high = math.Min(low, l.From), math.Max(high, l.From)
		}
	}
	var out []thing
	for i, c := range j.Frame.Cross {
		s := slices.IndexFunc(j.Stock, func(s job.Stock) bool { return s.Name == c.Stock })
		if s < 0 {
			continue
		}
		half := outline.Point{X: c.Width / 2, Y: j.Stock[s].Measured / 2}
		foot := outline.Region{Outer: outline.Rectangle(half.Scale(-1), half)}
		name := fmt.Sprintf("cross member %d", i+1)
		out = append(out, thing{part: name, Body: interference.Body{
			Name: name, Region: foot.Transform(outline.Place(c.Angle, false, c.At)), Low: low, Up: high,
		}})
	}
	return out
}

// ofKits makes bodies of what is stacked on the pins, and of the bolts and shafts themselves.
func ofKits(kits []stack.Kit) []thing {
	var out []thing
	for _, k := range kits {
		add := func(name string, diameter, low, up float64) {
			if diameter <= 0 || up <= low {
				return
			}
			out = append(out, thing{joint: k.Joint, Body: interference.Body{
				Name: name + " of " + k.Joint, Carrier: interference.OnJoint, Of: k.Joint, Low: low, Up: up,
				Region: outline.Region{Outer: outline.Circle(outline.Point{}, diameter/2)},
			}})
		}
		for _, e := range k.Elements {
			switch e.Kind {
			case stack.PartElement:
			default:
				add(string(e.Kind), e.Diameter, e.From, e.To)
			}
		}
		what := "bolt"
		if k.Pin.Kind == job.ShaftPin {
			what = "shaft"
		}
		add(what, k.Through.Diameter, k.Through.From, k.Through.To)
	}
	return out
}

func levelOf(levels []stack.Level, plane int) (stack.Level, bool) {
	i := slices.IndexFunc(levels, func(l stack.Level) bool { return l.Plane == plane })
	if i < 0 {
		return stack.Level{}, false
	}
	return levels[i], true
}
