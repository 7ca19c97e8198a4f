package outline

import (
	"math"
	"math/rand/v2"
	"testing"
)

// Bundles of long thin triangles whose sides cross each other near one place at angles between rounding and
// visible: every crossing is badly determined, and which ones are within the tolerance differs from pair to
// pair. Away from the sides the answer must be right all the same.
func TestBundlesOfNearlyParallelLines(t *testing.T) {
	again := 0
	const seeds = 1000
	for seed := range uint64(seeds) {
		r := rand.New(rand.NewPCG(seed, 5))
		g := newArrangement(tolerance, 32)
		var rs []Region
		for range 3 + r.IntN(4) {
			e := math.Pow(10, -10+7*r.Float64())
			slope := (r.Float64() - 0.5) * e
			y := (r.Float64() - 0.5) * 4e-9
			x0, x1 := -20-10*r.Float64(), 20+10*r.Float64()
			o := Polygon(Point{x0, y + slope*x0}, Point{x1, y + slope*x1}, Point{x1, 10 + r.Float64()})
			g.add(o, 0)
			rs = append(rs, Region{Outer: o})
		}
		if _, ok := g.loops(func(w [2]int) bool { return w[0] >= 1 }); !ok {
			again++
		}
		u, i := Union(rs...), Intersection(rs[:1], rs[1:])
		valid(t, "union", u, nearLattice)
		valid(t, "intersection", i, nearLattice)
		for range 50 {
			p := Point{r.Float64()*60 - 30, r.Float64()*12 - 1}
			if r.IntN(2) == 0 {
				p.Y = (r.Float64() - 0.5) * math.Pow(10, -6*r.Float64())
			}
			if margin(rs, p) < 1e-7 {
				continue
			}
			if got, want := inAny(u, p), inAny(rs, p); got != want {
				t.Fatalf("seed %d: union at %v is %v, want %v", seed, p, got, want)
			}
			want := inAny(rs[:1], p) == Inside && inAny(rs[1:], p) == Inside
			if got := inAny(i, p) == Inside; got != want {
				t.Fatalf("seed %d: intersection at %v is %v, want %v", seed, p, got, want)
			}
		}
	}
	if again > seeds/100 {
		t.Errorf("%d of %d needed a second try", again, seeds)
	}
}
