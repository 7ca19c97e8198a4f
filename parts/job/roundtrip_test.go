package job

import (
	"fmt"
	"math"
	"reflect"
	"slices"
	"strconv"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"pinwright/parts/linkage"
	"pinwright/parts/outline"
)

// same compares all that a job says, places in the file left out.
func same(t interface{ Fatalf(string, ...any) }, got, want Job) {
	got.places, got.sources, want.places, want.sources = nil, nil, nil, nil
	if !reflect.DeepEqual(got, want) {
		t.Fatalf("got\n%+v\nwant\n%+v", got, want)
	}
}

// TestRoundTrip: a job written out with every key and read again is the same job, to the last bit.
func TestRoundTrip(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		want := drawJob(t)
		text := writeJob(want)
		got, err := Parse("drawn.yaml", []byte(text), nil)
		if err != nil {
			t.Fatalf("%v\n%s", err, text)
		}
		same(t, got, want)
	})
}

// mm draws a length of a tenth of a micrometre's grain.
func mm(t *rapid.T, low, high float64, label string) float64 {
	return math.Round(rapid.Float64Range(low, high).Draw(t, label)*1e4) / 1e4
}

func drawJob(t *rapid.T) Job {
	j := Job{Name: rapid.StringMatching(`[a-zA-Z0-9][a-zA-Z0-9-]{0,20}`).Draw(t, "job"), Title: "a drawn job: #1, 'quoted'"}
	for i := range rapid.IntRange(1, 3).Draw(t, "stocks") {
		thickness := mm(t, 0.5, 20, "thickness")
		j.Stock = append(j.Stock, Stock{
			Name: fmt.Sprintf("s%d", i), Material: "cast acrylic", Thickness: thickness,
			Measured: thickness + mm(t, -0.4, 0.4, "off"),
			Width:    mm(t, 500, 3000, "w"), Height: mm(t, 500, 3000, "h"), Quantity: rapid.IntRange(1, 99).Draw(t, "quantity"),
			Margin: mm(t, 0, 50, "margin"), Web: mm(t, 0, 20, "web"), Kerf: mm(t, 0.05, 1, "kerf"),
			ByShop: rapid.Bool().Draw(t, "shop"), Grain: rapid.SampledFrom([]Grain{NoGrain, HalfTurn, Quarter, Fixed}).Draw(t, "grain"),
			Price: mm(t, 0, 100, "price"),
		})
		if j.Stock[i].Measured <= 0 {
			j.Stock[i].Measured = thickness
		}
	}
	stock := func() string { return rapid.SampledFrom(stockNames(j.Stock)).Draw(t, "stock") }
	drawLinkage(t, &j)
	for i := range j.Links {
		j.Links[i].Stock = stock()
	}
	switch rapid.IntRange(0, 2).Draw(t, "spacers") {
	case 1:
		j.Spacers = Spacers{Stock: true, Lengths: []float64{5, 10, mm(t, 11, 90, "stock length")}}
	case 2:
		j.Spacers = Spacers{Tube: mm(t, 100, 6000, "tube"), Saw: mm(t, 0, 3, "saw")}
	}
	j.Spare = Spare{Percent: mm(t, 0, 100, "percent"), Least: rapid.IntRange(0, 9).Draw(t, "least")}
	for i := range rapid.IntRange(1, 4).Draw(t, "copies") {
		j.Copies = append(j.Copies, Copy{fmt.Sprintf("c%d", i), mm(t, -7, 7, "phase"), rapid.Bool().Draw(t, "mirror")})
	}
	if n := len(j.Copies); n > 1 && rapid.Bool().Draw(t, "body") {
		j.Body = &Body{Shafts: make([]outline.Point, n), Spacing: rapid.SampledFrom([]float64{0, 12.5}).Draw(t, "spacing")}
		for i := range n {
			j.Body.Order = append(j.Body.Order, n-1-i)
			j.Body.Shafts[i].X = mm(t, -99, 99, "x")
		}
	}
	if rapid.Bool().Draw(t, "frame") {
		f := &Frame{Stock: stock(), Width: mm(t, 1, 50, "rim"), Plates: []FramePlate{{Name: "back", Plane: -1, Pivots: []string{"O", "G"}}, {Name: "front", Plane: 90, Pivots: []string{"G"}}}}
		if rapid.Bool().Draw(t, "plates free") {
			f.Plates[0].Plane, f.Plates[0].PlaneFree = 0, true
			f.Plates[1].Plane, f.Plates[1].PlaneFree = 0, true
			f.Plates[1].InFrontOf = []string{"back", "link-0"}
		}
		f.Mount = &Mount{At: []outline.Point{{X: 1, Y: 2}, {X: mm(t, 5, 9, "x"), Y: -3}}, Bolt: "M5", Fit: "coarse"}
		if rapid.Bool().Draw(t, "mount by diameter") {
			f.Mount.Bolt, f.Mount.Fit, f.Mount.Diameter = "", "", mm(t, 1, 20, "diameter")
		}
		for range rapid.IntRange(0, 2).Draw(t, "cross") {
			f.Cross = append(f.Cross, CrossMember{outline.Point{X: mm(t, -99, 99, "x"), Y: 4}, mm(t, -3, 3, "angle"), mm(t, 10, 90, "width"), rapid.IntRange(1, 5).Draw(t, "tabs"), stock(), mm(t, -0.5, 0.5, "clearance")})
		}
		if rapid.Bool().Draw(t, "standoffs") {
			f.Standoffs = &Standoffs{At: []outline.Point{{X: mm(t, -99, 99, "x"), Y: 7}}, Bolt: "M3", Fit: "fine", Head: "button", Round: rapid.Bool().Draw(t, "round")}
		}
		j.Frame = f
	}
	return j
}

