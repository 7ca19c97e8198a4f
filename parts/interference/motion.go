package interference

import (
	"fmt"
	"math"

	"pinwright/parts/linkage"
)

// mechanism is the linkage as equations between joint coordinates. Its unknowns are the moving
// joints; a joint of the driven link is one of them too, with its place given by two equations.
//
// Every link fixes the distance of its first two pins; a further pin is an affine function of the
// first two, P = A + a (B-A) + b left(B-A). Distances are the only equations that are not linear,
// and they are quadratic: that makes the remainder bound below exact in kind.
type mechanism struct {
	joints []string
	index  map[string]int
	slot   []int // joint to its place among the unknowns, -1 for ground joints
	n      int   // unknown joints

	ground   []groundJoint // by joint; zero for moving joints
	settings []int         // joints of the adjustable pivots, in order of joints
	links    []body
	link     map[string]int

	driven   int // index of the driven link
	hub      int // joint about which it turns
	rows     int
	from, to float64
}

type groundJoint struct {
	fixed  bool
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

// pose is the state at the middle of a box and what can happen within it.
type pose struct {
	at  []Point   // by joint
	vel [][]Point // by parameter, by joint: mm per unit of the parameter
	rho []float64 // by joint: how far it may stray from the linear motion, mm
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

// newMechanism reads the linkage. frames gives the pins of each link in the link's own frame, in the
// order of the links and their pins.
func newMechanism(l linkage.Linkage, frames [][]Point) (*mechanism, error) {
	m := &mechanism{index: map[string]int{}, link: map[string]int{}, driven: -1, from: l.Drive.From, to: l.Drive.To}
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
		b := body{frame: frames[i]}
		for _, p := range k.Pins {
			at, ok := m.index[p]
			if !ok {
				return nil, fmt.Errorf("link %s names joint %s, which is not there", k.Name, p)
			}
			b.pins = append(b.pins, at)
		}
		if len(b.pins) < 2 || len(b.frame) != len(b.pins) {
			return nil, fmt.Errorf("link %s has no frame for its pins", k.Name)
		}
		base := b.frame[1].Sub(b.frame[0])
		b.length = base.Len()
		for _, p := range b.frame[2:] {
			d := p.Sub(b.frame[0])
			b.a = append(b.a, d.Dot(base)/base.Dot(base))
			b.b = append(b.b, base.Left().Dot(d)/base.Dot(base))
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
	m.hub = -1
	for _, p := range m.links[m.driven].pins {
		if m.ground[p].fixed {
			m.hub = p
			break
		}
	}
	if m.hub < 0 {
		return nil, fmt.Errorf("the driven link %s has no ground pin", l.Drive.Link)
	}
	m.rows = m.countRows()
	if m.rows != 2*m.n {
		return nil, fmt.Errorf("%d equations for %d coordinates: the linkage is not of one degree of freedom", m.rows, 2*m.n)
	}
	return m, nil
}

// countRows counts the equations.
func (m *mechanism) countRows() int {
	rows := 0
	for i, b := range m.links {
		if i == m.driven {
			rows += 2 * (len(b.pins) - 1)
			continue
		}
		rows += 1 + 2*(len(b.pins)-2)
	}
	return rows
}
