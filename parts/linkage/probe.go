package linkage

import "math"

// probe evaluates a cycle between its positions. It owns a walker; one goroutine uses it at a time.
type probe struct {
	c *Cycle
	w *walker
}

func (c *Cycle) probe() *probe {
	pr := c.prog.clone()
	return &probe{c: c, w: newWalker(pr, pr.frameOf(&c.Positions[0]))}
}

// angleAt returns the drive angle of position k, which may be Steps for the end of a full turn.
func (c *Cycle) angleAt(k int) float64 {
	from, to := c.m.span()
	return from + (to-from)*float64(k)/float64(c.Steps)
}

// at solves the frame at an angle between positions k and k+1. The result is good until the next
// call. A place where the loop does not close by a hair gives the last frame that does.
func (p *probe) at(k int, angle float64) *frame {
	if p.w.cur.angle != angle {
		p.w.pr.loadFrame(p.w.cur, &p.c.Positions[k])
		p.w.to(angle)
	}
	return p.w.cur
}

// roots returns the drive angles at which a function of the frame changes its sign, in the order of
// the drive, each refined to rounding by halving and the secant in turn.
func (p *probe) roots(value func(*frame) float64) []root {
	var out []root
	c := p.c
	begin := value(p.at(0, c.angleAt(0)))
	f0 := begin
	for k := 0; k < c.Steps; k++ {
		f1 := begin // a full turn ends where it began, to the bit: a root there counts once
		if !c.Full || k < c.Steps-1 {
			f1 = value(p.at(k, c.angleAt(k+1)))
		}
		if f0 == 0 && (k > 0 || c.Full) || f0 < 0 && f1 > 0 || f0 > 0 && f1 < 0 {
			out = append(out, p.root(k, c.angleAt(k), c.angleAt(k+1), f0, f1, value))
		}
		f0 = f1
	}
	return out
}

// root is a drive angle between position step and the next.
type root struct {
	step  int
	angle float64
}

func (p *probe) root(k int, a, b, fa, fb float64, value func(*frame) float64) root {
	if fa == 0 {
		return root{k, a}
	}
	for i := range 100 {
		mid := (a + b) / 2
		if i%2 == 1 { // the secant, kept a little inside
			t := fa / (fa - fb)
			mid = a + (b-a)*math.Max(1e-3, math.Min(1-1e-3, t))
		}
		if math.Abs(b-a) < 1e-15*(1+math.Abs(a)) || mid == a || mid == b {
			break
		}
		fm := value(p.at(k, mid))
		if fm == 0 {
			return root{k, mid}
		}
		if (fm > 0) == (fa > 0) {
			a, fa = mid, fm
		} else {
			b, fb = mid, fm
		}
	}
	return root{k, (a + b) / 2}
}
