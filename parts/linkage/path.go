package linkage

import (
	"math"
	"sort"
)

// FootPath describes the path of one traced joint. Down is towards smaller y.
type FootPath struct {
	Joint  string
	Stride float64 // extent along x, mm
	Lift   float64 // extent along y, mm
	Length float64 // along the path, mm
	XMin   Extreme
	XMax   Extreme
	YMin   Extreme
	YMax   Extreme
	Stance []Stance // one for each band asked for
}

// Extreme is a place on a path and the drive angle at which it is reached; when it is reached several
// times, the first in the order of the drive.
type Extreme struct {
	Point
	Angle float64
}

// Stance is the part of the drive in which a foot is within a band above its lowest place.
type Stance struct {
	Band   float64 // as a fraction of the lift
	Height float64 // of the band, mm
	Length float64 // extent along x of the foot within it, mm
	Duty   float64 // share of the drive
}

// FootPath measures the path of a joint exactly, not at the positions only: extremes where the speed
// along x or y is zero, stance between the crossings of the band's top. Bands are fractions of the
// lift. It reports false for an unknown joint.
func (c *Cycle) FootPath(joint string, bands []float64) (FootPath, bool) {
	j, ok := c.m.joint[joint]
	if !ok {
		return FootPath{}, false
	}
	p := c.probe()
	nodes := p.nodes(j)
	out := FootPath{Joint: joint}
	first := nodes[0].extreme()
	out.XMin, out.XMax, out.YMin, out.YMax = first, first, first, first
	const tie = 1e-9 // mm: an equal extreme later in the drive does not replace an earlier one
	for _, n := range nodes {
		e := n.extreme()
		if e.X < out.XMin.X-tie {
			out.XMin = e
		}
		if e.X > out.XMax.X+tie {
			out.XMax = e
		}
		if e.Y < out.YMin.Y-tie {
			out.YMin = e
		}
		if e.Y > out.YMax.Y+tie {
			out.YMax = e
		}
	}
	out.Stride, out.Lift = out.XMax.X-out.XMin.X, out.YMax.Y-out.YMin.Y
	out.Length = p.length(j)
	for _, b := range bands {
		out.Stance = append(out.Stance, p.stance(j, nodes, out.YMin.Y, b, b*out.Lift))
	}
	return out, true
}

// node is a place of the path between which both coordinates go one way.
type node struct {
	step  int // position before it
	angle float64
	at    Point
}

func (n node) extreme() Extreme { return Extreme{n.at, n.angle} }

// nodes returns the positions of the cycle and the extremes between them, in the order of the drive,
// both ends of the drive included.
func (p *probe) nodes(j int) []node {
	c := p.c
	var out []node
	for k := 0; k <= c.Steps; k++ {
		step := min(k, c.Steps-1)
		out = append(out, node{step, c.angleAt(k), p.at(step, c.angleAt(k)).p[j]})
	}
	for _, along := range []func(*frame) float64{
		func(f *frame) float64 { return f.v[j].X },
		func(f *frame) float64 { return f.v[j].Y },
	} {
		for _, r := range p.roots(along) {
			out = append(out, node{r.step, r.angle, p.at(r.step, r.angle).p[j]})
		}
	}
	back := c.angleAt(c.Steps) < c.angleAt(0)
	sort.SliceStable(out, func(a, b int) bool {
		if out[a].step != out[b].step {
			return out[a].step < out[b].step
		}
		return (out[a].angle < out[b].angle) != back && out[a].angle != out[b].angle
	})
	return out
}

// length integrates the speed by Simpson's rule over each step.
func (p *probe) length(j int) float64 {
	c := p.c
	sum := 0.0
	for k := 0; k < c.Steps; k++ {
		a, b := c.angleAt(k), c.angleAt(k+1)
		v0 := norm(p.at(k, a).v[j])
		v1 := norm(p.at(k, (a+b)/2).v[j])
		v2 := norm(p.at(k, b).v[j])
		sum += math.Abs(b-a) * (v0 + 4*v1 + v2) / 6
	}
	return sum
}

func (p *probe) stance(j int, nodes []node, low, fraction, height float64) Stance {
	top := low + height
	lo, hi, down := math.Inf(1), math.Inf(-1), 0.0
	touch := func(x float64) { lo, hi = math.Min(lo, x), math.Max(hi, x) }
	for i, n := range nodes {
		if n.at.Y <= top {
			touch(n.at.X)
		}
		if i == 0 {
			continue
		}
		o := nodes[i-1]
		if n.angle == o.angle {
			continue
		}
		in, was := n.at.Y <= top, o.at.Y <= top
		switch {
		case in && was:
			down += math.Abs(n.angle - o.angle)
		case in != was:
			above := func(f *frame) float64 { return f.p[j].Y - top }
			r := p.root(o.step, o.angle, n.angle, o.at.Y-top, n.at.Y-top, above)
			touch(p.at(r.step, r.angle).p[j].X)
			if was {
				down += math.Abs(r.angle - o.angle)
			} else {
				down += math.Abs(n.angle - r.angle)
			}
		}
	}
	s := Stance{Band: fraction, Height: height}
	if hi >= lo {
		s.Length = hi - lo
	}
	s.Duty = down / math.Abs(p.c.angleAt(p.c.Steps)-p.c.angleAt(0))
	return s
}
