package hardware

import "fmt"

// Collar is a set collar: it keeps a shaft where it is.
type Collar struct {
	Bore, Outside, Width float64 // mm
	Source               Source
}

func collarOf(r *row) Collar {
	return Collar{
		Bore: r.number("bore"), Outside: r.number("outside"), Width: r.number("width"),
		Source: r.source(r.text("standard")),
	}
}

// CollarFor gives the set collar for a shaft, DIN 705 form A. The figures are from memory: measure
// what is bought.
func CollarFor(shaft float64) (Collar, error) {
	c, err := read()
	if err != nil {
		return Collar{}, err
	}
	var sizes []string
	for _, row := range c.collars {
		if row.Bore == shaft {
			return row, nil
		}
		sizes = append(sizes, fmt.Sprintf("%g", row.Bore))
	}
	return Collar{}, unknown("collar for a shaft of", fmt.Sprintf("%g", shaft), sizes)
}

// Designation writes the collar so that any shop knows it: "shaft collar for 6 mm shaft".
func (c Collar) Designation() string { return fmt.Sprintf("shaft collar for %g mm shaft", c.Bore) }
