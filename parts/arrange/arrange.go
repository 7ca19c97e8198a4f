// Package arrange finds the planes that a job leaves open: it measures what may share a plane and what
// sweeps across which pin, has package planes find the best side view, and sees to it that the stacks
// which come of it really have the heights that were reckoned with.
//
// Plan:
//
//  1. The parts are made: their outlines do not depend on the planes.
//  2. What each pin carries is asked of package stack, with the parts of the pin alone on planes next to
//     each other: how wide it is and how far head and nut reach, at the least (pins.go).
//  3. The smallest gap of every two parts, and of every pin to every part and to every other pin, over the
//     whole motion, certified. Less than the running gap: they must not be at the same height (measure.go).
//  4. Package planes solves that. The side view is stacked, and its true heights are compared with the
//     gaps. Where a longer bolt or a wider gap makes a head or nut reach further than reckoned, and to
//     something that sweeps across it, its reach is raised to what it is and the planes are found again.
//     Reaches only grow, so this ends. Where there is no bolt so long, the pin is held to be shorter: as
//     every bolt as long is missing as well, nothing is lost.
//
// The reaches of the first round are the least there are. So planes found without raising any are the best
// of all; else they are the best for the reaches as raised, and the answer says which.
//
// Lengths are millimetres, angles radians.
package arrange

import (
	"errors"
	"fmt"
	"math"
	"slices"

	"pinwright/parts/interference"
	"pinwright/parts/job"
	"pinwright/parts/linkage"
	"pinwright/parts/planes"
	"pinwright/parts/stack"
)

// Result says how the planes were found.
type Result struct {
	Answer  planes.Answer
	Problem planes.Problem // as solved last; its bodies are the links in their order, then the frame plates
	Raised  []string       // pins whose head or nut had to be reckoned with further than at the least
}

// mostRounds bounds step 4: far more than pins have lengths.
const mostRounds = 60

// Planes gives the job with a plane for every link and frame plate. Planes that are given stay as they are.
//
// When nothing fits the error says which demands and sweeps contradict each other, none of which could be
// left out. It errs as well when parts or pins cannot be made, or the motion cannot be certified.
func Planes(j job.Job, m *linkage.Mechanism) (job.Job, Result, error) {
	if err := named(j); err != nil {
		return j, Result{}, err
	}
	s, err := newSurvey(j, m)
	if err != nil {
		return j, Result{}, err
	}
	p, err := s.problem()
	if err != nil {
		return j, Result{}, err
	}
	var raised []string
	for range mostRounds {
		a, err := planes.Solve(p)
		if err != nil {
			return j, Result{}, s.explained(p, err)
		}
		out := placed(j, a.Planes)
		if s.tooLong(out, a, &p) {
			continue
		}
		higher, err := s.tooHigh(out, &p)
		if err != nil {
			return j, Result{}, err
		}
		if higher == "" {
			return out, Result{Answer: a, Problem: p, Raised: raised}, nil
		}
		if !slices.Contains(raised, higher) {
			raised = append(raised, higher)
		}
	}
	return j, Result{}, fmt.Errorf("%s: the planes that fit by reckoning do not fit when stacked; state the planes of some links", j.At("linkage.links"))
}

// named checks that the job is whole.
func named(j job.Job) error {
	if len(j.Links) != len(j.Linkage.Links) {
		return fmt.Errorf("arrange: %d build rules for %d links", len(j.Links), len(j.Linkage.Links))
	}
	return nil
}

// placed gives the job with these planes, those of the links first.
func placed(j job.Job, on []int) job.Job {
	j.Links = slices.Clone(j.Links)
	for i := range j.Links {
		j.Links[i].Plane, j.Links[i].PlaneFree = on[i], false
	}
	if j.Frame != nil {
		f := *j.Frame
		f.Plates = slices.Clone(f.Plates)
		for i := range f.Plates {
			f.Plates[i].Plane, f.Plates[i].PlaneFree = on[len(j.Links)+i], false
		}
		j.Frame = &f
	}
	return j
}

// explained puts the true depths of overlap into a contradiction and tells where in the file it is.
func (s *survey) explained(p planes.Problem, err error) error {
	var c *planes.Conflict
	if !errors.As(err, &c) {
		return err
	}
	for i := range c.Apart {
		x := &c.Apart[i]
		if n, err := s.near(s.part(x.A), s.part(x.B), deep(stack.RunningGap)); err == nil {
			x.Near = n
		}
	}
	for i := range c.Swept {
		x := &c.Swept[i]
		if n, err := s.near(s.disc(x.Pin, x.Zone), s.part(x.Body), deep(stack.RunningGap)); err == nil {
			x.Near = n
		}
	}
	for i := range c.Close {
		x := &c.Close[i]
		if n, err := s.near(s.disc(x.P, x.ZoneP), s.disc(x.Q, x.ZoneQ), deep(stack.RunningGap)); err == nil {
			x.Near = n
		}
	}
	key := "linkage.links"
	if len(c.Demands) > 0 {
		key = s.keyOf(c.Demands[0].A)
	}
	if s.job.At(key).File == "" {
		return c
	}
	return s.job.Fault(key, c.Message(), c.Hint())
}

