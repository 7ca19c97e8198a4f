package hardware

import (
	"fmt"
	"math"
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
// diameter, or the smallest whose bore the shaft goes through, so that a shaft of 1/4 inch gets the one of
// M6 (6.4 mm). Unknown series and shafts thicker than every bore are errors.
func ShaftWasher(kind WasherKind, diameter float64) (Washer, error) {
	c, err := read()
	if err != nil {
		return Washer{}, err
	}
	var best Washer
	most := 0.0
	for _, w := range c.washers {
		if w.Kind != kind {
			continue
		}
		if w.Size == fmt.Sprintf("M%g", diameter) {
			return w, nil
		}
		most = math.Max(most, w.Bore)
		if w.Bore >= diameter && (best.Bore == 0 || w.Bore < best.Bore) {
			best = w
		}
	}
	switch {
	case most == 0:
		_, err = WasherFor(kind, "")
		return Washer{}, err
	case best.Bore == 0:
		return Washer{}, fmt.Errorf("no %s washer goes on a shaft of %g mm: the widest bore in the catalogue is %g mm", kind, diameter, most)
	}
	return best, nil
}

// Designation writes the washer as it is ordered: "ISO 7089 4".
func (w Washer) Designation() string { return w.Standard + " " + strings.TrimPrefix(w.Size, "M") }
