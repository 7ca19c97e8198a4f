package parts

import (
	"math"
	"slices"
	"strconv"

	"pinwright/parts/job"
	"pinwright/parts/outline"
)

// The phase mark: a line from the axis that points, at the job's drive angle 0, along the linkage's x
// axis in every copy.
const (
	markClear    = 1.0  // between strokes and cuts, mm: closer lines burn into each other (0.5 mm, two public tables) with as much again for the eye
	shortestLine = 2.0  // mm
	longestLine  = 12.0 // mm
	lineStep     = 0.05 // mm
)

// phaseLine is the first piece of the ray from the axis that keeps clear of every cut.
func (k *maker) phaseLine(r outline.Region, seats []seat, pins []string, axis string, zero float64, l job.Link) (outline.Path, bool) {
	path := "linkage.links." + l.Name + ".phase-mark"
	i := slices.Index(pins, axis)
	if axis == "" || i < 0 {
		k.fail(path, "take the phase mark out: only the driven link has a phase", "link %s turns on no ground joint as the drive: there is no direction to mark", l.Name)
		return nil, false
	}
	edges := outline.EdgesOf(r)
	centre, way := seats[i].at, outline.Polar(1, zero)
	reach := r.Bounds().Width() + r.Bounds().Height()
	from := -1.0
	longest := 0.0
	for s := 0.0; s <= reach; s += lineStep {
		if edges.Depth(centre.Add(way.Scale(s))) < markClear+lineStep {
			from = -1
			continue
		}
		if from < 0 {
			from = s
		}
		longest = max(longest, s-from)
		if s-from >= longestLine {
			break
		}
		// The piece nearest to the axis is the one; it ends where the next step would be too close.
		next := edges.Depth(centre.Add(way.Scale(s+lineStep))) < markClear+lineStep
		if next && s-from >= shortestLine {
			return outline.Path{{Point: centre.Add(way.Scale(from))}, {Point: centre.Add(way.Scale(s))}}, true
		}
	}
	if longest >= longestLine {
		return outline.Path{{Point: centre.Add(way.Scale(from))}, {Point: centre.Add(way.Scale(from + longestLine))}}, true
	}
	k.fail(path, "widen the link, or take the phase mark out",
		"link %s: the phase mark has %s mm of room beside hole %s, it wants %s mm", l.Name, millimetres(longest), axis, millimetres(shortestLine))
	return nil, false
}

// degrees writes an angle for a mark, between 0 and 360, to a hundredth.
func degrees(radians float64) string {
	d := math.Mod(math.Round(radians/math.Pi*180*100)/100, 360)
	if d < 0 {
		d += 360
	}
	return strconv.FormatFloat(math.Round(d*100)/100, 'f', -1, 64) + "°"
}
