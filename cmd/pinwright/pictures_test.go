package main

import (
	"bytes"
	"context"
	"flag"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"

	"pinwright/export/files"
	"pinwright/parts"
	"pinwright/parts/material"
	"pinwright/parts/stack"
)

var update = flag.Bool("update", false, "write the pictures of the README anew from the demo")

// The pictures of the README are those that the demo writes. After a change of what is drawn:
//
//	go test ./cmd/pinwright -run ReadmePictures -update
func TestReadmePictures(t *testing.T) {
	p := planned(t, "demo.yaml")
	if err := p.arrange(context.Background(), 1, func(done, all int) {}); err != nil {
		t.Fatal(err)
	}
	set, err := p.pictures()
	if err != nil {
		t.Fatal(err)
	}
	for name, from := range map[string]string{
		"layout.svg": "sheet-clear3-1.svg",
		"side.svg":   "side.svg",
		"front.svg":  "front.svg",
	} {
		i := slices.IndexFunc(set, func(f files.File) bool { return f.Name == "pictures/"+from })
		if i < 0 {
			t.Fatalf("the demo has no pictures/%s", from)
		}
		want := set[i].Data
		path := filepath.Join("..", "..", "testdata", "pictures", name)
		if *update {
			if err := os.WriteFile(path, want, 0o644); err != nil {
				t.Fatal(err)
			}
		}
		if got, err := os.ReadFile(path); err != nil || !bytes.Equal(got, want) {
			t.Errorf("%s is not what the demo draws (%v): run the test with -update", path, err)
		}
	}
}

// planned works a job out as far as the papers need it.
func planned(t *testing.T, name string) plan {
	t.Helper()
	j, sum, err := readJob(filepath.Join("..", "..", "testdata", "jobs", name))
	if err != nil {
		t.Fatal(err)
	}
	p, err := buildable(j)
	if err != nil {
		t.Fatal(err)
	}
	p.sum = sum
	return p
}

// In the steps of every job each element of the kits is in one step, each part of the copy in one, and
// every text names things of the hardware.
func TestStepsOfJobs(t *testing.T) {
	for _, name := range []string{"demo.yaml", "jansen.yaml", "klann.yaml", "chebyshev.yaml", "watt-table.yaml", "fourbar-cycle.yaml"} {
		p := planned(t, name)
		a, err := p.assembling()
		if err != nil {
			t.Errorf("%s: %v", name, err)
			continue
		}
		if len(a.steps) != len(p.firstParts()) {
			t.Errorf("%s: %d steps for %d parts", name, len(a.steps), len(p.firstParts()))
		}
		for _, k := range p.firstKits() {
			for i, e := range k.Elements {
				if n := a.stepOf(k.Joint, i); (n == 0) != (e.Kind == stack.HeadElement) {
					t.Errorf("%s: joint %s: %s %s is in step %d", name, k.Joint, e.Kind, e.What, n)
				}
			}
		}
		for _, s := range a.steps {
			i := slices.IndexFunc(p.parts, func(part parts.Part) bool { return part.Name == s.Part })
			if !strings.HasPrefix(s.Takes(), p.parts[i].Mark.Text) {
				t.Errorf("%s: step %d takes %s, which is marked %s", name, s.Number, s.Takes(), p.parts[i].Mark.Text)
			}
			if words := strings.Join(s.Words(), " "); words == "" || strings.Contains(words, "  ") {
				t.Errorf("%s: step %d says %q", name, s.Number, words)
			}
		}
	}
}

// The parts stand in the scene where the linkage says: the hole of every joint of a part is at the joint,
// in a mirrored copy as well.
func TestSceneStands(t *testing.T) {
	for _, mirror := range []bool{false, true} {
		p := planned(t, "demo.yaml")
		if mirror {
			// The copies of the right hand first.
			slices.Reverse(p.job.Copies)
			if !p.job.Copies[0].Mirror {
				t.Fatal("the demo's last copy is not mirrored")
			}
		}
		s := p.scene()
		seen := 0
		for i, part := range p.firstParts() {
			for _, h := range part.Holes {
				for _, j := range s.Joints {
					if h.Joint != j.Name {
						continue
					}
					seen++
					if away := s.Bodies[i].At.Apply(h.Centre).Dist(j.At); away > 1e-9 {
						t.Errorf("mirrored %v: %s: hole %s is %g mm from its joint", mirror, part.Name, h.Name, away)
					}
				}
			}
		}
		if seen < 8 {
			t.Errorf("only %d holes have a joint", seen)
		}
	}
}

// No caution stands twice, and none of those that materials have is lost: each stands with the material's name
// or is one of the general ones.
func TestCautionsOnce(t *testing.T) {
	p := planned(t, "demo.yaml")
	list := p.cautions()
	all := strings.Join(list, "\n")
	said := map[string]bool{}
	for _, s := range p.job.Stock {
		m, err := material.Lookup(s.Material)
		if err != nil {
			t.Fatal(err)
		}
		for _, c := range m.Cautions {
			said[c] = true
			if n := strings.Count(all, c); n != 1 && !slices.Contains(saidInGeneral[:], c) {
				t.Errorf("%q stands %d times", c, n)
			}
		}
	}
	// What the general ones are said to hold is what materials say, word for word, and is in them.
	for _, c := range saidInGeneral {
		if !said[c] {
			t.Errorf("no material of the demo says %q any more", c)
		}
	}
	for _, words := range []string{"never leave a running laser alone", "fire extinguisher at hand", "unhealthy fumes", "extraction"} {
		if n := strings.Count(all, words); n != 1 {
			t.Errorf("%q stands %d times", words, n)
		}
	}
}
