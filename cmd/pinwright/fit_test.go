package main

import (
	"bytes"
	"context"
	"fmt"
	"os"
	"path/filepath"
	"strings"
	"testing"
)

// pinwrightFit runs the command fit.
func pinwrightFit(args ...string) (out, err string, status int) {
	var o, e bytes.Buffer
	status = run(context.Background(), append([]string{"fit"}, args...), terminal{out: &o, err: &e})
	return o.String(), e.String(), status
}

// readings is an invented table: holes of three sizes, 0.2 mm and 0.02 mm scatter by a fixed pattern.
func readings() string {
	var b strings.Builder
	b.WriteString("material,cast acrylic\nthickness_mm,3\nfeature,kind,drawn_mm,reading_mm,pin_mm,answer\n")
	for i := range 18 {
		d := []float64{3, 4, 6}[i%3]
		fmt.Fprintf(&b, "H%d,hole,%g,%.2f,,\n", i, d, d+0.2+0.02*float64(i*7%5-2))
	}
	b.WriteString("P1,hole,3.7,,3.98,no\nP2,hole,3.9,,3.98,drops\nempty,hole,4,,,\n")
	return b.String()
}

func TestFitWholeWay(t *testing.T) {
	dir := t.TempDir()
	table, out := filepath.Join(dir, "r.csv"), filepath.Join(dir, "p.yaml")
	if err := os.WriteFile(table, []byte(readings()), 0o600); err != nil {
		t.Fatal(err)
	}
	said, errs, status := pinwrightFit(table, "-o", out, "--laser", "big one", "--date", "2026-11-30")
	if status != statusFine || !strings.Contains(said, "kerf          0.20") || !strings.Contains(said, "1 rows not filled in") || !strings.Contains(errs, "wrote") {
		t.Fatalf("status %d\n%s%s", status, said, errs)
	}
	first, err := os.ReadFile(out)
	if err != nil || !strings.Contains(string(first), `laser: "big one"`) {
		t.Fatalf("%v\n%s", err, first)
	}
	if _, errs, status := pinwrightFit(table, "-o", out); status != statusSystem || !strings.Contains(errs, "exists already") {
		t.Errorf("status %d %s", status, errs)
	}
	again := filepath.Join(dir, "again.yaml")
	pinwrightFit(table, "-o", again, "--laser", "big one", "--date", "2026-11-30")
	if second, _ := os.ReadFile(again); string(second) != string(first) {
		t.Error("the same readings give another profile")
	}
	said, errs, status = pinwrightFit("--table", "../../testdata/jobs/demo.yaml", "--profile", out)
	if status != statusFine || !strings.Contains(said, "bolt M4, medium") || !strings.Contains(errs, "birch plywood") {
		t.Errorf("status %d\n%s%s", status, said, errs)
	}
	said, _, status = pinwrightFit("--table", "../../testdata/jobs/demo.yaml", "--profile", out, "--chance", "0.9")
	if status != statusFine || !strings.Contains(said, "10.0 %") {
		t.Errorf("status %d\n%s", status, said)
	}
}

func TestFitRefuses(t *testing.T) {
	dir := t.TempDir()
	table := filepath.Join(dir, "r.csv")
	head := "feature,kind,drawn_mm,reading_mm\n"
	for _, c := range []struct {
		text   string
		args   []string
		status int
		want   string
	}{
		{head + "A,hole,4,4.2\n", nil, statusRefused, "1 feature tells a kerf of about 0.2 mm"},
		{head + "A,hole,4,106\n", nil, statusRefused, "r.csv:2:10: A: 106 mm is 25.4 times too large"},
		{head, nil, statusRefused, "the table is empty"},
		{readings(), []string{"--chance", "0.9"}, statusUsage, "go with --table"},
		{readings(), []string{"--material", "birch plywood"}, statusUsage, "--material says birch plywood, the table cast acrylic"},
		{head + "A,hole,4,4.2\nB,hole,4,4.2\nC,hole,4,4.21\n", []string{"-o", filepath.Join(dir, "p")}, statusUsage, "a profile needs to know the material"},
		{"", []string{"--table"}, statusUsage, "by which profile?"},
		{readings(), []string{"--date", "May"}, statusUsage, "write it as 2026-11-30"},
	} {
		if err := os.WriteFile(table, []byte(c.text), 0o600); err != nil {
			t.Fatal(err)
		}
		_, errs, status := pinwrightFit(append([]string{table}, c.args...)...)
		if status != c.status || !strings.Contains(errs, c.want) {
			t.Errorf("%v: status %d, %s", c.args, status, errs)
		}
	}
	if _, _, status := pinwrightFit(filepath.Join(dir, "none.csv")); status != statusSystem {
		t.Errorf("a missing file: status %d", status)
	}
}
