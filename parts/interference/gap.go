package interference

import (
	"container/heap"
	"fmt"
	"math"
	"slices"

	"pinwright/parts/linkage"
	"pinwright/parts/outline"
)

// Options says how exact the answer must be.
type Options struct {
	Accuracy float64 // mm; the smallest gap is wanted to this
	Share    float64 // and to this share of itself: 0.02 leaves a gap of 5 mm open by another 0.1 mm
	Limit    float64 // mm; pairs that never come closer are not looked at further: their gap is given as Limit
	Boxes    int     // at most so many boxes a pair
}

// Space is a mechanism ready for questions about gaps. It keeps the poses it has solved, so asking
// about many pairs costs little more than asking about one. It is not safe for concurrent use.
type Space struct {
	m      *mechanism
	source *linkage.Mechanism
	cycles map[string]*linkage.Cycle
	poses  map[string]pose
}

// NewSpace prepares a mechanism. It errs when the mechanism has surplus links, whose equations do not
// fix the positions one by one.
func NewSpace(source *linkage.Mechanism) (*Space, error) {
	l := source.Linkage()
	frames := make([][]Point, len(l.Links))
	for i, k := range l.Links {
		frames[i] = source.LinkFrame(k.Name)
	}
	m, err := newMechanism(l, frames)
	if err != nil {
		return nil, fmt.Errorf("interference: %w", err)
	}
	return &Space{m: m, source: source, cycles: map[string]*linkage.Cycle{}, poses: map[string]pose{}}, nil
}

// seed gives the places of all joints at a drive angle and settings, on the branch that the
// mechanism is on.
func (s *Space) seed(angle float64, settings []float64) ([]Point, error) {
	const steps = 72 // only the branch matters: the places are solved again
	setting := linkage.Setting{}
	for i, j := range s.m.settings {
		setting[s.m.joints[j]] = settings[i]
	}
	key := setting.String()
	c, ok := s.cycles[key]
	if !ok {
		var err error
		if c, err = s.source.Cycle(steps, setting); err != nil {
			return nil, err
		}
		s.cycles[key] = c
	}
	p, err := c.At(angle)
	if err != nil {
		return nil, err
	}
	return p.Places, nil
}

// box is a piece of the parameter space.
type box struct {
	mid, half []float64
	low       float64 // the gap in it is at least this
	key       string  // the way of halvings that leads to it
}

type boxHeap []box

func (h boxHeap) Len() int { return len(h) }
func (h boxHeap) Less(i, j int) bool {
	if h[i].low != h[j].low {
		return h[i].low < h[j].low
	}
	return h[i].key < h[j].key
}
func (h boxHeap) Swap(i, j int) { h[i], h[j] = h[j], h[i] }
func (h *boxHeap) Push(x any)   { *h = append(*h, x.(box)) }
func (h *boxHeap) Pop() any {
	old := *h
	x := old[len(old)-1]
	*h = old[:len(old)-1]
	return x
}

// pose solves the middle of a box, from memory if it was met before.
func (s *Space) pose(b box) (pose, error) {
	if p, ok := s.poses[b.key]; ok {
		return p, nil
	}
	seed, err := s.seed(b.mid[0], b.mid[1:])
	if err != nil {
		return pose{}, fmt.Errorf("interference: %w", err)
	}
	p, err := s.m.poseAt(b.mid, b.half, seed)
	if err != nil {
		return pose{}, fmt.Errorf("interference: %w", err)
	}
	s.poses[b.key] = p
	return p, nil
}

// firstBoxes cuts the parameter space into pieces worth starting with.
func (s *Space) firstBoxes() []box {
	const turns = 48 // pieces of the drive: 7.5 degrees of a full turn
	var boxes []box
	width := (s.m.to - s.m.from) / turns
	for i := range turns {
		b := box{
			mid:  []float64{s.m.from + (float64(i)+0.5)*width},
			half: []float64{width / 2},
			key:  string([]byte{byte('A' + i)}),
			low:  math.Inf(-1),
		}
		for range s.m.settings {
			b.mid = append(b.mid, 0.5)
			b.half = append(b.half, 0.5)
		}
		boxes = append(boxes, b)
	}
	return boxes
}

// halve cuts a box across the parameter that moves the joints most.
func (s *Space) halve(b box, p pose) [2]box {
	side, most := 0, -1.0
	for k := range b.half {
		reach := 0.0
		for _, v := range p.vel[k] {
			reach = math.Max(reach, v.Len()*b.half[k])
		}
		if reach > most {
			side, most = k, reach
		}
	}
	var two [2]box
	for i, sign := range []float64{-1, 1} {
		c := box{
			mid:  append([]float64(nil), b.mid...),
			half: append([]float64(nil), b.half...),
			key:  b.key + string([]byte{byte('a' + 2*side + i)}),
		}
		c.half[side] /= 2
		c.mid[side] += sign * c.half[side]
		two[i] = c
	}
	return two
}

