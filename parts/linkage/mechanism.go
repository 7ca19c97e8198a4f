package linkage

import (
	"errors"
	"fmt"
	"math"
)

// Mechanism is a linkage that was checked, taken apart into groups and put together at the start of
// its drive. It is read only; several goroutines may use one.
type Mechanism struct {
	linkage    Linkage
	jointNames []string
	joint      map[string]int
	link       map[string]int
	pins       [][]int
	shapes     [][][]Point // all that the lengths allow, by link
	ground     []int
	isGround   []bool
	near       []*Point // by joint, nil when not given
	rough      []*Point // near, or the place of a ground pivot
	pivot, tip int
	drive      int
	full       bool
	surplus    []int // links that only repeat what the others say
	generic    freedom
	gruebler   int
	plan       []planStep

	start     *frame
	shape     [][]Point // taken, by link
	prog      *program
	ambiguity *Ambiguity
}

// Ambiguity says that the linkage closes in several ways at the start and the near places do not
// tell which is meant.
type Ambiguity struct {
	Ways   int      // assemblies that fit the near places about equally well
	Joints []string // joints whose place differs between them, in the order of the joints
	Taken  []Point  // their places in the assembly that was taken
	Other  []Point  // their places in the next best
}

// String says what was taken and how to decide.
func (a Ambiguity) String() string {
	return fmt.Sprintf("the links close in %d ways at the start of the drive and near does not tell which; joint %s was taken at (%s, %s), it could be at (%s, %s): give it a near place",
		a.Ways, a.Joints[0], number(a.Taken[0].X), number(a.Taken[0].Y), number(a.Other[0].X), number(a.Other[0].Y))
}

// New checks a linkage, counts its freedoms and puts it together at the start of its drive.
//
// Which assembly is taken follows from the joints' near places; where these do not decide, one that
// moves through the whole drive is preferred, and Ambiguity tells. Errors: faults of the data (all of
// them, joined), *MobilityError, *LoopError when the links do not meet at the start.
func New(l Linkage) (*Mechanism, error) {
	if err := validate(l); err != nil {
		return nil, err
	}
	m := &Mechanism{linkage: l, joint: map[string]int{}, link: map[string]int{}}
	for i, j := range l.Joints {
		m.jointNames = append(m.jointNames, j.Name)
		m.joint[j.Name] = i
		m.isGround = append(m.isGround, j.Ground != nil)
		m.near = append(m.near, nil)
		m.rough = append(m.rough, j.Near)
		if j.Ground != nil {
			m.ground = append(m.ground, i)
			at := j.Ground.At
			m.rough[i] = &at
		} else {
			m.near[i] = j.Near
		}
	}
	var errs []error
	for i, k := range l.Links {
		m.link[k.Name] = i
		p := make([]int, len(k.Pins))
		for n, name := range k.Pins {
			p[n] = m.joint[name]
		}
		m.pins = append(m.pins, p)
		all, err := shapes(k)
		if err != nil {
			errs = append(errs, err)
		}
		m.shapes = append(m.shapes, all)
	}
	if len(errs) > 0 {
		return nil, errors.Join(errs...)
	}
	m.setDrive()
	if err := m.countFreedom(); err != nil {
		return nil, err
	}
	out := map[int]bool{}
	for _, k := range m.surplus {
		out[k] = true
	}
	m.plan = plan(len(m.jointNames), m.pins, m.isGround, m.drive, out)
	for _, s := range m.plan {
		if s.kind == blockStep && len(s.joints) > maxBlock {
			return nil, fmt.Errorf("linkage: %s have to be solved together, %d joints at once; at most %d are solved", andList(m.linkNames(s.links)), len(s.joints), maxBlock)
		}
	}
	if err := m.putTogether(); err != nil {
		return nil, err
	}
	return m, nil
}

func (m *Mechanism) setDrive() {
	d := m.linkage.Drive
	m.drive = m.link[d.Link]
	p := m.pins[m.drive]
	for i, j := range p {
		if m.isGround[j] {
			m.pivot, m.tip = j, p[(i+1)%len(p)]
			break
		}
	}
	m.full = d.Full || math.Abs(math.Abs(d.To-d.From)-2*math.Pi) < 1e-9
}

// span returns the drive's first and last angle; a full turn ends exactly 2 pi after it began.
func (m *Mechanism) span() (from, to float64) {
	d := m.linkage.Drive
	if !m.full {
		return d.From, d.To
	}
	if d.To < d.From {
		return d.From, d.From - 2*math.Pi
	}
	return d.From, d.From + 2*math.Pi
}

// countFreedom finds free joints and links that say nothing new. Of the latter it leaves out links
// until the rest is independent, two-pin links first and then plates whose joints the others hold
// (the second ply of a doubled link), the last in the list first. Whether they fit is checked at
// every step of the drive, as a third equal bar of a parallelogram does.
func (m *Mechanism) countFreedom() error {
	m.gruebler = gruebler(m.linkage)
	held := append([]bool(nil), m.isGround...)
	for _, j := range m.pins[m.drive] {
		held[j] = true
	}
	out := map[int]bool{m.drive: true}
	m.generic = genericFreedom(len(m.jointNames), m.pins, held, out)
	f := m.generic
	for f.surplus > 0 {
		pick, next := m.spare(f, held, out)
		if pick < 0 {
			break
		}
		out[pick] = true
		m.surplus = append(m.surplus, pick)
		f = next
	}
	if f.freely > 0 || f.surplus > 0 {
		e := &MobilityError{Mobility: 1 + f.freely, Joints: m.names(m.generic.free), Links: m.linkNames(m.generic.stress)}
		if f.freely == 0 {
			e.Mobility = 1 - m.generic.surplus
		}
		return e
	}
	return nil
}

