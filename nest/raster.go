package nest

import (
	"math"
	"math/bits"

	"pinwright/parts/outline"
)

// bitmap is a raster of cells, row by row, 64 cells a word; bit 0 of word 0 is the first cell of a row.
type bitmap struct {
	width, height int // cells
	stride        int // words a row
	bits          []uint64
}

func newBitmap(width, height int) bitmap {
	stride := (width + 63) / 64
	return bitmap{width, height, stride, make([]uint64, stride*height)}
}

func (b bitmap) row(y int) []uint64 { return b.bits[y*b.stride : (y+1)*b.stride] }

// fill sets the cells from a to b inclusive of a row.
func (b bitmap) fill(y, from, to int) {
	from, to = max(from, 0), min(to, b.width-1)
	row := b.row(y)
	for x := from; x <= to; x++ {
		row[x>>6] |= 1 << (x & 63)
	}
}

// run is a stretch of set cells of one row, from and to inclusive.
type run struct{ from, to int }

// stamp is a shape as cells: every cell that the shape touches is set, so shapes whose cells are
// apart are apart. Cell (0, 0) has its lower left corner at the origin of the shape's bounding box.
type stamp struct {
	width, height int
	rows          [][]run
	cells         int
	low           outline.Point // lower left corner of the bounding box, in the turned shape's frame
}

// newStamp rasters regions; cell is the size of a cell, chord the error allowed in flattening.
//
// A cell is touched by a region if an edge of it runs through the cell, or if its middle is inside.
func newStamp(rs []outline.Region, cell, chord float64) stamp {
	box := outline.Bounds(rs)
	s := stamp{
		width:  int(math.Ceil(box.Width()/cell)) + 1,
		height: int(math.Ceil(box.Height()/cell)) + 1,
		low:    box.Min,
	}
	b := newBitmap(s.width, s.height)
	var rings [][]outline.Point
	for _, r := range rs {
		rings = append(rings, outline.Flatten(r.Outer, chord, outline.Around))
		for _, h := range r.Holes {
			// Around keeps a hole's outline within the polygon; the free room must be within the
			// hole, so it is taken the other way round.
			rings = append(rings, outline.Flatten(h, chord, outline.Within))
		}
	}
	crossings := make([][]float64, s.height)
	for _, ring := range rings {
		for i, p := range ring {
			q := ring[(i+1)%len(ring)]
			edgeCells(b, p.Sub(box.Min).Scale(1/cell), q.Sub(box.Min).Scale(1/cell), crossings)
		}
	}
	for y := range s.height {
		xs := crossings[y]
		sortFloats(xs)
		for i := 0; i+1 < len(xs); i += 2 {
			b.fill(y, int(math.Ceil(xs[i]-0.5)), int(math.Floor(xs[i+1]-0.5)))
		}
	}
	s.rows = make([][]run, s.height)
	for y := range s.height {
		s.rows[y] = runsOf(b.row(y), s.width)
		for _, r := range s.rows[y] {
			s.cells += r.to - r.from + 1
		}
	}
	return s
}

// edgeCells sets the cells that an edge touches and notes where it crosses the middle of rows.
func edgeCells(b bitmap, p, q outline.Point, crossings [][]float64) {
	if p.Y > q.Y {
		p, q = q, p
	}
	slope := 0.0
	if q.Y > p.Y {
		slope = (q.X - p.X) / (q.Y - p.Y)
	}
	for y := max(0, int(math.Floor(p.Y))); y <= min(b.height-1, int(math.Floor(q.Y))); y++ {
		from, to := p.X, q.X
		if slope != 0 || q.Y > p.Y {
			lo, up := math.Max(p.Y, float64(y)), math.Min(q.Y, float64(y+1))
			from, to = p.X+(lo-p.Y)*slope, p.X+(up-p.Y)*slope
		}
		if from > to {
			from, to = to, from
		}
		b.fill(y, int(math.Floor(from-1e-9)), int(math.Floor(to+1e-9)))
		if m := float64(y) + 0.5; p.Y <= m && m < q.Y {
			crossings[y] = append(crossings[y], p.X+(m-p.Y)*slope)
		}
	}
}

func sortFloats(xs []float64) {
	for i := 1; i < len(xs); i++ {
		for k := i; k > 0 && xs[k] < xs[k-1]; k-- {
			xs[k], xs[k-1] = xs[k-1], xs[k]
		}
	}
}

func runsOf(row []uint64, width int) []run {
	var out []run
	for x := 0; x < width; {
		if row[x>>6]&(1<<(x&63)) == 0 {
			x++
			continue
		}
		from := x
		for x < width && row[x>>6]&(1<<(x&63)) != 0 {
			x++
		}
		out = append(out, run{from, x - 1})
	}
	return out
}

// firstFree returns the lowest row from y0 on, and in it the first cell, at which the stamp hits no set
// cell of the sheet; false if there is none. blocked and spread are scratch rows of the sheet's stride.
func firstFree(sheet bitmap, s stamp, y0 int, blocked, spread []uint64) (x, y int, ok bool) {
	last := sheet.width - s.width
	if last < 0 {
		return 0, 0, false
	}
	for y = y0; y+s.height <= sheet.height; y++ {
		clear(blocked)
		full := false
		for r := 0; r < s.height && !full; r++ {
			row := sheet.row(y + r)
			if isZero(row) {
				continue
			}
			for _, run := range s.rows[r] {
				orSpread(blocked, row, run, spread)
			}
			full = r&7 == 7 && firstZero(blocked, last) < 0
		}
		if full {
			continue
		}
		if x = firstZero(blocked, last); x >= 0 {
			return x, y, true
		}
	}
	return 0, 0, false
}

func isZero(row []uint64) bool {
	for _, w := range row {
		if w != 0 {
			return false
		}
	}
	return true
}

// firstZero returns the first clear bit up to last, or -1.
func firstZero(row []uint64, last int) int {
	for i, w := range row {
		if w == ^uint64(0) {
			continue
		}
		x := i*64 + bits.TrailingZeros64(^w)
		if x > last {
			return -1
		}
		return x
	}
	return -1
}

// orSpread sets blocked at every x for which row has a set cell between x+run.from and x+run.to. The
// stretch is built up by doubling: the union of shifts over 2k is that over k and itself shifted by k.
func orSpread(blocked, row []uint64, r run, spread []uint64) {
	copy(spread, row)
	length, have := r.to-r.from+1, 1
	for have < length {
		step := min(have, length-have)
		orShiftDown(spread, spread, step)
		have += step
	}
	orShiftDown(blocked, spread, r.from)
}

// orShiftDown sets dst |= src >> n, cell x taking cell x+n. dst may be src when n > 0: words are
// written from the lowest up and read at or above the place written.
func orShiftDown(dst, src []uint64, n int) {
	words, rest := n/64, uint(n%64)
	for i := range dst {
		k := i + words
		if k >= len(src) {
			return
		}
		v := src[k] >> rest
		if rest > 0 && k+1 < len(src) {
			v |= src[k+1] << (64 - rest)
		}
		dst[i] |= v
	}
}

// press sets the cells of a stamp at (x, y).
func (b bitmap) press(s stamp, x, y int) {
	for r, runs := range s.rows {
		for _, run := range runs {
			b.fill(y+r, x+run.from, x+run.to)
		}
	}
}
