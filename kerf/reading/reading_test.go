package reading

import (
	"errors"
	"fmt"
	"math"
	"strings"
	"testing"

	"pinwright/parts/job"
)

const good = `# a coupon of 3 mm acrylic
material,cast acrylic
thickness_mm,2.9
laser,big one
date,2026-11-30
resolution_mm,0.01
feature,kind,drawn_mm,count,axis,side,reading_mm,over_mm,under_mm,pin_mm,answer
H4-1,hole,4,,x,top,4.21,,,,
H4-1,hole,4,,x,bottom,4.12,,,,
H4-2,hole,4,,,,,,,4.1,turns
H4-3,hole,4,,,,,4.15,4.2,,
H4-4,hole,4,,,,,4.15,,,
comb,bar,5,10,y,,48.1,,,,
H4-5,hole,4,,,,,,,,
`

func TestRead(t *testing.T) {
	s, err := Read("r.csv", []byte(good))
	if err != nil {
		t.Fatal(err)
	}
	if s.Material != "cast acrylic" || s.Thickness != 2.9 || s.Laser != "big one" || s.Date != "2026-11-30" || len(s.Readings) != 6 || s.Blank != 1 {
		t.Errorf("%+v", s)
	}
	r := s.Readings
	if r[0].Side != Top || r[0].Axis != X || math.Abs(r[0].Least-4.205) > 1e-12 || math.Abs(r[0].Most-4.215) > 1e-12 || r[0].Line != 8 {
		t.Errorf("%+v", r[0])
	}
	if r[2].Answer != Turns || r[2].Pin != 4.1 || r[3].Least != 4.15 || r[3].Most != 4.2 || !math.IsInf(r[4].Most, 1) || r[5].Count != 10 {
		t.Errorf("%+v", r[2:])
	}
	// Semicolons and decimal commas, line ends, byte order mark and empty fields as spreadsheets write them.
	other := strings.ReplaceAll("\ufeff"+strings.ReplaceAll(strings.ReplaceAll(strings.ReplaceAll(good, ",", ";"), "2.9\n", "2,9;;;\n"), "4.21", "4,21"), "\n", "\r\n")
	o, err := Read("r.csv", []byte(other))
	if err != nil || fmt.Sprint(o) != fmt.Sprint(s) {
		t.Errorf("%+v, %v", o, err)
	}
	inches, err := Read("r.csv", []byte("feature,kind,drawn_mm,reading_in\nH,hole,4,0.165\n"))
	if err != nil || math.Abs(inches.Readings[0].Least-(0.165*25.4-0.005)) > 1e-12 {
		t.Errorf("%+v, %v", inches, err)
	}
}