// deep asks for the depth of overlaps.
func deep(limit float64) interference.Options {
	return interference.Options{Accuracy: accuracy, Share: share, Limit: limit + 1, Boxes: effort, Depth: true}
}

// near asks for the smallest gap of two bodies.
func (s *survey) near(a, b interference.Body, o interference.Options) (planes.Near, error) {
	g, err := s.space.Smallest(a, b, o)
	if err != nil {
		return planes.Near{}, err
	}
	return planes.Near{MM: g.MM, Angle: g.Angle}, nil
}

// keyOf is where the job file speaks of a body.
func (s *survey) keyOf(body int) string {
	if body < len(s.job.Links) {
		return "linkage.links." + s.job.Links[body].Name
	}
	return "frame.plates." + s.job.Frame.Plates[body-len(s.job.Links)].Name
}

// tooLong tells whether pins do not come so long, and states in the problem that they do not: whatever is as
// long needs a bolt as long.
func (s *survey) tooLong(j job.Job, a planes.Answer, p *planes.Problem) bool {
	_, err := stack.Build(single(j))
	long := stack.Long(err)
	for i, x := range s.pins {
		if slices.Contains(long, x.joint) {
			p.Short = append(p.Short, planes.Short{Pin: i, MM: a.Spans[i] - 0.01})
		}
	}
	return len(long) > 0
}

// tooHigh stacks the planes and compares true heights with the gaps. When a head or nut is at the height of
// something that it comes too near to, its reach in the problem is raised and the pin is named. Pins that
// cannot be stacked so are the error.
func (s *survey) tooHigh(j job.Job, p *planes.Problem) (string, error) {
	levels, err := stack.Levels(j)
	if err != nil {
		return "", err
	}
	kits, err := stack.Build(single(j))
	if err != nil {
		return "", err
	}
	slabs := map[int]stack.Level{}
	for _, l := range levels {
		slabs[l.Plane] = l
	}
	for k, kit := range kits {
		bottom, top := ends(kit)
		for _, e := range things(kit) {
			above := e.To > top+slack
			if !above && e.From >= bottom-slack {
				continue // among its own parts: the search has it right whatever the heights are
			}
			reach := bottom - e.From
			known := &p.Pins[k].Below
			if above {
				reach, known = e.To-top, &p.Pins[k].Above
			}
			for b := range p.Bodies {
				d, ok := s.toBody[pair{k, b}]
				l := slabs[s.planeOf(j, b)]
				if ok && d-e.Diameter/2 < stack.RunningGap && overlap(e.From, e.To, l.From, l.From+p.Bodies[b].Thickness) {
					*known = raise(*known, reach)
					return p.Pins[k].Name, nil
				}
			}
			for q, other := range kits {
				d, ok := s.toPin[pair{min(k, q), max(k, q)}]
				if q == k || !ok {
					continue
				}
				for _, f := range things(other) {
					if d-e.Diameter/2-f.Diameter/2 < stack.RunningGap && overlap(e.From, e.To, f.From, f.To) && !s.hopeless(k, q) {
						*known = raise(*known, reach)
						return p.Pins[k].Name, nil
					}
				}
			}
		}
	}
	return "", nil
}

// hopeless tells whether two pins are on one part: planes may not be able to part them at all.
func (s *survey) hopeless(k, q int) bool {
	return slices.ContainsFunc(s.pins[k].members, func(b int) bool { return slices.Contains(s.pins[q].members, b) })
}

// raise gives a greater reach: what was found, or when that was reckoned with already, a little more.
func raise(known, found float64) float64 {
	return math.Max(math.Ceil(found*100)/100, known+1)
}

// overlap tells whether two things are at the same height, or as good as.
func overlap(alow, aup, blow, bup float64) bool {
	return alow < bup+axial && blow < aup+axial
}

// planeOf is the plane of a body.
func (s *survey) planeOf(j job.Job, body int) int {
	if body < len(j.Links) {
		return j.Links[body].Plane
	}
	return j.Frame.Plates[body-len(j.Links)].Plane
}
