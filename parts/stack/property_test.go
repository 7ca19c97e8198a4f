package stack

import (
	"fmt"
	"math"
	"reflect"
	"slices"
	"testing"

	"pgregory.net/rapid"

	"pinwright/parts/hardware"
	"pinwright/parts/job"
	"pinwright/parts/outline"
)

// failer is what both kinds of test have.
type failer interface {
	Helper()
	Errorf(format string, args ...any)
}

// checkKits holds kits against what they must be, by other ways than they were made: from their
// elements, the levels and the catalogue.
func checkKits(t failer, j job.Job, kits []Kit, levels []Level) {
	t.Helper()
	for i := 1; i < len(levels); i++ {
		if a, b := levels[i-1], levels[i]; b.Plane != a.Plane+1 || b.From < a.To-1e-9 || b.To < b.From {
			t.Errorf("levels %+v and %+v", a, b)
		}
	}
	level := map[int]Level{}
	for _, l := range levels {
		level[l.Plane] = l
	}
	plane, thick := map[string]int{}, map[string]float64{}
	note := func(name, stock string, p int) {
		plane[name] = p
		s, _ := stockNamed(j, stock)
		thick[name] = s.Measured
	}
	for _, l := range j.Links {
		note(l.Name, l.Stock, l.Plane)
	}
	if j.Frame != nil {
		for _, p := range j.Frame.Plates {
			note(p.Name, j.Frame.Stock, p.Plane)
		}
	}
	for _, k := range kits {
		checkRoom(t, k, levels, plane)
		z := math.Inf(-1)
		for _, e := range k.Elements {
			if math.Abs(e.To-e.From-e.Thickness) > 1e-8 || e.Thickness < 0 {
				t.Errorf("%s: %+v is not as thick as it is high", k.Joint, e)
			}
			switch e.Kind {
			case PartElement:
				l := level[plane[e.Part]]
				if math.Abs(e.From-l.From) > 1e-8 || e.To > l.To+1e-8 || math.Abs(e.Thickness-thick[e.Part]) > 1e-9 {
					t.Errorf("%s: %+v does not lie on %+v", k.Joint, e, l)
				}
			case BearingElement, SleeveElement: // it lies in its part
				z = e.To
				continue
			}
			if e.From < z-1e-8 {
				t.Errorf("%s: %+v begins under %g", k.Joint, e, z)
			}
			if e.Kind != PartElement || !slices.Contains(k.Pin.Seats, e.Part) {
				z = e.To
			}
		}
		if k.Pin.Kind == job.ShaftPin || k.Through.Length == 0 {
			continue
		}
		checkBolt(t, k)
	}
}

// checkRoom: where the plane above or below a pin is empty, its end keeps off the part beyond.
func checkRoom(t failer, k Kit, levels []Level, plane map[string]int) {
	t.Helper()
	var on []int
	low, up := math.Inf(1), k.Through.To
	for _, e := range k.Elements {
		low, up = min(low, e.From), max(up, e.To)
		if e.Kind == PartElement {
			on = append(on, plane[e.Part])
		}
	}
	for i, l := range levels {
		beyond := i + 1
		if l.Plane == slices.Max(on) && beyond < len(levels) && levels[beyond].Empty {
			for levels[beyond].Empty {
				beyond++
			}
			if levels[beyond].From-up < RunningGap-1e-8 {
				t.Errorf("%s: its upper end at %g, the next part at %g", k.Joint, up, levels[beyond].From)
			}
		}
		before := i - 1
		if l.Plane == slices.Min(on) && before >= 0 && levels[before].Empty {
			for levels[before].Empty {
				before--
			}
			if low-levels[before].To < RunningGap-1e-8 {
				t.Errorf("%s: its lower end at %g, the part below ends at %g", k.Joint, low, levels[before].To)
			}
		}
	}
}

