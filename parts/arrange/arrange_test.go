package arrange

import (
	"fmt"
	"math"
	"math/rand/v2"
	"os"
	"reflect"
	"regexp"
	"strings"
	"testing"

	"pinwright/parts"
	"pinwright/parts/assembly"
	"pinwright/parts/job"
	"pinwright/parts/linkage"
	"pinwright/parts/outline"
	"pinwright/parts/stack"
)

const jobs = "../../testdata/jobs/"

// noPlane takes the planes out of a job file.
var noPlane = regexp.MustCompile(`(?m)^ *plane: -?[0-9]+\n|, *plane: -?[0-9]+|plane: -?[0-9]+(, *)?`)

// bare reads a job file without its planes, changed by pairs of old and new text.
func bare(t testing.TB, name string, changes ...string) (job.Job, *linkage.Mechanism) {
	t.Helper()
	data, err := os.ReadFile(jobs + name + ".yaml")
	if err != nil {
		t.Fatal(err)
	}
	text := string(noPlane.ReplaceAll(data, nil))
	for i := 0; i < len(changes); i += 2 {
		if !strings.Contains(text, changes[i]) {
			t.Fatalf("%s has no %q any more", name, changes[i])
		}
		text = strings.Replace(text, changes[i], changes[i+1], 1)
	}
	return parse(t, name, text)
}

func parse(t testing.TB, name, text string) (job.Job, *linkage.Mechanism) {
	t.Helper()
	j, err := job.Parse(name+".yaml", []byte(text), func(n string) ([]byte, error) { return os.ReadFile(jobs + n) })
	if err != nil {
		t.Fatalf("%v\n%s", err, text)
	}
	m, err := linkage.New(j.Linkage)
	if err != nil {
		t.Fatal(err)
	}
	return j, m
}

// built makes everything of one copy that is not mirrored.
func built(t testing.TB, j job.Job, m *linkage.Mechanism) ([]parts.Part, []stack.Kit, []stack.Level) {
	t.Helper()
	levels, err := stack.Levels(j)
	if err != nil {
		t.Fatal(err)
	}
	kits, err := stack.Build(single(j))
	if err != nil {
		t.Fatal(err)
	}
	var faces []parts.Level
	for _, l := range levels {
		faces = append(faces, parts.Level{Plane: l.Plane, Low: l.From, Up: l.To})
	}
	list, err := parts.Make(single(j), m, faces)
	if err != nil {
		t.Fatal(err)
	}
	return list, kits, levels
}

// Published linkages without any plane: as few planes as found by hand or fewer, and the proof of the
// finished side view, which knows nothing of how it was found, finds the running gap everywhere.
func TestPublishedLinkages(t *testing.T) {
	for _, c := range []struct {
		name   string
		byHand int // planes of the job file in testdata, empty ones included
	}{
		{"jansen", 7}, {"klann", 9}, {"chebyshev", 5}, {"watt-table", 4}, {"fourbar-cycle", 4}, {"demo", 7},
	} {
		j, m := bare(t, c.name)
		out, r, err := Planes(j, m)
		if err != nil {
			t.Errorf("%s: %v", c.name, err)
			continue
		}
		if !r.Answer.Proven || r.Answer.Cost.Planes > c.byHand || !out.PlanesGiven() {
			t.Errorf("%s: %+v, by hand %d planes", c.name, r.Answer, c.byHand)
		}
		list, kits, levels := built(t, out, m)
		gaps, err := assembly.Gaps(single(out), m, list, kits, levels)
		if err != nil {
			t.Fatal(err)
		}
		if len(gaps) > 0 && gaps[0].MM < stack.RunningGap-0.02 {
			t.Errorf("%s: %+v", c.name, gaps[0])
		}
		again, _, err := Planes(j, m)
		if err != nil || !reflect.DeepEqual(out.Links, again.Links) {
			t.Errorf("%s: %v, then %v", c.name, out.Links, again.Links)
		}
	}
}

