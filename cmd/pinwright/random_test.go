package main

import (
	"flag"
	"fmt"
	"math"
	"os"
	"path/filepath"
	"regexp"
	"slices"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"pinwright/parts/outline"
)

// wild is a job made up at random: a four-bar with a traced point on its coupler, and what the test measures.
type wild struct {
	text                   string
	crank, coupler, rocker float64
	ground                 float64 // between the pivots; 0: there is no frame, or a slot in it
	flat                   bool    // the crank's bore has a flat: it is no circle
	copies                 int
	hole                   float64 // finished diameter at joint A
	kerf                   float64
}

// clearanceHoles are the diameters of ISO 273, fine, medium, coarse (as three public tables have them).
var clearanceHoles = map[string][3]float64{
	"M2.5": {2.7, 2.9, 3.1}, "M3": {3.2, 3.4, 3.6}, "M4": {4.3, 4.5, 4.8}, "M5": {5.3, 5.5, 5.8}, "M6": {6.4, 6.6, 7.0},
}

// wildJob draws a job. Most are sound; some do not turn, do not fit their sheet or have parts in the way.
func wildJob(t *rapid.T) wild {
	mm := func(name string, from, to float64) float64 {
		return math.Round(100*rapid.Float64Range(from, to).Draw(t, name)) / 100
	}
	pick := func(name string, from ...string) string { return rapid.SampledFrom(from).Draw(t, name) }
	often := func(name string) bool { return rapid.IntRange(0, 3).Draw(t, name) > 0 }

	// Grashof's rule makes the crank turn: it is the shortest, and together with the longest shorter than the
	// other two (F. Grashof, Theoretische Maschinenlehre, 1883). Some break it.
	w := wild{crank: mm("crank", 15, 35)}
	w.coupler = w.crank + mm("coupler", 25, 60)
	w.rocker = w.crank + mm("rocker", 25, 60)
	ground := math.Abs(w.coupler-w.rocker) + w.crank + mm("ground", 8, 30)
	if rapid.IntRange(0, 9).Draw(t, "grashof") == 0 {
		ground = mm("any ground", 20, 120)
	}
	lean := mm("lean", -180, 180) * math.Pi / 180
	at := func(p outline.Point, r, a float64) outline.Point {
		return outline.Point{X: p.X + r*math.Cos(a), Y: p.Y + r*math.Sin(a)}
	}
	o := outline.Point{}
	d := at(o, ground, lean)
	d.X, d.Y = math.Round(d.X*100)/100, math.Round(d.Y*100)/100
	ground = d.Dist(o)
	a := outline.Point{X: w.crank}
	s := a.Dist(d)
	open := math.Acos(max(-1, min(1, (s*s+w.rocker*w.rocker-w.coupler*w.coupler)/(2*s*w.rocker))))
	if rapid.Bool().Draw(t, "other way") {
		open = -open
	}
	b := at(d, w.rocker, math.Atan2(a.Y-d.Y, a.X-d.X)-open)
	ap, bp := w.coupler+mm("A-P", -8, 30), mm("B-P", 12, 50)
	if ap >= w.coupler+bp-0.5 || bp >= w.coupler+ap-0.5 {
		ap = math.Hypot(w.coupler, bp)
	}
	turn := math.Acos(max(-1, min(1, (w.coupler*w.coupler+ap*ap-bp*bp)/(2*w.coupler*ap))))
	p := at(a, ap, math.Atan2(b.Y-a.Y, b.X-a.X)+turn)

	bolt := pick("bolt", "M2.5", "M3", "M3", "M4", "M4", "M5", "M6")
	fit := rapid.IntRange(0, 2).Draw(t, "fit")
	w.hole, w.kerf = clearanceHoles[bolt][fit], mm("kerf", 0.05, 0.4)
	thick := mm("thickness", 1.5, 5)

	var y strings.Builder
	line := func(format string, args ...any) { fmt.Fprintf(&y, format+"\n", args...) }
	line("job: wild\nunits: {length: mm, angle: deg}\nlinkage:\n  joints:")
	pivot := fmt.Sprintf("[%g, %g]", d.X, d.Y)
	slot := rapid.IntRange(0, 5).Draw(t, "slot") == 0
	if slot {
		reach := mm("reach", 0.5, 4)
		pivot = fmt.Sprintf("{from: [%.2f, %g], to: [%.2f, %[2]g], at: [%[4]g, %[2]g]}", d.X-reach, d.Y, d.X+reach, d.X)
	}
	line("    O: {ground: [0, 0]}\n    D: {ground: %s}", pivot)
	for i, n := range []outline.Point{a, b, p} {
		line("    %s: {near: [%.1f, %.1f]}", []string{"A", "B", "P"}[i], n.X, n.Y)
	}
	line("  links:")
	w.flat = !often("round bore")
	bores, shaft := "", pick("shaft", "4", "5", "6")
	if w.flat {
		bores, shaft = ", bores: {O: {d: 6, flat: 5.5}}", "6"
	}
	line("    crank: {pins: [O, A], length: %g, drive: full-turn, plane: 2, shape: %s%s}", w.crank,
		pick("crank's shape", "crank-arm", "crank-arm, phase-mark: true", "bar", "disc, phase-mark: true"), bores)
	line("    coupler: {pins: [A, B, P], lengths: {A-B: %g, B-P: %g, A-P: %g}, plane: 3, shape: %s, foot: {at: P, radius: %g}}",
		w.coupler, bp, ap, pick("coupler's shape", "plate", "spider", "plate, windows: true", "spider, fillet: 4"), mm("toe", 6, 14))
	plane, shape := 4, pick("rocker's shape", "bar", "waisted", "bent, bend: 6")
	if !often("rocker in front") {
		plane = 2
	}
	if shape == "waisted" {
		shape = fmt.Sprintf("waisted, width: %g, waist: %g", mm("width", 18, 24), mm("waist", 8, 16))
	}
	line("    rocker: {pins: [D, B], length: %g, plane: %d, shape: %s}", w.rocker, plane, shape)
	line("  trace: [P]")
	if often("frame") {
		if !slot {
			w.ground = ground
		}
		line("frame:\n  plates:\n    back: {plane: 0}")
		if !often("one plate") {
			line("    front: {plane: 6, pivots: [D]}")
			if rapid.Bool().Draw(t, "cross member") {
				line("  cross: [{at: [%g, %g], width: %g, angle: %g, tabs: %d}]", d.X+mm("cross x", -20, 60), d.Y+mm("cross y", -60, 60),
					mm("cross width", 25, 40), mm("cross angle", 0, 180), rapid.IntRange(1, 2).Draw(t, "tabs"))
			}
		}
	}
	w.copies = 1
	switch pick("copies", "none", "none", "two", "mirrored") {
	case "two":
		w.copies = 2
		line("copies: [{name: twin, count: 2, phase: [0, %g]}]", mm("phase", 10, 350))
	case "mirrored":
		w.copies = 2
		line("copies: [{name: left}, {name: right, mirror: true, phase: %g}]", mm("phase", 0, 350))
	}
	line("pins:\n  default: {bolt: %s, fit: %s}", bolt, []string{"fine", "medium", "coarse"}[fit])
	line("  O: {shaft: %s, fit: push}", shaft)
	if !often("no bearing") {
		line("  B: {bearing: %s, fit: press, in: [%s]}", pick("bearing", "623", "624", "MR105"), pick("seat", "rocker", "coupler"))
	}
	line("stock:\n  sheet: {material: %s, thickness: %g, sheet: [%g, %g], quantity: %d, margin: %g, web: %g, kerf: %g, grain: %s}",
		pick("material", "cast acrylic", "birch plywood", "MDF", "POM", "aluminium"), thick,
		math.Round(mm("sheet's width", 150, 500)), math.Round(mm("sheet's height", 150, 400)), rapid.IntRange(1, 3).Draw(t, "quantity"),
		mm("margin", 2, 10), mm("web", 1.5, 6), w.kerf, pick("grain", "none", "half-turn", "quarter-turn", "fixed"))
	w.text = y.String()
	return w
}

