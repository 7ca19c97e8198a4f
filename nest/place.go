package nest

import (
	"cmp"
	"context"
	"errors"
	"fmt"
	"math"
	"math/rand/v2"
	"slices"

	"pinwright/parts/outline"
)

// Options says how hard to try.
type Options struct {
	Effort   int    // orders of placing that are tried; 0 and 1: one
	Seed     uint64 // of the random orders
	Progress func(Progress)
}

// Progress tells how far the search is.
type Progress struct {
	Done, All int     // orders tried, of how many
	Sheets    int     // sheets of the best layout so far
	Fill      float64 // area of its parts over area of its sheets, 0 to 1
}

// ErrItems is wrapped by the errors of Nest that name items which cannot be placed on any sheet.
var ErrItems = errors.New("cannot be placed")

// Nest lays the items on as few sheets as it can, each on the sheets of its stock.
//
// Plan:
//
//  1. Every shape is grown by half the distance that cut paths keep from each other, and drawn on a
//     raster in each of its allowed turns; every cell that it touches is taken (raster.go). Shapes
//     whose cells do not meet keep their distance.
//  2. Items are placed one by one, the largest first: on the first sheet with room, in the turn and at
//     the place whose far end along the sheet's long side is nearest, so that what is left of a sheet
//     is one piece. Windows of large parts are room like any other.
//  3. With more effort other orders are tried, drawn from the seed; the best layout counts: fewest
//     copies left over, fewest sheets, shortest last sheet.
//  4. The layout is verified exactly, on lines and arcs (Verify).
//
// Work counts in orders tried, not in seconds: the same call gives the same layout on any machine. When
// ctx ends, the best layout so far is returned, or ctx's error if there is none yet. Copies for which
// there is no room are in Layout.Left. Running time is about (sheet rows) x (part rows) words a turn
// and part, much less when many parts are alike.
func Nest(ctx context.Context, items []Item, stock []Stock, o Options) (Layout, error) {
	if err := check(items, stock); err != nil {
		return Layout{}, err
	}
	s := newSearch(items, stock)
	efforts := max(1, o.Effort)
	rng := rand.New(rand.NewPCG(o.Seed, 0x70696e)) //nolint:gosec // a seeded order, not a secret
	var best Layout
	found := false
	for try := range efforts {
		l, err := s.place(ctx, s.order(try, rng))
		if err != nil {
			if found {
				break
			}
			return Layout{}, err
		}
		if !found || better(l, best, s) {
			best, found = l, true
		}
		if o.Progress != nil {
			o.Progress(Progress{Done: try + 1, All: efforts, Sheets: len(best.Sheets), Fill: s.fill(best)})
		}
	}
	if err := Verify(items, stock, best); err != nil {
		return Layout{}, err
	}
	return best, nil
}

// piece is one copy of an item, to be placed.
type piece struct{ item, copy int }

// form is an item in one of its turns.
type form struct {
	turn  outline.Transform // without move
	stamp stamp
}

// search holds what is prepared once.
type search struct {
	items []Item
	stock []Stock
	kind  []int    // of items: stock
	forms [][]form // of items
	alike []int    // of items: the first item of the same shape and stock
	cell  []float64
}

const (
	// chordShare is the error of flattening, as a share of a cell.
	chordShare = 0.1
	// longCells is the number of cells along the long side of a sheet.
	longCells = 800
	// finest is the smallest cell, mm.
	finest = 0.25
)

func newSearch(items []Item, stock []Stock) *search {
	s := &search{items: items, stock: stock}
	for _, k := range stock {
		s.cell = append(s.cell, math.Max(finest, math.Max(k.Width, k.Height)/longCells))
	}
	for i, it := range items {
		k := slices.IndexFunc(stock, func(k Stock) bool { return k.Name == it.Stock })
		s.kind = append(s.kind, k)
		alike := i
		for p := range i {
			if s.kind[p] == k && same(items[p], it) {
				alike = p
				break
			}
		}
		s.alike = append(s.alike, alike)
		if alike != i {
			s.forms = append(s.forms, s.forms[alike])
			continue
		}
		s.forms = append(s.forms, s.formsOf(it, stock[k], s.cell[k]))
	}
	return s
}

// same tells whether two items are the same shape with the same freedom.
func same(a, b Item) bool {
	if a.Flip != b.Flip || !slices.Equal(a.Angles, b.Angles) || (a.Angles == nil) != (b.Angles == nil) ||
		!slices.Equal(a.Shape.Outer, b.Shape.Outer) || len(a.Shape.Holes) != len(b.Shape.Holes) {
		return false
	}
	for i := range a.Shape.Holes {
		if !slices.Equal(a.Shape.Holes[i], b.Shape.Holes[i]) {
			return false
		}
	}
	return true
}

