package interference

import (
	"container/heap"
	"math"

	"pinwright/parts/outline"
)

const (
	depthBoxes    = 400  // at most so many boxes a pair
	depthAccuracy = 0.05 // mm, and share of the depth: nobody makes more of it
	depthCells    = 4000 // at most so many squares a position
)

// deepest replaces the gap of a pair that touches by minus the depth of its overlap.
//
// If a disc of diameter d lies in both bodies at one position and they then move against each other by
// no more than e anywhere, a disc of diameter d-e lies in both still: half way between the place where
// the disc is carried by one and by the other. So a box holds no depth above that of its middle plus
// the approach, and the boxes are searched as for gaps. No depth is above the widest place of either
// body, which ends the search early for bars that cross.
func (x *pair) deepest(touch Gap, o Options) (Gap, error) {
	widest := math.Min(inscribed(x.a.edges), inscribed(x.b.edges))
	best := touch
	best.MM = 0
	allowed := func() float64 { return math.Max(o.Accuracy, depthAccuracy*math.Max(1, -best.MM)) }
	var open boxHeap
	visited := 0
	visit := func(y box) error {
		visited++
		m, err := x.at(y)
		if err != nil {
			return err
		}
		to := m.tb.Then(m.ta.Inverse())
		p, d, most := common(x.a.edges, x.b.edges, to, -best.MM)
		if d > -best.MM {
			best.MM, best.At = -d, m.ta.Apply(p)
			best.Angle, best.Settings = y.mid[0], append([]float64(nil), y.mid[1:]...)
		}
		y.low = -math.Min(most+m.come, widest)
		if y.low < best.MM-allowed() {
			heap.Push(&open, y)
		}
		return nil
	}
	boxes := x.s.firstBoxes(x.parameters)
	rigid := x.s.rigid(x.a, x.b)
	if rigid {
		boxes = boxes[:1]
	}
	for _, y := range boxes {
		if err := visit(y); err != nil {
			return best, err
		}
	}
	best.Error = allowed()
	number := len(boxes)
	for open.Len() > 0 && !rigid {
		y := heap.Pop(&open).(box)
		if y.low >= best.MM-allowed() {
			break
		}
		if visited >= depthBoxes {
			best.Error = best.MM - y.low
			break
		}
		m, err := x.at(y)
		if err != nil {
			return best, err
		}
		for _, z := range halve(y, m.pa, m.pb, number) {
			if err := visit(z); err != nil {
				return best, err
			}
		}
		number += 2
		best.Error = allowed()
	}
	best.Boxes += visited
	return best, nil
}

// commonAccuracy is how exactly the depth of one position is known, mm.
const commonAccuracy = 0.01

// common returns the middle and diameter of the largest disc in a and in b (moved by to), if it is
// larger than atLeast, else a diameter of 0; and a diameter that none is larger than.
func common(a, b outline.Edges, to outline.Transform, atLeast float64) (at Point, d, most float64) {
	back := to.Inverse()
	both, other := a.Bounds(), movedBox(b.Bounds(), to)
	both.Min.X, both.Min.Y = math.Max(both.Min.X, other.Min.X), math.Max(both.Min.Y, other.Min.Y)
	both.Max.X, both.Max.Y = math.Min(both.Max.X, other.Max.X), math.Min(both.Max.Y, other.Max.Y)
	return roomiest(both, atLeast, func(p Point) float64 {
		return math.Min(a.Depth(p), b.Depth(back.Apply(p)))
	})
}

// inscribed returns an upper bound, close to it, of the diameter of the largest disc in a region.
func inscribed(a outline.Edges) float64 {
	_, _, most := roomiest(a.Bounds(), 0, a.Depth)
	return most
}

func movedBox(b outline.Box, t outline.Transform) outline.Box {
	out := outline.EmptyBox()
	for _, p := range []Point{b.Min, {X: b.Max.X, Y: b.Min.Y}, b.Max, {X: b.Min.X, Y: b.Max.Y}} {
		q := t.Apply(p)
		out = out.Union(outline.Box{Min: q, Max: q})
	}
	return out
}

// roomiest maximises twice a depth over a box, to commonAccuracy. A depth changes by no more than the
// way from place to place: squares are quartered, the most promising first, until that decides. Returned
// are place and value, if above atLeast, else 0; and what no value is above.
func roomiest(b outline.Box, atLeast float64, depth func(Point) float64) (at Point, value, most float64) {
	if b.Empty() {
		return Point{}, 0, atLeast
	}
	best := atLeast
	var open boxHeap
	number := 0
	push := func(mid Point, half Point) {
		d := depth(mid)
		if 2*d > best {
			at, best, value = mid, 2*d, 2*d
		}
		if upper := 2 * (d + half.Len()); upper > best+commonAccuracy {
			heap.Push(&open, box{mid: []float64{mid.X, mid.Y}, half: []float64{half.X, half.Y}, low: -upper, number: number})
			number++
		}
	}
	push(b.Centre(), b.Max.Sub(b.Min).Scale(0.5))
	for open.Len() > 0 {
		c := heap.Pop(&open).(box)
		if -c.low <= best+commonAccuracy {
			break
		}
		if number > depthCells {
			return at, value, -c.low
		}
		half := Point{X: c.half[0] / 2, Y: c.half[1] / 2}
		for _, s := range []Point{{X: -1, Y: -1}, {X: 1, Y: -1}, {X: -1, Y: 1}, {X: 1, Y: 1}} {
			push(Point{X: c.mid[0] + s.X*half.X, Y: c.mid[1] + s.Y*half.Y}, half)
		}
	}
	return at, value, best + commonAccuracy
}
