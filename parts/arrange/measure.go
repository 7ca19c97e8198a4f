package arrange

import (
	"errors"
	"fmt"
	"math"
	"runtime"
	"slices"
	"sync"

	"pinwright/parts"
	"pinwright/parts/interference"
	"pinwright/parts/job"
	"pinwright/parts/linkage"
	"pinwright/parts/material"
	"pinwright/parts/outline"
	"pinwright/parts/planes"
	"pinwright/parts/stack"
)

const (
	// axial is how far two things must be apart in height to pass each other, as in the proof of the
	// finished side view (package assembly).
	axial = 0.25

	// point is the radius of the disc that stands for the axis of a pin, mm.
	point = 0.01

	// accuracy, share and effort of the gaps: whether they are wider than the running gap is what counts.
	accuracy = 0.01
	share    = 0.02
	effort   = 200000
)

// pair is a pin and a body, or two pins.
type pair struct{ a, b int }

// survey is everything that is measured.
type survey struct {
	job    job.Job
	space  *interference.Space
	bodies []interference.Body // by body of the problem
	thick  []float64
	cross  []interference.Body
	pins   []pin
	toBody map[pair]float64 // distance of a pin's axis to a body it is not on, where that matters
	toPin  map[pair]float64 // distance of two axes, the lesser pin first
}

// newSurvey makes the parts and measures the pins.
func newSurvey(j job.Job, m *linkage.Mechanism) (*survey, error) {
	s := &survey{job: j, toBody: map[pair]float64{}, toPin: map[pair]float64{}}
	var err error
	if s.space, err = interference.NewSpace(m); err != nil {
		return nil, err
	}
	if err := s.makeParts(m); err != nil {
		return nil, err
	}
	var errs []error
	for i := range j.Pins {
		p, err := measurePin(j, i)
		errs = append(errs, err)
		s.pins = append(s.pins, p)
	}
	return s, errors.Join(errs...)
}

// makeParts makes bodies of the links, the frame plates and the cross members, each on a plane of its own.
func (s *survey) makeParts(m *linkage.Mechanism) error {
	j := s.job
	n := len(j.Links)
	on := make([]int, n)
	var levels []parts.Level
	if j.Frame != nil {
		for i := range j.Frame.Plates {
			on = append(on, n+i)
			levels = append(levels, parts.Level{Plane: n + i, Low: float64(100 * i), Up: float64(100*i) + 1})
		}
	}
	for i := range n {
		on[i] = i
	}
	list, err := parts.Make(placed(single(j), on), m, levels)
	if err != nil {
		return err
	}
	s.bodies, s.thick = make([]interference.Body, len(on)), make([]float64, len(on))
	for _, p := range list {
		b := slices.Index(on, p.Plane)
		k := slices.IndexFunc(j.Stock, func(x job.Stock) bool { return x.Name == p.Stock })
		if b < 0 || k < 0 || p.Link != s.name(b) {
			continue // a cross member
		}
		s.thick[b] = j.Stock[k].Measured
		s.bodies[b] = interference.Body{Name: p.Link, Region: p.Region}
		if b < n {
			s.bodies[b].Carrier, s.bodies[b].Of = interference.OnLink, p.Link
		}
	}
	if j.Frame == nil {
		return nil
	}
	for i, c := range j.Frame.Cross {
		k := slices.IndexFunc(j.Stock, func(x job.Stock) bool { return x.Name == c.Stock })
		if k < 0 {
			return fmt.Errorf("cross member %d is cut from stock %q, which the job does not have", i+1, c.Stock)
		}
		half := outline.Point{X: c.Width / 2, Y: j.Stock[k].Measured / 2}
		foot := outline.Region{Outer: outline.Rectangle(half.Scale(-1), half)}
		s.cross = append(s.cross, interference.Body{Name: fmt.Sprintf("cross member %d", i+1), Region: foot.Transform(outline.Place(c.Angle, false, c.At))})
	}
	return nil
}

// name is the name of a body.
func (s *survey) name(b int) string {
	if b < len(s.job.Links) {
		return s.job.Links[b].Name
	}
	return s.job.Frame.Plates[b-len(s.job.Links)].Name
}

// part is a body as the gaps want it.
func (s *survey) part(b int) interference.Body { return s.bodies[b] }

// disc is a zone of a pin of the problem: first the job's pins, then the cross members.
func (s *survey) disc(pin int, z planes.Zone) interference.Body {
	if pin >= len(s.pins) {
		return s.cross[pin-len(s.pins)]
	}
	return s.round(pin, math.Max(point, s.pins[pin].radius[z]))
}

