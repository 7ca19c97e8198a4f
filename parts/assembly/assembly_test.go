package assembly

import (
	"math"
	"slices"
	"testing"

	"pinwright/parts"
	"pinwright/parts/interference"
	"pinwright/parts/job"
	"pinwright/parts/linkage"
	"pinwright/parts/outline"
	"pinwright/parts/stack"
)

// built is one copy of a job that is not mirrored, made.
type built struct {
	job    job.Job
	m      *linkage.Mechanism
	list   []parts.Part
	kits   []stack.Kit
	levels []stack.Level
}

func build(t testing.TB, j job.Job) built {
	t.Helper()
	b := built{job: j}
	var err error
	if b.m, err = linkage.New(j.Linkage); err != nil {
		t.Fatal(err)
	}
	if b.levels, err = stack.Levels(j); err != nil {
		t.Fatal(err)
	}
	one := j
	one.Copies, one.Body = []job.Copy{{}}, nil
	if b.kits, err = stack.Build(one); err != nil {
		t.Fatal(err)
	}
	if b.list, err = parts.Make(one, b.m, faces(b.levels)); err != nil {
		t.Fatal(err)
	}
	return b
}

func read(t testing.TB, file string) job.Job {
	t.Helper()
	j, err := job.Read(file)
	if err != nil {
		t.Fatal(err)
	}
	return j
}

func (b built) things() []thing { return append(ofParts(b.job, b.list, b.levels), ofKits(b.kits)...) }

// at places a thing at a position of the mechanism, by package linkage.
func (b built) at(x thing, p linkage.Position) outline.Region {
	switch x.Carrier {
	case interference.OnLink:
		return x.Region.Transform(b.m.Placement(x.Of, p))
	case interference.OnJoint:
		i, _ := b.m.Joint(x.Of)
		return x.Region.Transform(outline.Place(0, false, p.Places[i]))
	}
	return x.Region
}

// The jobs of published linkages: nothing touches at any of 7,200 positions, and the gaps agree with them.
func TestPublishedJobsAgainstBruteForce(t *testing.T) {
	for _, name := range []string{"jansen", "klann"} {
		b := build(t, read(t, "../../testdata/jobs/"+name+".yaml"))
		gaps, err := Gaps(b.job, b.m, b.list, b.kits, b.levels)
		if err != nil {
			t.Fatal(err)
		}
		steps := 7200
		if testing.Short() {
			steps = 360
		}
		c, err := b.m.Cycle(steps, nil)
		if err != nil {
			t.Fatal(err)
		}
		things := b.things()
		find := func(name string) thing {
			return things[slices.IndexFunc(things, func(x thing) bool { return x.Name == name })]
		}
		if len(gaps) == 0 {
			t.Errorf("%s: no gaps", name)
		}
		for _, g := range gaps[:min(len(gaps), 6)] {
			x, y := find(g.A), find(g.B)
			least := math.Inf(1)
			for _, p := range c.Positions {
				least = math.Min(least, outline.Between(b.at(x, p), b.at(y, p)).Distance)
			}
			// The same thing may be on a pin twice, at other heights: the first is compared.
			if g.MM <= 0 || least < g.MM-g.Error-1e-9 || least > g.MM+0.05 {
				t.Errorf("%s: %s and %s: gap %.4f (error %.4f), brute force %.4f", name, g.A, g.B, g.MM, g.Error, least)
			}
		}
	}
}

// Putting two links of a leg on one plane makes them clash: the gap is negative.
func TestClashIsNegative(t *testing.T) {
	j := read(t, "testdata/fourbar.yaml")
	b := build(t, j)
	gaps, err := Gaps(j, b.m, b.list, b.kits, b.levels)
	if err != nil {
		t.Fatal(err)
	}
	g := gaps[0]
	if g.A != "rocker" || g.B != "cross member 1" || !(g.MM < -0.5 && g.MM > -3.1) {
		t.Fatalf("smallest gap %+v, want the rocker in the cross member", g)
	}
}

