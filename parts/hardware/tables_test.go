package hardware

import (
	"math"
	"slices"
	"strings"
	"testing"
)

func catalogueOf(t *testing.T) *catalogue {
	t.Helper()
	c, err := read()
	if err != nil {
		t.Fatal(err)
	}
	return c
}

// Every row says where it comes from and how far it was confirmed, in the words of the package.
func TestEveryRowHasASource(t *testing.T) {
	c := catalogueOf(t)
	var sources []Source
	for _, r := range c.clearances {
		sources = append(sources, r.source)
	}
	for _, r := range append(slices.Clone(c.screws), c.shanks...) {
		sources = append(sources, r.Source)
	}
	for _, r := range c.lengths {
		sources = append(sources, r.source)
	}
	for _, r := range c.nuts {
		sources = append(sources, r.Source)
	}
	for _, r := range c.washers {
		sources = append(sources, r.Source)
	}
	for _, r := range c.bearings {
		sources = append(sources, r.Source)
	}
	for _, r := range c.rings {
		sources = append(sources, r.source)
	}
	for _, r := range c.threads {
		sources = append(sources, r.Source)
	}
	for _, r := range c.collars {
		sources = append(sources, r.Source)
	}
	for _, r := range c.zones {
		sources = append(sources, r.source)
	}
	if len(sources) < 450 {
		t.Errorf("%d rows: tables are missing", len(sources))
	}
	for _, s := range sources {
		if !slices.Contains([]string{"2+ places", "1 place", "from memory"}, s.Confirmed) {
			t.Errorf("%+v: confirmed %q", s, s.Confirmed)
		}
		if s.Standard == "" || s.From == "" {
			t.Errorf("%+v: no source", s)
		}
	}
}

// Closed forms of ISO 286-1 annex (from memory): with D the geometric mean of the range,
// i = 0.45 D^(1/3) + 0.001 D micrometres, IT5 7i, IT6 10i, IT7 16i, IT8 25i, IT9 40i, IT10 64i,
// IT11 100i, IT12 160i. The standard rounds; 12 % and half a micrometre take the rounding.
func TestGradesFollowTheirFormula(t *testing.T) {
	factor := map[string]float64{"IT5": 7, "IT6": 10, "IT7": 16, "IT8": 25, "IT9": 40, "IT10": 64, "IT11": 100, "IT12": 160}
	n := 0
	for _, z := range catalogueOf(t).zones {
		if z.kind != "grade" || z.over == 0 { // the first range is rounded up more
			continue
		}
		n++
		d := math.Sqrt(z.over * z.incl)
		want := factor[z.class] * (0.45*math.Cbrt(d) + 0.001*d)
		if math.Abs(z.upper-want) > 0.12*want+0.5 {
			t.Errorf("%s over %g to %g: %g, formula %.1f", z.class, z.over, z.incl, z.upper, want)
		}
	}
	if n < 50 {
		t.Errorf("%d grades", n)
	}
}

// Fundamental deviations of ISO 286-1 annex (from memory): D 16 D^0.44, E 11 D^0.41, F 5.5 D^0.41,
// G 2.5 D^0.34, H 0. The zone is as wide as its grade; shaft classes mirror hole classes.
func TestZonesFollowTheirFormula(t *testing.T) {
	deviation := map[string]func(d float64) float64{
		"D": func(d float64) float64 { return 16 * math.Pow(d, 0.44) },
		"E": func(d float64) float64 { return 11 * math.Pow(d, 0.41) },
		"F": func(d float64) float64 { return 5.5 * math.Pow(d, 0.41) },
		"G": func(d float64) float64 { return 2.5 * math.Pow(d, 0.34) },
		"H": func(float64) float64 { return 0 },
	}
	checked := 0
	for _, z := range catalogueOf(t).zones {
		if z.kind == "grade" {
			continue
		}
		letter := strings.TrimRight(z.class, "0123456789")
		it, err := Grade("IT"+strings.TrimPrefix(z.class, letter), z.incl)
		if err != nil {
			t.Fatal(err)
		}
		if math.Abs(z.upper-z.lower-it*1000) > 1e-9 {
			t.Errorf("%s to %g: zone of %g, grade %g", z.class, z.incl, z.upper-z.lower, it*1000)
		}
		near := z.lower
		if z.kind == "shaft" {
			near = -z.upper
		}
		f, ok := deviation[strings.ToUpper(letter)]
		if !ok {
			continue
		}
		checked++
		d := math.Sqrt(z.over * z.incl)
		if want := f(d); math.Abs(near-want) > 0.1*want+1 {
			t.Errorf("%s over %g to %g: deviation %g, formula %.1f", z.class, z.over, z.incl, near, want)
		}
	}
	if checked < 80 {
		t.Errorf("%d zones checked", checked)
	}
	// JS lies on both sides alike.
	for _, d := range []float64{2, 5, 8, 13, 22, 40} {
		upper, lower, err := Limits("JS7", d)
		if err != nil || upper != -lower {
			t.Errorf("JS7 at %g: %g %g %v", d, upper, lower, err)
		}
	}
}

