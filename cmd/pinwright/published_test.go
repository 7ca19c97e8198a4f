package main

import (
	"encoding/json"
	"math"
	"path/filepath"
	"strings"
	"testing"

	"pinwright/parts/outline"
)

// Every worked example goes together, with half a millimetre to spare at least, and goes the whole way.
func TestAllJobs(t *testing.T) {
	files, err := filepath.Glob(jobs + "*.yaml")
	if err != nil || len(files) < 6 {
		t.Fatalf("%d jobs, %v", len(files), err)
	}
	for _, f := range files {
		t.Run(strings.TrimSuffix(filepath.Base(f), ".yaml"), func(t *testing.T) {
			var found findings
			if err := json.Unmarshal([]byte(fine(t, "check", f, "--json")), &found); err != nil {
				t.Fatal(err)
			}
			if !found.OK {
				t.Errorf("it does not go together: %s", found.Error)
			}
			for _, g := range found.Gaps {
				if g.MM-g.Error < 0.5 {
					t.Errorf("%s and %s are %.2f mm apart at drive %.1f", g.A, g.B, g.MM, g.Drive)
				}
			}
			dir := filepath.Join(t.TempDir(), "out")
			fine(t, "cut", f, "-o", dir, "-q")
			fine(t, "proof", dir)
		})
	}
}

// The published lengths are in the drawings: as distances between the middles of circles, measured with
// nothing but the drawings. Circles stay where they are when the beam is allowed for.
//
// Jansen's leg has the eleven lengths a to k that Theo Jansen published for his beach animals, with l and m;
// a and l place one pivot of the frame from the other. Missing are h (65.7) and i (49), which end at the toe,
// where there is no hole.
//
// Chebyshev's lambda linkage has the published proportions crank 1, ground 2, coupler, its extension and rocker
// 2.5 each, here times 20 mm. The crank's bore and its place in the frame are left out: the bore has a flat, so
// that it is no circle, and its length is measured by the proof alone.
func TestPublishedLengthsInTheDrawings(t *testing.T) {
	for _, c := range []struct {
		job     string
		copies  int
		lengths map[string]float64
	}{
		{"jansen", 2, map[string]float64{
			"a, l": math.Hypot(38, 7.8), "b": 41.5, "c": 39.3, "d": 40.1, "e": 55.8, "f": 39.4, "g": 36.7,
			"j": 50, "k": 61.9, "m": 15,
		}},
		{"chebyshev", 1, map[string]float64{"ground": 40, "coupler": 50, "coupler and extension": 100}},
	} {
		dir := filepath.Join(t.TempDir(), c.job)
		fine(t, "cut", jobs+c.job+".yaml", "-o", dir, "-q")
		pairs := pairsOfHoles(t, dir)
		for name, want := range c.lengths {
			n := 0
			for _, p := range pairs {
				if math.Abs(p.apart-want) < 0.001 {
					n++
				}
			}
			if n < c.copies {
				t.Errorf("%s: %s: %d pairs of holes are %.4f mm apart, want %d", c.job, name, n, want, c.copies)
			}
		}
	}
}

// pair is two circles of one part: how far their middles are apart, and their diameters as drawn.
type pair struct{ apart, d1, d2 float64 }

// pairsOfHoles measures all pairs of circles that lie in the same outside cut, on every sheet.
func pairsOfHoles(t stopper, dir string) []pair {
	t.Helper()
	var out []pair
	for _, d := range sheetDrawings(t, dir) {
		for _, part := range d.Entities {
			if part.Layer != "CUT-OUTSIDE" {
				continue
			}
			var in []int
			for i, e := range d.Entities {
				if e.Circle != nil && e.Layer == "CUT-INSIDE" && part.Closed.Locate(e.Circle.Centre) == outline.Inside {
					in = append(in, i)
				}
			}
			for i, a := range in {
				for _, b := range in[i+1:] {
					p, q := d.Entities[a].Circle, d.Entities[b].Circle
					out = append(out, pair{p.Centre.Dist(q.Centre), 2 * p.Radius, 2 * q.Radius})
				}
			}
		}
	}
	return out
}
