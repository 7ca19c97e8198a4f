package reading

import (
	"encoding/csv"
	"errors"
	"fmt"
	"io"
	"math"
	"slices"
	"strconv"
	"strings"
	"time"
	"unicode/utf8"

	"pinwright/parts/job"
)

// Columns are the columns of a table of readings, in the order in which a blank one is written.
// Columns of lengths may end in _in instead of _mm.
var columns = []string{"feature", "kind", "drawn", "count", "axis", "side", "reading", "over", "under", "pin", "answer", "resolution"}

// Limits of what is taken.
const (
	mostBytes = 4 << 20
	mostRows  = 20000
	inch      = 25.4
)

// table is the state of one reading of a table.
type table struct {
	sheet      Sheet
	lines      []string
	comma      rune
	where      map[string]int     // column to place
	unit       map[string]float64 // column to millimetres
	resolution float64            // of readings that do not say their own, mm; NaN: not stated
	places     [][]place          // of the cells of each reading, by column
	errs       job.Errors
}

// place is a cell's text and where it stands.
type place struct {
	text         string
	line, column int
}

// Read reads a table of readings: CSV with commas (or semicolons, then with decimal commas if you
// like), lines that begin with # being comments.
//
// First come rows of a key and its value, each of which may be left out: material, thickness_mm, laser,
// date (YYYY-MM-DD), resolution_mm (of the calliper, 0.01 when not said). Then the heading, which begins
// with feature, and a row for each reading. Every row has feature, kind (hole, slot, bar) and drawn_mm,
// and then one of: reading_mm (a calliper value), over_mm and under_mm (the size lies between: the
// largest gauge that goes and the smallest that does not; one of them may be empty), or pin_mm and
// answer (drops, turns, push, no). A row with none of these was not filled in and is counted as blank.
//
// All that is wrong comes in one job.Errors, each with file, line and column.
func Read(file string, data []byte) (Sheet, error) {
	t := &table{sheet: Sheet{File: file}, resolution: math.NaN(), comma: ','}
	text := strings.TrimPrefix(string(data), "\ufeff")
	switch {
	case len(data) > mostBytes:
		t.fail(place{line: 1, column: 1}, "is it the right file?", "the table has %d bytes, more than the %d that are taken", len(data), mostBytes)
	case !utf8.ValidString(text):
		t.fail(place{line: 1, column: 1}, "save the table as CSV, UTF-8", "not a text in UTF-8")
	default:
		text = strings.ReplaceAll(text, "\r\n", "\n")
		t.lines = strings.Split(text, "\n")
		t.rows(text)
	}
	if len(t.errs) == 0 {
		t.doubt()
	}
	if len(t.errs) > 0 {
		slices.SortStableFunc(t.errs, func(a, b job.Error) int {
			if a.Line != b.Line {
				return a.Line - b.Line
			}
			return a.Column - b.Column
		})
		return Sheet{}, t.errs
	}
	return t.sheet, nil
}

// fail notes an error at a place.
func (t *table) fail(at place, hint, format string, args ...any) {
	e := job.Error{Span: max(1, utf8.RuneCountInString(at.text)), Message: fmt.Sprintf(format, args...), Hint: hint}
	e.File, e.Line, e.Column = t.sheet.File, max(1, at.line), max(1, at.column)
	if at.line >= 1 && at.line <= len(t.lines) {
		e.Source = t.lines[at.line-1]
	}
	t.errs = append(t.errs, e)
}

// rows splits the text into rows and hands them on.
func (t *table) rows(text string) {
	for _, line := range t.lines {
		if l := strings.TrimSpace(line); l != "" && !strings.HasPrefix(l, "#") {
			if strings.Contains(l, ";") && !strings.Contains(l, ",") {
				t.comma = ';'
			}
			break
		}
	}
	in := csv.NewReader(strings.NewReader(text))
	in.FieldsPerRecord, in.TrimLeadingSpace, in.Comment, in.Comma = -1, true, '#', t.comma
	count := 0
	for {
		record, err := in.Read()
		if errors.Is(err, io.EOF) {
			break
		}
		if err != nil {
			var parse *csv.ParseError
			at := place{line: 1, column: 1}
			if errors.As(err, &parse) {
				at.line, at.column = parse.Line, parse.Column
			}
			t.fail(at, "take quotes out, or put them round the whole field", "not understood as CSV: a quote that does not fit")
			return
		}
		row := make([]place, len(record))
		for i, field := range record {
			line, column := in.FieldPos(i)
			before := ""
			if line <= len(t.lines) && column-1 <= len(t.lines[line-1]) {
				before = t.lines[line-1][:column-1]
			}
			row[i] = place{strings.TrimSpace(field), line, utf8.RuneCountInString(before) + 1}
		}
		for len(row) > 1 && row[len(row)-1].text == "" && (t.where == nil || len(row) > len(t.where)) {
			row = row[:len(row)-1] // spreadsheets fill rows up
		}
		switch {
		case len(row) == 1 && row[0].text == "":
		case t.where == nil && row[0].text == "feature":
			if !t.heading(row) {
				return
			}
		case t.where == nil:
			t.key(row)
		default:
			if count++; count > mostRows {
				t.fail(row[0], "is it the right file?", "more than %d rows", mostRows)
				return
			}
			t.row(row)
		}
	}
	switch {
	case t.where == nil && len(t.errs) == 0:
		t.fail(place{line: 1, column: 1}, "the heading begins with feature, kind, drawn_mm", "the table has no heading")
	case t.where != nil && len(t.errs) == 0 && len(t.sheet.Readings) == 0 && t.sheet.Blank > 0:
		t.fail(place{line: 1, column: 1}, "fill in reading_mm, or pin_mm and answer", "nothing is filled in: all %d rows are blank", t.sheet.Blank)
	case t.where != nil && len(t.errs) == 0 && len(t.sheet.Readings) == 0:
		t.fail(place{line: 1, column: 1}, "write a row for each reading", "the table is empty: a heading and no rows")
	}
}

