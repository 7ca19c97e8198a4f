package interference

import (
	"container/heap"
	"fmt"
	"math"
	"runtime"
	"sync"

	"pinwright/parts/outline"
)

// toggleWidth is the width of a box, in radians of drive, at which a pose that is still loose counts as
// one that nothing can be said about.
const toggleWidth = 1e-7

// pair is two bodies in a search.
type pair struct {
	s          *Space
	a, b       carried
	va, vb     view
	parameters int
}

func (s *Space) pair(a, b Body) (pair, error) {
	x := pair{s: s}
	var err error
	if x.a, err = s.carry(a); err != nil {
		return x, err
	}
	if x.b, err = s.carry(b); err != nil {
		return x, err
	}
	x.va, x.vb, x.parameters, err = s.views(a.Copy, b.Copy)
	return x, err
}

// moment is a pair of bodies at the middle of a box.
type moment struct {
	pa, pb pose
	ta, tb outline.Transform
	come   float64 // how much nearer the bodies can come
}

func (x *pair) at(b box) (moment, error) {
	var m moment
	var err error
	if m.pa, err = x.s.see(x.va, b); err != nil {
		return m, err
	}
	m.pb = m.pa
	if x.va != x.vb {
		if m.pb, err = x.s.see(x.vb, b); err != nil {
			return m, err
		}
	}
	m.ta, m.tb = x.s.place(m.pa, x.a), x.s.place(m.pb, x.b)
	m.come = x.s.approach(m.pa, m.pb, b.half, x.a, x.b, m.ta, m.tb)
	if (m.pa.loose || m.pb.loose) && b.half[0] < toggleWidth {
		return m, fmt.Errorf("near drive angle %.3f deg links lie in line: which way they go on is not certain there; gaps cannot be proven", b.mid[0]*180/math.Pi)
	}
	return m, nil
}

// Smallest returns the smallest gap between two bodies over the whole motion, seen from above:
// heights are the caller's business. A body on a link counts as apart from other parts of the same
// link.
//
// It errs when the mechanism cannot be solved somewhere, when links pass through being in line and
// nothing tells them which way to go on, or when the accuracy asked for is not reached within the boxes
// allowed.
func (s *Space) Smallest(a, b Body, o Options) (Gap, error) {
	x, err := s.pair(a, b)
	if err != nil {
		return Gap{}, fmt.Errorf("interference: %w", err)
	}
	g, err := x.smallest(o)
	if err == nil && g.MM <= 0 && o.Depth {
		g, err = x.deepest(g, o)
	}
	if err != nil {
		return g, fmt.Errorf("interference: %s and %s: %w", a.Name, b.Name, err)
	}
	return g, nil
}

func (x *pair) smallest(o Options) (Gap, error) {
	best := Gap{MM: o.Limit}
	allowed := func() float64 { return o.Accuracy + o.Share*best.MM }
	done := func() bool { return best.MM <= 0 || best.MM < o.Enough }
	var open boxHeap
	visit := func(y box) error {
		best.Boxes++
		m, err := x.at(y)
		if err != nil {
			return err
		}
		if m.ta.Apply(x.a.centre).Dist(m.tb.Apply(x.b.centre))-x.a.radius-x.b.radius-m.come >= best.MM {
			return nil
		}
		// Seen from a, so that only b must be moved.
		to := m.tb.Then(m.ta.Inverse())
		near, ok := x.a.edges.Closer(outline.EdgesOf(x.b.Region.Transform(to)), best.MM+m.come)
		if !ok {
			return nil
		}
		if near.Distance < best.MM {
			best.MM, best.At = near.Distance, m.ta.Apply(near.A)
			best.Angle, best.Settings = y.mid[0], append([]float64(nil), y.mid[1:]...)
		}
		y.low = near.Distance - m.come
		if y.low < best.MM-allowed() && near.Distance > 1e-6 && !m.pa.loose && !m.pb.loose {
			n := m.ta.Apply(near.B).Sub(m.ta.Apply(near.A)).Unit()
			y.low = math.Max(y.low, x.s.apart(m.pa, m.pb, y.half, x.a, x.b, m.ta, m.tb, n))
			y.low = math.Max(y.low, x.s.apart(m.pb, m.pa, y.half, x.b, x.a, m.tb, m.ta, n.Scale(-1)))
		}
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
		if done() {
			break
		}
	}
	number := len(boxes)
	for open.Len() > 0 && !rigid && !done() {
		y := heap.Pop(&open).(box)
		if y.low >= best.MM-allowed() {
			break
		}
		if best.Boxes >= o.Boxes {
			return best, fmt.Errorf("the gap is known only to lie between %.3f and %.3f mm after %d boxes; near drive angle %.2f deg",
				y.low, best.MM, best.Boxes, best.Angle*180/math.Pi)
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
	}
	best.Error = allowed()
	if best.MM < o.Enough {
		best.Error = math.Max(0, best.MM)
	}
	return best, nil
}

// All returns the smallest gaps of pairs of bodies, in their order, as Smallest gives them; several
// are worked out at the same time. The error is that of the first pair that has one.
func (s *Space) All(pairs [][2]Body, o Options) ([]Gap, error) {
	gaps, errs := make([]Gap, len(pairs)), make([]error, len(pairs))
	var wait sync.WaitGroup
	next := make(chan int)
	for range min(runtime.GOMAXPROCS(0), len(pairs)) {
		wait.Go(func() {
			for i := range next {
				gaps[i], errs[i] = s.Smallest(pairs[i][0], pairs[i][1], o)
			}
		})
	}
	for i := range pairs {
		next <- i
	}
	close(next)
	wait.Wait()
	for _, err := range errs {
		if err != nil {
			return nil, err
		}
	}
	return gaps, nil
}
