package parts

import (
	"fmt"
	"math"
	"slices"

	"pinwright/parts/outline"
)

// windows is what lightening windows keep to.
type windows struct {
	rim    float64        // material left to the outer outline and round the joints' material, mm
	corner float64        // radius of their corners, mm: the smallest that there is
	joints []outline.Disc // material that stays round the holes
}

// smallestWindow is the area below which a window is not worth its cut: that of a disc of 5 mm radius.
const smallestWindow = 25 * math.Pi

// cut returns the windows of a part, clockwise, largest first: the outline moved in by the rim, less
// the material round the joints and whatever else is to be spared, its corners rounded so that no
// place in them is narrower than two corner radii, and no window smaller than 78 mm2.
func (w windows) cut(outer outline.Outline, spare []outline.Region) []outline.Outline {
	room := outline.Offset([]outline.Region{{Outer: outer}}, -w.rim)
	var keep []outline.Region
	for _, d := range w.joints {
		keep = append(keep, outline.Region{Outer: outline.Circle(d.Centre, d.Radius)})
	}
	keep = append(keep, spare...)
	left := outline.RoundOutside(outline.Difference(room, outline.Union(keep...)), w.corner)
	// What goes round something spared in its middle would cut that out: it is parted by a rib.
	var out []outline.Outline
	for _, r := range left {
		for _, piece := range w.ribbed(r, 0) {
			if piece.Area() >= smallestWindow {
				out = append(out, piece.Outer.Reverse())
			}
		}
	}
	slices.SortStableFunc(out, func(a, b outline.Outline) int {
		switch {
		case a.Area() < b.Area()-1e-6: // clockwise: the larger is the more negative
			return -1
		case a.Area() > b.Area()+1e-6:
			return 1
		}
		return 0
	})
	return out
}

// ribbed parts a window that has islands: two ribs hold each of them, from the island's middle along
// the part's x axis to both sides.
func (w windows) ribbed(r outline.Region, depth int) []outline.Region {
	if len(r.Holes) == 0 {
		return []outline.Region{r}
	}
	if depth > 8 {
		return nil
	}
	box := r.Bounds().Grow(1)
	at := r.Holes[0].Bounds().Centre()
	rib := outline.Rectangle(outline.Point{X: box.Min.X, Y: at.Y - w.rim/2}, outline.Point{X: box.Max.X, Y: at.Y + w.rim/2})
	var out []outline.Region
	for _, piece := range outline.RoundOutside(outline.Difference([]outline.Region{r}, []outline.Region{{Outer: rib}}), w.corner) {
		out = append(out, w.ribbed(piece, depth+1)...)
	}
	return out
}

// named makes holes of them.
func named(cuts []outline.Outline) []drilling {
	var out []drilling
	for i, o := range cuts {
		m := o.Moments()
		out = append(out, drilling{Hole{Name: fmt.Sprintf("window %d", i+1), Kind: Window, Centre: m.Centroid}, o})
	}
	return out
}
