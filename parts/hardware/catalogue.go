package hardware

import (
	"bytes"
	"embed"
	"encoding/csv"
	"errors"
	"fmt"
	"strconv"
	"strings"
	"sync"
)

//go:embed catalogue/*.csv
var files embed.FS

// catalogue is every table, read once. It is never changed after that.
type catalogue struct {
	clearances []clearance
	screws     []Screw
	shanks     []Screw // ISO 4014
	lengths    []length
	nuts       []Nut
	washers    []Washer
	bearings   []Bearing
	rings      []ring
	threads    []Thread
	collars    []Collar
	pushRings  []PushRing
	rodEnds    []RodEnd
	standoffs  []Standoff
	zones      []zone
}

// read gives the catalogue, or what is wrong with it. The files are part of the program, so that a
// test can promise that there is no error.
var read = sync.OnceValues(func() (*catalogue, error) {
	var c catalogue
	err := errors.Join(
		rows("clearance_holes", &c.clearances, clearanceOf),
		rows("socket_screws", &c.screws, socketOf),
		rows("button_screws", &c.screws, buttonOf),
		rows("hexagon_bolts", &c.screws, hexagonOf),
		rows("hexagon_bolts", &c.shanks, shankedOf),
		rows("preferred_lengths", &c.lengths, lengthOf),
		rows("nuts", &c.nuts, nutOf),
		rows("washers", &c.washers, washerOf),
		rows("bearings", &c.bearings, bearingOf),
		rows("bearing_tolerance", &c.rings, ringOf),
		rows("threads", &c.threads, threadOf),
		rows("collars", &c.collars, collarOf),
		rows("push_rings", &c.pushRings, pushRingOf),
		rows("rod_ends", &c.rodEnds, rodEndOf),
		rows("standoffs", &c.standoffs, standoffOf),
		rows("iso286", &c.zones, zoneOf),
	)
	if err != nil {
		return nil, fmt.Errorf("hardware catalogue: %w", err)
	}
	return &c, nil
})

// row is one line of a table, by the names of its columns. The first thing wrong with it sticks.
type row struct {
	cells map[string]string
	err   error
}

func (r *row) text(column string) string {
	cell, ok := r.cells[column]
	if !ok && r.err == nil {
		r.err = fmt.Errorf("no column %s", column)
	}
	return cell
}

// number reads a cell that must hold one.
func (r *row) number(column string) float64 {
	v, err := strconv.ParseFloat(r.text(column), 64)
	if err != nil && r.err == nil {
		r.err = fmt.Errorf("column %s: %w", column, err)
	}
	return v
}

// known reads a number, 0 for an empty cell.
func (r *row) known(column string) float64 {
	if r.text(column) == "" {
		return 0
	}
	return r.number(column)
}

func (r *row) source(standard string) Source {
	return Source{
		Standard:  standard,
		Confirmed: r.text("confirmed"),
		From:      r.text("source"),
		Note:      strings.TrimSpace(r.cells["note"]), // one table has none
	}
}

// rows appends what read makes of every row of a table.
func rows[T any](name string, to *[]T, read func(*row) T) error {
	data, err := files.ReadFile("catalogue/" + name + ".csv")
	if err != nil {
		return err
	}
	lines, err := csv.NewReader(bytes.NewReader(data)).ReadAll()
	if err != nil {
		return fmt.Errorf("%s: %w", name, err)
	}
	if len(lines) < 2 {
		return fmt.Errorf("%s: no rows", name)
	}
	for i, line := range lines[1:] {
		r := row{cells: map[string]string{}}
		for k, column := range lines[0] {
			r.cells[column] = line[k]
		}
		value := read(&r)
		if r.err != nil {
			return fmt.Errorf("%s, row %d: %w", name, i+2, r.err)
		}
		*to = append(*to, value)
	}
	return nil
}
