package outline

import (
	"math"
	"math/rand/v2"
	"testing"

	"pgregory.net/rapid"
)

// shapeGen draws a random shape by its seed and kind: rapid shrinks towards small seeds and the general kind.
func shapeGen(t *rapid.T, label string) []Region {
	seed := rapid.Uint64Range(0, 1<<20).Draw(t, label)
	k := rapid.SampledFrom(kinds[:2]).Draw(t, label+" kind")
	r := rand.New(rand.NewPCG(seed, 4242))
	rs := []Region{randomPiece(r, k)}
	for range r.IntN(3) {
		rs = Union(append(rs, randomPiece(r, k))...)
	}
	return rs
}

func TestOffsetProperties(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		a := shapeGen(t, "shape")
		d := rapid.Float64Range(0.05, 2).Draw(t, "d")
		e := rapid.Float64Range(0.05, 2).Draw(t, "e")
		within := func(what string, small, large []Region) {
			if rest := Offset(Difference(small, large), -1e-6); len(rest) > 0 {
				t.Fatalf("%s: %g mm2 stick out: %v", what, Area(rest), rest)
			}
		}
		same := func(what string, x, y []Region) {
			within(what, x, y)
			within(what, y, x)
		}
		out := Offset(a, d)
		within("growing", a, out)
		within("shrinking", Offset(a, -d), a)
		within("growing more", out, Offset(a, d+e))
		// Growing twice is growing by the sum; and so for shrinking.
		same("growing in two steps", Offset(out, e), Offset(a, d+e))
		same("shrinking in two steps", Offset(Offset(a, -d), -e), Offset(a, -d-e))
		// Opening loses, closing gains, and both a second time change nothing.
		open, closed := RoundOutside(a, d), RoundInside(a, d)
		within("opening", open, a)
		within("closing", a, closed)
		same("opening twice", RoundOutside(open, d), open)
		same("closing twice", RoundInside(closed, d), closed)
		// Growing a union is the union of the grown.
		b := shapeGen(t, "other")
		same("union grown", Offset(Union(append(append([]Region(nil), a...), b...)...), d), Union(append(append([]Region(nil), out...), Offset(b, d)...)...))
	})
}

func TestBooleanProperties(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		a, b, c := shapeGen(t, "a"), shapeGen(t, "b"), shapeGen(t, "c")
		join := func(x, y []Region) []Region { return Union(append(append([]Region(nil), x...), y...)...) }
		same := func(what string, x, y []Region) {
			if rest := Offset(SymmetricDifference(x, y), -1e-6); len(rest) > 0 {
				t.Fatalf("%s: differ by %g mm2: %v", what, Area(rest), rest)
			}
		}
		same("union commutes", join(a, b), join(b, a))
		same("intersection commutes", Intersection(a, b), Intersection(b, a))
		same("union associates", join(join(a, b), c), join(a, join(b, c)))
		same("intersection distributes", Intersection(a, join(b, c)), join(Intersection(a, b), Intersection(a, c)))
		same("De Morgan", Difference(a, join(b, c)), Intersection(Difference(a, b), Difference(a, c)))
		same("union of itself", join(a, a), a)
		if rest := Difference(a, a); len(rest) > 0 {
			t.Fatalf("a less a is %v", rest)
		}
		// chi(A) + chi(B) = chi(A union B) + chi(A intersection B) for closed sets. Ours leave out what is common
		// without having an area (edges that touch), so only where nothing changes when either grows or shrinks a hair.
		u, i := join(a, b), Intersection(a, b)
		steady := true
		for _, e := range []float64{1e-4, -1e-4} {
			x := Offset(a, e)
			steady = steady && euler(x) == euler(a) && euler(join(x, b)) == euler(u) && euler(Intersection(x, b)) == euler(i)
			steady = steady && euler(Offset(b, e)) == euler(b)
		}
		if steady && euler(a)+euler(b) != euler(u)+euler(i) {
			t.Fatalf("Euler characteristics: %d + %d is not %d + %d", euler(a), euler(b), euler(u), euler(i))
		}
	})
}

// TestCanonical: the same set in another guise gives the same vertices.
func TestCanonical(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		a := shapeGen(t, "shape")
		shift := rapid.IntRange(0, 20).Draw(t, "shift")
		var other []Region
		for i := len(a) - 1; i >= 0; i-- {
			turn := func(o Outline) Outline {
				k := shift % len(o)
				return append(append(Outline(nil), o[k:]...), o[:k]...)
			}
			r := Region{Outer: turn(a[i].Outer)}
			for j := len(a[i].Holes) - 1; j >= 0; j-- {
				r.Holes = append(r.Holes, turn(a[i].Holes[j]))
			}
			other = append(other, r)
		}
		x, y := Union(a...), Union(other...)
		if len(x) != len(y) {
			t.Fatalf("%d and %d regions", len(x), len(y))
		}
		for i := range x {
			xs, ys := x[i].Outlines(), y[i].Outlines()
			if len(xs) != len(ys) {
				t.Fatalf("region %d: %d and %d outlines", i, len(xs), len(ys))
			}
			for j := range xs {
				if len(xs[j]) != len(ys[j]) {
					t.Fatalf("region %d, outline %d: %v and %v", i, j, xs[j], ys[j])
				}
				for k := range xs[j] {
					v, w := xs[j][k], ys[j][k]
					if v.Dist(w.Point) > 1e-9 || math.Abs(v.Bulge-w.Bulge) > 1e-9 {
						t.Fatalf("region %d, outline %d, vertex %d: %v and %v", i, j, k, v, w)
					}
				}
			}
		}
	})
}
