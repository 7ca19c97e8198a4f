package parts

import (
	"math"
	"strings"
	"testing"

	"pinwright/parts/job"
	"pinwright/parts/linkage"
	"pinwright/parts/outline"
)

func pt(x, y float64) outline.Point { return outline.Point{X: x, Y: y} }

// fourBar is a four-bar with a traced point on its coupler: crank O-A 25, coupler A-B 70 with P,
// rocker D-B 65, frame O-D 80; M4 bolts in medium holes (4.5 mm, ISO 273), cast acrylic of 3 mm.
func fourBar(change ...func(*job.Job)) job.Job {
	near := func(x, y float64) *outline.Point { p := pt(x, y); return &p }
	j := job.Job{
		Name: "four-bar",
		Linkage: linkage.Linkage{
			Joints: []linkage.Joint{
				{Name: "O", Ground: &linkage.Ground{At: pt(0, 0)}},
				{Name: "D", Ground: &linkage.Ground{At: pt(80, 0)}},
				{Name: "A", Near: near(25, 0)},
				{Name: "B", Near: near(60, 62)},
				{Name: "P", Near: near(20, 80)},
			},
			Links: []linkage.Link{
				{Name: "crank", Pins: []string{"O", "A"}, Lengths: []linkage.Length{{A: "O", B: "A", MM: 25}}},
				{Name: "coupler", Pins: []string{"A", "B", "P"}, Lengths: []linkage.Length{{A: "A", B: "B", MM: 70}, {A: "B", B: "P", MM: 45}, {A: "A", B: "P", MM: 80}}},
				{Name: "rocker", Pins: []string{"D", "B"}, Lengths: []linkage.Length{{A: "D", B: "B", MM: 65}}},
			},
			Drive: linkage.Drive{Link: "crank", From: 0, To: 2 * math.Pi, Full: true},
			Trace: []string{"P"},
		},
		Links: []job.Link{
			{Name: "crank", Plane: 1, Shape: job.CrankArm, Stock: "clear3"},
			{Name: "coupler", Plane: 2, Shape: job.Plate, Stock: "clear3"},
			{Name: "rocker", Plane: 3, Shape: job.Bar, Stock: "clear3"},
		},
		Copies: []job.Copy{{}},
		Stock: []job.Stock{
			{Name: "clear3", Material: "cast acrylic", Thickness: 3, Measured: 2.85},
			{Name: "birch4", Material: "birch plywood", Thickness: 4, Measured: 3.8},
			{Name: "steel2", Material: "mild steel", Thickness: 2, Measured: 2},
		},
	}
	for _, joint := range []string{"O", "D", "A", "B"} {
		j.Pins = append(j.Pins, job.Pin{Joint: joint, Kind: job.BoltPin, Bolt: "M4", Fit: "medium", Head: "socket", Nut: "lock", Washer: "normal"})
	}
	for _, c := range change {
		c(&j)
	}
	return j
}

var heights = []Level{{0, 0, 3.8}, {1, 4.6, 7.4}, {2, 8.2, 11}, {3, 11.8, 14.6}, {5, 20, 23.8}, {7, 30, 33.8}}

// make1 makes the parts; an error ends the test.
func make1(t testing.TB, j job.Job) []Part {
	t.Helper()
	m, err := linkage.New(j.Linkage)
	if err != nil {
		t.Fatal(err)
	}
	all, err := Make(j, m, heights)
	if err != nil {
		t.Fatal(err)
	}
	for _, p := range all {
		if err := p.Region.Validate(); err != nil {
			t.Fatalf("%s: %v", p.Name, err)
		}
	}
	return all
}

// part makes the parts and returns one of them.
func part(t testing.TB, name string, change ...func(*job.Job)) Part {
	t.Helper()
	for _, p := range make1(t, fourBar(change...)) {
		if p.Name == name {
			return p
		}
	}
	t.Fatalf("there is no part %s", name)
	return Part{}
}

// failing makes the parts and returns the messages with their hints.
func failing(t testing.TB, j job.Job) string {
	t.Helper()
	m, err := linkage.New(j.Linkage)
	if err != nil {
		t.Fatal(err)
	}
	_, err = Make(j, m, heights)
	if err == nil {
		return ""
	}
	all, ok := err.(job.Errors)
	if !ok {
		t.Fatalf("%T is not job.Errors", err)
	}
	var b strings.Builder
	for _, e := range all {
		b.WriteString(e.Message + " / " + e.Hint + "\n")
	}
	return b.String()
}

func link(j *job.Job, name string) *job.Link {
	for i := range j.Links {
		if j.Links[i].Name == name {
			return &j.Links[i]
		}
	}
	return nil
}

func pin(j *job.Job, joint string) *job.Pin {
	for i := range j.Pins {
		if j.Pins[i].Joint == joint {
			return &j.Pins[i]
		}
	}
	return nil
}

func near(t testing.TB, what string, got, want, tolerance float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tolerance) {
		t.Errorf("%s: %v, want %v", what, got, want)
	}
}

// kink is the largest turn between two segments of an outline at a vertex, radians.
func kink(o outline.Outline) float64 {
	segments := o.Segments()
	worst := 0.0
	for i, s := range segments {
		u, v := s.Tangent(1), segments[(i+1)%len(segments)].Tangent(0)
		worst = math.Max(worst, math.Abs(math.Atan2(u.Cross(v), u.Dot(v))))
	}
	return worst
}
