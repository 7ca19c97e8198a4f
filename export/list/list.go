// Package list writes the lists that go with the sheets as CSV: the parts, the hardware to buy and
// the path of the joints.
//
// The files follow RFC 4180 (comma, CRLF, quotes only where needed) in UTF-8, with one header line
// whose names carry the unit. Numbers have a decimal point, or a decimal comma with semicolons
// between the columns where a spreadsheet of that custom is asked for. Rows are written in the
// order given.
package list

import (
	"encoding/csv"
	"fmt"
	"io"
	"math"
	"strconv"
	"strings"
)

// Options is the custom of the spreadsheet that will read the list. The zero value is RFC 4180 with
// a decimal point.
type Options struct {
	DecimalComma bool // 3,5 instead of 3.5, and semicolons between the columns
}

// table is one CSV file being written. The first error sticks.
type table struct {
	csv    *csv.Writer
	comma  bool
	header []string
	row    []string
	rows   int // rows written, the header not counted
	err    error
}

func newTable(w io.Writer, o Options, header ...string) *table {
	t := &table{csv: csv.NewWriter(w), comma: o.DecimalComma, header: header}
	t.csv.UseCRLF = true
	if o.DecimalComma {
		t.csv.Comma = ';'
	}
	for _, name := range header {
		t.text(name)
	}
	t.flushRow()
	return t
}

func (t *table) flushRow() {
	if t.err == nil {
		t.err = t.csv.Write(t.row)
	}
	t.row = t.row[:0]
}

// next ends a row of the body.
func (t *table) next() {
	t.flushRow()
	t.rows++
}

// end returns the first error of all.
func (t *table) end() error {
	t.csv.Flush()
	if t.err == nil {
		t.err = t.csv.Error()
	}
	return t.err
}

func (t *table) text(s string) { t.row = append(t.row, Shield(s)) }

func (t *table) whole(n int) { t.row = append(t.row, strconv.Itoa(n)) }

// number writes v rounded to so many decimals, without trailing zeros.
func (t *table) number(v float64, decimals int) {
	if (math.IsNaN(v) || math.IsInf(v, 0)) && t.err == nil {
		t.err = fmt.Errorf("row %d, column %s: %v is not a number", t.rows+1, t.header[len(t.row)], v)
	}
	s := strconv.FormatFloat(v, 'f', decimals, 64)
	if strings.Contains(s, ".") {
		s = strings.TrimRight(strings.TrimRight(s, "0"), ".")
	}
	if s == "-0" {
		s = "0"
	}
	if t.comma {
		s = strings.Replace(s, ".", ",", 1)
	}
	t.row = append(t.row, s)
}
