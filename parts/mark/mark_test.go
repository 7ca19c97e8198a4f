package mark

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"pinwright/parts/outline"
)

const all = "ABCDEFGHIJKLMNOPQRSTUVWXYZ0123456789 -._+/:()°"

func TestEveryLetterFillsItsBox(t *testing.T) {
	for _, r := range all {
		strokes, width := Text(string(r), 6)
		if r == ' ' {
			if len(strokes) != 0 || width <= 0 {
				t.Errorf("blank: %d strokes, width %v", len(strokes), width)
			}
			continue
		}
		box := outline.EmptyBox()
		for _, p := range strokes {
			box = box.Union(p.Bounds())
		}
		if box.Min.X < -1e-3 || box.Max.X > width+1e-3 || box.Min.Y < -1e-3 || box.Max.Y > 6+1e-3 {
			t.Errorf("%c: strokes in %v, box is %v wide", r, box, width)
		}
		if box.Min.X > 0.25 || box.Max.X < width-0.25 {
			t.Errorf("%c: strokes from %v to %v do not use the width of %v", r, box.Min.X, box.Max.X, width)
		}
		if strings.ContainsRune("ABCDEFGHIJKLMNOPQRSTUVWXYZ0123456789/()", r) && (math.Abs(box.Min.Y) > 1e-3 || math.Abs(box.Max.Y-6) > 1e-3) {
			t.Errorf("%c: from %v to %v, capitals and digits fill the height", r, box.Min.Y, box.Max.Y)
		}
	}
}

// No two characters may look alike: somewhere each has ink that is far from any ink of the other.
func TestLettersDiffer(t *testing.T) {
	const far = 0.8 // of a height of 6
	away := func(a, b []outline.Path) float64 {
		worst := 0.0
		for _, p := range a {
			for _, s := range p.Segments() {
				for i := range 9 {
					q := s.At(float64(i) / 8)
					near := math.Inf(1)
					for _, o := range b {
						near = min(near, o.Nearest(q).Distance)
					}
					worst = max(worst, near)
				}
			}
		}
		return worst
	}
	runes := []rune(strings.ReplaceAll(all, " ", ""))
	for i, r := range runes {
		for _, q := range runes[:i] {
			a, _ := Text(string(r), 6)
			b, _ := Text(string(q), 6)
			if d := max(away(a, b), away(b, a)); d < far {
				t.Errorf("%c and %c differ by %.2f only", q, r, d)
			}
		}
	}
}

func TestTextScalesAndGrows(t *testing.T) {
	_, one := Text("LEFT-1 CRANK", 1)
	_, three := Text("left-1 crank", 3)
	if math.Abs(three-3*one) > 1e-12 {
		t.Errorf("width %v at height 3, %v at height 1", three, one)
	}
	if strokes, w := Text("", 3); strokes != nil || w != 0 {
		t.Errorf("empty text: %v, %v", strokes, w)
	}
	for _, h := range []float64{0, -1, math.NaN()} {
		if strokes, w := Text("A", h); strokes != nil || w != 0 {
			t.Errorf("height %v: %v, %v", h, strokes, w)
		}
	}
	if strokes, _ := Text("é", 3); len(strokes) != 1 || len(strokes[0]) != 5 {
		t.Errorf("a character without a drawing is a box, got %v", strokes)
	}
	if Knows("naïve") || !Knows("left-1 crank") {
		t.Error("Knows")
	}
}

func bar(length, width, hole float64) outline.Region {
	return outline.Region{
		Outer: outline.Capsule(outline.Point{}, outline.Point{X: length}, width/2),
		Holes: []outline.Outline{
			outline.CircleHole(outline.Point{}, hole/2),
			outline.CircleHole(outline.Point{X: length}, hole/2),
		},
	}
}

func TestFitOnABar(t *testing.T) {
	f, ok := Fit(bar(80, 18, 4.5), "LEFT-1 ROCKER", 4, 1.5, 1.5)
	if !ok || f.Height != 4 || len(f.Lines) != 1 || f.At.Angle() != 0 {
		t.Fatalf("%+v, %v", f, ok)
	}
	_, w := Text("LEFT-1 ROCKER", 4)
	if want := 40 - w/2; math.Abs(f.At.Move.X-want) > 1e-9 || math.Abs(f.At.Move.Y+2) > 1e-9 {
		t.Errorf("text at %v, want it centred at %v, -2", f.At.Move, want)
	}
	// A bar 6 mm wide leaves 3 mm between the clearances.
	f, ok = Fit(bar(80, 6, 3), "LEFT-1 ROCKER", 4, 1.5, 1.5)
	if !ok || f.Height > 3 || f.Height < 3/1.03 {
		t.Errorf("height %v, want just below 3", f.Height)
	}
	if _, ok = Fit(bar(80, 4, 2), "LEFT-1 ROCKER", 4, 1.5, 1.5); ok {
		t.Error("1 mm is not enough for letters of 1.5 mm")
	}
}

