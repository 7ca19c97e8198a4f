package planes

import (
	"container/heap"
	"encoding/binary"
	"slices"
)

// Solve finds the planes. It errs with a *Conflict when there are none.
func Solve(p Problem) (Answer, error) {
	m, err := newModel(p)
	if err != nil {
		return Answer{}, err
	}
	if m.n == 0 {
		return Answer{Proven: true}, nil
	}
	limit := p.States
	if limit <= 0 {
		limit = 400_000
	}
	if !solvable(p) {
		return Answer{}, explain(p)
	}
	s := newSearch(m)
	end := s.run(limit)
	if end == nil && s.open.Len() == 0 {
		return Answer{}, explain(p)
	}
	out := Answer{States: s.made}
	if end != nil {
		out.Proven, out.Bound = true, end.spent.cost()
	} else {
		out.Bound = s.open[0].total.cost()
		if end = s.dive(limit); end == nil {
			return out, &Unknown{States: s.made}
		}
		out.Proven = end.spent.compare(s.open[0].total) <= 0
	}
	out.Cost = end.spent.cost()
	out.Planes = make([]int, m.n)
	lift := 0
	if m.isFixed == 0 {
		lift = p.First
	}
	for x := end; x != nil; x = x.before {
		each(x.layer, func(b int) { out.Planes[b] = x.plane + lift })
	}
	out.Spans = m.spans(end)
	return out, nil
}

// spans measures the pins of a complete side view.
func (m *model) spans(end *state) []float64 {
	var way []*state
	for x := end; x != nil; x = x.before {
		way = append(way, x)
	}
	slices.Reverse(way)
	out := make([]length, len(m.pins))
	from := &state{}
	for _, x := range way {
		open, opening := m.open(from.placed), m.opening(from.placed, x.layer)
		each(open, func(i int) { out[i] += m.gap(from, x.layer, x.plane-from.plane-1) + x.slab })
		each(opening, func(i int) { out[i] += x.slab })
		from = x
	}
	mm := make([]float64, len(out))
	for i, v := range out {
		mm[i] = float64(v) / 1000
	}
	return mm
}

// Unknown says that neither an answer nor a contradiction was found in the states allowed.
type Unknown struct {
	States int
}

func (u *Unknown) Error() string {
	return "planes: no arrangement was found in the time allowed: state the planes of some parts"
}

// state is a side view built up to some plane. Heights are counted from the top of that plane.
type state struct {
	placed set
	plane  int
	layer  set // bodies on the plane
	before *state
	slab   length
	room   length   // what the pins that ended on the plane need above it
	body   []length // by body not placed: where it may begin at the lowest
	begin  []length // by pin not begun: where it may begin at the lowest
	end    []length // by pin not ended: where it may end at the lowest
	since  []length // by open pin that has a least or a greatest length: where it began, below the top
	spent  expense
	total  expense // spent, and at least what is to come
	number int     // of its making
}

// stateHeap has the most promising state on top: of equals that with the most bodies placed.
type stateHeap []*state

func (h stateHeap) Len() int { return len(h) }
func (h stateHeap) Less(i, j int) bool {
	if c := h[i].total.compare(h[j].total); c != 0 {
		return c < 0
	}
	if a, b := count(h[i].placed), count(h[j].placed); a != b {
		return a > b
	}
	return h[i].number < h[j].number
}
func (h stateHeap) Swap(i, j int) { h[i], h[j] = h[j], h[i] }
func (h *stateHeap) Push(x any)   { *h = append(*h, x.(*state)) }
func (h *stateHeap) Pop() any {
	old := *h
	x := old[len(old)-1]
	*h = old[:len(old)-1]
	return x
}

// search is step 3 of the plan.
type search struct {
	m      *model
	finish *finish
	open   stateHeap
	seen   map[string]expense // least spent for what decides the future
	made   int
}