func TestBadTables(t *testing.T) {
	const head = "feature,kind,drawn_mm,reading_mm,over_mm,under_mm,pin_mm,answer\n"
	for _, c := range []struct{ name, text, want string }{
		{"empty", "", "r.csv:1:1: the table has no heading"},
		{"heading alone", head, "the table is empty: a heading and no rows"},
		{"nothing filled in", head + "H1,hole,4,,,,,\nH2,hole,4,,,,,\n", "nothing is filled in: all 2 rows are blank"},
		{"one in inches", head + "H1,hole,4,4.1,,,,\nH2,hole,4,4.2,,,,\nH3,hole,4,104.14,,,,\n", "r.csv:4:11: H3: 104.14 mm is 25.4 times too large where 4 mm was drawn"},
		{"what it would be", head + "H1,hole,4,4.1,,,,\nH2,hole,4,4.2,,,,\nH3,hole,4,104.14,,,,\n", "104.14 / 25.4 = 4.1"},
		{"all in inches", head + "H1,hole,4,0.161,,,,\nH2,hole,4,0.162,,,,\n", "r.csv:2:11: 2 of 2 readings are 25.4 times too small"},
		{"all too large", head + "H1,hole,4,104,,,,\nH2,hole,6,157,,,,\n", "2 of 2 readings are 25.4 times too large"},
		{"far off", head + "H1,hole,4,41,,,,\n", "r.csv:2:11: H1: a reading of 41 mm where 4 mm was drawn"},
		{"not a number", head + "H1,hole,4,4.1mm,,,,\n", `r.csv:2:11: reading: "4.1mm" is no number`},
		{"minus", head + "H1,hole,4,-0.1,,,,\n", "r.csv:2:11: reading is -0.1 mm: sizes are above 0"},
		{"hexadecimal", head + "H1,hole,4,0x4,,,,\n", "is no number"},
		{"no kind", head + "H1,disc,4,4,,,,\n", `r.csv:2:4: unknown kind "disc"`},
		{"bad answer", head + "H1,hole,4,,,,4.1,fits\n", `r.csv:2:18: unknown answer "fits"`},
		{"no pin", head + "H1,hole,4,,,,,turns\n", "which pin turns?"},
		{"pin in a bar", head + "H1,bar,4,,,,4,turns\n", "pins are tried in holes"},
		{"two at once", head + "H1,hole,4,4.1,4,,,\n", "a row holds one reading"},
		{"gauges crossed", head + "H1,hole,4,,4.2,4.1,,\n", "over 4.2 mm and yet under 4.1 mm"},
		{"contradiction", head + "H1,hole,4,,,,4.1,no\nH1,hole,4,,,,4.2,drops\n", "r.csv:3:14: H1: the pin of 4.2 mm: drops, but in line 2 the thinner one of 4.1 mm: no"},
		{"contradiction, other order", head + "H1,hole,4,,,,4.2,drops\nH1,hole,4,,,,4.1,no\n", "the pin of 4.2 mm: drops"},
		{"same name", head + "H1,hole,4,4.1,,,,\nH1,hole,5,5.1,,,,\n", "give every feature its own name"},
		{"fields", head + "H1,hole,4\n", "the row has 3 fields, the heading has 8"},
		{"unknown column", "feature,kind,drawn_mm,colour\n", `r.csv:1:23: unknown column "colour"`},
		{"no unit", "feature,kind,drawn\n", `column "drawn"`},
		{"twice", "feature,kind,drawn_mm,drawn_in\n", "there twice"},
		{"missing", "feature,kind\n", "no column drawn"},
		{"key", "colour,red\n" + head, `unknown or repeated key "colour"`},
		{"date", "date,30.11.2026\n" + head, `r.csv:1:6: "30.11.2026" is no date`},
		{"resolution", "resolution_mm,5\n" + head, "measures no kerf"},
		{"quote", head + "H\"1,hole,4,4.1,,,,\n", "a quote that does not fit"},
		{"not UTF-8", "\xff\xfe", "not a text in UTF-8"},
		{"count", "feature,kind,drawn_mm,count,reading_mm\nB,hole,4,3,12\n", "only bars are measured side by side"},
	} {
		_, err := Read("r.csv", []byte(c.text))
		var all job.Errors
		if err == nil || !errors.As(err, &all) || !strings.Contains(err.Error(), c.want) {
			t.Errorf("%s: %v", c.name, err)
		}
	}
}

func FuzzRead(f *testing.F) {
	f.Add([]byte(good))
	f.Add([]byte("feature;kind;drawn_mm;pin_mm;answer\nA;hole;4,0;4,1;no\n"))
	f.Fuzz(func(t *testing.T, data []byte) {
		s, err := Read("r.csv", data)
		if err != nil {
			if err.Error() == "" {
				t.Error("an error that says nothing")
			}
			return
		}
		for _, r := range s.Readings {
			if !(r.Drawn > 0) || r.Count < 1 || !(r.Least <= r.Most) && r.Answer == NoAnswer {
				t.Errorf("%+v", r)
			}
		}
	})
}

func ExampleRead() {
	s, err := Read("coupon.csv", []byte("material,cast acrylic\nfeature,kind,drawn_mm,reading_mm\nH4-1,hole,4,4.21\nH4-2,hole,4,\n"))
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("%s: %d read, %d blank\n", s.Material, len(s.Readings), s.Blank)
	_, err = Read("coupon.csv", []byte("feature,kind,drawn_mm,reading_mm\nH4-1,hole,4,106.9\n"))
	fmt.Println(err)
	// Output:
	// cast acrylic: 1 read, 1 blank
	// coupon.csv:2:13: H4-1: 106.9 mm is 25.4 times too large where 4 mm was drawn
	//   H4-1,hole,4,106.9
	//               ^^^^^
	//   inches and millimetres are mixed up: 106.9 / 25.4 = 4.209
}
