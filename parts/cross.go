package parts

import (
	"fmt"
	"slices"

	"pinwright/parts/job"
	"pinwright/parts/outline"
)

// cross is a cross member: a plate that stands square between the two outermost frame plates, its tabs
// in their slots; frame plates between these have one slot of its whole width, through which it goes.
//
// Along the width there are tabs and gaps of one length, a gap at either end: of a member W wide with n
// tabs each is W/(2n+1). A tab is as long as the frame plate is thick, as measured. A slot is the
// clearance wider than the member is thick, as measured, and the clearance longer than the tab.
type cross struct {
	job.CrossMember
	name      string
	path      string
	frame     job.Stock
	stock     job.Stock
	low, high int // planes of the outermost plates
	between   float64
	pitch     float64 // length of a tab and of a gap, mm
	placed    outline.Transform
}

// crosses prepares the cross members of the frame, all the same in every copy.
func (k *maker) crosses(f *job.Frame) []cross {
	if len(f.Cross) == 0 {
		return nil
	}
	if len(f.Plates) < 2 {
		k.fail("frame.cross", "add a plate, or take the cross members out", "cross members stand between two frame plates, and there is one")
		return nil
	}
	planes := make([]int, len(f.Plates))
	for i, p := range f.Plates {
		planes[i] = p.Plane
	}
	low, high := slices.Min(planes), slices.Max(planes)
	bottom, okLow := k.level(low)
	top, okHigh := k.level(high)
	if !okLow || !okHigh {
		k.fail("frame.cross", "", "the heights of planes %d and %d are not known: the cross members have no length", low, high)
		return nil
	}
	between := top.Low - bottom.Up
	if !(between > 0) {
		k.fail("frame.cross", "put the plates on planes with room between them", "the frame plates on planes %d and %d leave %s mm between them", low, high, millimetres(between))
		return nil
	}
	plates := k.stock(f.Stock)
	var out []cross
	for i, m := range f.Cross {
		x := cross{
			CrossMember: m, name: k.crossName(i), path: fmt.Sprintf("frame.cross.%d", i),
			frame: plates, stock: k.stock(m.Stock), low: low, high: high, between: between,
			pitch:  m.Width / float64(2*m.Tabs+1),
			placed: outline.Place(m.Angle, false, m.At),
		}
		least := max(k.rule(m.Stock).web, k.rule(f.Stock).web+max(0, m.Clearance))
		if m.Tabs < 1 || x.pitch < least-1e-9 {
			k.fail(x.path, fmt.Sprintf("take fewer tabs, or make it at least %s mm wide", upTo(least*float64(2*max(1, m.Tabs)+1))),
				"cross member %d: %d tabs on %s mm leave tabs and gaps of %s mm; %s and %s want %s mm", i+1, m.Tabs, millimetres(m.Width), millimetres(x.pitch),
				k.rule(m.Stock).name, k.rule(f.Stock).name, millimetres(least))
			continue
		}
		if x.stock.Measured+m.Clearance <= 0 || x.pitch+m.Clearance <= 0 {
			k.fail(x.path+".clearance", "make it greater than 0", "cross member %d: a clearance of %s mm leaves no slot", i+1, millimetres(m.Clearance))
			continue
		}
		out = append(out, x)
	}
	return out
}

func (k *maker) level(plane int) (Level, bool) {
	i := slices.IndexFunc(k.levels, func(l Level) bool { return l.Plane == plane })
	if i < 0 {
		return Level{}, false
	}
	return k.levels[i], true
}

// crossName is cross-1 and so on, another word before it if a link or plate is called that.
func (k *maker) crossName(i int) string {
	name := fmt.Sprintf("cross-%d", i+1)
	taken := func() bool {
		return slices.ContainsFunc(k.job.Links, func(l job.Link) bool { return l.Name == name }) ||
			slices.ContainsFunc(k.job.Frame.Plates, func(p job.FramePlate) bool { return p.Name == name })
	}
	for taken() {
		name = "frame-" + name
	}
	return name
}

// slots are the slots for the member in a frame plate, in the linkage's coordinates.
func (x cross) slots(plane int) []drilling {
	half := (x.stock.Measured + x.Clearance) / 2
	slot := func(name string, from, to float64) drilling {
		o := outline.Rectangle(outline.Point{X: from - x.Clearance/2, Y: -half}, outline.Point{X: to + x.Clearance/2, Y: half})
		at := x.placed.Apply(outline.Point{X: (from + to) / 2})
		return drilling{
			Hole{Name: name, Kind: TabSlot, Centre: at, Width: min(2*half, to-from+x.Clearance)},
			o.Transform(x.placed).Reverse(),
		}
	}
	if plane != x.low && plane != x.high {
		return []drilling{slot(x.name, -x.Width/2, x.Width/2)}
	}
	var out []drilling
	for i := range x.Tabs {
		from := -x.Width/2 + x.pitch*float64(2*i+1)
		out = append(out, slot(fmt.Sprintf("%s tab %d", x.name, i+1), from, from+x.pitch))
	}
	return out
}

// corners are the corners of the member's foot on a frame plate.
func (x cross) corners() []outline.Point {
	half := (x.stock.Measured + x.Clearance) / 2
	long := (x.Width + max(0, x.Clearance)) / 2
	var out []outline.Point
	for _, p := range []outline.Point{{X: -long, Y: -half}, {X: long, Y: -half}, {X: long, Y: half}, {X: -long, Y: half}} {
		out = append(out, x.placed.Apply(p))
	}
	return out
}

// crossPart is the member itself: x along its width, y from the lower frame plate to the upper one,
// the origin in its middle.
func (k *maker) crossPart(c job.Copy, x cross) {
	half, t := x.between/2, x.frame.Measured
	var pts []outline.Point
	edge := func(y, tip float64, i int) {
		from := -x.Width/2 + x.pitch*float64(2*i+1)
		pts = append(pts, outline.Point{X: from, Y: y}, outline.Point{X: from, Y: tip}, outline.Point{X: from + x.pitch, Y: tip}, outline.Point{X: from + x.pitch, Y: y})
	}
	pts = append(pts, outline.Point{X: -x.Width / 2, Y: -half})
	for i := range x.Tabs {
		edge(-half, -half-t, i)
	}
	pts = append(pts, outline.Point{X: x.Width / 2, Y: -half}, outline.Point{X: x.Width / 2, Y: half})
	upper := len(pts)
	for i := range x.Tabs {
		edge(half, half+t, i)
	}
	slices.Reverse(pts[upper:])
	pts = append(pts, outline.Point{X: -x.Width / 2, Y: half})
	p := Part{Name: partName(c, x.name), Link: x.name, Copy: c.Name, Stock: x.Stock, Plane: x.low}
	p.Region.Outer = outline.Polygon(pts...)
	if !k.sound(p, x.path) {
		return
	}
	k.parts = append(k.parts, p)
	k.notes = append(k.notes, note{path: x.path})
}