// checkBolt: the shortest screw of the length on the thickest stack shows a pitch past the nut, and on
// the thinnest the nut stays on the thread.
func checkBolt(t failer, k Kit) {
	t.Helper()
	head := hardware.Head(k.Pin.Head)
	s, err := hardware.ScrewFor(head, k.Pin.Bolt)
	if err != nil {
		t.Errorf("%s: %v", k.Joint, err)
		return
	}
	if shanked, err := s.Shanked(); err == nil && k.Through.Designation == shanked.Designation(k.Through.Length) {
		s = shanked
	}
	if k.Through.Designation != s.Designation(k.Through.Length) || !slices.Contains(s.Lengths(), k.Through.Length) {
		t.Errorf("%s: %+v", k.Joint, k.Through)
	}
	shortest, _ := hardware.LengthLimits(k.Through.Length)
	nut := 0.0
	pitch := 0.0
	if k.Pin.Nut != "none" {
		n, err := hardware.NutFor(hardware.NutKind(k.Pin.Nut), k.Pin.Bolt)
		if err != nil {
			t.Errorf("%s: %v", k.Joint, err)
			return
		}
		nut, pitch = n.Height, n.Pitch
	}
	// The greatest stack from the elements: sheets may be 0.1 mm off their measure, washers as their
	// table says, spacers 0.1; bearings are never wider. Not measured sheets are checked by the budget.
	if k.Budget.Most+nut+pitch > shortest+1e-9 {
		t.Errorf("%s: %s may be %g mm long; stack %g, nut %g, pitch %g", k.Joint, k.Through.Designation, shortest, k.Budget.Most, nut, pitch)
	}
	if k.Pin.Nut != "none" && s.Grip(k.Through.Length) > k.Budget.Least+1e-9 {
		t.Errorf("%s: the nut of %s stops on the shank: %g, stack %g", k.Joint, k.Through.Designation, s.Grip(k.Through.Length), k.Budget.Least)
	}
	sum, firstNut := 0.0, math.Inf(1)
	for i, e := range k.Elements {
		switch e.Kind {
		case PartElement:
			if !slices.Contains(k.Pin.Seats, e.Part) {
				sum += e.Thickness
			}
		case WasherElement, SpacerElement, BearingElement, SleeveElement, RodEndElement:
			sum += e.Thickness
		case NutElement:
			firstNut = min(firstNut, e.From-k.Through.From)
			if i < len(k.Elements)-1 { // the thin one beside a clamped link
				sum += e.Thickness
			}
		}
	}
	if s.Grip(k.Through.Length) > firstNut {
		t.Errorf("%s: the first nut is %g mm from the head and the shank %g mm", k.Joint, firstNut, s.Grip(k.Through.Length))
	}
	checkKind(t, k)
	if math.Abs(sum-k.Budget.Nominal) > 1e-8 || k.Budget.Least > sum || k.Budget.Most < sum+k.Play-1e-8 {
		t.Errorf("%s: elements sum to %g, budget %+v", k.Joint, sum, k.Budget)
	}
	limit := MostExcess
	if k.Pin.Excess > 0 {
		limit = k.Pin.Excess
	}
	if k.Pin.Nut != "none" && k.Through.Excess > limit+1e-9 {
		t.Errorf("%s: %g mm too long, %g mm may be", k.Joint, k.Through.Excess, limit)
	}
	if b := k.Budget; b.LikelyLeast < b.Least-1e-8 || b.LikelyMost > b.Most+1e-8 || b.LikelyLeast > b.LikelyMost {
		t.Errorf("%s: root-sum-square outside of the worst case: %+v", k.Joint, b)
	}
	if k.Through.Excess < -1e-9 || math.Abs(k.Through.Length-k.Through.Need-k.Through.Excess) > 1e-8 {
		t.Errorf("%s: %+v", k.Joint, k.Through)
	}
}

