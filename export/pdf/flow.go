package pdf

import (
	"bytes"
	"fmt"
	"io"
	"strings"

	"pinwright/export"
	"pinwright/export/picture"
	"pinwright/parts/outline"
)

// Measures of a page, mm.
const (
	marginSide  = 18
	marginTop   = 16
	marginFoot  = 18
	captionRoom = 10
	headingRoom = sizeHeading*lead + 2

	sizeTitle   = 6.4
	sizeHeading = 4.4
	sizeBody    = 3.3
	sizeTable   = 2.8
	sizeSmall   = 2.6
	lead        = 1.35 // from line to line, in sizes of the font
)

var (
	ink    = export.RGB{R: 0x22, G: 0x22, B: 0x22}
	rule   = export.RGB{R: 0xb0, G: 0xb0, B: 0xb0}
	shade  = export.RGB{R: 0xec, G: 0xee, B: 0xf0}
	signal = export.RGB{R: 0xe0, G: 0xa0, B: 0x00}
)

// flow sets blocks one below the other. It knows how far down the page it is; every page is a piece
// of content in millimetres, y up.
type flow struct {
	format        Format
	width, height float64 // of the paper
	fonts         faces
	pages         []*bytes.Buffer
	b             *bytes.Buffer // the page being set
	y             float64       // what is free begins here, from the bottom of the paper
}

func newFlow(format Format) (*flow, error) {
	fonts, err := loadFaces()
	if err != nil {
		return nil, err
	}
	f := &flow{format: format, fonts: fonts}
	f.width, f.height = format.Size()
	f.newPage()
	return f, nil
}

func (f *flow) newPage() {
	f.b = &bytes.Buffer{}
	f.pages = append(f.pages, f.b)
	f.y = f.height - marginTop
}

// empty tells whether nothing stands on the page yet.
func (f *flow) empty() bool { return f.y >= f.height-marginTop }

// room begins a new page unless so much is free on this one.
func (f *flow) room(height float64) {
	if f.y-height < marginFoot && !f.empty() {
		f.newPage()
	}
}

func (f *flow) space(height float64) {
	if !f.empty() {
		f.y -= height
	}
}

// block sets a block; next is the least room that the one after it needs.
func (f *flow) block(b Block, next float64) error {
	switch b := b.(type) {
	case Heading:
		f.space(4)
		f.room(sizeHeading*lead + 2 + next)
		f.paragraph(f.fonts.bold, string(b), sizeHeading, 0)
		f.space(1)
	case Text:
		f.paragraph(f.fonts.regular, string(b), sizeBody, 0)
		f.space(1.5)
	case Cautions:
		for _, c := range b {
			f.caution(c)
		}
		f.space(1.5)
	case Table:
		f.table(b)
		f.space(2.5)
	case Drawing:
		return f.drawing(b)
	case PageBreak:
		if !f.empty() {
			f.newPage()
		}
	default:
		return fmt.Errorf("%T is not a block", b)
	}
	return nil
}

// next returns the room that the blocks after a heading need on its page: texts whole, then the beginning
// of what they are about.
func (f *flow) next(blocks []Block) float64 {
	room := 0.0
	for _, b := range blocks {
		t, ok := b.(Text)
		if !ok {
			return room + f.least(b)
		}
		room += float64(len(f.wrap(f.fonts.regular, string(t), sizeBody, f.width-2*marginSide)))*sizeBody*lead + 1.5
		if room > f.height/2 {
			break
		}
	}
	return room
}

// least returns the room that a block needs on the page where it begins.
func (f *flow) least(b Block) float64 {
	switch b := b.(type) {
	case Drawing:
		_, height := f.format.Room()
		return min(b.Picture.Height, height) + captionRoom
	case Table:
		return 3 * sizeTable * lead * 1.6
	}
	return 2 * sizeBody * lead
}

// paragraph sets wrapped text from the left margin plus indent.
func (f *flow) paragraph(font *face, s string, size, indent float64) {
	for _, line := range f.wrap(font, s, size, f.width-2*marginSide-indent) {
		f.room(size * lead)
		f.y -= size * lead
		f.text(font, line, size, marginSide+indent, f.y+size*0.3, ink)
	}
}

// caution sets a warning beside a sign.
func (f *flow) caution(s string) {
	const indent = 8
	lines := f.wrap(f.fonts.regular, s, sizeBody, f.width-2*marginSide-indent)
	f.room(float64(min(len(lines), 4)) * sizeBody * lead)
	x, y := float64(marginSide), f.y-sizeBody*lead
	sign := outline.Outline{
		{Point: outline.Point{X: x + 0.4, Y: y + 0.3}}, {Point: outline.Point{X: x + 5.2, Y: y + 0.3}}, {Point: outline.Point{X: x + 2.8, Y: y + 4.4}},
	}
	fmt.Fprintf(f.b, "%s rg\n", rgb(signal))
	run(f.b, sign.Segments(), true)
	f.b.WriteString("f\n")
	f.text(f.fonts.bold, "!", 3, x+2.8-f.fonts.bold.width("!", 3)/2, y+0.8, ink)
	f.paragraph(f.fonts.regular, s, sizeBody, indent)
	f.space(1.2)
}

