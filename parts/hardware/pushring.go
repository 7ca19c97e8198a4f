package hardware

import "fmt"

// PushRing is a ring with teeth that is pushed onto a smooth shaft and does not come back.
type PushRing struct {
	Bore, Outside, Height float64 // mm
	Source                Source
}

func pushRingOf(r *row) PushRing {
	return PushRing{
		Bore: r.number("bore"), Outside: r.number("outside"), Height: r.number("height"),
		Source: r.source(r.text("standard")),
	}
}

// PushRingFor gives the push-on ring for a shaft. The figures are from memory: measure what is bought.
func PushRingFor(shaft float64) (PushRing, error) {
	c, err := read()
	if err != nil {
		return PushRing{}, err
	}
	var sizes []string
	for _, row := range c.pushRings {
		if row.Bore == shaft {
			return row, nil
		}
		sizes = append(sizes, fmt.Sprintf("%g", row.Bore))
	}
	return PushRing{}, unknown("push-on ring for a shaft of", fmt.Sprintf("%g", shaft), sizes)
}

// Designation writes the ring so that any shop knows it: "push-on ring for 6 mm shaft".
func (p PushRing) Designation() string { return fmt.Sprintf("push-on ring for %g mm shaft", p.Bore) }

// Mass estimates the mass of a ring, g: sheet of a quarter of its height.
func (p PushRing) Mass() float64 {
	return Steel * (cylinder(p.Outside, p.Height/4) - cylinder(p.Bore, p.Height/4))
}
