package linkage

import "math"

// The steps of a walk along the drive, radians.
const (
	// longestStep bounds a single step, so that between two frames a dyad's gap has at most one
	// valley and a tangent predicts a block well.
	longestStep = 2 * math.Pi / 72
	// shortestStep is where halving ends: what is not told apart there (a flip from a near miss)
	// differs by less than a ten-thousandth of a millimetre on a 100 mm link.
	shortestStep = 2.0e-7
	// closeToFlat is the last step before a frame in which a dyad lies in line.
	closeToFlat = 1e-5
)

// walker follows one assembly along the drive:
//
//  1. From the frame at one angle the next is solved group by group: a dyad keeps its side, a block
//     starts from where its speeds point and is solved by Newton's method.
//  2. The step is certain when no dyad's gap (squared distance of its joint from the line of its
//     pivots) can have reached zero on the way: it falls at one end and rises at the other only
//     when the tangents at the ends meet above zero (the gap is convex near its valley, so it lies
//     above its tangents) and its pivots did not pass through each other; and when each block's Jacobian keeps the sign of its determinant and its
//     joints went as far as their speeds at both ends say.
//  3. A step that is not certain is halved. At the shortest step a dyad's gap does reach zero: the
//     links pass through being in line and the joint goes on to the other side, as it does without
//     a jump in speed (a change point). A loop that stays open at the shortest step ends the walk.
//
// Each step is O(dyads) plus the cube of each block's size; nothing is allocated.
type walker struct {
	pr        *program
	cur, next *frame
	targets   []float64
	flips     []bool
	changes   []change
}

// change is a dyad that passes through being in line.
type change struct {
	dyad  int
	angle float64
}

type verdict uint8

const (
	sure verdict = iota
	unsure
	open
)

func newWalker(pr *program, start *frame) *walker {
	w := &walker{pr: pr, cur: pr.newFrame(), next: pr.newFrame(), flips: make([]bool, pr.dyads)}
	w.targets = make([]float64, 0, 64)
	w.cur.copyFrom(start)
	w.next.copyFrom(start)
	return w
}

// stop says where a walk ended.
type stop struct {
	angle float64 // last angle that closes
	step  int     // of the program
	dyad  int     // -1: a block
}

// to walks to the drive angle. When the linkage does not close that far it returns where it stops,
// and the walker rests at the last frame before it.
func (w *walker) to(angle float64) (stop, bool) {
	w.targets = append(w.targets[:0], angle)
	for len(w.targets) > 0 {
		t := w.targets[len(w.targets)-1]
		width := math.Abs(t - w.cur.angle)
		if width == 0 {
			w.targets = w.targets[:len(w.targets)-1]
			continue
		}
		if width > longestStep*(1+1e-9) {
			n := math.Ceil(width / longestStep)
			w.targets = append(w.targets, w.cur.angle+(t-w.cur.angle)/n)
			continue
		}
		v, at := w.try(t)
		if v == unsure && width <= shortestStep {
			v, at = w.flip(t)
		}
		switch {
		case v == sure:
			w.noteLeaving()
			w.cur, w.next = w.next, w.cur
			w.targets = w.targets[:len(w.targets)-1]
		case width > shortestStep:
			w.targets = append(w.targets, w.cur.angle+(t-w.cur.angle)/2)
		default:
			s := stop{angle: w.cur.angle, step: at, dyad: -1}
			if st := &w.pr.steps[at]; st.kind == dyadStep {
				s.dyad = st.index
			}
			return s, false
		}
	}
	return stop{}, true
}

// noteLeaving records the change points that lie exactly at the frame which the walk now leaves.
func (w *walker) noteLeaving() {
	for i, flat := range w.cur.flat {
		if flat && !w.next.flat[i] {
			w.changes = append(w.changes, change{i, w.cur.angle})
		}
	}
}

