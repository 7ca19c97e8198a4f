package nest

import (
	"math"
	"slices"

	"pinwright/parts/outline"
)

// shape is a shape with its forms; several items may have the same.
type shape struct {
	forms []form
	first int // number of its first form among all of the group
	sizes [sizes]float64
}

// sizes are the measures by which pieces are sorted.
const (
	byLength = iota
	byArea
	byWidth
	sizes
)

// piece is one copy of an item, to be placed.
type piece struct{ item, copy, shape int }

// group is what lies on one stock, prepared.
type group struct {
	kind    int // index of the stock
	stock   Stock
	cell    float64
	shapes  []shape
	forms   int // of all shapes
	longest int // run of cells in a stamp
	pieces  []piece
}

const (
	// cellsLong is the number of cells along the long side of a sheet; more if the smallest part were
	// less than cellsAcross wide, up to mostCells.
	cellsLong   = 800
	cellsAcross = 12
	mostCells   = 2400
)

// newGroup prepares the items of a stock. Every item must fit the sheet (check).
func newGroup(items []Item, stock []Stock, kind int) *group {
	k := stock[kind]
	g := &group{kind: kind, stock: k}
	between, _ := k.clearance()
	least := math.Inf(1)
	var mine []int
	for i, it := range items {
		if it.Stock == k.Name {
			mine = append(mine, i)
			_, w := narrowest(hullOf(it.Shape.Outer))
			least = math.Min(least, w+between-0.2) // a little less, for the chords of the hull
		}
	}
	long := math.Max(k.Width, k.Height)
	g.cell = math.Max(math.Min(long/cellsLong, least/cellsAcross), long/mostCells)
	var of []int // of shapes: an item that has it
	for _, i := range mine {
		s := slices.IndexFunc(of, func(o int) bool { return same(items[o], items[i]) })
		if s < 0 {
			s = len(of)
			of = append(of, i)
			g.shapes = append(g.shapes, g.newShape(items[i], between, least))
		}
		for c := range items[i].Quantity {
			g.pieces = append(g.pieces, piece{i, c, s})
		}
	}
	return g
}

func (g *group) newShape(it Item, between, least float64) shape {
	rs := grown(it.Shape, between, least)
	s := shape{first: g.forms}
	w, h := g.stock.free()
	for _, mirror := range []bool{false, true} {
		if mirror && !it.Flip {
			break
		}
		in := it
		if mirror {
			in = it.flipped()
		}
		for _, a := range turns(in, w, h) {
			f := newForm(rs, outline.Place(a, mirror, outline.Point{}), g.stock, g.cell)
			if !slices.ContainsFunc(s.forms, func(o form) bool { return f.like(&o) }) {
				s.forms = append(s.forms, f)
				g.longest = max(g.longest, f.stamp.longest)
			}
		}
	}
	g.forms += len(s.forms)
	_, width := narrowest(hullOf(it.Shape.Outer))
	box := it.Shape.Outer.Bounds()
	s.sizes = [sizes]float64{
		byLength: rounded(math.Hypot(box.Width(), box.Height())), byArea: rounded(it.Shape.Outer.Area()), byWidth: rounded(width),
	}
	return s
}

// same tells whether two items are the same shape with the same freedom.
func same(a, b Item) bool {
	return a.Flip == b.Flip && slices.Equal(a.Angles, b.Angles) && (a.Angles == nil) == (b.Angles == nil) &&
		slices.Equal(a.Shape.Outer, b.Shape.Outer) &&
		slices.EqualFunc(a.Shape.Holes, b.Shape.Holes, slices.Equal[outline.Outline])
}
