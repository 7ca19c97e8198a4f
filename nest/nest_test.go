package nest

import (
	"context"
	"math"
	"runtime"
	"slices"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"pinwright/parts/outline"
)

func pt(x, y float64) outline.Point { return outline.Point{X: x, Y: y} }

func region(o outline.Outline, holes ...outline.Outline) outline.Region {
	return outline.Region{Outer: o, Holes: holes}
}

// leg is the parts of a number of invented legs: bars of several lengths, plates, cranks.
func leg(copies int) []Item {
	bar := func(name string, length float64) Item {
		return Item{Name: name, Stock: "s", Quantity: copies, Shape: region(
			outline.Capsule(pt(0, 0), pt(length, 0), 6),
			outline.CircleHole(pt(0, 0), 2), outline.CircleHole(pt(length, 0), 2))}
	}
	plate := Item{Name: "plate", Stock: "s", Quantity: copies, Shape: region(outline.Hull(
		outline.Disc{Centre: pt(0, 0), Radius: 7}, outline.Disc{Centre: pt(60, 0), Radius: 7}, outline.Disc{Centre: pt(25, 40), Radius: 7}))}
	return []Item{bar("upper", 50), bar("lower", 62), bar("rocker", 40), bar("tie", 39), bar("crank", 15), plate}
}

// Rectangles that fill a sheet exactly, web and margin counted: 4 x 3 of 46 x 30 mm with 4 mm between
// and 5 mm round about take 4*46+3*4+2*5 = 206 by 3*30+2*4+2*5 = 108 mm.
func TestExactTiling(t *testing.T) {
	items := []Item{{Name: "tile", Stock: "s", Quantity: 12, Shape: region(outline.Rectangle(pt(0, 0), pt(46, 30))), Angles: []float64{0}}}
	stock := []Stock{{Name: "s", Width: 206, Height: 108, Quantity: 2, Margin: 5, Web: 4}}
	l, err := Nest(context.Background(), items, stock, Options{})
	if err != nil {
		t.Fatal(err)
	}
	if len(l.Sheets) != 1 || len(l.Left) != 0 {
		t.Errorf("%d sheets, %v left over", len(l.Sheets), l.Left)
	}
	stock[0].Width = 205.999
	l, err = Nest(context.Background(), items, stock, Options{})
	if err != nil {
		t.Fatal(err)
	}
	if len(l.Sheets) != 2 {
		t.Errorf("twelve tiles cannot lie on one sheet of 205.999 mm, got %d sheets", len(l.Sheets))
	}
}

// A small part finds room in the window of a large one that fills its sheet.
func TestWindowIsRoom(t *testing.T) {
	frame := Item{Name: "frame", Stock: "s", Quantity: 1, Shape: region(outline.Rectangle(pt(0, 0), pt(90, 90)), outline.Rectangle(pt(15, 15), pt(75, 75)).Reverse())}
	disc := Item{Name: "disc", Stock: "s", Quantity: 1, Shape: region(outline.Circle(pt(0, 0), 20))}
	stock := []Stock{{Name: "s", Width: 102, Height: 102, Quantity: 1, Margin: 5, Web: 2, Kerf: 0.2}}
	l, err := Nest(context.Background(), []Item{frame, disc}, stock, Options{})
	if err != nil {
		t.Fatal(err)
	}
	if len(l.Sheets) != 1 || len(l.Left) != 0 {
		t.Errorf("%d sheets, left %v", len(l.Sheets), l.Left)
	}
}

func TestLeftoversAreNamed(t *testing.T) {
	items := []Item{{Name: "square", Stock: "s", Quantity: 3, Shape: region(outline.Rectangle(pt(0, 0), pt(80, 80)))}}
	l, err := Nest(context.Background(), items, []Stock{{Name: "s", Width: 100, Height: 100, Quantity: 2, Margin: 5}}, Options{})
	if err != nil {
		t.Fatal(err)
	}
	if len(l.Sheets) != 2 || len(l.Left) != 1 || l.Left[0].Copies != 1 || l.Left[0].Sheets != 1 || !strings.Contains(l.Left[0].Why, "2 sheets of s (100 x 100 mm): add 1 sheet for") {
		t.Errorf("%d sheets, left %+v", len(l.Sheets), l.Left)
	}
}