// drawLinkage makes a chain from pivot O over moving joints to pivot G, some links with a traced
// point of their own.
func drawLinkage(t *rapid.T, j *Job) {
	l := &j.Linkage
	l.Joints = []linkage.Joint{{Name: "O", Ground: &linkage.Ground{At: linkage.Point{X: mm(t, -99, -1, "x"), Y: mm(t, -99, 99, "y")}}}}
	g := linkage.Joint{Name: "G"}
	switch rapid.IntRange(0, 2).Draw(t, "pivot") {
	case 0:
		g.Ground = &linkage.Ground{At: linkage.Point{X: mm(t, 0, 99, "x"), Y: mm(t, -99, 99, "y")}}
	case 1:
		from := linkage.Point{X: mm(t, 0, 99, "x"), Y: mm(t, -99, 99, "y")}
		to := linkage.Point{X: from.X + 10, Y: from.Y + mm(t, -5, 5, "y")}
		g.Ground = &linkage.Ground{At: to, Range: &linkage.Range{From: from, To: to}}
	default:
		r := linkage.Range{Centre: linkage.Point{X: mm(t, 0, 99, "x"), Y: 5}, Radius: mm(t, 1, 99, "r"), Start: mm(t, -3, 0, "start"), End: mm(t, 0.1, 3, "end")}
		s, c := math.Sincos((r.Start + r.End) / 2)
		g.Ground = &linkage.Ground{At: linkage.Point{X: r.Centre.X + r.Radius*c, Y: r.Centre.Y + r.Radius*s}, Range: &r}
	}
	l.Joints = append(l.Joints, g)
	joint := func(name string) string {
		j := linkage.Joint{Name: name}
		if rapid.Bool().Draw(t, "near") {
			j.Near = &linkage.Point{X: mm(t, -99, 99, "x"), Y: mm(t, -99, 99, "y")}
		}
		l.Joints = append(l.Joints, j)
		return name
	}
	n := rapid.IntRange(2, 5).Draw(t, "links")
	last := "O"
	for i := range n {
		next := "G"
		if i < n-1 {
			next = joint(fmt.Sprintf("J%d", i))
		}
		link := linkage.Link{Name: fmt.Sprintf("link-%d", i), Pins: []string{last, next}, Lengths: []linkage.Length{{A: last, B: next, MM: mm(t, 30, 100, "length")}}}
		b := Link{
			Name: link.Name, Plane: i, Shape: Bar, Width: mm(t, 1, 40, "width"), Fillet: mm(t, 0, 9, "fillet"),
		}
		if i > 0 && rapid.Bool().Draw(t, "free") {
			b.Plane, b.PlaneFree = 0, true
			if i > 1 {
				b.SameAs = "link-0"
			}
			if rapid.Bool().Draw(t, "in front") {
				b.InFrontOf = []string{"link-0"}
			}
		}
		if i > 0 && i < n-1 && rapid.Bool().Draw(t, "foot") {
			toe := joint(fmt.Sprintf("T%d", i))
			link.Pins = append(link.Pins, toe)
			link.Lengths = append(link.Lengths, linkage.Length{A: next, B: toe, MM: mm(t, 110, 130, "length")}, linkage.Length{A: last, B: toe, MM: 120})
			l.Trace = append(l.Trace, toe)
			b.Shape = rapid.SampledFrom([]Shape{Plate, Spider}).Draw(t, "shape")
			b.Windows, b.Rim = true, mm(t, 1, 9, "rim")
			b.Foot = &Foot{toe, mm(t, 5, 20, "radius"), mm(t, 1, 9, "pen")}
		} else {
			b.Shape = rapid.SampledFrom([]Shape{Bar, Waisted, Bent, CrankArm, DiscForm}).Draw(t, "shape")
		}
		switch b.Shape {
		case Waisted:
			b.Waist = b.Width / 2
		case Bent:
			if rapid.Bool().Draw(t, "around") {
				b.Around = []outline.Disc{{Centre: outline.Point{X: 20, Y: mm(t, -5, 5, "y")}, Radius: mm(t, 1, 20, "r")}}
			} else {
				b.Bend = mm(t, 1, 40, "bend")
			}
		case CrankArm, DiscForm:
			b.PhaseMark = rapid.Bool().Draw(t, "mark")
		}
		switch rapid.IntRange(0, 4).Draw(t, "bore") {
		case 1:
			b.Bores = []Bore{{Joint: last, Kind: RoundBore, Diameter: mm(t, 10, 15, "d")}}
		case 2:
			d := mm(t, 10, 15, "d")
			b.Bores = []Bore{{Joint: last, Kind: DBore, Diameter: d, Flat: d * 0.9}, {Joint: next, Kind: HexagonBore, Across: mm(t, 10, 15, "across")}}
		case 3:
			b.Bores = []Bore{{Joint: next, Kind: HubBore, Diameter: 10, Bolts: 4, Circle: mm(t, 20, 30, "circle"), Hole: 3.4}}
		}
		l.Links = append(l.Links, link)
		j.Links = append(j.Links, b)
		j.Pins = append(j.Pins, Pin{})
		last = next
	}
	l.Drive = linkage.Drive{Link: "link-0", To: fullTurn, Full: true}
	if rapid.Bool().Draw(t, "swing") {
		l.Drive = linkage.Drive{Link: "link-0", From: mm(t, -3, 0, "from"), To: mm(t, 0.1, 3, "to")}
	}
	j.Pins = nil
	for _, joint := range l.Joints {
		var on []string
		for _, link := range l.Links {
			if slices.Contains(link.Pins, joint.Name) {
				on = append(on, link.Name)
			}
		}
		if joint.Ground != nil || len(on) > 1 {
			j.Pins = append(j.Pins, drawPin(t, joint.Name, on))
			// A round bore wider than a bolt's washer is refused: let a shaft go through it.
			for _, l := range j.Links {
				for _, b := range l.Bores {
					if p := &j.Pins[len(j.Pins)-1]; b.Joint == p.Joint && b.Kind == RoundBore && p.Kind != ShaftPin {
						*p = Pin{Joint: p.Joint, Kind: ShaftPin, Shaft: 8, Fit: "running", Washer: "normal"}
					}
				}
			}
		}
	}
}

