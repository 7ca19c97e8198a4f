package main

import (
	"pinwright/parts/assembly"
	"pinwright/parts/linkage"
)

// findings is what check knows of a job, for machines. Angles are degrees, lengths millimetres.
type findings struct {
	OK           bool           `json:"ok"`
	Job          string         `json:"job"`
	Error        string         `json:"error,omitempty"`
	Mobility     int            `json:"mobility"`
	Gruebler     int            `json:"gruebler"`
	FullTurn     bool           `json:"full_turn"`
	Closure      float64        `json:"closure"`
	Transmission []transmission `json:"transmission"`
	Toggles      []toggle       `json:"toggles"`
	Paths        []path         `json:"paths"`
	Planes       *planesFinding `json:"planes,omitempty"` // when the job leaves some open
	Pins         []pinFinding   `json:"pins"`
	Gaps         []gap          `json:"gaps"`
	Body         *body          `json:"body,omitempty"`
	Parts        int            `json:"parts"`
}

type transmission struct {
	Joint string  `json:"joint"`
	Least float64 `json:"least"`
	Most  float64 `json:"most"`
}

type toggle struct {
	Kind  string  `json:"kind"`
	Joint string  `json:"joint"`
	Drive float64 `json:"drive"`
}

type path struct {
	Joint  string  `json:"joint"`
	Stride float64 `json:"stride"`
	Lift   float64 `json:"lift"`
	Length float64 `json:"length"`
}

// planesFinding is the planes that were found, by part, and what is proven: no fewer planes than Least.
type planesFinding struct {
	Of     map[string]int `json:"of"`
	Planes int            `json:"planes"`
	Least  int            `json:"least"`
	Length float64        `json:"length"`
	Proven bool           `json:"proven"`
	For    []string       `json:"for,omitempty"` // pins whose bolts are reckoned with as long as they are
}

type pinFinding struct {
	Copy  string   `json:"copy"`
	Joint string   `json:"joint"`
	Bolt  string   `json:"bolt"`
	Stack []string `json:"stack"`
	Play  float64  `json:"play"`
}

type gap struct {
	A     string  `json:"a"`
	B     string  `json:"b"`
	MM    float64 `json:"mm"`
	Error float64 `json:"error"`
	Drive float64 `json:"drive"`
}

// body is how close copies may stand, mm along their shafts; see assembly.Spacing.
type body struct {
	Least   float64 `json:"least"`
	Clear   float64 `json:"clear"`
	Between string  `json:"between"`
	Blocked string  `json:"blocked,omitempty"`
}

// findings gathers what is known; err is what kept the job from being worked out further.
func (p plan) findings(gaps []assembly.Gap, err error) findings {
	r := p.motion.report
	f := findings{
		Job: p.job.Name, Mobility: r.Mobility, Gruebler: r.Gruebler, FullTurn: r.Full, Closure: r.Set.Closure, Parts: len(p.parts),
		Transmission: []transmission{}, Toggles: []toggle{}, Paths: []path{}, Pins: []pinFinding{}, Gaps: []gap{},
	}
	if err == nil {
		err = p.clashes(gaps)
	}
	if err == nil {
		var s *assembly.Spacing
		if s, err = p.spacing(); s != nil {
			f.Body = &body{s.Least, s.Clear, s.Between, s.Blocked}
			err = p.crowded()
		}
	}
	f.OK = err == nil
	if err != nil {
		f.Error = err.Error()
	}
	f.motion(r.Set)
	f.Planes = p.found.finding()
	for _, k := range p.kits {
		pin := pinFinding{Copy: k.Copy, Joint: k.Joint, Bolt: k.Through.Designation, Stack: []string{}, Play: k.Play}
		for _, e := range k.Elements {
			if pin.Stack = append(pin.Stack, e.What); e.What == "" {
				pin.Stack[len(pin.Stack)-1] = e.Part
			}
		}
		f.Pins = append(f.Pins, pin)
	}
	for _, g := range gaps {
		f.Gaps = append(f.Gaps, gap{g.A, g.B, g.MM, g.Error, degrees(g.Angle)})
	}
	return f
}

func (f *findings) motion(s linkage.SettingReport) {
	for _, t := range s.Transmissions {
		f.Transmission = append(f.Transmission, transmission{t.Joint, degrees(t.Min), degrees(t.Max)})
	}
	for _, t := range s.Toggles {
		f.Toggles = append(f.Toggles, toggle{string(t.Kind), t.Joint, degrees(t.Angle)})
	}
	for _, t := range s.Paths {
		f.Paths = append(f.Paths, path{t.Joint, t.Stride, t.Lift, t.Length})
	}
}
