package nest

import (
	"math"
	"slices"

	"pinwright/parts/outline"
)

// The frame of the work: u runs across a sheet's long side and v along it, both from the corner of the
// free part of the sheet, so that filling from v = 0 up leaves the far end of the sheet in one piece.
// Shapes are grown by half the distance that cut paths keep, and so is the free part of the sheet; what
// is left to do is to lay polygons without overlap. Points have u as X and v as Y.

// chord is the error of flattening grown shapes, mm, always to the outside. It costs about two thirds
// of it times the length of the arcs in area: some 0.2 % for a disc of 10 mm.
const chord = 0.02

// form is a shape in one of its turns, as polygons that contain its grown outline.
type form struct {
	turn   outline.Transform // of the shape on the sheet, without the move
	low    outline.Point     // lower left corner of the polygons' box in the frame of the work, before the move
	width  float64           // of the polygons' box, mm
	height float64
	inner  outline.Box // the box of the true shape within that of the polygons, which are up to a chord larger
	middle float64     // height of its centroid in its box
	rings  [][]outline.Point
	faces  [4][]face // by direction
	stamp  stamp
}

// frame turns the sheet into the frame of the work. It is its own inverse: nothing, or the exchange of
// the axes.
func (k Stock) frame() outline.Transform {
	if k.Width < k.Height {
		return outline.Place(0, false, outline.Point{})
	}
	return outline.Place(-math.Pi/2, true, outline.Point{})
}

// clearance is the distance that cut paths keep from each other and from the sheet's edge, mm.
func (k Stock) clearance() (between, edge float64) {
	return k.Web + k.Kerf, k.Margin + k.Kerf/2
}

// free is the size of the free part of a sheet, for cut paths, as the sheet lies, mm.
func (k Stock) free() (w, h float64) {
	_, edge := k.clearance()
	return k.Width - 2*edge, k.Height - 2*edge
}

// room is the free part of the sheet in the frame of the work, for grown shapes: its size, and where
// on the sheet its corner lies (in both directions).
func (k Stock) room() (u, v, corner float64) {
	between, edge := k.clearance()
	w, h := k.free()
	return math.Min(w, h) + between, math.Max(w, h) + between, edge - between/2
}

// grown returns the shape grown by half the distance that cut paths keep, without windows in which no
// part of the given least width has room.
func grown(r outline.Region, between, least float64) []outline.Region {
	rs := []outline.Region{r}
	if between > 0 {
		rs = outline.Offset(rs, between/2)
	}
	for i, g := range rs {
		rs[i].Holes = slices.DeleteFunc(slices.Clone(g.Holes), func(o outline.Outline) bool {
			b := o.Bounds()
			return math.Min(b.Width(), b.Height()) < least
		})
	}
	return rs
}

// newForm draws a grown shape turned; k is its stock, cell the size of the raster's cells.
func newForm(rs []outline.Region, turn outline.Transform, k Stock, cell float64) form {
	f := form{turn: turn}
	var sum, height float64
	box, inner := outline.EmptyBox(), outline.EmptyBox()
	for _, r := range outline.TransformAll(rs, turn.Then(k.frame())) {
		rings := outline.FlattenRegion(r, chord, outline.Around)
		f.rings = append(f.rings, rings...)
		box = box.Union(outline.BoxOf(rings[0]...))
		inner = inner.Union(r.Bounds())
		m := r.Moments()
		sum, height = sum+m.Area, height+m.Area*m.Centroid.Y
	}
	f.low, f.width, f.height, f.middle = box.Min, box.Width(), box.Height(), height/sum-box.Min.Y
	f.inner = outline.Box{Min: inner.Min.Sub(f.low), Max: inner.Max.Sub(f.low)}
	for _, ring := range f.rings {
		for i := range ring {
			ring[i] = ring[i].Sub(f.low)
		}
	}
	f.faces = facesOf(f.rings)
	f.stamp = newStamp(f.rings, f.width, f.height, cell)
	return f
}

// placed returns where on the sheet the shape lies when the corner of the form's polygons is at p in the
// frame of the work.
func (f *form) placed(p outline.Point, k Stock) outline.Transform {
	_, _, corner := k.room()
	move := outline.Place(0, false, p.Sub(f.low).Add(outline.Point{X: corner, Y: corner}))
	return f.turn.Then(k.frame()).Then(move).Then(k.frame())
}

// like tells whether two forms cover the same cells and have the same size: the same shape turned onto
// itself, for which one of the two is enough.
func (f *form) like(g *form) bool {
	return math.Abs(f.width-g.width) < 1e-6 && math.Abs(f.height-g.height) < 1e-6 &&
		slices.EqualFunc(f.stamp.rows, g.stamp.rows, slices.Equal[[]run])
}
