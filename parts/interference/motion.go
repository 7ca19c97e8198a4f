package interference

import (
	"fmt"
	"math"

	"pinwright/parts/linkage"
	"pinwright/parts/outline"
)

// mechanism is the linkage as equations between joint coordinates. Its unknowns are the moving
// joints; a joint of the driven link is one of them too, with its place given by two equations.
//
// Every link fixes the distance of its first two pins; a further pin is an affine function of the
// first two, P = A + a (B-A) + b left(B-A). Distances are the only equations that are not linear,
// and they are quadratic: that makes the remainder bound of pose.go exact in kind.
//
// There may be more equations than unknowns: surplus links say again what the others say, and the
// opposite sides of a parallelogram that stays one are equal as vectors. Such equations hold as well,
// and they tell the way through a change point, where the others do not.
type mechanism struct {
	joints []string
	index  map[string]int
	slot   []int // joint to its place among the unknowns, -1 for ground joints
	n      int   // unknown joints

	ground   []groundJoint // by joint; zero for moving joints
	settings []int         // joints of the adjustable pivots, in order of joints
	links    []body
	link     map[string]int
	parallel [][4]int // joints O, A, B, D with A-O = B-D throughout

	driven int // index of the driven link
	hub    int // joint about which it turns
	aside  Point
	rows   int
	from   float64
	to     float64
	full   bool
	size   float64 // of the linkage, mm
}

type groundJoint struct {
	fixed  bool // in the ground, if only at a setting
	at     Point
	moving *linkage.Range
}

// body is a link as joints and the affine places of its further pins.
type body struct {
	pins   []int
	length float64
	a, b   []float64 // of pins[2:], see mechanism
	frame  []Point   // pins in the link's frame
}

// parameters returns the number of parameters: the drive and each adjustable pivot.
func (m *mechanism) parameters() int { return 1 + len(m.settings) }

// groundAt gives the place of a ground joint at setting s (0 to 1), its velocity with respect to s,
// and half the size of its second derivative (for the remainder).
func (g groundJoint) groundAt(s float64) (at, vel Point, curve float64) {
	r := g.moving
	switch {
	case r == nil:
		return g.at, Point{}, 0
	case r.Radius > 0:
		span := r.End - r.Start
		sin, cos := math.Sincos(r.Start + s*span)
		return Point{X: r.Centre.X + r.Radius*cos, Y: r.Centre.Y + r.Radius*sin},
			Point{X: -r.Radius * sin * span, Y: r.Radius * cos * span},
			r.Radius * span * span / 2
	default:
		d := r.To.Sub(r.From)
		return r.From.Add(d.Scale(s)), d, 0
	}
}

// newMechanism reads the linkage.
func newMechanism(source *linkage.Mechanism) (*mechanism, error) {
	l := source.Linkage()
	m := &mechanism{index: map[string]int{}, link: map[string]int{}, driven: -1, from: l.Drive.From, to: l.Drive.To, full: source.Full()}
	if m.full {
		m.to = m.from + 2*math.Pi
	}
	if m.to < m.from {
		m.from, m.to = m.to, m.from
	}
	for i, j := range l.Joints {
		m.index[j.Name] = i
		m.joints = append(m.joints, j.Name)
		if j.Ground != nil {
			m.slot = append(m.slot, -1)
			m.ground = append(m.ground, groundJoint{fixed: true, at: j.Ground.At, moving: j.Ground.Range})
			if j.Ground.Range != nil {
				m.settings = append(m.settings, i)
			}
			continue
		}
		m.slot = append(m.slot, m.n)
		m.n++
		m.ground = append(m.ground, groundJoint{})
	}
	for i, k := range l.Links {
		b, err := m.newBody(k, source.LinkFrame(k.Name))
		if err != nil {
			return nil, err
		}
		m.link[k.Name] = i
		m.links = append(m.links, b)
		if k.Name == l.Drive.Link {
			m.driven = i
		}
	}
	if m.driven < 0 {
		return nil, fmt.Errorf("no link is driven")
	}
	if err := m.setHub(l.Drive.Link); err != nil {
		return nil, err
	}
	start, err := source.Cycle(seedSteps, nil)
	if err != nil {
		return nil, err
	}
	m.parallel = m.parallels(start)
	m.rows = m.countRows()
	if m.rows < 2*m.n {
		return nil, fmt.Errorf("%d equations for %d coordinates: the linkage is not of one degree of freedom", m.rows, 2*m.n)
	}
	return m, nil
}