func TestRefused(t *testing.T) {
	good := Item{Name: "p", Stock: "s", Quantity: 1, Shape: region(outline.Circle(pt(0, 0), 10))}
	sheet := Stock{Name: "s", Width: 100, Height: 100, Quantity: 1, Margin: 5, Web: 3, Kerf: 0.2}
	with := func(f func(*Item)) []Item {
		i := good
		f(&i)
		return []Item{i}
	}
	for _, c := range []struct {
		name  string
		items []Item
		stock []Stock
		want  string
	}{
		{"too large", with(func(i *Item) { i.Shape = region(outline.Circle(pt(0, 0), 60)) }), []Stock{sheet}, "needs 120.0 x 120.0 mm"},
		{"none", with(func(i *Item) { i.Quantity = 0 }), []Stock{sheet}, "quantity of 0"},
		{"other stock", with(func(i *Item) { i.Stock = "x" }), []Stock{sheet}, "no stock x"},
		{"no turn", with(func(i *Item) { i.Angles = []float64{} }), []Stock{sheet}, "no turn"},
		{"bad turn", with(func(i *Item) { i.Angles = []float64{math.NaN()} }), []Stock{sheet}, "not a number"},
		{"crossing", with(func(i *Item) { i.Shape = region(outline.Polygon(pt(0, 0), pt(10, 10), pt(10, 0), pt(0, 10))) }), []Stock{sheet}, "p:"},
		{"sheet twice", []Item{good}, []Stock{sheet, sheet}, "twice"},
		{"bad sheet", []Item{good}, []Stock{{Name: "s", Width: math.Inf(1), Height: 10, Quantity: 1}}, "stock s"},
		{"negative sheets", []Item{good}, []Stock{{Name: "s", Width: 100, Height: 100, Quantity: -1}}, "-1 sheets"},
	} {
		_, err := Nest(context.Background(), c.items, c.stock, Options{})
		if err == nil || !strings.Contains(err.Error(), c.want) {
			t.Errorf("%s: %v, want %q", c.name, err, c.want)
		}
	}
}

func TestVerifyFindsFaults(t *testing.T) {
	items := []Item{{Name: "p", Stock: "s", Quantity: 2, Shape: region(outline.Circle(pt(0, 0), 10)), Angles: []float64{0}}}
	stock := []Stock{{Name: "s", Width: 100, Height: 100, Quantity: 1, Margin: 5, Web: 3, Kerf: 0.2}}
	at := func(x1, x2 float64) Layout {
		return Layout{Sheets: []Sheet{{}}, Placements: []Placement{
			{Item: 0, Copy: 0, At: outline.Place(0, false, pt(x1, 50))},
			{Item: 0, Copy: 1, At: outline.Place(0, false, pt(x2, 50))},
		}}
	}
	if err := Verify(items, stock, at(20, 43.2)); err != nil {
		t.Errorf("distance of exactly 3.2 mm: %v", err)
	}
	for name, l := range map[string]Layout{
		"p (copy 1) and p (copy 2) on sheet 1 are 3.1999 mm apart, wanted are 3.2000 mm: 0.0001 mm too little": at(20, 43.1999),
		"p (copy 1) and p (copy 2) on sheet 1 overlap by 314.1593 mm2":                                         at(20, 20),
		"p (copy 1) on sheet 1 is 5.0000 mm from the edge, wanted are 5.1000 mm: 0.1000 mm too little":         at(15, 60),
	} {
		err := Verify(items, stock, l)
		if err == nil || !strings.Contains(err.Error(), name) {
			t.Errorf("%s: %v", name, err)
		}
	}
	turned := at(20, 60)
	turned.Placements[1].At = outline.Place(0.1, false, pt(60, 50))
	if err := Verify(items, stock, turned); err == nil {
		t.Error("a turn that is not allowed passes")
	}
	flipped := at(20, 60)
	flipped.Placements[1].At = outline.Place(0, true, pt(60, 50))
	if err := Verify(items, stock, flipped); err == nil {
		t.Error("a flip that is not allowed passes")
	}
}

