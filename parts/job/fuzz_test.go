package job

import (
	"bytes"
	"errors"
	"os"
	"path/filepath"
	"strings"
	"testing"
	"unicode/utf8"
)

// sound fails on an error that is not of type Errors, or without a place in the text of its file.
func sound(t *testing.T, j Job, err error, files map[string][]byte) {
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
		text, known := files[e.File]
		if !known || e.Span < 1 || e.Message == "" {
			t.Fatalf("error without a place: %+v", e)
		}
		text = bytes.ReplaceAll(bytes.ReplaceAll(bytes.TrimPrefix(text, []byte("\xef\xbb\xbf")), []byte("\r\n"), []byte("\n")), []byte("\r"), []byte("\n"))
		lines := strings.Split(string(text), "\n")
		if e.Line < 1 || e.Line > len(lines) || e.Column < 1 || e.Column > 1+utf8.RuneCountInString(lines[e.Line-1]) {
			t.Fatalf("place outside of the file: %+v", e)
		}
		if e.Source != lines[e.Line-1] && e.Source != "" {
			t.Fatalf("the line is %q: %+v", lines[e.Line-1], e)
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
		files := map[string][]byte{"fuzz.yaml": data}
		j, err := Parse("fuzz.yaml", data, func(name string) ([]byte, error) {
			files[filepath.Clean(name)] = tables
			return tables, nil
		})
		sound(t, j, err, files)
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
		sound(t, j, err, map[string][]byte{name + ".yaml": job, name + ".csv": data})
	})
}

func FuzzLengthTable(f *testing.F) { fuzzTable(f, "watt-table") }

func FuzzCycleTable(f *testing.F) { fuzzTable(f, "fourbar-cycle") }