// clearance is the distance that cut paths keep from each other and from the sheet's edge.
func (k Stock) clearance() (between, edge float64) {
	return k.Web + k.Kerf, k.Margin + k.Kerf/2
}

// formsOf draws an item in all its turns that fit the sheet. The raster's rows lie across the sheet's
// long side, so that the lowest row is the near end.
func (s *search) formsOf(it Item, k Stock, cell float64) []form {
	between, _ := k.clearance()
	grown := outline.Offset([]outline.Region{it.Shape}, between/2)
	var out []form
	for _, flip := range []bool{false, true}[:1+b2i(it.Flip)] {
		for _, a := range turns(it) {
			t := outline.Place(a, flip, outline.Point{})
			rs := outline.TransformAll(grown, t.Then(k.upright()))
			out = append(out, form{t, newStamp(rs, cell, cell*chordShare)})
		}
	}
	return out
}

func b2i(b bool) int {
	if b {
		return 1
	}
	return 0
}

// upright turns the sheet so that its long side points up: rows of the raster lie across it. Turning by
// a quarter and mirroring keeps the near end near and the lower edge left.
func (k Stock) upright() outline.Transform {
	if k.Width < k.Height {
		return outline.Place(0, false, outline.Point{})
	}
	return outline.Place(-math.Pi/2, true, outline.Point{})
}

// turns lists the turns to try: the allowed ones, or, when any is allowed, eighths of a turn from the
// item's long axis and from its own frame.
func turns(it Item) []float64 {
	if it.Angles != nil {
		return it.Angles
	}
	m := it.Shape.Moments()
	axis := 0.5 * math.Atan2(-2*m.Ixy, m.Ixx-m.Iyy)
	var out []float64
	for _, from := range []float64{0, -axis} {
		for i := range 8 {
			a := math.Remainder(from+float64(i)*math.Pi/4, 2*math.Pi)
			if !slices.ContainsFunc(out, func(b float64) bool { return math.Abs(math.Remainder(a-b, 2*math.Pi)) < 1e-3 }) {
				out = append(out, a)
			}
		}
	}
	return out
}

// order lists the pieces in the order of placing: the largest first, with more effort shuffled near
// that.
func (s *search) order(try int, rng *rand.Rand) []piece {
	type keyed struct {
		piece
		size float64
	}
	var ks []keyed
	jitter := make([]float64, len(s.items))
	for i := range jitter {
		jitter[i] = 1
		if try > 0 {
			jitter[i] = math.Exp(rng.NormFloat64() * 0.4)
		}
	}
	for i, it := range s.items {
		box := it.Shape.Outer.Bounds()
		size := math.Hypot(box.Width(), box.Height()) * jitter[s.alike[i]]
		if try%2 == 1 {
			size = it.Shape.Outer.Area() * jitter[s.alike[i]]
		}
		for c := range it.Quantity {
			ks = append(ks, keyed{piece{i, c}, size})
		}
	}
	slices.SortStableFunc(ks, func(a, b keyed) int { return cmp.Compare(b.size, a.size) })
	out := make([]piece, len(ks))
	for i, k := range ks {
		out[i] = k.piece
	}
	return out
}

// table is a sheet being filled.
type table struct {
	stock int
	map_  bitmap
	tried map[[2]int]int // first row not yet ruled out, by shape and form
}

func (s *search) newTable(stock int) *table {
	k := s.stock[stock]
	between, edge := k.clearance()
	w, h := k.Width, k.Height
	if w >= h {
		w, h = h, w
	}
	// The grown shape may stick out over the free part of the sheet by half the distance.
	room := func(side float64) int { return int(math.Floor((side-2*edge+between)/s.cell[stock] + 1e-9)) }
	return &table{stock: stock, map_: newBitmap(max(0, room(w)), max(0, room(h))), tried: map[[2]int]int{}}
}

// place lays the pieces in their order.
func (s *search) place(ctx context.Context, order []piece) (Layout, error) {
	var tables []*table
	used := make([]int, len(s.stock))
	left := map[int]int{}
	var l Layout
	for _, p := range order {
		if err := ctx.Err(); err != nil {
			return Layout{}, err
		}
		k := s.kind[p.item]
		placed := false
		for t := range tables {
			if tables[t].stock != k {
				continue
			}
			if at, ok := s.drop(tables[t], p.item); ok {
				l.Placements = append(l.Placements, Placement{Item: p.item, Copy: p.copy, Sheet: t, At: at})
				placed = true
				break
			}
		}
		if !placed && used[k] < s.stock[k].Quantity {
			t := s.newTable(k)
			if at, ok := s.drop(t, p.item); ok {
				used[k]++
				tables = append(tables, t)
				l.Placements = append(l.Placements, Placement{Item: p.item, Copy: p.copy, Sheet: len(tables) - 1, At: at})
				placed = true
			}
		}
		if !placed {
			left[p.item]++
		}
	}
	for _, t := range tables {
		l.Sheets = append(l.Sheets, Sheet{Stock: t.stock})
	}
	s.finish(&l, left)
	return l, nil
}

