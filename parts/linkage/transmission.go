package linkage

import (
	"math"

	"gonum.org/v1/gonum/mat"
)

// Transmission is the angle between the two links of a dyad at their common joint. At 90 degrees a
// force goes through whole; near 0 or 180 the links lie in line and the joint may jam or jump.
type Transmission struct {
	Joint    string
	Links    [2]string
	Pins     [3]string // of the first link, the joint, of the second link
	Min, Max float64   // radians, between 0 and pi
	MinAt    float64   // drive angle, radians
	MaxAt    float64
}

// Deviation is the largest difference from a right angle over the drive, radians.
func (t Transmission) Deviation() float64 {
	return math.Max(math.Abs(t.Min-math.Pi/2), math.Abs(t.Max-math.Pi/2))
}

// Transmissions returns the transmission angle of every dyad over the cycle, in the order in which
// they are solved. The extremes are exact: the distance of the dyad's two pivots is stationary there.
func (c *Cycle) Transmissions() []Transmission {
	p := c.probe()
	var out []Transmission
	for i := range c.prog.steps {
		s := &c.prog.steps[i]
		if s.kind != dyadStep {
			continue
		}
		d := s.dyad
		t := Transmission{
			Joint: c.m.jointNames[d.j],
			Pins:  [3]string{c.m.jointNames[d.a], c.m.jointNames[d.j], c.m.jointNames[d.b]},
			Min:   math.Inf(1), Max: math.Inf(-1),
		}
		copy(t.Links[:], c.m.linkNames(s.links))
		look := func(f *frame) {
			const tie = 1e-12
			a := d.angle(f)
			if a < t.Min-tie {
				t.Min, t.MinAt = a, f.angle
			}
			if a > t.Max+tie {
				t.Max, t.MaxAt = a, f.angle
			}
		}
		look(p.at(0, c.angleAt(0)))
		for _, r := range p.roots(d.spread) {
			look(p.at(r.step, r.angle))
		}
		look(p.at(c.Steps-1, c.angleAt(c.Steps)))
		out = append(out, t)
	}
	return out
}

// angle is the angle at the dyad's joint between its pivots.
func (d dyad) angle(f *frame) float64 {
	a, b := sub(f.p[d.a], f.p[d.j]), sub(f.p[d.b], f.p[d.j])
	return math.Abs(math.Atan2(cross(a, b), dot(a, b)))
}

// spread is the speed at which the dyad's pivots part, times their distance.
func (d dyad) spread(f *frame) float64 {
	return dot(sub(f.p[d.b], f.p[d.a]), sub(f.v[d.b], f.v[d.a]))
}

// Condition is how well a block of links that are solved together holds its joints: the smallest
// singular value of its Jacobian, in which a length error of a millimetre counts as 1 whatever the
// size of the linkage. About 0.1 and more is firm; at 0 the block is loose, as a dyad is in line.
type Condition struct {
	Links   []string
	Joints  []string
	Least   float64
	LeastAt float64 // drive angle, radians, of the position that has it
}

// Conditions returns the condition of every block over the positions of the cycle, in the order in
// which they are solved; empty for a linkage of dyads.
func (c *Cycle) Conditions() []Condition {
	var out []Condition
	for i, s := range c.prog.clone().steps {
		if s.kind != blockStep {
			continue
		}
		x := Condition{Links: c.m.linkNames(c.m.plan[i].links), Joints: c.m.names(s.joints), Least: math.Inf(1)}
		for _, p := range c.Positions {
			s.block.jacobian(p.Places, s.block.jac)
			var svd mat.SVD
			if !svd.Factorize(mat.NewDense(s.block.n, s.block.n, s.block.jac), mat.SVDNone) {
				continue
			}
			if v := svd.Values(nil); v[len(v)-1] < x.Least {
				x.Least, x.LeastAt = v[len(v)-1], p.Angle
			}
		}
		out = append(out, x)
	}
	return out
}