// Demands are kept, and what is given stays.
func TestDemands(t *testing.T) {
	plane := func(j job.Job, name string) int {
		for _, l := range j.Links {
			if l.Name == name {
				return l.Plane
			}
		}
		t.Fatalf("no link %s", name)
		return 0
	}
	j, m := bare(t, "jansen", "crank: {", "crank: {plane: 5, ", "upper: {", "upper: {in-front-of: [lower, back], ", "rocker: {", "rocker: {same-plane-as: tie, ")
	out, r, err := Planes(j, m)
	if err != nil {
		t.Fatal(err)
	}
	if plane(out, "crank") != 5 || plane(out, "upper") <= plane(out, "lower") || plane(out, "upper") <= out.Frame.Plates[0].Plane || plane(out, "rocker") != plane(out, "tie") || !r.Answer.Proven {
		t.Errorf("%+v", out.Links)
	}
}

// What contradicts itself is named with the gap, the angle and what would help, at its place in the file.
func TestContradiction(t *testing.T) {
	j, m := bare(t, "jansen", "lower: {", "lower: {same-plane-as: hip, ")
	_, _, err := Planes(j, m)
	if err == nil {
		t.Fatal("planes were found")
	}
	for _, want := range []string{"jansen.yaml:21", "lower is to lie on the same plane as hip", "lower cannot lie between the parts on B, whose spacers it sweeps across (gap -", " deg)", "take same-plane-as: hip of lower out", "bend lower by"} {
		if !strings.Contains(err.Error(), want) {
			t.Errorf("%q is not in\n%v", want, err)
		}
	}
}

// touching looks for anything that touches, at evenly spaced steps of the drive: regions are moved by the
// positions of package linkage and laid over each other. It shares with the program only the outlines, the
// kits and the exact positions.
func touching(t testing.TB, j job.Job, m *linkage.Mechanism, steps int) string {
	t.Helper()
	list, kits, levels := built(t, j, m)
	c, err := m.Cycle(steps, nil)
	if err != nil {
		t.Fatal(err)
	}
	height := map[int]float64{}
	for _, l := range levels {
		height[l.Plane] = l.From
	}
	thick := map[string]float64{}
	for _, s := range j.Stock {
		thick[s.Name] = s.Measured
	}
	joint := map[string]int{}
	for i, x := range j.Linkage.Joints {
		joint[x.Name] = i
	}
	type solid struct {
		what         string
		low, up      float64
		region       outline.Region
		first, other int // joints that place a link; -1
		disc         float64
		on           map[string]bool
	}
	var all []solid
	for _, p := range list {
		s := solid{what: p.Link, low: height[p.Plane], up: height[p.Plane] + thick[p.Stock], region: p.Region, first: -1, on: map[string]bool{}}
		for _, h := range p.Holes {
			s.on[h.Joint] = true
		}
		for _, l := range j.Linkage.Links {
			if l.Name == p.Link {
				s.first, s.other = joint[l.Pins[0]], joint[l.Pins[1]]
			}
		}
		all = append(all, s)
	}
	for _, k := range kits {
		for _, e := range things(k) {
			all = append(all, solid{what: string(e.Kind) + " of " + k.Joint, low: e.From, up: e.To, first: joint[k.Joint], disc: e.Diameter / 2, on: map[string]bool{k.Joint: true}})
		}
	}
	for _, pos := range c.Positions {
		moved := make([]outline.Region, len(all))
		for i, s := range all {
			switch {
			case s.disc > 0:
			case s.first < 0:
				moved[i] = s.region
			default:
				at, d := pos.Places[s.first], pos.Places[s.other].Sub(pos.Places[s.first])
				moved[i] = s.region.Transform(outline.Place(math.Atan2(d.Y, d.X), false, at))
			}
		}
		for i, a := range all {
			for k := i + 1; k < len(all); k++ {
				b := all[k]
				if a.low >= b.up || b.low >= a.up {
					continue
				}
				var gap float64
				switch {
				case a.disc > 0 && b.disc > 0:
					if a.first == b.first {
						continue
					}
					gap = pos.Places[a.first].Dist(pos.Places[b.first]) - a.disc - b.disc
				case b.disc > 0:
					if a.on[j.Linkage.Joints[b.first].Name] {
						continue
					}
					gap = outline.Between(moved[i], outline.Region{Outer: outline.Circle(pos.Places[b.first], b.disc)}).Distance
				default:
					gap = outline.Between(moved[i], moved[k]).Distance
				}
				if gap <= 0 {
					return a.what + " and " + b.what
				}
			}
		}
	}
	return ""
}

