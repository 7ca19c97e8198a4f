package linkage

import (
	"fmt"
	"math"

	"pinwright/parts/outline"
)

// Position is the linkage at one drive angle.
type Position struct {
	Angle  float64 // of the drive, radians
	Places []Point // by joint, in the order of Linkage.Joints, mm
	// Speeds is the derivative of Places by the drive angle, mm per radian. Where links lie in line
	// exactly (a change point) it is that of 1e-5 radians before.
	Speeds []Point
	signs  []float64
	dets   []float64
}

// Cycle is the linkage over its drive, at equal steps of the drive angle and one setting of the
// adjustable pivots. A full turn has Steps positions (the last is followed by the first), a part of
// a turn Steps+1 (both ends are there). It is read only.
type Cycle struct {
	Setting   Setting
	Steps     int
	Full      bool
	Positions []Position
	Changes   []ChangePoint // where links pass through being in line, in the order of the drive

	m    *Mechanism
	prog *program
}

// ChangePoint is a drive angle at which the two links of a dyad lie in line and could be pushed to
// either side; the cycle follows the motion that has no jump in speed.
type ChangePoint struct {
	Angle float64
	Joint string
	Links [2]string
}

// Cycle solves the linkage at steps equal steps of its drive (at least 1), the adjustable pivots at
// the setting. The assembly is that of the start at the set places, carried along.
//
// Errors: *LoopError when it does not close everywhere (between the steps as well), *BranchError when
// a full turn does not come back to its beginning, *MobilityError when a surplus link would have to
// stretch; a setting that names a pivot which is not adjustable or a parameter outside 0 to 1.
func (m *Mechanism) Cycle(steps int, setting Setting) (*Cycle, error) {
	if steps < 1 || steps > 1<<20 {
		return nil, fmt.Errorf("cycle: %d steps asked for, want 1 to %d", steps, 1<<20)
	}
	pr := m.prog.clone()
	start, err := m.startAt(pr, setting)
	if err != nil {
		return nil, err
	}
	c := &Cycle{Setting: setting, Steps: steps, Full: m.full, m: m, prog: pr}
	from, to := m.span()
	n := steps
	if !m.full {
		n++
	}
	nj := pr.joints
	c.Positions = make([]Position, n)
	places, speeds := make([]Point, n*nj), make([]Point, n*nj)
	signs, dets := make([]float64, n*pr.dyads), make([]float64, n*pr.blocks)
	w := newWalker(pr, start)
	for k := 0; k <= steps; k++ {
		angle := from + (to-from)*float64(k)/float64(steps)
		if s, ok := w.to(angle); !ok {
			return nil, m.loopError(pr, start, w, s, setting)
		}
		if k == n {
			break
		}
		p := &c.Positions[k]
		p.Angle = angle
		p.Places, places = places[:nj:nj], places[nj:]
		p.Speeds, speeds = speeds[:nj:nj], speeds[nj:]
		p.signs, signs = signs[:pr.dyads:pr.dyads], signs[pr.dyads:]
		p.dets, dets = dets[:pr.blocks:pr.blocks], dets[pr.blocks:]
		copy(p.Places, w.cur.p)
		copy(p.Speeds, w.cur.v)
		copy(p.signs, w.cur.signs)
		copy(p.dets, w.cur.det)
	}
	for _, x := range w.changes {
		c.Changes = append(c.Changes, m.changePoint(x))
	}
	if m.full {
		if err := m.comesBack(start, w, setting); err != nil {
			return nil, err
		}
	}
	if err := m.surplusFits(c); err != nil {
		return nil, err
	}
	return c, nil
}

func (m *Mechanism) changePoint(x change) ChangePoint {
	c := ChangePoint{Angle: x.angle}
	for i, s := range m.prog.steps {
		if s.kind == dyadStep && s.index == x.dyad {
			c.Joint = m.jointNames[m.plan[i].joint]
			copy(c.Links[:], m.linkNames(m.plan[i].links))
		}
	}
	return c
}

// comesBack compares the end of a full turn with its beginning.
func (m *Mechanism) comesBack(start *frame, w *walker, setting Setting) error {
	worst, joint := 0.0, 0
	for j := range start.p {
		if d := dist(start.p[j], w.cur.p[j]); d > worst {
			worst, joint = d, j
		}
	}
	if worst <= 1e-6*m.prog.size {
		return nil
	}
	e := &BranchError{Joint: m.jointNames[joint], Angle: w.cur.angle, Jump: worst, Setting: setting}
	if len(w.changes) > 0 {
		e.Angle = w.changes[0].angle
	}
	return e
}

