package planes

import (
	"errors"
	"math"
	"reflect"
	"slices"
	"testing"

	"pgregory.net/rapid"
)

// aProblem draws a problem of some bodies. Lengths are multiples of 0.5 mm, so that sums are exact in binary.
func aProblem(t *rapid.T, bodies int, demands bool) Problem {
	half := func(label string, from, to int) float64 { return float64(rapid.IntRange(from, to).Draw(t, label)) / 2 }
	p := Problem{Washer: half("washer", 1, 3), Clear: half("clear", 0, 1)}
	for i := range bodies {
		p.Bodies = append(p.Bodies, Body{Name: string(rune('a' + i)), Thickness: half("thickness", 4, 10)})
	}
	body := rapid.IntRange(0, bodies-1)
	for i := range rapid.IntRange(1, bodies+1).Draw(t, "pins") {
		members := rapid.SliceOfNDistinct(body, 1, min(3, bodies), rapid.ID[int]).Draw(t, "members")
		p.Pins = append(p.Pins, Pin{
			Name: string(rune('P' + i)), Members: members,
			Below: half("below", 0, 12), Above: half("above", 0, 20), Least: half("least", 0, 10) * float64(min(1, len(members)-1)), Free: rapid.IntRange(0, 5).Draw(t, "free") == 0, Loaded: rapid.Bool().Draw(t, "loaded"),
		})
	}
	pin := rapid.IntRange(0, len(p.Pins)-1)
	near := Near{MM: -1}
	share := rapid.IntRange(1, 4).Draw(t, "density")
	for a := range bodies {
		for b := range a {
			if rapid.IntRange(0, share).Draw(t, "apart") == 0 {
				p.Apart = append(p.Apart, Apart{A: a, B: b, Near: near})
			}
		}
		for q := range p.Pins {
			for _, z := range []Zone{Shank, Head, Nut} {
				if !slices.Contains(p.Pins[q].Members, a) && rapid.IntRange(0, share+1).Draw(t, "swept") == 0 {
					p.Swept = append(p.Swept, Swept{Pin: q, Body: a, Zone: z, Near: near})
				}
			}
		}
	}
	for range rapid.IntRange(0, 3).Draw(t, "close") {
		a, b := pin.Draw(t, "p"), pin.Draw(t, "q")
		zones := rapid.SampledFrom([]Zone{Shank, Head, Nut})
		if a != b {
			p.Close = append(p.Close, Close{P: a, Q: b, ZoneP: zones.Draw(t, "zone"), ZoneQ: zones.Draw(t, "zone"), Near: near})
		}
	}
	for q := range p.Pins {
		if rapid.IntRange(0, 4).Draw(t, "short") == 0 {
			p.Short = append(p.Short, Short{Pin: q, MM: half("longest", 4, 30)})
		}
	}
	if demands {
		for range rapid.IntRange(0, 3).Draw(t, "demands") {
			d := Demand{Kind: rapid.SampledFrom([]DemandKind{On, SamePlane, InFrontOf}).Draw(t, "kind"), A: body.Draw(t, "A"), B: body.Draw(t, "B"), Plane: rapid.IntRange(-1, 3).Draw(t, "plane")}
			p.Demands = append(p.Demands, d)
		}
	}
	return p
}

