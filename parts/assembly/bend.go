package assembly

import (
	"math"
	"slices"

	"pinwright/parts"
	"pinwright/parts/interference"
	"pinwright/parts/job"
	"pinwright/parts/linkage"
	"pinwright/parts/outline"
	"pinwright/parts/stack"
)

// Bend is a form of a bar that frees it from what it runs into.
type Bend struct {
	Link string
	MM   float64 // as job.Link.Bend: sideways shift of the middle, positive to the left going from first to last pin
	Gap  float64 // smallest gap to anything at its heights then, certified; at least the running gap
}

const (
	bendStep = 0.5 // mm: makers do not ask for finer bends
	bendMost = 0.5 // of the distance of the pins: a half circle
	bendTry  = 8   // so many shapes that look right are made in full
)

// FindBend looks for the smallest bend of a straight bar, on either side, with which it keeps the running
// gap from everything at its heights through the whole motion; ok is false when there is none, or when
// the link is no plain bar of two pins. Bends are tried in steps of half a millimetre, the smallest
// first, to the left before to the right; the answer is certified with the part as it would be made.
//
// Everything else is as for Gaps. One pass over the bends; most fail at the body that stopped the one
// before.
func FindBend(j job.Job, m *linkage.Mechanism, list []parts.Part, kits []stack.Kit, levels []stack.Level, link string) (bend Bend, ok bool, err error) {
	i := slices.IndexFunc(j.Links, func(l job.Link) bool { return l.Name == link })
	pins := m.LinkFrame(link)
	if i < 0 || len(pins) != 2 || len(j.Links[i].Around) > 0 || j.Links[i].Shape != job.Bar && j.Links[i].Shape != job.Bent {
		return Bend{}, false, nil
	}
	space, err := interference.NewSpace(m)
	if err != nil {
		return Bend{}, false, err
	}
	things := append(ofParts(j, list, levels), ofKits(kits)...)
	own := slices.IndexFunc(things, func(t thing) bool { return t.part == link })
	if own < 0 {
		return Bend{}, false, nil
	}
	bar := things[own]
	var others []thing
	for _, t := range things {
		if meet(m.Linkage(), bar, t) {
			others = append(others, t)
		}
	}
	half := widthOf(j.Links[i], bar.Region, pins) / 2
	length := pins[1].Dist(pins[0])
	tries := 0
	for k := 1; float64(k)*bendStep <= bendMost*length && tries < bendTry; k++ {
		for _, side := range []float64{1, -1} {
			mm := side * float64(k) * bendStep
			line := outline.Path{{Point: pins[0], Bulge: -2 * mm / length}, {Point: pins[1]}}
			middle := outline.Stroke(line, half)
			if line.Segments()[0].Radius() <= half || len(middle) != 1 {
				continue
			}
			bar.Region = middle[0]
			if free, err := freeOf(space, bar, others); err != nil {
				return Bend{}, false, err
			} else if !free {
				continue
			}
			tries++
			made, ok := bentPart(j, m, levels, i, mm)
			if !ok {
				continue
			}
			bar.Region = made
			least, err := nearest(space, bar, others)
			if err != nil {
				return Bend{}, false, err
			}
			if least >= stack.RunningGap {
				return Bend{Link: link, MM: mm, Gap: least}, true, nil
			}
		}
	}
	return Bend{}, false, nil
}

// widthOf is the width of a bar between its ends: as given, or that of the slimmer end.
func widthOf(l job.Link, r outline.Region, pins []outline.Point) float64 {
	if l.Width > 0 {
		return l.Width
	}
	b := r.Bounds()
	return 2 * math.Min(pins[0].X-b.Min.X, b.Max.X-pins[1].X)
}

// freeOf tells whether a body keeps the running gap from others; the one that stops it is put first.
func freeOf(space *interference.Space, a thing, others []thing) (bool, error) {
	for i, b := range others {
		g, err := space.Smallest(a.Body, b.Body, interference.Options{
			Accuracy: accuracy, Limit: stack.RunningGap + accuracy, Enough: stack.RunningGap, Boxes: effort,
		})
		if err != nil {
			return false, err
		}
		if g.MM < stack.RunningGap {
			copy(others[1:i+1], others[:i])
			others[0] = b
			return false, nil
		}
	}
	return true, nil
}

// nearest is the smallest gap of a body to others that is certain, up to interest.
func nearest(space *interference.Space, a thing, others []thing) (float64, error) {
	var pairs [][2]interference.Body
	for _, b := range others {
		pairs = append(pairs, [2]interference.Body{a.Body, b.Body})
	}
	gaps, err := space.All(pairs, interference.Options{Accuracy: accuracy, Limit: interest, Boxes: effort})
	least := float64(interest)
	for _, g := range gaps {
		least = math.Min(least, g.MM-g.Error)
	}
	return least, err
}

// bentPart makes the outline of a link with a bend; ok is false when it cannot be made.
func bentPart(j job.Job, m *linkage.Mechanism, levels []stack.Level, link int, mm float64) (outline.Region, bool) {
	j.Copies = []job.Copy{{}}
	j.Frame = nil
	j.Links = slices.Clone(j.Links)
	j.Links[link].Shape, j.Links[link].Bend = job.Bent, mm
	j.Links, j.Linkage.Links = j.Links[link:link+1], j.Linkage.Links[link:link+1]
	list, err := parts.Make(j, m, faces(levels))
	if err != nil || len(list) != 1 {
		return outline.Region{}, false
	}
	return list[0].Region, true
}

func faces(levels []stack.Level) []parts.Level {
	out := make([]parts.Level, len(levels))
	for i, l := range levels {
		out[i] = parts.Level{Plane: l.Plane, Low: l.From, Up: l.To}
	}
	return out
}