// surplusFits checks the links that were left out of the solution because others say the same.
func (m *Mechanism) surplusFits(c *Cycle) error {
	for _, k := range m.surplus {
		worst, at := 0.0, 0.0
		for _, p := range c.Positions {
			if d := fits(m.pins[k], m.shape[k], p.Places); d > worst {
				worst, at = d, p.Angle
			}
		}
		if worst > 1e-7*m.prog.size {
			links := m.linkNames(m.generic.stress)
			links = append(without(links, m.linkage.Links[k].Name), m.linkage.Links[k].Name)
			return &MobilityError{Mobility: 1 - len(m.surplus), Links: links, Stretch: worst, Angle: at}
		}
	}
	return nil
}

func without(list []string, name string) []string {
	var out []string
	for _, s := range list {
		if s != name {
			out = append(out, s)
		}
	}
	return out
}

// At solves the position at any drive angle within the drive, on the assembly of the cycle.
func (c *Cycle) At(angle float64) (Position, error) {
	w := c.walkerNear(angle)
	if _, ok := w.to(angle); !ok {
		return Position{}, fmt.Errorf("drive angle %s is outside the drive of the linkage", degrees(angle))
	}
	return w.position(), nil
}

func (w *walker) position() Position {
	return Position{
		Angle:  w.cur.angle,
		Places: append([]Point(nil), w.cur.p...), Speeds: append([]Point(nil), w.cur.v...),
		signs: append([]float64(nil), w.cur.signs...), dets: append([]float64(nil), w.cur.det...),
	}
}

// walkerNear returns a walker that stands at the last position of the cycle before the angle, so that
// it walks the way of the drive: a dyad that lies in line at a position leaves to its other side.
func (c *Cycle) walkerNear(angle float64) *walker {
	from, to := c.m.span()
	k := int(math.Floor((angle - from) / (to - from) * float64(c.Steps)))
	k = max(0, min(k, len(c.Positions)-1))
	return c.walkerAt(k)
}

func (c *Cycle) walkerAt(k int) *walker {
	pr := c.prog.clone()
	return newWalker(pr, pr.frameOf(&c.Positions[k]))
}

// frameOf turns a position back into a frame, with the gaps that a walk needs.
func (pr *program) frameOf(p *Position) *frame {
	f := pr.newFrame()
	pr.loadFrame(f, p)
	return f
}

func (pr *program) loadFrame(f *frame, p *Position) {
	f.angle = p.Angle
	copy(f.p, p.Places)
	copy(f.v, p.Speeds)
	copy(f.signs, p.signs)
	copy(f.det, p.dets)
	for i := range pr.steps {
		if s := &pr.steps[i]; s.kind == dyadStep {
			at, speed := f.p[s.dyad.j], f.v[s.dyad.j]
			f.meet(&s.dyad, s.index)
			f.p[s.dyad.j], f.v[s.dyad.j] = at, speed
		}
	}
}

// Placement returns the rigid motion that takes the link's own frame (see LinkFrame) to the plane of
// the linkage at a position of the cycle. It never mirrors.
func (c *Cycle) Placement(link string, position int) outline.Transform {
	return c.m.Placement(link, c.Positions[position])
}

// Placement returns the rigid motion that takes the link's own frame to the plane of the linkage; the
// motion that does nothing for an unknown link.
func (m *Mechanism) Placement(link string, p Position) outline.Transform {
	k, ok := m.link[link]
	if !ok {
		return outline.Place(0, false, Point{})
	}
	a, b := p.Places[m.pins[k][0]], p.Places[m.pins[k][1]]
	return outline.Place(math.Atan2(b.Y-a.Y, b.X-a.X), false, a)
}

// Turn returns the angular velocity of a link, radians per radian of drive, counter-clockwise
// positive; 0 for an unknown link.
func (m *Mechanism) Turn(link string, p Position) float64 {
	k, ok := m.link[link]
	if !ok {
		return 0
	}
	a, b := m.pins[k][0], m.pins[k][1]
	d := sub(p.Places[b], p.Places[a])
	return cross(d, sub(p.Speeds[b], p.Speeds[a])) / dot(d, d)
}

// Path returns the places of one joint over the cycle; nil for an unknown joint.
func (c *Cycle) Path(joint string) []Point {
	j, ok := c.m.joint[joint]
	if !ok {
		return nil
	}
	out := make([]Point, len(c.Positions))
	for k := range c.Positions {
		out[k] = c.Positions[k].Places[j]
	}
	return out
}

// Mechanism returns what the cycle was solved from.
func (c *Cycle) Mechanism() *Mechanism { return c.m }

// Closure returns the largest difference between the distance of two pins in a link's shape and in
// place, over all links and positions of the cycle, mm.
func (c *Cycle) Closure() float64 {
	worst := 0.0
	for _, p := range c.Positions {
		worst = math.Max(worst, closure(c.m.pins, c.m.shape, p.Places))
	}
	return worst
}
