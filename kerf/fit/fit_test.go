package fit

import (
	"fmt"
	"math"
	"math/rand/v2"
	"strings"
	"testing"

	"gonum.org/v1/gonum/stat/distuv"

	"pinwright/kerf/estimate"
	"pinwright/kerf/profile"
	"pinwright/parts/hardware"
	"pinwright/parts/job"
)

// laser is an invented one: kerf, scatter, taper, and how well known.
func laser(scatter, taper, doubt, freedom float64) profile.Profile {
	return profile.Profile{
		Material: "cast acrylic", Thickness: 3, Freedom: freedom, Centre: 4, Smallest: 3, Largest: 8,
		Figures: []estimate.Figure{
			{Term: estimate.Kerf, Value: 0.2}, {Term: estimate.Taper, Value: taper}, {Term: estimate.Scatter, Value: scatter},
		},
		Covariance: [][]float64{{doubt * doubt, 0}, {0, 0}},
	}
}

// A pin of one size and a scatter well known: the chance is the normal distribution, closed form. With
// a hole and a pin both scattering, the reliability of the fit is that of the difference of two variates
// (interference theory, any handbook of reliability).
func TestChanceOfOneSize(t *testing.T) {
	p := laser(0.03, 0, 0.04, 1e9) // 3, 4, 5
	f, err := In(p, Pin{Name: "pin", Least: 4, Most: 4}, Window{Binds: 0, Rattles: 0.2}, 4.1)
	if err != nil {
		t.Fatal(err)
	}
	n := distuv.UnitNormal
	if want := n.CDF(-0.1 / 0.05); math.Abs(f.Binds-want) > 1e-6 || math.Abs(f.Rattles-want) > 1e-6 || math.Abs(f.Fits-(1-2*want)) > 1e-6 {
		t.Errorf("%+v, want %v at each end", f, want)
	}
	if math.Abs(f.Draw-3.9) > 1e-9 || math.Abs(f.Low-(4.1-1.959964*0.05)) > 1e-6 || math.Abs(f.High-(4.1+1.959964*0.05)) > 1e-6 {
		t.Errorf("%+v", f)
	}
}

// A pin of any size between limits: the mean of the normal distribution over it, closed form, and a
// simulation with a fixed seed.
func TestChanceOfARange(t *testing.T) {
	p := laser(0.05, 0.08, 0, 1e9)
	pin := Pin{Name: "M4", Least: 3.838, Most: 3.978}
	f, err := In(p, pin, Window{Binds: 0, Rattles: 0.15}, 4.05)
	if err != nil {
		t.Fatal(err)
	}
	integral := func(z float64) float64 { return z*distuv.UnitNormal.CDF(z) + bell(z) }
	tight := 4.05 - 0.04
	mean := func(c float64) float64 {
		return 0.05 * (integral((pin.Most+c-tight)/0.05) - integral((pin.Least+c-tight)/0.05)) / (pin.Most - pin.Least)
	}
	if math.Abs(f.Binds-mean(0)) > 1e-6 || math.Abs(f.Rattles-(1-mean(0.15))) > 1e-6 {
		t.Errorf("%+v, closed form %v and %v", f, mean(0), 1-mean(0.15))
	}
	rng := rand.New(rand.NewPCG(4, 4))
	binds, rattles := 0, 0
	const n = 200000
	for range n {
		c := tight + 0.05*rng.NormFloat64() - (pin.Least + rng.Float64()*(pin.Most-pin.Least))
		if c < 0 {
			binds++
		} else if c > 0.15 {
			rattles++
		}
	}
	if math.Abs(float64(binds)/n-f.Binds) > 0.005 || math.Abs(float64(rattles)/n-f.Rattles) > 0.005 {
		t.Errorf("simulated %v and %v, foreseen %v and %v", float64(binds)/n, float64(rattles)/n, f.Binds, f.Rattles)
	}
}

func bell(z float64) float64 { return math.Exp(-z*z/2) / math.Sqrt(2*math.Pi) }

