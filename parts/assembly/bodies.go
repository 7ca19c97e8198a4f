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

// thing is a body and what it belongs to.
type thing struct {
	interference.Body
	part   string   // link, frame plate or cross member; "" for what is on a pin
	joints []string // that a part has holes for
	joint  string   // of what is on a pin
	shaft  bool     // it is the shaft itself
}

// meet tells whether two bodies could touch and should not: they share a height, are not one rigid
// thing, and neither is on a pin that goes through the other.
func meet(l linkage.Linkage, a, b thing) bool {
	if a.Low >= b.Up+axial || b.Low >= a.Up+axial {
		return false
	}
	switch {
	case a.part != "" && b.part != "":
		// What shares a pin is stacked on it, face to face where there is no washer.
		if slices.ContainsFunc(a.joints, b.carries) && (a.Low >= b.Up-contact || b.Low >= a.Up-contact) {
			return false
		}
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
	out = append(out, ofCrossMembers(j, levels)...)
	return append(out, ofStandoffs(j)...)
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
		before := len(out)
		add(what, k.Through.Diameter, k.Through.From, k.Through.To)
		for i := before; i < len(out); i++ {
			out[i].shaft = k.Pin.Kind == job.ShaftPin
		}
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
