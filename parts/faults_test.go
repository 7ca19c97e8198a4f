package parts

import (
	"math"
	"strings"
	"testing"

	"pinwright/parts/job"
	"pinwright/parts/linkage"
	"pinwright/parts/outline"
)

// What goes wrong says what, where, by how much and what to do.
func TestFaults(t *testing.T) {
	on := func(name string, f func(l *job.Link)) func(*job.Job) {
		return func(j *job.Job) { f(link(j, name)) }
	}
	for _, c := range []struct {
		name   string
		change func(*job.Job)
		want   []string
	}{
		{
			"bar too narrow", on("rocker", func(l *job.Link) { l.Width = 12 }),
			[]string{"link rocker: hole D (4.5 mm) leaves 3.75 mm to the edge; 3 mm cast acrylic wants 4.5 mm / widen it to 18 mm, at the least 13.5 mm", "hole B"},
		},
		{
			"toe smaller than its pen hole", on("coupler", func(l *job.Link) { l.Foot = &job.Foot{At: "P", Radius: 4, Pen: 5} }),
			[]string{"link coupler: the pen hole (5 mm) leaves 1.5 mm of the toe of radius 4 mm; 3 mm cast acrylic wants 3 mm / make the toe at least 5.5 mm"},
		},
		{
			"toe round a pin too small", on("coupler", func(l *job.Link) { l.Foot = &job.Foot{At: "B", Radius: 5} }),
			[]string{"link coupler: hole B (4.5 mm) wants 6.75 mm to the edge in 3 mm cast acrylic, the toe of radius 5 mm leaves less / make the toe at least 6.8 mm"},
		},
		{
			"waist too wide", on("rocker", func(l *job.Link) { l.Shape, l.Waist = job.Waisted, 20 }),
			[]string{"link rocker: a waist of 20 mm is no narrower than its ends, 18 mm and 18 mm / make the waist less than 18 mm"},
		},
		{
			"waist too short", func(j *job.Job) {
				*link(j, "crank") = job.Link{Name: "crank", Plane: 1, Shape: job.Waisted, Waist: 4, Stock: "clear3"}
				j.Linkage.Links[0].Lengths[0].MM = 15
			},
			[]string{"link crank: its ends of 18 mm and 18 mm meet before the bar is drawn in to 4 mm / take shape: bar, or lengthen the link to more than 17.6 mm"},
		},
		{
			"waist thinner than the web", on("rocker", func(l *job.Link) { l.Shape, l.Waist = job.Waisted, 2 }),
			[]string{"rocker: the part is 2 mm wide at (32.5, 0); 3 mm cast acrylic wants 3 mm / widen it there by 1 mm"},
		},
		{
			"bend too tight", on("rocker", func(l *job.Link) { l.Shape, l.Bend, l.Width = job.Bent, 33, 70 }),
			[]string{"link rocker: a bend of 33 mm gives a middle line of radius 32.5 mm, too tight for a bar 70 mm wide"},
		},
		{
			"bend into itself", on("rocker", func(l *job.Link) { l.Shape, l.Bend, l.Width = job.Bent, 280, 70 }),
			[]string{"link rocker: the bent bar, 70 mm wide, runs into itself / bend it less"},
		},
		{
			"obstacle on a pin", on("rocker", func(l *job.Link) { l.Shape, l.Around = job.Bent, []outline.Disc{{Centre: pt(8, 3), Radius: 4}} }),
			[]string{"link rocker: obstacle 1 at (8, 3) lies in the end of the bar at (0, 0), by 5.46 mm / move the obstacle away"},
		},
		{
			"fillet into an obstacle", func(j *job.Job) {
				l := link(j, "rocker")
				l.Shape, l.Width, l.Fillet, l.Around = job.Bent, 14, 40, []outline.Disc{{Centre: pt(42, 2), Radius: 4}}
				*pin(j, "B") = job.Pin{Joint: "B", Kind: job.BearingPin, Bearing: "624", Bolt: "M4", Fit: "press", Seats: []string{"rocker"}}
			},
			[]string{"link rocker: the bar comes to 0", "from obstacle 1 at (42, 2); it wants 1 mm / move or shrink the obstacle"},
		},
		{
			"bore wider than its arm", on("crank", func(l *job.Link) {
				l.Bores = []job.Bore{{Joint: "O", Kind: job.RoundBore, Diameter: 46}}
			}),
			[]string{"crank: hole O at (0, 0) and hole A at (25, 0) run into each other / move them apart"},
		},
		{
			"holes too near", func(j *job.Job) { j.Linkage.Links[0].Lengths[0].MM = 8 },
			[]string{"crank: 3.5 mm is left between hole O at (0, 0) and hole A at (8, 0); 3 mm cast acrylic wants 4.5 mm / move them apart by 1 mm"},
		},
		{
			"rim too thin", on("coupler", func(l *job.Link) { l.Windows, l.Rim = true, 2 }),
			[]string{"link coupler: a rim of 2 mm is less than the 3 mm that 3 mm cast acrylic wants / make the rim at least 3 mm"},
		},
		{
			"phase mark without room", func(j *job.Job) {
				link(j, "crank").PhaseMark, link(j, "crank").Width = true, 8.4
				pin(j, "O").Bolt, pin(j, "A").Bolt = "M2", "M2"
				j.Copies[0].Phase = math.Pi / 2
			},
			[]string{"link crank: the phase mark has 0.", "of room beside hole O, it wants 2 mm / widen the link"},
		},
		{
			"bearing nowhere", func(j *job.Job) {
				*pin(j, "B") = job.Pin{Joint: "B", Kind: job.BearingPin, Bearing: "624", Bolt: "M4", Fit: "press"}
			},
			[]string{"link coupler: the bearing of joint B sits in no part", "link rocker: the bearing of joint B sits in no part"},
		},
		{
			"unknown bolt", func(j *job.Job) { pin(j, "B").Bolt = "M4.5" },
			[]string{"link coupler: hole B:", "M4.5"},
		},
		{
			"forbidden sheet", func(j *job.Job) { j.Stock[0].Material = "PVC" },
			[]string{"stock clear3:"},
		},
		{
			"frame rim too thin", func(j *job.Job) { framed(j); j.Frame.Width = 2 },
			[]string{"back: hole O (4.5 mm) leaves 2 mm to the edge; 4 mm birch plywood wants 4.5 mm / make it at least 4.5 mm"},
		},
		{
			"mounting hole on a pivot", func(j *job.Job) { framed(j); j.Frame.Mount.At[0] = pt(2, 1) },
			[]string{"back: hole O at (0, 0) and mount 1 at (2, 1) run into each other"},
		},
		{
			"empty plate", func(j *job.Job) {
				framed(j)
				j.Frame.Mount, j.Frame.Cross = nil, nil
				j.Frame.Plates[0].Pivots = nil
			},
			[]string{"plate back carries nothing: it has no shape / give it a pivot"},
		},
		{
			"too many tabs", func(j *job.Job) { framed(j); j.Frame.Cross[0].Tabs = 6 },
			[]string{"cross member 1: 6 tabs on 40 mm leave tabs and gaps of 3.08 mm; 3 mm cast acrylic and 4 mm birch plywood want 4.1 mm / take fewer tabs, or make it at least 53.3 mm wide"},
		},
		{
			"no slot left", func(j *job.Job) { framed(j); j.Frame.Cross[0].Clearance = -3 },
			[]string{"cross member 1: a clearance of -3 mm leaves no slot"},
		},
		{
			"member on one plate", func(j *job.Job) { framed(j); j.Frame.Plates = j.Frame.Plates[:1] },
			[]string{"cross members stand between two frame plates, and there is one"},
		},
		{
			"heights unknown", func(j *job.Job) { framed(j); j.Frame.Plates[1].Plane = 44 },
			[]string{"the heights of planes 0 and 44 are not known"},
		},
		{
			"bearing in a slot", func(j *job.Job) {
				framed(j)
				j.Linkage.Joints[1].Ground.Range = &linkage.Range{From: pt(80, 0), To: pt(84, 0)}
				*pin(j, "D") = job.Pin{Joint: "D", Kind: job.BearingPin, Bearing: "624", Bolt: "M4", Fit: "press", Seats: []string{"back"}}
			},
			[]string{"back: a bearing can't be pressed into a slot, and pivot D is adjustable"},
		},
		{
			"slot closes on itself", func(j *job.Job) {
				framed(j)
				j.Linkage.Joints[1].Ground.Range = &linkage.Range{Centre: pt(80, 4), Radius: 4, Start: -1.5707963, End: 4.6}
			},
			[]string{"back: the slot of pivot D, 4.5 mm wide, closes on itself"},
		},
	} {
		got := failing(t, fourBar(c.change))
		if got == "" {
			t.Errorf("%s: no error", c.name)
			continue
		}
		for _, want := range c.want {
			if !strings.Contains(got, want) {
				t.Errorf("%s:\n%s lacks\n%s", c.name, got, want)
			}
		}
	}
}

