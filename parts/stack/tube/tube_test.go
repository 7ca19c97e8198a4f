package tube

import (
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

// checkPlan: all pieces are cut, none more, and every tube holds its pieces with a saw cut between each
// two and one more where something is left.
func checkPlan(t interface {
	Helper()
	Fatalf(string, ...any)
}, p Plan, length, saw float64, pieces []Piece,
) {
	t.Helper()
	want, got := map[int]int{}, map[int]int{}
	for _, x := range pieces {
		if x.Count > 0 {
			want[micro(x.Length)] += x.Count
		}
	}
	sumLeft, sumSaw := 0.0, 0.0
	for _, b := range p.Bars {
		used := 0.0
		for i, c := range b.Cuts {
			got[micro(c)]++
			used += c
			if i > 0 {
				used += saw
			}
		}
		if len(b.Cuts) == 0 || used > length+1e-9 {
			t.Fatalf("tube of %g with %v: %g", length, b.Cuts, used)
		}
		if left := max(0, length-used-saw); math.Abs(left-b.Left) > 1e-6 {
			t.Fatalf("tube of %g with %v: %g is left, not %g", length, b.Cuts, left, b.Left)
		}
		sumLeft += b.Left
		cut := 0.0
		for _, c := range b.Cuts {
			cut += c
		}
		sumSaw += length - cut - b.Left
	}
	if fmt.Sprint(want) != fmt.Sprint(got) {
		t.Fatalf("wanted %v, cut %v", want, got)
	}
	if math.Abs(sumLeft-p.Left) > 1e-6 || math.Abs(sumSaw-p.Saw) > 1e-6 {
		t.Fatalf("left %g, saw %g: %+v", sumLeft, sumSaw, p)
	}
	if p.Bound > len(p.Bars) || p.Best != (p.Best && len(p.Bars) >= p.Bound) {
		t.Fatalf("%+v", p)
	}
}

// fewest is the least number of tubes by trying every tube for every piece.
func fewest(length, saw float64, pieces []Piece) int {
	var all []int
	for _, p := range pieces {
		for range p.Count {
			all = append(all, micro(p.Length)+micro(saw))
		}
	}
	best := len(all)
	var room []int
	var place func(i int)
	place = func(i int) {
		if len(room) >= best {
			return
		}
		if i == len(all) {
			best = len(room)
			return
		}
		for k := range room {
			if room[k] >= all[i] {
				room[k] -= all[i]
				place(i + 1)
				room[k] += all[i]
			}
		}
		room = append(room, micro(length)+micro(saw)-all[i])
		place(i + 1)
		room = room[:len(room)-1]
	}
	place(0)
	return best
}

// Against exhaustive search: the plan is the best, and says so; the bound is no more than it.
func TestAgainstExhaustive(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		length := float64(rapid.IntRange(20, 100).Draw(t, "length"))
		saw := rapid.SampledFrom([]float64{0, 0.5, 1.5}).Draw(t, "saw")
		var pieces []Piece
		left := rapid.IntRange(0, 9).Draw(t, "pieces")
		for left > 0 {
			n := rapid.IntRange(1, left).Draw(t, "count")
			pieces = append(pieces, Piece{float64(rapid.IntRange(30, 10*int(length)).Draw(t, "tenths")) / 10, n})
			left -= n
		}
		p, err := Cut(length, saw, pieces)
		if err != nil {
			t.Fatal(err)
		}
		checkPlan(t, p, length, saw, pieces)
		if want := fewest(length, saw, pieces); len(p.Bars) != want || !p.Best || p.Bound > want {
			t.Fatalf("%d tubes (bound %d, best %v), exhaustive search finds %d", len(p.Bars), p.Bound, p.Best, want)
		}
	})
}

// Larger ones whose best is known because they were cut from whole tubes: n tubes, nothing left.
func TestCutFromWholeTubes(t *testing.T) {
	proven, all := 0, 0
	rapid.Check(t, func(t *rapid.T) {
		n := rapid.IntRange(1, 12).Draw(t, "tubes")
		var pieces []Piece
		for range n {
			left := 1000
			for left > 0 {
				l := min(left, 10*rapid.IntRange(5, 60).Draw(t, "piece"))
				if left-l < 50 {
					l = left
				}
				pieces = append(pieces, Piece{float64(l), 1})
				left -= l
			}
		}
		p, err := cut(1000, 0, pieces, 20_000)
		if err != nil {
			t.Fatal(err)
		}
		checkPlan(t, p, 1000, 0, pieces)
		all++
		if p.Best {
			proven++
			if len(p.Bars) != n {
				t.Fatalf("%d tubes said to be the best, and %d do", len(p.Bars), n)
			}
		}
		if p.Bound != n {
			t.Fatalf("bound %d, the pieces fill %d tubes", p.Bound, n)
		}
	})
	if proven*10 < all*9 {
		t.Errorf("%d of %d solved", proven, all)
	}
}

