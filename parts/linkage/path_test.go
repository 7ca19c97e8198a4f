package linkage

import (
	"math"
	"testing"
)

// TestCircleAsFoot: the crank's own tip runs on a circle, whose stance is elementary.
func TestCircleAsFoot(t *testing.T) {
	l, _ := load(t, "fourbar.json")
	l.Drive.From, l.Drive.To = 0.1, 0.1+2*math.Pi
	for _, steps := range []int{7, 24, 100} {
		c := cycleOf(t, l, steps)
		bands := []float64{0.1, 0.5, 0.9, 1}
		f, ok := c.FootPath("A", bands)
		if !ok {
			t.Fatal("no path")
		}
		near(t, "stride", f.Stride, 80, 1e-9)
		near(t, "lift", f.Lift, 80, 1e-9)
		near(t, "length", f.Length, 2*math.Pi*40, 1e-9)
		near(t, "lowest at", f.YMin.Angle, 1.5*math.Pi, 1e-9)
		near(t, "rightmost at", f.XMax.Angle, 2*math.Pi, 1e-9)
		for i, b := range bands {
			half := math.Acos(1 - 2*b)
			near(t, "duty", f.Stance[i].Duty, half/math.Pi, 1e-9)
			x := 40 * math.Sin(math.Min(half, math.Pi/2))
			near(t, "stance length", f.Stance[i].Length, 2*x, 1e-9)
		}
	}
	if _, ok := cycleOf(t, l, 9).FootPath("Z", nil); ok {
		t.Error("path of an unknown joint")
	}
}

// TestStraightPathLength: on Peaucellier's line the way is the distance of its ends, the speed varies.
func TestStraightPathLength(t *testing.T) {
	l, _ := load(t, "peaucellier.json")
	c := cycleOf(t, l, 60)
	f, _ := c.FootPath("P", nil)
	near(t, "length", f.Length, f.Lift, 1e-6)
	near(t, "stride", f.Stride, 0, 1e-9)
	p := c.Path("P")
	near(t, "ends", math.Abs(p[60].Y-p[0].Y), f.Lift, 1e-9)
}