func (s *survey) round(pin int, radius float64) interference.Body {
	p := s.pins[pin]
	return interference.Body{
		Name: "pin " + p.joint, Carrier: interference.OnJoint, Of: p.joint,
		Region: outline.Region{Outer: outline.Circle(outline.Point{}, radius)},
	}
}

// question is a gap that is asked for, and what is done with the answer.
type question struct {
	a, b          interference.Body
	limit, enough float64
	then          func(g interference.Gap)
}

// upTo is the limit for a question whether a gap is at least so wide: what is open about a gap at the limit
// still leaves as much.
func upTo(gap float64) float64 { return (gap + 2*accuracy) / (1 - share) }

// ask answers questions on all cores; what follows from the answers is done in the order of the questions.
func (s *survey) ask(list []question) error {
	gaps, errs := make([]interference.Gap, len(list)), make([]error, len(list))
	next := make(chan int)
	var work sync.WaitGroup
	for range min(runtime.GOMAXPROCS(0), len(list)) {
		work.Go(func() {
			for i := range next {
				q := list[i]
				gaps[i], errs[i] = s.space.Smallest(q.a, q.b, interference.Options{Accuracy: accuracy, Share: share, Limit: q.limit, Enough: q.enough, Boxes: effort})
			}
		})
	}
	for i := range list {
		next <- i
	}
	close(next)
	work.Wait()
	if err := errors.Join(errs...); err != nil {
		return err
	}
	for i, q := range list {
		q.then(gaps[i])
	}
	return nil
}

// problem measures the gaps and states the problem.
func (s *survey) problem() (planes.Problem, error) {
	p := planes.Problem{Washer: stack.RunningGap, Clear: stack.RunningGap, First: 1}
	for b := range s.bodies {
		p.Bodies = append(p.Bodies, planes.Body{Name: s.name(b), Thickness: s.thick[b]})
	}
	for _, x := range s.pins {
		p.Pins = append(p.Pins, planes.Pin{Name: x.joint, Members: x.members, Below: x.below, Above: x.above, Loaded: true})
	}
	p.Washer = s.washer()
	s.frame(&p)
	var list []question
	list = append(list, s.ofParts(&p)...)
	list = append(list, s.ofPinsAndParts(&p)...)
	list = append(list, s.ofPins(&p)...)
	if err := s.ask(list); err != nil {
		return p, err
	}
	s.demands(&p)
	return p, nil
}

// washer is the gap between planes as a rule: the thickest washer of the pins.
func (s *survey) washer() float64 {
	out := 0.0
	for i, x := range s.pins {
		kits, err := stack.Build(alone(s.job, i, x.members, 1))
		if err != nil {
			continue
		}
		for _, e := range kits[0].Elements {
			if e.Kind == stack.WasherElement {
				out = math.Max(out, e.Thickness)
			}
		}
	}
	if out == 0 {
		return stack.RunningGap
	}
	return out
}

// frame enters the cross members, which join the frame plates, and keeps plates apart.
func (s *survey) frame(p *planes.Problem) {
	if s.job.Frame == nil || len(s.job.Frame.Plates) < 2 {
		s.cross = nil
		return
	}
	var plates []int
	for b := len(s.job.Links); b < len(s.bodies); b++ {
		plates = append(plates, b)
	}
	for i, c := range s.cross {
		least := 2*s.thick[plates[0]] + s.web(s.job.Frame.Cross[i].Stock)
		p.Pins = append(p.Pins, planes.Pin{Name: c.Name, Members: plates, Least: least, Free: true})
	}
	if len(s.cross) == 0 {
		p.Pins = append(p.Pins, planes.Pin{Name: "the frame", Members: plates, Free: true})
	}
}

// web is how narrow a part of a stock may be: a cross member is no shorter between its tabs.
func (s *survey) web(stock string) float64 {
	i := slices.IndexFunc(s.job.Stock, func(x job.Stock) bool { return x.Name == stock })
	if i < 0 {
		return 0
	}
	m, err := material.Lookup(s.job.Stock[i].Material)
	if err != nil {
		return 0
	}
	return m.Web(s.job.Stock[i].Thickness).Want
}

// ofParts asks which parts may share a plane. Those on one pin may not anyway.
func (s *survey) ofParts(p *planes.Problem) []question {
	var out []question
	for a := range s.bodies {
		for b := a + 1; b < len(s.bodies); b++ {
			if slices.ContainsFunc(p.Pins, func(x planes.Pin) bool { return slices.Contains(x.Members, a) && slices.Contains(x.Members, b) }) {
				continue
			}
			out = append(out, question{s.bodies[a], s.bodies[b], upTo(stack.RunningGap), stack.RunningGap, func(g interference.Gap) {
				if g.MM-g.Error < stack.RunningGap {
					p.Apart = append(p.Apart, planes.Apart{A: a, B: b, Near: planes.Near{MM: g.MM, Angle: g.Angle}})
				}
			}})
		}
	}
	return out
}

