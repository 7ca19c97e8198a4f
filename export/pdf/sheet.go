// Package pdf writes sheets as PDF pages at 1:1 for the laser, and papers for the workshop: pages
// with text, tables and pictures.
//
// The page of a sheet is exactly as large as the sheet. It holds the paths of the beam and nothing
// else, as hairlines, in the order of the work, each operation on a layer of its own that can be
// switched off (an optional content group); arcs are cubics within a hundredth of a micrometre. There
// are no dates, names of machines or random identifiers inside, and nothing is compressed: the same
// input gives the same bytes. The format is that of ISO 32000-1.
package pdf

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"strings"

	"pinwright/export"
)

// Options are choices that do not move a line. The zero value is what a laser wants.
type Options struct {
	Line   float64 // width of the lines, mm; 0: 0.02, which drivers that cut hairlines take for one
	Dashes bool    // tell operations apart by dashes too; for the eye only, since a driver may cut dashes as such
}

// ErrTooLarge is returned for a sheet that a PDF page cannot hold: a page has at most 14400 units of
// 1/72 inch, 5080 mm (ISO 32000-1, annex C). Readers that overlook the scaled units of later versions
// would cut such a sheet too small, so they are not used: take the DXF.
var ErrTooLarge = errors.New("a PDF page holds at most 5080 mm: use the DXF")

const largestPage = 14400 / points

// WriteSheet writes one sheet as a document of one page.
func WriteSheet(w io.Writer, s export.Sheet, o Options) error {
	title := s.Title
	if title == "" {
		title = s.Name
	}
	return writeSheets(w, []export.Sheet{s}, title, o)
}

// WriteSheets writes one page a sheet, in their order.
func WriteSheets(w io.Writer, sheets []export.Sheet, o Options) error {
	if len(sheets) == 1 {
		return WriteSheet(w, sheets[0], o)
	}
	return writeSheets(w, sheets, fmt.Sprintf("%d sheets", len(sheets)), o)
}

func writeSheets(w io.Writer, sheets []export.Sheet, title string, o Options) error {
	if len(sheets) == 0 {
		return errors.New("pdf: there is no sheet to write")
	}
	if o.Line == 0 {
		o.Line = 0.02
	}
	if !(o.Line > 0 && o.Line < 10) {
		return fmt.Errorf("pdf: a line %g mm wide cannot be drawn", o.Line)
	}
	for _, s := range sheets {
		if err := s.Check(); err != nil {
			return fmt.Errorf("pdf: %w", err)
		}
		if s.Width > largestPage || s.Height > largestPage {
			return fmt.Errorf("pdf: sheet %s is %g x %g mm: %w", s.Name, s.Width, s.Height, ErrTooLarge)
		}
	}
	d := newDocument()
	layers := map[export.Operation]ref{}
	var order, properties []string
	for _, op := range export.Operations() {
		layers[op] = d.add(fmt.Sprintf("<< /Type /OCG /Name %s >>", text(op.String())))
		order = append(order, layers[op].String())
		properties = append(properties, fmt.Sprintf("/%s %v", op, layers[op]))
	}
	resources := fmt.Sprintf("<< /Properties << %s >> >>", strings.Join(properties, " "))
	for _, s := range sheets {
		d.page(s.Width, s.Height, sheetContent(s, o), resources)
	}
	all := strings.Join(order, " ")
	catalog := fmt.Sprintf("/OCProperties << /OCGs [%s] /D << /Name (Operations) /Order [%s] /ON [%s] >> >>", all, all, all)
	if err := d.write(w, title, catalog); err != nil {
		return fmt.Errorf("pdf: %w", err)
	}
	return nil
}

// sheetContent draws in millimetres: one matrix stands before everything.
func sheetContent(s export.Sheet, o Options) []byte {
	var b bytes.Buffer
	fmt.Fprintf(&b, "q\n%s 0 0 %s 0 0 cm\n1 J 1 j %s w\n", num(points, 15), num(points, 15), num(o.Line, 6))
	for i, step := range s.Steps {
		if i == 0 || s.Steps[i-1].Op != step.Op {
			if i > 0 {
				b.WriteString("EMC\n")
			}
			look := step.Op.Look()
			fmt.Fprintf(&b, "/OC /%s BDC\n%s RG\n", step.Op, rgb(look.Colour))
			if o.Dashes {
				b.WriteString(dash(look.Dash))
			}
		}
		if step.Op == export.Engrave {
			run(&b, step.Open.Segments(), false)
		} else {
			run(&b, step.Closed.Segments(), true)
		}
		b.WriteString("S\n")
	}
	if len(s.Steps) > 0 {
		b.WriteString("EMC\n")
	}
	b.WriteString("Q")
	return b.Bytes()
}

func rgb(c export.RGB) string {
	return num(float64(c.R)/255, 4) + " " + num(float64(c.G)/255, 4) + " " + num(float64(c.B)/255, 4)
}

func dash(on []float64) string {
	s := make([]string, len(on))
	for i, v := range on {
		s[i] = num(v, 6)
	}
	return "[" + strings.Join(s, " ") + "] 0 d\n"
}
