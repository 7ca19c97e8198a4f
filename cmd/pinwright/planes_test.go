package main

import (
	"os"
	"path/filepath"
	"regexp"
	"strings"
	"testing"
)

// noPlane takes the planes out of a job file.
var noPlane = regexp.MustCompile(`(?m)^ *plane: -?[0-9]+\n|, *plane: -?[0-9]+|plane: -?[0-9]+(, *)?`)

// Jobs that state no plane at all go the whole way: planes found and proven, every gap certified, cut
// and proved. The six-bar is Klann's leg (five links and the frame), the eight-bar Jansen's.
func TestJobsWithoutPlanes(t *testing.T) {
	for _, name := range []string{"jansen", "klann", "chebyshev", "watt-table", "demo"} {
		t.Run(name, func(t *testing.T) {
			dir := t.TempDir()
			data, err := os.ReadFile(jobs + name + ".yaml")
			if err != nil {
				t.Fatal(err)
			}
			tables, _ := filepath.Glob(jobs + "*.csv")
			for _, table := range tables {
				text, err := os.ReadFile(table)
				if err != nil {
					t.Fatal(err)
				}
				if err := os.WriteFile(filepath.Join(dir, filepath.Base(table)), text, 0o644); err != nil {
					t.Fatal(err)
				}
			}
			text := noPlane.ReplaceAll(data, nil)
			if len(text) == len(data) {
				t.Fatal("no plane was taken out")
			}
			file := filepath.Join(dir, name+".yaml")
			if err := os.WriteFile(file, text, 0o644); err != nil {
				t.Fatal(err)
			}
			out, errs, status := shell("check", file)
			if status != statusFine || !strings.Contains(out, "optimal, proven") || !strings.Contains(out, "it goes together") {
				t.Fatalf("status %d\n%s%s", status, out, errs)
			}
			if _, errs, status := shell("cut", file, "-o", filepath.Join(dir, "out"), "-q"); status != statusFine {
				t.Fatalf("status %d\n%s", status, errs)
			}
			if _, errs, status := shell("proof", filepath.Join(dir, "out")); status != statusFine {
				t.Errorf("status %d\n%s", status, errs)
			}
		})
	}
}
