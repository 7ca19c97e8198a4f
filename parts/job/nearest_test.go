package job

import "testing"

func TestNearest(t *testing.T) {
	keys := linkForm.names()
	for word, want := range map[string]string{
		"lenght": "length", "widht": "width", "wdth": "width", "Plane": "plane", "phase_mark": "phase-mark", "phasemark": "phase-mark",
		"pin": "pins", "bore": "bores", "colour": "", "x": "", "length": "lengths",
	} {
		if got := nearest(word, keys); got != want {
			t.Errorf("nearest(%q) = %q, want %q", word, got, want)
		}
	}
	for _, c := range []struct {
		a, b string
		want int
	}{
		{"", "", 0}, {"abc", "", 3}, {"kitten", "sitting", 3}, {"ab", "ba", 1}, {"center", "centre", 1}, {"ca", "abc", 3}, // restricted: 3, not 2
	} {
		if got := editDistance([]rune(c.a), []rune(c.b)); got != c.want {
			t.Errorf("distance of %q and %q is %d, want %d", c.a, c.b, got, c.want)
		}
		if got := editDistance([]rune(c.b), []rune(c.a)); got != c.want {
			t.Errorf("distance of %q and %q is %d, want %d", c.b, c.a, got, c.want)
		}
	}
}
