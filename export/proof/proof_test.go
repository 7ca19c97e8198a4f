package proof_test

import (
	"math"
	"strings"
	"testing"

	"pinwright/export/proof"
)

func TestSoundSheetPasses(t *testing.T) {
	r := check(t, demo().write(t, false, nil))
	if !r.OK {
		t.Fatal(printed(t, r))
	}
	if r.Parts != 7 || r.Holes != 3*2+2*3+1+3 || r.Drawings != 1 {
		t.Errorf("%d parts, %d holes, %d drawings", r.Parts, r.Holes, r.Drawings)
	}
	for _, c := range r.Checks {
		if c.Compared == 0 {
			t.Errorf("%s compared nothing", c.Name)
		}
		if c.Name == "centre distances" && (c.Figure == nil || c.Figure.Value > 1e-9) {
			t.Errorf("%s: %+v", c.Name, c.Figure)
		}
	}
	t.Log(printed(t, r))
}

func figureOf(t *testing.T, r proof.Report, name string) *proof.Figure {
	t.Helper()
	for _, c := range r.Checks {
		if c.Name == name {
			return c.Figure
		}
	}
	t.Fatalf("no check %q", name)
	return nil
}

var _ = math.Pi
var _ = strings.Contains