func drawPin(t *rapid.T, joint string, on []string) Pin {
	p := Pin{Joint: joint, Washer: rapid.SampledFrom([]string{"normal", "small", "large", "none"}).Draw(t, "washer")}
	p.Kind = rapid.SampledFrom([]PinKind{BoltPin, BearingPin, ShaftPin, SleevePin, ClampPin, RodEndPin}).Draw(t, "kind")
	if p.Kind != ShaftPin {
		p.Head = rapid.SampledFrom([]string{"socket", "button", "hexagon"}).Draw(t, "head")
		p.Nut = rapid.SampledFrom([]string{"lock", "plain", "thin", "none"}).Draw(t, "nut")
		p.Excess = rapid.SampledFrom([]float64{0, 4.5, 20}).Draw(t, "excess")
	}
	if p.Kind != BearingPin && p.Kind != RodEndPin && rapid.Bool().Draw(t, "play") {
		p.Play = [2]float64{mm(t, 0, 0.3, "least play"), mm(t, 0.4, 2, "most play")}
	}
	if p.Nut == "none" && (p.Kind == SleevePin || p.Kind == ClampPin || p.Kind == RodEndPin) {
		p.Nut = "lock"
	}
	switch p.Kind {
	case SleevePin:
		p.Bolt, p.Sleeve, p.Seats = "M4", mm(t, 5, 8, "sleeve"), on[:1]
		p.Fit = rapid.SampledFrom(plainFits).Draw(t, "fit")
	case ClampPin:
		p.Bolt, p.Clamped, p.Fit = "M5", on[0], rapid.SampledFrom(metricFits).Draw(t, "fit")
	case RodEndPin:
		p.Bolt, p.Fit = "M5", rapid.SampledFrom(metricFits).Draw(t, "fit")
		p.RodEnd = rapid.SampledFrom([]Side{HeadSide, NutSide}).Draw(t, "side")
	case BoltPin:
		p.Bolt, p.Fit = "M4", rapid.SampledFrom(metricFits).Draw(t, "fit")
		if rapid.Bool().Draw(t, "inch") {
			p.Bolt, p.Fit = "#8", rapid.SampledFrom(inchFits).Draw(t, "fit")
		}
	case BearingPin:
		p.Bearing, p.Bolt, p.Seats = "624", "M4", on[:1]
		p.Fit = rapid.SampledFrom(append([]string{"H7", "N7"}, plainFits...)).Draw(t, "fit")
	default:
		p.Shaft, p.Fit = mm(t, 1, 10, "shaft"), rapid.SampledFrom(plainFits).Draw(t, "fit")
		p.Retain = rapid.SampledFrom([]Retainer{"", CollarRetainer, RingRetainer}).Draw(t, "retain")
	}
	if rapid.Bool().Draw(t, "explicit") {
		c := mm(t, -0.5, 0.5, "clearance")
		p.Clearance, p.Fit = &c, ""
	}
	return p
}

