package parts

import (
	"math"
	"testing"

	"pgregory.net/rapid"

	"pinwright/kerf"
	"pinwright/parts/job"
	"pinwright/parts/linkage"
	"pinwright/parts/mark"
	"pinwright/parts/material"
	"pinwright/parts/outline"
)

// holds checks a part against the linkage and the material, and that the beam gives it back.
func holds(t interface {
	Helper()
	Fatalf(string, ...any)
}, j job.Job, m *linkage.Mechanism, p Part,
) {
	t.Helper()
	if err := p.Region.Validate(); err != nil {
		t.Fatalf("%s: %v", p.Name, err)
	}
	if len(p.Holes) != len(p.Region.Holes) {
		t.Fatalf("%s: %d holes, %d in the region", p.Name, len(p.Holes), len(p.Region.Holes))
	}
	var stock job.Stock
	for _, s := range j.Stock {
		if s.Name == p.Stock {
			stock = s
		}
	}
	sheet, err := material.Lookup(stock.Material)
	if err != nil {
		t.Fatalf("%s: %v", p.Name, err)
	}
	web := sheet.Web(stock.Thickness).Refuse
	at := map[string]outline.Point{}
	for i, h := range p.Holes {
		shape := p.Region.Holes[i]
		if d := outline.OutlineDistance(p.Region.Outer, shape).Distance; d < web-1e-6 {
			t.Fatalf("%s: %s leaves %v mm to the edge, the web is %v", p.Name, h.Name, d, web)
		}
		for k := range i {
			if d := outline.OutlineDistance(p.Region.Holes[k], shape).Distance; d < web-1e-6 {
				t.Fatalf("%s: %v mm between %s and %s", p.Name, d, p.Holes[k].Name, h.Name)
			}
		}
		if h.Kind == PinHole {
			want := sheet.EdgeDistance(stock.Thickness, h.Diameter).Refuse
			if d := p.Region.Outer.Nearest(h.Centre).Distance; d < want-1e-6 {
				t.Fatalf("%s: the centre of %s is %v mm from the edge, refused is under %v", p.Name, h.Name, d, want)
			}
		}
		if h.Joint != "" && (h.Kind == PinHole || h.Kind == ShaftBore || h.Kind == BearingSeat || h.Kind == PenHole) {
			at[h.Joint] = h.Centre
		}
		if centre, r, round := shape.AsCircle(); h.Diameter > 0 && (!round || math.Abs(2*r-h.Diameter) > 1e-12 || centre.Dist(h.Centre) > 1e-9) {
			t.Fatalf("%s: %s is %v at %v", p.Name, h.Name, shape, h.Centre)
		}
		if h.Width > 0 && math.Abs(2*largestDisc(shape)-h.Width) > 0.01 && h.Kind != ShaftBore {
			t.Fatalf("%s: %s is %v wide, said to be %v", p.Name, h.Name, 2*largestDisc(shape), h.Width)
		}
	}
	for i, l := range j.Linkage.Links {
		if l.Name != p.Link {
			continue
		}
		frame := m.LinkFrame(l.Name)
		for a, pa := range l.Pins {
			for b, pb := range l.Pins[:a] {
				qa, okA := at[pa]
				qb, okB := at[pb]
				if okA && okB && math.Abs(qa.Dist(qb)-frame[a].Dist(frame[b])) > 1e-9 {
					t.Fatalf("%s: %s-%s is %v", j.Links[i].Name, pb, pa, qa.Dist(qb))
				}
			}
		}
	}
	if p.Mark.Text == "" || mark.Clearance(p.Region, p.Mark.Strokes) < markClear-1e-9 {
		t.Fatalf("%s: mark %q comes to %v mm from a cut", p.Name, p.Mark.Text, mark.Clearance(p.Region, p.Mark.Strokes))
	}
	names := make([]string, len(p.Holes))
	beam := kerf.Beam{Width: 0.2}
	cut, err := kerf.Compensate(p.Name, p.Region, names, beam)
	if err != nil {
		t.Fatalf("%v", err)
	}
	back, err := kerf.Finished(cut, beam)
	if err != nil {
		t.Fatalf("%s: %v", p.Name, err)
	}
	for i, o := range p.Region.Outlines() {
		// Sharp inside corners keep (1/sin(a/2) - 1) of the beam's radius: 0.0414 in a square one.
		limit := 1e-6
		if i > 0 && p.Holes[i-1].Diameter == 0 && p.Holes[i-1].Kind != Window && p.Holes[i-1].Kind != PivotSlot || i == 0 && kink(o) > 1 {
			limit = 0.0415
		}
		if d := outline.HausdorffDistance(o, back.Outlines()[i]); d > limit {
			t.Fatalf("%s: outline %d comes back from the beam %v mm away", p.Name, i, d)
		}
	}
}

