package outline

import (
	"errors"
	"math"
	"math/rand/v2"
	"testing"
)

// cases is how many random pairs of each kind the tests try. Many more were tried when it was written.
const cases = 300

// randomPiece returns a random simple shape. On the lattice, coordinates, radii and angles come from small
// sets, so that coincident edges, tangent circles and shared corners are frequent.
func randomPiece(r *rand.Rand, k kind) Region {
	lattice := k != general
	num := func(lo, hi int) float64 {
		if lattice {
			return float64(lo + r.IntN(hi-lo+1))
		}
		return float64(lo) + r.Float64()*float64(hi-lo)
	}
	angle := func() float64 {
		if lattice {
			return float64(r.IntN(16)) * math.Pi / 8
		}
		return r.Float64() * 2 * math.Pi
	}
	p := func() Point { return Point{num(0, 12), num(0, 12)} }
	var o Outline
	switch r.IntN(7) {
	case 0:
		o = Circle(p(), num(1, 4))
	case 1:
		a := p()
		o = Rectangle(a, a.Add(Point{num(1, 6), num(1, 6)}))
	case 2:
		o = Capsule(p(), p(), num(1, 2))
	case 3:
		from := angle()
		o = ArcSlot(p(), num(3, 5), from, from+0.5+angle()*0.7, 1)
	case 4:
		o = Hull(Disc{p(), num(0, 3)}, Disc{p(), num(0, 3)}, Disc{p(), num(0, 3)})
	case 5:
		c, rad := p(), num(3, 5)
		return Region{Outer: Circle(c, rad), Holes: []Outline{CircleHole(c, num(1, 2))}}
	case 6:
		// A rectangle with round bites and bumps for sides.
		a := p()
		o = Rectangle(a, a.Add(Point{num(3, 6), num(3, 6)}))
		for i := range o {
			o[i].Bulge = []float64{0, 0, 1, -0.25, 0.25, math.Sqrt2 - 1, 1 - math.Sqrt2}[r.IntN(7)]
		}
		if o.Validate() != nil {
			o = Rectangle(a, a.Add(Point{3, 3}))
		}
	}
	if o == nil {
		o = Circle(p(), num(1, 4))
	}
	reg := Region{Outer: o}
	if r.IntN(3) == 0 {
		c := p()
		t := Place(angle(), r.IntN(2) == 0, Point{})
		t.Move = c.Sub(t.Apply(c))
		reg = reg.Transform(t)
	}
	if k == nearLattice {
		// Off the lattice by something between rounding and visible, so that some contacts are within the
		// tolerance and some are not.
		e := math.Pow(10, -6-8*r.Float64())
		reg = reg.Transform(Place(e*(r.Float64()-0.5), false, Point{e * (r.Float64() - 0.5), e * (r.Float64() - 0.5)}))
	}
	return reg
}

// kind is how degenerate random shapes are.
type kind int

const (
	general kind = iota
	onLattice
	nearLattice
)

var kinds = []kind{general, onLattice, nearLattice}

// randomShape is a union or difference of several random pieces.
func randomShape(t testing.TB, r *rand.Rand, k kind) []Region {
	rs := []Region{randomPiece(r, k)}
	for range r.IntN(4) {
		n := []Region{randomPiece(r, k)}
		switch r.IntN(3) {
		case 0, 1:
			rs = Union(append(rs, n...)...)
		case 2:
			rs = Difference(rs, n)
		}
	}
	valid(t, "random shape", rs, k)
	return rs
}

// valid fails unless all regions are valid, but for touches in single points, and apart from each other.
//
// Near the lattice results can have gaps and slivers that are just wider than the tolerance at one end: there
// outlines may also run along each other.
func valid(t testing.TB, what string, rs []Region, k kind) {
	t.Helper()
	fine := func(err error) bool {
		var f *Fault
		return err == nil || Touching(err) || k == nearLattice && errors.As(err, &f) && f.Kind == FaultAlong
	}
	for i, r := range rs {
		if err := r.Validate(); !fine(err) {
			t.Fatalf("%s: region %d of %d: %v\n%v", what, i, len(rs), err, r)
		}
		for _, o := range r.Outlines() {
			for _, v := range o {
				if math.IsNaN(v.X) || math.IsNaN(v.Y) || math.IsNaN(v.Bulge) {
					t.Fatalf("%s: NaN in %v", what, o)
				}
			}
		}
	}
	var all []Outline
	for _, r := range rs {
		all = append(all, r.Outlines()...)
	}
	if f := contacts(all); f != nil && !fine(f) {
		t.Fatalf("%s: regions meet: %v\n%v", what, f, rs)
	}
}