// checkKind: what every kind of pin promises.
func checkKind(t failer, k Kit) {
	t.Helper()
	switch k.Pin.Kind {
	case job.SleevePin:
		if len(k.Turning) != len(k.Pin.Seats) {
			t.Errorf("%s: %d parts turn on sleeves, %d are to", k.Joint, len(k.Turning), len(k.Pin.Seats))
		}
		for _, x := range k.Turning {
			if x.Play.Least < LeastPlay-1e-8 {
				t.Errorf("%s: %s may have no more than %g mm of play", k.Joint, x.Part, x.Play.Least)
			}
		}
	case job.ClampPin:
		// A nut lies next to the clamped link but for a washer, and head or nut on its other side.
		i := slices.IndexFunc(k.Elements, func(e Element) bool { return e.Kind == PartElement && e.Part == k.Pin.Clamped })
		var under, over ElementKind
		for n := i - 1; n >= 0 && (under == "" || under == WasherElement); n-- {
			under = k.Elements[n].Kind
		}
		for n := i + 1; n < len(k.Elements) && (over == "" || over == WasherElement); n++ {
			over = k.Elements[n].Kind
		}
		if over != NutElement || under != NutElement && under != HeadElement {
			t.Errorf("%s: %s lies between %s and %s", k.Joint, k.Pin.Clamped, under, over)
		}
	case job.RodEndPin:
		i := slices.IndexFunc(k.Elements, func(e Element) bool { return e.Kind == RodEndElement })
		if i < 2 || k.Elements[i-1].Kind != WasherElement || k.Elements[i+1].Kind != WasherElement {
			t.Errorf("%s: the ball lies bare: %v", k.Joint, k.Elements)
		}
	}
}

// checkList counts the kits' elements by another way and compares with the list.
func checkList(t failer, j job.Job, kits []Kit) {
	t.Helper()
	count := map[string]int{}
	for _, k := range kits {
		count[fmt.Sprintf("%s %.2f", k.Through.Designation, k.Through.Length)]++
		for _, e := range k.Elements {
			switch e.Kind {
			case PartElement, HeadElement:
			case SpacerElement, SleeveElement:
				count[fmt.Sprintf("%s %.2f", e.What, e.Thickness)]++
			default:
				count[e.What+" 0.00"]++
			}
		}
	}
	if s, err := Standoffs(j); err == nil && s != nil {
		for range max(1, len(j.Copies)) * len(s.At) {
			count[fmt.Sprintf("%s %.2f", s.Designation, s.Length)]++
			for i := range s.Screws {
				count[fmt.Sprintf("%s %.2f", s.Screws[i], s.Lengths[i])]++
				count[s.Washer+" 0.00"]++
			}
			for range s.Washers {
				count[s.Washer+" 0.00"]++
			}
		}
	}
	lines := List(j, kits)
	checkTubes(t, j, lines)
	for _, l := range lines {
		if l.Kind == ConsumableLine || l.Kind == TubeLine || len(l.Joints) > 0 && (l.Joints[0] == "mount" || l.Joints[0] == "hub") {
			continue
		}
		key := fmt.Sprintf("%s %.2f", l.Designation, l.Length)
		if count[key] != l.Need {
			t.Errorf("%s: %d on the list, %d in the kits", key, l.Need, count[key])
		}
		delete(count, key)
		if l.Buy != l.Need+l.Spare || l.Packs*l.Pack < l.Buy && l.Pack > 0 {
			t.Errorf("%+v", l)
		}
	}
	if len(count) > 0 {
		t.Errorf("in the kits and not on the list: %v", count)
	}
}

// checkTubes: the tubes hold every spacer and sleeve that is to be bought, and no other.
func checkTubes(t failer, j job.Job, lines []Line) {
	t.Helper()
	want, got, bars := 0, 0, 0
	for _, l := range lines {
		switch l.Kind {
		case SpacerLine, SleeveLine:
			want += l.Buy
		case TubeLine:
			bars += l.Buy
		}
	}
	tubes, err := Tubes(j, lines)
	if err != nil {
		t.Errorf("%v", err)
	}
	for _, x := range tubes {
		bars -= len(x.Plan.Bars)
		for _, b := range x.Plan.Bars {
			got += len(b.Cuts)
		}
	}
	if j.Spacers.Tube > 0 && want != got || bars != 0 {
		t.Errorf("%d pieces are to be cut and %d are; %d tubes too many on the list", want, got, bars)
	}
}

