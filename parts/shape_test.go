package parts

import (
	"math"
	"testing"

	"pinwright/parts/job"
	"pinwright/parts/outline"
)

// A bar between two M4 bolts, medium: holes of 4.5 mm (ISO 273), 2 d from the centre to the edge.
func TestBar(t *testing.T) {
	p := part(t, "rocker")
	near(t, "area", p.Region.Area(), 65*18+math.Pi*81-2*math.Pi*2.25*2.25, 1e-9)
	near(t, "mass", p.Mass(2.85, 1190), p.Region.Area()*2.85*1.190e-3, 1e-9)
	if len(p.Holes) != 2 || len(p.Region.Holes) != 2 {
		t.Fatalf("%d holes", len(p.Holes))
	}
	for i, want := range []Hole{{"D", PinHole, "D", pt(0, 0), 4.5, 4.5}, {"B", PinHole, "B", pt(65, 0), 4.5, 4.5}} {
		if p.Holes[i] != want {
			t.Errorf("hole %d is %+v, want %+v", i, p.Holes[i], want)
		}
		centre, radius, ok := p.Region.Holes[i].AsCircle()
		if !ok || centre.Dist(want.Centre) > 1e-12 || math.Abs(radius-2.25) > 1e-12 {
			t.Errorf("hole %d: %v %v %v", i, centre, radius, ok)
		}
		near(t, "edge", outline.OutlineDistance(p.Region.Outer, p.Region.Holes[i]).Distance, 6.75, 1e-9)
	}
	if p.Name != "rocker" || p.Link != "rocker" || p.Copy != "" || p.Stock != "clear3" || p.Plane != 3 || p.Mark.Text != "ROCKER" {
		t.Errorf("%+v", p)
	}
}

func TestBarOfGivenWidth(t *testing.T) {
	p := part(t, "rocker", func(j *job.Job) { link(j, "rocker").Width = 14 })
	near(t, "area", p.Region.Area(), 65*14+math.Pi*49-2*math.Pi*2.25*2.25, 1e-9)
}

// A bearing seat in a bar of given width gets a boss, with filleted corners.
func TestBarWithABoss(t *testing.T) {
	p := part(t, "rocker", func(j *job.Job) {
		link(j, "rocker").Width = 15
		link(j, "rocker").Fillet = 4
		*pin(j, "B") = job.Pin{Joint: "B", Kind: job.BearingPin, Bearing: "624", Bolt: "M4", Fit: "press", Seats: []string{"rocker"}, Washer: "normal"}
	})
	seat := p.Holes[1]
	// 624: 4 x 13 x 5 (ISO 15); N7 at 13 mm is -5 to -23 um (ISO 286-2), the middle -14.
	if seat.Kind != BearingSeat || math.Abs(seat.Diameter-12.986) > 1e-9 {
		t.Errorf("seat %+v", seat)
	}
	if k := kink(p.Region.Outer); k > 1e-6 {
		t.Errorf("the outline has a corner of %v rad", k)
	}
	// A third of the hole, at least 1.5 thicknesses: the rim rule of the material package.
	near(t, "rim", outline.OutlineDistance(p.Region.Outer, p.Region.Holes[1]).Distance, 4.5, 1e-9)
	near(t, "width", p.Region.Outer.Nearest(pt(30, 0)).Distance, 7.5, 1e-9)
	other := part(t, "coupler", func(j *job.Job) {
		*pin(j, "B") = job.Pin{Joint: "B", Kind: job.BearingPin, Bearing: "624", Bolt: "M4", Fit: "press", Seats: []string{"rocker"}, Washer: "normal"}
	})
	if h := other.Holes[1]; h.Kind != PinHole || h.Diameter != 4.3 { // ISO 273 fine
		t.Errorf("the bolt's hole in the other link is %+v", h)
	}
}

// Steiner's formula: the hull of equal discs has area A + P r + pi r^2.
func TestPlate(t *testing.T) {
	p := part(t, "coupler")
	a, b, c := 70.0, 45.0, 80.0
	s := (a + b + c) / 2
	area := math.Sqrt(s*(s-a)*(s-b)*(s-c)) + (a+b+c)*9 + math.Pi*81
	near(t, "area", p.Region.Area(), area-2*math.Pi*2.25*2.25, 1e-9)
	if len(p.Holes) != 2 {
		t.Errorf("P carries no pin, but there are %d holes", len(p.Holes))
	}
}

func TestFoot(t *testing.T) {
	p := part(t, "coupler", func(j *job.Job) { link(j, "coupler").Foot = &job.Foot{At: "P", Radius: 10, Pen: 5} })
	at := p.Holes[2].Centre
	if p.Holes[2].Kind != PenHole || p.Holes[2].Diameter != 5 {
		t.Fatalf("%+v", p.Holes[2])
	}
	near(t, "A-P", at.Len(), 80, 1e-9)
	near(t, "B-P", at.Dist(p.Holes[1].Centre), 45, 1e-9)
	near(t, "toe", p.Region.Outer.Nearest(at).Distance, 10, 1e-9)
	bare := part(t, "coupler", func(j *job.Job) { link(j, "coupler").Foot = &job.Foot{At: "P", Radius: 6} })
	if len(bare.Holes) != 2 {
		t.Errorf("%d holes", len(bare.Holes))
	}
	near(t, "toe", bare.Region.Outer.Nearest(at).Distance, 6, 1e-9)
}

