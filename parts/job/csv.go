package job

import (
	"encoding/csv"
	"errors"
	"io"
	"io/fs"
	"path/filepath"
	"regexp"
	"slices"
	"strings"
	"unicode/utf8"
)

// cell is a field of a table and its place.
type cell struct {
	text string
	at   spot
}

// sheetRows is a table as rows of cells, the heading first.
type sheetRows [][]cell

// csvTable opens and reads a CSV file that the job names: fields between commas (or semicolons, when
// the heading has them and no comma), # begins a line of comment.
func (r *reader) csvTable(v *value) (sheetRows, bool) {
	if !v.ok() {
		return nil, false
	}
	if r.open == nil {
		r.fail(v.at, "", "%s: tables can't be opened here", short(v.text))
		return nil, false
	}
	data, err := r.open(v.text)
	if err != nil {
		hint := ""
		var path *fs.PathError
		if errors.As(err, &path) {
			err = path.Err
		}
		if errors.Is(err, fs.ErrNotExist) {
			hint = "the file is looked for beside the job file"
		}
		r.fail(v.at, hint, "table %s can't be read: %v", short(v.text), err)
		return nil, false
	}
	file := v.text
	if !filepath.IsAbs(file) {
		file = filepath.Join(filepath.Dir(r.name), filepath.FromSlash(file))
	}
	if file == filepath.Clean(r.name) {
		r.fail(v.at, "name the CSV file", "%s is the job file itself", short(v.text))
		return nil, false
	}
	s, text, bad := newSource(file, data, mostTableBytes)
	r.sources[file] = s
	if bad != nil {
		r.errs = append(r.errs, *bad)
		return nil, false
	}
	in := csv.NewReader(strings.NewReader(string(text)))
	in.FieldsPerRecord = -1
	in.TrimLeadingSpace = true
	in.Comment = '#'
	for _, line := range s.lines {
		if t := strings.TrimSpace(line); t != "" && !strings.HasPrefix(t, "#") {
			if strings.Contains(t, ";") && !strings.Contains(t, ",") {
				in.Comma = ';'
			}
			break
		}
	}
	var rows sheetRows
	for {
		record, err := in.Read()
		if errors.Is(err, io.EOF) {
			break
		}
		if err != nil {
			var parse *csv.ParseError
			if errors.As(err, &parse) {
				at := s.at(parse.Line, parse.Column, 1)
				message, hint := "not understood as CSV: "+parse.Err.Error(), ""
				if errors.Is(parse.Err, csv.ErrQuote) || errors.Is(parse.Err, csv.ErrBareQuote) {
					message, hint = "a quote that does not fit", "take quotes out, or put them round the whole field"
				}
				r.fail(at, hint, "%s", message)
			} else {
				r.fail(s.at(1, 1, 1), "", "not understood as CSV: %v", err)
			}
			return nil, false
		}
		row := make([]cell, len(record))
		for i, field := range record {
			line, column := in.FieldPos(i)
			trimmed := strings.TrimSpace(field)
			row[i] = cell{trimmed, s.at(line, column, utf8.RuneCountInString(trimmed))}
		}
		if len(row) == 1 && row[0].text == "" {
			continue
		}
		rows = append(rows, row)
	}
	if len(rows) == 0 {
		r.fail(s.at(1, 1, 1), "", "the table is empty")
		return nil, false
	}
	if len(rows) == 1 {
		r.fail(rows[0][0].at, "", "the table has a heading and no rows")
		return nil, false
	}
	return rows, true
}

// fits reports rows with more or fewer fields than the heading.
func (r *reader) fits(row, heading []cell) bool {
	if len(row) == len(heading) {
		return true
	}
	r.fail(row[0].at, "", "the row has %s, the heading has %d", counted(len(row), "field"), len(heading))
	return false
}

// lengthRow is a row of a table of lengths.
type lengthRow struct {
	link     string
	linkAt   spot
	from, to cell
	mm       float64
	lengthAt spot
	sound    bool
}

// mostLengths is how many rows of a table of lengths are taken.
const mostLengths = 5000

// lengthColumns are the columns of a table of lengths; the unit of the last one may be in its name,
// as in length_mm.
var (
	lengthColumns = []string{"link", "from", "to", "length"}
	unitSuffix    = regexp.MustCompile(`^(.*?)_([a-z]+)$`)
)

// lengthTable reads the table of lengths; nil and sound when the job names none.
func (r *reader) lengthTable(v *value) (out []lengthRow, sound bool) {
	if v == nil {
		return nil, true
	}
	rows, ok := r.csvTable(v)
	if !ok {
		return nil, false
	}
	heading := rows[0]
	where := map[string]int{}
	unit := ""
	sound = true
	for i, h := range heading {
		name := h.text
		if m := unitSuffix.FindStringSubmatch(name); m != nil && m[1] == "length" {
			u, known := unitNamed(m[2])
			if !known || u.dim != length {
				r.fail(h.at, "the units are "+oneOf(unitNames(length)), "unknown unit %s of the column %s", short(m[2]), short(name))
				sound = false
			}
			name, unit = "length", m[2]
		}
		if !slices.Contains(lengthColumns, name) {
			hint := meant(name, lengthColumns)
			if hint == "" {
				hint = "the columns are link, from, to, length"
			}
			r.fail(h.at, hint, "unknown column %s", short(name))
			sound = false
			continue
		}
		if _, twice := where[name]; twice {
			r.fail(h.at, "keep one of them", "column %s is there twice", name)
			sound = false
		}
		where[name] = i
	}
	for _, name := range lengthColumns {
		if _, ok := where[name]; !ok && sound {
			r.fail(heading[0].at, "the columns are link, from, to, length", "no column %s", name)
			sound = false
		}
	}
	if !sound {
		return nil, false
	}
	if len(rows) > mostLengths {
		r.fail(rows[0][0].at, "is it the right file?", "the table has %d rows, more than the %d that are taken", len(rows)-1, mostLengths)
		return nil, false
	}
	form := positive(5000)
	for _, row := range rows[1:] {
		if !r.fits(row, heading) {
			sound = false
			continue
		}
		link, value := row[where["link"]], row[where["length"]]
		l := lengthRow{link: link.text, linkAt: link.at, from: row[where["from"]], to: row[where["to"]], lengthAt: value.at}
		if !fileName.form.MatchString(link.text) {
			r.fail(link.at, "allowed are "+fileName.says, "%q can't be the name of a link", short(link.text))
			sound = false
			continue
		}
		ends := true
		for _, end := range []cell{l.from, l.to} {
			if !jointName.form.MatchString(end.text) {
				r.fail(end.at, "allowed are "+jointName.says, "%q can't be the name of a joint", short(end.text))
				ends = false
			}
		}
		if ends && l.from.text == l.to.text {
			r.fail(l.to.at, "name two different joints", "link %s: from %s to itself", link.text, l.to.text)
			ends = false
		}
		if !ends {
			sound = false
			continue
		}
		l.mm, l.sound = r.cellQuantity(value, &form, "length", unit)
		out = append(out, l)
	}
	return out, sound
}

// cellQuantity reads a number of a table; its unit may be its own, the column's or the job's.
func (r *reader) cellQuantity(c cell, f *form, what, unit string) (float64, bool) {
	if c.text == "" {
		r.fail(c.at, f.wanted()+" is wanted", "%s is empty", what)
		return 0, false
	}
	stated := r.unit[f.dim]
	if unit != "" {
		r.unit[f.dim] = unit
	}
	number, ok := r.quantity(c.text, f, what, "", c.at)
	r.unit[f.dim] = stated
	return number, ok
}
