package assembly

import (
	"strings"
	"testing"

	"pinwright/parts/outline"
)

// Standoffs out of the way touch nothing; one on the circle of the crank's end is hit, and named.
func TestStandoffsInTheWay(t *testing.T) {
	for _, c := range []struct {
		at   outline.Point
		hits bool
	}{{outline.Point{X: 90, Y: -60}, false}, {outline.Point{X: 0, Y: -25}, true}} {
		j := read(t, "../../testdata/jobs/kinds.yaml")
		j.Frame.Standoffs.At = []outline.Point{{X: -10, Y: -60}, c.at}
		b := build(t, j)
		gaps, err := Gaps(b.job, b.m, b.list, b.kits, b.levels)
		if err != nil {
			t.Fatal(err)
		}
		hit := false
		for _, g := range gaps {
			if g.MM < 0 {
				hit = true
				if !strings.Contains(g.A+g.B, "standoff 2") {
					t.Errorf("%s and %s touch", g.A, g.B)
				}
			}
		}
		if hit != c.hits {
			t.Errorf("standoff at %v: touches something %v", c.at, hit)
		}
	}
}
