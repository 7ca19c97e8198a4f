package linkage

import (
	"math"
	"testing"
)

// TestBound samples the speeds densely within an interval: none is above its bound, and the bounds
// close in on the speeds as the interval shrinks.
func TestBound(t *testing.T) {
	for _, file := range []string{"jansen.json", "chebyshev.json", "stephenson.json", "watt.json"} {
		l, _ := load(t, file)
		c := cycleOf(t, l, 36)
		for k := 1; k < 35; k += 3 {
			p := c.Positions[k]
			for _, half := range []float64{0.02, 0.005, 1e-4} {
				b := c.Bound(p, half)
				for s := -10; s <= 10; s++ {
					q, err := c.At(p.Angle + half*float64(s)/10)
					if err != nil {
						t.Fatal(err)
					}
					for j := range q.Speeds {
						if v := norm(q.Speeds[j]); v > b.Speed[j]*(1+1e-12)+1e-12 {
							t.Fatalf("%s step %d half %g: joint %d moves at %g, bound %g", file, k, half, j, v, b.Speed[j])
						}
					}
					for i, link := range l.Links {
						if w := math.Abs(c.m.Turn(link.Name, q)); w > b.Turn[i]*(1+1e-12)+1e-12 {
							t.Fatalf("%s step %d half %g: %s turns at %g, bound %g", file, k, half, link.Name, w, b.Turn[i])
						}
					}
				}
				if half == 1e-4 {
					for j := range p.Speeds {
						if b.Speed[j] > 1.1*norm(p.Speeds[j])+0.5 {
							t.Errorf("%s step %d: bound %g for a speed of %g", file, k, b.Speed[j], norm(p.Speeds[j]))
						}
					}
				}
			}
		}
	}
	// Accelerations of a crank are known: its tip has r.
	l, _ := load(t, "jansen.json")
	c := cycleOf(t, l, 36)
	x, _ := c.m.Joint("X")
	b := c.Bound(c.Positions[0], 0.1)
	near(t, "crank speed", b.Speed[x], 15, 1e-12)
	near(t, "crank acceleration", b.Pull[x], 15, 1e-12)
	near(t, "reach", b.Reach(0, x, 2), 17, 1e-12)
	// A dyad that comes in line within the interval has no bound.
	l, _ = load(t, "parallelogram.json")
	c = cycleOf(t, l, 36)
	j, _ := c.m.Joint("B")
	if b := c.Bound(c.Positions[8], 0.2); !math.IsInf(b.Speed[j], 1) {
		t.Errorf("bound %g through a change point", b.Speed[j])
	}
}
