package nest

import (
	"fmt"
	"math"
	"math/rand/v2"
	"slices"
	"testing"

	"pgregory.net/rapid"

	"pinwright/parts/outline"
)

func circleCut(part int, x, y, r float64) Cutting {
	return Cutting{Part: part, Closed: outline.Circle(pt(x, y), r)}
}

// nested draws rings in rings: a part, its window, a part in the window, and so on, each cut strictly
// inside the one before.
func nested(t *rapid.T) []Cutting {
	var work []Cutting
	for p := range rapid.IntRange(1, 6).Draw(t, "towers") {
		x := 100 * float64(p)
		for level := range rapid.IntRange(1, 5).Draw(t, "levels") {
			part := 10*p + level/2
			r := 40 - 8*float64(level)
			work = append(work, circleCut(part, x, 0, r))
			for range rapid.IntRange(0, 3).Draw(t, "holes") { // between this ring and the next
				a := rapid.Float64Range(0, 6).Draw(t, "angle")
				work = append(work, circleCut(part, x+(r-4)*math.Cos(a), (r-4)*math.Sin(a), 1))
			}
			if rapid.Bool().Draw(t, "mark") {
				work = append(work, Cutting{Part: part, Open: outline.Path{{Point: pt(x, 1)}, {Point: pt(x+1, 1)}}})
			}
		}
	}
	shuffle := rapid.Permutation(work).Draw(t, "order")
	return shuffle
}

// Every step once; engraving first; whatever lies inside a cut before that cut.
func TestOrderKeepsPrecedence(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		work := nested(t)
		order := Order(work)
		sorted := slices.Clone(order)
		slices.Sort(sorted)
		for i, k := range sorted {
			if i != k {
				t.Fatalf("not a permutation: %v", order)
			}
		}
		place := make([]int, len(work))
		for i, k := range order {
			place[k] = i
		}
		for i, a := range work {
			for k, b := range work {
				switch {
				case a.Closed == nil && b.Closed != nil && place[i] > place[k]:
					t.Fatalf("stroke %d after cut %d", i, k)
				case a.Closed != nil && b.Closed != nil && i != k:
					ca, ra, _ := a.Closed.AsCircle()
					cb, rb, _ := b.Closed.AsCircle()
					if ca.Dist(cb)+ra < rb && place[i] > place[k] {
						t.Fatalf("inner cut %d after outer %d", i, k)
					}
				}
			}
		}
	})
}

func TestOrderFinishesAPartBeforeTheNext(t *testing.T) {
	work := []Cutting{
		circleCut(0, 0, 0, 20), circleCut(0, -5, 0, 2), circleCut(0, 5, 0, 2),
		circleCut(1, 45, 0, 20), circleCut(1, 40, 0, 2), circleCut(1, 50, 0, 2),
	}
	var parts []int
	for _, i := range Order(work) {
		if p := work[i].Part; len(parts) == 0 || parts[len(parts)-1] != p {
			parts = append(parts, p)
		}
	}
	if len(parts) != 2 {
		t.Errorf("parts are worked in the order %v", parts)
	}
}

// The travel of the order against the shortest under the same rules, by exhaustive search over all orders
// of up to seven cuts: single cuts, parts with holes, parts in windows. No order can be shorter; local
// search reaches the shortest nearly always.
func TestTravelAgainstExhaustiveSearch(t *testing.T) {
	rng := rand.New(rand.NewPCG(1, 2))
	const cases = 150
	exact, excess := 0, 0.0
	for range cases {
		var work []Cutting
		places := rng.Perm(64)
		for part := 0; len(work) < 7; part++ {
			x, y := 100*float64(places[part]%8), 100*float64(places[part]/8)
			switch kind := rng.IntN(3); {
			case kind == 0 && len(work) <= 4: // a part with two holes
				work = append(work, circleCut(part, x, y, 30), circleCut(part, x-15, y, 3), circleCut(part, x+15, y+rng.Float64(), 3))
			case kind == 1 && len(work) <= 4: // a part in the window of another
				work = append(work, circleCut(part, x, y, 30), circleCut(part, x, y, 20), circleCut(part+100, x, y+1, 10))
			default:
				work = append(work, circleCut(part, x, y, 2))
			}
		}
		got := travel(work, Order(work))
		least := math.Inf(1)
		permute(len(work), func(order []int) {
			if d := travel(work, order); d < least && keepsRules(work, order) {
				least = d
			}
		})
		if order := Order(work); !keepsRules(work, order) {
			t.Fatalf("order %v of %v breaks the rules", order, work)
		}
		if got < least-1e-6 {
			t.Fatalf("travel %.3f is shorter than the shortest that keeps the rules, %.3f", got, least)
		}
		if got < least+1e-6 {
			exact++
		}
		excess += got/least - 1
	}
	t.Logf("%d of %d orders are the shortest, mean excess %.2f %%", exact, cases, 100*excess/cases)
	if exact < cases*8/10 || excess/cases > 0.02 {
		t.Errorf("%d of %d orders are the shortest, mean excess %.2f %%", exact, cases, 100*excess/cases)
	}
}