func TestWaisted(t *testing.T) {
	for _, fillet := range []float64{0, 20} {
		p := part(t, "rocker", func(j *job.Job) {
			l := link(j, "rocker")
			l.Shape, l.Waist, l.Fillet = job.Waisted, 9, fillet
			pin(j, "B").Bolt = "M3"
		})
		if k := kink(p.Region.Outer); k > 1e-9 {
			t.Errorf("fillet %v: the outline has a corner of %v rad", fillet, k)
		}
		least := math.Inf(1)
		for x := 0.0; x < 65; x += 0.01 {
			least = math.Min(least, p.Region.Outer.Nearest(pt(x, 0)).Distance)
		}
		near(t, "half the waist", least, 4.5, 1e-5)
		near(t, "end at D", p.Region.Outer.Nearest(pt(0, 0)).Distance, 9, 1e-9)
		near(t, "end at B", p.Region.Outer.Nearest(pt(65, 0)).Distance, 6.8, 1e-9)
		if fillet > 0 {
			rounded := outline.RoundInside([]outline.Region{{Outer: p.Region.Outer}}, fillet-1e-6)
			near(t, "inside corners", outline.HausdorffDistance(rounded[0].Outer, p.Region.Outer), 0, 1e-6)
		}
	}
}

func TestBent(t *testing.T) {
	for _, bend := range []float64{12, -20, 40} {
		p := part(t, "rocker", func(j *job.Job) { link(j, "rocker").Shape, link(j, "rocker").Bend = job.Bent, bend })
		middle := pt(32.5, bend)
		near(t, "half the width at the bend", p.Region.Outer.Nearest(middle).Distance, 9, 1e-9)
		if p.Region.Locate(middle) != outline.Inside {
			t.Errorf("bend %v: the bar does not pass %v", bend, middle)
		}
		// An arc through both pins and the bend: length by the chord and the rise.
		radius := (32.5*32.5 + bend*bend) / (2 * math.Abs(bend))
		turn := 4 * math.Atan(math.Abs(bend)/32.5)
		near(t, "area", p.Region.Outer.Area(), radius*turn*18+math.Pi*81, 1e-6)
	}
}

func TestBentRoundObstacles(t *testing.T) {
	obstacles := []outline.Disc{{Centre: pt(25, 2), Radius: 6}, {Centre: pt(42, 6), Radius: 3}, {Centre: pt(30, 60), Radius: 8}}
	p := part(t, "rocker", func(j *job.Job) {
		link(j, "rocker").Shape, link(j, "rocker").Around = job.Bent, obstacles
		link(j, "rocker").Width = 14
	})
	solid := outline.Region{Outer: p.Region.Outer}
	for i, want := range []float64{passing, -1, -1} {
		gap := outline.Between(solid, outline.Region{Outer: outline.Circle(obstacles[i].Centre, obstacles[i].Radius)}).Distance
		if gap < passing-1e-9 {
			t.Errorf("obstacle %d: gap %v", i, gap)
		}
		if want > 0 {
			near(t, "gap", gap, want, 1e-6)
		}
	}
	// Both pass on the same side, the lower: the shorter one.
	if p.Region.Bounds().Min.Y > -12 {
		t.Errorf("bounds %v", p.Region.Bounds())
	}
	if k := kink(p.Region.Outer); k > 1e-6 {
		t.Errorf("the outline has a corner of %v rad", k)
	}
}

func TestSpider(t *testing.T) {
	for _, width := range []float64{0, 15} {
		p := part(t, "coupler", func(j *job.Job) {
			link(j, "coupler").Shape, link(j, "coupler").Fillet, link(j, "coupler").Width = job.Spider, 5, width
		})
		outer := []outline.Region{{Outer: p.Region.Outer}}
		near(t, "inside corners", outline.HausdorffDistance(outline.RoundInside(outer, 5-1e-6)[0].Outer, p.Region.Outer), 0, 1e-6)
		if d := outline.HausdorffDistance(outline.RoundInside(outer, 6)[0].Outer, p.Region.Outer); d < 0.05 {
			t.Errorf("fillets are larger than asked for: %v", d)
		}
		plate := part(t, "coupler")
		if p.Region.Area() >= plate.Region.Area() {
			t.Error("a spider is lighter than a plate")
		}
		for _, h := range p.Region.Holes {
			if d := outline.OutlineDistance(p.Region.Outer, h).Distance; d < 15.0/2-2.25-1e-9 {
				t.Errorf("%v mm to the edge", d)
			}
		}
	}
}

