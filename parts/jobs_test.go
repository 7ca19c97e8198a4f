package parts

import (
	"fmt"
	"path/filepath"
	"reflect"
	"strings"
	"testing"

	"pinwright/parts/job"
	"pinwright/parts/linkage"
)

// levelsOf stacks the planes of a job with 5 mm from one to the next.
func levelsOf(j job.Job) []Level {
	seen := map[int]bool{}
	var out []Level
	add := func(plane int) {
		if !seen[plane] {
			seen[plane] = true
			out = append(out, Level{plane, 5 * float64(plane), 5*float64(plane) + 3})
		}
	}
	for _, l := range j.Links {
		add(l.Plane)
	}
	if j.Frame != nil {
		for _, p := range j.Frame.Plates {
			add(p.Plane)
		}
	}
	return out
}

// The project's own jobs, published linkages among them, become parts that hold.
func TestJobsBecomeParts(t *testing.T) {
	files, err := filepath.Glob("../testdata/jobs/*.yaml")
	if err != nil || len(files) == 0 {
		t.Fatal("there are no jobs", err)
	}
	for _, file := range files {
		j, err := job.Read(file)
		if err != nil {
			t.Errorf("%s: %v", file, err)
			continue
		}
		m, err := linkage.New(j.Linkage)
		if err != nil {
			t.Errorf("%s: %v", file, err)
			continue
		}
		all, err := Make(j, m, levelsOf(j))
		if err != nil {
			t.Errorf("%s: %v", file, err)
			continue
		}
		plates, crosses := 0, 0
		if j.Frame != nil {
			plates, crosses = len(j.Frame.Plates), len(j.Frame.Cross)
		}
		if want := len(j.Copies) * (len(j.Links) + plates + crosses); len(all) != want {
			t.Errorf("%s: %d parts, want %d", file, len(all), want)
		}
		names, marks := map[string]bool{}, map[string]bool{}
		for _, p := range all {
			if names[p.Name] || marks[p.Mark.Text] {
				t.Errorf("%s: %s, marked %s, is not the only one", file, p.Name, p.Mark.Text)
			}
			names[p.Name], marks[p.Mark.Text] = true, true
			if !strings.HasSuffix(p.Name, p.Link) || !strings.HasPrefix(p.Name, p.Copy) {
				t.Errorf("%s: %s is %s of %s", file, p.Name, p.Link, p.Copy)
			}
			holds(t, j, m, p)
		}
		again, err := Make(j, m, levelsOf(j))
		if err != nil || !reflect.DeepEqual(all, again) {
			t.Errorf("%s: made twice, it differs", file)
		}
	}
}

func ExampleMake() {
	j := fourBar(func(j *job.Job) { j.Copies = []job.Copy{{Name: "left"}} })
	m, err := linkage.New(j.Linkage)
	if err != nil {
		fmt.Println(err)
		return
	}
	all, err := Make(j, m, nil)
	if err != nil {
		fmt.Println(err)
		return
	}
	rocker := all[2]
	fmt.Println(rocker.Name, "of", rocker.Stock, "is marked", rocker.Mark.Text)
	for _, v := range rocker.Region.Outer {
		fmt.Printf("  (%.1f, %.1f) bulge %.1f\n", v.X, v.Y, v.Bulge)
	}
	for _, h := range rocker.Holes {
		fmt.Printf("hole %s: %.1f mm at (%.1f, %.1f)\n", h.Name, h.Diameter, h.Centre.X, h.Centre.Y)
	}
	link(&j, "rocker").Width = 12
	_, err = Make(j, m, nil)
	fmt.Println(err.(job.Errors)[0].Message)
	fmt.Println(err.(job.Errors)[0].Hint)
	// Output:
	// left.rocker of clear3 is marked LEFT ROCKER
	//   (0.0, -9.0) bulge 0.0
	//   (65.0, -9.0) bulge 1.0
	//   (65.0, 9.0) bulge 0.0
	//   (0.0, 9.0) bulge 1.0
	// hole D: 4.5 mm at (0.0, 0.0)
	// hole B: 4.5 mm at (65.0, 0.0)
	// link rocker: hole D (4.5 mm) leaves 3.75 mm to the edge; 3 mm cast acrylic wants 4.5 mm
	// widen it to 18 mm, at the least 13.5 mm, or leave the width out
}

func BenchmarkPartsOfTheDemo(b *testing.B) {
	j, err := job.Read("../testdata/jobs/demo.yaml")
	if err != nil {
		b.Fatal(err)
	}
	m, err := linkage.New(j.Linkage)
	if err != nil {
		b.Fatal(err)
	}
	for b.Loop() {
		if _, err := Make(j, m, levelsOf(j)); err != nil {
			b.Fatal(err)
		}
	}
}
