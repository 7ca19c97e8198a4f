package job

import (
	"errors"
	"flag"
	"os"
	"path/filepath"
	"strings"
	"testing"
)

var update = flag.Bool("update", false, "write the messages of the broken job files anew; read every one of them")

// TestBrokenJobs reads every job file of testdata/broken and compares the whole message with the one
// beside it.
func TestBrokenJobs(t *testing.T) {
	files, err := filepath.Glob("testdata/broken/*.yaml")
	if err != nil || len(files) < 90 {
		t.Fatalf("%d broken job files, %v", len(files), err)
	}
	for _, file := range files {
		name := strings.TrimSuffix(filepath.Base(file), ".yaml")
		t.Run(name, func(t *testing.T) {
			data, err := os.ReadFile(file)
			if err != nil {
				t.Fatal(err)
			}
			j, err := Parse(filepath.Base(file), data, func(table string) ([]byte, error) {
				return os.ReadFile(filepath.Join("testdata/broken", table))
			})
			var all Errors
			if !errors.As(err, &all) {
				t.Fatalf("read without error, or with one of another type: %v", err)
			}
			if j.Name != "" || j.Links != nil {
				t.Error("a job came with the error")
			}
			for _, e := range all {
				if e.File == "" || e.Line < 1 || e.Column < 1 || e.Message == "" {
					t.Errorf("error without a place or a message: %+v", e)
				}
			}
			golden := strings.TrimSuffix(file, ".yaml") + ".txt"
			got := err.Error() + "\n"
			if *update {
				if err := os.WriteFile(golden, []byte(got), 0o644); err != nil {
					t.Fatal(err)
				}
				return
			}
			want, err := os.ReadFile(golden)
			if err != nil {
				t.Fatal(err)
			}
			if got != string(want) {
				t.Errorf("got\n%s\nwant\n%s", got, want)
			}
		})
	}
}