// drawJob makes a job of some links on planes of their own choice, joined at random.
func drawJob(t *rapid.T) job.Job {
	stocks := []job.Stock{}
	for _, name := range []string{"thin", "thick"} {
		nominal := rapid.SampledFrom([]float64{2, 3, 4, 5, 6}).Draw(t, name)
		measured := 0.0
		if rapid.Bool().Draw(t, name+" measured") {
			measured = math.Round((nominal+rapid.Float64Range(-0.3, 0.3).Draw(t, name+" off"))*100) / 100
		}
		stocks = append(stocks, sheet(name, nominal, measured))
	}
	n := rapid.IntRange(2, 7).Draw(t, "links")
	joints := []string{"A", "B", "C", "D", "Gx", "Gy"}
	var links []at
	taken := map[string]bool{}
	for i := range n {
		l := at{
			name:  fmt.Sprintf("link%d", i),
			stock: rapid.SampledFrom([]string{"thin", "thick"}).Draw(t, "stock"),
			plane: rapid.IntRange(-2, 6).Draw(t, "plane"),
		}
		for _, joint := range joints {
			spot := fmt.Sprint(joint, l.plane)
			if !taken[spot] && rapid.IntRange(0, 2).Draw(t, "on "+joint) == 0 {
				taken[spot] = true
				l.pins = append(l.pins, joint)
				if rapid.IntRange(0, 5).Draw(t, "flat") == 0 {
					l.bores = append(l.bores, job.Bore{Joint: joint, Kind: job.DBore})
				}
			}
		}
		links = append(links, l)
	}
	var frame *job.Frame
	if rapid.Bool().Draw(t, "frame") {
		frame = &job.Frame{Stock: "thick", Plates: []job.FramePlate{{Name: "back", Plane: -4, Pivots: []string{"Gx", "Gy"}}}}
		if rapid.Bool().Draw(t, "front") {
			frame.Plates = append(frame.Plates, job.FramePlate{Name: "front", Plane: rapid.IntRange(7, 9).Draw(t, "front plane"), Pivots: []string{"Gy"}})
		}
	}
	var pins []job.Pin
	for _, joint := range joints {
		var on []string
		for _, l := range links {
			if slices.Contains(l.pins, joint) {
				on = append(on, l.name)
			}
		}
		if len(on) == 0 {
			continue
		}
		pin := bolt(joint, rapid.SampledFrom([]string{"M3", "M4", "M5", "M6"}).Draw(t, "bolt"))
		pin.Head = rapid.SampledFrom([]string{"socket", "button", "hexagon"}).Draw(t, "head")
		pin.Nut = rapid.SampledFrom([]string{"lock", "plain", "thin", "none"}).Draw(t, "nut")
		pin.Washer = rapid.SampledFrom([]string{"normal", "small", "large", "none"}).Draw(t, "washer")
		if rapid.IntRange(0, 3).Draw(t, "play asked") == 0 && pin.Kind == job.BoltPin {
			pin.Play = [2]float64{0.05, rapid.SampledFrom([]float64{0.2, 0.3, 0.6}).Draw(t, "most play")}
		}
		pin.Excess = rapid.SampledFrom([]float64{0, 0, 0, 3, 6}).Draw(t, "excess")
		switch rapid.IntRange(0, 9).Draw(t, "kind") {
		case 4, 5:
			pin.Kind, pin.Bolt, pin.Sleeve, pin.Washer, pin.Play = job.SleevePin, "M4", 6, "large", [2]float64{}
			pin.Seats = on[:max(1, len(on)-1)]
		case 6, 8:
			pin.Kind, pin.Clamped = job.ClampPin, lowest(links, joint)
		case 7:
			pin.Kind, pin.Bolt, pin.Play = job.RodEndPin, rapid.SampledFrom([]string{"M4", "M5", "M6"}).Draw(t, "rod end"), [2]float64{}
			pin.RodEnd = rapid.SampledFrom([]job.Side{job.HeadSide, job.NutSide}).Draw(t, "side")
		case 0:
			pin.Kind, pin.Bolt = job.ShaftPin, ""
			pin.Shaft = rapid.SampledFrom([]float64{3, 4, 5, 6, 8, 10}).Draw(t, "shaft")
			pin.Fit = rapid.SampledFrom([]string{"running", "push"}).Draw(t, "fit")
			pin.Retain = rapid.SampledFrom([]job.Retainer{"", job.CollarRetainer, job.RingRetainer}).Draw(t, "retain")
		case 1:
			pin.Kind, pin.Bolt, pin.Play = job.BearingPin, "M4", [2]float64{}
			pin.Bearing = rapid.SampledFrom([]string{"624", "684", "684ZZ", "F624", "MR84", "MR104"}).Draw(t, "bearing")
			pin.Seats = on[:max(1, len(on)-1)]
		}
		pins = append(pins, pin)
	}
	j := jobOf(links, pins, frame, stocks...)
	for i := range rapid.IntRange(1, 3).Draw(t, "copies") - 1 {
		j.Copies = append(j.Copies, job.Copy{Name: fmt.Sprint("copy", i)})
	}
	switch rapid.IntRange(0, 3).Draw(t, "spacers") {
	case 0:
		j.Spacers.Stock = true
	case 1:
		j.Spacers.Tube, j.Spacers.Saw = 300, 1.5
	}
	if frame != nil && len(frame.Plates) == 2 && rapid.Bool().Draw(t, "standoffs") {
		frame.Standoffs = &job.Standoffs{At: []outline.Point{{X: 1}, {Y: 2}}, Bolt: rapid.SampledFrom([]string{"M3", "M4"}).Draw(t, "standoff"), Fit: "medium"}
	}
	// Pins that cannot be built alone are errors of their own; the others are kept.
	j.Pins = slices.DeleteFunc(j.Pins, func(p job.Pin) bool {
		alone := j
		alone.Pins = []job.Pin{p}
		_, err := Build(alone)
		return err != nil
	})
	j.Spare = job.Spare{Percent: rapid.Float64Range(0, 30).Draw(t, "percent"), Least: rapid.IntRange(0, 3).Draw(t, "least")}
	return j
}

