// Package svg writes sheets as SVG drawings at 1:1, and pictures.
//
// A drawing of a sheet has its size in millimetres and user units that are millimetres. Lines and
// arcs are written as such (A commands, circles as circles), coordinates to a millionth of a
// millimetre, in the order of the work, in a group for every run of steps of one operation. SVG's y
// points down: coordinates are turned over, and there is no transform for a reader to overlook.
// The same input gives the same bytes.
package svg

import (
	"bytes"
	"encoding/xml"
	"fmt"
	"io"
	"math"
	"strconv"
	"strings"

	"pinwright/export"
	"pinwright/parts/outline"
)

// Options are choices that do not move a line. The zero value is what a laser wants.
type Options struct {
	Line   float64 // width of the lines, mm; 0: 0.1
	Dashes bool    // tell operations apart by dashes too; for the eye only, since a driver may cut dashes as such
}

// Write writes a sheet. The groups are named engrave, cut-inside and cut-outside; a sheet that comes
// back to an operation numbers the later runs (cut-inside-2).
func Write(w io.Writer, s export.Sheet, o Options) error {
	if err := s.Check(); err != nil {
		return fmt.Errorf("svg: %w", err)
	}
	if o.Line == 0 {
		o.Line = 0.1
	}
	if !(o.Line > 0 && o.Line < 10) {
		return fmt.Errorf("svg: a line %g mm wide cannot be drawn", o.Line)
	}
	p := printer{height: s.Height}
	title := s.Title
	if title == "" {
		title = s.Name
	}
	p.open(s.Width, s.Height, title, fmt.Sprintf("Cutting paths of sheet %s, %s x %s mm, at 1:1.", s.Name, num(s.Width), num(s.Height)))
	runs := map[export.Operation]int{}
	for i, step := range s.Steps {
		if i == 0 || s.Steps[i-1].Op != step.Op {
			if i > 0 {
				p.b.WriteString("</g>\n")
			}
			runs[step.Op]++
			p.group(step.Op, runs[step.Op], o)
		}
		p.step(step)
	}
	if len(s.Steps) > 0 {
		p.b.WriteString("</g>\n")
	}
	return p.close(w)
}

// printer writes one drawing; height turns y over.
type printer struct {
	b      bytes.Buffer
	height float64
}

func (p *printer) open(width, height float64, title, text string) {
	fmt.Fprintf(&p.b, "<?xml version=\"1.0\" encoding=\"UTF-8\"?>\n<svg xmlns=\"http://www.w3.org/2000/svg\" version=\"1.1\" width=\"%smm\" height=\"%smm\" viewBox=\"0 0 %s %s\">\n",
		num(width), num(height), num(width), num(height))
	fmt.Fprintf(&p.b, "<title>%s</title>\n", escape(title))
	if text != "" {
		fmt.Fprintf(&p.b, "<desc>%s</desc>\n", escape(text))
	}
}

func (p *printer) close(w io.Writer) error {
	p.b.WriteString("</svg>\n")
	if _, err := w.Write(p.b.Bytes()); err != nil {
		return fmt.Errorf("svg: %w", err)
	}
	return nil
}

func (p *printer) group(op export.Operation, run int, o Options) {
	id := op.String()
	if run > 1 {
		id += "-" + strconv.Itoa(run)
	}
	look := op.Look()
	fmt.Fprintf(&p.b, "<g id=\"%s\" fill=\"none\" stroke=\"%s\" stroke-width=\"%s\" stroke-linecap=\"round\" stroke-linejoin=\"round\"",
		id, look.Colour.Hex(), num(o.Line))
	if o.Dashes {
		p.dash(look.Dash)
	}
	p.b.WriteString(">\n")
}

func (p *printer) dash(dash []float64) {
	if len(dash) == 0 {
		return
	}
	on := make([]string, len(dash))
	for i, d := range dash {
		on[i] = num(d)
	}
	fmt.Fprintf(&p.b, " stroke-dasharray=\"%s\"", strings.Join(on, " "))
}

func (p *printer) step(s export.Step) {
	end := "/>\n"
	if centre, radius, ok := s.Closed.AsCircle(); ok {
		fmt.Fprintf(&p.b, "<circle cx=\"%s\" cy=\"%s\" r=\"%s\"", num(centre.X), num(p.height-centre.Y), num(radius))
		if s.Part != "" {
			end = "><title>" + escape(s.Part) + "</title></circle>\n"
		}
	} else {
		p.b.WriteString("<path d=\"")
		if s.Op == export.Engrave {
			p.run(s.Open.Segments(), false)
		} else {
			p.run(s.Closed.Segments(), true)
		}
		p.b.WriteByte('"')
		if s.Part != "" {
			end = "><title>" + escape(s.Part) + "</title></path>\n"
		}
	}
	p.b.WriteString(end)
}

// run writes the path data of a run. An arc command says where the arc ends and how large it is, and
// leaves the centre to the reader: near a half turn a rounded radius would move the centre by its
// square root. So arcs of more than a third of a turn are halved; then the error is below twice the
// rounding.
func (p *printer) run(segments []outline.Segment, closed bool) {
	pieces := export.Split(segments, func(s outline.Segment) bool { return math.Abs(s.Sweep()) <= 2*math.Pi/3 })
	if len(pieces) == 0 {
		return
	}
	p.b.WriteString("M" + p.point(pieces[0].A))
	for i, s := range pieces {
		switch {
		case sagitta(s) >= flat:
			radius := num(s.Radius())
			// Sweep 1 is from x to y, which is clockwise to the eye as y points down.
			sweep := "0"
			if s.Bulge < 0 {
				sweep = "1"
			}
			p.b.WriteString("A" + radius + " " + radius + " 0 0 " + sweep + " " + p.point(s.B))
		case !closed || i+1 < len(pieces):
			p.b.WriteString("L" + p.point(s.B))
		}
	}
	if closed {
		p.b.WriteByte('Z')
	}
}

// flat is the height of an arc over its chord below which it is written as a line, mm: a tenth of a
// micrometre, a tenth of what is promised. The centre of a flatter one is so far away that readers
// lose more by computing it.
const flat = 1e-4

func sagitta(s outline.Segment) float64 { return math.Abs(s.Bulge) * s.A.Dist(s.B) / 2 }

// point writes a point, y turned over.
func (p *printer) point(q outline.Point) string { return num(q.X) + " " + num(p.height-q.Y) }

// num writes a length with six decimals at most, a nanometre.
func num(v float64) string {
	s := strconv.FormatFloat(v, 'f', 6, 64)
	s = strings.TrimRight(strings.TrimRight(s, "0"), ".")
	if s == "-0" {
		return "0"
	}
	return s
}

func escape(s string) string {
	var b strings.Builder
	_ = xml.EscapeText(&b, []byte(s))
	return b.String()
}