// Published instances. The paper mill: rolls of 5600 mm, thirteen widths, 73 rolls are the fewest (the
// example of the encyclopedias on the cutting stock problem; from memory).
func TestPublished(t *testing.T) {
	for _, c := range []struct {
		name   string
		length float64
		pieces []Piece
		want   int
	}{
		{"paper mill", 5600, []Piece{
			{1380, 22},
			{1520, 25},
			{1560, 12},
			{1710, 14},
			{1820, 18},
			{1880, 18},
			{1930, 20},
			{2000, 10},
			{2050, 12},
			{2100, 14},
			{2140, 16},
			{2150, 18},
			{2200, 20},
		}, 73},
		// 97 of 45, 610 of 36, 395 of 31, 211 of 14 from 100: 452.25 is the linear optimum, 453 rolls
		// (Chvatal, Linear Programming, 1983, chapter 13; from memory).
		{"Chvatal", 100, []Piece{{45, 97}, {36, 610}, {31, 395}, {14, 211}}, 453},
		// First-fit decreasing takes 6 + 4 + ... : 4 tubes of 12; three do: 6+6, 5+4+3, 5+4+3.
		{"first fit fails", 12, []Piece{{6, 2}, {5, 2}, {4, 2}, {3, 2}}, 3},
	} {
		p, err := Cut(c.length, 0, c.pieces)
		if err != nil {
			t.Fatal(err)
		}
		checkPlan(t, p, c.length, 0, c.pieces)
		if len(p.Bars) != c.want || !p.Best {
			t.Errorf("%s: %d tubes (bound %d, best %v), want %d", c.name, len(p.Bars), p.Bound, p.Best, c.want)
		}
	}
}

// The saw counts: four pieces of 250 mm are a tube of 1000 mm without saw cuts, and three with; 249 mm
// with three cuts of 1 mm are 999 mm, and the fourth cut takes the last millimetre.
func TestSaw(t *testing.T) {
	for _, c := range []struct {
		piece, saw   float64
		tubes        int
		left, sawing float64
	}{
		{250, 0, 1, 0, 0},
		{250, 1, 2, 1000 - 3*250 - 3 + 1000 - 250 - 1, 4},
		{249, 1, 1, 0, 4},
		{249.25, 1, 1, 0, 3},
	} {
		p, err := Cut(1000, c.saw, []Piece{{c.piece, 4}})
		if err != nil || len(p.Bars) != c.tubes || math.Abs(p.Left-c.left) > 1e-9 || math.Abs(p.Saw-c.sawing) > 1e-9 || !p.Best {
			t.Errorf("%+v: %+v (%v)", c, p, err)
		}
	}
}

func TestBadInput(t *testing.T) {
	for _, c := range []struct {
		length, saw float64
		pieces      []Piece
		want        string
	}{
		{1000, 1, []Piece{{1200, 1}}, "a piece of 1200 mm is longer than the tube of 1000 mm"},
		{0, 1, nil, "a tube of 0 mm"},
		{math.NaN(), 1, nil, "a tube of NaN mm"},
		{1000, -1, nil, "a saw cut of -1 mm"},
		{1000, 1, []Piece{{-5, 1}}, "a piece of -5 mm cannot be cut"},
		{1000, 1, []Piece{{5, -1}}, "-1 pieces of 5 mm"},
		{1000, 1, []Piece{{5, 9000}, {6, 9000}}, "more than 10000 pieces"},
	} {
		if _, err := Cut(c.length, c.saw, c.pieces); err == nil || !strings.Contains(err.Error(), c.want) {
			t.Errorf("%v, want %s", err, c.want)
		}
	}
	if p, err := Cut(1000, 1, []Piece{{5, 0}}); err != nil || len(p.Bars) != 0 || !p.Best {
		t.Errorf("nothing to cut: %+v %v", p, err)
	}
}

// When the steps run out the plan is sound, and not said to be the best.
func TestStepsRunOut(t *testing.T) {
	pieces := []Piece{{6, 2}, {5, 2}, {4, 2}, {3, 2}}
	p, err := cut(12, 0, pieces, 1)
	if err != nil {
		t.Fatal(err)
	}
	checkPlan(t, p, 12, 0, pieces)
	if p.Best || p.Bound != 3 || len(p.Bars) < 4 {
		t.Errorf("%+v", p)
	}
}

// The same pieces in another order give the same plan.
func TestOrderDoesNotMatter(t *testing.T) {
	pieces := []Piece{{12.7, 8}, {30.1, 5}, {8.4, 12}, {55, 3}}
	a, _ := Cut(300, 1.5, pieces)
	slices.Reverse(pieces)
	b, _ := Cut(300, 1.5, pieces)
	if fmt.Sprint(a) != fmt.Sprint(b) {
		t.Errorf("%v\n%v", a, b)
	}
}

func Example() {
	p, err := Cut(100, 1.5, []Piece{{38, 2}, {12.7, 4}, {30, 1}})
	if err != nil {
		fmt.Println(err)
		return
	}
	for _, b := range p.Bars {
		fmt.Printf("%v %.1f mm left\n", b.Cuts, b.Left)
	}
	fmt.Println("no fewer tubes:", p.Best)
	// Output:
	// [38 38 12.7] 6.8 mm left
	// [30 12.7 12.7 12.7] 25.9 mm left
	// no fewer tubes: true
}

func BenchmarkCutPaperMill(b *testing.B) {
	pieces := []Piece{
		{1380, 22},
		{1520, 25},
		{1560, 12},
		{1710, 14},
		{1820, 18},
		{1880, 18},
		{1930, 20},
		{2000, 10},
		{2050, 12},
		{2100, 14},
		{2140, 16},
		{2150, 18},
		{2200, 20},
	}
	for b.Loop() {
		if _, err := Cut(5600, 0, pieces); err != nil {
			b.Fatal(err)
		}
	}
}
