package outline

import (
	"math"
	"testing"
)

// gear is an outline of n segments, lines and arcs, half of its corners concave.
func gear(n int) Outline {
	var o Outline
	teeth := n / 4
	r := float64(teeth) * 3 / math.Pi
	for i := range teeth {
		a := 2 * math.Pi * float64(i) / float64(teeth)
		w := 2 * math.Pi / float64(teeth)
		o = append(o,
			Vertex{Polar(r, a), math.Tan(w * 0.3 / 4)},
			Vertex{Polar(r, a+0.3*w), 0},
			Vertex{Polar(r+3, a+0.4*w), 0.3},
			Vertex{Polar(r+3, a+0.9*w), 0},
		)
	}
	return o
}

func BenchmarkOffset1000Segments(b *testing.B) {
	for _, c := range []struct {
		name string
		d    float64
	}{{"Out", 0.09}, {"In", -0.09}, {"OutClosingGaps", 1}} {
		b.Run(c.name, func(b *testing.B) {
			rs := []Region{{Outer: gear(1000)}}
			if err := rs[0].Validate(); err != nil {
				b.Fatal(err)
			}
			b.ReportAllocs()
			for b.Loop() {
				if len(Offset(rs, c.d)) != 1 {
					b.Fatal("not one region")
				}
			}
		})
	}
}

func BenchmarkOffsetPlateWithHoles(b *testing.B) {
	plate := Region{Outer: Hull(Disc{Point{0, 0}, 9}, Disc{Point{60, 0}, 9}, Disc{Point{20, 40}, 9})}
	for _, p := range []Point{{0, 0}, {60, 0}, {20, 40}} {
		plate.Holes = append(plate.Holes, CircleHole(p, 2.25))
	}
	b.ReportAllocs()
	for b.Loop() {
		Offset([]Region{plate}, 0.09)
	}
}

func BenchmarkUnionOf50Capsules(b *testing.B) {
	var rs []Region
	for i := range 50 {
		a := float64(i) * 2.4
		rs = append(rs, Region{Outer: Capsule(Polar(20, a), Polar(45, a+1), 3)})
	}
	b.ReportAllocs()
	for b.Loop() {
		Union(rs...)
	}
}

func BenchmarkDifferenceHoleFromPlate(b *testing.B) {
	plate := []Region{{Outer: Hull(Disc{Point{0, 0}, 9}, Disc{Point{60, 0}, 9}, Disc{Point{20, 40}, 9})}}
	hole := []Region{{Outer: Circle(Point{20, 15}, 5)}}
	b.ReportAllocs()
	for b.Loop() {
		Difference(plate, hole)
	}
}

func BenchmarkDistanceBetweenParts(b *testing.B) {
	part := Region{Outer: gear(100), Holes: []Outline{CircleHole(Point{}, 4)}}
	other := part.Transform(Place(0.3, false, Point{60, 7}))
	p, q := EdgesOf(part), EdgesOf(other)
	b.Run("Plain", func(b *testing.B) {
		b.ReportAllocs()
		for b.Loop() {
			Between(part, other)
		}
	})
	b.Run("Prepared", func(b *testing.B) {
		b.ReportAllocs()
		for b.Loop() {
			p.Between(q)
		}
	})
	b.Run("Far", func(b *testing.B) {
		far := EdgesOf(part.Transform(Place(0, false, Point{500, 0})))
		b.ReportAllocs()
		for b.Loop() {
			p.Closer(far, 2)
		}
	})
}

func BenchmarkFlatten1000Segments(b *testing.B) {
	o := gear(1000)
	b.ReportAllocs()
	for b.Loop() {
		Flatten(o, 0.01, Around)
	}
}

func BenchmarkHausdorff100Segments(b *testing.B) {
	o := gear(100)
	p := o.Transform(Place(0, false, Point{1e-4, 0}))
	b.ReportAllocs()
	for b.Loop() {
		HausdorffDistance(o, p)
	}
}
