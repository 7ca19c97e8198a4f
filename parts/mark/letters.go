package mark

// The letters, drawn for this program: every character as the way of one tool, in a box 6 high whose
// width follows the letter. Straight lines, quarter and half circles; nothing below the base line, so
// that a line of text fills its box exactly. 0 has a stroke and O has none, 1 has a flag and I has
// none.

// capHeight is the height of the letters in the units of the table.
const capHeight = 6

// gap is between two letters, blank the width of a space, leading from base line to base line.
const (
	gap     = 1.8
	blank   = 2.4
	leading = 9
)

// knot is x, y and the bulge of the segment that leaves it.
type knot [3]float64

type glyph struct {
	width   float64
	strokes [][]knot
}

// Bulges that come back: a half circle, a quarter, two thirds and five twelfths of a turn, a sixth.
const (
	half    = 1
	quarter = 0.41421356237309503 // tan(90/4 degrees)
	twelfth = 0.26794919243112270 // tan(60/4): a sixth of a turn
	five    = 0.76732698797896033 // tan(150/4)
	two3    = 1.7320508075688772  // tan(240/4)
)

// dot is a small circle with its lowest point at x, y.
func dot(x, y float64) []knot {
	const r = 0.35
	return []knot{{x, y, half}, {x, y + 2*r, half}, {x, y}}
}

// letter returns the drawing of a capital, digit or sign.
func letter(r rune) (glyph, bool) {
	switch r {
	case ' ':
		return glyph{width: blank}, true
	case 'A':
		return glyph{4, [][]knot{{{0, 0}, {2, 6}, {4, 0}}, {{0.6, 1.8}, {3.4, 1.8}}}}, true
	case 'B':
		return glyph{4, [][]knot{
			{{0, 0}, {0, 6}, {2.6, 6, -half}, {2.6, 3.2}, {0, 3.2}},
			{{2.4, 3.2, -half}, {2.4, 0}, {0, 0}},
		}}, true
	case 'C':
		return glyph{3.8, [][]knot{{{3.732050807568877, 5, five}, {0, 4}, {0, 2, five}, {3.732050807568877, 1}}}}, true
	case 'D':
		return glyph{4, [][]knot{{{0, 0}, {0, 6}, {1.6, 6, -quarter}, {4, 3.6}, {4, 2.4, -quarter}, {1.6, 0}, {0, 0}}}}, true
	case 'E':
		return glyph{3.4, [][]knot{{{3.4, 6}, {0, 6}, {0, 0}, {3.4, 0}}, {{0, 3.2}, {2.8, 3.2}}}}, true
	case 'F':
		return glyph{3.4, [][]knot{{{3.4, 6}, {0, 6}, {0, 0}}, {{0, 3.2}, {2.8, 3.2}}}}, true
	case 'G':
		return glyph{4, [][]knot{{{3.732050807568877, 5, five}, {0, 4}, {0, 2, half}, {4, 2}, {4, 2.8}, {2.3, 2.8}}}}, true
	case 'H':
		return glyph{4, [][]knot{{{0, 0}, {0, 6}}, {{4, 0}, {4, 6}}, {{0, 3.2}, {4, 3.2}}}}, true
	case 'I':
		return glyph{0, [][]knot{{{0, 0}, {0, 6}}}}, true
	case 'J':
		return glyph{3, [][]knot{{{3, 6}, {3, 1.5, -half}, {0, 1.5}}}}, true
	case 'K':
		return glyph{4, [][]knot{{{0, 0}, {0, 6}}, {{3.8, 6}, {0, 2.2}}, {{1.4, 3.6}, {4, 0}}}}, true
	case 'L':
		return glyph{3.2, [][]knot{{{0, 6}, {0, 0}, {3.2, 0}}}}, true
	case 'M':
		return glyph{4.6, [][]knot{{{0, 0}, {0, 6}, {2.3, 2}, {4.6, 6}, {4.6, 0}}}}, true
	case 'N':
		return glyph{4, [][]knot{{{0, 0}, {0, 6}, {4, 0}, {4, 6}}}}, true
	case 'O':
		return glyph{4, [][]knot{{{4, 2}, {4, 4, half}, {0, 4}, {0, 2, half}, {4, 2}}}}, true
	case 'P':
		return glyph{4, [][]knot{{{0, 0}, {0, 6}, {2.4, 6, -half}, {2.4, 2.8}, {0, 2.8}}}}, true
	case 'Q':
		return glyph{4, [][]knot{{{4, 2}, {4, 4, half}, {0, 4}, {0, 2, half}, {4, 2}}, {{2.4, 1.8}, {4, 0}}}}, true
	case 'R':
		return glyph{4, [][]knot{{{0, 0}, {0, 6}, {2.4, 6, -half}, {2.4, 2.8}, {0, 2.8}}, {{2, 2.8}, {4, 0}}}}, true
	case 'S':
		return glyph{4, [][]knot{{
			{3.799038105676658, 5.25, twelfth},
			{2.5, 6},
			{1.5, 6, half},
			{1.5, 3},
			{2.5, 3, -half},
			{2.5, 0},
			{1.5, 0, -twelfth},
			{0.200961894323342, 0.75},
		}}}, true
	case 'T':
		return glyph{4, [][]knot{{{0, 6}, {4, 6}}, {{2, 6}, {2, 0}}}}, true
	case 'U':
		return glyph{4, [][]knot{{{0, 6}, {0, 2, half}, {4, 2}, {4, 6}}}}, true
	case 'V':
		return glyph{4, [][]knot{{{0, 6}, {2, 0}, {4, 6}}}}, true
	case 'W':
		return glyph{5.2, [][]knot{{{0, 6}, {1.3, 0}, {2.6, 4.4}, {3.9, 0}, {5.2, 6}}}}, true
	case 'X':
		return glyph{4, [][]knot{{{0, 0}, {4, 6}}, {{0, 6}, {4, 0}}}}, true
	case 'Y':
		return glyph{4, [][]knot{{{0, 6}, {2, 2.8}, {4, 6}}, {{2, 2.8}, {2, 0}}}}, true
	case 'Z':
		return glyph{4, [][]knot{{{0, 6}, {4, 6}, {0, 0}, {4, 0}}}}, true
	}
	return digit(r)
}