// A cross member stands where the rocker ends its swing: a bend to the left of the rocker (D to B, away from
// the member) frees it, the next smaller one does not, and the gap is as a bent job has it.
func TestFindBend(t *testing.T) {
	j := read(t, "testdata/fourbar.yaml")
	b := build(t, j)
	bend, ok, err := FindBend(j, b.m, b.list, b.kits, b.levels, "rocker")
	if err != nil || !ok {
		t.Fatalf("no bend: %v", err)
	}
	if bend.MM <= 0 || bend.MM > 15 || bend.Gap < stack.RunningGap {
		t.Errorf("bend %+v", bend)
	}
	i := slices.IndexFunc(j.Links, func(l job.Link) bool { return l.Name == "rocker" })
	least := func(mm float64) float64 {
		k := j
		k.Links = slices.Clone(j.Links)
		k.Links[i].Shape, k.Links[i].Bend = job.Bent, mm
		b := build(t, k)
		gaps, err := Gaps(k, b.m, b.list, b.kits, b.levels)
		if err != nil {
			t.Fatal(err)
		}
		least := float64(interest)
		for _, g := range gaps {
			if g.A == "rocker" || g.B == "rocker" {
				least = math.Min(least, g.MM-g.Error)
			}
		}
		return least
	}
	if got := least(bend.MM); math.Abs(got-bend.Gap) > 2*accuracy+share*got {
		t.Errorf("bend %.1f: gap %.3f, a job with that bend has %.3f", bend.MM, bend.Gap, got)
	}
	for _, mm := range []float64{bend.MM - bendStep, -bend.MM} {
		if got := least(mm); got >= stack.RunningGap+2*accuracy {
			t.Errorf("a bend of %.1f gives %.3f already", mm, got)
		}
	}
	// What is no bar is not bent, and nothing that is not there.
	for _, name := range []string{"crank", "back", "nothing"} {
		if _, ok, err := FindBend(j, b.m, b.list, b.kits, b.levels, name); ok || err != nil {
			t.Errorf("%s is bent (%v)", name, err)
		}
	}
}

// Spacings against brute force: both copies as bodies in space, through the whole turn. At Clear, at Least
// and above Clear nothing is nearer than the running gap; a little below Clear and below Least something is.
func TestSpaceAgainstBruteForce(t *testing.T) {
	for _, x := range []struct {
		file   string
		copies []job.Copy
		frame  bool
	}{
		{"testdata/fourbar.yaml", []job.Copy{{Name: "a"}, {Name: "b", Phase: math.Pi}}, true},
		{"testdata/fourbar.yaml", []job.Copy{{Name: "a"}, {Name: "b", Phase: math.Pi / 2, Mirror: true}}, false},
		{"../../testdata/jobs/jansen.yaml", []job.Copy{{Name: "a"}, {Name: "b", Phase: math.Pi, Mirror: true}}, false},
	} {
		j := read(t, x.file)
		j.Copies = x.copies
		j.Body = &job.Body{Order: []int{0, 1}, Shafts: make([]outline.Point, 2)}
		b := build(t, j)
		if !x.frame { // without its plates, which keep copies apart by themselves
			b.list = slices.DeleteFunc(b.list, func(p parts.Part) bool {
				return !slices.ContainsFunc(j.Links, func(l job.Link) bool { return l.Name == p.Link })
			})
			j.Frame, b.job.Frame = nil, nil
		}
		s, err := Space(j, b.m, b.list, b.kits, b.levels)
		if err != nil {
			t.Fatal(err)
		}
		t.Logf("%s: %+v", x.file, s)
		const steps = 360
		c, err := b.m.Cycle(steps, nil)
		if err != nil {
			t.Fatal(err)
		}
		p := &pairs{j: j, m: b.m}
		least := func(spacing float64) float64 {
			least := math.Inf(1)
			for _, a := range b.things() {
				for _, d := range b.things() {
					still := p.still(a, true) && p.still(d, true)
					gap := stack.RunningGap
					if still {
						gap = 0
					}
					if a.Low >= d.Up+spacing+gap-1e-9 || d.Low+spacing >= a.Up+gap-1e-9 {
						continue
					}
					if a.joint == d.joint && (a.shaft || d.shaft) {
						continue
					}
					for k := range steps {
						turned := (k + int(math.Round(x.copies[1].Phase/(2*math.Pi)*steps))) % steps
						if x.copies[1].Mirror {
							turned = (2*steps + int(math.Round(x.copies[1].Phase/(2*math.Pi)*steps)) - k) % steps
						}
						r := b.at(d, c.Positions[turned]).Transform(outline.Place(0, x.copies[1].Mirror, outline.Point{}))
						if g := outline.Between(b.at(a, c.Positions[k]), r).Distance; g < least {
							least = g
						}
						if still || least == 0 {
							break
						}
					}
					if least == 0 {
						return 0
					}
				}
			}
			return least
		}
		for _, free := range []float64{s.Least, s.Clear, s.Clear + 3.3} {
			if got := least(free); got < stack.RunningGap-0.02 {
				t.Errorf("%s: at %.3f something is only %.4f apart", x.file, free, got)
			}
		}
		for _, tight := range []float64{s.Clear - 0.05, s.Least - 0.05, s.Least / 2} {
			if got := least(tight); tight > 0 && got > stack.RunningGap+0.3 {
				t.Errorf("%s: at %.3f everything is %.4f apart already", x.file, tight, got)
			}
		}
		if s.Least > s.Clear {
			t.Errorf("least %.3f, clear %.3f", s.Least, s.Clear)
		}
		// The job's own spacing is refused if too tight, and named.
		j.Body.Spacing = s.Clear
		if err := Crowded(j, b.m, b.list, b.kits, b.levels); err != nil {
			t.Error(err)
		}
		if j.Body.Spacing = s.Clear - 0.05; j.Body.Spacing > 0 && Crowded(j, b.m, b.list, b.kits, b.levels) == nil {
			t.Errorf("%s: a spacing of %.2f is taken", x.file, j.Body.Spacing)
		}
	}
}