func TestDisc(t *testing.T) {
	p := part(t, "crank", func(j *job.Job) { link(j, "crank").Shape = job.DiscForm })
	centre, radius, ok := p.Region.Outer.AsCircle()
	if !ok || centre != pt(0, 0) || math.Abs(radius-34) > 1e-12 {
		t.Errorf("%v %v %v", centre, radius, ok)
	}
}

func TestBores(t *testing.T) {
	bored := func(b job.Bore) Part {
		b.Joint = "O"
		return part(t, "crank", func(j *job.Job) { link(j, "crank").Bores = []job.Bore{b} })
	}
	p := bored(job.Bore{Kind: job.DBore, Diameter: 6, Flat: 5.5})
	// Circle less its segment: r^2 (acos(h/r) - h/r sqrt(1-(h/r)^2)).
	half := math.Acos(2.5 / 3)
	near(t, "D", -p.Region.Holes[0].Area(), math.Pi*9-9*(half-math.Sin(2*half)/2), 1e-9)
	if box := p.Region.Holes[0].Bounds(); math.Abs(box.Width()-5.5) > 1e-9 || math.Abs(box.Max.X-2.5) > 1e-9 {
		t.Errorf("the flat is not at 2.5 to the right: %v", box)
	}
	p = bored(job.Bore{Kind: job.HexagonBore, Across: 7})
	near(t, "hexagon", -p.Region.Holes[0].Area(), math.Sqrt(3)/2*49, 1e-9)
	near(t, "across flats", 2*p.Region.Holes[0].Nearest(pt(0, 0)).Distance, 7, 1e-9)
	p = bored(job.Bore{Kind: job.RoundBore, Diameter: 8})
	if h := p.Holes[0]; h.Kind != ShaftBore || h.Diameter != 8 {
		t.Errorf("%+v", h)
	}
	p = bored(job.Bore{Kind: job.HubBore, Diameter: 6, Bolts: 4, Circle: 16, Hole: 3.2})
	if len(p.Holes) != 6 || p.Holes[0].Diameter != 6 || p.Holes[2].Name != "O bolt 2 of 4" || p.Holes[5].Name != "A" {
		t.Fatalf("%+v", p.Holes)
	}
	for i, want := range []outline.Point{pt(8, 0), pt(0, 8), pt(-8, 0), pt(0, -8)} {
		if at := p.Holes[1+i].Centre; at.Dist(want) > 1e-9 {
			t.Errorf("hub bolt %d at %v, want %v", i, at, want)
		}
	}
}

func TestWindows(t *testing.T) {
	p := part(t, "coupler", func(j *job.Job) { link(j, "coupler").Windows = true })
	n := 0
	for i, h := range p.Holes {
		if h.Kind != Window {
			continue
		}
		n++
		w := p.Region.Holes[i]
		if d := outline.OutlineDistance(w, p.Region.Outer).Distance; d < 6-1e-9 {
			t.Errorf("%s leaves a rim of %v mm", h.Name, d)
		}
		for m, other := range p.Holes {
			if other.Kind == PinHole {
				if d := p.Region.Holes[i].Nearest(other.Centre).Distance; d < 9-1e-9 {
					t.Errorf("%s comes to %v mm from the centre of %s", h.Name, d, p.Holes[m].Name)
				}
			}
		}
		open := []outline.Region{{Outer: w.Reverse()}}
		near(t, "corners", outline.HausdorffDistance(outline.RoundOutside(open, 2-1e-6)[0].Outer, open[0].Outer), 0, 1e-6)
		if -w.Area() < smallestWindow {
			t.Errorf("%s of %v mm2", h.Name, -w.Area())
		}
	}
	if n == 0 {
		t.Error("no windows")
	}
	if full := part(t, "coupler"); p.Region.Area() > 0.8*full.Region.Area() {
		t.Errorf("windows take %v of %v mm2 only", full.Region.Area()-p.Region.Area(), full.Region.Area())
	}
	wide := part(t, "coupler", func(j *job.Job) { link(j, "coupler").Windows, link(j, "coupler").Rim = true, 14 })
	for i, h := range wide.Holes {
		if h.Kind == Window {
			if d := outline.OutlineDistance(wide.Region.Holes[i], wide.Region.Outer).Distance; d < 14-1e-9 {
				t.Errorf("%s leaves a rim of %v mm", h.Name, d)
			}
		}
	}
}

// A pin within a plate stands in a window: ribs hold its material.
func TestWindowsRoundAMiddlePin(t *testing.T) {
	w := windows{rim: 5, corner: 2, joints: []outline.Disc{{Centre: pt(0, 0), Radius: 9}, {Centre: pt(40, 10), Radius: 9}}}
	cuts := w.cut(outline.Circle(pt(0, 0), 70), nil)
	region := outline.Region{Outer: outline.Circle(pt(0, 0), 70), Holes: cuts}
	if err := region.Validate(); err != nil || len(cuts) < 2 {
		t.Fatalf("%d windows, %v", len(cuts), err)
	}
	if thin := outline.ThinPlaces(region, 5-1e-6); len(thin) > 0 {
		t.Errorf("%v", thin)
	}
}
