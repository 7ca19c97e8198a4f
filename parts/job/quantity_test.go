package job

import (
	"fmt"
	"math"
	"strconv"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

func TestMeasure(t *testing.T) {
	for _, c := range []struct {
		text     string
		dim      dimension
		fallback string
		want     float64
	}{
		// The inch is 25.4 mm by definition (international yard and pound agreement, 1959).
		{"3mm", length, "", 3},
		{"0.25in", length, "", 6.35},
		{"1/4in", length, "", 6.35},
		{"1 1/4in", length, "", 31.75},
		{"-1 1/2in", length, "", -38.1},
		{"1.2cm", length, "", 12},
		{" 3 mm ", length, "", 3},
		{"3", length, "cm", 30},
		{"3mm", length, "in", 3},
		{"+.5", length, "in", 12.7},
		{"1e1mm", length, "", 10},
		{"1m", length, "", 1000},
		{"0", length, "", 0},
		{"-0.0", angle, "", 0},
		{"180deg", angle, "", math.Pi},
		{"90", angle, "deg", math.Pi / 2},
		{"0.26rad", angle, "deg", 0.26},
		{"0.5turn", angle, "", math.Pi},
		{"12.5", plain, "", 12.5},
	} {
		got, bare, bad := measure(c.text, c.dim, c.fallback)
		if bare || bad != nil || math.Abs(got-c.want) > 1e-15*math.Abs(c.want) {
			t.Errorf("%q is %v %v %v, want %v", c.text, got, bare, bad, c.want)
		}
	}
	for text, want := range map[string]string{
		"15deg": "is an angle, a length is wanted", "3 inches": "write 3in", "3'": "the units are mm", "1,5": "write 1.5",
		"0x10": "is not a number", "1_000": "is not a number", "--3": "is not a number", "": "is not a number", "mm": "is not a number",
		"1e400mm": "too large", "1e308m": "too large", "3mm4": "is not a number", "1/2/3in": "is not a number", "١": "is not a number",
	} {
		_, bare, bad := measure(text, length, "mm")
		if bare || bad == nil {
			t.Errorf("%q was taken", text)
			continue
		}
		if all := bad.message + "; " + bad.hint; !strings.Contains(all, want) {
			t.Errorf("%q: %s, want %s", text, all, want)
		}
	}
}

// Writing a length in any unit and reading it gives the length, to the last bits.
func TestUnitsProperty(t *testing.T) {
	perUnit := map[string]float64{"mm": 1, "cm": 10, "m": 1000, "in": 25.4, "rad": 1, "deg": math.Pi / 180, "turn": 2 * math.Pi}
	rapid.Check(t, func(t *rapid.T) {
		u := rapid.SampledFrom(unitTable).Draw(t, "unit")
		number := rapid.Float64Range(-1e6, 1e6).Draw(t, "number")
		text := strconv.FormatFloat(number, rapid.SampledFrom([]byte{'g', 'f', 'e'}).Draw(t, "form"), -1, 64)
		want := number * perUnit[u.name]
		got, bare, bad := measure(text+u.name, u.dim, "")
		if bad != nil || bare || math.Abs(got-want) > 1e-15*math.Abs(want)+1e-300 {
			t.Fatalf("%s%s is %v %v, want %v", text, u.name, got, bad, want)
		}
		again, bare, bad := measure(text, u.dim, u.name)
		if bad != nil || bare || again != got {
			t.Fatalf("%s with the unit stated once is %v %v, want %v", text, again, bad, got)
		}
		if number != 0 {
			if _, bare, bad := measure(text, u.dim, ""); !bare || bad != nil {
				t.Fatalf("%s without a unit was taken", text)
			}
		}
		other := length
		if u.dim == length {
			other = angle
		}
		if _, _, bad := measure(text+u.name, other, ""); bad == nil {
			t.Fatalf("%s%s was taken for the other kind", text, u.name)
		}
		whole, top, under := rapid.IntRange(0, 50).Draw(t, "whole"), rapid.IntRange(0, 64).Draw(t, "top"), rapid.IntRange(1, 64).Draw(t, "under")
		got, _, bad = measure(fmt.Sprintf("%d %d/%d%s", whole, top, under, u.name), u.dim, "")
		want = (float64(whole) + float64(top)/float64(under)) * perUnit[u.name]
		if bad != nil || math.Abs(got-want) > 1e-14*math.Abs(want) {
			t.Fatalf("%d %d/%d%s is %v %v, want %v", whole, top, under, u.name, got, bad, want)
		}
	})
}