var zones = [...]planes.Zone{planes.Shank, planes.Head, planes.Nut}

// ofPinsAndParts asks what sweeps across which pin and cross member. The distance of the axis tells it for
// every radius.
func (s *survey) ofPinsAndParts(p *planes.Problem) []question {
	var out []question
	for i := range p.Pins {
		for b, body := range s.bodies {
			if slices.Contains(p.Pins[i].Members, b) {
				continue
			}
			if i >= len(s.pins) {
				if i-len(s.pins) < len(s.cross) {
					out = append(out, question{s.disc(i, planes.Shank), body, upTo(stack.RunningGap), stack.RunningGap, func(g interference.Gap) {
						if g.MM-g.Error < stack.RunningGap {
							p.Swept = append(p.Swept, planes.Swept{Pin: i, Body: b, Near: planes.Near{MM: g.MM, Angle: g.Angle}})
						}
					}})
				}
				continue
			}
			r := s.pins[i].radius
			widest := max(r[0], r[1], r[2])
			out = append(out, question{s.round(i, point), body, upTo(widest + stack.RunningGap), min(r[0], r[1], r[2]), func(g interference.Gap) {
				d := g.MM - g.Error + point
				if d-widest >= stack.RunningGap {
					return
				}
				s.toBody[pair{i, b}] = d
				for _, z := range zones {
					if gap := d - r[z]; gap < stack.RunningGap {
						p.Swept = append(p.Swept, planes.Swept{Pin: i, Body: b, Zone: z, Near: planes.Near{MM: gap, Angle: g.Angle}})
					}
				}
			}})
		}
	}
	return out
}

// ofPins asks which pins come too near to each other, and to cross members.
func (s *survey) ofPins(p *planes.Problem) []question {
	var out []question
	for i := range s.pins {
		a := s.pins[i].radius
		for k := i + 1; k < len(s.pins); k++ {
			b := s.pins[k].radius
			widest := max(a[0], a[1], a[2]) + max(b[0], b[1], b[2])
			out = append(out, question{s.round(i, point), s.round(k, point), upTo(widest + stack.RunningGap), 0, func(g interference.Gap) {
				d := g.MM - g.Error + 2*point
				if d-widest >= stack.RunningGap {
					return
				}
				s.toPin[pair{i, k}] = d
				for _, y := range zones {
					for _, z := range zones {
						if gap := d - a[y] - b[z]; gap < stack.RunningGap {
							p.Close = append(p.Close, planes.Close{P: i, Q: k, ZoneP: y, ZoneQ: z, Near: planes.Near{MM: gap, Angle: g.Angle}})
						}
					}
				}
			}})
		}
		for k, c := range s.cross {
			widest := max(a[0], a[1], a[2])
			out = append(out, question{s.round(i, point), c, upTo(widest + stack.RunningGap), 0, func(g interference.Gap) {
				for _, z := range zones {
					if gap := g.MM - g.Error + point - a[z]; gap < stack.RunningGap {
						p.Close = append(p.Close, planes.Close{P: i, Q: len(s.pins) + k, ZoneP: z, Near: planes.Near{MM: gap, Angle: g.Angle}})
					}
				}
			}})
		}
	}
	return out
}

// demands enters what the job says about planes.
func (s *survey) demands(p *planes.Problem) {
	j := s.job
	index := func(name string) int {
		for b := range s.bodies {
			if s.name(b) == name {
				return b
			}
		}
		return -1
	}
	on := func(b, plane int, free bool) {
		if !free {
			p.Demands = append(p.Demands, planes.Demand{Kind: planes.On, A: b, Plane: plane})
		}
	}
	with := func(kind planes.DemandKind, a int, names ...string) {
		for _, name := range names {
			if b := index(name); b >= 0 {
				p.Demands = append(p.Demands, planes.Demand{Kind: kind, A: a, B: b})
			}
		}
	}
	for i, l := range j.Links {
		on(i, l.Plane, l.PlaneFree)
		if l.SameAs != "" {
			with(planes.SamePlane, i, l.SameAs)
		}
		with(planes.InFrontOf, i, l.InFrontOf...)
	}
	if j.Frame != nil {
		for i, f := range j.Frame.Plates {
			on(len(j.Links)+i, f.Plane, f.PlaneFree)
			with(planes.InFrontOf, len(j.Links)+i, f.InFrontOf...)
		}
	}
}