// spare returns a link that can be left out without freeing a joint, and what is left then; -1 when
// there is none.
func (m *Mechanism) spare(f freedom, held []bool, out map[int]bool) (int, freedom) {
	without := func(k int) freedom {
		out[k] = true
		g := genericFreedom(len(m.jointNames), m.pins, held, out)
		delete(out, k)
		return g
	}
	for _, plates := range []bool{false, true} {
		for i := len(f.stress) - 1; i >= 0; i-- {
			k := f.stress[i]
			if (len(m.pins[k]) > 2) != plates {
				continue
			}
			if g := without(k); g.freely == f.freely {
				return k, g
			}
		}
	}
	return -1, f
}

func (m *Mechanism) isSurplus(k int) bool {
	for _, s := range m.surplus {
		if s == k {
			return true
		}
	}
	return false
}

func (m *Mechanism) names(joints []int) []string {
	var out []string
	for _, j := range joints {
		out = append(out, m.jointNames[j])
	}
	return out
}

func (m *Mechanism) linkNames(links []int) []string {
	var out []string
	for _, k := range links {
		out = append(out, m.linkage.Links[k].Name)
	}
	return out
}

// setPlaces returns the places of the ground pivots as set, by joint.
func (m *Mechanism) setPlaces() []Point {
	p := make([]Point, len(m.jointNames))
	for _, j := range m.ground {
		p[j] = m.linkage.Joints[j].Ground.At
	}
	return p
}

func (m *Mechanism) putTogether() error {
	from, to := m.span()
	all, fall := m.assemble(from, m.setPlaces(), maxAssemblies)
	if len(all) == 0 {
		e := &LoopError{Angle: from, Short: fall.short, ShortAt: from, Reason: fall.reason, Ranges: m.closingRanges(nil)}
		m.blame(e, fall.step)
		return e
	}
	rivals := m.rivals(all)
	take := 0
	if len(rivals) > 1 {
		for i := range rivals {
			if i < 64 && m.walks(rivals[i], from, to) {
				take = i
				break
			}
		}
	}
	a := rivals[take]
	m.start, m.shape, m.prog = a.frame, a.shape, a.prog
	for _, k := range m.surplus {
		best := math.Inf(1)
		for _, shape := range m.shapes[k] {
			if off := fits(m.pins[k], shape, a.frame.p); off < best {
				best, m.shape[k] = off, shape
			}
		}
	}
	m.start.angle = from
	for i, s := range m.prog.steps {
		if s.kind == dyadStep && m.start.flat[s.index] {
			return m.startsInLine(i)
		}
	}
	if len(rivals) > 1 {
		other := rivals[0]
		if take == 0 {
			other = rivals[1]
		}
		m.ambiguity = &Ambiguity{Ways: len(rivals)}
		for j := range m.jointNames {
			if dist(a.frame.p[j], other.frame.p[j]) > sameAssembly*a.prog.size {
				m.ambiguity.Joints = append(m.ambiguity.Joints, m.jointNames[j])
				m.ambiguity.Taken = append(m.ambiguity.Taken, a.frame.p[j])
				m.ambiguity.Other = append(m.ambiguity.Other, other.frame.p[j])
			}
		}
	}
	return nil
}

func (m *Mechanism) startsInLine(step int) error {
	s := m.plan[step]
	return fmt.Errorf("joint %s: %s lie in line at the start of the drive, %s, so it could go to either side: start the drive a little earlier or later",
		m.jointNames[s.joint], andList(m.linkNames(s.links)), degrees(m.linkage.Drive.From))
}

func (m *Mechanism) walks(a assembly, from, to float64) bool {
	a.frame.angle = from
	w := newWalker(a.prog, a.frame)
	_, ok := w.to(to)
	return ok
}

// blame names the joint and links of a step.
func (m *Mechanism) blame(e *LoopError, s planStep) {
	switch {
	case s.kind == dyadStep:
		e.Joint = m.jointNames[s.joint]
	case len(s.joints) > 0:
		e.Joint = m.jointNames[s.joints[0]]
	}
	e.Links = m.linkNames(s.links)
}

// Linkage returns what the mechanism was made from.
func (m *Mechanism) Linkage() Linkage { return m.linkage }

// Ambiguity tells whether the start of the drive allows several assemblies; nil when it does not, or
// when the near places decide.
func (m *Mechanism) Ambiguity() *Ambiguity { return m.ambiguity }

// Full reports whether the drive turns all the way round.
func (m *Mechanism) Full() bool { return m.full }

// Joint returns the index of a joint in Linkage.Joints and in every list of places.
func (m *Mechanism) Joint(name string) (int, bool) {
	i, ok := m.joint[name]
	return i, ok
}

// LinkFrame returns the pins of a link in its own frame, in the order of its pins: the first is the
// origin, the second lies on the positive x axis. A link whose mirror image was taken has it in here,
// so placements never mirror. Nil for an unknown link.
func (m *Mechanism) LinkFrame(link string) []Point {
	k, ok := m.link[link]
	if !ok {
		return nil
	}
	return append([]Point(nil), m.shape[k]...)
}
