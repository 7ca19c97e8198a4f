package profile

import (
	"fmt"
	"math"
	"reflect"
	"strings"
	"testing"

	"pinwright/kerf/estimate"
	"pinwright/kerf/reading"
)

// acrylic is an invented laser.
func acrylic() Profile {
	return Profile{
		Material: "cast acrylic", Thickness: 2.9, Laser: "big one", Date: "2026-11-30", Readings: 40, Features: 30, Freedom: 26,
		Centre: 4.5, Smallest: 3, Largest: 8,
		Figures: []estimate.Figure{
			{Term: estimate.Kerf, Value: 0.18, SE: 0.005, Low: 0.17, High: 0.19},
			{Term: estimate.Holes, Value: 0.05, SE: 0.007, Low: 0.035, High: 0.065},
			{Term: estimate.Diameter, Value: 0.1, SE: 0.02, Low: 0.06, High: 0.14},
			{Term: estimate.Taper, Value: 0.08, SE: 0.01, Low: 0.06, High: 0.1},
			{Term: estimate.Scatter, Value: 0.02, SE: 0.003, Low: 0.015, High: 0.03},
		},
		Covariance: [][]float64{{2.5e-5, -2.5e-5, 0, 0}, {-2.5e-5, 5e-5, 0, 0}, {0, 0, 4e-4, 0}, {0, 0, 0, 1e-4}},
	}
}

func TestRoundTrip(t *testing.T) {
	p := acrylic()
	data, err := p.Write()
	if err != nil {
		t.Fatal(err)
	}
	got, err := Read("p.yaml", data)
	if err != nil || !reflect.DeepEqual(got, p) {
		t.Fatalf("%v\n%+v\n%+v", err, got, p)
	}
	again, _ := got.Write()
	if string(again) != string(data) {
		t.Error("written again it differs")
	}
}

func TestFromReadings(t *testing.T) {
	s := reading.Sheet{Material: "birch plywood", Thickness: 4}
	for i := range 10 {
		s.Readings = append(s.Readings, reading.Measured(fmt.Sprint(i), reading.Hole, 4, 4.2+0.01*float64(i%4), 0.01))
	}
	r, err := estimate.Fit(s.Readings)
	if err != nil {
		t.Fatal(err)
	}
	data, err := Of(s, r).Write()
	if err != nil {
		t.Fatal(err)
	}
	p, err := Read("p.yaml", data)
	if err != nil || p.Laser != "" || p.Date != "" || math.Abs(p.Value(estimate.Kerf)-0.213) > 1e-3 {
		t.Errorf("%+v, %v\n%s", p, err, data)
	}
}

func TestDrawIsTheInverseOfFinished(t *testing.T) {
	p := acrylic()
	for _, d := range []float64{1.5, 3, 4.5, 8, 22} {
		drawn, err := p.Draw(d)
		if got := p.Finished(drawn); err != nil || math.Abs(got.Middle-d) > 1e-12 || math.Abs(got.Wide()-got.Tight()-0.08) > 1e-12 {
			t.Errorf("%v: drawn %v gives %+v, %v", d, drawn, got, err)
		}
	}
	if d, err := p.Draw(0.2); err == nil {
		t.Errorf("0.2 mm drawn %v", d)
	}
	// At the centre: kerf and holes, whose sum has the variance 2.5e-5 + 5e-5 - 2 * 2.5e-5.
	if s := p.Finished(4.5); math.Abs(s.Middle-4.73) > 1e-12 || math.Abs(s.Doubt-0.005) > 1e-12 {
		t.Errorf("%+v", s)
	}
}

func TestSuits(t *testing.T) {
	p := acrylic()
	for _, c := range []struct {
		material  string
		thickness float64
		warning   string
		err       string
	}{
		{"cast acrylic", 2.9, "", ""},
		{"PMMA", 3, "", ""},
		{"cast acrylic", 3.5, "kerf and taper differ", ""},
		{"cast acrylic", 6, "", "cut a coupon of it"},
		{"birch plywood", 2.9, "", "the profile is of cast acrylic, the sheet is birch plywood"},
	} {
		w, err := p.Suits(c.material, c.thickness)
		if (w == "") != (c.warning == "") || !strings.Contains(w, c.warning) || (err == nil) != (c.err == "") || err != nil && !strings.Contains(err.Error(), c.err) {
			t.Errorf("%+v: %q, %v", c, w, err)
		}
	}
	if p.Covers(4) != "" || p.Covers(1) == "" || p.Covers(20) == "" {
		t.Error("sizes far from those read")
	}
}

func TestBroken(t *testing.T) {
	data, _ := acrylic().Write()
	good := string(data)
	for _, c := range []struct{ from, to, want string }{
		{"laser:", "lasre:", `p.yaml:6:1: profile: unknown key "lasre"`},
		{"thickness: 2.9", "thickness: thick", `p.yaml:5:12: "thick" is no number`},
		{"thickness: 2.9\n", "", "profile: no thickness"},
		{"thickness: 2.9", "thickness: -1", "a thickness of -1 mm"},
		{"kerf: {value: 0.18", "kerf: {value: -0.18", "kerf"},
		{"value: 0.18, se: 0.005, low: 0.17, high: 0.19", "value: 4.6, se: 0.1, low: 4.5, high: 4.8", "a kerf of 4.6 mm"},
		{"profile: 1", "profile: 2", "version 2"},
		{"profile: 1", "profile: 1\nprofile: 1", "profile is there twice"},
		{`date: "2026-11-30"`, "date: yesterday", "no date"},
		{"readings: 40", "readings: -3", "is no count"},
		{", high: 0.19}", "}", "kerf: no high"},
		{good, "{", "not understood as YAML"},
		{good, "- a\n", "must be keys with values"},
		{good, "", "not understood as YAML"},
	} {
		_, err := Read("p.yaml", []byte(strings.Replace(good, c.from, c.to, 1)))
		if c.want == "" {
			continue
		}
		if err == nil || !strings.Contains(err.Error(), c.want) {
			t.Errorf("%s -> %s: %v", c.from, c.to, err)
		}
	}
	if _, err := (Profile{}).Write(); err == nil {
		t.Error("an empty profile is written")
	}
}

func FuzzRead(f *testing.F) {
	data, _ := acrylic().Write()
	f.Add(data)
	f.Fuzz(func(t *testing.T, data []byte) {
		p, err := Read("p.yaml", data)
		if err != nil {
			return
		}
		if _, err := p.Write(); err != nil {
			t.Errorf("read but not written: %v", err)
		}
		p.Finished(4)
		if _, err := p.Draw(4); err != nil && err.Error() == "" {
			t.Error("an error that says nothing")
		}
	})
}

func ExampleProfile_Draw() {
	p := Profile{Centre: 4, Figures: []estimate.Figure{{Term: estimate.Kerf, Value: 0.2}, {Term: estimate.Scatter, Value: 0.02}}, Covariance: [][]float64{{1e-5}}}
	drawn, err := p.Draw(4.5)
	fmt.Printf("%.2f %v\n", drawn, err)
	// Output: 4.30 <nil>
}