// Worst case of a stack of a hole and a pin, as in any handbook: hole 4.50 to 4.68 (H13 on ISO 273
// medium), thread 3.838 to 3.978 (6g): clearance 0.522 to 0.842.
func TestWindowOfMediumM4(t *testing.T) {
	h, err := HoleFor(hardware.Spec{Kind: hardware.Bolt, Size: "M4", Fit: "medium"})
	if err != nil || h.Finished != 4.5 || math.Abs(h.Pin.Least-3.838) > 1e-9 || math.Abs(h.Window.Rattles-0.842) > 1e-9 || h.Window.Binds != 0 {
		t.Errorf("%+v, %v", h, err)
	}
	// H7 and h9 at 6 mm: 0 to 12 and -30 to 0 micrometres (ISO 286-1; public tables agree): 0 to 42 clearance.
	s, err := HoleFor(hardware.Spec{Kind: hardware.Shaft, Diameter: 6, Fit: "H7"})
	if err != nil || math.Abs(s.Window.Rattles-0.042) > 1e-9 || math.Abs(s.Window.Binds) > 1e-9 || s.Window.Press {
		t.Errorf("%+v, %v", s, err)
	}
	// N7 at 13 mm: -23 to -5; outer ring 0 to -8 (ISO 492 Normal): 23 interference to 3 clearance.
	b, err := HoleFor(hardware.Spec{Kind: hardware.BearingSeat, Size: "624", Fit: "press"})
	if err != nil || math.Abs(b.Window.Binds+0.023) > 1e-9 || math.Abs(b.Window.Rattles-0.003) > 1e-9 || !b.Window.Press {
		t.Errorf("%+v, %v", b, err)
	}
	for _, s := range []hardware.Spec{{Kind: hardware.Bolt, Size: "M4", Fit: "tight"}, {Kind: hardware.Bolt, Size: "M99", Fit: "medium"}, {Kind: hardware.BearingSeat, Size: "9", Fit: "press"}} {
		if _, err := HoleFor(s); err == nil {
			t.Errorf("%+v is taken", s)
		}
	}
}

func TestBestAndForChance(t *testing.T) {
	p := laser(0.03, 0.05, 0.01, 20)
	pin := Pin{Name: "pin", Least: 3.95, Most: 4}
	w := Window{Binds: 0, Rattles: 0.2}
	best, err := Best(p, pin, w)
	if err != nil {
		t.Fatal(err)
	}
	for d := 3.9; d < 4.4; d += 0.001 {
		if f, _ := In(p, pin, w, d); f.Fits > best.Fits+1e-6 {
			t.Fatalf("%v fits with %v, the best %v with %v", d, f.Fits, best.Wanted, best.Fits)
		}
	}
	for _, chance := range []float64{0.5, 0.9, 0.95, 0.999} {
		f, err := ForChance(p, pin, w, chance)
		if err != nil || math.Abs(f.Binds-(1-chance)) > 1e-3*(1-chance)+1e-5 {
			t.Errorf("%v: %+v, %v", chance, f, err)
		}
	}
	for _, chance := range []float64{0, 1, 1.2, math.NaN(), 95} {
		if _, err := ForChance(p, pin, w, chance); err == nil {
			t.Errorf("a chance of %v is taken", chance)
		}
	}
	for _, bad := range []Pin{{}, {Least: 4, Most: 3}, {Least: math.NaN(), Most: 3}} {
		if _, err := In(p, bad, w, 4); err == nil {
			t.Errorf("%+v is taken", bad)
		}
	}
	if _, err := Best(p, pin, Window{Binds: 0.2, Rattles: 0.1}); err == nil || !strings.Contains(err.Error(), "nothing fits") {
		t.Errorf("%v", err)
	}
}

// Two rings of one material, solid shaft: p = E d / (2 R) (ro2 - R2) / ro2 by the radial interference d
// (Shigley, Mechanical Engineering Design, press and shrink fits; from memory). Shaft of 50 mm in a hub of
// 100 mm, steel, 0.025 mm over the radius, worked by hand: 206000 0.025 / 50 0.75 = 77.25 MPa; hoop stress
// (1 + 1/4)/(1 - 1/4) times that, 128.75 MPa.
func TestLameOfOneMaterial(t *testing.T) {
	p, err := Lame(50, 0, 100, 0.05, steel, steel)
	if err != nil || math.Abs(p.Pressure-77.25) > 1e-9 || math.Abs(p.Hoop-128.75) > 1e-9 || p.Warning != "" {
		t.Errorf("%+v, %v", p, err)
	}
}