// writeJob writes a job with every key that its values need, in mm and rad.
func writeJob(j Job) string {
	var b strings.Builder
	line := func(format string, args ...any) { fmt.Fprintf(&b, format+"\n", args...) }
	mm := func(v float64) string { return strconv.FormatFloat(v, 'g', -1, 64) + "mm" }
	rad := func(v float64) string { return strconv.FormatFloat(v, 'g', -1, 64) + "rad" }
	at := func(p outline.Point) string { return "[" + mm(p.X) + ", " + mm(p.Y) + "]" }
	line("job: %s\ntitle: %q\nlinkage:\n  joints:", j.Name, j.Title)
	for _, joint := range j.Linkage.Joints {
		switch g := joint.Ground; {
		case g == nil && joint.Near == nil:
			line("    %s: {}", joint.Name)
		case g == nil:
			line("    %s: {near: %s}", joint.Name, at(*joint.Near))
		case g.Range == nil:
			line("    %s: {ground: %s}", joint.Name, at(g.At))
		case g.Range.Radius > 0:
			line("    %s: {ground: {centre: %s, radius: %s, from: %s, to: %s}}", joint.Name, at(g.Range.Centre), mm(g.Range.Radius), rad(g.Range.Start), rad(g.Range.End))
		default:
			line("    %s: {ground: {from: %s, to: %s, at: %s}}", joint.Name, at(g.Range.From), at(g.Range.To), at(g.At))
		}
	}
	line("  links:")
	for i, l := range j.Linkage.Links {
		k := j.Links[i]
		line("    %s:\n      pins: [%s]", l.Name, strings.Join(l.Pins, ", "))
		if !k.PlaneFree {
			line("      plane: %d", k.Plane)
		}
		if k.SameAs != "" {
			line("      same-plane-as: %s", k.SameAs)
		}
		if len(k.InFrontOf) > 0 {
			line("      in-front-of: %s", k.InFrontOf[0])
		}
		line("      shape: %s\n      stock: %s\n      width: %s\n      fillet: %s\n      lengths:", k.Shape, k.Stock, mm(k.Width), mm(k.Fillet))
		for _, s := range l.Lengths {
			line("        %s-%s: %s", s.A, s.B, mm(s.MM))
		}
		if d := j.Linkage.Drive; d.Link == l.Name && d.Full {
			line("      drive: full-turn")
		} else if d.Link == l.Name {
			line("      drive: {from: %s, to: %s}", rad(d.From), rad(d.To))
		}
		if k.Waist > 0 {
			line("      waist: %s", mm(k.Waist))
		}
		if k.Bend != 0 {
			line("      bend: %s", mm(k.Bend))
		}
		for _, a := range k.Around {
			line("      around: [{at: %s, radius: %s}]", at(a.Centre), mm(a.Radius))
		}
		if k.Foot != nil {
			line("      foot: {at: %s, radius: %s, pen: %s}", k.Foot.At, mm(k.Foot.Radius), mm(k.Foot.Pen))
		}
		line("      windows: %v\n      phase-mark: %v", k.Windows, k.PhaseMark)
		if k.Windows {
			line("      rim: %s", mm(k.Rim))
		}
		if len(k.Bores) > 0 {
			line("      bores:")
		}
		for _, o := range k.Bores {
			switch o.Kind {
			case RoundBore:
				line("        %s: {round: %s}", o.Joint, mm(o.Diameter))
			case DBore:
				line("        %s: {d: %s, flat: %s}", o.Joint, mm(o.Diameter), mm(o.Flat))
			case HexagonBore:
				line("        %s: {hexagon: %s}", o.Joint, mm(o.Across))
			case HubBore:
				line("        %s: {hub: {bolts: %d, circle: %s, hole: %s, centre: %s}}", o.Joint, o.Bolts, mm(o.Circle), mm(o.Hole), mm(o.Diameter))
			}
		}
	}
	if len(j.Linkage.Trace) > 0 {
		line("  trace: [%s]", strings.Join(j.Linkage.Trace, ", "))
	}
	if f := j.Frame; f != nil {
		line("frame:\n  stock: %s\n  width: %s\n  plates:", f.Stock, mm(f.Width))
		for _, p := range f.Plates {
			plane := fmt.Sprintf("plane: %d", p.Plane)
			if p.PlaneFree {
				plane = fmt.Sprintf("in-front-of: [%s]", strings.Join(p.InFrontOf, ", "))
			}
			if p.PlaneFree && len(p.InFrontOf) == 0 {
				line("    %s: {pivots: [%s]}", p.Name, strings.Join(p.Pivots, ", "))
				continue
			}
			line("    %s: {%s, pivots: [%s]}", p.Name, plane, strings.Join(p.Pivots, ", "))
		}
		if f.Mount.Bolt != "" {
			line("  mount: {holes: [%s, %s], bolt: %s, fit: %s}", at(f.Mount.At[0]), at(f.Mount.At[1]), f.Mount.Bolt, f.Mount.Fit)
		} else {
			line("  mount: {holes: [%s, %s], diameter: %s}", at(f.Mount.At[0]), at(f.Mount.At[1]), mm(f.Mount.Diameter))
		}
		if s := f.Standoffs; s != nil {
			kind := "hexagon"
			if s.Round {
				kind = "round"
			}
			line("  standoffs: {at: [%s], bolt: %s, fit: %s, head: %s, form: %s}", at(s.At[0]), s.Bolt, s.Fit, s.Head, kind)
		}
		if len(f.Cross) > 0 {
			line("  cross:")
		}
		for _, c := range f.Cross {
			line("    - {at: %s, angle: %s, width: %s, tabs: %d, stock: %s, clearance: %s}", at(c.At), rad(c.Angle), mm(c.Width), c.Tabs, c.Stock, mm(c.Clearance))
		}
	}
	line("copies:")
	for _, c := range j.Copies {
		line("  - {name: %s, phase: %s, mirror: %v}", c.Name, rad(c.Phase), c.Mirror)
	}
	if b := j.Body; b != nil {
		var order []string
		for _, i := range b.Order {
			order = append(order, j.Copies[i].Name)
		}
		line("body:\n  order: [%s]\n  shafts:", strings.Join(order, ", "))
		for i, c := range j.Copies {
			line("    %s: %s", c.Name, at(b.Shafts[i]))
		}
		if b.Spacing > 0 {
			line("  spacing: %s", mm(b.Spacing))
		}
	}
	line("pins:")
	for _, p := range j.Pins {
		line("  %s:\n    washer: %s", p.Joint, p.Washer)
		if p.Bolt != "" {
			line("    bolt: %q", p.Bolt)
		}
		if p.Bearing != "" {
			line("    bearing: %s\n    in: [%s]", p.Bearing, strings.Join(p.Seats, ", "))
		}
		if p.Sleeve > 0 {
			line("    sleeve: %s\n    in: [%s]", mm(p.Sleeve), strings.Join(p.Seats, ", "))
		}
		if p.Clamped != "" {
			line("    clamp: %s", p.Clamped)
		}
		if p.RodEnd != "" {
			line("    rod-end: %s", p.RodEnd)
		}
		if p.Retain != "" {
			line("    retain: %s", p.Retain)
		}
		if p.Play[1] > 0 {
			line("    play: [%s, %s]", mm(p.Play[0]), mm(p.Play[1]))
		}
		if p.Excess > 0 {
			line("    excess: %s", mm(p.Excess))
		}
		if p.Shaft > 0 {
			line("    shaft: %s", mm(p.Shaft))
		}
		if p.Fit != "" {
			line("    fit: %s", p.Fit)
		}
		if p.Clearance != nil {
			line("    clearance: %s", mm(*p.Clearance))
		}
		if p.Head != "" {
			line("    head: %s\n    nut: %s", p.Head, p.Nut)
		}
	}
	if s := j.Spacers; s.Stock {
		var all []string
		for _, l := range s.Lengths {
			all = append(all, mm(l))
		}
		line("spacers: {from: stock, lengths: [%s]}", strings.Join(all, ", "))
	} else if s.Tube > 0 {
		line("spacers: {from: tube, tube: %s, saw: %s}", mm(s.Tube), mm(s.Saw))
	}
	line("spare: {percent: %s, least: %d}", strings.TrimSuffix(mm(j.Spare.Percent), "mm"), j.Spare.Least)
	line("stock:")
	for _, s := range j.Stock {
		by := "pinwright"
		if s.ByShop {
			by = "shop"
		}
		line("  %s: {material: %s, thickness: %s, measured: %s, sheet: [%s, %s], quantity: %d, margin: %s, web: %s, kerf: %s, compensated-by: %s, grain: %s, price: %s}",
			s.Name, s.Material, mm(s.Thickness), mm(s.Measured), mm(s.Width), mm(s.Height), s.Quantity, mm(s.Margin), mm(s.Web), mm(s.Kerf), by, s.Grain, strings.TrimSuffix(mm(s.Price), "mm"))
	}
	return b.String()
}
