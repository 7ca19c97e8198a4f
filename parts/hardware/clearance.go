package hardware

import "strings"

// mmPerInch is exact by definition (international yard and pound agreement, 1959).
const mmPerInch = 25.4

// clearance is a row of the table of clearance holes.
type clearance struct {
	size      string
	nominal   float64
	diameters [3]float64 // by class, closest first
	source    Source
}

var (
	metricClasses = []string{"fine", "medium", "coarse"} // ISO 273
	inchClasses   = []string{"close", "normal", "loose"} // ASME B18.2.8
)

func clearanceOf(r *row) clearance {
	scale := 1.0
	if strings.HasPrefix(r.text("unit"), "in") {
		scale = mmPerInch
	}
	return clearance{
		size:      r.text("size"),
		nominal:   r.number("nominal_mm"),
		diameters: [3]float64{scale * r.number("fine_or_close"), scale * r.number("medium_or_normal"), scale * r.number("coarse_or_loose")},
		source:    r.source(r.text("standard")),
	}
}

// ClearanceHole gives the diameter of the clearance hole of a bolt, mm: ISO 273 fine, medium or
// coarse for metric sizes, ASME B18.2.8 close, normal or loose for inch sizes. An unknown size or
// class is an error with the nearest spelling and the list.
func ClearanceHole(size, class string) (float64, error) {
	h, err := BoltHole(size, class)
	return h.Diameter, err
}

// BoltHole is ClearanceHole with where it comes from. The standards give no deviations here: Upper
// and Lower are 0.
func BoltHole(size, class string) (HoleSize, error) {
	c, err := clearanceFor(size)
	if err != nil {
		return HoleSize{}, err
	}
	classes := metricClasses
	if IsInch(size) {
		classes = inchClasses
	}
	for i, name := range classes {
		if name == class {
			return HoleSize{
				Nominal:  c.nominal,
				Diameter: c.diameters[i],
				Rule:     c.source.Standard + " " + class,
				Source:   c.source,
			}, nil
		}
	}
	return HoleSize{}, unknown("class of clearance hole for "+size, class, classes)
}

// BoltDiameter gives the nominal diameter of a bolt, mm.
func BoltDiameter(size string) (float64, error) {
	c, err := clearanceFor(size)
	return c.nominal, err
}

// BoltSizes are the designations of the bolts that have a clearance hole: metric, then inch, each by
// diameter.
func BoltSizes() []string {
	c, err := read()
	if err != nil {
		return nil
	}
	var sizes []string
	for _, row := range c.clearances {
		sizes = append(sizes, row.size)
	}
	return sizes
}

func clearanceFor(size string) (clearance, error) {
	c, err := read()
	if err != nil {
		return clearance{}, err
	}
	for _, row := range c.clearances {
		if row.size == size {
			return row, nil
		}
	}
	return clearance{}, unknown("bolt", size, BoltSizes())
}