func TestFitBreaksAndTurns(t *testing.T) {
	// A short wide piece takes two lines, an upright one turns the text.
	f, ok := Fit(outline.Region{Outer: outline.Rectangle(outline.Point{}, outline.Point{X: 26, Y: 20})}, "RIGHT-2 COUPLER", 3, 2.5, 1)
	if !ok || len(f.Lines) != 2 || f.Lines[0] != "RIGHT-2" || f.Lines[1] != "COUPLER" {
		t.Errorf("%+v, %v", f, ok)
	}
	f, ok = Fit(outline.Region{Outer: outline.Rectangle(outline.Point{}, outline.Point{X: 10, Y: 60})}, "LEFT CRANK", 5, 2, 1)
	if !ok || math.Abs(f.At.Angle()-math.Pi/2) > 1e-9 {
		t.Errorf("%+v, %v", f, ok)
	}
}

func TestFitRefuses(t *testing.T) {
	r := bar(80, 18, 4.5)
	for _, c := range []struct{ want, least, clear float64 }{
		{0, 0, 1}, {1, 2, 1}, {3, 2, -1}, {math.NaN(), 1, 1}, {3, math.NaN(), 1}, {3, 1, math.NaN()}, {math.Inf(1), 1, 1},
	} {
		if _, ok := Fit(r, "A", c.want, c.least, c.clear); ok {
			t.Errorf("%+v fits", c)
		}
	}
	if _, ok := Fit(outline.Region{}, "A", 3, 2, 1); ok {
		t.Error("fits on nothing")
	}
	if _, ok := Fit(r, "", 3, 2, 1); ok {
		t.Error("nothing fits")
	}
}

// Whatever fits keeps its way, is of a size between the bounds, and is not mirrored.
func TestFitKeepsClear(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		num := func(name string, low, high float64) float64 { return rapid.Float64Range(low, high).Draw(t, name) }
		var discs []outline.Disc
		var holes []outline.Outline
		for i := range rapid.IntRange(2, 4).Draw(t, "discs") {
			c := outline.Point{X: float64(i) * 20, Y: num("y", -30, 30)}
			discs = append(discs, outline.Disc{Centre: c, Radius: num("r", 5, 12)})
			holes = append(holes, outline.CircleHole(c, num("hole", 1, 4)))
		}
		turn := outline.Place(num("turn", -4, 4), rapid.Bool().Draw(t, "mirror"), outline.Point{X: num("x", -50, 50)})
		r := outline.Region{Outer: outline.Hull(discs...), Holes: holes}.Transform(turn)
		clear, least := num("clear", 0.1, 3), num("least", 1, 2)
		f, ok := Fit(r, "LEFT-1 CRANK", 4, least, clear)
		if !ok {
			return
		}
		if f.Height > 4 || f.Height < least || f.At.Mirror {
			t.Fatalf("%+v", f)
		}
		if f.Clear < clear-1e-9 || Clearance(r, f.Strokes) != f.Clear {
			t.Fatalf("keeps %v of %v", f.Clear, clear)
		}
	})
}

func ExampleText() {
	strokes, width := Text("L1", 6)
	fmt.Println(len(strokes), "strokes,", width, "mm")
	for _, p := range strokes {
		for _, v := range p {
			fmt.Printf(" %v,%v", v.X, v.Y)
		}
		fmt.Println()
	}
	// Output:
	// 2 strokes, 6.6 mm
	//  0,6 0,0 3.2,0
	//  5,4.6 6.6,6 6.6,0
}

func ExampleFit() {
	plate := outline.Region{Outer: outline.Rectangle(outline.Point{}, outline.Point{X: 60, Y: 12})}
	f, ok := Fit(plate, "LEFT-1 CRANK", 4, 2, 1.5)
	fmt.Println(ok, f.Lines, f.Height, "mm high")
	// Output: true [LEFT-1 CRANK] 4 mm high
}

func BenchmarkFitOnABar(b *testing.B) {
	r := bar(80, 14, 4.5)
	for b.Loop() {
		if _, ok := Fit(r, "LEFT-1 ROCKER", 4, 1.5, 1.5); !ok {
			b.Fatal("does not fit")
		}
	}
}

func BenchmarkFitWhereNothingFits(b *testing.B) {
	r := bar(15, 14, 10)
	for b.Loop() {
		if _, ok := Fit(r, "LEFT-1 ROCKER", 4, 1.5, 1); ok {
			b.Fatal("fits")
		}
	}
}