// key reads a row before the heading.
func (t *table) key(row []place) {
	if len(row) != 2 {
		t.fail(row[0], "before the heading stand keys with their values: material, thickness_mm, laser, date, resolution_mm", "a row of %d fields before the heading", len(row))
		return
	}
	value := row[1]
	switch name, unit := split(row[0].text); {
	case name == "material" && t.sheet.Material == "":
		t.sheet.Material = value.text
	case name == "laser" && t.sheet.Laser == "":
		t.sheet.Laser = value.text
	case name == "date" && t.sheet.Date == "":
		if _, err := time.Parse(time.DateOnly, value.text); err != nil {
			t.fail(value, "write it as 2026-11-30", "%q is no date", value.text)
		}
		t.sheet.Date = value.text
	case name == "thickness" && unit > 0 && t.sheet.Thickness == 0:
		if v, ok := t.number(value, "thickness"); ok {
			t.sheet.Thickness = v * unit
			if v*unit <= 0 || v*unit > 100 {
				t.fail(value, "write the measured thickness of the sheet", "a sheet of %s mm is not cut", mm(v*unit))
			}
		}
	case name == "resolution" && unit > 0 && math.IsNaN(t.resolution):
		if v, ok := t.number(value, "resolution"); ok {
			t.resolution = v * unit
			if !(t.resolution >= 0) || t.resolution > 1 {
				t.fail(value, "write the step of its last digit, such as 0.01", "an instrument that shows steps of %s mm measures no kerf", mm(v*unit))
			}
		}
	default:
		t.fail(row[0], "the keys are material, thickness_mm, laser, date, resolution_mm, each once", "unknown or repeated key %q", row[0].text)
	}
}

// split takes the unit off a name: its size in mm, 0 when there is none.
func split(name string) (string, float64) {
	if n, ok := strings.CutSuffix(name, "_mm"); ok {
		return n, 1
	}
	if n, ok := strings.CutSuffix(name, "_in"); ok {
		return n, inch
	}
	return name, 0
}

// heading reads the heading.
func (t *table) heading(row []place) bool {
	t.where, t.unit = map[string]int{}, map[string]float64{}
	before := len(t.errs)
	for i, h := range row {
		name, unit := split(h.text)
		long := slices.Contains([]string{"drawn", "reading", "over", "under", "pin", "resolution"}, name)
		switch _, twice := t.where[name]; {
		case !slices.Contains(columns, name):
			t.fail(h, "the columns are feature, kind, drawn_mm, count, axis, side, reading_mm, over_mm, under_mm, pin_mm, answer, resolution_mm", "unknown column %q", h.text)
		case twice:
			t.fail(h, "keep one of them", "column %s is there twice", name)
		case long != (unit > 0):
			t.fail(h, "columns of lengths, and no others, end in _mm or _in", "column %q", h.text)
		}
		t.where[name], t.unit[name] = i, unit
	}
	for _, name := range []string{"feature", "kind", "drawn"} {
		if _, ok := t.where[name]; !ok {
			t.fail(row[0], "", "no column %s", name)
		}
	}
	return len(t.errs) == before
}

// number reads a number, with a decimal comma where fields are between semicolons.
func (t *table) number(c place, what string) (float64, bool) {
	text := c.text
	if t.comma == ';' {
		text = strings.Replace(text, ",", ".", 1)
	}
	v, err := strconv.ParseFloat(text, 64)
	if err != nil || math.IsNaN(v) || math.IsInf(v, 0) || strings.ContainsAny(text, "xXpP_") {
		t.fail(c, "write a number such as 4.12; its unit stands in the heading", "%s: %q is no number", what, c.text)
		return 0, false
	}
	return v, true
}