func inAny(rs []Region, p Point) Location {
	at := Outside
	for _, r := range rs {
		if l := r.Locate(p); l > at || l == OnEdge {
			at = l
		}
		if at == OnEdge {
			return at
		}
	}
	return at
}

// margin is the distance from p to the nearest edge.
func margin(rs []Region, p Point) float64 {
	d := math.Inf(1)
	for _, r := range rs {
		for _, o := range r.Outlines() {
			d = min(d, o.Nearest(p).Distance)
		}
	}
	return d
}

func TestBooleansOnRandomShapes(t *testing.T) {
	for _, k := range kinds {
		for seed := range uint64(cases) {
			r := rand.New(rand.NewPCG(seed, 7))
			a, b := randomShape(t, r, k), randomShape(t, r, k)
			u := Union(append(append([]Region(nil), a...), b...)...)
			i := Intersection(a, b)
			d := Difference(a, b)
			x := SymmetricDifference(a, b)
			for _, c := range []struct {
				what string
				rs   []Region
			}{{"union", u}, {"intersection", i}, {"difference", d}, {"symmetric difference", x}} {
				valid(t, c.what, c.rs, k)
			}
			const tol = 1e-6 // contours of some 100 mm within the tolerance of 1e-9 mm, with a reserve
			bad := false
			check := func(what string, got, want float64) {
				if math.Abs(got-want) > tol {
					bad = true
					t.Errorf("kind %v seed %d: %s: %.12g, want %.12g", k, seed, what, got, want)
				}
			}
			check("area of union and intersection", Area(u)+Area(i), Area(a)+Area(b))
			check("area of difference", Area(d), Area(a)-Area(i))
			check("area of symmetric difference", Area(x), Area(u)-Area(i))
			for range 40 {
				p := Point{r.Float64()*20 - 4, r.Float64()*20 - 4}
				if margin(a, p) < 1e-6 || margin(b, p) < 1e-6 {
					continue
				}
				ia, ib := inAny(a, p) == Inside, inAny(b, p) == Inside
				for _, c := range []struct {
					what string
					rs   []Region
					want bool
				}{{"union", u, ia || ib}, {"intersection", i, ia && ib}, {"difference", d, ia && !ib}, {"symmetric difference", x, ia != ib}} {
					if got := inAny(c.rs, p) == Inside; got != c.want {
						bad = true
						t.Errorf("kind %v seed %d: %s at %v is %v, want %v", k, seed, c.what, p, got, c.want)
					}
				}
			}
			if bad {
				t.Fatalf("a = %#v\nb = %#v", a, b)
			}
		}
	}
}

func TestOffsetOnRandomShapes(t *testing.T) {
	for _, k := range kinds {
		for seed := range uint64(cases) {
			r := rand.New(rand.NewPCG(seed, 11))
			a := randomShape(t, r, k)
			d := r.Float64()*3 - 1.5
			if k != general {
				d = []float64{-2, -1.5, -1, -0.5, 0.5, 1, 1.5, 2}[r.IntN(8)]
			}
			o := Offset(a, d)
			// Off the lattice short arcs fix their directions badly, and a second try may have been needed.
			close := [...]float64{general: 1e-9, onLattice: 2e-9, nearLattice: 1e-6}[k]
			valid(t, "offset", o, k)
			// Every vertex and middle of the result is at exactly |d| from the original.
			for _, reg := range o {
				for _, ol := range reg.Outlines() {
					for _, s := range ol.Segments() {
						for _, f := range []float64{0, 0.5} {
							p := s.At(f)
							if m := margin(a, p); math.Abs(m-math.Abs(d)) > close {
								t.Fatalf("kind %v seed %d: offset %g: %v is %.12g from the outline\na = %#v", k, seed, d, p, m, a)
							}
						}
					}
				}
			}
			for range 40 {
				p := Point{r.Float64()*24 - 6, r.Float64()*24 - 6}
				m := margin(a, p)
				if math.Abs(m-math.Abs(d)) < 1e-6 {
					continue
				}
				in := inAny(a, p) == Inside
				want := in && (d > 0 || m > -d) || !in && d > 0 && m < d
				if got := inAny(o, p) == Inside; got != want {
					t.Fatalf("kind %v seed %d: offset %g at %v is %v, want %v\na = %#v\no = %#v", k, seed, d, p, got, want, a, o)
				}
			}
		}
	}
}
