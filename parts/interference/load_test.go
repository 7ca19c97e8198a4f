package interference

import (
	"encoding/json"
	"math"
	"os"
	"path/filepath"
	"testing"

	"pinwright/parts/linkage"
	"pinwright/parts/outline"
)

// load reads a published linkage of testdata/linkages; the file names its source.
func load(t testing.TB, file string) linkage.Linkage {
	t.Helper()
	data, err := os.ReadFile(filepath.Join("..", "..", "testdata", "linkages", file))
	if err != nil {
		t.Fatal(err)
	}
	var p struct {
		Joints []struct {
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
	}
	if err := json.Unmarshal(data, &p); err != nil {
		t.Fatal(err)
	}
	var l linkage.Linkage
	for _, j := range p.Joints {
		k := linkage.Joint{Name: j.Name}
		if j.Ground != nil {
			k.Ground = &linkage.Ground{At: Point{X: j.Ground[0], Y: j.Ground[1]}}
		}
		if j.Near != nil {
			k.Near = &Point{X: j.Near[0], Y: j.Near[1]}
		}
		l.Joints = append(l.Joints, k)
	}
	for _, k := range p.Links {
		n := linkage.Link{Name: k.Name, Pins: k.Pins}
		for _, g := range k.Lengths {
			n.Lengths = append(n.Lengths, linkage.Length{A: g.From, B: g.To, MM: g.MM})
		}
		l.Links = append(l.Links, n)
	}
	l.Drive = linkage.Drive{Link: p.Drive.Link, From: p.Drive.FromDeg * math.Pi / 180, To: p.Drive.ToDeg * math.Pi / 180}
	l.Drive.Full = math.Abs(l.Drive.To-l.Drive.From-2*math.Pi) < 1e-9
	return l
}

// bodiesOf makes a bar or hull of every link and a disc of every joint; a link of three pins or more
// has a window, so that regions with holes and hollow sides come up.
func bodiesOf(m *linkage.Mechanism, half float64) []Body {
	var out []Body
	l := m.Linkage()
	for _, k := range l.Links {
		var discs []outline.Disc
		for _, p := range m.LinkFrame(k.Name) {
			discs = append(discs, outline.Disc{Centre: p, Radius: half})
		}
		r := outline.Region{Outer: outline.Hull(discs...)}
		if len(discs) > 2 {
			mid := discs[0].Centre.Add(discs[1].Centre).Add(discs[2].Centre).Scale(1.0 / 3)
			if outline.EdgesOf(r).Depth(mid) > 1.5*half {
				r.Holes = append(r.Holes, outline.CircleHole(mid, 0.8*half))
			}
		}
		out = append(out, Body{Name: k.Name, Carrier: OnLink, Of: k.Name, Region: r})
	}
	for _, j := range l.Joints {
		out = append(out, Body{Name: "pin " + j.Name, Carrier: OnJoint, Of: j.Name, Region: pin(0.8 * half)})
	}
	return out
}

// apartFrom tells whether the bodies have no pin in common, so that their gap is of interest.
func apartFrom(m *linkage.Mechanism, a, b Body) bool {
	pins := func(x Body) []string {
		if x.Carrier == OnJoint {
			return []string{x.Of}
		}
		for _, k := range m.Linkage().Links {
			if k.Name == x.Of {
				return k.Pins
			}
		}
		return nil
	}
	for _, p := range pins(a) {
		for _, q := range pins(b) {
			if p == q {
				return false
			}
		}
	}
	return true
}

// put places a body at a position of its mechanism, by package linkage.
func put(m *linkage.Mechanism, b Body, p linkage.Position) outline.Region {
	r := b.Region
	switch b.Carrier {
	case OnLink:
		r = r.Transform(m.Placement(b.Of, p))
	case OnJoint:
		j, _ := m.Joint(b.Of)
		r = r.Transform(outline.Place(0, false, p.Places[j]))
	}
	return r.Transform(outline.Place(0, b.Copy.Mirror, b.Copy.At))
}
