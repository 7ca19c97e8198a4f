package main

import (
	"fmt"
	"math"
	"slices"

	"pinwright/export/picture"
	"pinwright/parts"
	"pinwright/parts/job"
	"pinwright/parts/outline"
)

// scene places the parts of the first copy, the drive at its start and the adjustable pivots as set.
func (p plan) scene() picture.Scene {
	c := p.job.Copies[0]
	// From the linkage to the copy as it is built.
	built := outline.Place(0, c.Mirror, outline.Point{})
	s := picture.Scene{Planes: p.sideLevels()}
	m := p.motion.mechanism
	start := p.motion.cycle.Positions[0]
	for _, part := range p.firstParts() {
		b := picture.Body{Name: part.Name, Region: part.Region, At: outline.Place(0, false, outline.Point{})}
		b.Low, b.High = p.levelIndex(part.Plane), p.levelIndex(part.Plane)
		for _, h := range part.Holes {
			b.Joints = append(b.Joints, h.Joint)
		}
		switch i, ok := p.crossIndex(part); {
		case p.isLink(part.Link):
			b.At = m.Placement(part.Link, start).Then(built)
			if c.Mirror {
				b.At = parts.Mirrored().Inverse().Then(b.At)
			}
		case ok:
			b.Region, b.At = p.footprint(p.job.Frame.Cross[i]), built
			b.Low, b.High = p.frameLevels()
		}
		s.Bodies = append(s.Bodies, b)
	}
	l := m.Linkage()
	for i, joint := range l.Joints {
		s.Joints = append(s.Joints, picture.Spot{Name: joint.Name, At: built.Apply(start.Places[i]), Ground: joint.Ground != nil})
	}
	for _, name := range l.Trace {
		t := picture.Track{Name: name, Closed: m.Full()}
		for _, q := range p.motion.cycle.Path(name) {
			t.Points = append(t.Points, built.Apply(q))
		}
		s.Paths = append(s.Paths, t)
	}
	return s
}

// pose says in words how the scene stands.
func (p plan) pose() string {
	name := p.job.Copies[0].Name
	if name == "" {
		name = "the mechanism"
	}
	return fmt.Sprintf("Drawn is %s, its drive at %s deg.", name, fixed(degrees(p.motion.cycle.Positions[0].Angle), 0))
}

// firstParts are those of the first copy.
func (p plan) firstParts() []parts.Part {
	var out []parts.Part
	for _, part := range p.parts {
		if part.Copy == p.job.Copies[0].Name {
			out = append(out, part)
		}
	}
	return out
}

func (p plan) isLink(name string) bool {
	return slices.ContainsFunc(p.job.Links, func(l job.Link) bool { return l.Name == name })
}

func (p plan) isPlate(name string) bool {
	return p.job.Frame != nil && slices.ContainsFunc(p.job.Frame.Plates, func(f job.FramePlate) bool { return f.Name == name })
}

// crossIndex tells which cross member of the job a part of the first copy is. They are made in the order
// of the job, after links and plates.
func (p plan) crossIndex(part parts.Part) (int, bool) {
	n := 0
	for _, q := range p.firstParts() {
		if p.isLink(q.Link) || p.isPlate(q.Link) {
			continue
		}
		if q.Name == part.Name {
			return n, p.job.Frame != nil && n < len(p.job.Frame.Cross)
		}
		n++
	}
	return 0, false
}

// footprint is a cross member seen from the front, in the linkage's coordinates.
func (p plan) footprint(c job.CrossMember) outline.Region {
	s, _ := stockNamed(p.job, c.Stock)
	half := outline.Point{X: c.Width / 2, Y: s.Measured / 2}
	r := outline.Region{Outer: outline.Rectangle(half.Scale(-1), half)}
	return r.Transform(outline.Place(c.Angle, false, c.At))
}

// levelIndex is the place of a plane among the levels.
func (p plan) levelIndex(plane int) int {
	for i, l := range p.levels {
		if l.Plane == plane {
			return i
		}
	}
	return 0
}

// frameLevels are the lowest and the highest level with a frame plate.
func (p plan) frameLevels() (low, high int) {
	least, most := math.MaxInt, math.MinInt
	for _, f := range p.job.Frame.Plates {
		least, most = min(least, f.Plane), max(most, f.Plane)
	}
	return p.levelIndex(least), p.levelIndex(most)
}
