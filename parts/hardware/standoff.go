package hardware

import (
	"fmt"
	"slices"
	"strconv"
	"strings"
)

// Standoff is a size of a bolt with thread in both ends.
type Standoff struct {
	Size    string
	Across  float64   // across flats, or diameter of round ones, mm
	Thread  float64   // depth of thread in either end; in shorter ones the thread goes through, mm
	Lengths []float64 // usual stock lengths, ascending, mm
	Source  Source
}

func standoffOf(r *row) Standoff {
	s := Standoff{Size: r.text("size"), Across: r.number("across"), Thread: r.number("thread"), Source: r.source(r.text("standard"))}
	for _, word := range strings.Fields(r.text("lengths")) {
		l, err := strconv.ParseFloat(word, 64)
		if err != nil && r.err == nil {
			r.err = fmt.Errorf("column lengths: %w", err)
		}
		s.Lengths = append(s.Lengths, l)
	}
	return s
}

// StandoffFor gives the standoff of a size of thread. Common practice, no source: shops differ.
func StandoffFor(size string) (Standoff, error) {
	c, err := read()
	if err != nil {
		return Standoff{}, err
	}
	var sizes []string
	for _, row := range c.standoffs {
		if row.Size == size {
			row.Lengths = slices.Clone(row.Lengths)
			return row, nil
		}
		sizes = append(sizes, row.Size)
	}
	return Standoff{}, unknown("standoff", size, sizes)
}

// Depth is how far a screw may go into one end of a standoff of a length, mm, so that it does not meet
// the screw of the other end.
func (s Standoff) Depth(length float64) float64 { return min(s.Thread, length/2) }

// Mass estimates the mass of a standoff of a length, g, of steel.
func (s Standoff) Mass(length float64, round bool) float64 {
	d, _ := BoltDiameter(s.Size) // looked up before
	body := hexagon(s.Across, length)
	if round {
		body = cylinder(s.Across, length)
	}
	return Steel * (body - cylinder(d, 2*s.Depth(length)))
}

// SpacerLengths are the usual stock lengths of plain spacers, ascending, mm. Common practice, no source.
func SpacerLengths() []float64 {
	return []float64{2, 3, 4, 5, 6, 8, 10, 12, 15, 16, 18, 20, 25, 30, 35, 40, 45, 50, 60}
}
