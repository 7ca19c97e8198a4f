package list

import (
	"fmt"
	"io"

	"pinwright/parts/outline"
)

// PathTable is where the joints are through the cycle.
type PathTable struct {
	Points []string // names of joints and traced points: the order of PathRow.At
	Copies []string // names of the copies: the order of PathRow.CopyDeg; empty for a single copy
	Rows   []PathRow
}

// PathRow is one position of the drive.
type PathRow struct {
	DriveDeg float64   // angle of the drive, degrees
	CopyDeg  []float64 // angle of each copy's own drive at that moment, degrees
	At       []outline.Point
}

// Path writes path.csv: drive_deg, one column <copy>_drive_deg for every copy, then <point>_x_mm and
// <point>_y_mm for every point; angles and coordinates to a millionth. A row with too few or too
// many values is an error.
func Path(w io.Writer, p PathTable, o Options) error {
	header := []string{"drive_deg"}
	for _, name := range p.Copies {
		header = append(header, name+"_drive_deg")
	}
	for _, name := range p.Points {
		header = append(header, name+"_x_mm", name+"_y_mm")
	}
	for i, r := range p.Rows {
		if len(r.CopyDeg) != len(p.Copies) || len(r.At) != len(p.Points) {
			return fmt.Errorf("path row %d: %d copies and %d points, the header has %d and %d",
				i+1, len(r.CopyDeg), len(r.At), len(p.Copies), len(p.Points))
		}
	}
	t := newTable(w, o, header...)
	for _, r := range p.Rows {
		t.number(r.DriveDeg, 6)
		for _, a := range r.CopyDeg {
			t.number(a, 6)
		}
		for _, at := range r.At {
			t.number(at.X, 6)
			t.number(at.Y, 6)
		}
		t.next()
	}
	return t.end()
}