// judged lays the planes out from scratch and tells what they cost and whether nothing is wrong with them.
// It shares nothing with the search: every pair of things is looked at by its heights.
func judged(p Problem, on []int) (Cost, bool) {
	lowest, highest := slices.Min(on), slices.Max(on)
	slab := map[int]float64{}
	for i, b := range p.Bodies {
		slab[on[i]] = math.Max(slab[on[i]], b.Thickness)
	}
	ends := func(q Pin) (lo, hi int) {
		lo, hi = on[q.Members[0]], on[q.Members[0]]
		for _, m := range q.Members {
			lo, hi = min(lo, on[m]), max(hi, on[m])
		}
		return lo, hi
	}
	from := map[int]float64{}
	last := lowest
	for z := lowest + 1; z <= highest; z++ {
		if slab[z] == 0 {
			continue
		}
		gap := p.Washer
		if e := float64(z - last - 1); e > 0 {
			gap = e*math.Max(slab[last], slab[z]) + (e+1)*p.Washer
			for _, q := range p.Pins {
				lo, hi := ends(q)
				if hi == last {
					gap = math.Max(gap, q.Above+p.Clear)
				}
				if lo == z {
					gap = math.Max(gap, q.Below+p.Clear)
				}
			}
		}
		from[z] = from[last] + slab[last] + gap
		last = z
	}
	type span struct{ low, up float64 }
	zones := make([][3]span, len(p.Pins))
	cost := Cost{Planes: highest - lowest + 1}
	for i, q := range p.Pins {
		for a, x := range q.Members {
			for _, y := range q.Members[a+1:] {
				if on[x] == on[y] {
					return cost, false
				}
			}
		}
		lo, hi := ends(q)
		bottom, top := from[lo], from[hi]+slab[hi]
		zones[i] = [3]span{Shank: {bottom, top}, Head: {bottom - q.Below, bottom}, Nut: {top, top + q.Above}}
		if !q.Free {
			cost.Length += top - bottom
		}
		if top-bottom < q.Least {
			return cost, false
		}
		if q.Loaded {
			cost.Overhang += hi - lo + 1 - len(q.Members)
		}
	}
	for _, x := range p.Apart {
		if on[x.A] == on[x.B] {
			return cost, false
		}
	}
	for _, x := range p.Swept {
		z, low, up := zones[x.Pin][x.Zone], from[on[x.Body]], from[on[x.Body]]+slab[on[x.Body]]
		switch {
		case x.Zone == Shank && up > z.low && low < z.up:
			return cost, false
		case x.Zone == Head && z.up > z.low && low < z.up && up > z.low-p.Clear:
			return cost, false
		case x.Zone == Nut && z.up > z.low && up > z.low && low < z.up+p.Clear:
			return cost, false
		}
	}
	for _, x := range p.Close {
		if sharesMember(p.Pins[x.P], p.Pins[x.Q]) && x.ZoneP == Shank && x.ZoneQ == Shank {
			continue
		}
		a, b := zones[x.P][x.ZoneP], zones[x.Q][x.ZoneQ]
		if a.up == a.low || b.up == b.low {
			continue
		}
		if x.ZoneP == Shank && x.ZoneQ == Shank {
			if a.up > b.low && a.low < b.up {
				return cost, false
			}
			continue
		}
		if tooNear(a.low, a.up, b.low, b.up, p.Clear) && !seated(x.ZoneP, x.ZoneQ, a.low, a.up, b.low, b.up) && !seated(x.ZoneQ, x.ZoneP, b.low, b.up, a.low, a.up) {
			return cost, false
		}
	}
	for _, x := range p.Short {
		if z := zones[x.Pin][Shank]; z.up-z.low > x.MM {
			return cost, false
		}
	}
	for _, d := range p.Demands {
		switch d.Kind {
		case On:
			if on[d.A] != d.Plane {
				return cost, false
			}
		case SamePlane:
			if on[d.A] != on[d.B] {
				return cost, false
			}
		case InFrontOf:
			if on[d.A] <= on[d.B] {
				return cost, false
			}
		}
	}
	return cost, true
}

func sharesMember(a, b Pin) bool {
	return slices.ContainsFunc(a.Members, func(m int) bool { return slices.Contains(b.Members, m) })
}

func tooNear(alow, aup, blow, bup, clear float64) bool {
	return blow < aup+clear && alow < bup+clear
}

// seated tells whether a head or nut lies on the face of the plane that the other pin's shank begins or
// ends on: they are one behind the other and never at one height.
func seated(a, b Zone, alow, aup, blow, bup float64) bool {
	return b == Shank && (a == Head && aup == blow || a == Nut && alow == bup)
}

func less(a, b Cost) bool {
	if a.Planes != b.Planes {
		return a.Planes < b.Planes
	}
	if a.Length != b.Length {
		return a.Length < b.Length
	}
	return a.Overhang < b.Overhang
}

// best tries every assignment to planes from low to low+width-1.
func best(p Problem, low, width int) (Cost, bool) {
	on := make([]int, len(p.Bodies))
	var out Cost
	found := false
	var try func(i int)
	try = func(i int) {
		if i == len(on) {
			if c, ok := judged(p, on); ok && (!found || less(c, out)) {
				out, found = c, true
			}
			return
		}
		for z := range width {
			on[i] = low + z
			try(i + 1)
		}
	}
	try(0)
	return out, found
}

func checkAgainstAll(t *rapid.T, p Problem, low, width int) {
	a, err := Solve(p)
	want, found := best(p, low, width)
	if err != nil {
		if found {
			t.Fatalf("no answer, but there is one that costs %+v: %v\n%+v", want, err, p)
		}
		return
	}
	got, ok := judged(p, a.Planes)
	if !ok {
		t.Fatalf("planes %v are wrong\n%+v", a.Planes, p)
	}
	if got != a.Cost {
		t.Fatalf("planes %v cost %+v, said to cost %+v\n%+v", a.Planes, got, a.Cost, p)
	}
	if !a.Proven || a.Bound != a.Cost {
		t.Fatalf("not proven: %+v", a)
	}
	if found && less(want, got) {
		t.Fatalf("planes %v cost %+v, the best %+v\n%+v", a.Planes, got, want, p)
	}
	for i, q := range p.Pins {
		lo, hi := a.Planes[q.Members[0]], a.Planes[q.Members[0]]
		for _, m := range q.Members {
			lo, hi = min(lo, a.Planes[m]), max(hi, a.Planes[m])
		}
		if lo == hi && a.Spans[i] > 5 || lo < hi && a.Spans[i] < 4+p.Washer {
			t.Fatalf("pin %d spans %g mm", i, a.Spans[i])
		}
	}
	if !found && got.Planes <= width && len(p.Demands) == 0 {
		t.Fatalf("the exhaustive search is wrong: %v", a.Planes)
	}
}

