package main

import (
	"bytes"
	"context"
	"os"
	"path/filepath"
	"runtime"
	"strings"
	"testing"
)

// The demo goes the whole way: everything is there that the README speaks of, and the proof holds.
func TestCutDemo(t *testing.T) {
	dir := filepath.Join(t.TempDir(), "out")
	said := fine(t, "cut", jobs+"demo.yaml", "-o", dir)
	if want := "24 parts with 72 holes on 2 drawings agree with the linkage"; !strings.Contains(said, want) {
		t.Errorf("the proof does not say %q:\n%s", want, said)
	}
	got := contents(t, dir)
	want := []string{
		"manifest.json", "parts.csv", "hardware.csv", "path.csv", "papers.pdf",
		"sheet-clear3-1.dxf", "sheet-clear3-1.pdf", "sheet-clear3-1.svg",
		"sheet-birch4-1.dxf", "sheet-birch4-1.pdf", "sheet-birch4-1.svg",
		"pictures/side.svg", "pictures/front.svg", "pictures/planes.svg",
		"pictures/sheet-clear3-1.svg", "pictures/sheet-birch4-1.svg",
	}
	for _, name := range want {
		if got[name] == "" {
			t.Errorf("%s is missing or empty", name)
		}
	}
	if len(got) != len(want) {
		t.Errorf("%d files, want %d", len(got), len(want))
	}
	fine(t, "proof", dir)
	if said := fine(t, "check", jobs+"demo.yaml"); !strings.Contains(said, "24 in 4 copies, all can be cut") || !strings.Contains(said, "it goes together") {
		t.Errorf("check says\n%s", said)
	}
}

// The same job gives the same bytes: again into the same directory, into another, on one core and on several.
func TestCutSameBytes(t *testing.T) {
	tmp := t.TempDir()
	dir := filepath.Join(tmp, "out")
	cut := func(dir string, cores int) map[string]string {
		defer runtime.GOMAXPROCS(runtime.GOMAXPROCS(cores))
		fine(t, "cut", jobs+"demo.yaml", "-o", dir, "-q", "--part-files")
		return contents(t, dir)
	}
	first := cut(dir, 1)
	for what, second := range map[string]map[string]string{
		"on two cores": cut(dir, 2), "in another directory": cut(filepath.Join(tmp, "else where"), 2),
	} {
		if len(first) != len(second) {
			t.Errorf("%s: %d files, were %d", what, len(second), len(first))
		}
		for name, text := range first {
			if second[name] != text {
				t.Errorf("%s: %s differs", what, name)
			}
		}
	}
}

// A rerun takes away what an earlier run wrote and leaves the maker's own files alone.
func TestCutAgain(t *testing.T) {
	dir := filepath.Join(t.TempDir(), "out")
	fine(t, "cut", jobs+"demo.yaml", "-o", dir, "-q")
	if err := os.WriteFile(filepath.Join(dir, "note.txt"), []byte("mine"), 0o600); err != nil {
		t.Fatal(err)
	}
	fine(t, "cut", jobs+"chebyshev.yaml", "-o", dir, "-q")
	after := contents(t, dir)
	if after["note.txt"] != "mine" {
		t.Error("the maker's file is gone")
	}
	for name := range after {
		if strings.Contains(name, "birch4") {
			t.Errorf("%s of the run before is still there", name)
		}
	}
	fine(t, "proof", dir)
}

// What cannot be built is refused before anything is written, and a directory of somebody else's is not touched.
func TestCutWritesNothing(t *testing.T) {
	demo, err := os.ReadFile(jobs + "demo.yaml")
	if err != nil {
		t.Fatal(err)
	}
	swap := func(old, new string) string {
		text := strings.ReplaceAll(string(demo), old, new)
		if text == string(demo) {
			t.Fatalf("the demo says %q no more", old)
		}
		return text
	}
	for _, c := range []struct{ what, text, says string }{
		{"a key that is none", swap("trace:", "tracing:"), "tracing"},
		{"a loop that does not close", swap("length: 20", "length: 120"), "do not meet at drive angle"},
		{"two links of a joint on one plane", swap("plane: 4", "plane: 3"), "both lie on plane 3"},
		{"a sheet that is too small", swap("sheet: [300, 200]", "sheet: [80, 60]"), "too large: use a larger sheet"},
		{"too few sheets", swap("sheet: [300, 200], quantity: 2", "sheet: [150, 80], quantity: 1"), "clear3"},
		{"a kerf wider than a hole", swap("pen: 8", "pen: 0.15"), "pen"},
		{"a plastic that gives off chlorine", swap("cast acrylic", "PVC"), "chlorine"},
	} {
		t.Run(c.what, func(t *testing.T) {
			file := written(t, "job.yaml", c.text)
			dir := filepath.Join(t.TempDir(), "out")
			out, errs, status := shell("cut", file, "-o", dir)
			if status != statusRefused || out != "" || !strings.Contains(errs, c.says) || !strings.Contains(errs, "job.yaml:") {
				t.Errorf("status %d, prints %q, says %q, want %q", status, out, errs, c.says)
			}
			absent(t, dir)
		})
	}
}

