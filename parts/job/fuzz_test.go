package job

import (
	"errors"
	"os"
	"path/filepath"
	"testing"
)

// sound fails on an error that is not of type Errors, or without a place in its file.
func sound(t *testing.T, j Job, err error) {
	t.Helper()
	if err == nil {
		complete(t, j)
		return
	}
	var all Errors
	if !errors.As(err, &all) || len(all) == 0 {
		t.Fatalf("error of another type: %v", err)
	}
	for _, e := range all {
		if e.File == "" || e.Line < 1 || e.Column < 1 || e.Span < 1 || e.Message == "" {
			t.Fatalf("error without a place: %+v", e)
		}
	}
	if len(err.Error()) == 0 {
		t.Fatal("no message")
	}
}

func FuzzParse(f *testing.F) {
	for _, pattern := range []string{jobsDir + "/*.yaml", "testdata/broken/*.yaml"} {
		files, err := filepath.Glob(pattern)
		if err != nil || len(files) == 0 {
			f.Fatalf("no seeds: %v", err)
		}
		for _, file := range files {
			data, err := os.ReadFile(file)
			if err != nil {
				f.Fatal(err)
			}
			f.Add(data)
		}
	}
	tables, err := os.ReadFile(filepath.Join(jobsDir, "watt-table.csv"))
	if err != nil {
		f.Fatal(err)
	}
	f.Fuzz(func(t *testing.T, data []byte) {
		j, err := Parse("fuzz.yaml", data, func(string) ([]byte, error) { return tables, nil })
		sound(t, j, err)
	})
}

// fuzzTable reads a job of the repository with another table.
func fuzzTable(f *testing.F, name string) {
	job, err := os.ReadFile(filepath.Join(jobsDir, name+".yaml"))
	if err != nil {
		f.Fatal(err)
	}
	table, err := os.ReadFile(filepath.Join(jobsDir, name+".csv"))
	if err != nil {
		f.Fatal(err)
	}
	f.Add(table)
	broken, err := filepath.Glob("testdata/broken/*.csv")
	if err != nil {
		f.Fatal(err)
	}
	for _, file := range broken {
		data, err := os.ReadFile(file)
		if err != nil {
			f.Fatal(err)
		}
		f.Add(data)
	}
	f.Fuzz(func(t *testing.T, data []byte) {
		j, err := Parse(name+".yaml", job, func(string) ([]byte, error) { return data, nil })
		sound(t, j, err)
	})
}

func FuzzLengthTable(f *testing.F) { fuzzTable(f, "watt-table") }

func FuzzCycleTable(f *testing.F) { fuzzTable(f, "fourbar-cycle") }
