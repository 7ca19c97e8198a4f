package pdf

import (
	"encoding/binary"
	"strings"
	"testing"
	"unicode/utf8"

	"golang.org/x/image/font/gofont/goregular"
	"pgregory.net/rapid"
)

// No line is wider than the column, unless a single character is, and every word comes out again.
func TestWrap(t *testing.T) {
	f, err := newFlow(A4)
	if err != nil {
		t.Fatal(err)
	}
	rapid.Check(t, func(t *rapid.T) {
		s := rapid.OneOf(rapid.String(), rapid.StringMatching(`([a-z]{1,30} ){0,30}`), rapid.StringMatching(`(W{1,90}\n?){0,3}`)).Draw(t, "text")
		width := rapid.Float64Range(1, 200).Draw(t, "width")
		lines := f.wrap(f.fonts.regular, s, sizeBody, width)
		for _, line := range lines {
			if f.fonts.regular.width(line, sizeBody) > width+1e-9 && utf8.RuneCountInString(line) > 1 {
				t.Fatalf("%q is wider than %g", line, width)
			}
		}
		bare := func(s string) string { return strings.Join(strings.Fields(s), "") }
		if bare(strings.Join(lines, " ")) != bare(s) {
			t.Fatalf("%q became %q", s, lines)
		}
	})
}

func TestWidths(t *testing.T) {
	f, err := newFlow(A4)
	if err != nil {
		t.Fatal(err)
	}
	regular := f.fonts.regular
	// All figures of a text font have the same width, so that columns of numbers align.
	for _, d := range "123456789" {
		if regular.width(string(d), 1) != regular.width("0", 1) {
			t.Errorf("%c is as wide as %g, 0 is %g", d, regular.width(string(d), 1), regular.width("0", 1))
		}
	}
	if w := regular.width("WW", 10) - 2*regular.width("W", 10); w > 1e-12 || w < -1e-12 {
		t.Errorf("widths do not add up: %g", w)
	}
	if regular.width("\u4e2d", 1) != regular.width("?", 1) {
		t.Error("a character that the font lacks is not shown as a question mark")
	}
}

// The subset keeps the outlines of what is used, those of accented letters too, and is itself a font.
func TestSubsetIsAFont(t *testing.T) {
	f, err := newFace("Go-Regular", goregular.TTF)
	if err != nil {
		t.Fatal(err)
	}
	f.show("Aé2")
	glyphs := f.glyphs()
	data, _, err := subset(f.data, glyphs)
	if err != nil {
		t.Fatal(err)
	}
	if len(data) > len(f.data)/8 {
		t.Errorf("%d bytes of %d are kept", len(data), len(f.data))
	}
	if sum := checksum(data); sum != 0xB1B0AFBA { // OpenType, head.checkSumAdjustment
		t.Errorf("checksum %#x", sum)
	}
	whole, err := tablesOf(f.data)
	if err != nil {
		t.Fatal(err)
	}
	cut, err := tablesOf(data)
	if err != nil {
		t.Fatal(err)
	}
	for _, g := range glyphs {
		a, b := glyphData(whole, int(g)), glyphData(cut, int(g))
		if len(a) == 0 || !strings.HasPrefix(string(b), string(a)) {
			t.Errorf("glyph %d: %d bytes of %d", g, len(b), len(a))
		}
	}
	for n := range data[:200] {
		if _, _, err := subset(data[:n], glyphs); err == nil {
			t.Errorf("a font of %d bytes is taken", n)
		}
	}
}

// glyphData reads a glyph by the font's own table of places.
func glyphData(tables map[string][]byte, g int) []byte {
	loca := tables["loca"]
	if binary.BigEndian.Uint16(tables["head"][50:]) == 0 {
		return tables["glyf"][2*int(binary.BigEndian.Uint16(loca[2*g:])) : 2*int(binary.BigEndian.Uint16(loca[2*g+2:]))]
	}
	return tables["glyf"][binary.BigEndian.Uint32(loca[4*g:]):binary.BigEndian.Uint32(loca[4*g+4:])]
}