func TestCutLeavesForeignDirectories(t *testing.T) {
	dir := t.TempDir()
	if err := os.WriteFile(filepath.Join(dir, "thesis.tex"), []byte("mine"), 0o600); err != nil {
		t.Fatal(err)
	}
	out, errs, status := shell("cut", jobs+"watt-table.yaml", "-o", dir)
	if status != statusSystem || out != "" || !strings.Contains(errs, "thesis.tex") || !strings.Contains(errs, "choose another directory") {
		t.Errorf("status %d, prints %q, says %q", status, out, errs)
	}
	if got := contents(t, dir); len(got) != 1 || got["thesis.tex"] != "mine" {
		t.Errorf("%d files are in it now", len(got))
	}
}

// Interrupted before it began, a run writes nothing.
func TestCutInterrupted(t *testing.T) {
	dir := filepath.Join(t.TempDir(), "out")
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	var o, e bytes.Buffer
	status := run(ctx, []string{"cut", jobs + "demo.yaml", "-o", dir}, terminal{out: &o, err: &e})
	if status != statusRefused || o.Len() != 0 || !strings.Contains(e.String(), "interrupted") {
		t.Errorf("status %d, prints %q, says %q", status, o.String(), e.String())
	}
	absent(t, dir)
}

// With --part-files every part has a drawing of its own, and the proof looks at them as well.
func TestCutPartFiles(t *testing.T) {
	dir := filepath.Join(t.TempDir(), "out")
	fine(t, "cut", jobs+"demo.yaml", "-o", dir, "-q", "--part-files")
	parts, err := filepath.Glob(filepath.Join(dir, "parts", "*.dxf"))
	if err != nil || len(parts) != 24 {
		t.Fatalf("%d drawings of parts, want 24 (%v)", len(parts), err)
	}
	if said := fine(t, "proof", dir); !strings.Contains(said, "on 2 drawings, and 24 drawings of single parts") {
		t.Errorf("the proof does not look at the drawings of the parts:\n%s", said)
	}
	edit(t, filepath.Join(dir, "parts", "right-2.rocker.dxf"))
	if out, _, status := shell("proof", dir); status != statusRefused || !strings.Contains(out, "parts/right-2.rocker.dxf") {
		t.Errorf("status %d after an edit:\n%s", status, out)
	}
}

// edit changes the first coordinate of a drawing that lies in an outline by some tenths of a millimetre.
func edit(t *testing.T, path string) {
	t.Helper()
	text, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	lines := strings.Split(string(text), "\n")
	within := false
	for i, l := range lines[:len(lines)-1] {
		within = within || strings.TrimSpace(l) == "LWPOLYLINE"
		if !within || strings.TrimSpace(l) != "10" {
			continue
		}
		whole, _, _ := strings.Cut(strings.TrimSpace(lines[i+1]), ".")
		if lines[i+1] == whole+".25" {
			t.Fatalf("%s: the edit changes nothing", path)
		}
		lines[i+1] = whole + ".25"
		if err := os.WriteFile(path, []byte(strings.Join(lines, "\n")), 0o600); err != nil {
			t.Fatal(err)
		}
		return
	}
	t.Fatalf("%s has no outline", path)
}

// A file that was edited since it was written fails the proof, which names it and says what to do.
func TestProofOfAnEditedFile(t *testing.T) {
	dir := filepath.Join(t.TempDir(), "out")
	fine(t, "cut", jobs+"watt-table.yaml", "-o", dir, "-q")
	edit(t, filepath.Join(dir, "sheet-clear3-1.dxf"))
	out, errs, status := shell("proof", dir)
	if status != statusRefused || !strings.Contains(errs, "do not cut") {
		t.Errorf("status %d, says %q", status, errs)
	}
	for _, want := range []string{"FAIL", "sheet-clear3-1.dxf", "write the files anew"} {
		if !strings.Contains(out, want) {
			t.Errorf("the proof does not say %q:\n%s", want, out)
		}
	}
}