// carried is a body with what the search asks of it again and again.
type carried struct {
	Body
	index   int // of link or joint
	corners [4]Point
	centre  Point
	radius  float64
	disc    bool // a disc about the joint that carries it
	convex  bool // the outer outline
}

func (s *Space) carry(b Body) (carried, error) {
	c := carried{Body: b}
	switch b.Carrier {
	case OnLink:
		i, ok := s.m.link[b.Of]
		if !ok {
			return c, fmt.Errorf("interference: body %s moves with link %s, which is not there", b.Name, b.Of)
		}
		c.index = i
	case OnJoint:
		i, ok := s.m.index[b.Of]
		if !ok {
			return c, fmt.Errorf("interference: body %s moves with joint %s, which is not there", b.Name, b.Of)
		}
		c.index = i
	}
	box := b.Region.Bounds()
	c.corners = [4]Point{box.Min, {X: box.Max.X, Y: box.Min.Y}, box.Max, {X: box.Min.X, Y: box.Max.Y}}
	c.centre = box.Min.Add(box.Max).Scale(0.5)
	c.radius = box.Max.Sub(box.Min).Len() / 2
	if at, r, ok := b.Region.Outer.AsCircle(); ok && b.Carrier == OnJoint && at.Len() < 1e-9 {
		c.disc, c.radius = true, r
	}
	c.convex = convex(b.Region.Outer)
	return c, nil
}

// place returns the motion of a body at a pose.
func (s *Space) place(p pose, b carried) outline.Transform {
	switch b.Carrier {
	case OnLink:
		return s.m.placement(p, b.index)
	case OnJoint:
		return outline.Place(0, false, p.at[b.index])
	}
	return outline.Place(0, false, Point{})
}

// field returns the velocity of the body's point that is at q, by parameter k, and how far that
// point may stray from the linear motion within the pose's box.
func (s *Space) field(p pose, b carried, q Point, k int) Point {
	switch b.Carrier {
	case OnLink:
		pins := s.m.links[b.index].pins
		base := p.at[pins[1]].Sub(p.at[pins[0]])
		va, vb := p.vel[k][pins[0]], p.vel[k][pins[1]]
		spin := base.Left().Dot(vb.Sub(va)) / base.Dot(base)
		return va.Add(q.Sub(p.at[pins[0]]).Left().Scale(spin))
	case OnJoint:
		return p.vel[k][b.index]
	}
	return Point{}
}

func (s *Space) stray(p pose, b carried, q Point) float64 {
	switch b.Carrier {
	case OnLink:
		pins := s.m.links[b.index].pins
		base := p.at[pins[1]].Sub(p.at[pins[0]])
		d := q.Sub(p.at[pins[0]])
		fa := d.Dot(base) / base.Dot(base)
		fb := base.Left().Dot(d) / base.Dot(base)
		return math.Hypot(1-fa, fb)*p.rho[pins[0]] + math.Hypot(fa, fb)*p.rho[pins[1]]
	case OnJoint:
		return p.rho[b.index]
	}
	return 0
}

// approach bounds how much nearer the bodies can come within the box than at its middle.
//
// Seen from body b, a point q of a is displaced by e_a(q) - e_b(q), both motions being affine in
// the place. The length of that is convex in q, so its greatest value over a is at a corner of a box
// round a. The same holds with the bodies exchanged; the smaller bound counts.
func (s *Space) approach(p pose, half []float64, a, b carried, ta, tb outline.Transform) float64 {
	bound := func(of carried, t outline.Transform) float64 {
		worst := 0.0
		for _, c := range of.corners {
			q := t.Apply(c)
			d := s.stray(p, a, q) + s.stray(p, b, q)
			for k := range half {
				d += s.field(p, a, q, k).Sub(s.field(p, b, q, k)).Len() * half[k]
			}
			worst = math.Max(worst, d)
		}
		return worst
	}
	return math.Min(bound(a, ta), bound(b, tb))
}