// keepsRules tells whether an order of circles works each part in one go, and the inner circles before
// the outer ones.
func keepsRules(work []Cutting, order []int) bool {
	ended := map[int]bool{}
	for n, i := range order {
		if n > 0 {
			if p := work[order[n-1]].Part; p != work[i].Part {
				ended[p] = true
			}
		}
		if ended[work[i].Part] {
			return false
		}
		ci, ri, _ := work[i].Closed.AsCircle()
		for _, k := range order[:n] {
			if ck, rk, _ := work[k].Closed.AsCircle(); ci.Dist(ck)+ri < rk {
				return false
			}
		}
	}
	return true
}

// A part of which one cut lies in another part's window and one around that part: no part can be worked in one go, and
// what lies inside still comes first.
func TestOrderOfPartsWithinEachOther(t *testing.T) {
	work := []Cutting{circleCut(0, 0, 0, 40), circleCut(1, 0, 0, 30), circleCut(0, 0, 0, 20), {Part: 2}}
	order := Order(work)
	if len(order) != 4 || slices.Index(order, 2) > slices.Index(order, 1) || slices.Index(order, 1) > slices.Index(order, 0) {
		t.Errorf("order %v", order)
	}
}

func travel(work []Cutting, order []int) float64 {
	at, sum := outline.Point{}, 0.0
	for _, i := range order {
		begin, end := ends(work[i])
		sum += at.Dist(begin)
		at = end
	}
	return sum
}

// Travel on a sheet full of parts, against the tour of the nearest neighbour that it starts from.
func BenchmarkOrderOfASheet(b *testing.B) {
	rng := rand.New(rand.NewPCG(3, 4))
	var work []Cutting
	for part := range 150 {
		x, y := 600*rng.Float64(), 400*rng.Float64()
		work = append(work, circleCut(part, x, y, 7), circleCut(part, x-3, y, 1), circleCut(part, x+3, y, 1))
		for s := range 20 {
			p := pt(x+0.1*float64(s), y)
			work = append(work, Cutting{Part: part, Open: outline.Path{{Point: p}, {Point: p.Add(pt(0, 0.1))}}})
		}
	}
	var first []int
	at := outline.Point{}
	for _, closed := range []bool{false, true} {
		var which []int
		for i, c := range work {
			if (c.Closed != nil) == closed {
				which = append(which, i)
			}
		}
		plain := units(work, which, nesting(work))
		for _, u := range plain.nearest(at) {
			first = append(first, plain.units[u]...)
		}
		_, at = ends(work[first[len(first)-1]])
	}
	for b.Loop() {
		b.ReportMetric(100*travel(work, Order(work))/travel(work, first), "%of-nearest")
	}
}

func permute(n int, visit func([]int)) {
	order := make([]int, n)
	for i := range order {
		order[i] = i
	}
	var rec func(k int)
	rec = func(k int) {
		if k == n {
			visit(order)
			return
		}
		for i := k; i < n; i++ {
			order[k], order[i] = order[i], order[k]
			rec(k + 1)
			order[k], order[i] = order[i], order[k]
		}
	}
	rec(0)
}

func ExampleOrder() {
	work := []Cutting{
		{Part: 0, Closed: outline.Circle(outline.Point{X: 20, Y: 20}, 15)},
		{Part: 0, Closed: outline.Circle(outline.Point{X: 20, Y: 20}, 2)},
		{Part: 0, Open: outline.Path{{Point: outline.Point{X: 20, Y: 25}}, {Point: outline.Point{X: 24, Y: 25}}}},
	}
	fmt.Println(Order(work))
	// Output: [2 1 0]
}
