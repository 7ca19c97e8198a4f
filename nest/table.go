package nest

import (
	"math"

	"pinwright/parts/outline"
)

// put is a form at its place in the frame of the work.
type put struct {
	piece
	form *form
	at   outline.Point
}

// table is a sheet being filled.
type table struct {
	cell        float64
	width, long float64 // of the room, mm
	field       field
	placed      []put
	from        []int  // by form: the first row that is not ruled out; dead if all are
	strict      []bool // by form: its cells must lie wholly in the room
	raster      bool   // forms stay where the raster finds them
	blocked     []uint64
}

const dead = math.MaxInt

// slack is the number of cells by which a form may stick out of the room on the raster. Its cells may
// be up to two more than it needs, one for each side; it is slid before it is judged.
const slack = 2

// noise is what values may differ by through rounding, which is not the same on all processors, mm: no choice
// hangs on it.
const noise = 1e-6

// rounded takes the noise away.
func rounded(v float64) float64 { return math.Round(v/noise) * noise }

// lost is the length of part of a cell that is free all the same, cells.
const lost = 1e-6

func newTable(g *group, raster bool) *table {
	u, v, _ := g.stock.room()
	w, h := int(u/g.cell)+2+slack, int(v/g.cell)+2+slack
	t := &table{
		raster: raster,
		cell:   g.cell, width: u, long: v,
		field:  newField(w, h, g.longest),
		from:   make([]int, g.forms),
		strict: make([]bool, g.forms),
	}
	t.blocked = make([]uint64, t.field.levels[0].stride)
	return t
}

// rule says which of the places that a piece can take is the best: that with the least value.
type rule int

const (
	farEnd   rule = iota // where its far end is lowest
	centroid             // where its centroid is lowest
	nearEnd              // where its near end is lowest, of equal ones the flattest
	rules
)

func (r rule) value(f *form, p outline.Point) float64 {
	// Of equal places the one further left, and of these the first form.
	v := p.X * 1e-4
	switch r {
	case centroid:
		return v + p.Y + f.middle
	case nearEnd:
		return v + p.Y + f.height*0.1
	}
	return v + p.Y + f.height
}

// drop puts a shape where the rule likes it best; false if the table has no room for it.
//
// Each form has one candidate: the first free place of its cells on the raster, slid down and left until it
// touches. Cells take more room than the form, so along the far sides they may stick out of the room at
// first, and the slide tells whether the form does.
func (t *table) drop(s *shape, r rule) (put, bool) {
	best, value := put{}, math.Inf(1)
	for i := range s.forms {
		f, id := &s.forms[i], s.first+i
		for t.from[id] != dead {
			// The slide gains two cells at most by rule of thumb; a wrong guess costs a better place, no overlap.
			if low := float64(t.from[id]-slack) * t.cell; r.value(f, outline.Point{Y: low}) >= value-noise {
				break
			}
			xLast, yLast := t.last(f, t.strict[id])
			x, y, ok := t.field.firstFree(&f.stamp, t.from[id], xLast, yLast, t.blocked)
			if !ok {
				t.from[id] = dead
				break
			}
			t.from[id] = y
			p := t.slide(f, outline.Point{X: float64(x) * t.cell, Y: float64(y) * t.cell})
			if !t.holds(f, p) {
				t.strict[id] = true
				continue
			}
			if v := r.value(f, p); v < value-noise {
				best, value = put{form: f, at: p}, v
			}
			break
		}
	}
	return best, best.form != nil
}

// last returns the last cell and row at which a form may be tried.
func (t *table) last(f *form, strict bool) (x, y int) {
	x = int(math.Floor((t.width-f.inner.Max.X)/t.cell + lost))
	y = int(math.Floor((t.long-f.inner.Max.Y)/t.cell + lost))
	if !strict {
		x, y = x+slack, y+slack
	}
	field := t.field.levels[0]
	return min(x, field.width-f.stamp.width), min(y, field.height-f.stamp.height)
}

// holds tells whether a form at p is within the room on its far sides.
func (t *table) holds(f *form, p outline.Point) bool {
	return p.X+f.inner.Max.X <= t.width+2*fitTolerance && p.Y+f.inner.Max.Y <= t.long+2*fitTolerance
}

// lay presses a shape into the table.
func (t *table) lay(p put) {
	t.placed = append(t.placed, p)
	t.field.press(p.form.rings, p.at, t.cell)
}

// reach is how far the forms reach along the sheet, mm.
func (t *table) reach() (far float64) {
	for _, p := range t.placed {
		far = math.Max(far, p.at.Y+p.form.inner.Max.Y)
	}
	return rounded(far)
}