// Random regions with holes: whatever is placed keeps its distances (Nest verifies exactly), everything
// is placed or named, and the turns are allowed ones.
func TestRandomRegions(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		f := func(lo, hi float64, name string) float64 { return rapid.Float64Range(lo, hi).Draw(t, name) }
		var items []Item
		for range rapid.IntRange(1, 6).Draw(t, "items") {
			discs := []outline.Disc{{Radius: f(3, 15, "r")}}
			for range rapid.IntRange(0, 3).Draw(t, "discs") {
				discs = append(discs, outline.Disc{Centre: pt(f(-40, 40, "x"), f(-40, 40, "y")), Radius: f(3, 15, "r")})
			}
			r := region(outline.Hull(discs...), outline.CircleHole(pt(0, 0), discs[0].Radius*0.6))
			it := Item{Name: "p", Stock: "s", Quantity: rapid.IntRange(1, 3).Draw(t, "n"), Shape: r}
			if rapid.Bool().Draw(t, "grain") {
				it.Angles = []float64{0, math.Pi}
			}
			items = append(items, it)
		}
		stock := []Stock{{
			Name: "s", Width: f(140, 400, "w"), Height: f(140, 400, "h"), Quantity: rapid.IntRange(1, 3).Draw(t, "sheets"),
			Margin: f(0, 8, "margin"), Web: f(0.5, 5, "web"), Kerf: f(0, 0.5, "kerf"),
		}}
		l, err := Nest(context.Background(), items, stock, Options{Effort: rapid.IntRange(0, 3).Draw(t, "effort")})
		if err != nil {
			t.Fatal(err)
		}
		count := len(l.Placements)
		for _, x := range l.Left {
			count += x.Copies
		}
		want := 0
		for _, it := range items {
			want += it.Quantity
		}
		if count != want {
			t.Fatalf("%d copies placed or named, %d asked for", count, want)
		}
		if len(l.Sheets) > stock[0].Quantity {
			t.Fatalf("%d sheets of %d", len(l.Sheets), stock[0].Quantity)
		}
	})
}

func TestSameLayoutOnAnyNumberOfCores(t *testing.T) {
	stock := []Stock{{Name: "s", Width: 300, Height: 200, Quantity: 5, Margin: 5, Web: 3, Kerf: 0.2}}
	var first Layout
	for i, procs := range []int{1, 2} {
		old := runtime.GOMAXPROCS(procs)
		l, err := Nest(context.Background(), leg(6), stock, Options{Effort: 3, Seed: 7})
		runtime.GOMAXPROCS(old)
		if err != nil {
			t.Fatal(err)
		}
		if i == 0 {
			first = l
			continue
		}
		if !slices.Equal(l.Placements, first.Placements) {
			t.Error("another layout with another number of cores")
		}
	}
}

func TestCancelled(t *testing.T) {
	ctx, cancel := context.WithCancel(context.Background())
	stock := []Stock{{Name: "s", Width: 300, Height: 200, Quantity: 5, Margin: 5, Web: 3}}
	l, err := Nest(ctx, leg(2), stock, Options{Effort: 50, Progress: func(p Progress) {
		if p.Done == 2 {
			cancel()
		}
	}})
	if err != nil || len(l.Placements) != 12 {
		t.Errorf("%d placements, %v: the best layout so far is wanted", len(l.Placements), err)
	}
	if _, err := Nest(ctx, leg(2), stock, Options{}); err == nil {
		t.Error("cancelled before the first layout, and no error")
	}
}

func TestMoreEffortIsNoWorse(t *testing.T) {
	stock := []Stock{{Name: "s", Width: 400, Height: 250, Quantity: 9, Margin: 5, Web: 3, Kerf: 0.2}}
	one, err := Nest(context.Background(), leg(12), stock, Options{Effort: 1})
	if err != nil {
		t.Fatal(err)
	}
	ten, err := Nest(context.Background(), leg(12), stock, Options{Effort: 10})
	if err != nil {
		t.Fatal(err)
	}
	if len(ten.Sheets) > len(one.Sheets) {
		t.Errorf("%d sheets with more effort, %d with less", len(ten.Sheets), len(one.Sheets))
	}
	if b := Bound(leg(12), stock)[0]; len(ten.Sheets) < b {
		t.Errorf("%d sheets, fewer than the bound %d", len(ten.Sheets), b)
	}
}

func BenchmarkLegParts(b *testing.B) {
	stock := []Stock{{Name: "s", Width: 600, Height: 400, Quantity: 9, Margin: 5, Web: 3, Kerf: 0.2}}
	items := leg(7)
	for b.Loop() {
		l, err := Nest(context.Background(), items, stock, Options{})
		if err != nil {
			b.Fatal(err)
		}
		b.ReportMetric(100*l.Sheets[0].Fill, "%fill")
	}
}

func Benchmark1000Parts(b *testing.B) {
	stock := []Stock{{Name: "s", Width: 600, Height: 400, Quantity: 99, Margin: 5, Web: 3, Kerf: 0.2}}
	items := leg(167) // 1,002 parts
	for b.Loop() {
		l, err := Nest(context.Background(), items, stock, Options{})
		if err != nil {
			b.Fatal(err)
		}
		fill := 0.0
		for _, s := range l.Sheets[:len(l.Sheets)-1] {
			fill += 100 * s.Fill / float64(len(l.Sheets)-1)
		}
		b.ReportMetric(float64(len(l.Sheets)), "sheets")
		b.ReportMetric(fill, "%fill")
	}
}
