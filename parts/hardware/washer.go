package hardware

import (
	"fmt"
	"strings"
)

// WasherKind is the series of a washer.
type WasherKind string

// The washers; the words are those of the job file.
const (
	NormalWasher WasherKind = "normal" // ISO 7089
	SmallWasher  WasherKind = "small"  // ISO 7092
	LargeWasher  WasherKind = "large"  // ISO 7093-1
)

// Washer is a size of a plain washer.
type Washer struct {
	Kind        WasherKind
	Standard    string
	Size        string  // of the bolt: "M4"
	Bore        float64 // smallest, mm
	Outside     float64 // largest, mm
	Thickness   float64 // nominal, mm
	Least, Most float64 // of the thickness, mm
	Source      Source
}

func washerOf(r *row) Washer {
	return Washer{
		Kind:      WasherKind(r.text("series")),
		Standard:  r.text("standard"),
		Size:      r.text("size"),
		Bore:      r.number("d1_min"),
		Outside:   r.number("d2_max"),
		Thickness: r.number("h_nom"),
		Least:     r.number("h_min"),
		Most:      r.number("h_max"),
		Source:    r.source(r.text("standard")),
	}
}

// WasherFor gives the washer of a series for a bolt.
func WasherFor(kind WasherKind, size string) (Washer, error) {
	c, err := read()
	if err != nil {
		return Washer{}, err
	}
	var sizes []string
	for _, w := range c.washers {
		if w.Kind != kind {
			continue
		}
		if w.Size == size {
			return w, nil
		}
		sizes = append(sizes, w.Size)
	}
	if len(sizes) == 0 {
		return Washer{}, unknown("washer", string(kind), []string{string(NormalWasher), string(SmallWasher), string(LargeWasher)})
	}
	return Washer{}, missing(string(kind)+" washer", size, sizes)
}

// ShaftWasher gives the washer of a series that goes on a plain shaft: that of the bolt of the same
// diameter.
func ShaftWasher(kind WasherKind, diameter float64) (Washer, error) {
	w, err := WasherFor(kind, fmt.Sprintf("M%g", diameter))
	if err != nil {
		return Washer{}, fmt.Errorf("washer for a shaft of %g mm: %w", diameter, err)
	}
	return w, nil
}

// Designation writes the washer as it is ordered: "ISO 7089 4".
func (w Washer) Designation() string { return w.Standard + " " + strings.TrimPrefix(w.Size, "M") }
