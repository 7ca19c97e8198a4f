package parts

import (
	"math"
	"strings"
	"testing"

	"pinwright/parts/job"
	"pinwright/parts/linkage"
	"pinwright/parts/outline"
)

func framed(j *job.Job) {
	j.Frame = &job.Frame{
		Stock: "birch4",
		Plates: []job.FramePlate{
			{Name: "back", Plane: 0, Pivots: []string{"O", "D"}},
			{Name: "front", Plane: 5, Pivots: []string{"D"}},
		},
		Mount: &job.Mount{At: []outline.Point{pt(10, -40), pt(70, -40)}, Bolt: "M4", Fit: "medium"},
		Cross: []job.CrossMember{{At: pt(40, -20), Width: 40, Tabs: 2, Stock: "clear3", Clearance: 0.1, Angle: math.Pi / 6}},
	}
}

func TestFramePlate(t *testing.T) {
	p := part(t, "back", framed)
	var names []string
	for _, h := range p.Holes {
		names = append(names, h.Name)
	}
	if got := strings.Join(names, ", "); got != "O, D, mount 1, mount 2, cross-1 tab 1, cross-1 tab 2" {
		t.Errorf("holes %s", got)
	}
	near(t, "O-D", p.Holes[0].Centre.Dist(p.Holes[1].Centre), 80, 1e-12)
	for i, h := range p.Holes {
		d := outline.OutlineDistance(p.Region.Outer, p.Region.Holes[i]).Distance
		if h.Kind == PinHole && d < 9-2.25-1e-9 {
			t.Errorf("%s leaves %v mm", h.Name, d)
		}
		if d < 4-1e-9 {
			t.Errorf("%s leaves %v mm", h.Name, d)
		}
	}
	wide := part(t, "front", framed, func(j *job.Job) { j.Frame.Width = 11 })
	near(t, "rim", wide.Region.Outer.Nearest(pt(80, 0)).Distance, 13.25, 1e-9)
}

// The member goes between the facing plates, its tabs through them, and each tab has half the
// clearance on every side of its slot.
func TestCrossMember(t *testing.T) {
	all := make1(t, fourBar(framed))
	find := func(name string) Part {
		for _, p := range all {
			if p.Name == name {
				return p
			}
		}
		t.Fatalf("no %s", name)
		return Part{}
	}
	member, back, front := find("cross-1"), find("back"), find("front")
	box := member.Region.Bounds()
	near(t, "width", box.Width(), 40, 1e-12)
	// Planes 0 and 5: faces at 3.8 and 20; plates of 3.8 mm as measured.
	near(t, "height", box.Height(), 20-3.8+2*3.8, 1e-12)
	near(t, "area", member.Region.Area(), 40*16.2+4*8*3.8, 1e-9)
	for _, plate := range []Part{back, front} {
		n := 0
		for i, h := range plate.Holes {
			if h.Kind != TabSlot {
				continue
			}
			// The tab's cross section: 8 mm long at 40/5 from the end, 2.85 thick as measured.
			from := -20 + 8*float64(2*n+1)
			n++
			tab := outline.Rectangle(pt(from, -2.85/2), pt(from+8, 2.85/2)).Transform(outline.Place(math.Pi/6, false, pt(40, -20)))
			if d := outline.OutlineDistance(tab, plate.Region.Holes[i]).Distance; math.Abs(d-0.05) > 1e-9 {
				t.Errorf("%s: %s leaves %v mm beside the tab", plate.Name, h.Name, d)
			}
			near(t, "slot", -plate.Region.Holes[i].Area(), 8.1*2.95, 1e-9)
			near(t, "narrowest way", h.Width, 2.95, 1e-9)
		}
		if n != 2 {
			t.Errorf("%s has %d slots", plate.Name, n)
		}
	}
}

// Both plates have the clearance holes of the standoffs (M3 medium, ISO 273: 3.4 mm), and are drawn wide enough.
func TestStandoffHoles(t *testing.T) {
	for _, name := range []string{"back", "front"} {
		p := part(t, name, framed, func(j *job.Job) {
			j.Frame.Standoffs = &job.Standoffs{At: []outline.Point{pt(-60, -70), pt(140, -70)}, Bolt: "M3", Fit: "medium"}
		})
		n := 0
		for _, h := range p.Holes {
			if strings.HasPrefix(h.Name, "standoff") {
				n++
				near(t, h.Name, h.Diameter, 3.4, 1e-12)
				if h.Kind != BoltHole || p.Region.Locate(h.Centre.Add(pt(3, 0))) != outline.Inside {
					t.Errorf("%s: %+v", name, h)
				}
			}
		}
		if n != 2 {
			t.Errorf("%s has %d holes for standoffs", name, n)
		}
	}
}

// A plate between the outermost ones lets the member through.
func TestCrossMemberThroughAPlate(t *testing.T) {
	p := part(t, "middle", framed, func(j *job.Job) {
		j.Frame.Plates = append(j.Frame.Plates, job.FramePlate{Name: "far", Plane: 7}, job.FramePlate{Name: "middle", Plane: 2})
		j.Links[1].Plane = 4
	})
	for i, h := range p.Holes {
		if h.Kind == TabSlot {
			near(t, "slot", -p.Region.Holes[i].Area(), 40.1*2.95, 1e-9)
			return
		}
	}
	t.Error("there is no slot")
}

// A slot is the pin's hole swept along the range: every place of it has the hole's radius round it.
func TestAdjustablePivots(t *testing.T) {
	for _, r := range []linkage.Range{
		{From: pt(76, -4), To: pt(84, 4)},
		{Centre: pt(80, 30), Radius: 30, Start: -math.Pi/2 - 0.3, End: -math.Pi/2 + 0.3},
	} {
		p := part(t, "front", framed, func(j *job.Job) { j.Linkage.Joints[1].Ground.Range = &r })
		h := p.Holes[0]
		if h.Name != "D" || h.Kind != PivotSlot || h.Width != 4.5 {
			t.Fatalf("%+v", h)
		}
		for i := range 21 {
			at := r.Place(float64(i) / 20)
			near(t, "half the slot", p.Region.Holes[0].Nearest(at).Distance, 2.25, 1e-9)
			if d := p.Region.Outer.Nearest(at).Distance; d < 9-1e-9 {
				t.Errorf("at %v the edge is %v mm away", at, d)
			}
		}
		near(t, "area", -p.Region.Holes[0].Area(), r.Length()*4.5+math.Pi*2.25*2.25, 1e-9)
	}
}
