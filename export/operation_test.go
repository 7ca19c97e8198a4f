package export

import (
	"math"
	"testing"
)

// Contrast ratio as WCAG 2.1 defines it ("relative luminance", "contrast ratio" in its glossary).
func contrast(a, b RGB) float64 {
	l := func(c RGB) float64 {
		f := func(v uint8) float64 {
			s := float64(v) / 255
			if s <= 0.03928 {
				return s / 12.92
			}
			return math.Pow((s+0.055)/1.055, 2.4)
		}
		return 0.2126*f(c.R) + 0.7152*f(c.G) + 0.0722*f(c.B)
	}
	x, y := l(a), l(b)
	return (max(x, y) + 0.05) / (min(x, y) + 0.05)
}

func TestOperationsAreToldApartByLightness(t *testing.T) {
	ops := Operations()
	for i, a := range ops {
		if c := contrast(a.Look().Colour, RGB{255, 255, 255}); c < 2.5 {
			t.Errorf("%v against white paper: contrast %.2f", a, c)
		}
		for _, b := range ops[i+1:] {
			// 1.7 is our own floor: well past what a grey print loses.
			if c := contrast(a.Look().Colour, b.Look().Colour); c < 1.7 {
				t.Errorf("%v against %v: contrast %.2f", a, b, c)
			}
		}
	}
}

func TestOperationNames(t *testing.T) {
	for op, want := range map[Operation]string{
		Engrave: "engrave", CutInside: "cut-inside", CutOutside: "cut-outside", 7: "operation 7", -1: "operation -1",
	} {
		if got := op.String(); got != want {
			t.Errorf("%d: %q, want %q", int(op), got, want)
		}
	}
	if Operation(9).Valid() || Operation(9).Look().Dash != nil || Operation(-1).Valid() {
		t.Error("an unknown operation has a look")
	}
	Engrave.Look().Dash[0] = 99
	if Engrave.Look().Dash[0] == 99 {
		t.Error("a caller can change the palette")
	}
	if got := CutOutside.Look().Colour.Hex(); got != "#143670" {
		t.Errorf("hex %s", got)
	}
}