// The tables agree with each other: pitch of screw, nut and thread; the bore of the normal washer is
// the fine hole of ISO 273; corners of a hexagon are wider than the standard's e_min; a flanged bearing
// is the plain one with a flange.
func TestTablesAgree(t *testing.T) {
	c := catalogueOf(t)
	for _, s := range append(slices.Clone(c.screws), c.shanks...) {
		thread, err := ThreadFor(s.Size)
		if err != nil || thread.Pitch != s.Pitch {
			t.Errorf("%s %s: pitch %g, thread %g %v", s.Standard, s.Size, s.Pitch, thread.Pitch, err)
		}
		for _, n := range Nuts(s.Size) {
			if n.Pitch != s.Pitch {
				t.Errorf("%s: pitch %g, screw %g", n.Designation(), n.Pitch, s.Pitch)
			}
			if n.Height < n.Least {
				t.Errorf("%s: %g high at most, %g at least", n.Designation(), n.Height, n.Least)
			}
		}
		if !(thread.Most < s.Diameter && thread.Least < thread.Most) {
			t.Errorf("thread %s: %g to %g", s.Size, thread.Least, thread.Most)
		}
		if s.HeadDiameter <= s.Diameter || s.Least > s.Most || s.Drive >= s.HeadDiameter {
			t.Errorf("%s %s: %+v", s.Standard, s.Size, s)
		}
		lengths := s.Lengths()
		if len(lengths) == 0 || lengths[0] != s.Least || lengths[len(lengths)-1] != s.Most || !slices.IsSorted(lengths) {
			t.Errorf("%s %s: lengths %v, table %g to %g", s.Standard, s.Size, lengths, s.Least, s.Most)
		}
	}
	for _, w := range c.washers {
		fine, err := ClearanceHole(w.Size, "fine")
		if err != nil || w.Bore != fine {
			t.Errorf("%s: bore %g, ISO 273 fine %g %v", w.Designation(), w.Bore, fine, err)
		}
		if !(w.Least < w.Thickness && w.Thickness < w.Most) || w.Outside <= w.Bore {
			t.Errorf("%s: %+v", w.Designation(), w)
		}
	}
	for _, h := range c.clearances {
		if !(h.nominal < h.diameters[0] && h.diameters[0] < h.diameters[1] && h.diameters[1] < h.diameters[2]) {
			t.Errorf("%s: %v", h.size, h.diameters)
		}
	}
	for _, l := range c.lengths {
		if !(l.least < l.mm && l.mm < l.most) {
			t.Errorf("length %g: %g to %g", l.mm, l.least, l.most)
		}
	}
	for _, b := range c.bearings {
		plain := strings.TrimPrefix(b.Designation, "F")
		if rest, ok := strings.CutPrefix(b.Designation, "MF"); ok {
			plain = "MR" + rest
		}
		if plain == b.Designation || plain == "MR115" { // its open width is disputed, as its note says
			continue
		}
		p, err := BearingFor(plain)
		if err != nil || p.Bore != b.Bore || p.Outside != b.Outside || p.Width != b.Width || b.Flange <= b.Outside {
			t.Errorf("%s and %s: %+v %+v %v", b.Designation, plain, b, p, err)
		}
	}
}