func newSearch(m *model) *search {
	s := &search{m: m, finish: newFinish(m), seen: map[string]expense{}}
	root := m.root()
	for _, plane := range m.starts() {
		m.layers(m.ready(0, 0), func(next set) {
			if x := m.put(root, next, plane, 0); x != nil {
				s.add(x)
			}
		})
	}
	return s
}

// root is the state with nothing placed.
func (m *model) root() *state {
	pins := len(m.pins)
	return &state{body: make([]length, m.n), begin: make([]length, pins), end: make([]length, pins), since: make([]length, pins)}
}

// starts are the planes that the side view may begin on, the lowest first. When none is demanded it is 0;
// else it never pays to begin lower than all other bodies behind the lowest one demanded could need.
func (m *model) starts() []int {
	if m.isFixed == 0 {
		return []int{0}
	}
	var out []int
	for plane := m.lowest - m.n*(1+m.mostEmpty()); plane <= m.lowest; plane++ {
		out = append(out, plane)
	}
	return out
}

// mostEmpty is how many empty planes in a row can have a use: enough for the longest head or nut.
func (m *model) mostEmpty() int {
	var reach length
	for i := range m.pins {
		reach = max(reach, m.pins[i].below, m.pins[i].above, m.pins[i].shortest)
	}
	return int((2*reach+2*m.clear)/(m.washer+m.thinnest)) + 1
}

// add puts a state on the heap unless it cannot be finished or one as good was there before.
func (s *search) add(x *state) {
	rest := s.finish.from(x.placed)
	if rest == impossible {
		return
	}
	x.total = x.spent.add(rest)
	if far := s.m.farthest(x.placed); far > x.plane && far-x.plane > rest.planes {
		x.total = x.spent.add(expense{planes: far - x.plane})
	}
	key := s.m.key(x)
	if spent, ok := s.seen[key]; ok && spent.compare(x.spent) <= 0 {
		return
	}
	s.seen[key] = x.spent
	x.number = s.made
	s.made++
	heap.Push(&s.open, x)
}

// farthest is the highest plane demanded of a body not placed yet.
func (m *model) farthest(placed set) int {
	if m.isFixed&^placed == 0 {
		return m.lowest - 1<<20
	}
	out := m.lowest
	each(m.isFixed&^placed, func(b int) { out = max(out, m.fixed[b]) })
	return out
}

// key tells apart states with different futures.
func (m *model) key(x *state) string {
	key := m.future(x)
	if m.isFixed&^x.placed != 0 {
		key = string(binary.AppendVarint([]byte(key), int64(x.plane)))
	}
	return key
}

// future is what decides what can follow on a state but for the number of its plane.
func (m *model) future(x *state) string {
	key := binary.AppendUvarint(nil, x.placed)
	key = binary.AppendVarint(key, x.slab)
	key = binary.AppendVarint(key, x.room)
	for _, list := range [][]length{x.body, x.begin, x.end, x.since} {
		for _, v := range list {
			key = binary.AppendVarint(key, v)
		}
	}
	return string(key)
}

// run takes states from the heap until a complete one comes, the heap is empty or enough states were made.
func (s *search) run(limit int) *state {
	for s.open.Len() > 0 {
		x := s.open[0]
		if x.placed == s.m.all {
			return x
		}
		if s.made > limit {
			return nil
		}
		heap.Pop(&s.open)
		s.expand(x, s.add)
	}
	return nil
}

