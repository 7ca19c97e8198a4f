package outline

import "slices"

// sweepPairs calls meet for every pair of boxes that come within tol of each other, in an order that
// depends on the boxes alone: they are sorted along the axis in which they are spread widest, and each
// is compared with those that begin before it ends. O(n log n + pairs that overlap along the axis).
func sweepPairs(boxes []Box, tol float64, meet func(i, j int32)) {
	if len(boxes) < 2 {
		return
	}
	all := EmptyBox()
	var w, h float64
	for i := range boxes {
		b := &boxes[i]
		all = all.Union(*b)
		w += b.Max.X - b.Min.X
		h += b.Max.Y - b.Min.Y
	}
	alongX := all.Width()*h >= all.Height()*w
	keys := make([]sweepKey, len(boxes))
	for i := range boxes {
		lo := boxes[i].Min.X
		if !alongX {
			lo = boxes[i].Min.Y
		}
		keys[i] = sweepKey{lo - tol, int32(i)}
	}
	slices.SortFunc(keys, func(a, b sweepKey) int {
		switch {
		case a.lo < b.lo:
			return -1
		case a.lo > b.lo:
			return 1
		}
		return int(a.i - b.i)
	})
	items := make([]item, len(boxes))
	for x, k := range keys {
		b := &boxes[k.i]
		if alongX {
			items[x] = item{k.lo, b.Max.X, b.Min.Y - tol, b.Max.Y, k.i}
		} else {
			items[x] = item{k.lo, b.Max.Y, b.Min.X - tol, b.Max.X, k.i}
		}
	}
	for x := range items {
		a := &items[x]
		for y := x + 1; y < len(items); y++ {
			b := &items[y]
			if b.lo > a.hi {
				break
			}
			if b.side <= a.sideHi && a.side <= b.sideHi {
				meet(min(a.i, b.i), max(a.i, b.i))
			}
		}
	}
}

// sweepKey is where a box begins along the axis.
type sweepKey struct {
	lo float64
	i  int32
}

// item is a box in the sweep: its extent along the axis and across it, the lower ends moved out by the
// tolerance.
type item struct {
	lo, hi       float64
	side, sideHi float64
	i            int32
}
