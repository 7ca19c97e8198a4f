package hardware

import "strings"

// NutKind is the form of a nut.
type NutKind string

// The nuts; the words are those of the job file.
const (
	LockNut  NutKind = "lock"  // nylon insert, low: DIN 985, the common one
	PlainNut NutKind = "plain" // ISO 4032
	ThinNut  NutKind = "thin"  // ISO 4035
)

// Nut is a size of a nut.
type Nut struct {
	Kind     NutKind // "" for forms that the job file has no word for
	Standard string
	Size     string
	Pitch    float64
	Across   float64 // across flats, mm
	Corners  float64 // across corners, largest, mm
	Height   float64 // largest, insert included, mm
	Least    float64 // smallest height, mm; 0: not known. Of inserts by ISO the metal part only
	Source   Source
}

func nutOf(r *row) Nut {
	standard, _, _ := strings.Cut(r.text("standard"), " (")
	n := Nut{
		Standard: standard,
		Size:     r.text("size"),
		Pitch:    r.number("pitch"),
		Across:   r.number("s"),
		Corners:  r.number("s") * overCorners,
		Height:   r.number("m_or_h_max"),
		Least:    r.known("m_min"),
		Source:   r.source(r.text("standard")),
	}
	switch standard {
	case "DIN 985", "trade size":
		n.Kind = LockNut
	case "ISO 4032":
		n.Kind = PlainNut
	case "ISO 4035":
		n.Kind = ThinNut
	}
	return n
}

// NutFor gives the nut of a kind and a size: lock DIN 985 (M2 and M2.5, which it does not hold, as a
// trade size), plain ISO 4032, thin ISO 4035.
func NutFor(kind NutKind, size string) (Nut, error) {
	c, err := read()
	if err != nil {
		return Nut{}, err
	}
	var sizes []string
	for _, n := range c.nuts {
		if n.Kind != kind || kind == "" {
			continue
		}
		if n.Size == size {
			return n, nil
		}
		sizes = append(sizes, n.Size)
	}
	if len(sizes) == 0 {
		return Nut{}, unknown("nut", string(kind), []string{string(LockNut), string(PlainNut), string(ThinNut)})
	}
	return Nut{}, missing(string(kind)+" nut", size, sizes)
}

// Nuts are all nuts of a size, of all standards of the catalogue.
func Nuts(size string) []Nut {
	c, err := read()
	if err != nil {
		return nil
	}
	var out []Nut
	for _, n := range c.nuts {
		if n.Size == size {
			out = append(out, n)
		}
	}
	return out
}

// Designation writes the nut as it is ordered: "DIN 985 M4".
func (n Nut) Designation() string {
	if n.Standard == "trade size" {
		return "nylon insert nut " + n.Size
	}
	return n.Standard + " " + n.Size
}