// dive looks for an answer depth first, the most promising next plane first, from the states of the heap in
// their order.
func (s *search) dive(limit int) *state {
	from := slices.Clone(s.open)
	slices.SortFunc(from, func(a, b *state) int {
		if c := count(b.placed) - count(a.placed); c != 0 {
			return c
		}
		if c := a.total.compare(b.total); c != 0 {
			return c
		}
		return a.number - b.number
	})
	stop := s.made + limit
	var down func(x *state) *state
	down = func(x *state) *state {
		if x.placed == s.m.all {
			return x
		}
		if s.made > stop {
			return nil
		}
		var next []*state
		s.expand(x, func(y *state) {
			rest := s.finish.from(y.placed)
			if rest == impossible {
				return
			}
			y.total, y.number = y.spent.add(rest), s.made
			s.made++
			next = append(next, y)
		})
		// Many bodies a plane first: the weak bound does not see it.
		slices.SortFunc(next, func(a, b *state) int {
			if s.finish.weak {
				if c := count(b.placed)*a.spent.planes - count(a.placed)*b.spent.planes; c != 0 {
					return c
				}
			}
			if c := a.total.compare(b.total); c != 0 {
				return c
			}
			return a.number - b.number
		})
		for _, y := range next {
			if end := down(y); end != nil {
				return end
			}
		}
		return nil
	}
	var best *state
	for i, x := range from {
		if i == 50 {
			break
		}
		if end := down(x); end != nil && (best == nil || end.spent.compare(best.spent) < 0) {
			best = end
		}
	}
	return best
}

// expand makes all states that follow.
func (s *search) expand(x *state, add func(*state)) {
	m := s.m
	m.layers(m.ready(x.placed, m.open(x.placed)), func(next set) {
		if s.finish.from(x.placed|next) == impossible {
			return
		}
		for empty := 0; ; empty++ {
			y := m.put(x, next, x.plane+1+empty, empty)
			if y != nil {
				add(y)
			}
			// More empty planes are of use only as long as something still reaches up here, or to come
			// to a plane that is demanded.
			if gap := m.gap(x, next, empty); gap >= x.reach() && gap >= m.lacking(x) && m.farthest(x.placed) <= x.plane+1+empty {
				break
			}
		}
	})
}

// reach is the greatest height that anything has to wait for.
func (x *state) reach() length {
	var out length
	for _, list := range [][]length{x.body, x.begin, x.end} {
		for _, v := range list {
			out = max(out, v)
		}
	}
	return out
}

// lacking is the greatest length that an open pin has yet to reach.
func (m *model) lacking(x *state) length {
	var out length
	each(m.open(x.placed), func(i int) { out = max(out, m.pins[i].shortest-x.since[i]) })
	return out
}

// gap is the distance from a plane to the next with bodies on it: that of a washer, or with empty planes
// between as wide as these and as what ends there needs.
func (m *model) gap(x *state, next set, empty int) length {
	if x.placed == 0 {
		return 0
	}
	if empty == 0 {
		return m.washer
	}
	e := length(empty)
	gap := max(e*max(x.slab, m.slab(next))+(e+1)*m.washer, x.room)
	each(m.opening(x.placed, next), func(i int) { gap = max(gap, m.pins[i].below+m.clear) })
	return gap
}

// put lays bodies on a plane; nil when they cannot lie there.
func (m *model) put(x *state, next set, plane, empty int) *state {
	if m.misplaced(x.placed, next, plane) {
		return nil
	}
	open, opening := m.open(x.placed), m.opening(x.placed, next)
	placed := x.placed | next
	stay := m.open(placed)
	closing := (open | opening) &^ stay
	gap := m.gap(x, next, empty)
	top := gap + m.slab(next)
	if !m.fits(x, next, open, opening, closing, stay, gap, top) {
		return nil
	}
	y := &state{placed: placed, plane: plane, layer: next, slab: m.slab(next), body: make([]length, m.n), begin: make([]length, len(m.pins)), end: make([]length, len(m.pins)), since: make([]length, len(m.pins))}
	if x.placed != 0 {
		y.before = x
	}
	y.spent = x.spent.add(m.step(open, opening, next, gap, empty))
	each(stay, func(i int) {
		if a := &m.pins[i]; a.longest > 0 || a.shortest > 0 {
			y.since[i] = m.since(x, i, open, gap, top)
		}
	})
	each(closing, func(i int) { y.room = max(y.room, m.pins[i].above+m.clear) })
	if placed == m.all {
		return y
	}
	each(m.all&^placed, func(b int) {
		v := x.body[b] - top
		each(closing, func(i int) {
			if a := &m.pins[i]; a.above > 0 && a.swept[Nut]>>b&1 == 1 {
				v = max(v, a.above+m.clear)
			}
		})
		if v > m.washer {
			y.body[b] = v
		}
	})
	m.wait(x, y, next, opening, closing, gap, top)
	return y
}

