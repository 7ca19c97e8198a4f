package svg

import (
	"fmt"
	"io"

	"pinwright/export/picture"
	"pinwright/parts/outline"
)

// WritePicture writes a picture, its size in millimetres, with text as text.
func WritePicture(w io.Writer, pic picture.Picture) error {
	if err := pic.Check(); err != nil {
		return fmt.Errorf("svg: %w", err)
	}
	p := printer{height: pic.Height}
	p.open(pic.Width, pic.Height, pic.Title, pic.Text)
	p.b.WriteString("<rect width=\"100%\" height=\"100%\" fill=\"#ffffff\"/>\n")
	for _, item := range pic.Items {
		switch item := item.(type) {
		case picture.Shape:
			p.shape(item)
		case picture.Label:
			p.label(item)
		}
	}
	return p.close(w)
}

func (p *printer) shape(s picture.Shape) {
	fill, stroke := "none", "none"
	if s.Fill != nil {
		fill = s.Fill.Hex()
	}
	if s.Stroke != nil {
		stroke = s.Stroke.Hex()
	}
	if len(s.Closed) > 0 {
		p.b.WriteString("<path d=\"")
		for _, o := range s.Closed {
			p.run(o.Segments(), true)
		}
		fmt.Fprintf(&p.b, "\" fill=\"%s\" fill-rule=\"evenodd\"", fill)
		p.stroke(s, stroke)
	}
	if len(s.Open) > 0 && s.Stroke != nil {
		p.b.WriteString("<path d=\"")
		for _, o := range s.Open {
			p.run(o.Segments(), false)
		}
		p.b.WriteString("\" fill=\"none\"")
		p.stroke(s, stroke)
	}
}

func (p *printer) stroke(s picture.Shape, colour string) {
	if s.Stroke != nil {
		fmt.Fprintf(&p.b, " stroke=\"%s\" stroke-width=\"%s\" stroke-linecap=\"round\" stroke-linejoin=\"round\"", colour, num(s.Line))
		p.dash(s.Dash)
	}
	if s.Title != "" {
		fmt.Fprintf(&p.b, "><title>%s</title></path>\n", escape(s.Title))
		return
	}
	p.b.WriteString("/>\n")
}

func (p *printer) label(l picture.Label) {
	anchor := [...]string{picture.Start: "start", picture.Middle: "middle", picture.End: "end"}[l.Anchor]
	weight := ""
	if l.Bold {
		weight = " font-weight=\"bold\""
	}
	at := outline.Point{X: l.At.X, Y: p.height - l.At.Y}
	fmt.Fprintf(&p.b, "<text x=\"%s\" y=\"%s\" font-family=\"Go, Helvetica, Arial, sans-serif\" font-size=\"%s\"%s text-anchor=\"%s\" fill=\"%s\">%s</text>\n",
		num(at.X), num(at.Y), num(l.Size), weight, anchor, l.Colour.Hex(), escape(l.Text))
}
