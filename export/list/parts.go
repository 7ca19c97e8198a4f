package list

import "io"

// PartRow is one part as it is cut.
type PartRow struct {
	Part        string // "left-1.crank"
	Link        string
	Copy        string
	Stock       string
	Sheet       string // file name of the sheet it lies on, without extension
	Plane       int
	Mark        string // the text engraved on it
	Quantity    int
	WidthMM     float64 // finished size, along x and y of the part's own frame
	HeightMM    float64
	AreaMM2     float64 // finished, holes taken off
	CutLengthMM float64 // way of the beam, holes included
	MassG       float64
	Holes       int
}

// Parts writes parts.csv: lengths to 0.001 mm, areas to 0.01 mm2, masses to 0.01 g.
func Parts(w io.Writer, rows []PartRow, o Options) error {
	t := newTable(w, o, "part", "link", "copy", "stock", "sheet", "plane", "mark", "quantity",
		"width_mm", "height_mm", "area_mm2", "cut_length_mm", "mass_g", "holes")
	for _, r := range rows {
		t.text(r.Part)
		t.text(r.Link)
		t.text(r.Copy)
		t.text(r.Stock)
		t.text(r.Sheet)
		t.whole(r.Plane)
		t.text(r.Mark)
		t.whole(r.Quantity)
		t.number(r.WidthMM, 3)
		t.number(r.HeightMM, 3)
		t.number(r.AreaMM2, 2)
		t.number(r.CutLengthMM, 3)
		t.number(r.MassG, 2)
		t.whole(r.Holes)
		t.next()
	}
	return t.end()
}