// All parts are looked at, every fault is told once, not once a copy.
func TestFaultsAtOnce(t *testing.T) {
	got := failing(t, fourBar(fourCopies, func(j *job.Job) {
		link(j, "crank").Width = 0
		link(j, "rocker").Width = 12
		link(j, "coupler").Foot = &job.Foot{At: "P", Radius: 4, Pen: 5}
	}))
	if n := strings.Count(got, "\n"); n != 3 {
		t.Errorf("%d faults, want hole D, hole B and the toe:\n%s", n, got)
	}
}

// A fault points into the job file.
func TestFaultsHavePlaces(t *testing.T) {
	const text = `job: a
linkage:
  joints: {O: {ground: [0mm, 0mm]}, D: {ground: [80mm, 0mm]}, A: {near: [25mm, 0mm]}, B: {near: [60mm, 62mm]}}
  links:
    crank: {pins: [O, A], length: 25mm, drive: full-turn, plane: 1}
    coupler: {pins: [A, B], length: 70mm, plane: 2}
    rocker:
      pins: [D, B]
      length: 65mm
      plane: 3
      width: 10mm
pins: {default: {bolt: M4, fit: medium}}
stock: {clear3: {material: cast acrylic, thickness: 3mm, sheet: [600mm, 400mm], margin: 5mm, kerf: 0.2mm}}
`
	j, err := job.Parse("a.yaml", []byte(text), nil)
	if err != nil {
		t.Fatal(err)
	}
	m, err := linkage.New(j.Linkage)
	if err != nil {
		t.Fatal(err)
	}
	_, err = Make(j, m, nil)
	if err == nil || !strings.HasPrefix(err.Error(), "a.yaml:11:") || !strings.Contains(err.Error(), "width: 10mm") {
		t.Errorf("%v", err)
	}
}
