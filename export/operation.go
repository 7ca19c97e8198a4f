package export

import "fmt"

// operations says how each operation is named and drawn.
var operations = [...]struct {
	name string
	look Look
}{
	Engrave:    {"engrave", Look{Colour: RGB{0x3f, 0xae, 0x9c}, Dash: []float64{0.6, 0.9}}},
	CutInside:  {"cut-inside", Look{Colour: RGB{0xb8, 0x5a, 0x0b}, Dash: []float64{2.4, 0.9}}},
	CutOutside: {"cut-outside", Look{Colour: RGB{0x14, 0x36, 0x70}}},
}

// Operations returns all operations in the order in which a sheet is worked.
func Operations() []Operation { return []Operation{Engrave, CutInside, CutOutside} }

// Valid tells whether o is one of the operations.
func (o Operation) Valid() bool { return o >= 0 && int(o) < len(operations) }

// String names the operation as the files do: "engrave", "cut-inside", "cut-outside".
func (o Operation) String() string {
	if !o.Valid() {
		return fmt.Sprintf("operation %d", int(o))
	}
	return operations[o].name
}

// RGB is a colour, red, green and blue of 0 to 255.
type RGB struct{ R, G, B uint8 }

// Hex returns the colour as "#rrggbb".
func (c RGB) Hex() string { return fmt.Sprintf("#%02x%02x%02x", c.R, c.G, c.B) }

// Look is how an operation is drawn.
type Look struct {
	Colour RGB
	Dash   []float64 // mm on, mm off; nil is a solid line
}

// Look returns how the operation is drawn in SVG, PDF and pictures: green-blue short dashes for
// engraving, orange-brown long dashes for inside cuts, a dark blue solid line for outside cuts. The
// three differ in lightness as well as in hue, and in their dashes where dashes are asked for, so
// that they are told apart without colour vision and on a grey print.
func (o Operation) Look() Look {
	if !o.Valid() {
		return Look{}
	}
	look := operations[o].look
	look.Dash = append([]float64(nil), look.Dash...)
	return look
}
