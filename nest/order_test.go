package nest

import (
	"fmt"
	"math"
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
			work = append(work, circleCut(part, x, 0, 40-8*float64(level)))
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
					if ca == cb && ra < rb && place[i] > place[k] {
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

// The travel of the order against the shortest, by exhaustive search over all orders of a few holes. A
// nearest neighbour tour is no more than (ceil(log2 n) + 1)/2 times the shortest closed tour (D. J.
// Rosenkrantz, R. E. Stearns, P. M. Lewis, An analysis of several heuristics for the traveling salesman
// problem, SIAM J. Comput. 6, 1977).
func TestTravelWithinTheNearestNeighbourBound(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		n := rapid.IntRange(2, 6).Draw(t, "n")
		var work []Cutting
		for i := range n {
			work = append(work, circleCut(i, 10*float64(rapid.IntRange(0, 9).Draw(t, "x")), 10*float64(rapid.IntRange(0, 9).Draw(t, "y")), 1))
		}
		got := travel(work, Order(work))
		least := math.Inf(1)
		permute(n, func(order []int) { least = min(least, travel(work, order)) })
		bound := (math.Ceil(math.Log2(float64(n+1))) + 1) / 2 * 2 * least // a closed tour is at most twice an open one
		if got > bound+1e-9 {
			t.Fatalf("travel %.1f, shortest %.1f, bound %.1f", got, least, bound)
		}
	})
}

func travel(work []Cutting, order []int) float64 {
	at, sum := outline.Point{}, 0.0
	for _, i := range order {
		p := start(work[i])
		sum += at.Dist(p)
		at = p
	}
	return sum
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