func digit(r rune) (glyph, bool) {
	switch r {
	case '0':
		return glyph{3.6, [][]knot{
			{{3.6, 1.8}, {3.6, 4.2, half}, {0, 4.2}, {0, 1.8, half}, {3.6, 1.8}},
			{{1, 1.6}, {2.6, 4.4}},
		}}, true
	case '1':
		return glyph{1.6, [][]knot{{{0, 4.6}, {1.6, 6}, {1.6, 0}}}}, true
	case '2':
		// The arc about (1.75, 4.25) ends where the line from the lower left touches it.
		return glyph{3.6, [][]knot{{{0.2345, 5.125, -1.13797}, {2.9925, 3.0178}, {0, 0}, {3.6, 0}}}}, true
	case '3':
		return glyph{3, [][]knot{{{0.1876, 5.3, -two3}, {1.4, 3.2, -two3}, {0.0144, 0.8}}}}, true
	case '4':
		return glyph{3.8, [][]knot{{{2.8, 0}, {2.8, 6}, {0, 1.8}, {3.8, 1.8}}}}, true
	case '5':
		return glyph{3.65, [][]knot{{{3.2, 6}, {0.8, 6}, {0.5287, 3.3555, -2.747477}, {0.1046, 0.95}}}}, true
	case '6':
		// The stem is the arc through (2.9, 6) that runs into the bowl.
		return glyph{3.6, [][]knot{{{2.9, 6, 0.311697}, {0, 1.8, half}, {3.6, 1.8, half}, {0, 1.8}}}}, true
	case '7':
		return glyph{3.6, [][]knot{{{0, 6}, {3.6, 6}, {1.2, 0}}}}, true
	case '8':
		return glyph{3.2, [][]knot{{{1.6, 3.2, half}, {1.6, 6, half}, {1.6, 3.2, -half}, {1.6, 0, -half}, {1.6, 3.2}}}}, true
	case '9':
		return glyph{3.6, [][]knot{{{0.7, 0, 0.311697}, {3.6, 4.2, half}, {0, 4.2, half}, {3.6, 4.2}}}}, true
	}
	return sign(r)
}

func sign(r rune) (glyph, bool) {
	switch r {
	case '-':
		return glyph{2.4, [][]knot{{{0, 3}, {2.4, 3}}}}, true
	case '_':
		return glyph{3.4, [][]knot{{{0, 0}, {3.4, 0}}}}, true
	case '.':
		return glyph{0.7, [][]knot{dot(0.35, 0)}}, true
	case ':':
		return glyph{0.7, [][]knot{dot(0.35, 0.9), dot(0.35, 3.9)}}, true
	case '+':
		return glyph{3, [][]knot{{{0, 3}, {3, 3}}, {{1.5, 1.5}, {1.5, 4.5}}}}, true
	case '/':
		return glyph{3, [][]knot{{{0, 0}, {3, 6}}}}, true
	case '(':
		return glyph{1.2, [][]knot{{{1.2, 6, 0.4}, {1.2, 0}}}}, true
	case ')':
		return glyph{1.2, [][]knot{{{0, 6, -0.4}, {0, 0}}}}, true
	case '°':
		return glyph{2, [][]knot{{{1, 4, half}, {1, 6, half}, {1, 4}}}}, true
	}
	return glyph{}, false
}

// unknown stands for characters that have no drawing.
func unknown() glyph {
	return glyph{3.4, [][]knot{{{0, 0}, {3.4, 0}, {3.4, 6}, {0, 6}, {0, 0}}}}
}
