package linkage

import (
	"math"
	"math/rand/v2"
	"sort"
)

// limits of the search for assemblies.
const (
	maxAssemblies = 512     // assemblies kept
	maxBranches   = 1 << 15 // branches of the search looked at
	quickBranches = 1 << 10 // the same when any one assembly will do
	maxShapeSets  = 1024    // combinations of mirrored shapes
	maxBlockSets  = 32      // the same when there is a block, each of which takes a search
	blockStarts   = 60      // first guesses for a block
	blockMost     = 32      // assemblies of one block
	sameAssembly  = 1e-6    // of the longest length: closer than this is the same place
	nearDecides   = 1.25    // an assembly counts as ruled out when it is this much further from near
	clearlyShaped = 0.1     // of a triangle's area that near places must show to choose its mirror image
)

// assembly is one way in which the linkage closes at the start of the drive.
type assembly struct {
	shape [][]Point
	frame *frame
	prog  *program
	miss  float64 // sum of squared distances to the near places, mm2
	order int
}

// miss of a search that found nothing: the joint that came nearest to closing.
type shortfall struct {
	step   planStep
	short  float64
	deep   int
	reason string
}

// assemble finds the assemblies at the drive angle: all combinations of mirrored shapes (those that
// the near places already exclude are left out), all sides of all dyads, and for each block the
// solutions that Newton's method reaches from the near places and from a fixed random sequence.
// They come sorted by distance from the near places, ties in the order of the search.
//
// It keeps at most the given number and then stops.
func (m *Mechanism) assemble(angle float64, ground []Point, most int) ([]assembly, shortfall) {
	var found []assembly
	branches := 0
	fall := shortfall{short: math.Inf(1), deep: -1}
	for _, set := range m.shapeSets() {
		shape := make([][]Point, len(m.pins))
		for k := range m.pins {
			shape[k] = m.shapes[k][set[k]]
		}
		pr := compile(len(m.jointNames), m.pins, shape, m.plan, m.ground, m.pivot, m.tip)
		f := pr.newFrame()
		copy(f.p, ground)
		s := search{m: m, pr: pr, shape: shape, found: &found, fall: &fall, most: most, branches: &branches}
		pr.placeDrive(f, angle)
		s.from(0, f)
		if len(found) >= most {
			break
		}
	}
	sort.SliceStable(found, func(i, j int) bool { return found[i].miss < found[j].miss })
	return found, fall
}

// shapeSets lists which of its shapes each link takes, all combinations within reason.
func (m *Mechanism) shapeSets() [][]int {
	most := maxShapeSets
	for _, s := range m.plan {
		if s.kind == blockStep {
			most = maxBlockSets
		}
	}
	sets := [][]int{make([]int, len(m.pins))}
	for k := range m.pins {
		choice := m.likelyShapes(k)
		if m.isSurplus(k) || len(sets)*len(choice) > most {
			choice = choice[:1]
		}
		var next [][]int
		for _, s := range sets {
			for _, c := range choice {
				t := append([]int(nil), s...)
				t[k] = c
				next = append(next, t)
			}
		}
		sets = next
	}
	return sets
}

// likelyShapes returns the shapes of a link that do not contradict the places that are known roughly.
func (m *Mechanism) likelyShapes(k int) []int {
	var all, ok []int
	for c, shape := range m.shapes[k] {
		all = append(all, c)
		good := true
		pins := m.pins[k]
		for a := range pins {
			for b := 0; b < a; b++ {
				for e := 0; e < b; e++ {
					pa, pb, pe := m.rough[pins[a]], m.rough[pins[b]], m.rough[pins[e]]
					if pa == nil || pb == nil || pe == nil {
						continue
					}
					is := cross(sub(shape[b], shape[a]), sub(shape[e], shape[a]))
					near := cross(sub(*pb, *pa), sub(*pe, *pa))
					if is*near < 0 && math.Abs(near) > clearlyShaped*math.Abs(is) {
						good = false
					}
				}
			}
		}
		if good {
			ok = append(ok, c)
		}
	}
	if len(ok) == 0 {
		return all
	}
	return ok
}

type search struct {
	m     *Mechanism
	pr    *program
	shape [][]Point
	found *[]assembly
	fall  *shortfall

	most     int
	branches *int
}

// from goes through the program from step k on, f holding what is placed before it.
func (s *search) from(k int, f *frame) {
	limit := maxBranches
	if s.most == 1 {
		limit = quickBranches
	}
	if *s.branches++; len(*s.found) >= s.most || *s.branches > limit {
		return
	}
	if k == len(s.pr.steps) {
		s.keep(f)
		return
	}
	st := &s.pr.steps[k]
	switch st.kind {
	case rigidStep:
		f.carry(st.carry)
		s.from(k+1, f)
	case dyadStep:
		for _, sign := range []float64{1, -1} {
			g := s.pr.newFrame()
			g.copyFrom(f)
			g.signs[st.index] = sign
			if !g.meet(&st.dyad, st.index) {
				s.short(k, dyadShort(g.p, st.dyad), g)
				return
			}
			s.from(k+1, g)
			if g.flat[st.index] {
				return // both sides are one
			}
		}
	case blockStep:
		for _, p := range s.blockSolutions(k, f) {
			g := s.pr.newFrame()
			g.copyFrom(f)
			copy(g.p, p)
			g.det[st.index] = st.block.newton(g.p)
			if g.det[st.index] == 0 {
				continue
			}
			st.block.speeds(g.p, g.v)
			s.from(k+1, g)
		}
	}
}

