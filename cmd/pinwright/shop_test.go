package main

import (
	"math"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"pinwright/export/dxf"
	"pinwright/parts/outline"
)

// Where the shop compensates, the drawings show finished sizes, and its beam takes a whole kerf beside
// each of them: web and margin are kept from there. Measured in the drawing.
func TestShopCompensates(t *testing.T) {
	text, err := os.ReadFile(filepath.Join(jobs, "chebyshev.yaml"))
	if err != nil {
		t.Fatal(err)
	}
	const kerf, margin, web = 0.4, 6.0, 4.0
	for _, old := range []string{"kerf: 0.18", "kerf: 0.22"} {
		text = []byte(strings.ReplaceAll(string(text), old+"}", old+", compensated-by: shop}"))
	}
	job := strings.NewReplacer("kerf: 0.18,", "kerf: 0.4,", "kerf: 0.22,", "kerf: 0.4,", "margin: 5", "margin: 6", "web: 3", "web: 4").Replace(string(text))
	if !strings.Contains(job, "kerf: 0.4, compensated-by: shop") {
		t.Fatalf("the job has changed: say anew how its kerf stands\n%s", job)
	}
	tmp := t.TempDir()
	file := filepath.Join(tmp, "shop.yaml")
	if err := os.WriteFile(file, []byte(job), 0o644); err != nil {
		t.Fatal(err)
	}
	out := filepath.Join(tmp, "out")
	if _, errs, status := shell("cut", file, "-o", out, "-q"); status != statusFine {
		t.Fatal(errs)
	}
	drawings, _ := filepath.Glob(filepath.Join(out, "*.dxf"))
	bolts := 0
	for _, name := range drawings {
		f, err := os.Open(name)
		if err != nil {
			t.Fatal(err)
		}
		d, err := dxf.Read(f)
		f.Close()
		if err != nil {
			t.Fatal(err)
		}
		var outer []outline.Region
		for _, e := range d.Entities {
			if e.Circle != nil && math.Abs(e.Circle.Radius-4.5/2) < 1e-9 { // ISO 273 medium M4, drawn at finished size
				bolts++
			}
			if e.Layer == dxf.LayerOutside {
				outer = append(outer, outline.Region{Outer: e.Closed})
			}
		}
		for i, a := range outer {
			if b := a.Bounds(); b.Min.X < margin+kerf-1e-6 || b.Min.Y < margin+kerf-1e-6 {
				t.Errorf("%s: a part at %v, the margin and the beam want %g", name, b.Min, margin+kerf)
			}
			for _, b := range outer[i+1:] {
				if got := outline.Between(a, b).Distance; got < web+2*kerf-1e-6 {
					t.Errorf("%s: parts %g mm apart, web and two beams want %g", name, got, web+2*kerf)
				}
			}
		}
	}
	if bolts == 0 {
		t.Error("no bolt hole at finished size in the drawings")
	}
}