// misplaced tells whether planes are demanded that bodies would not come to.
func (m *model) misplaced(placed, next set, plane int) bool {
	bad := false
	each(m.isFixed&^placed, func(b int) {
		on := next>>b&1 == 1
		bad = bad || on && m.fixed[b] != plane || !on && m.fixed[b] <= plane
	})
	return bad
}

// fits tells whether heads, nuts and bodies have the height they need.
func (m *model) fits(x *state, next, open, opening, closing, stay set, gap, top length) bool {
	ok := !m.clash(open, opening, closing, stay)
	each(next, func(b int) { ok = ok && x.body[b] <= gap })
	each(opening, func(i int) { ok = ok && x.begin[i] <= gap })
	each(closing, func(i int) { ok = ok && x.end[i] <= top })
	each(open|opening, func(i int) {
		a, long := &m.pins[i], m.since(x, i, open, gap, top)
		ok = ok && (a.longest == 0 || long <= a.longest) && (stay>>i&1 == 1 || long >= a.shortest)
	})
	return ok
}

// since is how far below the top of the next plane a pin began.
func (m *model) since(x *state, pin int, open set, gap, top length) length {
	if open>>pin&1 == 1 {
		return x.since[pin] + top
	}
	return top - gap
}

// clash tells whether pins come too near to each other on a plane whatever the heights are: heads of those
// that begin on it to each other and to pins that are open below it, nuts of those that end on it to each
// other and to pins that stay open.
func (m *model) clash(open, opening, closing, stay set) bool {
	bad := false
	each(opening, func(i int) {
		if a := &m.pins[i]; a.below > 0 {
			bad = bad || a.close[Head][Shank]&open != 0
			each(a.close[Head][Head]&opening, func(q int) { bad = bad || m.pins[q].below > 0 })
		}
	})
	each(closing, func(i int) {
		if a := &m.pins[i]; a.above > 0 {
			bad = bad || a.close[Nut][Shank]&stay != 0
			each(a.close[Nut][Nut]&closing, func(q int) { bad = bad || m.pins[q].above > 0 })
		}
	})
	return bad
}

// wait works out from where on pins may begin and end.
func (m *model) wait(x, y *state, next, opening, closing set, gap, top length) {
	for q := range m.pins {
		a := &m.pins[q]
		if a.members&^y.placed == 0 {
			continue
		}
		if a.above > 0 {
			v := x.end[q] - top
			each(a.close[Nut][Nut]&closing, func(p int) {
				if up := m.pins[p].above; up > 0 {
					v = max(v, up+m.clear)
				}
			})
			if v > m.washer+m.thinnest {
				y.end[q] = v
			}
		}
		if a.members&y.placed != 0 {
			continue
		}
		v := x.begin[q] - top
		each(a.close[Shank][Nut]&closing, func(p int) {
			if up := m.pins[p].above; up > 0 {
				v = max(v, up+m.clear)
			}
		})
		if a.below > 0 {
			v = max(v, m.underHead(a, next, opening, closing, gap-top)+a.below)
		}
		if v > m.washer {
			y.begin[q] = v
		}
	}
}

// underHead is the height that the head of a pin must stay above, room included, as far as it follows from
// the plane just laid, whose lower face is at bottom and whose upper is at 0.
func (m *model) underHead(a *axle, next, opening, closing set, bottom length) length {
	v := -a.below // nothing
	if a.swept[Head]&next != 0 || a.close[Head][Shank]&closing != 0 {
		v = max(v, m.clear)
	}
	each(a.close[Head][Head]&opening, func(p int) {
		if m.pins[p].below > 0 {
			v = max(v, bottom+m.clear)
		}
	})
	each(a.close[Head][Nut]&closing, func(p int) {
		if up := m.pins[p].above; up > 0 {
			v = max(v, up+m.clear)
		}
	})
	return v
}