// largestDisc is the radius of the largest disc in a hole, by moving it in.
func largestDisc(o outline.Outline) float64 {
	low, high := 0.0, 1000.0
	for high-low > 1e-3 {
		if middle := (low + high) / 2; len(outline.OffsetOutline(o, middle)) > 0 {
			low = middle
		} else {
			high = middle
		}
	}
	return low
}

// Whatever is asked for, it is either refused with words or made right.
func TestRandomParts(t *testing.T) {
	made := 0
	rapid.Check(t, func(t *rapid.T) {
		num := func(name string, low, high float64) float64 { return rapid.Float64Range(low, high).Draw(t, name) }
		yes := func(name string) bool { return rapid.Bool().Draw(t, name) }
		pick := func(name string, from ...string) string { return rapid.SampledFrom(from).Draw(t, name) }
		j := fourBar()
		scale := num("scale", 0.6, 2.5)
		for i := range j.Linkage.Links {
			for k := range j.Linkage.Links[i].Lengths {
				j.Linkage.Links[i].Lengths[k].MM *= scale
			}
		}
		for i := range j.Linkage.Joints {
			joint := &j.Linkage.Joints[i]
			if joint.Near != nil {
				*joint.Near = joint.Near.Scale(scale)
			} else {
				joint.Ground.At = joint.Ground.At.Scale(scale)
			}
		}
		if yes("framed") {
			framed(&j)
			j.Frame.Mount.At = []outline.Point{pt(num("mx", -20, 100), num("my", -60, -10))}
			j.Frame.Cross[0].At = pt(num("cx", 0, 80)*scale, num("cy", 20, 60))
			j.Frame.Cross[0].Angle = num("ca", -3, 3)
			j.Frame.Cross[0].Tabs = rapid.IntRange(1, 3).Draw(t, "tabs")
			if yes("adjustable") {
				at := j.Linkage.Joints[1].Ground.At
				j.Linkage.Joints[1].Ground.Range = &linkage.Range{From: at.Add(pt(-2, 0)), To: at.Add(pt(num("range", 0, 3), 1))}
			}
		}
		shapes := map[string][]string{
			"crank": {string(job.CrankArm), string(job.DiscForm), string(job.Bar)}, "coupler": {string(job.Plate), string(job.Spider)},
			"rocker": {string(job.Bar), string(job.Waisted), string(job.Bent)},
		}
		for i := range j.Links {
			l := &j.Links[i]
			l.Shape = job.Shape(pick("shape", shapes[l.Name]...))
			l.Stock = pick("stock", "clear3", "birch4", "steel2")
			if yes("wide") {
				l.Width = num("width", 10, 30)
			}
			if yes("fillet") {
				l.Fillet = num("fillet", 1, 15)
			}
			l.Windows = l.Name != "crank" && yes("windows")
			switch {
			case l.Shape == job.Waisted:
				l.Waist = num("waist", 3, 16)
			case l.Shape == job.Bent && yes("around"):
				l.Around = []outline.Disc{{Centre: pt(num("ox", 20, 40), num("oy", -8, 8)), Radius: num("or", 2, 8)}}
			case l.Shape == job.Bent:
				l.Bend = num("bend", -30, 30)
			}
		}
		if yes("foot") {
			link(&j, "coupler").Foot = &job.Foot{At: "P", Radius: num("toe", 4, 14), Pen: rapid.SampledFrom([]float64{0, 3, 5}).Draw(t, "pen")}
		}
		for i := range j.Pins {
			p := &j.Pins[i]
			p.Bolt = pick("bolt", "M2.5", "M3", "M4", "M5")
			if p.Joint == "B" && yes("bearing") {
				p.Kind, p.Bearing, p.Bolt, p.Fit, p.Seats = job.BearingPin, "623", "M3", "press", []string{"rocker"}
			}
		}
		if yes("bore") {
			bores := []job.Bore{
				{Joint: "O", Kind: job.DBore, Diameter: 6, Flat: 5.5},
				{Joint: "O", Kind: job.HexagonBore, Across: 7},
				{Joint: "O", Kind: job.HubBore, Diameter: 5, Bolts: 3, Circle: 16, Hole: 3.2},
			}
			link(&j, "crank").Bores = []job.Bore{rapid.SampledFrom(bores).Draw(t, "bore")}
		}
		link(&j, "crank").PhaseMark = yes("phase mark")
		j.Copies = []job.Copy{{Name: "left", Phase: num("phase", 0, 6)}, {Name: "right", Mirror: true}}
		m, err := linkage.New(j.Linkage)
		if err != nil {
			t.Skip(err)
		}
		all, err := Make(j, m, heights)
		if err != nil {
			for _, e := range err.(job.Errors) {
				if e.Message == "" {
					t.Fatalf("an error without words: %+v", e)
				}
			}
			return
		}
		made++
		for _, p := range all {
			holds(t, j, m, p)
		}
	})
	if made == 0 {
		t.Error("everything was refused")
	}
	t.Logf("%d jobs were made", made)
}
