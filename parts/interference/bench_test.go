package interference

import (
	"fmt"
	"math"
	"testing"
)

// legPairs is every pair of bodies of an eight-bar leg that share no pin, as a planner asks for them:
// without regard to heights.
func legPairs(b *testing.B) (*Space, [][2]Body) {
	s, m := newSpace(b, load(b, "jansen.json"))
	bodies := bodiesOf(m, 6)
	var pairs [][2]Body
	for i, x := range bodies {
		for _, y := range bodies[i+1:] {
			if apartFrom(m, x, y) {
				pairs = append(pairs, [2]Body{x, y})
			}
		}
	}
	return s, pairs
}

var planning = Options{Accuracy: 0.01, Share: 0.05, Limit: 10, Boxes: 100000}

// BenchmarkGapsEightBar is all gaps of an eight-bar leg, from the linkage on.
func BenchmarkGapsEightBar(b *testing.B) {
	for b.Loop() {
		s, pairs := legPairs(b)
		gaps, err := s.All(pairs, planning)
		if err != nil {
			b.Fatal(err)
		}
		boxes := 0
		for _, g := range gaps {
			boxes += g.Boxes
		}
		b.ReportMetric(float64(len(pairs)), "pairs")
		b.ReportMetric(float64(boxes)/float64(len(pairs)), "boxes/pair")
	}
}

// BenchmarkGapsFourLegs is all gaps of four legs on one shaft, two of them mirrored, each against each
// and within itself.
func BenchmarkGapsFourLegs(b *testing.B) {
	for b.Loop() {
		s, own := legPairs(b)
		bodies := bodiesOf(s.source, 6)
		copies := []Copy{{}, {Phase: math.Pi}, {Phase: math.Pi / 2, Mirror: true}, {Phase: -math.Pi / 2, Mirror: true}}
		pairs := own
		for i, c := range copies {
			for _, d := range copies[i+1:] {
				for _, x := range bodies {
					for _, y := range bodies {
						x.Copy, y.Copy = c, d
						pairs = append(pairs, [2]Body{x, y})
					}
				}
			}
		}
		if _, err := s.All(pairs, planning); err != nil {
			b.Fatal(err)
		}
		b.ReportMetric(float64(len(pairs)), "pairs")
	}
}

// BenchmarkGapsByLinks shows the cost against the number of links: all pairs, from the linkage on.
func BenchmarkGapsByLinks(b *testing.B) {
	for _, file := range []string{"fourbar.json", "klann.json", "jansen.json"} {
		b.Run(fmt.Sprintf("%d", len(load(b, file).Links)+1), func(b *testing.B) {
			for b.Loop() {
				s, m := newSpace(b, load(b, file))
				bodies := bodiesOf(m, 0.02*s.m.size)
				var pairs [][2]Body
				for i, x := range bodies {
					for _, y := range bodies[i+1:] {
						if apartFrom(m, x, y) {
							pairs = append(pairs, [2]Body{x, y})
						}
					}
				}
				if _, err := s.All(pairs, planning); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}