// drop puts an item on a table where its far end is nearest; false if there is no room.
func (s *search) drop(t *table, item int) (outline.Transform, bool) {
	k := s.stock[t.stock]
	cell := s.cell[t.stock]
	between, edge := k.clearance()
	blocked, spread := make([]uint64, t.map_.stride), make([]uint64, t.map_.stride)
	bestForm, bestX, bestY, bestEnd := -1, 0, 0, math.MaxInt
	for f, fm := range s.forms[item] {
		key := [2]int{s.alike[item], f}
		from := t.tried[key]
		if from < 0 || from+fm.stamp.height >= bestEnd {
			continue
		}
		x, y, ok := firstFree(t.map_, fm.stamp, from, blocked, spread)
		if !ok {
			t.tried[key] = -1
			continue
		}
		t.tried[key] = y
		if end := y + fm.stamp.height; end < bestEnd {
			bestForm, bestX, bestY, bestEnd = f, x, y, end
		}
	}
	if bestForm < 0 {
		return outline.Transform{}, false
	}
	fm := s.forms[item][bestForm]
	t.map_.press(fm.stamp, bestX, bestY)
	// From the turned shape's frame to the raster, and from there to the sheet.
	corner := outline.Point{X: float64(bestX) * cell, Y: float64(bestY) * cell}
	origin := outline.Point{X: edge - between/2, Y: edge - between/2}
	move := outline.Place(0, false, corner.Sub(fm.stamp.low).Add(origin))
	up := k.upright()
	return fm.turn.Then(up).Then(move).Then(up.Inverse()), true
}

// finish puts the placements in order and fills in what is known of the sheets.
func (s *search) finish(l *Layout, left map[int]int) {
	slices.SortStableFunc(l.Placements, func(a, b Placement) int {
		return cmp.Or(cmp.Compare(a.Item, b.Item), cmp.Compare(a.Copy, b.Copy))
	})
	for _, p := range l.Placements {
		k := s.stock[l.Sheets[p.Sheet].Stock]
		l.Sheets[p.Sheet].Fill += s.items[p.Item].Shape.Area() / (k.Width * k.Height)
	}
	for i := range s.items {
		if n := left[i]; n > 0 {
			k := s.stock[s.kind[i]]
			l.Left = append(l.Left, Leftover{Item: i, Copies: n, Why: fmt.Sprintf(
				"no room left on the %d sheets of %s (%g x %g mm): add sheets", k.Quantity, k.Name, k.Width, k.Height)})
		}
	}
}

// better tells whether layout a is better than b.
func better(a, b Layout, s *search) bool {
	copies := func(l Layout) (n int) {
		for _, x := range l.Left {
			n += x.Copies
		}
		return n
	}
	return cmp.Or(cmp.Compare(copies(a), copies(b)), cmp.Compare(len(a.Sheets), len(b.Sheets)), cmp.Compare(s.reach(a), s.reach(b))) < 0
}

// reach is how far the parts reach along the long side of their sheets, summed, mm.
func (s *search) reach(l Layout) float64 {
	far := make([]float64, len(l.Sheets))
	for _, p := range l.Placements {
		k := s.stock[l.Sheets[p.Sheet].Stock]
		box := s.items[p.Item].Shape.Outer.Transform(p.At).Bounds()
		far[p.Sheet] = math.Max(far[p.Sheet], pick(k.Width >= k.Height, box.Max.X, box.Max.Y))
	}
	sum := 0.0
	for _, f := range far {
		sum += f
	}
	return sum
}

func pick(first bool, a, b float64) float64 {
	if first {
		return a
	}
	return b
}

// fill is the area of the parts over the area of the sheets in use.
func (s *search) fill(l Layout) float64 {
	if len(l.Sheets) == 0 {
		return 0
	}
	parts, sheets := 0.0, 0.0
	for _, sh := range l.Sheets {
		k := s.stock[sh.Stock]
		sheets += k.Width * k.Height
		parts += sh.Fill * k.Width * k.Height
	}
	return parts / sheets
}
