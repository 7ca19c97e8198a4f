package linkage

import (
	"fmt"
	"math"
	"sort"
)

// startAt returns the start of the drive with the adjustable pivots at the setting: the assembly at
// the set places, carried along the ranges, halving the step where it must.
func (m *Mechanism) startAt(pr *program, setting Setting) (*frame, error) {
	f := pr.newFrame()
	f.copyFrom(m.start)
	if len(setting) == 0 {
		return f, nil
	}
	names := make([]string, 0, len(setting))
	for n := range setting {
		names = append(names, n)
	}
	sort.Strings(names)
	type move struct {
		joint    int
		from, to float64
	}
	var moves []move
	for _, n := range names {
		j, ok := m.joint[n]
		switch {
		case !ok:
			return nil, fmt.Errorf("setting: there is no joint %s", n)
		case m.linkage.Joints[j].Ground == nil || m.linkage.Joints[j].Ground.Range == nil:
			return nil, fmt.Errorf("setting: joint %s is not an adjustable pivot", n)
		case !(setting[n] >= 0 && setting[n] <= 1):
			return nil, fmt.Errorf("setting: %s of the range of %s is outside 0 to 1", number(setting[n]), n)
		}
		t, _ := m.linkage.Joints[j].Ground.Range.Nearest(m.linkage.Joints[j].Ground.At)
		moves = append(moves, move{j, t, setting[n]})
	}
	g := pr.newFrame()
	done, step := 0.0, 1.0
	if pr.blocks > 0 {
		step = 1.0 / 16
	}
	for done < 1 {
		to := math.Min(1, done+step)
		g.copyFrom(f)
		for _, v := range moves {
			t := v.from + to*(v.to-v.from)
			if to == 1 {
				t = v.to
			}
			g.p[v.joint] = m.linkage.Joints[v.joint].Ground.Range.Place(t)
		}
		if at, ok := pr.shift(f, g); !ok {
			if step /= 2; step > 1e-6 {
				continue
			}
			from, _ := m.span()
			e := &LoopError{Angle: from, ShortAt: from, Setting: setting, Short: pr.shortOf(at, g), Reason: m.reason(pr, at, g), Ranges: m.closingRanges(setting)}
			m.blame(e, m.plan[at])
			return nil, e
		}
		f, g = g, f
		done = to
	}
	return f, nil
}

// shift solves g at the drive angle of f with ground pivots moved a little. It returns the step of
// the program that does not close.
func (pr *program) shift(f, g *frame) (int, bool) {
	pr.placeDrive(g, f.angle)
	for k := range pr.steps {
		s := &pr.steps[k]
		switch s.kind {
		case rigidStep:
			g.carry(s.carry)
		case dyadStep:
			if !g.meet(&s.dyad, s.index) {
				return k, false
			}
		case blockStep:
			det := s.block.newton(g.p)
			if det == 0 || (det > 0) != (f.det[s.index] > 0) {
				return k, false
			}
			moved := 0.0
			for _, j := range s.block.joints {
				moved = math.Max(moved, dist(f.p[j], g.p[j]))
			}
			if moved > 0.1*s.block.size {
				return k, false
			}
			g.det[s.index] = det
			s.block.speeds(g.p, g.v)
		}
	}
	return 0, true
}

// shortOf is by how much the links of a step miss each other, mm, f holding what comes before it.
func (pr *program) shortOf(step int, f *frame) float64 {
	s := &pr.steps[step]
	switch s.kind {
	case dyadStep:
		return dyadShort(f.p, s.dyad)
	case blockStep:
		return s.block.settle(append([]Point(nil), f.p...), 80)
	}
	return 0
}
