package assembly

import (
	"fmt"

	"pinwright/parts/interference"
	"pinwright/parts/job"
	"pinwright/parts/outline"
	"pinwright/parts/stack"
)

// ofStandoffs makes bodies of the standoffs between the frame plates and of the screws' heads outside,
// each as wide as it is at its widest.
func ofStandoffs(j job.Job) []thing {
	s, err := stack.Standoffs(j)
	if err != nil || s == nil {
		return nil // whoever builds the kits says what is wrong
	}
	low, high, thick := s.From, s.To, 0.0
	for _, k := range j.Stock {
		if k.Name == j.Frame.Stock {
			thick = k.Measured
		}
	}
	var out []thing
	for i, at := range s.At {
		add := func(what string, diameter, from, to float64) {
			name := fmt.Sprintf("%s %d", what, i+1)
			out = append(out, thing{part: name, Body: interference.Body{
				Name: name, Region: outline.Region{Outer: outline.Circle(at, diameter/2)}, Low: from, Up: to,
			}})
		}
		add("standoff", s.Diameter, low, high)
		add("lower screw of standoff", s.HeadWide, low-thick-s.Head, low-thick)
		add("upper screw of standoff", s.HeadWide, high+thick, high+thick+s.Head)
	}
	return out
}