// The elastic ring solved otherwise: u” + u'/r - u/r2 = 0 by finite differences, with the stress at the
// bore -p and at the outside 0; the bore then widens by what Lame's formula foresees for a rigid pin.
func TestLameAgainstDifferences(t *testing.T) {
	e := Elastic{Modulus: 3000, Poisson: 0.37, Limit: 15}
	const a, b = 6.5, 12.0
	p, err := Lame(2*a, 0, 2*b, 0.05, e, Elastic{Modulus: 1e15})
	if err != nil {
		t.Fatal(err)
	}
	// Plane stress: sr = E/(1-v2) (u' + v u/r). Shooting from the bore with u = 0.025: the u' that
	// leaves no stress outside, by the secant of two shots, as the problem is linear.
	const n = 20000
	v := e.Poisson
	h := (b - a) / n
	shoot := func(slope float64) float64 {
		u, w := 0.025, slope
		f := func(r, u, w float64) (float64, float64) { return w, u/(r*r) - w/r }
		for i := range n {
			r := a + float64(i)*h
			k1, l1 := f(r, u, w)
			k2, l2 := f(r+h/2, u+h/2*k1, w+h/2*l1)
			u, w = u+h*k2, w+h*l2
		}
		return w + v*u/b
	}
	s0, s1 := shoot(0), shoot(-0.01)
	slope := -0.01 * s0 / (s0 - s1)
	pressure := -e.Modulus / (1 - v*v) * (slope + v*0.025/a)
	hoop := e.Modulus / (1 - v*v) * (0.025/a + v*slope)
	if math.Abs(p.Pressure-pressure) > 1e-5*pressure || math.Abs(p.Hoop-hoop) > 1e-5*hoop {
		t.Errorf("%+v, by differences %v and %v", p, pressure, hoop)
	}
	if p.Warning != "" {
		t.Errorf("%v at %v MPa", p.Warning, p.Hoop)
	}
	// A wide plate and a rigid pin: hoop stress E i / (d (1 + v)).
	wide, _ := Lame(13, 0, math.Inf(1), 0.1, e, Elastic{Modulus: 1e15})
	if want := 3000 * 0.1 / 13 / 1.37; math.Abs(wide.Hoop-want) > 1e-6 || !strings.Contains(wide.Warning, "17 MPa, more than the 15 MPa") {
		t.Errorf("%+v, want %v", wide, want)
	}
	if _, err := Lame(13, 14, 20, 0.1, e, e); err == nil {
		t.Error("a bore larger than its ring is taken")
	}
	if loose, err := Lame(13, 0, 20, -0.1, e, e); err != nil || loose.Hoop != 0 {
		t.Errorf("%+v, %v", loose, err)
	}
}

func TestStress(t *testing.T) {
	p := laser(0.02, 0.05, 0, 1e6)
	h, err := HoleFor(hardware.Spec{Kind: hardware.BearingSeat, Size: "624", Fit: "press"})
	if err != nil {
		t.Fatal(err)
	}
	f, err := In(p, h.Pin, h.Window, 12.85)
	if err != nil {
		t.Fatal(err)
	}
	if s, ok := Stress(f, "cast acrylic", 3); !ok || !strings.Contains(s.Warning, "it may crack") {
		t.Errorf("%+v, %v", s, ok)
	}
	if _, ok := Stress(f, "birch plywood", 3); ok {
		t.Error("wood is no elastic ring")
	}
	for _, name := range []string{"PMMA", "extruded acrylic", "POM", "mild steel", "stainless steel", "aluminium"} {
		if e, ok := ElasticOf(name); !ok || e.Source == "" {
			t.Errorf("%s: %+v", name, e)
		}
	}
}

func TestHolesOfAJob(t *testing.T) {
	j, err := job.Read("../../testdata/jobs/demo.yaml")
	if err != nil {
		t.Fatal(err)
	}
	holes, err := Holes(j)
	if err != nil || len(holes) < len(j.Pins) {
		t.Fatalf("%d holes of %d pins, %v", len(holes), len(j.Pins), err)
	}
	for _, h := range holes {
		f, err := In(laser(0.03, 0.05, 0.01, 20), h.Pin, h.Window, h.Finished)
		if err != nil || math.Abs(f.Binds+f.Fits+f.Rattles-1) > 1e-9 {
			t.Errorf("%s %s: %+v, %v", h.Joint, h.What, f, err)
		}
	}
}

// A sleeve has the hole that turns on it and the closest one for its bolt; a clamped bolt the hole of what
// turns and the closest one in the crank.
func TestHolesOfKinds(t *testing.T) {
	holes, err := Holes(job.Job{Pins: []job.Pin{
		{Joint: "B", Kind: job.SleevePin, Bolt: "M4", Sleeve: 6, Fit: "running", Seats: []string{"coupler"}},
		{Joint: "A", Kind: job.ClampPin, Bolt: "M4", Fit: "medium", Clamped: "crank"},
	}})
	if err != nil {
		t.Fatal(err)
	}
	var got []string
	for _, h := range holes {
		got = append(got, h.Joint+" "+h.What)
	}
	if want := "B shaft 6, running; B bolt M4, fine; A bolt M4, medium; A bolt M4, fine"; strings.Join(got, "; ") != want {
		t.Errorf("%s\nwant %s", strings.Join(got, "; "), want)
	}
}

func ExampleForChance() {
	p := profile.Profile{
		Material: "cast acrylic", Thickness: 3, Freedom: 20, Centre: 4, Smallest: 3, Largest: 6,
		Figures:    []estimate.Figure{{Term: estimate.Kerf, Value: 0.2}, {Term: estimate.Scatter, Value: 0.02}},
		Covariance: [][]float64{{2.5e-5}},
	}
	f, err := ForChance(p, Pin{Name: "bolt M4", Least: 3.838, Most: 3.978}, Window{Binds: 0, Rattles: 0.5}, 0.99)
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("draw %.2f, comes out %.2f (%.2f to %.2f); binds %.1f %%, rattles %.1f %%\n", f.Draw, f.Sizes.Middle, f.Low, f.High, 100*f.Binds, 100*f.Rattles)
	// Output: draw 3.80, comes out 4.00 (3.96 to 4.05); binds 1.0 %, rattles 0.0 %
}
