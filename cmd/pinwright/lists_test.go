package main

import (
	"encoding/csv"
	"math"
	"os"
	"path/filepath"
	"strconv"
	"testing"
)

// table reads a CSV file of a run: its rows by the names of their columns.
func table(t *testing.T, path string) []map[string]string {
	t.Helper()
	f, err := os.Open(path)
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	rows, err := csv.NewReader(f).ReadAll()
	if err != nil || len(rows) < 2 {
		t.Fatalf("%s: %d rows, %v", path, len(rows), err)
	}
	var out []map[string]string
	for _, r := range rows[1:] {
		m := map[string]string{}
		for i, name := range rows[0] {
			m[name] = r[i]
		}
		out = append(out, m)
	}
	return out
}

// number reads a column of a row.
func number(t *testing.T, row map[string]string, column string) float64 {
	t.Helper()
	v, err := strconv.ParseFloat(row[column], 64)
	if err != nil {
		t.Fatalf("column %s: %v", column, err)
	}
	return v
}

// The lists of the demo against what its job says, worked out by hand.
func TestListsOfTheDemo(t *testing.T) {
	dir := filepath.Join(t.TempDir(), "out")
	fine(t, "cut", jobs+"demo.yaml", "-o", dir, "-q")

	// path.csv: half a degree a step; every link keeps its length in every row, and the copies' drives
	// stand ahead by their phases.
	path := table(t, filepath.Join(dir, "path.csv"))
	if len(path) != 720 {
		t.Errorf("path.csv has %d rows, want 720", len(path))
	}
	for i, row := range path {
		drive := number(t, row, "drive_deg")
		if math.Abs(drive-float64(i)/2) > 1e-9 {
			t.Fatalf("row %d is at %g deg", i, drive)
		}
		for _, l := range []struct {
			a, b string
			want float64
		}{{"O", "A", 20}, {"A", "B", 50}, {"B", "P", 50}, {"A", "P", 100}, {"C", "B", 50}, {"O", "C", 40}} {
			got := math.Hypot(number(t, row, l.a+"_x_mm")-number(t, row, l.b+"_x_mm"), number(t, row, l.a+"_y_mm")-number(t, row, l.b+"_y_mm"))
			if math.Abs(got-l.want) > 3e-6 {
				t.Fatalf("%s-%s is %.6f mm at %g deg, want %g", l.a, l.b, got, drive, l.want)
			}
		}
		angle := math.Atan2(number(t, row, "A_y_mm"), number(t, row, "A_x_mm")) * 180 / math.Pi
		if d := math.Abs(math.Remainder(angle-drive, 360)); d > 1e-4 {
			t.Fatalf("the crank stands at %.4f deg, the drive at %g", angle, drive)
		}
		for name, phase := range map[string]float64{"left-1": 0, "left-2": 180, "right-1": 0, "right-2": 180} {
			got := number(t, row, name+"_drive_deg")
			if got < 0 || got >= 360 || math.Abs(math.Remainder(got-drive-phase, 360)) > 1e-6 {
				t.Fatalf("%s stands at %g deg when the drive is at %g", name, got, drive)
			}
		}
	}

	// parts.csv: six parts a copy, each with a mark of its own.
	marks := map[string]string{}
	for _, row := range table(t, filepath.Join(dir, "parts.csv")) {
		if other := marks[row["mark"]]; other != "" {
			t.Errorf("%s and %s have one mark", row["part"], other)
		}
		marks[row["mark"]] = row["part"]
	}
	if len(marks) != 24 {
		t.Errorf("%d marks, want 24", len(marks))
	}

	// hardware.csv, four copies. A bolt holds parts of 2.85 mm and washers and ends a pitch beyond its nut:
	// at A and B two parts, three washers of 0.8 mm, a nut of 5 mm (DIN 985 M4), pitch 0.7 mm: 13.8 mm, and
	// screws go from 12 to 16 mm (lengths of ISO 4762). Spare: a tenth, one at least.
	lines := map[string][2]float64{} // needed and bought
	for _, row := range table(t, filepath.Join(dir, "hardware.csv")) {
		n, buy := number(t, row, "need"), number(t, row, "buy")
		lines[row["item"]] = [2]float64{n, buy}
		if row["kind"] != "shaft" && buy != n+max(1, math.Ceil(n/10)) {
			t.Errorf("%s: %g for %g", row["item"], buy, n)
		}
	}
	for item, want := range map[string]float64{
		"ISO 4762 M4x16": 8, "DIN 985 M4": 8, "ISO 7089 4": 24, "ISO 4762 M5x45": 4, "DIN 985 M5": 4, "ISO 7089 5": 24, "ISO 7089 6": 12,
	} {
		if got := lines[item][0]; got != want {
			t.Errorf("%g of %s needed, want %g", got, item, want)
		}
	}
}
