// Package mark writes on parts: single-stroke letters of lines and arcs for a laser or a pen, and the
// search for the place on a part where a text fits without touching a cut.
package mark

import (
	"unicode"

	"pinwright/parts/outline"
)

// Text returns the strokes of one line of text with letters of this height, mm, and the width of the
// line. The base line runs from the origin along x; everything lies between y = 0 and y = height.
// Small letters are drawn as capitals; a character without a drawing is a box. Blanks at the ends
// count for the width. No strokes, width 0 for an empty text or a height that is not positive.
func Text(s string, height float64) ([]outline.Path, float64) {
	if !(height > 0) {
		return nil, 0
	}
	f := height / capHeight
	var strokes []outline.Path
	x := 0.0
	first := true
	for _, r := range s {
		if !first {
			x += gap
		}
		first = false
		g, ok := letter(unicode.ToUpper(r))
		if !ok {
			g = unknown()
		}
		for _, stroke := range g.strokes {
			path := make(outline.Path, len(stroke))
			for i, k := range stroke {
				path[i].Point = outline.Point{X: (x + k[0]) * f, Y: k[1] * f}
				if i < len(stroke)-1 {
					path[i].Bulge = k[2]
				}
			}
			strokes = append(strokes, path)
		}
		x += g.width
	}
	return strokes, x * f
}

// Lines returns the strokes of several lines of text, the last one on the base line y = 0, all of
// them centred about x = width/2, and the size of the whole.
func Lines(lines []string, height float64) (strokes []outline.Path, width, total float64) {
	if !(height > 0) || len(lines) == 0 {
		return nil, 0, 0
	}
	widths := make([]float64, len(lines))
	texts := make([][]outline.Path, len(lines))
	for i, s := range lines {
		texts[i], widths[i] = Text(s, height)
		width = max(width, widths[i])
	}
	step := height * leading / capHeight
	for i, text := range texts {
		move := outline.Point{X: (width - widths[i]) / 2, Y: step * float64(len(lines)-1-i)}
		for _, p := range text {
			strokes = append(strokes, p.Transform(outline.Place(0, false, move)))
		}
	}
	return strokes, width, height + step*float64(len(lines)-1)
}

// Knows says whether every character of the text has a drawing.
func Knows(s string) bool {
	for _, r := range s {
		if _, ok := letter(unicode.ToUpper(r)); !ok {
			return false
		}
	}
	return true
}