// approachDisc is approach for a disc about a joint and a convex body, when it can say more; near is the
// shortest way between them at the middle, from the body to the disc.
//
// Seen from the body, the disc's centre c is displaced by the vector w = e_c - e_body(c), turned back by
// the turn phi of the body within the box. A convex body lies behind the line square to the shortest
// way n, so the gap shrinks by no more than -n.w <= |n.V| d + strays, and by |phi| |w| for the turning
// back. phi <= pi/2 times the chord, which the joints' displacements bound.
func (s *Space) approachDisc(p pose, half []float64, disc, body carried, near outline.Nearest) float64 {
	centre := p.at[disc.index]
	n := centre.Sub(near.A)
	if n.Len() < 1e-9 {
		return math.Inf(1)
	}
	n = n.Unit()
	strays := s.stray(p, disc, centre) + s.stray(p, body, centre)
	along, whole := strays, strays
	for k := range half {
		v := s.field(p, disc, centre, k).Sub(s.field(p, body, centre, k))
		along += math.Abs(n.Dot(v)) * half[k]
		whole += v.Len() * half[k]
	}
	return along + s.turnBound(p, half, body)*whole
}

// turnBound bounds how far a body turns within the box, radians.
func (s *Space) turnBound(p pose, half []float64, b carried) float64 {
	if b.Carrier != OnLink {
		return 0
	}
	link := s.m.links[b.index]
	i, k := link.pins[0], link.pins[1]
	chord := p.rho[i] + p.rho[k]
	for q := range half {
		chord += p.vel[q][i].Sub(p.vel[q][k]).Len() * half[q]
	}
	return math.Pi / 2 * chord / link.length
}

// convex tells whether an outer outline turns left all the way.
func convex(o outline.Outline) bool {
	segments := o.Segments()
	for i, a := range segments {
		b := segments[(i+1)%len(segments)]
		if a.Bulge < 0 || a.Tangent(1).Cross(b.Tangent(0)) < -1e-9 {
			return false
		}
	}
	return true
}

// rigid tells whether two bodies never move against each other: both are discs about pins of one link.
func (s *Space) rigid(a, b carried) bool {
	if !a.disc || !b.disc {
		return false
	}
	for _, l := range s.m.links {
		if slices.Contains(l.pins, a.index) && slices.Contains(l.pins, b.index) {
			return true
		}
	}
	return false
}

// Smallest returns the smallest gap between two bodies over the whole motion, seen from above:
// heights are the caller's business.
//
// It errs when the mechanism cannot be solved somewhere, or when the accuracy asked for is not
// reached within the boxes allowed.
func (s *Space) Smallest(a, b Body, o Options) (Gap, error) {
	ca, err := s.carry(a)
	if err != nil {
		return Gap{}, err
	}
	cb, err := s.carry(b)
	if err != nil {
		return Gap{}, err
	}
	best := Gap{MM: o.Limit}
	allowed := func(gap float64) float64 { return o.Accuracy + o.Share*gap }
	var open boxHeap
	visit := func(x box) error {
		best.Boxes++
		p, err := s.pose(x)
		if err != nil {
			return err
		}
		ta, tb := s.place(p, ca), s.place(p, cb)
		come := s.approach(p, x.half, ca, cb, ta, tb)
		apart := ta.Apply(ca.centre).Dist(tb.Apply(cb.centre)) - ca.radius - cb.radius
		if apart-come >= best.MM {
			return nil
		}
		near := outline.Between(a.Region.Transform(ta), b.Region.Transform(tb))
		if near.Distance < best.MM {
			best.MM, best.At = near.Distance, near.A
			best.Angle, best.Settings = x.mid[0], append([]float64(nil), x.mid[1:]...)
		}
		switch {
		case cb.disc && ca.convex:
			come = math.Min(come, s.approachDisc(p, x.half, cb, ca, near))
		case ca.disc && cb.convex:
			come = math.Min(come, s.approachDisc(p, x.half, ca, cb, outline.Nearest{A: near.B, B: near.A}))
		}
		x.low = near.Distance - come
		if x.low < best.MM-allowed(best.MM) {
			heap.Push(&open, x)
		}
		return nil
	}
	boxes := s.firstBoxes()
	if s.rigid(ca, cb) {
		boxes = boxes[:1]
	}
	for _, x := range boxes {
		if err := visit(x); err != nil {
			return Gap{}, err
		}
	}
	for open.Len() > 0 && !s.rigid(ca, cb) {
		x := heap.Pop(&open).(box)
		if best.MM == 0 || x.low >= best.MM-allowed(best.MM) {
			break
		}
		if best.Boxes >= o.Boxes {
			return best, fmt.Errorf("interference: gap between %s and %s is known only to lie between %.3f and %.3f mm after %d boxes; near drive angle %.2f deg",
				a.Name, b.Name, x.low, best.MM, best.Boxes, best.Angle*180/math.Pi)
		}
		p, err := s.pose(x)
		if err != nil {
			return Gap{}, err
		}
		for _, y := range s.halve(x, p) {
			if err := visit(y); err != nil {
				return Gap{}, err
			}
		}
	}
	best.Error = allowed(best.MM)
	return best, nil
}
