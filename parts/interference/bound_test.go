package interference

import (
	"math"
	"testing"

	"pinwright/parts/linkage"
	"pinwright/parts/outline"
)

// Every lower bound of a box against the gaps sampled densely within it, each bound by itself: of first
// order, and of second order seen from either body. Discs, bars and plates of Jansen's leg and of a
// four-bar whose pivot is on an arc.
func TestBoxBounds(t *testing.T) {
	arc := &linkage.Range{Centre: Point{X: 80}, Radius: 22, Start: -0.4, End: 0.5}
	adjustable := fourBar(arc)
	adjustable.Joints[1].Ground.At = arc.Place(0.5)
	for _, l := range []linkage.Linkage{load(t, "jansen.json"), adjustable} {
		s, m := newSpace(t, l)
		bodies := bodiesOf(m, 0.03*s.m.size)
		first, second := 0, 0
		for i, a := range bodies {
			for k, b := range bodies {
				if i == k || !apartFrom(m, a, b) {
					continue
				}
				x, err := s.pair(a, b)
				if err != nil {
					t.Fatal(err)
				}
				for n := range 6 {
					y := box{mid: []float64{s.m.from + 0.2 + 0.97*float64(n)}, half: []float64{0.12}}
					for len(y.mid) < x.parameters {
						y.mid, y.half = append(y.mid, 0.3+0.06*float64(n)), append(y.half, 0.1)
					}
					now, err := x.at(y)
					if err != nil {
						t.Fatal(err)
					}
					if now.pa.loose || now.pb.loose {
						continue
					}
					near := outline.Between(x.a.Region.Transform(now.ta), x.b.Region.Transform(now.tb))
					if near.Distance < 1e-6 {
						continue
					}
					normal := near.B.Sub(near.A).Unit()
					bounds := []float64{
						near.Distance - now.come,
						s.apart(now.pa, now.pb, y.half, x.a, x.b, now.ta, now.tb, normal),
						s.apart(now.pb, now.pa, y.half, x.b, x.a, now.tb, now.ta, normal.Scale(-1)),
					}
					if bounds[1] > bounds[0] {
						second++
					} else {
						first++
					}
					least := math.Inf(1)
					for _, f := range []float64{-1, -0.6, 0, 0.6, 1} {
						for _, g := range []float64{-1, -0.5, 0, 0.5, 1} {
							setting := linkage.Setting{}
							for q, j := range s.m.settings {
								setting[s.m.joints[j]] = y.mid[1+q] + f*y.half[1+q]
							}
							c, err := s.cycle(setting)
							if err != nil {
								t.Fatal(err)
							}
							p, err := c.At(y.mid[0] + g*y.half[0])
							if err != nil {
								t.Fatal(err)
							}
							least = math.Min(least, outline.Between(put(m, a, p), put(m, b, p)).Distance)
						}
						if x.parameters == 1 {
							break
						}
					}
					for kind, bound := range bounds {
						if least < bound-1e-9 {
							t.Errorf("%s / %s, box at %.3f: bound %d says %.5f, there is %.5f", a.Name, b.Name, y.mid[0], kind, bound, least)
						}
					}
				}
			}
		}
		if first+second < 40 || second == 0 {
			t.Errorf("only %d boxes, %d of them of second order", first+second, second)
		}
	}
}

// A bound that leaves out how far the joints stray from the linear motion would be too good: the crank's tip
// towards a disc, near the angle where it is nearest.
func TestStrayOfJoints(t *testing.T) {
	s, m := newSpace(t, fourBar(nil))
	x, err := s.pair(Body{Carrier: OnJoint, Of: "A", Region: pin(2)}, Body{Region: outline.Region{Outer: outline.Circle(Point{X: 60}, 2)}})
	if err != nil {
		t.Fatal(err)
	}
	// At angle 0 the tip moves square to the way to the disc, and comes no nearer than it is; a little before
	// and after it is further. Displaced by d it is 40 (1 - cos d) off the tangent.
	const h = 0.05
	now, err := x.at(box{mid: []float64{h}, half: []float64{h}})
	if err != nil {
		t.Fatal(err)
	}
	tip, _ := m.Joint("A")
	if want := 40 * h * h / 2; now.pa.rho[tip] < want-1e-3*want {
		t.Errorf("tip strays by %.6f, bound %.6f", want, now.pa.rho[tip])
	}
	gap := now.ta.Apply(Point{}).Dist(Point{X: 60}) - 4
	n := Point{X: 60}.Sub(now.ta.Apply(Point{})).Unit()
	if low := s.apart(now.pa, now.pb, []float64{h}, x.a, x.b, now.ta, now.tb, n); low > 16+1e-9 || low < gap-0.5 {
		t.Errorf("bound %.5f, smallest in the box 16, at its middle %.5f", low, gap)
	}
}

// The bound of second order must allow for the turn of the body that it is seen from: a bar turns about O
// while a disc beside O goes straight along it, and the bar's end comes up to the disc. Turned by d and moved by
// 40 d from (10, 8), the disc is 8 cos d - (10 + 40 d) sin d from the bar's axis.
func TestTurnCounts(t *testing.T) {
	s, m := newSpace(t, fourBar(nil))
	tip, _ := m.Joint("A")
	x, err := s.pair(Body{Carrier: OnLink, Of: "crank", Region: bar(40, 4)}, Body{Carrier: OnJoint, Of: "A", Region: pin(2)})
	if err != nil {
		t.Fatal(err)
	}
	const h = 0.15
	pa, err := s.pose([]float64{0}, []float64{h})
	if err != nil {
		t.Fatal(err)
	}
	pa.rho, pa.loose = make([]float64, len(pa.at)), false // of the crank the strays are known
	pa.rho[tip] = 40 * h * h / 2
	pb := pose{at: make([]Point, len(pa.at)), vel: [][]Point{make([]Point, len(pa.at))}, rho: make([]float64, len(pa.at))}
	pb.at[tip], pb.vel[0][tip] = Point{X: 10, Y: 8}, Point{X: 40}
	low := s.apart(pa, pb, []float64{h}, x.a, x.b, s.place(pa, x.a), s.place(pb, x.b), Point{Y: 1})
	if there := 8*math.Cos(h) - (10+40*h)*math.Sin(h) - 6; low > there {
		t.Errorf("bound %.4f, there is %.4f", low, there)
	}
}
