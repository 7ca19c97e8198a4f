package dxf

import (
	"bytes"
	"math"
	"strconv"
	"strings"
)

// tags is a drawing being written: pairs of group code and value, a line each.
type tags struct {
	buf []byte
	bad bool // a number that DXF cannot hold was asked for
}

func (t *tags) code(c int) {
	if c < 100 {
		t.buf = append(t.buf, ' ')
	}
	if c < 10 {
		t.buf = append(t.buf, ' ')
	}
	t.buf = strconv.AppendInt(t.buf, int64(c), 10)
	t.buf = append(t.buf, '\n')
}

func (t *tags) str(c int, s string) {
	t.code(c)
	t.buf = append(t.buf, s...)
	t.buf = append(t.buf, '\n')
}

func (t *tags) int(c, v int) {
	t.code(c)
	t.buf = strconv.AppendInt(t.buf, int64(v), 10)
	t.buf = append(t.buf, '\n')
}

func (t *tags) handle(c int, h int) {
	t.code(c)
	t.buf = append(t.buf, hex(h)...)
	t.buf = append(t.buf, '\n')
}

// num writes a number: the shortest plain decimal that reads back as the same float64, always with
// a decimal point, because some readers tell reals from integers by it. Minus zero becomes zero.
func (t *tags) num(c int, v float64) {
	if math.IsNaN(v) || math.Abs(v) > maxCoordinate {
		t.bad = true
	}
	t.code(c)
	if v == 0 {
		v = math.Abs(v)
	}
	at := len(t.buf)
	t.buf = strconv.AppendFloat(t.buf, v, 'f', -1, 64)
	if bytes.IndexByte(t.buf[at:], '.') < 0 {
		t.buf = append(t.buf, '.', '0')
	}
	t.buf = append(t.buf, '\n')
}

func (t *tags) point(c int, x, y float64) {
	t.num(c, x)
	t.num(c+10, y)
}

func (t *tags) point3(c int, x, y, z float64) {
	t.point(c, x, y)
	t.num(c+20, z)
}

// list writes integers with their codes: code, value, code, value.
func (t *tags) list(pairs ...int) {
	for i := 0; i+1 < len(pairs); i += 2 {
		t.int(pairs[i], pairs[i+1])
	}
}

// maxCoordinate is the largest coordinate that is written or read, mm: a kilometre, far beyond any
// sheet, and far below where a micrometre is lost in a float64.
const maxCoordinate = 1e6

func hex(h int) string { return strings.ToUpper(strconv.FormatInt(int64(h), 16)) }

func itoa(n int) string { return strconv.Itoa(n) }
