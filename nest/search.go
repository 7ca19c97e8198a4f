package nest

import (
	"cmp"
	"context"
	"math/rand/v2"
	"runtime"
	"slices"
	"sync"
	"sync/atomic"
)

// trial is an order of placing with a rule, and what came of it.
type trial struct {
	order  []piece
	rule   rule
	raster bool // no slides
	tables []*table
	unfit  []piece
	undone int // pieces that were not placed before the end of the context
	value  value
}

// value says how good a layout is; less is better, the first field first.
type value struct {
	undone int     // pieces that were not tried
	sheets int     // in use, those that are not on the shelf included
	over   int     // pieces on sheets that are not on the shelf
	reach  float64 // of the last sheet, mm
}

func (a value) compare(b value) int {
	return cmp.Or(cmp.Compare(a.undone, b.undone), cmp.Compare(a.sheets, b.sheets), cmp.Compare(a.over, b.over), cmp.Compare(a.reach, b.reach))
}

// batch is the number of orders tried side by side: the first batch is every measure with every rule. It is
// part of the search and not a number of cores, for the best of a batch is what the next one starts from.
const batch = sizes * int(rules)

// search tries orders, batch after batch, and returns the best; say is told after each batch, and may
// be nil.
//
// Plan: the first batch sorts the pieces by decreasing length, area and width and uses all rules. From then
// on each changes the best order so far in as many ways, drawn from the seed: some pieces, usually of one
// shape, move elsewhere. The best of the batch is kept if it is no worse.
func (g *group) search(ctx context.Context, batches int, seed uint64, say func(best trial)) trial {
	var best trial
	for b := range batches {
		tries := make([]trial, batch)
		for i := range tries {
			if b == 0 {
				tries[i] = g.sorted(i)
			} else {
				tries[i] = g.changed(best, rand.New(rand.NewPCG(seed, uint64(b*batch+i)))) //nolint:gosec // a seeded search, not a secret
			}
		}
		g.placeAll(ctx, tries)
		pick := slices.MinFunc(tries, func(a, b trial) int { return a.value.compare(b.value) })
		if b == 0 || pick.value.compare(best.value) <= 0 {
			best = pick
		}
		if ctx.Err() != nil {
			break
		}
		if say != nil {
			say(best)
		}
	}
	return best
}

// placeAll lays all trials, as many at once as there are cores and the first ones first, so that an
// interruption finds one that is complete.
func (g *group) placeAll(ctx context.Context, tries []trial) {
	var wait sync.WaitGroup
	var next atomic.Int64
	for range min(len(tries), runtime.GOMAXPROCS(0)) {
		wait.Go(func() {
			for i := next.Add(1) - 1; int(i) < len(tries); i = next.Add(1) - 1 {
				g.place(ctx, &tries[i])
			}
		})
	}
	wait.Wait()
}

// sorted returns the n-th of the first trials: every measure with every rule.
func (g *group) sorted(n int) trial {
	t := trial{order: slices.Clone(g.pieces), rule: rule(n / sizes % int(rules))}
	by := n % sizes
	slices.SortStableFunc(t.order, func(a, b piece) int {
		return cmp.Compare(g.shapes[b.shape].sizes[by], g.shapes[a.shape].sizes[by])
	})
	return t
}

// changed returns a trial a little different from t.
func (g *group) changed(t trial, rng *rand.Rand) trial {
	c := trial{order: slices.Clone(t.order), rule: t.rule}
	if rng.IntN(8) == 0 {
		c.rule = rule(rng.IntN(int(rules)))
	}
	n := len(c.order)
	for range 1 + rng.IntN(3) {
		// A stretch of one shape, or a part of it, moves to another place.
		from := rng.IntN(n)
		to := from + 1
		for to < n && c.order[to].shape == c.order[from].shape && rng.IntN(4) > 0 {
			to++
		}
		moved := slices.Clone(c.order[from:to])
		c.order = slices.Delete(c.order, from, to)
		at := rng.IntN(len(c.order) + 1)
		c.order = slices.Insert(c.order, at, moved...)
	}
	return c
}

// place lays the pieces in their order, each on the first sheet with room. Sheets beyond those on the
// shelf are used as if they were there.
func (g *group) place(ctx context.Context, t *trial) {
	full := make([]int, len(g.shapes)) // the first sheet that may have room
	for n, p := range t.order {
		if ctx.Err() != nil {
			t.undone = len(t.order) - n
			break
		}
		s := &g.shapes[p.shape]
		for i := full[p.shape]; ; i++ {
			if i == len(t.tables) {
				t.tables = append(t.tables, newTable(g, t.raster))
			}
			empty := len(t.tables[i].placed) == 0
			if at, ok := t.tables[i].drop(s, t.rule); ok {
				at.piece = p
				t.tables[i].lay(at)
				break
			}
			if empty { // the check lets no such piece through; better an item left over than a search without end
				t.unfit = append(t.unfit, p)
				t.tables = t.tables[:i]
				break
			}
			if i == full[p.shape] {
				full[p.shape]++
			}
		}
	}
	t.value = value{undone: t.undone + len(t.unfit), sheets: len(t.tables)}
	for i, table := range t.tables {
		if i >= g.stock.Quantity {
			t.value.over += len(table.placed)
		}
		t.value.reach = table.reach()
	}
}
