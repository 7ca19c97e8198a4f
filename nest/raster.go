package nest

import (
	"math"
	"math/bits"
	"slices"

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

// fill sets the cells from a to b inclusive of a row; cells off the raster are left out.
func (b bitmap) fill(y, from, to int) {
	from, to = max(from, 0), min(to, b.width-1)
	if y < 0 || y >= b.height || from > to {
		return
	}
	row := b.row(y)
	first, last := from>>6, to>>6
	head, tail := ^uint64(0)<<(from&63), ^uint64(0)>>(63-to&63)
	if first == last {
		row[first] |= head & tail
		return
	}
	row[first] |= head
	for i := first + 1; i < last; i++ {
		row[i] = ^uint64(0)
	}
	row[last] |= tail
}

// run is a stretch of set cells of one row, from and to inclusive.
type run struct{ from, to int }

// stamp is a shape as cells: every cell that the shape touches is set, so shapes whose cells are
// apart are apart. Cell (0, 0) has its lower left corner at the corner of the shape's box.
type stamp struct {
	width, height int
	rows          [][]run
	probe         []int // all rows, in an order in which far apart ones come first
	longest       int   // run, cells
}

// newStamp rasters rings with their box, of this width and height, at the origin.
func newStamp(rings [][]outline.Point, width, height, cell float64) stamp {
	s := stamp{width: cells(width, cell), height: cells(height, cell)}
	b := newBitmap(s.width, s.height)
	var p painter
	p.paint(b, rings, outline.Point{}, cell)
	s.rows = make([][]run, s.height)
	for y := range s.height {
		s.rows[y] = runsOf(b.row(y), s.width)
		for _, r := range s.rows[y] {
			s.longest = max(s.longest, r.to-r.from+1)
		}
	}
	for step := 1 << bits.Len(uint(s.height)); step > 0; step /= 2 {
		for y := step - 1; y < s.height; y += 2 * step {
			s.probe = append(s.probe, y)
		}
	}
	return s
}

// touch is how far into a cell a shape must reach to take it, cells: what only touches a cell's side
// leaves it free, rounding included.
const touch = 1e-7

// cells is the number of cells that a length from a cell's side takes, at least one.
func cells(length, cell float64) int { return max(1, int(math.Ceil(length/cell-touch))) }

// painter sets the cells that shapes touch. It keeps its scratch room.
type painter struct{ crossings [][]float64 }

// paint sets the cells that rings moved by at touch, and returns the first and last of the rows.
//
// A cell is touched if an edge runs through it, or if its middle is inside.
func (p *painter) paint(b bitmap, rings [][]outline.Point, at outline.Point, cell float64) (low, high int) {
	for len(p.crossings) < b.height {
		p.crossings = append(p.crossings, nil)
	}
	low, high = b.height, -1
	for _, ring := range rings {
		for i, a := range ring {
			c := ring[(i+1)%len(ring)]
			from, to := p.edge(b, a.Add(at).Scale(1/cell), c.Add(at).Scale(1/cell))
			low, high = min(low, from), max(high, to)
		}
	}
	for y := max(low, 0); y <= min(high, b.height-1); y++ {
		xs := p.crossings[y]
		slices.Sort(xs)
		for i := 0; i+1 < len(xs); i += 2 {
			b.fill(y, int(math.Ceil(xs[i]-0.5)), int(math.Floor(xs[i+1]-0.5)))
		}
		p.crossings[y] = xs[:0]
	}
	return max(low, 0), min(high, b.height-1)
}

// edge sets the cells that an edge touches, notes where it crosses the middle of rows, and returns its
// first and last row.
func (p *painter) edge(b bitmap, a, c outline.Point) (low, high int) {
	if a.Y > c.Y {
		a, c = c, a
	}
	slope := 0.0
	if c.Y > a.Y {
		slope = (c.X - a.X) / (c.Y - a.Y)
	}
	low = max(0, int(math.Floor(a.Y+touch)))
	high = min(b.height-1, max(int(math.Ceil(c.Y-touch))-1, int(math.Floor(a.Y+touch))))
	for y := low; y <= high; y++ {
		from, to := a.X, c.X
		if c.Y > a.Y {
			from, to = a.X+(math.Max(a.Y, float64(y))-a.Y)*slope, a.X+(math.Min(c.Y, float64(y+1))-a.Y)*slope
		}
		if from > to {
			from, to = to, from
		}
		b.fill(y, int(math.Floor(from+touch)), int(math.Ceil(to-touch))-1)
		if m := float64(y) + 0.5; a.Y <= m && m < c.Y {
			p.crossings[y] = append(p.crossings[y], a.X+(m-a.Y)*slope)
		}
	}
	return low, high
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

// field is the cells of a sheet that are taken, ready to be asked for stretches: in level k the cell x
// is set if one of the cells x to x+2^k-1 is taken. Whether a run of cells meets a taken one is then
// the union of two levels' words, for all places in a row at once.
type field struct {
	levels []bitmap
	top    int // rows from here on are free
	paint  painter
}

func newField(width, height, longest int) field {
	f := field{}
	for range bits.Len(uint(longest)) {
		f.levels = append(f.levels, newBitmap(width, height))
	}
	return f
}

// press takes the cells that rings moved by at touch.
func (f *field) press(rings [][]outline.Point, at outline.Point, cell float64) {
	low, high := f.paint.paint(f.levels[0], rings, at, cell)
	for k := 1; k < len(f.levels); k++ {
		for y := low; y <= high; y++ {
			row := f.levels[k].row(y)
			copy(row, f.levels[k-1].row(y))
			orShiftDown(row, f.levels[k-1].row(y), 1<<(k-1))
		}
	}
	f.top = max(f.top, high+1)
}

// firstFree returns the lowest row from y0 up to yLast, and in it the first cell up to xLast, at which
// the stamp meets no taken cell; false if there is none. blocked is a scratch row.
func (f *field) firstFree(s *stamp, y0, xLast, yLast int, blocked []uint64) (x, y int, ok bool) {
	for y = y0; y <= yLast; y++ {
		clear(blocked)
		full := false
		for i, r := range s.probe {
			if y+r >= f.top {
				continue
			}
			for _, run := range s.rows[r] {
				k := bits.Len(uint(run.to-run.from+1)) - 1
				row := f.levels[k].row(y + r)
				orShiftDown(blocked, row, run.from)
				if rest := run.to - 1<<k + 1; rest > run.from {
					orShiftDown(blocked, row, rest)
				}
			}
			if i&3 == 3 && firstZero(blocked, xLast) < 0 {
				full = true
				break
			}
		}
		if full {
			continue
		}
		if x = firstZero(blocked, xLast); x >= 0 {
			return x, y, true
		}
	}
	return 0, 0, false
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

// orShiftDown sets dst |= src >> n, cell x taking cell x+n.
func orShiftDown(dst, src []uint64, n int) {
	words, rest := n/64, uint(n%64)
	if words >= len(src) {
		return
	}
	src = src[words:]
	if rest == 0 {
		for i, w := range src {
			dst[i] |= w
		}
		return
	}
	last := len(src) - 1
	dst = dst[:len(src)]
	for i := range last {
		dst[i] |= src[i]>>rest | src[i+1]<<(64-rest)
	}
	dst[last] |= src[last] >> rest
}
