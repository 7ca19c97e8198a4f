package linkage

import "testing"

// TestSensitivities compares with linkages whose length or pivot really is a little different.
func TestSensitivities(t *testing.T) {
	for _, file := range []string{"jansen.json", "stephenson.json"} {
		l, _ := load(t, file)
		joint := l.Trace[0]
		c := cycleOf(t, l, 12)
		j, _ := c.m.Joint(joint)
		for _, k := range []int{1, 5} {
			p := c.Positions[k]
			all, err := c.Sensitivities(p, joint)
			if err != nil {
				t.Fatal(err)
			}
			const h = 1e-4
			i := 0
			compare := func(name string, change func(*Linkage, float64)) {
				t.Helper()
				var at [2]Point
				for n, s := range []float64{h, -h} {
					v, _ := load(t, file)
					change(&v, s)
					m, err := New(v)
					if err != nil {
						t.Fatal(err)
					}
					vc, err := m.Cycle(12, nil)
					if err != nil {
						t.Fatal(err)
					}
					at[n] = vc.Positions[k].Places[j]
				}
				d := Point{X: (at[0].X - at[1].X) / (2 * h), Y: (at[0].Y - at[1].Y) / (2 * h)}
				if e := dist(d, all[i].Move); e > 1e-5*(1+norm(d)) {
					t.Errorf("%s, step %d, %s: got %v, differences say %v", file, k, name, all[i].Move, d)
				}
				i++
			}
			for a, link := range l.Links {
				for b, g := range link.Lengths {
					compare(g.A+"-"+g.B, func(v *Linkage, s float64) { v.Links[a].Lengths[b].MM += s })
				}
			}
			for a, q := range l.Joints {
				if q.Ground == nil {
					continue
				}
				compare(q.Name+" x", func(v *Linkage, s float64) { v.Joints[a].Ground.At.X += s })
				compare(q.Name+" y", func(v *Linkage, s float64) { v.Joints[a].Ground.At.Y += s })
			}
			if i != len(all) {
				t.Errorf("%d sensitivities, compared %d", len(all), i)
			}
		}
	}
	// On one line a length shifts along the line: the tip of the lambda's coupler, driven at a right
	// angle to a length change, still follows by the part the least squares give it.
	l, _ := load(t, "chebyshev.json")
	c := cycleOf(t, l, 12)
	all, err := c.Sensitivities(c.Positions[3], "P")
	if err != nil || len(all) != 5+4 {
		t.Errorf("%d sensitivities, %v", len(all), err)
	}
	if _, err := c.Sensitivities(c.Positions[3], "Z"); err == nil {
		t.Error("unknown joint goes through")
	}
}