func (s *search) short(k int, mm float64, f *frame) {
	if k > s.fall.deep || k == s.fall.deep && mm < s.fall.short {
		*s.fall = shortfall{s.m.plan[k], mm, k, s.m.reason(s.pr, k, f)}
	}
}

// dyadShort is by how much the two links of a dyad miss each other, mm, given its pivots.
func dyadShort(p []Point, d dyad) float64 {
	span := dist(p[d.a], p[d.b])
	return math.Max(0, math.Max(span-d.ra-d.rb, math.Abs(d.ra-d.rb)-span))
}

func (s *search) keep(f *frame) {
	miss := 0.0
	for j, n := range s.m.near {
		if n != nil {
			d := dist(f.p[j], *n)
			miss += d * d
		}
	}
	for _, a := range *s.found {
		if samePlaces(a.frame.p, f.p, sameAssembly*s.pr.size) {
			return
		}
	}
	g := s.pr.newFrame()
	g.copyFrom(f)
	*s.found = append(*s.found, assembly{shape: s.shape, frame: g, prog: s.pr, miss: miss, order: len(*s.found)})
}

func samePlaces(p, q []Point, tol float64) bool {
	for i := range p {
		if dist(p[i], q[i]) > tol {
			return false
		}
	}
	return true
}

// blockSolutions finds assemblies of one block from many first guesses.
func (s *search) blockSolutions(k int, f *frame) [][]Point {
	b := s.pr.steps[k].block
	lo, hi := Point{X: math.Inf(1), Y: math.Inf(1)}, Point{X: math.Inf(-1), Y: math.Inf(-1)}
	around := func(p Point) {
		lo = Point{X: math.Min(lo.X, p.X), Y: math.Min(lo.Y, p.Y)}
		hi = Point{X: math.Max(hi.X, p.X), Y: math.Max(hi.Y, p.Y)}
	}
	for _, e := range b.bars {
		if b.col[e.i] < 0 {
			around(f.p[e.i])
		}
		if b.col[e.j] < 0 {
			around(f.p[e.j])
		}
	}
	for _, c := range b.carried {
		for _, j := range [3]int{c.k, c.a, c.b} {
			if b.col[j] < 0 {
				around(f.p[j])
			}
		}
	}
	rng := rand.New(rand.NewPCG(5, uint64(k)))
	var out [][]Point
	p := append([]Point(nil), f.p...)
	best := math.Inf(1)
	for start := range blockStarts {
		copy(p, f.p)
		for _, j := range b.joints {
			u := Point{X: rng.Float64()*1.6 - 0.3, Y: rng.Float64()*1.6 - 0.3}
			p[j] = Point{
				X: lo.X - b.size + u.X*(hi.X-lo.X+2*b.size),
				Y: lo.Y - b.size + u.Y*(hi.Y-lo.Y+2*b.size),
			}
			if r := s.m.near[j]; r != nil {
				wild := 0.0 // first the near places themselves, then ever wilder ones
				if start > 0 {
					wild = float64(start) / blockStarts
				}
				p[j] = Point{X: r.X + wild*(p[j].X-r.X), Y: r.Y + wild*(p[j].Y-r.Y)}
			}
		}
		miss := b.settle(p, 60)
		best = math.Min(best, miss)
		if miss > 1e-3*b.size || b.newton(p) == 0 {
			continue
		}
		known := false
		for _, q := range out {
			known = known || samePlaces(p, q, sameAssembly*b.size)
		}
		if !known && len(out) < blockMost {
			out = append(out, append([]Point(nil), p...))
		}
	}
	if len(out) == 0 {
		s.short(k, best, f)
	}
	return out
}

// rivals returns the assemblies that the near places do not rule out against the best, the best
// first: for those joints that differ between the two and have a near place, the other must be
// clearly further away.
func (m *Mechanism) rivals(all []assembly) []assembly {
	if len(all) == 0 {
		return nil
	}
	best := all[0]
	out := []assembly{best}
	for _, a := range all[1:] {
		var mine, its float64
		for j, n := range m.near {
			if n == nil || dist(a.frame.p[j], best.frame.p[j]) < sameAssembly*best.prog.size {
				continue
			}
			mine += math.Pow(dist(best.frame.p[j], *n), 2)
			its += math.Pow(dist(a.frame.p[j], *n), 2)
		}
		if math.Sqrt(its) <= nearDecides*math.Sqrt(mine)+1e-9*best.prog.size {
			out = append(out, a)
		}
	}
	return out
}
