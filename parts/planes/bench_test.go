package planes

import (
	"fmt"
	"math/rand/v2"
	"testing"
)

// ladder is a planar linkage as far as planes see it: a chain of four-bar loops, n links in all and a frame
// plate, joints of two links each, and what sweeps across what drawn by chance (seeded).
func ladder(n int, seed uint64) Problem {
	r := rand.New(rand.NewPCG(seed, 1))
	p := Problem{Washer: 0.8, Clear: 0.5}
	for i := range n {
		p.Bodies = append(p.Bodies, Body{Name: fmt.Sprintf("link %d", i), Thickness: 3})
	}
	plate := n
	p.Bodies = append(p.Bodies, Body{Name: "plate", Thickness: 5})
	join := func(members ...int) {
		p.Pins = append(p.Pins, Pin{Name: fmt.Sprintf("J%d", len(p.Pins)), Members: members, Below: 4.8, Above: 8.3, Loaded: true})
	}
	join(plate, 0)
	for i := 1; i < n; i++ {
		join(i-1, i)
		if i%2 == 0 {
			join(plate, i)
		}
	}
	for a := range n {
		for b := range a {
			if r.IntN(3) == 0 {
				p.Apart = append(p.Apart, Apart{A: a, B: b, Near: Near{MM: -1}})
			}
		}
		p.Apart = append(p.Apart, Apart{A: a, B: plate, Near: Near{MM: -5}})
		for q := range p.Pins {
			if r.IntN(5) == 0 {
				for _, z := range []Zone{Shank, Head, Nut} {
					p.Swept = append(p.Swept, Swept{Pin: q, Body: a, Zone: z, Near: Near{MM: -1}})
				}
			}
		}
	}
	return p
}

// One step up in links at a time shows what a link costs.
func BenchmarkPlanes(b *testing.B) {
	for n := 4; n <= 14; n += 2 {
		b.Run(fmt.Sprintf("links=%d", n), func(b *testing.B) {
			states := 0
			for b.Loop() {
				a, err := Solve(ladder(n, 3))
				if err == nil && !a.Proven {
					b.Fatal("not proven")
				}
				states = a.States
			}
			b.ReportMetric(float64(states), "states")
		})
	}
}
