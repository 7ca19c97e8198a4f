package export

import (
	"math"
	"testing"

	"pinwright/parts/outline"
)

func TestCheck(t *testing.T) {
	circle := outline.Outline{{Point: outline.Point{X: 1, Y: 2}, Bulge: 1}, {Point: outline.Point{X: 3, Y: 2}, Bulge: 1}}
	line := outline.Path{{Point: outline.Point{X: 1, Y: 2}}, {Point: outline.Point{X: 3, Y: 2}}}
	for want, s := range map[string]Sheet{
		"": {Name: "a", Width: 10, Height: 20, Steps: []Step{{Op: Engrave, Open: line}, {Op: CutOutside, Closed: circle}}},
		"sheet a: a size of 0 x 20 mm cannot be drawn":                                                              {Name: "a", Height: 20},
		"sheet a: a size of NaN x 20 mm cannot be drawn":                                                            {Name: "a", Width: math.NaN(), Height: 20},
		"sheet a: step 1 (p): operation 3 does not exist":                                                           {Name: "a", Width: 1, Height: 1, Steps: []Step{{Op: 3, Part: "p"}}},
		"sheet a: step 1 (p): engraving is an open path of two or more points; this one has 0, and an outline of 2": {Name: "a", Width: 1, Height: 1, Steps: []Step{{Part: "p", Closed: circle}}},
		"sheet a: step 2 (q): a cut is an outline of two or more points; this one has 0, and an open path of 2":     {Name: "a", Width: 1, Height: 1, Steps: []Step{{Op: CutInside, Closed: circle}, {Op: CutInside, Part: "q", Open: line}}},
		"sheet a: step 1 (): (1, +Inf) with bulge 0 cannot be drawn":                                                {Name: "a", Width: 1, Height: 1, Steps: []Step{{Open: outline.Path{line[0], {Point: outline.Point{X: 1, Y: math.Inf(1)}}}}}},
		"sheet a: step 1 (): (1, 2) with bulge NaN cannot be drawn":                                                 {Name: "a", Width: 1, Height: 1, Steps: []Step{{Open: outline.Path{{Point: line[0].Point, Bulge: math.NaN()}, line[1]}}}},
	} {
		got := ""
		if err := s.Check(); err != nil {
			got = err.Error()
		}
		if got != want {
			t.Errorf("got  %s\nwant %s", got, want)
		}
	}
}
