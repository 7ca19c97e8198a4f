package pdf

import (
	"fmt"
	"sort"

	"pinwright/export"
)

// Measures of a table, mm.
const (
	cellSide = 1.4 // left and right of a cell's text
	cellTop  = 0.7 // above and below it
)

// table sets a table. A row goes to the next page as a whole if a page can hold it.
func (f *flow) table(t Table) {
	if len(t.Columns) == 0 {
		return
	}
	widths := f.columnWidths(t)
	head := make([]string, len(t.Columns))
	for i, c := range t.Columns {
		head[i] = c.Head
	}
	headLines := f.cells(f.fonts.bold, head, widths)
	headHeight := rowHeight(headLines)
	f.room(headHeight + 2*sizeTable*lead)
	f.row(t, headLines, widths, f.fonts.bold)
	for _, r := range t.Rows {
		lines := f.cells(f.fonts.regular, r, widths)
		for tallest(lines) > 0 {
			free := f.y - marginFoot
			if rowHeight(lines) > free {
				// A row that no page can hold is broken between its lines.
				whole := f.height - marginTop - marginFoot - headHeight
				if rowHeight(lines) <= whole || free < 4*sizeTable*lead {
					f.newPage()
					f.row(t, headLines, widths, f.fonts.bold)
					free = f.y - marginFoot
				}
			}
			n := max(1, min(tallest(lines), int((free-2*cellTop)/(sizeTable*lead))))
			f.row(t, first(lines, n), widths, f.fonts.regular)
			lines = after(lines, n)
		}
	}
}

// columnWidths gives every column the width of its longest cell if that fits the page; else narrow
// columns keep theirs and the wide ones share what is left evenly.
func (f *flow) columnWidths(t Table) []float64 {
	natural := make([]float64, len(t.Columns))
	for i, c := range t.Columns {
		natural[i] = f.fonts.bold.width(c.Head, sizeTable)
		for _, r := range t.Rows {
			if i < len(r) {
				natural[i] = max(natural[i], f.fonts.regular.width(r[i], sizeTable))
			}
		}
		natural[i] += 2*cellSide + 0.01 // so that rounding never wraps the longest
	}
	order := make([]int, len(natural))
	for i := range order {
		order[i] = i
	}
	sort.SliceStable(order, func(a, b int) bool { return natural[order[a]] < natural[order[b]] })
	room := f.width - 2*marginSide
	widths := make([]float64, len(natural))
	for k, i := range order {
		widths[i] = min(natural[i], room/float64(len(order)-k))
		room -= widths[i]
	}
	return widths
}

// cells wraps the texts of a row into their columns.
func (f *flow) cells(font *face, texts []string, widths []float64) [][]string {
	lines := make([][]string, len(widths))
	for i := range widths {
		s := ""
		if i < len(texts) {
			s = texts[i]
		}
		lines[i] = f.wrap(font, s, sizeTable, widths[i]-2*cellSide)
	}
	return lines
}

// row sets one row that fits, with a line below it.
func (f *flow) row(t Table, lines [][]string, widths []float64, font *face) {
	height := rowHeight(lines)
	x := float64(marginSide)
	total := 0.0
	for _, w := range widths {
		total += w
	}
	if font == f.fonts.bold {
		f.fill(x, f.y-height, total, height, shade)
	}
	for i, cell := range lines {
		for k, line := range cell {
			at := x + cellSide
			if t.Columns[i].Right {
				at = x + widths[i] - cellSide - font.width(line, sizeTable)
			}
			f.text(font, line, sizeTable, at, f.y-cellTop-float64(k+1)*sizeTable*lead+sizeTable*0.32, ink)
		}
		x += widths[i]
	}
	f.y -= height
	f.fill(marginSide, f.y, total, 0.12, rule)
}

// fill paints a rectangle.
func (f *flow) fill(x, y, width, height float64, colour export.RGB) {
	fmt.Fprintf(f.b, "%s rg %s %s %s %s re f\n", rgb(colour), num(x, 4), num(y, 4), num(width, 4), num(height, 4))
}

func tallest(lines [][]string) int {
	n := 0
	for _, cell := range lines {
		n = max(n, len(cell))
	}
	return n
}

func rowHeight(lines [][]string) float64 { return float64(tallest(lines))*sizeTable*lead + 2*cellTop }

func first(lines [][]string, n int) [][]string {
	out := make([][]string, len(lines))
	for i, cell := range lines {
		out[i] = cell[:min(n, len(cell))]
	}
	return out
}

func after(lines [][]string, n int) [][]string {
	out := make([][]string, len(lines))
	for i, cell := range lines {
		out[i] = cell[min(n, len(cell)):]
	}
	return out
}
