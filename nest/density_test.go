package nest

import (
	"context"
	"encoding/json"
	"math"
	"os"
	"path/filepath"
	"testing"

	"pinwright/parts/outline"
)

// strip is a published irregular strip packing instance: pieces that are to lie in a strip of fixed
// width on as little length as can be. Source of the data in each file.
type strip struct {
	Name   string
	Width  float64
	Best   float64 `json:"best_density"` // published, %
	Pieces []struct {
		Quantity  int
		Rotations []float64 // deg
		Outline   [][2]float64
	}
}

// readStrip reads an instance of testdata.
func readStrip(tb testing.TB, name string) strip {
	b, err := os.ReadFile(filepath.Join("..", "testdata", "packing", name+".json"))
	if err != nil {
		tb.Fatal(err)
	}
	var s strip
	if err := json.Unmarshal(b, &s); err != nil {
		tb.Fatal(err)
	}
	return s
}

// sheet states a strip as one sheet of twice the length that the parts need, scaled to a width of 400 mm.
// With free set, every turn is allowed and not only the published ones.
func (s strip) sheet(free bool) (items []Item, stock []Stock, area float64) {
	scale := 400 / s.Width
	for _, p := range s.Pieces {
		pts := make([]outline.Point, len(p.Outline))
		for i, q := range p.Outline {
			pts[i] = pt(q[0]*scale, q[1]*scale)
		}
		o := outline.Polygon(pts...).Clean()
		if o.Area() < 0 {
			o = o.Reverse()
		}
		it := Item{Name: s.Name, Stock: "s", Quantity: p.Quantity, Shape: region(o)}
		if !free {
			for _, a := range p.Rotations {
				it.Angles = append(it.Angles, a*math.Pi/180)
			}
		}
		items = append(items, it)
		area += o.Area() * float64(p.Quantity)
	}
	return items, []Stock{{Name: "s", Height: 400, Width: math.Ceil(2*area/400 + 400), Quantity: 1}}, area
}

// used is the length of a strip that a layout uses, mm.
func used(items []Item, l Layout) (far float64) {
	for _, p := range l.Placements {
		far = math.Max(far, items[p.Item].Shape.Outer.Transform(p.At).Bounds().Max.X)
	}
	return far
}

// bars is many equal long bars.
func bars() ([]Item, []Stock) {
	return []Item{{Name: "bar", Stock: "s", Quantity: 80, Shape: region(outline.Capsule(pt(0, 0), pt(150, 0), 7))}},
		[]Stock{{Name: "s", Width: 900, Height: 600, Quantity: 2, Margin: 5, Web: 3, Kerf: 0.2}}
}

// packed is the area of the parts with half their web round them over that of the room of their sheets as far
// as they reach: what the layout is to blame for, web and margin left out.
func packed(items []Item, stock []Stock, l Layout) float64 {
	grown, room := 0.0, 0.0
	far := make([]float64, len(l.Sheets))
	for _, p := range l.Placements {
		k := stock[l.Sheets[p.Sheet].Stock]
		between, edge := k.clearance()
		r := items[p.Item].Shape
		r.Holes = nil
		grown += outline.Area(outline.Offset([]outline.Region{r}, between/2))
		box := r.Transform(p.At).Bounds()
		end := box.Max.X
		if k.Height > k.Width {
			end = box.Max.Y
		}
		far[p.Sheet] = math.Max(far[p.Sheet], end-edge+between)
	}
	for i, s := range l.Sheets {
		u, _, _ := stock[s.Stock].room()
		room += far[i] * u
	}
	return grown / room
}

var strips = []string{"ALBANO", "DAGLI", "FU", "JAKOBS1", "MAO", "SHAPES0", "SHIRTS", "SWIM"}

// BenchmarkStrips gives the density reached on published instances with their own rules, and what the
// best published one is (J. Gardeyn, G. Vanden Berghe, T. Wauters 2025, arXiv:2509.13329, table 3). Those
// are searched for many minutes.
func BenchmarkStrips(b *testing.B) {
	for _, name := range strips {
		s := readStrip(b, name)
		items, stock, area := s.sheet(false)
		for _, effort := range []int{1, 25} {
			b.Run(name+map[int]string{1: "/Quickest", 25: "/Effort25"}[effort], func(b *testing.B) {
				for b.Loop() {
					l, err := Nest(context.Background(), items, stock, Options{Effort: effort})
					if err != nil {
						b.Fatal(err)
					}
					b.ReportMetric(100*area/(400*used(items, l)), "%dense")
					b.ReportMetric(s.Best, "%published")
				}
			})
		}
	}
}
