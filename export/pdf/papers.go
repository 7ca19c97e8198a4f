package pdf

import (
	"fmt"
	"io"

	"pinwright/export/picture"
)

// Papers is what goes to the workshop on paper: text, tables and pictures one below the other,
// broken into pages.
type Papers struct {
	Title  string // at the head of the first page, and the title of the document
	Footer string // at the foot of every page, before its number
	Format Format
	Blocks []Block
}

// Block is one of Heading, Text, Cautions, Table, Drawing and PageBreak.
type Block interface{ block() }

// Heading begins a section. It stays with what follows.
type Heading string

// Text is a paragraph; line breaks in it are kept.
type Text string

// Cautions are warnings, each one set off by a bar and a sign.
type Cautions []string

// Table is a table with a head that is repeated on every page. Rows may be shorter than Columns.
// Columns share the width of the page; what does not fit into one is wrapped, nothing is cut off.
type Table struct {
	Columns []Column
	Rows    [][]string
}

// Column is a column of a table.
type Column struct {
	Head  string
	Right bool // set to the right, for numbers
}

// Drawing is a picture at its own size; one that is larger than the room on a page is reduced, and
// its caption says to what percentage.
type Drawing struct {
	Picture picture.Picture
	Caption string
}

// PageBreak begins a new page.
type PageBreak struct{}

func (Heading) block()   {}
func (Text) block()      {}
func (Cautions) block()  {}
func (Table) block()     {}
func (Drawing) block()   {}
func (PageBreak) block() {}

// Format is the size of the paper.
type Format int

// The formats: ISO 216 A4 (210 x 297 mm) and US Letter (8.5 x 11 in).
const (
	A4 Format = iota
	Letter
)

// Size returns the size of the paper, mm.
func (f Format) Size() (width, height float64) {
	if f == Letter {
		return 215.9, 279.4
	}
	return 210, 297
}

// Room returns the size of the largest picture that fits on a page with its caption, mm.
func (f Format) Room() (width, height float64) {
	width, height = f.Size()
	return width - 2*marginSide, height - marginTop - marginFoot - captionRoom
}

// Below returns the same for a picture that stands below a heading and so many lines of text as wide as
// the page.
func (f Format) Below(lines int) (width, height float64) {
	width, height = f.Room()
	height -= headingRoom
	if lines > 0 {
		height -= float64(lines)*sizeBody*lead + 1.5
	}
	return width, height
}

// WritePapers writes the papers as a document with its fonts inside.
func WritePapers(w io.Writer, p Papers) error {
	f, err := newFlow(p.Format)
	if err != nil {
		return fmt.Errorf("pdf: %w", err)
	}
	if p.Title != "" {
		f.paragraph(f.fonts.bold, p.Title, sizeTitle, 0)
		f.space(2)
	}
	for i, b := range p.Blocks {
		if err := f.block(b, f.next(p.Blocks[i+1:])); err != nil {
			return fmt.Errorf("pdf: block %d: %w", i+1, err)
		}
	}
	if err := f.write(w, p.Title, p.Footer); err != nil {
		return fmt.Errorf("pdf: %w", err)
	}
	return nil
}
