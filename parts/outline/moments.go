package outline

import "math"

// Moments are integrals over the area, turned into integrals along the outline by Green's theorem:
//
//	area = 1/2 integral x dy - y dx      S_x = 1/2 integral x^2 dy     S_y = -1/2 integral y^2 dx
//	Iyy  = 1/3 integral x^3 dy           Ixx = -1/3 integral y^3 dx    Ixy = 1/2 integral x^2 y dy
//
// On an arc the integrand is a trigonometric polynomial of degree 5 at most; Gauss-Legendre with
// twelve points over a quarter turn is exact to rounding, also for nearly flat arcs, where the closed
// forms lose all digits.

// rawMoments are the integrals about a given origin.
type rawMoments struct{ a, sx, sy, ixx, iyy, ixy float64 }

func (m *rawMoments) add(n rawMoments) {
	m.a += n.a
	m.sx += n.sx
	m.sy += n.sy
	m.ixx += n.ixx
	m.iyy += n.iyy
	m.ixy += n.ixy
}

// gauss12 holds the positive abscissas and the weights of the twelve-point Gauss-Legendre rule on
// -1..1 (Abramowitz and Stegun, table 25.4).
var gauss12 = [6][2]float64{
	{0.125233408511468915472441369464, 0.249147045813402785000562436043},
	{0.367831498998180193752691536644, 0.233492536538354808760849898925},
	{0.587317954286617447296702418941, 0.203167426723065921749064455810},
	{0.769902674194304687036893833213, 0.160078328543346226334652529543},
	{0.904117256370474856678465866119, 0.106939325995318430960254718194},
	{0.981560634246719250690549090149, 0.047175336386511827194615961485},
}

func (c *curve) moments(origin Point) rawMoments {
	var m rawMoments
	if c.len == 0 {
		return m
	}
	pieces := 1
	if c.k != 0 {
		pieces = max(1, int(math.Ceil(math.Abs(c.sweep())/(math.Pi/2)-1e-9)))
	}
	h := c.len / float64(pieces) / 2
	for i := range pieces {
		mid := (2*float64(i) + 1) * h
		for _, g := range gauss12 {
			for _, side := range [2]float64{-1, 1} {
				s := mid + side*g[0]*h
				p, t := c.at(s).Sub(origin), c.tangent(s)
				dx, dy := t.X*g[1]*h, t.Y*g[1]*h
				x, y := p.X, p.Y
				m.a += (x*dy - y*dx) / 2
				m.sx += x * x * dy / 2
				m.sy -= y * y * dx / 2
				m.iyy += x * x * x * dy / 3
				m.ixx -= y * y * y * dx / 3
				m.ixy += x * x * y * dy / 2
			}
		}
	}
	return m
}

func (o Outline) rawMoments(origin Point) rawMoments {
	var m rawMoments
	for _, c := range o.curves() {
		m.add(c.moments(origin))
	}
	return m
}

// about turns integrals about the origin into moments about the centroid.
func (m rawMoments) about(origin Point) Moments {
	if m.a == 0 {
		return Moments{Centroid: origin}
	}
	cx, cy := m.sx/m.a, m.sy/m.a
	return Moments{
		Area:     m.a,
		Centroid: origin.Add(Point{cx, cy}),
		Ixx:      m.ixx - m.a*cy*cy,
		Iyy:      m.iyy - m.a*cx*cx,
		Ixy:      m.ixy - m.a*cx*cy,
	}
}

// Moments returns the area measures of what the outline encloses; all but the centroid are negative
// for a clockwise one.
func (o Outline) Moments() Moments {
	if len(o) < 2 {
		return Moments{}
	}
	ref := o.Bounds().Centre()
	return o.rawMoments(ref).about(ref)
}

// Moments returns the area measures of the material.
func (r Region) Moments() Moments { return MomentsOf([]Region{r}) }

// MomentsOf returns the area measures of all regions together.
func MomentsOf(rs []Region) Moments {
	b := Bounds(rs)
	if b.Empty() {
		return Moments{}
	}
	ref := b.Centre()
	var m rawMoments
	for _, r := range rs {
		for _, o := range r.Outlines() {
			m.add(o.rawMoments(ref))
		}
	}
	return m.about(ref)
}
