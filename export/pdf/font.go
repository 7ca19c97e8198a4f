package pdf

import (
	"fmt"
	"sort"
	"strings"
	"unicode/utf16"

	"golang.org/x/image/font"
	"golang.org/x/image/font/gofont/gobold"
	"golang.org/x/image/font/gofont/goregular"
	"golang.org/x/image/font/sfnt"
	"golang.org/x/image/math/fixed"
)

// face is a font and the glyphs of it that a document uses.
type face struct {
	name string
	data []byte
	font *sfnt.Font
	buf  sfnt.Buffer
	used map[sfnt.GlyphIndex]rune
}

// faces are the two fonts of our papers: the Go fonts, which may be embedded freely.
type faces struct{ regular, bold *face }

func loadFaces() (faces, error) {
	regular, err := newFace("Go-Regular", goregular.TTF)
	if err != nil {
		return faces{}, err
	}
	bold, err := newFace("Go-Bold", gobold.TTF)
	return faces{regular, bold}, err
}

func newFace(name string, data []byte) (*face, error) {
	f, err := sfnt.Parse(data)
	if err != nil {
		return nil, fmt.Errorf("font %s: %w", name, err)
	}
	return &face{name: name, data: data, font: f, used: map[sfnt.GlyphIndex]rune{}}, nil
}

// glyph returns the glyph of a character; a question mark's where the font has none.
func (f *face) glyph(r rune) (sfnt.GlyphIndex, rune) {
	if r == '\u00a0' || r < ' ' {
		r = ' '
	}
	g, err := f.font.GlyphIndex(&f.buf, r)
	if err != nil || g == 0 {
		r = '?'
		g, _ = f.font.GlyphIndex(&f.buf, r)
	}
	return g, r
}

// advance returns the width of a glyph in thousandths of the font's size.
func (f *face) advance(g sfnt.GlyphIndex) float64 {
	em := f.font.UnitsPerEm()
	a, err := f.font.GlyphAdvance(&f.buf, g, fixed.I(int(em)), font.HintingNone)
	if err != nil {
		return 0
	}
	return float64(a) / 64 * 1000 / float64(em)
}

// width returns the length of a text set at a size, in the unit of the size.
func (f *face) width(s string, size float64) float64 {
	w := 0.0
	for _, r := range s {
		g, _ := f.glyph(r)
		w += f.advance(g)
	}
	return w * size / 1000
}

// show returns the text as the string of a Tj operator, and remembers its glyphs.
func (f *face) show(s string) string {
	var b strings.Builder
	b.WriteByte('<')
	for _, r := range s {
		g, shown := f.glyph(r)
		f.used[g] = shown
		fmt.Fprintf(&b, "%04X", uint16(g))
	}
	b.WriteByte('>')
	return b.String()
}

// glyphs returns the glyphs that are used, in the order of their numbers.
func (f *face) glyphs() []sfnt.GlyphIndex {
	glyphs := make([]sfnt.GlyphIndex, 0, len(f.used))
	for g := range f.used {
		glyphs = append(glyphs, g)
	}
	sort.Slice(glyphs, func(i, j int) bool { return glyphs[i] < glyphs[j] })
	return glyphs
}

// embed fills object at with the font, cut down to the glyphs that are used: a composite font whose
// character codes are the glyph numbers, with a map back to Unicode so that text can be searched
// and copied (ISO 32000-1, 9.7 and 9.10.3).
func (f *face) embed(d *document, at ref) error {
	glyphs := f.glyphs()
	data, head, err := subset(f.data, glyphs)
	if err != nil {
		return fmt.Errorf("font %s: %w", f.name, err)
	}
	file := d.stream(fmt.Sprintf("/Length1 %d", len(data)), data)
	scale := 1000 / float64(f.font.UnitsPerEm())
	metrics, err := f.font.Metrics(&f.buf, fixed.I(1000), font.HintingNone)
	if err != nil {
		return fmt.Errorf("font %s: %w", f.name, err)
	}
	name := "/PINWRT+" + f.name // six letters and a plus mark a font of which a part is embedded
	box := fmt.Sprintf("[%s %s %s %s]", num(float64(head.xMin)*scale, 0), num(float64(head.yMin)*scale, 0),
		num(float64(head.xMax)*scale, 0), num(float64(head.yMax)*scale, 0))
	descriptor := d.add(fmt.Sprintf("<< /Type /FontDescriptor /FontName %s /Flags 32 /FontBBox %s /ItalicAngle 0 /Ascent %d /Descent %d /CapHeight %d /StemV 80 /FontFile2 %v >>",
		name, box, metrics.Ascent.Round(), -metrics.Descent.Round(), metrics.CapHeight.Round(), file))
	var widths strings.Builder
	for _, g := range glyphs {
		fmt.Fprintf(&widths, "%d [%s] ", g, num(f.advance(g), 3))
	}
	descendant := d.add(fmt.Sprintf("<< /Type /Font /Subtype /CIDFontType2 /BaseFont %s /CIDSystemInfo << /Registry (Adobe) /Ordering (Identity) /Supplement 0 >> /FontDescriptor %v /CIDToGIDMap /Identity /DW 1000 /W [%s] >>",
		name, descriptor, strings.TrimSpace(widths.String())))
	unicode := d.stream("", f.toUnicode(glyphs))
	d.fill(at, fmt.Sprintf("<< /Type /Font /Subtype /Type0 /BaseFont %s /Encoding /Identity-H /DescendantFonts [%v] /ToUnicode %v >>",
		name, descendant, unicode))
	return nil
}

func (f *face) toUnicode(glyphs []sfnt.GlyphIndex) []byte {
	var b strings.Builder
	b.WriteString("/CIDInit /ProcSet findresource begin\n12 dict begin\nbegincmap\n" +
		"/CIDSystemInfo << /Registry (Adobe) /Ordering (UCS) /Supplement 0 >> def\n" +
		"/CMapName /Adobe-Identity-UCS def\n/CMapType 2 def\n" +
		"1 begincodespacerange\n<0000> <FFFF>\nendcodespacerange\n")
	for len(glyphs) > 0 {
		part := glyphs[:min(100, len(glyphs))] // no more in one run: 9.7.5.4
		glyphs = glyphs[len(part):]
		fmt.Fprintf(&b, "%d beginbfchar\n", len(part))
		for _, g := range part {
			fmt.Fprintf(&b, "<%04X> <", uint16(g))
			for _, u := range utf16.Encode([]rune{f.used[g]}) {
				fmt.Fprintf(&b, "%04X", u)
			}
			b.WriteString(">\n")
		}
		b.WriteString("endbfchar\n")
	}
	b.WriteString("endcmap\nCMapName currentdict /CMap defineresource pop\nend\nend\n")
	return []byte(b.String())
}
