package list_test

import (
	"bytes"
	"encoding/csv"
	"errors"
	"math"
	"os"
	"strconv"
	"strings"
	"testing"
	"unicode/utf8"

	"pgregory.net/rapid"

	"pinwright/export/list"
	"pinwright/parts/outline"
)

func ExampleParts() {
	var b bytes.Buffer
	err := list.Parts(&b, []list.PartRow{{
		Part: "left-1.crank", Link: "crank", Copy: "left-1", Stock: "clear3", Sheet: "clear3-1", Plane: 1,
		Mark: "L1 CRANK", Quantity: 1, WidthMM: 27.5, HeightMM: 12.5, AreaMM2: 278.0041, CutLengthMM: 94.2478,
		MassG: 0.943, Holes: 2,
	}}, list.Options{})
	if err != nil {
		panic(err)
	}
	os.Stdout.Write(bytes.ReplaceAll(b.Bytes(), []byte("\r\n"), []byte("\n")))
	// Output:
	// part,link,copy,stock,sheet,plane,mark,quantity,width_mm,height_mm,area_mm2,cut_length_mm,mass_g,holes
	// left-1.crank,crank,left-1,clear3,clear3-1,1,L1 CRANK,1,27.5,12.5,278,94.248,0.94,2
}

func ExampleHardware() {
	var b bytes.Buffer
	err := list.Hardware(&b, []list.HardwareRow{
		{
			Item: "ISO 4762 M4 x 20", Kind: "bolt", LengthMM: 20, Need: 12, Spare: 2, Buy: 14, Packs: 1, MassG: 36.1,
			WhereUsed: "A, C, D", Note: "thickest stack 13.2 mm",
		},
		{Item: "ISO 7089 M4", Kind: "washer", Need: 48, Spare: 5, Buy: 53},
	}, list.Options{DecimalComma: true})
	if err != nil {
		panic(err)
	}
	os.Stdout.Write(bytes.ReplaceAll(b.Bytes(), []byte("\r\n"), []byte("\n")))
	// Output:
	// item;kind;length_mm;need;spare;buy;packs;mass_g;where_used;note
	// ISO 4762 M4 x 20;bolt;20;12;2;14;1;36,1;A, C, D;thickest stack 13.2 mm
	// ISO 7089 M4;washer;;48;5;53;;;;
}

func ExamplePath() {
	var b bytes.Buffer
	err := list.Path(&b, list.PathTable{
		Points: []string{"A", "toe"},
		Copies: []string{"left", "right"},
		Rows: []list.PathRow{
			{DriveDeg: 0, CopyDeg: []float64{0, 180}, At: []outline.Point{{X: 15}, {X: -20.25, Y: -84.0312345678}}},
			{DriveDeg: 7.5, CopyDeg: []float64{7.5, 187.5}, At: []outline.Point{{X: 14.8716729, Y: 1.9578929}, {X: -19, Y: -84}}},
		},
	}, list.Options{})
	if err != nil {
		panic(err)
	}
	os.Stdout.Write(bytes.ReplaceAll(b.Bytes(), []byte("\r\n"), []byte("\n")))
	// Output:
	// drive_deg,left_drive_deg,right_drive_deg,A_x_mm,A_y_mm,toe_x_mm,toe_y_mm
	// 0,0,180,15,0,-20.25,-84.031235
	// 7.5,7.5,187.5,14.871673,1.957893,-19,-84
}

func TestLinesEndAsRFC4180Says(t *testing.T) {
	var b bytes.Buffer
	if err := list.Hardware(&b, []list.HardwareRow{{Item: `1/4" bolt, long`}}, list.Options{}); err != nil {
		t.Fatal(err)
	}
	s := b.String()
	if strings.Count(s, "\r\n") != 2 || strings.Count(s, "\n") != 2 || !strings.HasSuffix(s, "\r\n") {
		t.Errorf("line ends: %q", s)
	}
	// RFC 4180, 2.6 and 2.7: quotes round a field with a comma or quote, quotes doubled.
	if !strings.Contains(s, "\r\n\"1/4\"\" bolt, long\",") {
		t.Errorf("quoting: %q", s)
	}
}

func TestShield(t *testing.T) {
	for in, want := range map[string]string{
		"crank":                  "crank",
		"":                       "",
		"=1+1":                   "'=1+1",
		"+A1":                    "'+A1",
		"-2":                     "'-2",
		"@SUM(A1)":               "'@SUM(A1)",
		"  =1":                   "'  =1",
		"\t=1":                   "' =1",
		"a\r\nb":                 "a  b",
		"'quoted":                "''quoted",
		"left-1.crank":           "left-1.crank",
		"\xff":                   "\uFFFD",
		"\u2028x":                " x",
		"=HYPERLINK(\"x\",\"\")": "'=HYPERLINK(\"x\",\"\")",
	} {
		if got := list.Shield(in); got != want {
			t.Errorf("Shield(%q) = %q, want %q", in, got, want)
		}
	}
}

