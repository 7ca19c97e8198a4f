package export

import (
	"math"
	"testing"

	"pinwright/parts/outline"
)

func TestPlace(t *testing.T) {
	hole := outline.CircleHole(outline.Point{X: 10}, 2)
	p := Piece{
		Part: "bar", Outside: outline.Capsule(outline.Point{}, outline.Point{X: 10}, 4), Inside: []outline.Outline{hole},
		Marks: []outline.Path{{{Point: outline.Point{X: 2}}, {Point: outline.Point{X: 4}}}},
	}
	steps := p.Place(outline.Place(math.Pi/6, false, outline.Point{X: 100, Y: 50}))
	for i, want := range []Operation{Engrave, CutInside, CutOutside} {
		if steps[i].Op != want || steps[i].Part != "bar" {
			t.Errorf("step %d is %v of %s", i, steps[i].Op, steps[i].Part)
		}
	}
	at, r, ok := steps[1].Closed.AsCircle()
	if !ok || math.Abs(r-2) > 2e-9 || math.Abs(at.X-(100+10*math.Cos(math.Pi/6))) > 2e-9 || math.Abs(at.Y-55) > 2e-9 {
		t.Errorf("the hole is at %v, radius %v, a circle: %v", at, r, ok)
	}
	for _, v := range steps[2].Closed {
		if x := v.X * 1e9; math.Abs(x-math.Round(x)) > 1e-4 {
			t.Errorf("%v is not rounded", v.X)
		}
	}
	if p.Inside[0][0] != hole[0] {
		t.Error("the piece itself was moved")
	}
}