// text sets one line at a place.
func (f *flow) text(font *face, s string, size, x, y float64, colour export.RGB) {
	if s == "" {
		return
	}
	name := "R"
	if font == f.fonts.bold {
		name = "B"
	}
	fmt.Fprintf(f.b, "BT %s rg /%s %s Tf %s %s Td %s Tj ET\n", rgb(colour), name, num(size, 4), num(x, 4), num(y, 4), font.show(s))
}

// wrap breaks a text into lines no wider than width: at spaces, and inside a word only if the word
// alone is wider. Line breaks in the text are kept. The result has at least one line.
func (f *flow) wrap(font *face, s string, size, width float64) []string {
	var lines []string
	for _, paragraph := range strings.Split(s, "\n") {
		line := ""
		for _, word := range strings.Fields(paragraph) {
			joined := word
			if line != "" {
				joined = line + " " + word
			}
			if font.width(joined, size) <= width {
				line = joined
				continue
			}
			if line != "" {
				lines = append(lines, line)
			}
			line = word
			for font.width(line, size) > width {
				n := fitting(font, line, size, width)
				lines = append(lines, line[:n])
				line = line[n:]
			}
		}
		lines = append(lines, line)
	}
	return lines
}

// fitting returns how many bytes of the word fit, at least one character.
func fitting(font *face, word string, size, width float64) int {
	fit := 0
	for i := range word {
		if i > 0 && font.width(word[:i], size) > width {
			break
		}
		fit = i
	}
	if fit == 0 {
		for i := range word {
			if i > 0 {
				return i
			}
		}
		return len(word)
	}
	return fit
}

// drawing sets a picture in the middle, with its caption below.
func (f *flow) drawing(d Drawing) error {
	if err := d.Picture.Check(); err != nil {
		return err
	}
	width, height := f.format.Room()
	scale := min(1, width/d.Picture.Width, height/d.Picture.Height)
	caption := d.Caption
	if scale < 0.9999 {
		caption = strings.TrimSpace(fmt.Sprintf("%s (reduced to %.0f %%)", caption, 100*scale))
	}
	f.room(d.Picture.Height*scale + captionRoom)
	f.y -= d.Picture.Height * scale
	fmt.Fprintf(f.b, "q\n%s 0 0 %s %s %s cm\n1 J 1 j\n", num(scale, 9), num(scale, 9), num((f.width-d.Picture.Width*scale)/2, 6), num(f.y, 6))
	for _, item := range d.Picture.Items {
		switch item := item.(type) {
		case picture.Shape:
			f.shape(item)
		case picture.Label:
			f.label(item)
		}
	}
	f.b.WriteString("Q\n")
	if caption != "" {
		f.space(1)
		f.paragraph(f.fonts.regular, caption, sizeSmall, 0)
	}
	f.space(3)
	return nil
}

func (f *flow) shape(s picture.Shape) {
	if s.Fill != nil {
		fmt.Fprintf(f.b, "%s rg\n", rgb(*s.Fill))
	}
	if s.Stroke != nil {
		fmt.Fprintf(f.b, "%s RG %s w %s", rgb(*s.Stroke), num(s.Line, 6), dash(s.Dash))
	}
	paint := ""
	switch {
	case s.Fill != nil && s.Stroke != nil:
		paint = "B*\n"
	case s.Fill != nil:
		paint = "f*\n"
	case s.Stroke != nil:
		paint = "S\n"
	}
	if paint != "" && len(s.Closed) > 0 {
		for _, o := range s.Closed {
			run(f.b, o.Segments(), true)
		}
		f.b.WriteString(paint)
	}
	if s.Stroke != nil && len(s.Open) > 0 {
		for _, p := range s.Open {
			run(f.b, p.Segments(), false)
		}
		f.b.WriteString("S\n")
	}
}

func (f *flow) label(l picture.Label) {
	font := f.fonts.regular
	if l.Bold {
		font = f.fonts.bold
	}
	x := l.At.X
	switch l.Anchor {
	case picture.Middle:
		x -= font.width(l.Text, l.Size) / 2
	case picture.End:
		x -= font.width(l.Text, l.Size)
	}
	f.text(font, l.Text, l.Size, x, l.At.Y, l.Colour)
}

// write sets the feet of the pages and writes the document.
func (f *flow) write(w io.Writer, title, footer string) error {
	d := newDocument()
	regular, bold := d.reserve(), d.reserve()
	resources := fmt.Sprintf("<< /Font << /R %v /B %v >> >>", regular, bold)
	for i, page := range f.pages {
		f.b = page
		number := fmt.Sprintf("page %d of %d", i+1, len(f.pages))
		at := f.width - marginSide - f.fonts.regular.width(number, sizeSmall)
		left := f.wrap(f.fonts.regular, strings.ReplaceAll(footer, "\n", " "), sizeSmall, at-marginSide-5)[0]
		f.text(f.fonts.regular, left, sizeSmall, marginSide, 9, ink)
		f.text(f.fonts.regular, number, sizeSmall, at, 9, ink)
		content := fmt.Sprintf("q\n%s 0 0 %s 0 0 cm\n%sQ", num(points, 15), num(points, 15), page.Bytes())
		d.page(f.width, f.height, []byte(content), resources)
	}
	if err := f.fonts.regular.embed(d, regular); err != nil {
		return err
	}
	if err := f.fonts.bold.embed(d, bold); err != nil {
		return err
	}
	return d.write(w, title, "/Lang (en)")
}
