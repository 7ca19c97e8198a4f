package export

import (
	"math"
	"testing"

	"pgregory.net/rapid"

	"pinwright/parts/outline"
)

func TestSplitKeepsTheCurve(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		c := rapid.Float64Range(-500, 500)
		s := outline.Segment{
			A: outline.Point{X: c.Draw(t, "ax"), Y: c.Draw(t, "ay")}, B: outline.Point{X: c.Draw(t, "bx"), Y: c.Draw(t, "by")},
			Bulge: rapid.Float64Range(-5, 5).Draw(t, "bulge"),
		}
		limit := rapid.Float64Range(0.05, 3).Draw(t, "limit")
		pieces := Split([]outline.Segment{s}, func(p outline.Segment) bool { return math.Abs(p.Sweep()) <= limit })
		if pieces[0].A != s.A || pieces[len(pieces)-1].B != s.B {
			t.Fatal("the ends moved")
		}
		sweep := 0.0
		for i, p := range pieces {
			if i > 0 && p.A != pieces[i-1].B {
				t.Fatal("a gap")
			}
			if math.Abs(p.Sweep()) > limit+1e-12 {
				t.Fatalf("sweep %g", p.Sweep())
			}
			sweep += p.Sweep()
			if d := s.Nearest(p.At(0.3)).Distance; d > 1e-9 {
				t.Fatalf("off the curve by %g", d)
			}
		}
		if math.Abs(sweep-s.Sweep()) > 1e-9 {
			t.Fatalf("sweep %g, want %g", sweep, s.Sweep())
		}
	})
}
