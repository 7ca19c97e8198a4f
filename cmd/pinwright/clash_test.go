package main

import (
	"encoding/json"
	"fmt"
	"math"
	"os"
	"path/filepath"
	"regexp"
	"strconv"
	"strings"
	"testing"

	"pinwright/parts/outline"
)

// nearMiss is a crank-rocker whose crank and rocker lie on one plane and pass each other closely when the
// crank points along the ground, and nowhere else. Both are bars of the width. Own choice of lengths:
// crank 25, coupler 60, rocker 55, ground 45.
func nearMiss(width float64) string {
	return fmt.Sprintf(`job: near-miss
units: {length: mm, angle: deg}
linkage:
  joints:
    O: {ground: [0, 0]}
    D: {ground: [45, 0]}
    A: {near: [25, 0]}
    B: {near: [41, 55]}
  links:
    crank: {pins: [O, A], length: 25, drive: full-turn, plane: 2, shape: bar, width: %[1]g}
    coupler: {pins: [A, B], length: 60, plane: 3}
    rocker: {pins: [D, B], length: 55, plane: 2, width: %[1]g}
  trace: [B]
frame:
  plates: {back: {plane: 0}}
pins:
  default: {bolt: M3, fit: medium}
  O: {shaft: 5, fit: push}
stock:
  clear3: {material: cast acrylic, thickness: 3, sheet: [300, 200], margin: 5, kerf: 0.2}
`, width)
}

// apart is how far the middle lines of crank and rocker are apart at a drive angle, by the law of cosines.
func apart(deg float64) float64 {
	at := func(p outline.Point, r, a float64) outline.Point {
		return outline.Point{X: p.X + r*math.Cos(a), Y: p.Y + r*math.Sin(a)}
	}
	o, d := outline.Point{}, outline.Point{X: 45}
	a := at(o, 25, deg*math.Pi/180)
	s := a.Dist(d)
	b := at(d, 55, math.Atan2(a.Y-d.Y, a.X-d.X)-math.Acos((s*s+55*55-60*60)/(2*s*55)))
	// Two segments that do not cross are nearest at an end of one of them.
	to := func(p, u, v outline.Point) float64 {
		x, y := v.X-u.X, v.Y-u.Y
		k := math.Max(0, math.Min(1, ((p.X-u.X)*x+(p.Y-u.Y)*y)/(x*x+y*y)))
		return p.Dist(outline.Point{X: u.X + k*x, Y: u.Y + k*y})
	}
	return min(to(o, d, b), to(a, d, b), to(d, o, a), to(b, o, a))
}

// Links on one plane that touch within a few degrees only are found, named with the angle, and refused by check
// and cut alike; slimmer ones pass, and the gap is what closed form says.
func TestPlantedClash(t *testing.T) {
	least, from, to := math.Inf(1), 0.0, 0.0
	for i := -1800; i <= 1800; i++ {
		deg := float64(i) / 10
		d := apart(deg)
		least = min(least, d)
		if d < 20.4 {
			from, to = min(from, deg), max(to, deg)
		}
	}
	if to-from > 15 || to-from < 2 {
		t.Fatalf("they touch from %.1f to %.1f deg: not the clash that was meant", from, to)
	}
	file := written(t, "near-miss.yaml", nearMiss(20.4))
	dir := filepath.Join(t.TempDir(), "out")
	touch := regexp.MustCompile(`near-miss\.yaml:10:12: crank and rocker touch at drive angle ([\d.]+) deg`)
	for _, args := range [][]string{{"check", file}, {"cut", file, "-o", dir}} {
		_, errs, status := shell(args...)
		m := touch.FindStringSubmatch(errs)
		if status != statusRefused || m == nil || !strings.Contains(errs, "put one of them on another plane") {
			t.Fatalf("%v: status %d, says %q", args, status, errs)
		}
		deg, _ := strconv.ParseFloat(m[1], 64)
		if d := apart(deg); d > 20.4 {
			t.Errorf("at %.1f deg they are still %.2f mm apart", deg, d-20.4)
		}
	}
	absent(t, dir)

	var found findings
	if err := json.Unmarshal([]byte(fine(t, "check", "--json", written(t, "near-miss.yaml", nearMiss(19)))), &found); err != nil {
		t.Fatal(err)
	}
	g := found.Gaps[0]
	if g.A != "crank" || g.B != "rocker" || math.Abs(g.MM-(least-19)) > g.Error+1e-3 || g.Error > 0.1 {
		t.Errorf("the least gap is %+v, want crank and rocker with %.4f mm", g, least-19)
	}
}

// In Jansen's leg rocker and tie pass on one plane; at their usual width they touch near 191 degrees.
func TestClashOfAWiderJansen(t *testing.T) {
	text, err := os.ReadFile(jobs + "jansen.yaml")
	if err != nil {
		t.Fatal(err)
	}
	wide := strings.ReplaceAll(string(text), "plane: 3, width: 12}", "plane: 3}")
	if wide == string(text) {
		t.Fatal("the job has changed: plant the clash anew")
	}
	_, errs, status := shell("check", written(t, "clash.yaml", wide))
	if status != statusRefused || !strings.Contains(errs, "rocker and tie touch at drive angle 19") || !strings.Contains(errs, "clash.yaml:") {
		t.Errorf("status %d: %s", status, errs)
	}
}
