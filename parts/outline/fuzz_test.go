package outline

import (
	"encoding/binary"
	"math"
	"testing"
)

// outlineFrom makes an outline of bytes: any at all, also crossing itself. Two bytes a coordinate on a grid of a
// quarter millimetre and one for the bulge; a first byte of 255 asks for raw numbers, NaN and all.
func outlineFrom(data []byte) Outline {
	var o Outline
	if len(data) > 0 && data[0] == 255 {
		for data = data[1:]; len(data) >= 24 && len(o) < 40; data = data[24:] {
			f := func(i int) float64 { return math.Float64frombits(binary.LittleEndian.Uint64(data[8*i:])) }
			o = append(o, Vertex{Point{f(0), f(1)}, f(2)})
		}
		return o
	}
	bulges := [8]float64{0, 0, 1, -1, math.Sqrt2 - 1, 1 - math.Sqrt2, 0.1, -3}
	for ; len(data) >= 3 && len(o) < 40; data = data[3:] {
		o = append(o, Vertex{Point{float64(int8(data[0])) / 4, float64(int8(data[1])) / 4}, bulges[data[2]%8]})
	}
	return o
}

func fuzzSeeds(f *testing.F) {
	f.Add([]byte{}, []byte{}, 1.0)
	f.Add([]byte{0, 0, 0, 40, 0, 0, 40, 40, 0, 0, 40, 0}, []byte{20, 20, 2, 60, 20, 2}, 0.5)
	f.Add([]byte{0, 0, 2, 0, 40, 2}, []byte{0, 0, 2, 0, 40, 2}, -1.0)
	f.Add([]byte{0, 0, 0, 40, 40, 0, 40, 0, 0, 0, 40, 0}, []byte{0, 0, 7, 1, 0, 7}, -0.25)
	raw := []byte{255}
	for _, x := range []float64{0, 0, 1e-13, 1e6, 0, -1e-7, 5, 1e-9, 1e5, math.NaN(), 1, 0} {
		raw = binary.LittleEndian.AppendUint64(raw, math.Float64bits(x))
	}
	f.Add(raw, []byte{0, 0, 3, 40, 0, 5, 40, 40, 6}, 1e-9)
}

// sound fails unless the regions are made of usable numbers and run the right way round, holes inside.
func sound(t *testing.T, what string, rs []Region) {
	t.Helper()
	for _, r := range rs {
		for i, o := range r.Outlines() {
			if len(o) < 2 {
				t.Fatalf("%s: an outline of %d vertices", what, len(o))
			}
			for _, v := range o {
				if math.IsNaN(v.X+v.Y+v.Bulge) || math.IsInf(v.X+v.Y+v.Bulge, 0) {
					t.Fatalf("%s: %v is no number", what, v)
				}
			}
			if (o.Area() > 0) != (i == 0) {
				t.Fatalf("%s: outline %d has the area %g: %v", what, i, o.Area(), o)
			}
		}
		for _, h := range r.Holes {
			if !r.Bounds().Grow(1e-6).ContainsBox(h.Bounds()) {
				t.Fatalf("%s: a hole outside: %v", what, r)
			}
		}
	}
}

// ordinary says whether the outline is on the grid, so that contacts are either exact or plain.
func ordinary(data []byte) bool { return len(data) == 0 || data[0] != 255 }

func FuzzBoolean(f *testing.F) {
	fuzzSeeds(f)
	f.Fuzz(func(t *testing.T, x, y []byte, _ float64) {
		a, b := []Region{{Outer: outlineFrom(x)}}, []Region{{Outer: outlineFrom(y)}}
		u, i, d := Union(a[0], b[0]), Intersection(a, b), Difference(a, b)
		for _, rs := range [][]Region{u, i, d, SymmetricDifference(a, b)} {
			sound(t, "boolean", rs)
			if ordinary(x) && ordinary(y) {
				valid(t, "boolean", rs, nearLattice)
			}
		}
		if !ordinary(x) || !ordinary(y) {
			return
		}
		// Where outlines cross themselves, parts run backwards and take away from what they lie on: only of shapes
		// cleaned up by themselves do areas add up.
		a, b = Union(a[0]), Union(b[0])
		u, i, d = Union(append(append([]Region(nil), a...), b...)...), Intersection(a, b), Difference(a, b)
		for _, rs := range [][]Region{u, i, d} {
			valid(t, "boolean of clean shapes", rs, nearLattice)
		}
		if got, want := Area(u)+Area(i), Area(a)+Area(b); math.Abs(got-want) > 1e-5 {
			t.Fatalf("union and intersection %g, both %g", got, want)
		}
		if got, want := Area(d), Area(a)-Area(i); math.Abs(got-want) > 1e-5 {
			t.Fatalf("difference %g, want %g", got, want)
		}
	})
}

func FuzzOffset(f *testing.F) {
	fuzzSeeds(f)
	f.Fuzz(func(t *testing.T, x, _ []byte, d float64) {
		a := []Region{{Outer: outlineFrom(x)}}
		o := Offset(a, d)
		sound(t, "offset", o)
		if !ordinary(x) || !(math.Abs(d) < 50) || math.Abs(d) < 1e-6 {
			return
		}
		valid(t, "offset", o, nearLattice)
		a = Union(a[0])
		o = Offset(a, d)
		valid(t, "offset of a clean shape", o, nearLattice)
		for _, r := range o {
			for _, ol := range r.Outlines() {
				for _, s := range ol.Segments() {
					if m := margin(a, s.At(0.5)); math.Abs(m-math.Abs(d)) > 1e-6 {
						t.Fatalf("offset %g: %v is at %g\na = %#v", d, s.At(0.5), m, a)
					}
				}
			}
		}
	})
}

func FuzzMeasures(f *testing.F) {
	fuzzSeeds(f)
	f.Fuzz(func(t *testing.T, x, y []byte, d float64) {
		a, b := outlineFrom(x), outlineFrom(y)
		_ = a.Validate()
		_ = Region{Outer: a, Holes: []Outline{b}}.Validate()
		a.AsCircle()
		Flatten(a, d, Within)
		Flatten(a, d, Around)
		OutlineDistance(a, b)
		Between(Region{Outer: a}, Region{Outer: b})
		Thin(Region{Outer: a, Holes: []Outline{b}}, d)
		a.Moments()
		if c := a.Clean(); a.usable() && ordinary(x) && a.Validate() == nil {
			if math.Abs(c.Area()-a.Area()) > 1e-6 {
				t.Fatalf("cleaning changed the area from %g to %g", a.Area(), c.Area())
			}
			if h := HausdorffDistance(a, c); h > 1e-8 {
				t.Fatalf("cleaning moved the outline by %g", h)
			}
		}
	})
}
