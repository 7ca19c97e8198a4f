package list

import "io"

// HardwareRow is one line of the shopping list.
type HardwareRow struct {
	Item      string  // designation: "ISO 4762 M4 x 20"
	Kind      string  // bolt, nut, washer, spacer, bearing
	LengthMM  float64 // of bolts and spacers; 0 where a length means nothing, then the cell is empty
	Need      int     // pieces built in
	Spare     int     // pieces on top
	Buy       int     // pieces to buy
	Packs     int     // packs to buy; 0 where packs are not known, then the cell is empty
	MassG     float64 // of all pieces built in; 0 where not known, then the cell is empty
	WhereUsed string  // joints
	Note      string
}

// Hardware writes hardware.csv: lengths to 0.001 mm, masses to 0.01 g.
func Hardware(w io.Writer, rows []HardwareRow, o Options) error {
	t := newTable(w, o, "item", "kind", "length_mm", "need", "spare", "buy", "packs", "mass_g", "where_used", "note")
	for _, r := range rows {
		t.text(r.Item)
		t.text(r.Kind)
		t.known(r.LengthMM, 3)
		t.whole(r.Need)
		t.whole(r.Spare)
		t.whole(r.Buy)
		t.known(float64(r.Packs), 0)
		t.known(r.MassG, 2)
		t.text(r.WhereUsed)
		t.text(r.Note)
		t.next()
	}
	return t.end()
}

// known writes a number, or an empty cell for 0.
func (t *table) known(v float64, decimals int) {
	if v == 0 {
		t.row = append(t.row, "")
		return
	}
	t.number(v, decimals)
}