func (m *mechanism) newBody(k linkage.Link, frame []Point) (body, error) {
	b := body{frame: frame}
	for _, p := range k.Pins {
		at, ok := m.index[p]
		if !ok {
			return b, fmt.Errorf("link %s names joint %s, which is not there", k.Name, p)
		}
		b.pins = append(b.pins, at)
	}
	if len(b.pins) < 2 || len(b.frame) != len(b.pins) {
		return b, fmt.Errorf("link %s has no frame for its pins", k.Name)
	}
	base := b.frame[1].Sub(b.frame[0])
	b.length = base.Len()
	m.size = math.Max(m.size, b.length)
	for _, p := range b.frame[2:] {
		d := p.Sub(b.frame[0])
		b.a = append(b.a, d.Dot(base)/base.Dot(base))
		b.b = append(b.b, base.Left().Dot(d)/base.Dot(base))
	}
	return b, nil
}

// setHub finds the joint about which the driven link turns, and where its next pin lies from there:
// the drive's angle is that of the line between them.
func (m *mechanism) setHub(name string) error {
	pins := m.links[m.driven].pins
	for k, p := range pins {
		if m.ground[p].fixed {
			f := m.links[m.driven].frame
			m.hub, m.aside = p, f[(k+1)%len(pins)].Sub(f[k])
			return nil
		}
	}
	return fmt.Errorf("the driven link %s has no ground pin", name)
}

// countRows counts the equations.
func (m *mechanism) countRows() int {
	rows := 2 * len(m.parallel)
	for i, b := range m.links {
		if i == m.driven {
			rows += 2 * (len(b.pins) - 1)
			continue
		}
		rows += 1 + 2*(len(b.pins)-2)
	}
	return rows
}

// parallels finds parallelograms whose opposite sides stay parallel: A on a link with O, B on a link
// with D, A and B on one link, O and D on one link or both in the ground for good; the lengths of
// opposite sides agree to rounding, and the sides are parallel at every position of the cycle.
func (m *mechanism) parallels(c *linkage.Cycle) [][4]int {
	type side struct {
		p, q int
		mm   float64
	}
	var sides []side
	for _, b := range m.links {
		for i, p := range b.pins {
			for k, q := range b.pins {
				if i != k {
					sides = append(sides, side{p, q, b.frame[i].Dist(b.frame[k])})
				}
			}
		}
	}
	for p, g := range m.ground {
		for q, h := range m.ground {
			if p != q && g.fixed && h.fixed && g.moving == nil && h.moving == nil {
				sides = append(sides, side{p, q, g.at.Dist(h.at)})
			}
		}
	}
	near := 1e-9 * m.size
	var out [][4]int
	for _, oa := range sides {
		for _, db := range sides {
			// Each parallelogram once: o is the least joint, a before d.
			if oa.p > db.p || oa.p > oa.q || oa.p > db.q || oa.q > db.p || oa.q == db.q || oa.p == db.p || math.Abs(oa.mm-db.mm) > near {
				continue
			}
			across := func(p, q int) float64 {
				for _, s := range sides {
					if s.p == p && s.q == q {
						return s.mm
					}
				}
				return math.NaN()
			}
			if !(math.Abs(across(oa.q, db.q)-across(oa.p, db.p)) <= near) {
				continue
			}
			stays := true
			for _, p := range c.Positions {
				at := p.Places
				off := at[oa.q].Sub(at[oa.p]).Sub(at[db.q].Sub(at[db.p]))
				stays = stays && off.Len() < 1e-6*m.size
			}
			if stays {
				out = append(out, [4]int{oa.p, oa.q, db.q, db.p})
			}
		}
	}
	return out
}

// placement returns the motion that carries link i from its frame to the places of the joints.
func (m *mechanism) placement(at []Point, i int) outline.Transform {
	b := m.links[i]
	d := at[b.pins[1]].Sub(at[b.pins[0]]).Unit() // the second pin is on the frame's x axis
	t := outline.Transform{Cos: d.X, Sin: d.Y}
	t.Move = at[b.pins[0]].Sub(t.Apply(b.frame[0]))
	return t
}
