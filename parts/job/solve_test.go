package job

import (
	"path/filepath"
	"testing"

	"pinwright/parts/linkage"
)

// TestJobsGoRound: every job of the repository, and the starter, closes over its whole drive.
func TestJobsGoRound(t *testing.T) {
	files, err := filepath.Glob(jobsDir + "/*.yaml")
	if err != nil || len(files) < 6 {
		t.Fatalf("%d job files, %v", len(files), err)
	}
	solve := func(j Job) {
		t.Helper()
		m, err := linkage.New(j.Linkage)
		if err != nil {
			t.Errorf("%s: %v", j.Name, err)
			return
		}
		if _, err := m.Cycle(72, nil); err != nil {
			t.Errorf("%s: %v", j.Name, err)
		}
	}
	for _, file := range files {
		j, err := Read(file)
		if err != nil {
			t.Errorf("%v", err)
			continue
		}
		solve(j)
	}
	j, err := Parse("starter.yaml", Starter(), nil)
	if err != nil {
		t.Fatal(err)
	}
	solve(j)
}
