package hardware

import (
	"fmt"
	"strings"
)

// Head is the form of a screw's head.
type Head string

// The heads; the words are those of the job file.
const (
	Socket  Head = "socket"  // hexagon socket head cap screw, ISO 4762
	Button  Head = "button"  // button head with hexagon socket, ISO 7380-1
	Hexagon Head = "hexagon" // hexagon head: ISO 4014 with a shank, ISO 4017 threaded to the head
)

// Screw is a size of a screw standard.
type Screw struct {
	Head         Head
	Standard     string  // as it is ordered: "ISO 4762"
	Size         string  // "M4"
	Diameter     float64 // nominal, mm
	Pitch        float64 // coarse, mm
	HeadDiameter float64 // largest: knurled where that is usual; across the corners of a hexagon, mm
	HeadHeight   float64 // largest, mm
	Drive        float64 // hexagon key, or across flats of a hexagon head, mm
	Thread       float64 // length of thread of screws that have a shank, mm; 0: threaded to the head
	FullUpTo     float64 // screws up to this length are threaded to the head, mm; 0 where Thread is
	Least, Most  float64 // shortest and longest standard length, mm
	Source       Source
}

func metric(size string, r *row) float64 {
	var d float64
	if _, err := fmt.Sscanf(size, "M%g", &d); err != nil && r.err == nil {
		r.err = fmt.Errorf("size %q: %w", size, err)
	}
	return d
}

func socketOf(r *row) Screw {
	return Screw{
		Head:         Socket,
		Standard:     "ISO 4762",
		Size:         r.text("size"),
		Diameter:     metric(r.text("size"), r),
		Pitch:        r.number("pitch"),
		HeadDiameter: r.number("dk_max_knurled"),
		HeadHeight:   r.number("k_max"),
		Drive:        r.number("socket_s"),
		Thread:       r.number("thread_length_b_ref"),
		FullUpTo:     r.number("full_thread_up_to_l"),
		Least:        r.number("l_min"),
		Most:         r.number("l_max"),
		Source:       r.source(r.text("standard")),
	}
}

// buttonOf: the table has no length of thread; the shorter lengths, which are those on sale, are
// threaded to the head, and longer ones have 2d + 12 of thread as ISO 4762 (from memory).
func buttonOf(r *row) Screw {
	d := metric(r.text("size"), r)
	return Screw{
		Head:         Button,
		Standard:     "ISO 7380-1",
		Size:         r.text("size"),
		Diameter:     d,
		Pitch:        r.number("pitch"),
		HeadDiameter: r.number("dk_max"),
		HeadHeight:   r.number("k_max"),
		Drive:        r.number("socket_s"),
		Thread:       2*d + 12,
		FullUpTo:     2*d + 12,
		Least:        r.number("l_min"),
		Most:         r.number("l_max"),
		Source:       r.source("ISO 7380-1"),
	}
}

// hexagonOf reads ISO 4017.
func hexagonOf(r *row) Screw {
	return Screw{
		Head:         Hexagon,
		Standard:     "ISO 4017",
		Size:         r.text("size"),
		Diameter:     metric(r.text("size"), r),
		Pitch:        r.number("pitch"),
		HeadDiameter: r.number("s") * overCorners,
		HeadHeight:   r.number("k_nom"),
		Drive:        r.number("s"),
		Least:        r.number("l_min_4017"),
		Most:         r.number("l_max_4017"),
		Source:       r.source(r.text("standard")),
	}
}

// shankedOf reads ISO 4014.
func shankedOf(r *row) Screw {
	s := hexagonOf(r)
	s.Standard = "ISO 4014"
	s.Thread = r.number("thread_length_b_l_le_125")
	s.Least, s.Most = r.number("l_min_4014"), r.number("l_max_4014")
	return s
}

// overCorners is the width across the corners of a regular hexagon over that across its flats,
// 2 / sqrt(3).
const overCorners = 1.1547005383792515

// ScrewFor gives the screw of a head and a size. An unknown head or size is an error with the nearest
// spelling and the list; an inch size an error that wraps ErrInch.
func ScrewFor(head Head, size string) (Screw, error) {
	c, err := read()
	if err != nil {
		return Screw{}, err
	}
	var sizes []string
	for _, s := range c.screws {
		if s.Head != head {
			continue
		}
		if s.Size == size {
			return s, nil
		}
		sizes = append(sizes, s.Size)
	}
	if len(sizes) == 0 {
		return Screw{}, unknown("head", string(head), []string{string(Socket), string(Button), string(Hexagon)})
	}
	return Screw{}, missing(string(head)+" head screw", size, sizes)
}

// screwOf finds a screw by its standard.
func screwOf(standard, size string) (Screw, error) {
	switch strings.ReplaceAll(standard, " ", "") {
	case "ISO4762", "DIN912":
		return ScrewFor(Socket, size)
	case "ISO7380-1", "ISO7380":
		return ScrewFor(Button, size)
	case "ISO4017", "DIN933":
		return ScrewFor(Hexagon, size)
	case "ISO4014", "DIN931":
		s, err := ScrewFor(Hexagon, size)
		if err != nil {
			return Screw{}, err
		}
		return s.Shanked()
	}
	return Screw{}, unknown("screw standard", standard, []string{"ISO 4762", "ISO 7380-1", "ISO 4014", "ISO 4017"})
}

// Shanked gives the form of a hexagon screw that has a plain shank, ISO 4014, which links turn on
// better than on thread.
func (s Screw) Shanked() (Screw, error) {
	c, err := read()
	if err != nil {
		return Screw{}, err
	}
	for _, row := range c.shanks {
		if s.Head == Hexagon && row.Size == s.Size {
			return row, nil
		}
	}
	return Screw{}, fmt.Errorf("%s %s: there is no form with a shank in the catalogue", s.Standard, s.Size)
}

// Grip is the longest part under the head that may be without thread on a screw of a length: a nut
// does not go nearer to the head, mm. 0: threaded to the head.
func (s Screw) Grip(length float64) float64 {
	if s.Thread == 0 || length <= s.FullUpTo {
		return 0
	}
	return max(0, length-s.Thread)
}

// Shank is the part under the head that is surely without thread on a screw of a length, mm: five pitches
// less than the longest, by which the run-out may be longer (ISO 4014 and ISO 4762: l_s min = l_g max -
// 5 P; from memory).
func (s Screw) Shank(length float64) float64 {
	return max(0, s.Grip(length)-5*s.Pitch)
}

// Designation writes the screw as it is ordered: "ISO 4762 M4x20"; without a length when it is 0.
func (s Screw) Designation(length float64) string {
	if length == 0 {
		return s.Standard + " " + s.Size
	}
	return fmt.Sprintf("%s %sx%g", s.Standard, s.Size, length)
}
