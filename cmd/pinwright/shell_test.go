package main

import (
	"bytes"
	"context"
	"io/fs"
	"os"
	"path/filepath"
	"testing"

	"pinwright/export/dxf"
)

// jobs is where the worked examples are.
const jobs = "../../testdata/jobs/"

// shell runs the program, away from any terminal, and returns what it prints and its exit status.
func shell(args ...string) (out, err string, status int) {
	var o, e bytes.Buffer
	status = run(context.Background(), args, terminal{out: &o, err: &e})
	return o.String(), e.String(), status
}

// fine runs the program and stops the test unless all went well. It returns what was printed.
func fine(t testing.TB, args ...string) string {
	t.Helper()
	out, errs, status := shell(args...)
	if status != statusFine || errs != "" {
		t.Fatalf("%v: status %d\n%s%s", args, status, out, errs)
	}
	return out
}

// written puts a text into a file of a temporary directory and returns its path.
func written(t testing.TB, name, text string) string {
	t.Helper()
	path := filepath.Join(t.TempDir(), name)
	if err := os.WriteFile(path, []byte(text), 0o600); err != nil {
		t.Fatal(err)
	}
	return path
}

// contents reads all files below a directory, by their path in it.
func contents(t testing.TB, dir string) map[string]string {
	t.Helper()
	out := map[string]string{}
	err := filepath.WalkDir(dir, func(path string, d fs.DirEntry, err error) error {
		if err != nil || d.IsDir() {
			return err
		}
		data, err := os.ReadFile(path)
		name, _ := filepath.Rel(dir, path)
		out[filepath.ToSlash(name)] = string(data)
		return err
	})
	if err != nil {
		t.Fatal(err)
	}
	return out
}

// absent makes sure that nothing is at a path.
func absent(t testing.TB, path string) {
	t.Helper()
	if _, err := os.Lstat(path); err == nil {
		t.Errorf("%s is there", filepath.Base(path))
	}
}

// stopper is a test, or one run of a random test.
type stopper interface {
	Helper()
	Fatalf(format string, args ...any)
}

// sheetDrawings reads the drawings of sheets in a directory, by name, in the order of their names.
func sheetDrawings(t stopper, dir string) []dxf.Drawing {
	t.Helper()
	names, err := filepath.Glob(filepath.Join(dir, "*.dxf"))
	if err != nil || len(names) == 0 {
		t.Fatalf("no drawings in %s (%v)", dir, err)
	}
	out := make([]dxf.Drawing, len(names))
	for i, name := range names {
		data, err := os.ReadFile(name)
		if err != nil {
			t.Fatalf("%s: %v", name, err)
		}
		if out[i], err = dxf.Read(bytes.NewReader(data)); err != nil {
			t.Fatalf("%s: %v", name, err)
		}
	}
	return out
}
