package picture

// roughWidth is how long a text is at most, whichever of the usual fonts it is set in.
func roughWidth(s string, size float64) float64 {
	w := 0
	for _, r := range s {
		if r >= ' ' && int(r-' ') < len(advances) {
			w += advances[r-' ']
		} else {
			w += widest
		}
	}
	return size * float64(w) / 1000
}

// boldWidth is the same for bold letters: no more than a fifth wider.
func boldWidth(s string, size float64) float64 { return 1.2 * roughWidth(s, size) }

// advances are the widths of the characters from the space to the tilde, thousandths of the font's
// size: the larger of Go Regular, with which papers are set, and DejaVu Sans, which stands in where
// none of the fonts that an SVG names is there. Both as measured from the font files.
var advances = [...]int{
	318, 401, 460, 838, 637, 951, 780, 275, 391, 391, 584, 838, 318, 584, 318, 337,
	637, 637, 637, 637, 637, 637, 637, 637, 637, 637, 337, 337, 838, 838, 838, 557,
	1016, 685, 687, 723, 771, 667, 611, 778, 752, 399, 496, 667, 558, 863, 749, 788,
	667, 788, 723, 667, 611, 732, 685, 989, 686, 667, 686, 391, 337, 391, 838, 557,
	500, 613, 635, 550, 635, 616, 353, 635, 634, 278, 278, 580, 278, 975, 634, 612,
	635, 635, 412, 521, 393, 634, 592, 818, 592, 592, 525, 637, 337, 637, 838,
}

// widest is taken for every other character.
const widest = 1000

// shorten cuts a text so that it is no wider than room, with three dots for what is gone.
func shorten(s string, size, room float64) string {
	if roughWidth(s, size) <= room {
		return s
	}
	runes := []rune(s)
	for n := len(runes) - 1; n > 0; n-- {
		if short := string(runes[:n]) + "..."; roughWidth(short, size) <= room {
			return short
		}
	}
	return ""
}