// lowest is the link on the lowest plane at a joint.
func lowest(links []at, joint string) string {
	best := -1
	for i, l := range links {
		if slices.Contains(l.pins, joint) && (best < 0 || l.plane < links[best].plane) {
			best = i
		}
	}
	return links[best].name
}

// Random jobs: either there is an error, or the kits, the levels and the list are what they must be, and
// the same a second time.
func TestRandomJobs(t *testing.T) {
	built, kinds := 0, map[job.PinKind]int{}
	rapid.Check(t, func(t *rapid.T) {
		j := drawJob(t)
		kits, err := Build(j)
		if err != nil {
			return
		}
		built++
		levels, err := Levels(j)
		if err != nil {
			t.Fatal(err)
		}
		checkKits(t, j, kits, levels)
		checkList(t, j, kits)
		for _, k := range kits {
			kinds[k.Pin.Kind]++
		}
		again, err := Build(j)
		if err != nil || !reflect.DeepEqual(kits, again) || !reflect.DeepEqual(List(j, kits), List(j, again)) {
			t.Fatalf("not the same a second time: %v", err)
		}
	})
	t.Logf("%d jobs built: %v", built, kinds)
	if len(kinds) < 5 { // the rarest may be missing by chance
		t.Errorf("not every kind of pin was built: %v", kinds)
	}
}

// Parts that share a pin on planes that follow each other never touch when the pin has washers, and no
// gap is left open by more than the play.
func TestGapsAreFilled(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		washers := []float64{0, 0.3, 0.5, 0.8, 1, 1.6, 2, 2.5}
		var crossings []crossing
		for range rapid.IntRange(0, 5).Draw(t, "pins") {
			crossings = append(crossings, crossing{
				washer: rapid.SampledFrom(washers).Draw(t, "washer"),
				more:   rapid.Float64Range(-4, 4).Draw(t, "more"),
			})
		}
		least := rapid.Float64Range(0, 20).Draw(t, "least")
		gap := smallestGap(least, crossings)
		if gap < least-1e-9 {
			t.Fatalf("gap %g under %g", gap, least)
		}
		for _, c := range crossings {
			f, ok := fill(gap+c.more, c.washer)
			if !ok {
				t.Fatalf("gap %g: %+v is not filled", gap, c)
			}
			if sum := float64(f.washers)*c.washer + f.spacer + f.play; math.Abs(sum-gap-c.more) > 1e-8 || f.play > MostPlay+1e-8 || c.washer > 0 && f.washers == 0 {
				t.Fatalf("gap %g, %+v: %+v", gap, c, f)
			}
		}
	})
}