// try solves the frame at the angle into next. at is the step of the program that is to blame when
// the verdict is not sure.
func (w *walker) try(angle float64) (v verdict, at int) {
	pr, f, g := w.pr, w.cur, w.next
	delta := angle - f.angle
	for i, s := range f.signs {
		if f.flat[i] { // it was in line: it leaves to the other side
			s = -s
		}
		g.signs[i] = s
	}
	for _, j := range pr.ground {
		g.p[j] = f.p[j]
	}
	pr.placeDrive(g, angle)
	doubt, doubtAt := sure, 0
	for k := range pr.steps {
		s := &pr.steps[k]
		switch s.kind {
		case rigidStep:
			g.carry(s.carry)
		case dyadStep:
			i := s.index
			g.v[s.dyad.j] = f.v[s.dyad.j]
			if !g.meet(&s.dyad, i) {
				return open, k
			}
			if doubt == sure && !certain(&s.dyad, i, f, g, delta) {
				doubt, doubtAt = unsure, k
			}
		case blockStep:
			if v := pr.solveBlock(s, f, g, delta); v != sure {
				return v, k
			}
		}
	}
	return doubt, doubtAt
}

// certain reports whether a dyad surely keeps its side between two frames: its links were not in line
// in between, and its pivots did not pass through each other (which turns the side about).
func certain(d *dyad, i int, f, g *frame, delta float64) bool {
	a, b := f.p[d.a], f.p[d.b]
	c, e := g.p[d.a], g.p[d.b]
	if (b.X-a.X)*(e.X-c.X)+(b.Y-a.Y)*(e.Y-c.Y) <= 0 {
		return false
	}
	if g.flat[i] {
		// The speed in line is taken from the frame before: come close to it first.
		return f.flat[i] || math.Abs(delta) <= closeToFlat
	}
	return f.flat[i] || clear0(f.gap[i], f.slope[i]*delta, g.gap[i], g.slope[i]*delta)
}

// clear0 reports whether a quantity that goes from g0 to g1 with slopes d0 and d1 over a step stays
// above zero: it does when it is monotonic, and when the tangents at the ends of a valley meet above.
func clear0(g0, d0, g1, d1 float64) bool {
	if d0 >= 0 || d1 <= 0 {
		return g0 > 0 && g1 > 0
	}
	x := (g1 - d1 - g0) / (d0 - d1)
	return g0+d0*x > 0
}

// solveBlock solves one block of g from the frame f, delta before it.
func (pr *program) solveBlock(s *progStep, f, g *frame, delta float64) verdict {
	b := s.block
	for _, j := range b.joints {
		g.p[j] = addScaled(f.p[j], delta, f.v[j])
	}
	det := b.newton(g.p)
	if det == 0 {
		return open
	}
	g.det[s.index] = det
	if (det > 0) != (f.det[s.index] > 0) {
		return open
	}
	b.speeds(g.p, g.v)
	for _, j := range b.joints {
		mean := Point{X: (f.v[j].X + g.v[j].X) / 2, Y: (f.v[j].Y + g.v[j].Y) / 2}
		off := dist(g.p[j], addScaled(f.p[j], delta, mean))
		if off > math.Abs(delta)*(0.02*(norm(f.v[j])+norm(g.v[j]))+1e-3*b.size)+1e-11*b.size {
			return open
		}
	}
	return sure
}

// flip solves the frame at the angle, a shortest step away, with every dyad that cannot be told from
// being in line sent to its other side.
func (w *walker) flip(angle float64) (verdict, int) {
	pr, f, g := w.pr, w.cur, w.next
	delta := angle - f.angle
	changed := false
	for k := range pr.steps {
		if s := &pr.steps[k]; s.kind == dyadStep {
			w.flips[s.index] = !certain(&s.dyad, s.index, f, g, delta)
			changed = changed || w.flips[s.index]
		}
	}
	if !changed {
		return sure, 0
	}
	for k := range pr.steps {
		s := &pr.steps[k]
		switch s.kind {
		case rigidStep:
			g.carry(s.carry)
		case dyadStep:
			if w.flips[s.index] {
				g.signs[s.index] = -g.signs[s.index]
				w.changes = append(w.changes, change{s.index, (f.angle + angle) / 2})
			}
			if !g.meet(&s.dyad, s.index) {
				return open, k
			}
		case blockStep:
			if v := pr.solveBlock(s, f, g, delta); v != sure {
				return v, k
			}
		}
	}
	return sure, 0
}
