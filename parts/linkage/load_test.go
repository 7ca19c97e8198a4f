package linkage

import (
	"encoding/json"
	"math"
	"os"
	"path/filepath"
	"testing"
)

// published is a file of testdata/linkages.
type published struct {
	Name, Source string
	Joints       []struct {
		Name         string
		Ground, Near *[2]float64
	}
	Links []struct {
		Name    string
		Pins    []string
		Lengths []struct {
			From, To string
			MM       float64
		}
	}
	Drive struct {
		Link    string
		FromDeg float64 `json:"from_deg"`
		ToDeg   float64 `json:"to_deg"`
	}
	Trace  []string
	Expect json.RawMessage
}

func load(t testing.TB, file string) (Linkage, published) {
	t.Helper()
	data, err := os.ReadFile(filepath.Join("..", "..", "testdata", "linkages", file))
	if err != nil {
		t.Fatal(err)
	}
	var p published
	if err := json.Unmarshal(data, &p); err != nil {
		t.Fatal(err)
	}
	var l Linkage
	for _, j := range p.Joints {
		k := Joint{Name: j.Name}
		if j.Ground != nil {
			k.Ground = ground(j.Ground[0], j.Ground[1])
		}
		if j.Near != nil {
			k.Near = pt(j.Near[0], j.Near[1])
		}
		l.Joints = append(l.Joints, k)
	}
	for _, k := range p.Links {
		n := Link{Name: k.Name, Pins: k.Pins}
		for _, g := range k.Lengths {
			n.Lengths = append(n.Lengths, Length{g.From, g.To, g.MM})
		}
		l.Links = append(l.Links, n)
	}
	l.Drive = Drive{Link: p.Drive.Link, From: rad(p.Drive.FromDeg), To: rad(p.Drive.ToDeg), Full: p.Drive.ToDeg-p.Drive.FromDeg == 360}
	l.Trace = p.Trace
	return l, p
}

func rad(deg float64) float64 { return deg * math.Pi / 180 }
func deg(rad float64) float64 { return rad * 180 / math.Pi }

func pt(x, y float64) *Point { return &Point{X: x, Y: y} }

func ground(x, y float64) *Ground { return &Ground{At: Point{X: x, Y: y}} }

func bar2(name, a, b string, mm float64) Link {
	return Link{Name: name, Pins: []string{a, b}, Lengths: []Length{{a, b, mm}}}
}

func tri(name, a, b, c string, ab, bc, ac float64) Link {
	return Link{Name: name, Pins: []string{a, b, c}, Lengths: []Length{{a, b, ab}, {b, c, bc}, {a, c, ac}}}
}

// cycleOf solves a linkage and checks the promised closure.
func cycleOf(t testing.TB, l Linkage, steps int) *Cycle {
	t.Helper()
	m, err := New(l)
	if err != nil {
		t.Fatal(err)
	}
	if a := m.Ambiguity(); a != nil {
		t.Errorf("ambiguous: %v", a)
	}
	c, err := m.Cycle(steps, nil)
	if err != nil {
		t.Fatal(err)
	}
	if x := c.Closure(); x > 1e-10 { // design: loop closure at every drive step
		t.Errorf("closure %g mm, want 1e-10", x)
	}
	for _, p := range c.Positions {
		for _, k := range l.Links {
			for _, g := range k.Lengths {
				a, b := p.Places[m.joint[g.A]], p.Places[m.joint[g.B]]
				if e := math.Abs(dist(a, b) - g.MM); e > 1e-10 {
					t.Fatalf("at %g deg %s-%s is %g mm off its length", deg(p.Angle), g.A, g.B, e)
				}
			}
		}
	}
	return c
}
