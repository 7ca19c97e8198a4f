package main

import (
	"fmt"
	"testing"

	"pinwright/parts/assembly"
)

func TestNearest(t *testing.T) {
	var said []string
	for _, g := range nearest([]assembly.Gap{
		{A: "leg", B: "washer of M", MM: -1},
		{A: "nut of M", B: "leg", MM: -0.5},
		{A: "leg", B: "M", MM: 0.1},
		{A: "leg", B: "bolt of M", MM: 0.2},
		{A: "leg", B: "bolt of C", MM: 0.3},
		{A: "M", B: "leg", MM: 0.4},
		{A: "bolt of C", B: "washer of M", MM: 0.5},
	}) {
		said = append(said, fmt.Sprintf("%s, %s: %g", g.A, g.B, g.MM))
	}
	// The first of leg and pin M, of leg and link M, of leg and pin C, of two pins.
	const want = "[leg, washer of M: -1 leg, M: 0.1 leg, bolt of C: 0.3 bolt of C, washer of M: 0.5]"
	if got := fmt.Sprint(said); got != want {
		t.Errorf("got  %s\nwant %s", got, want)
	}
}