// BenchmarkGapsOfAJob is all gaps of Jansen's leg as built, BenchmarkSpace the spacing of four of them.
func BenchmarkGapsOfAJob(b *testing.B) {
	x := build(b, read(b, "../../testdata/jobs/jansen.yaml"))
	for b.Loop() {
		if _, err := Gaps(x.job, x.m, x.list, x.kits, x.levels); err != nil {
			b.Fatal(err)
		}
	}
}

func BenchmarkSpace(b *testing.B) {
	j := read(b, "../../testdata/jobs/jansen.yaml")
	j.Copies = []job.Copy{{Name: "a"}, {Name: "b", Phase: math.Pi, Mirror: true}, {Name: "c", Phase: math.Pi / 2}, {Name: "d", Phase: 3 * math.Pi / 2, Mirror: true}}
	j.Body = &job.Body{Order: []int{0, 1, 2, 3}, Shafts: make([]outline.Point, 4)}
	x := build(b, j)
	for b.Loop() {
		if _, err := Space(j, x.m, x.list, x.kits, x.levels); err != nil {
			b.Fatal(err)
		}
	}
}

func BenchmarkFindBend(b *testing.B) {
	x := build(b, read(b, "testdata/fourbar.yaml"))
	for b.Loop() {
		if _, ok, err := FindBend(x.job, x.m, x.list, x.kits, x.levels, "rocker"); !ok || err != nil {
			b.Fatal(ok, err)
		}
	}
}

// Where copies can reach into one another the least spacing lies in a gap between the intervals: those of
// this test are (-4, 4), (3, 5), (6, 9) and, of bodies that never come close, (4.5, 7).
func TestLeastBetweenIntervals(t *testing.T) {
	p := &pairs{
		j:     job.Job{Copies: []job.Copy{{Name: "a"}, {Name: "b", Phase: 1}}, Body: &job.Body{Order: []int{0, 1}, Shafts: make([]outline.Point, 2)}},
		known: map[string]interference.Gap{},
	}
	for _, x := range []struct {
		name     string
		from, to float64
		gap      float64
	}{{"one", 6, 9, 0}, {"two", 4.5, 7, math.Inf(1)}, {"three", 3, 5, 0.2}, {"four", -4, 4, 0}} {
		b := ban{upper: 1, a: thing{part: x.name}, b: thing{part: x.name}, from: x.from, to: x.to}
		p.bans = append(p.bans, b)
		p.known[p.key(&b)] = interference.Gap{MM: x.gap}
	}
	if s, err := p.least(); err != nil || s != 5 {
		t.Errorf("least %v (%v), want 5", s, err)
	}
}
