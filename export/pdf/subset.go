package pdf

import (
	"encoding/binary"
	"errors"

	"golang.org/x/image/font/sfnt"
)

// headTable is what a descriptor needs of a font's head table.
type headTable struct{ xMin, yMin, xMax, yMax int16 }

var errFont = errors.New("not a TrueType font with outlines")

// subset returns a TrueType font with the outlines of the given glyphs alone; the glyphs keep their
// numbers. Tables that only a text engine needs (names, character map, layout) are left out, as
// ISO 32000-1, 9.9 allows. The table formats are those of the OpenType specification (head, loca,
// glyf, and the table directory with its sums).
func subset(font []byte, glyphs []sfnt.GlyphIndex) ([]byte, headTable, error) {
	tables, err := tablesOf(font)
	if err != nil {
		return nil, headTable{}, err
	}
	head, loca, glyf, maxp := tables["head"], tables["loca"], tables["glyf"], tables["maxp"]
	if len(head) < 54 || len(maxp) < 6 {
		return nil, headTable{}, errFont
	}
	count := int(binary.BigEndian.Uint16(maxp[4:]))
	offset := func(i int) int {
		if binary.BigEndian.Uint16(head[50:]) == 0 {
			return 2 * int(binary.BigEndian.Uint16(loca[2*i:]))
		}
		return int(binary.BigEndian.Uint32(loca[4*i:]))
	}
	if long := binary.BigEndian.Uint16(head[50:]); len(loca) < (count+1)*2*(1+int(long)) {
		return nil, headTable{}, errFont
	}
	outline := func(g int) ([]byte, error) {
		a, b := offset(g), offset(g+1)
		if g >= count || a > b || b > len(glyf) {
			return nil, errFont
		}
		return glyf[a:b], nil
	}

	// Glyphs put together from others need those too. Number 0 stands for a missing character.
	keep := map[int]bool{}
	todo := []int{0}
	for _, g := range glyphs {
		todo = append(todo, int(g))
	}
	for len(todo) > 0 {
		g := todo[0]
		todo = todo[1:]
		if keep[g] || g >= count {
			continue
		}
		keep[g] = true
		data, err := outline(g)
		if err != nil {
			return nil, headTable{}, err
		}
		more, err := components(data)
		if err != nil {
			return nil, headTable{}, err
		}
		todo = append(todo, more...)
	}

	newLoca := make([]byte, 4*(count+1))
	var newGlyf []byte
	for g := range count {
		binary.BigEndian.PutUint32(newLoca[4*g:], uint32(len(newGlyf)))
		if keep[g] {
			data, err := outline(g)
			if err != nil {
				return nil, headTable{}, err
			}
			newGlyf = append(newGlyf, data...)
			for len(newGlyf)%4 != 0 {
				newGlyf = append(newGlyf, 0)
			}
		}
	}
	binary.BigEndian.PutUint32(newLoca[4*count:], uint32(len(newGlyf)))
	newHead := append([]byte(nil), head...)
	binary.BigEndian.PutUint32(newHead[8:], 0)
	binary.BigEndian.PutUint16(newHead[50:], 1) // loca in long form
	tables["head"], tables["loca"], tables["glyf"] = newHead, newLoca, newGlyf

	at := func(i int) int16 { return int16(binary.BigEndian.Uint16(head[i:])) }
	return assemble(tables), headTable{at(36), at(38), at(40), at(42)}, nil
}

// tablesOf cuts a font file into its tables.
func tablesOf(font []byte) (map[string][]byte, error) {
	if len(font) < 12 {
		return nil, errFont
	}
	n := int(binary.BigEndian.Uint16(font[4:]))
	if len(font) < 12+16*n {
		return nil, errFont
	}
	tables := map[string][]byte{}
	for i := range n {
		entry := font[12+16*i:]
		a, l := uint64(binary.BigEndian.Uint32(entry[8:])), uint64(binary.BigEndian.Uint32(entry[12:]))
		if a+l > uint64(len(font)) {
			return nil, errFont
		}
		tables[string(entry[:4])] = font[a : a+l]
	}
	return tables, nil
}

// components returns the glyphs that a composite glyph is put together from.
func components(glyph []byte) ([]int, error) {
	const (
		words     = 1 << 0
		scale     = 1 << 3
		more      = 1 << 5
		xyScale   = 1 << 6
		twoByTwo  = 1 << 7
		headBytes = 10
	)
	if len(glyph) < headBytes || int16(binary.BigEndian.Uint16(glyph)) >= 0 {
		return nil, nil
	}
	var found []int
	for p := headBytes; ; {
		if p+4 > len(glyph) {
			return nil, errFont
		}
		flags := binary.BigEndian.Uint16(glyph[p:])
		found = append(found, int(binary.BigEndian.Uint16(glyph[p+2:])))
		p += 6
		if flags&words != 0 {
			p += 2
		}
		switch {
		case flags&scale != 0:
			p += 2
		case flags&xyScale != 0:
			p += 4
		case flags&twoByTwo != 0:
			p += 8
		}
		if flags&more == 0 {
			return found, nil
		}
	}
}

// assemble writes a font file of the tables that a PDF reader needs, sorted by name.
func assemble(tables map[string][]byte) []byte {
	var names []string
	for _, name := range []string{"cvt ", "fpgm", "glyf", "head", "hhea", "hmtx", "loca", "maxp", "prep"} {
		if len(tables[name]) > 0 {
			names = append(names, name)
		}
	}
	n := len(names)
	power, log := 1, 0
	for power*2 <= n {
		power, log = power*2, log+1
	}
	out := binary.BigEndian.AppendUint32(nil, 0x00010000)
	for _, v := range []int{n, power * 16, log, (n - power) * 16} {
		out = binary.BigEndian.AppendUint16(out, uint16(v))
	}
	at := 12 + 16*n
	headAt := 0
	for _, name := range names {
		t := tables[name]
		if name == "head" {
			headAt = at
		}
		out = append(out, name...)
		out = binary.BigEndian.AppendUint32(out, checksum(t))
		out = binary.BigEndian.AppendUint32(out, uint32(at))
		out = binary.BigEndian.AppendUint32(out, uint32(len(t)))
		at += (len(t) + 3) / 4 * 4
	}
	for _, name := range names {
		out = append(out, tables[name]...)
		for len(out)%4 != 0 {
			out = append(out, 0)
		}
	}
	binary.BigEndian.PutUint32(out[headAt+8:], 0xB1B0AFBA-checksum(out))
	return out
}

func checksum(b []byte) uint32 {
	var sum uint32
	for len(b) >= 4 {
		sum += binary.BigEndian.Uint32(b)
		b = b[4:]
	}
	if len(b) > 0 {
		var last [4]byte
		copy(last[:], b)
		sum += binary.BigEndian.Uint32(last[:])
	}
	return sum
}
