package nest

import (
	"cmp"
	"context"
	"fmt"
	"slices"
)

// Options says how hard to try.
type Options struct {
	Effort   int    // batches of nine layouts that are tried for every stock; 0 and 1: one
	Seed     uint64 // of the orders that are drawn
	Progress func(Progress)
}

// Progress tells how far the search is.
type Progress struct {
	Done, All int     // batches, of how many
	Sheets    int     // sheets of the best layout so far, all stocks
	Fill      float64 // area of its parts over area of its sheets, 0 to 1
}

// Nest lays the items on as few sheets as it can, each on the sheets of its stock.
//
// Plan:
//
//  1. The free part of a sheet and every shape are grown by half the distance that cut paths keep
//     from each other. The grown shapes are flattened to polygons around them in every turn that is
//     tried (turns.go, form.go): laid without overlap, they keep their distance.
//  2. The polygons are drawn on a raster; every cell that one touches is taken (raster.go).
//  3. Pieces are placed one by one, each on the first sheet with room: the raster gives a free place
//     for every turn, sliding down and left until it touches makes it exact (slide.go), and a rule
//     chooses between the turns (table.go). Windows of large parts are room like any other.
//  4. Orders and rules are tried, more with more effort (search.go). The best layout is that with the
//     fewest sheets, and of these that with the shortest use of the last one: its remnant is one piece.
//     Stocks have nothing to do with each other and are searched one after the other.
//  5. The layout is verified exactly, on lines and arcs (Verify). Should a slide have gone wrong, the
//     layout is made again from the raster alone.
//
// Work counts in orders tried, not in seconds: the same call gives the same layout on any machine with
// any number of cores. Running time of an order is about (rows of the sheet) x (rows of the part) word rows a
// turn and part, much less when many parts are alike.
//
// When ctx ends, the best layout so far is returned with no error. If not even the first is complete,
// what has been placed is returned as a valid layout, the rest in Left, and ctx's error wrapped.
// Copies for which there is no room are in Layout.Left, which is no error; an item that fits no sheet
// of its stock is one, and all such faults come at once.
func Nest(ctx context.Context, items []Item, stock []Stock, o Options) (Layout, error) {
	if err := check(items, stock); err != nil {
		return Layout{}, err
	}
	batches := max(1, o.Effort)
	var groups []*group
	for k := range stock {
		if slices.ContainsFunc(items, func(it Item) bool { return it.Stock == stock[k].Name }) {
			groups = append(groups, newGroup(items, stock, k))
		}
	}
	best := make([]trial, len(groups))
	for i, g := range groups {
		done := 0
		best[i] = g.search(ctx, batches, o.Seed, func(t trial) {
			done++
			if o.Progress == nil {
				return
			}
			now := slices.Clone(best[:i+1])
			now[i] = t
			l := assemble(items, groups[:i+1], now)
			o.Progress(Progress{Done: i*batches + done, All: len(groups) * batches, Sheets: len(l.Sheets), Fill: fill(stock, l)})
		})
	}
	l := assemble(items, groups, best)
	if err := Verify(items, stock, l); err != nil {
		for i, g := range groups {
			best[i] = g.withoutSlides(ctx, best[i])
		}
		l = assemble(items, groups, best)
		if err := Verify(items, stock, l); err != nil {
			return Layout{}, fmt.Errorf("nest: the layout is at fault, which is an error of the program: %w", err)
		}
	}
	if slices.ContainsFunc(best, func(t trial) bool { return t.undone > 0 }) {
		return l, fmt.Errorf("nest: interrupted before every part had its place: %w", ctx.Err())
	}
	return l, nil
}

// withoutSlides places a trial's order again, on the raster alone.
func (g *group) withoutSlides(ctx context.Context, t trial) trial {
	again := trial{order: t.order, rule: t.rule, raster: true}
	g.place(context.WithoutCancel(ctx), &again)
	return again
}

// assemble makes a layout of the best trial of every group.
func assemble(items []Item, groups []*group, best []trial) Layout {
	var l Layout
	left := make([]Leftover, len(items))
	for i, g := range groups {
		k := g.stock
		over := max(0, len(best[i].tables)-k.Quantity)
		for n, t := range best[i].tables {
			for _, p := range t.placed {
				if n >= k.Quantity {
					left[p.item].Copies++
					continue
				}
				l.Placements = append(l.Placements, Placement{Item: p.item, Copy: p.copy, Sheet: len(l.Sheets), At: p.form.placed(p.at, k)})
			}
			if n < k.Quantity {
				l.Sheets = append(l.Sheets, Sheet{Stock: g.kind})
			}
		}
		for n := range left {
			if left[n].Copies > 0 && items[n].Stock == k.Name {
				left[n].Sheets = over
				left[n].Why = fmt.Sprintf("no room left on the %s of %s (%g x %g mm): add %s for all that is left over", sheets(k.Quantity), k.Name, k.Width, k.Height, sheets(over))
			}
		}
		t := best[i]
		for _, p := range slices.Concat(t.unfit, t.order[len(t.order)-t.undone:]) {
			left[p.item].Copies++
			left[p.item].Sheets = 0
			left[p.item].Why = "the search was interrupted before all had their place"
		}
	}
	slices.SortFunc(l.Placements, func(a, b Placement) int {
		return cmp.Or(cmp.Compare(a.Item, b.Item), cmp.Compare(a.Copy, b.Copy))
	})
	for _, p := range l.Placements {
		k := groups[slices.IndexFunc(groups, func(g *group) bool { return g.kind == l.Sheets[p.Sheet].Stock })].stock
		l.Sheets[p.Sheet].Fill += items[p.Item].Shape.Area() / (k.Width * k.Height)
	}
	for i, x := range left {
		if x.Copies > 0 {
			x.Item = i
			l.Left = append(l.Left, x)
		}
	}
	return l
}

// sheets says how many sheets.
func sheets(n int) string {
	if n == 1 {
		return "1 sheet"
	}
	return fmt.Sprintf("%d sheets", n)
}

// fill is the area of the parts over the area of the sheets in use.
func fill(stock []Stock, l Layout) float64 {
	parts, all := 0.0, 0.0
	for _, s := range l.Sheets {
		a := stock[s.Stock].Width * stock[s.Stock].Height
		all += a
		parts += s.Fill * a
	}
	if all == 0 {
		return 0
	}
	return parts / all
}