// At 7,200 steps of the drive nothing touches.
func TestBruteForcePublished(t *testing.T) {
	for _, name := range []string{"jansen", "klann"} {
		j, m := bare(t, name)
		out, _, err := Planes(j, m)
		if err != nil {
			t.Fatal(err)
		}
		if what := touching(t, out, m, 7200); what != "" {
			t.Errorf("%s: %s touch", name, what)
		}
	}
}

// randomLinkage writes the job of a crank-rocker with dyads added, 3, 5 or 7 links in all: the joints of each
// dyad's ends are pivots in the frame or moving joints there are. Whether it turns is not known.
func randomLinkage(r *rand.Rand) string {
	var joints, links strings.Builder
	mm := func(low, high float64) float64 { return math.Round(10*(low+(high-low)*r.Float64())) / 10 }
	joints.WriteString("    O: {ground: [0, 0]}\n    A: {near: [20, 0]}\n")
	links.WriteString("    crank: {pins: [O, A], length: 20, drive: full-turn}\n")
	at := map[string]outline.Point{"A": {X: 20}}
	moving := []string{"A"}
	for i := range 1 + r.IntN(3) {
		from := moving[r.IntN(len(moving))]
		to := fmt.Sprintf("G%d", i)
		g := outline.Point{X: mm(-120, 120), Y: mm(-120, 120)}
		if i > 0 && len(moving) > 1 && r.IntN(3) == 0 {
			if to = moving[r.IntN(len(moving))]; to == from {
				continue
			}
			g = at[to]
		} else {
			fmt.Fprintf(&joints, "    %s: {ground: [%g, %g]}\n", to, g.X, g.Y)
		}
		d := at[from].Dist(g)
		a, b := mm(0.6*d+25, 0.8*d+60), mm(0.6*d+25, 0.8*d+60)
		x := (d*d + a*a - b*b) / (2 * d)
		along := g.Sub(at[from]).Scale(1 / d)
		p := at[from].Add(along.Scale(x)).Add(along.Left().Scale(math.Sqrt(math.Max(0, a*a-x*x))))
		name := fmt.Sprintf("P%d", i)
		fmt.Fprintf(&joints, "    %s: {near: [%.2f, %.2f]}\n", name, p.X, p.Y)
		fmt.Fprintf(&links, "    left-%d: {pins: [%s, %s], length: %g}\n    right-%d: {pins: [%s, %s], length: %g}\n", i, from, name, a, i, to, name, b)
		at[name] = p
		moving = append(moving, name)
	}
	return "job: random\nunits: {length: mm, angle: deg}\nlinkage:\n  joints:\n" + joints.String() + "  links:\n" + links.String() +
		"frame: {plates: {back: {}}}\npins: {default: {bolt: M5}}\nstock:\n  a: {material: cast acrylic, thickness: 4, sheet: [600, 400], margin: 5, kerf: 0.18}\n"
}

// Random linkages of 3, 5 and 7 links: nothing touches, at 7,200 steps for some and at 360 for the rest, and
// what has no planes is explained.
func TestRandomLinkages(t *testing.T) {
	solved, refused := 0, 0
	for seed := range uint64(60) {
		j, err := job.Parse("random.yaml", []byte(randomLinkage(rand.New(rand.NewPCG(seed, 7)))), nil)
		if err != nil {
			continue // two pivots in one place, a length out of bounds
		}
		m, err := linkage.New(j.Linkage)
		if err != nil {
			continue
		}
		if _, err := m.Cycle(360, nil); err != nil {
			continue
		}
		out, r, err := Planes(j, m)
		if err != nil {
			if !strings.Contains(err.Error(), "no planes fit") {
				t.Logf("seed %d: %v", seed, err)
				continue
			}
			refused++
			continue
		}
		solved++
		steps := 360
		if len(j.Links) == 7 && solved%8 == 0 {
			steps = 7200
		}
		if what := touching(t, out, m, steps); what != "" {
			t.Errorf("seed %d: %s touch", seed, what)
		}
		if !r.Answer.Proven {
			t.Errorf("seed %d: not proven", seed)
		}
	}
	t.Logf("%d solved, %d without planes", solved, refused)
	if solved < 10 {
		t.Errorf("%d solved", solved)
	}
}

// The planes of an eight-bar leg, from the job to the proven answer.
func BenchmarkPlanesEightBar(b *testing.B) {
	j, m := bare(b, "jansen")
	for b.Loop() {
		if _, _, err := Planes(j, m); err != nil {
			b.Fatal(err)
		}
	}
}
