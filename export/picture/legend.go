package picture

import (
	"pinwright/export"
	"pinwright/parts/outline"
)

// entry is a line of a legend.
type entry struct {
	tint export.RGB
	text string
}

// legend is entries in columns, filled one after the other.
type legend struct {
	entries []entry
	size    float64
	rows    int
	column  float64 // width
	height  float64
}

// entriesOf sets entries into as many columns as fit into the width.
func entriesOf(entries []entry, width, size float64) legend {
	longest := 0.0
	for _, e := range entries {
		longest = max(longest, swatch(size)+roughWidth(e.text, size))
	}
	columns := max(1, min(len(entries), int(width/(longest+3))))
	rows := max(1, (len(entries)+columns-1)/columns)
	return legend{entries, size, rows, width / float64(columns), float64(rows) * 1.5 * size}
}

// swatch is the room for the patch of colour before an entry.
func swatch(size float64) float64 { return 2.4 * size }

// entries draws a legend downwards from top.
func (p *Picture) entries(l legend, x, top float64) {
	for i, e := range l.entries {
		x := x + float64(i/l.rows)*l.column
		y := top - l.size*1.5*float64(i%l.rows+1) + 0.45*l.size
		p.Items = append(p.Items, Shape{
			Closed: []outline.Outline{rectangle(x+0.1, y-0.15*l.size, x+1.8*l.size, y+0.85*l.size)},
			Fill:   colour(e.tint), Stroke: colour(ink), Line: 0.12,
		})
		p.label(x+swatch(l.size), y, shorten(e.text, l.size, l.column-swatch(l.size)), l.size, Start, false)
	}
}