var placed = regexp.MustCompile(`^pinwright: \S*wild\.yaml:\d+:\d+: \S`)

// Whatever the job, it is refused with its place in the file and nothing is written, or it is cut: then the
// proof holds, and every length and every hole is in the drawings, measured with nothing but their circles.
func TestEveryCutSheetPassesTheProof(t *testing.T) {
	// A run of the whole program takes longer than what rapid counts on.
	if f := flag.Lookup("rapid.checks"); f.Value.String() == f.DefValue {
		if err := f.Value.Set("40"); err != nil {
			t.Fatal(err)
		}
		defer func() { _ = f.Value.Set(f.DefValue) }()
	}
	tmp := t.TempDir()
	ran, cut := 0, 0
	rapid.Check(t, func(t *rapid.T) {
		w := wildJob(t)
		file, dir := filepath.Join(tmp, "wild.yaml"), filepath.Join(tmp, "out")
		if err := os.WriteFile(file, []byte(w.text), 0o600); err != nil {
			t.Fatal(err)
		}
		if err := os.RemoveAll(dir); err != nil {
			t.Fatal(err)
		}
		ran++
		out, errs, status := shell("cut", file, "-o", dir)
		switch {
		case status == statusRefused:
			if _, err := os.Stat(dir); err == nil || out != "" || !placed.MatchString(errs) || strings.Contains(errs, "fault of Pinwright") {
				t.Fatalf("refused, but prints %q and says %q to\n%s", out, errs, w.text)
			}
			t.Logf("refused: %s", errs)
			return
		case status != statusFine || errs != "":
			t.Fatalf("status %d, says %q to\n%s", status, errs, w.text)
		}
		cut++
		if out, errs, status := shell("proof", dir); status != statusFine {
			t.Fatalf("the proof fails:\n%s%s\n%s", out, errs, w.text)
		}
		w.measure(t, dir)
	})
	t.Logf("%d of %d jobs were cut", cut, ran)
	if !t.Failed() && ran >= 40 && cut < ran/8 {
		t.Errorf("only %d of %d jobs were cut: the test looks at too little", cut, ran)
	}
}

// measure looks for the lengths of the job in its drawings, and for the holes at joint A.
func (w wild) measure(t *rapid.T, dir string) {
	pairs := pairsOfHoles(t, dir)
	for name, want := range map[string]float64{"crank": w.crank, "coupler": w.coupler, "rocker": w.rocker, "ground": w.ground} {
		found := 0
		for _, p := range pairs {
			if math.Abs(p.apart-want) > 0.001 {
				continue
			}
			holes := []float64{p.d1 + w.kerf, p.d2 + w.kerf}
			atA := slices.ContainsFunc(holes, func(d float64) bool { return math.Abs(d-w.hole) < 0.001 })
			if atA || name == "rocker" || name == "ground" {
				found++
			}
		}
		if name == "crank" && w.flat {
			continue
		}
		if want > 0 && found < w.copies {
			t.Fatalf("%s: %d pairs of holes are %g mm apart, want %d, in\n%s", name, found, want, w.copies, w.text)
		}
	}
}