// row reads one reading.
func (t *table) row(row []place) {
	if len(row) != len(t.where) {
		t.fail(row[0], "", "the row has %d fields, the heading has %d", len(row), len(t.where))
		return
	}
	before := len(t.errs)
	cell := func(name string) place {
		if i, ok := t.where[name]; ok {
			return row[i]
		}
		return place{line: row[0].line, column: row[0].column}
	}
	length := func(name string) (float64, bool) {
		c := cell(name)
		if c.text == "" {
			return 0, false
		}
		v, ok := t.number(c, name)
		if ok && v <= 0 && name != "resolution" || v < 0 {
			t.fail(c, "write the size itself, not what it is off", "%s is %s mm: sizes are above 0", name, mm(v*t.unit[name]))
		}
		return v * t.unit[name], ok
	}
	r := Reading{Feature: cell("feature").text, Kind: Kind(cell("kind").text), Axis: Axis(cell("axis").text), Side: Side(cell("side").text), Answer: Answer(cell("answer").text), Count: 1, Line: row[0].line}
	if r.Feature == "" {
		t.fail(cell("feature"), "name what was measured as the coupon does", "the feature has no name")
	}
	if !slices.Contains([]Kind{Hole, Slot, Bar}, r.Kind) {
		t.fail(cell("kind"), "the kinds are hole, slot, bar", "unknown kind %q", r.Kind)
	}
	if !slices.Contains([]Axis{AnyAxis, X, Y}, r.Axis) {
		t.fail(cell("axis"), "x, y, or nothing", "unknown axis %q", r.Axis)
	}
	if !slices.Contains([]Side{Through, Top, Bottom}, r.Side) {
		t.fail(cell("side"), "top, bottom, or nothing", "unknown side %q", r.Side)
	}
	if r.Answer != NoAnswer && r.Answer.Looseness() < 0 {
		t.fail(cell("answer"), "the answers are drops, turns, push, no", "unknown answer %q", r.Answer)
	}
	if c := cell("count"); c.text != "" {
		n, err := strconv.Atoi(c.text)
		if err != nil || n < 1 || n > 1000 {
			t.fail(c, "write how many bars were measured side by side", "count: %q is no such number", c.text)
		} else if r.Count = n; n > 1 && r.Kind != Bar {
			t.fail(c, "only bars are measured side by side", "%d of kind %s at once", n, r.Kind)
		}
	}
	var ok bool
	if r.Drawn, ok = length("drawn"); !ok && cell("drawn").text == "" {
		t.fail(cell("drawn"), "write the size that went to the laser", "drawn is empty")
	}
	value, measured := length("reading")
	over, hasOver := length("over")
	under, hasUnder := length("under")
	pin, hasPin := length("pin")
	step, hasStep := length("resolution")
	if !hasStep {
		if step = t.resolution; math.IsNaN(step) {
			step = usualResolution
		}
	}
	answered := r.Answer != NoAnswer
	if len(t.errs) > before {
		return
	}
	ways := 0
	for _, way := range []bool{measured, hasOver || hasUnder, answered} {
		if way {
			ways++
		}
	}
	switch {
	case ways > 1:
		t.fail(row[0], "give each its own row, with the same feature", "%s: a row holds one reading: reading_mm, or over_mm and under_mm, or pin_mm and answer", r.Feature)
		return
	case ways == 0:
		t.sheet.Blank++
		return
	case measured:
		if hasPin {
			t.fail(cell("pin"), "leave the pin out, or say how it goes in the column answer", "%s: a pin beside a calliper value", r.Feature)
		}
		r.Least, r.Most = value-step/2, value+step/2
	case answered:
		if !hasPin {
			t.fail(cell("pin"), "measure the pin and write its diameter", "%s: which pin %s?", r.Feature, r.Answer)
		}
		if r.Kind != Hole {
			t.fail(cell("kind"), "measure it with a calliper or gauges", "%s: pins are tried in holes, not in a %s", r.Feature, r.Kind)
		}
		r.Pin = pin
	default:
		r.Least, r.Most = math.Inf(-1), math.Inf(1)
		if hasOver {
			r.Least = over
		}
		if hasUnder {
			r.Most = under
		}
		if r.Least >= r.Most {
			t.fail(cell("over"), "over_mm is the largest gauge that goes, under_mm the smallest that does not", "%s: over %s mm and yet under %s mm", r.Feature, mm(r.Least), mm(r.Most))
		}
	}
	if len(t.errs) > before {
		return
	}
	t.sheet.Readings = append(t.sheet.Readings, r)
	at := []place{cell("drawn"), row[0]}
	for _, name := range []string{"reading", "over", "under", "pin"} {
		if c := cell(name); c.text != "" {
			at[1] = c
			break
		}
	}
	t.places = append(t.places, at)
}

// usualResolution is the step of a digital calliper, mm.
const usualResolution = 0.01

// mm writes a length to a micrometre, without zeros at the end.
func mm(v float64) string {
	return strconv.FormatFloat(math.Round(v*1000)/1000, 'f', -1, 64)
}
