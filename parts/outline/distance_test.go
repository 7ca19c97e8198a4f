package outline

import (
	"math"
	"math/rand/v2"
	"testing"
)

// Two regions at the distance d just fail to meet when both grow by a little less than half of it, and meet when
// it is a little more. Offset and distance share no more than the segments.
func TestBetweenAgainstOffset(t *testing.T) {
	apart := 0
	for seed := range uint64(200) {
		r := rand.New(rand.NewPCG(seed, 21))
		k := kinds[seed%2]
		a, b := randomPiece(r, k), randomPiece(r, k)
		b = b.Transform(Place(0, false, Point{r.Float64() * 12, r.Float64() * 12}))
		n := Between(a, b)
		ea, eb := EdgesOf(a), EdgesOf(b)
		if m := ea.Between(eb); m != n {
			t.Fatalf("seed %d: prepared %v, plain %v", seed, m, n)
		}
		if m, ok := ea.Closer(eb, n.Distance); ok || m.Distance != n.Distance {
			t.Fatalf("seed %d: closer than itself: %v", seed, m)
		}
		if m, ok := ea.Closer(eb, n.Distance+1e-9); !ok || m != n {
			t.Fatalf("seed %d: %v, want %v", seed, m, n)
		}
		meet := func(d float64) bool {
			return len(Intersection(Offset([]Region{a}, d), Offset([]Region{b}, d))) > 0
		}
		if n.Distance == 0 {
			if !meet(1e-6) {
				t.Fatalf("seed %d: distance 0, but they do not meet", seed)
			}
			continue
		}
		apart++
		near(t, "length of the way", n.A.Dist(n.B), n.Distance, 1e-12)
		if a.Locate(n.A) != OnEdge || b.Locate(n.B) != OnEdge {
			t.Fatalf("seed %d: the way from %v to %v does not end on the edges", seed, n.A, n.B)
		}
		if e := 1e-6; meet(n.Distance/2-e) || !meet(n.Distance/2+e) {
			t.Fatalf("seed %d: distance %g, but grown shapes say otherwise\na = %v\nb = %v", seed, n.Distance, a, b)
		}
	}
	if apart < 50 {
		t.Errorf("only %d pairs were apart", apart)
	}
	if !math.IsInf(Between(Region{}, Region{Outer: square(0, 0, 1)}).Distance, 1) {
		t.Error("nothing is at a distance")
	}
}