// Answers are as good as the best of all assignments to a range of planes wide enough that more would cost more.
func TestAgainstExhaustiveSearch(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		n := rapid.IntRange(1, 4).Draw(t, "bodies")
		checkAgainstAll(t, aProblem(t, n, false), 0, 7)
	})
}

func TestAgainstExhaustiveSearchOfFive(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		if rapid.IntRange(0, 9).Draw(t, "one in ten") == 0 {
			checkAgainstAll(t, aProblem(t, 5, false), 0, 7)
		}
	})
}

func TestAgainstExhaustiveSearchOfSix(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		if rapid.IntRange(0, 19).Draw(t, "one in twenty") == 0 {
			checkAgainstAll(t, aProblem(t, 6, false), 0, 6)
		}
	})
}

// What is drawn has answers often enough for the comparison to mean something.
func TestDrawnProblemsHaveAnswers(t *testing.T) {
	all, answered := 0, 0
	rapid.Check(t, func(t *rapid.T) {
		p := aProblem(t, rapid.IntRange(3, 6).Draw(t, "bodies"), false)
		a, err := Solve(p)
		all++
		if err == nil && a.Cost.Planes > 1 {
			answered++
		}
	})
	if answered < all/10 {
		t.Errorf("%d of %d have an answer of more than one plane", answered, all)
	}
}

func TestDemandsAgainstExhaustiveSearch(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		n := rapid.IntRange(1, 4).Draw(t, "bodies")
		checkAgainstAll(t, aProblem(t, n, true), -4, 10)
	})
}

// The rules that a conflict names have no answer, and have one without any of them.
func TestConflictsAreMinimal(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := aProblem(t, rapid.IntRange(2, 5).Draw(t, "bodies"), true)
		_, err := Solve(p)
		var c *Conflict
		if !errors.As(err, &c) {
			if err != nil {
				t.Fatal(err)
			}
			return
		}
		q := p
		q.Apart, q.Swept, q.Close, q.Short, q.Demands = c.Apart, c.Swept, c.Close, c.Short, c.Demands
		if _, err := Solve(q); !errors.As(err, &c) {
			t.Fatalf("the rules do not contradict each other: %v", err)
		}
		without := func(q Problem) {
			if _, err := Solve(q); err != nil {
				t.Fatalf("a rule could go: %v", err)
			}
		}
		for i := range q.Apart {
			r := q
			r.Apart = slices.Delete(slices.Clone(q.Apart), i, i+1)
			without(r)
		}
		for i := range q.Swept {
			r := q
			r.Swept = slices.Delete(slices.Clone(q.Swept), i, i+1)
			without(r)
		}
		for i := range q.Close {
			r := q
			r.Close = slices.Delete(slices.Clone(q.Close), i, i+1)
			without(r)
		}
		for i := range q.Short {
			r := q
			r.Short = slices.Delete(slices.Clone(q.Short), i, i+1)
			without(r)
		}
		for i := range q.Demands {
			r := q
			r.Demands = slices.Delete(slices.Clone(q.Demands), i, i+1)
			without(r)
		}
	})
}

// Bounds of a search that is cut short are bounds, and its answers are sound.
func TestCutShort(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := aProblem(t, rapid.IntRange(2, 6).Draw(t, "bodies"), false)
		full, err := Solve(p)
		if err != nil {
			return
		}
		p.States = rapid.IntRange(1, 60).Draw(t, "states")
		cut, err := Solve(p)
		var u *Unknown
		if errors.As(err, &u) {
			return
		}
		if err != nil {
			t.Fatal(err)
		}
		if less(full.Cost, cut.Bound) || less(cut.Cost, full.Cost) || cut.Proven && cut.Cost != full.Cost {
			t.Fatalf("cut short %+v, in full %+v", cut, full)
		}
		if _, ok := judged(p, cut.Planes); !ok {
			t.Fatalf("planes %v are wrong", cut.Planes)
		}
	})
}

func TestSameAgain(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := aProblem(t, rapid.IntRange(1, 5).Draw(t, "bodies"), true)
		a, errA := Solve(p)
		b, errB := Solve(p)
		if !reflect.DeepEqual(a, b) || (errA == nil) != (errB == nil) || errA != nil && errA.Error() != errB.Error() {
			t.Fatalf("%+v, %v, then %+v, %v", a, errA, b, errB)
		}
	})
}
