// Package picture draws what a maker looks at and does not cut: how the parts lie on a sheet, and
// what is stacked on each pin. It makes plain lists of shapes and labels; the packages svg and pdf
// write them.
package picture

import (
	"fmt"
	"math"

	"pinwright/export"
	"pinwright/parts/outline"
)

// Picture is a drawing on paper. Lengths are millimetres on the paper; the origin is the lower left
// corner, x to the right, y up. Items are drawn in order, later ones over earlier ones.
type Picture struct {
	Title         string // what it shows, in a few words
	Text          string // the same for someone who cannot see it
	Width, Height float64
	Items         []Item
}

// Item is a Shape or a Label.
type Item interface{ item() }

// Shape is outlines, filled as one by the even-odd rule, and open paths, which are stroked only.
type Shape struct {
	Closed []outline.Outline
	Open   []outline.Path
	Fill   *export.RGB // nil: not filled
	Stroke *export.RGB // nil: not stroked
	Line   float64     // width of the stroke
	Dash   []float64   // on, off; nil: solid
	Title  string      // what it is; shown by a browser when pointed at
}

// Anchor says which point of a label lies at its place, along the line of the text.
type Anchor int

// The anchors.
const (
	Start Anchor = iota
	Middle
	End
)

// Label is one line of text. At is on its base line.
type Label struct {
	At     outline.Point
	Text   string
	Size   float64 // of the font
	Anchor Anchor
	Bold   bool
	Colour export.RGB
}

func (Shape) item() {}
func (Label) item() {}

// The colours of pictures: ink, greys, and tints on which ink is well read.
var (
	ink  = export.RGB{R: 0x22, G: 0x22, B: 0x22}
	grey = export.RGB{R: 0x8a, G: 0x8a, B: 0x8a}
	pale = export.RGB{R: 0xf3, G: 0xf3, B: 0xf0}

	faint  = export.RGB{R: 0xcc, G: 0xcc, B: 0xcc}
	accent = export.RGB{R: 0xb0, G: 0x30, B: 0x30}
	white  = export.RGB{R: 0xff, G: 0xff, B: 0xff}
)

// tint returns the colour of the i-th thing of a row: eight tints, light enough for ink on them, that
// differ in hue and lightness.
func tint(i int) export.RGB {
	tints := [...]export.RGB{
		{R: 0xbc, G: 0xd4, B: 0xe6},
		{R: 0xf3, G: 0xd9, B: 0xa4},
		{R: 0xc9, G: 0xe4, B: 0xc3},
		{R: 0xe8, G: 0xc4, B: 0xcb},
		{R: 0xd8, G: 0xd1, B: 0xea},
		{R: 0xf2, G: 0xef, B: 0xb6},
		{R: 0xb9, G: 0xdf, B: 0xdb},
		{R: 0xdd, G: 0xcf, B: 0xc0},
	}
	return tints[((i%len(tints))+len(tints))%len(tints)]
}

func colour(c export.RGB) *export.RGB { return &c }

// rectangle is counter-clockwise from the lower left corner.
func rectangle(x0, y0, x1, y1 float64) outline.Outline {
	return outline.Outline{
		{Point: outline.Point{X: x0, Y: y0}},
		{Point: outline.Point{X: x1, Y: y0}},
		{Point: outline.Point{X: x1, Y: y1}},
		{Point: outline.Point{X: x0, Y: y1}},
	}
}

func line(points ...outline.Point) outline.Path {
	p := make(outline.Path, len(points))
	for i, q := range points {
		p[i].Point = q
	}
	return p
}

// Check tells whether the picture can be written: every number is one, and the size is above zero.
func (p Picture) Check() error {
	if !(p.Width > 0 && p.Height > 0 && p.Width <= most && p.Height <= most) {
		return fmt.Errorf("picture %q: a size of %g x %g mm cannot be drawn", p.Title, p.Width, p.Height)
	}
	for i, item := range p.Items {
		if !sound(item) {
			return fmt.Errorf("picture %q: item %d has a number that is none", p.Title, i+1)
		}
	}
	return nil
}

// most is the largest number in a picture, mm.
const most = 1e6

func sound(item Item) bool {
	ok := func(vs ...float64) bool {
		for _, v := range vs {
			if !(math.Abs(v) <= most) {
				return false
			}
		}
		return true
	}
	run := func(vs []outline.Vertex) bool {
		for _, v := range vs {
			if !ok(v.X, v.Y, v.Bulge) {
				return false
			}
		}
		return true
	}
	switch item := item.(type) {
	case Shape:
		for _, o := range item.Closed {
			if !run(o) {
				return false
			}
		}
		for _, o := range item.Open {
			if !run(o) {
				return false
			}
		}
		return ok(item.Line) && ok(item.Dash...) && item.Line >= 0
	case Label:
		return ok(item.At.X, item.At.Y, item.Size) && item.Size > 0 && item.Anchor >= Start && item.Anchor <= End
	}
	return false
}
