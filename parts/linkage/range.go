package linkage

import (
	"fmt"
	"math"
)

// loopError describes a walk that stopped: where, by how much the links miss each other at the worst
// place of the rest of the drive, and over which angles the linkage does close. It looks at 720
// angles of the rest of the drive.
func (m *Mechanism) loopError(pr *program, start *frame, w *walker, s stop, setting Setting) error {
	from, to := m.span()
	e := &LoopError{Angle: s.angle, ShortAt: s.angle, Setting: setting}
	m.blame(e, m.plan[s.step])

	const looks = 720
	f := pr.newFrame()
	f.copyFrom(w.cur)
	for k := 1; k <= looks; k++ {
		angle := s.angle + (to-s.angle)*float64(k)/looks
		if !pr.upTo(s.step, f, angle) {
			break
		}
		if short := pr.shortOf(s.step, f); short > e.Short {
			e.Short, e.ShortAt = short, angle
		}
	}
	if pr.upTo(s.step, f, e.ShortAt) {
		e.Reason = m.reason(pr, s.step, f)
	}
	// The range that closes about the start: what was walked, and for a full turn what lies before.
	r := Span{math.Min(from, s.angle), math.Max(from, s.angle)}
	if m.full {
		back := newWalker(pr, start)
		if t, ok := back.to(from - (to - from)); !ok {
			r = Span{math.Min(t.angle, s.angle), math.Max(t.angle, s.angle)}
		}
	}
	e.Ranges = []Span{r}
	return e
}

// upTo solves the steps before the given one at a drive angle.
func (pr *program) upTo(step int, f *frame, angle float64) bool {
	pr.placeDrive(f, angle)
	for k := range pr.steps[:step] {
		s := &pr.steps[k]
		switch s.kind {
		case rigidStep:
			f.carry(s.carry)
		case dyadStep:
			if !f.meet(&s.dyad, s.index) {
				return false
			}
		case blockStep:
			if s.block.newton(f.p) == 0 {
				return false
			}
			s.block.speeds(f.p, f.v)
		}
	}
	return true
}

// reason gives the figures of a dyad that does not close.
func (m *Mechanism) reason(pr *program, step int, f *frame) string {
	if pr.steps[step].kind != dyadStep {
		return ""
	}
	d := pr.steps[step].dyad
	span := dist(f.p[d.a], f.p[d.b])
	names := m.linkNames(m.plan[step].links)
	a, b := m.jointNames[d.a], m.jointNames[d.b]
	switch {
	case span < 1e-6*(d.ra+d.rb) && math.Abs(d.ra-d.rb) <= 1e-6*(d.ra+d.rb):
		return fmt.Sprintf("%s and %s come together there, so that %s may swing about them", a, b, m.jointNames[d.j])
	case span > d.ra+d.rb:
		return fmt.Sprintf("%s and %s are %s apart there, %s and %s reach %s", a, b, millimetres(span), names[0], names[1], millimetres(d.ra+d.rb))
	case span < math.Abs(d.ra-d.rb):
		return fmt.Sprintf("%s and %s are only %s apart there, %s and %s cannot fold below %s", a, b, millimetres(span), names[0], names[1], millimetres(math.Abs(d.ra-d.rb)))
	}
	return ""
}

// closingRanges looks for drive angles at which the linkage can be put together at all, on a grid of
// 5 degrees refined to a millionth of one; it serves the message when the start does not close.
func (m *Mechanism) closingRanges(setting Setting) []Span {
	ground := m.setPlaces()
	for n, t := range setting {
		j := m.joint[n]
		ground[j] = m.linkage.Joints[j].Ground.Range.Place(t)
	}
	for _, s := range m.plan {
		if s.kind == blockStep {
			return nil // each place would take a search of its own
		}
	}
	from, to := m.span()
	if !m.full && to < from {
		from, to = to, from
	}
	closes := func(a float64) bool {
		all, _ := m.assemble(a, ground, 1)
		return len(all) > 0
	}
	const grid = 72
	edge := func(in, out float64) float64 {
		for range 24 {
			if mid := (in + out) / 2; closes(mid) {
				in = mid
			} else {
				out = mid
			}
		}
		return in
	}
	lo, hi := math.Min(from, to), math.Max(from, to)
	step := (hi - lo) / grid
	var out []Span
	inside := false
	for k := 0; k <= grid; k++ {
		a := lo + step*float64(k)
		ok := closes(a)
		switch {
		case ok && !inside:
			begin := a
			if k > 0 {
				begin = edge(a, a-step)
			}
			out = append(out, Span{begin, a})
		case !ok && inside:
			out[len(out)-1].To = edge(a-step, a)
		}
		if ok && k == grid {
			out[len(out)-1].To = a
		}
		inside = ok
	}
	return out
}