func TestErrors(t *testing.T) {
	err := list.Parts(&bytes.Buffer{}, []list.PartRow{{}, {AreaMM2: math.NaN()}}, list.Options{})
	if err == nil || err.Error() != "row 2, column area_mm2: NaN is not a number" {
		t.Errorf("got %v", err)
	}
	err = list.Path(&bytes.Buffer{}, list.PathTable{Points: []string{"A"}, Rows: []list.PathRow{{}}}, list.Options{})
	if err == nil || err.Error() != "path row 1: 0 copies and 0 points, the header has 0 and 1" {
		t.Errorf("got %v", err)
	}
	full := errors.New("disk full")
	for _, write := range []func() error{
		func() error { return list.Parts(failing{full}, make([]list.PartRow, 1), list.Options{}) },
		func() error { return list.Hardware(failing{full}, make([]list.HardwareRow, 1), list.Options{}) },
		func() error { return list.Path(failing{full}, list.PathTable{}, list.Options{}) },
	} {
		if err := write(); !errors.Is(err, full) {
			t.Errorf("got %v", err)
		}
	}
}

type failing struct{ err error }

func (f failing) Write([]byte) (int, error) { return 0, f.err }

// The independent reader is encoding/csv: whatever the names are, it gives back the same cells.
func TestReadsBack(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		o := list.Options{DecimalComma: rapid.Bool().Draw(t, "comma")}
		text := rapid.OneOf(rapid.String(), rapid.SampledFrom([]string{"=1", "a,b", "a;b", `"`, "'", "-", " ", `\.`, "\r\n"}))
		length := rapid.Float64Range(-1e6, 1e6)
		rows := rapid.SliceOfN(rapid.Custom(func(t *rapid.T) list.PartRow {
			return list.PartRow{
				Part: text.Draw(t, "part"), Link: text.Draw(t, "link"), Copy: text.Draw(t, "copy"),
				Stock: text.Draw(t, "stock"), Sheet: text.Draw(t, "sheet"), Plane: rapid.IntRange(-9, 99).Draw(t, "plane"),
				Mark: text.Draw(t, "mark"), Quantity: rapid.IntRange(0, 999).Draw(t, "quantity"),
				WidthMM: length.Draw(t, "width"), HeightMM: length.Draw(t, "height"), AreaMM2: length.Draw(t, "area"),
				CutLengthMM: length.Draw(t, "cut"), MassG: length.Draw(t, "mass"), Holes: rapid.IntRange(0, 99).Draw(t, "holes"),
			}
		}), 0, 5).Draw(t, "rows")
		var b bytes.Buffer
		if err := list.Parts(&b, rows, o); err != nil {
			t.Fatal(err)
		}
		if !utf8.Valid(b.Bytes()) {
			t.Fatal("not UTF-8")
		}
		r := csv.NewReader(&b)
		if o.DecimalComma {
			r.Comma = ';'
		}
		got, err := r.ReadAll()
		if err != nil {
			t.Fatal(err)
		}
		if len(got) != len(rows)+1 {
			t.Fatalf("%d lines for %d rows", len(got), len(rows))
		}
		for i, row := range rows {
			cells := got[i+1]
			for j, want := range map[int]string{0: row.Part, 1: row.Link, 2: row.Copy, 3: row.Stock, 4: row.Sheet, 6: row.Mark} {
				if cells[j] != list.Shield(want) {
					t.Fatalf("cell %q, want %q", cells[j], list.Shield(want))
				}
				if c := strings.TrimLeft(cells[j], " "); c != "" && strings.ContainsAny(c[:1], "=+-@") {
					t.Fatalf("cell %q would be taken for a formula", cells[j])
				}
			}
			for j, want := range map[int]float64{8: row.WidthMM, 9: row.HeightMM, 10: row.AreaMM2, 11: row.CutLengthMM, 12: row.MassG} {
				s := cells[j]
				if o.DecimalComma {
					s = strings.Replace(s, ",", ".", 1)
				}
				v, err := strconv.ParseFloat(s, 64)
				if err != nil || math.Abs(v-want) > 0.00501 {
					t.Fatalf("column %d: %q for %v (%v)", j, cells[j], want, err)
				}
			}
		}
	})
}

func FuzzShield(f *testing.F) {
	for _, s := range []string{"", "=1", "'=1", "\u00a0=1", "a\r\nb", "\xff="} {
		f.Add(s)
	}
	f.Fuzz(func(t *testing.T, s string) {
		got := list.Shield(s)
		var b bytes.Buffer
		if err := list.Hardware(&b, []list.HardwareRow{{Item: s, Note: s}}, list.Options{}); err != nil {
			t.Fatal(err)
		}
		lines, err := csv.NewReader(&b).ReadAll()
		if err != nil || len(lines) != 2 || lines[1][0] != got || lines[1][9] != got {
			t.Fatalf("read back %q (%v), want %q", lines, err, got)
		}
		if utf8.ValidString(s) && !strings.ContainsFunc(s, func(r rune) bool { return r < ' ' || r >= 0x7f }) {
			if shielded := got != s; shielded && list.Unshield(got) != s {
				t.Fatalf("Unshield(%q) = %q, want %q", got, list.Unshield(got), s)
			}
		}
	})
}

func BenchmarkParts1000(b *testing.B) {
	rows := make([]list.PartRow, 1000)
	for i := range rows {
		rows[i] = list.PartRow{Part: "left-1.crank", WidthMM: 12.345678, AreaMM2: float64(i) / 7}
	}
	var buf bytes.Buffer
	for b.Loop() {
		buf.Reset()
		if err := list.Parts(&buf, rows, list.Options{}); err != nil {
			b.Fatal(err)
		}
	}
}
