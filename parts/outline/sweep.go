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
	for _, b := range boxes {
		all = all.Union(b)
		w += b.Width()
		h += b.Height()
	}
	alongX := all.Width()*h >= all.Height()*w
	items := make([]item, len(boxes))
	for i, b := range boxes {
		if alongX {
			items[i] = item{b.Min.X - tol, b.Max.X, b.Min.Y - tol, b.Max.Y, int32(i)}
		} else {
			items[i] = item{b.Min.Y - tol, b.Max.Y, b.Min.X - tol, b.Max.X, int32(i)}
		}
	}
	slices.SortFunc(items, func(a, b item) int {
		switch {
		case a.lo < b.lo:
			return -1
		case a.lo > b.lo:
			return 1
		}
		return int(a.i - b.i)
	})
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

// item is a box in the sweep: its extent along the axis and across it, the lower ends moved out by the
// tolerance.
type item struct {
	lo, hi       float64
	side, sideHi float64
	i            int32
}
