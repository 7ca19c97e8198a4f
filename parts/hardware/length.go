package hardware

import (
	"fmt"
	"slices"
)

// length is a row of the series of screw lengths.
type length struct {
	mm, least, most float64
	standards       []string // whose series it is in
	source          Source
}

func lengthOf(r *row) length {
	l := length{
		mm: r.number("length_mm"), least: r.number("min_js15"), most: r.number("max_js15"),
		source: r.source("ISO 888"),
	}
	for _, s := range []struct{ column, standard string }{
		{"in_iso4762", "ISO 4762"},
		{"in_iso7380_1", "ISO 7380-1"},
		{"in_iso4014", "ISO 4014"},
		{"in_iso4017", "ISO 4017"},
	} {
		if r.text(s.column) == "y" {
			l.standards = append(l.standards, s.standard)
		}
	}
	return l
}

// Lengths are the standard lengths of a screw, ascending, mm.
func (s Screw) Lengths() []float64 {
	c, err := read()
	if err != nil {
		return nil
	}
	var out []float64
	for _, l := range c.lengths {
		if slices.Contains(l.standards, s.Standard) && l.mm >= s.Least && l.mm <= s.Most {
			out = append(out, l.mm)
		}
	}
	return out
}

// TooShortError is the error of a need beyond the longest standard length.
type TooShortError struct {
	Screw       Screw
	Need, Short float64 // what is needed, and by how much the longest falls short, mm
}

func (e TooShortError) Error() string {
	return fmt.Sprintf("%s %s: %.2f mm are needed and the longest standard length is %g mm, %.2f mm too short",
		e.Screw.Standard, e.Screw.Size, e.Need, e.Screw.Most, e.Short)
}

// ScrewLength gives the smallest standard length that is not under need, mm; the excess over need is
// the caller's to see. Standards go by their ISO number ("ISO 4762") or the older DIN one. A need
// beyond the longest is a TooShortError.
func ScrewLength(standard, size string, need float64) (float64, error) {
	s, err := screwOf(standard, size)
	if err != nil {
		return 0, err
	}
	return s.Length(need)
}

// Length gives the smallest standard length of the screw that is not under need, mm.
func (s Screw) Length(need float64) (float64, error) {
	lengths := s.Lengths()
	if i := slices.IndexFunc(lengths, func(l float64) bool { return l >= need-within }); i >= 0 {
		return lengths[i], nil
	}
	return 0, TooShortError{Screw: s, Need: need, Short: need - s.Most}
}

// SureLength gives the smallest standard length of which even the shortest screw that the tolerance
// js15 lets through is not under need, mm: an M3x16 may be 15.65 mm long.
func (s Screw) SureLength(need float64) (float64, error) {
	for _, l := range s.Lengths() {
		if least, _ := LengthLimits(l); least >= need-within {
			return l, nil
		}
	}
	least, _ := LengthLimits(s.Most)
	return 0, TooShortError{Screw: s, Need: need, Short: need - least}
}

// within is the slack of comparisons of sums of tabulated figures, mm: it swallows their rounding in
// binary and nothing else.
const within = 1e-9

// LengthLimits gives the shortest and the longest screw of a standard length (ISO 4759-1, js15), mm;
// a length that is not in the series is taken as exact.
func LengthLimits(mm float64) (least, most float64) {
	c, err := read()
	if err != nil {
		return mm, mm
	}
	for _, l := range c.lengths {
		if l.mm == mm {
			return l.least, l.most
		}
	}
	return mm, mm
}
