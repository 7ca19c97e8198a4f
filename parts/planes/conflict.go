package planes

// Conflict says that there is no assignment: these rules contradict each other, and without any one of them
// those left do not.
type Conflict struct {
	Apart   []Apart
	Swept   []Swept
	Close   []Close
	Short   []Short
	Demands []Demand
	problem Problem
}

// explain finds a smallest set of rules that contradict each other in a problem without an answer.
//
// Rules are taken away in halves, quarters and so on down to single ones, as long as there is no answer
// without them; a last pass goes through those left one by one.
func explain(p Problem) *Conflict {
	rules := len(p.Apart) + len(p.Swept) + len(p.Close) + len(p.Short) + len(p.Demands)
	keep := make([]bool, rules)
	for i := range keep {
		keep[i] = true
	}
	for size := max(1, rules/2); ; size /= 2 {
		for from := 0; from < rules; from += size {
			was := append([]bool(nil), keep...)
			some := false
			for i := from; i < min(from+size, rules); i++ {
				some = some || keep[i]
				keep[i] = false
			}
			if some && solvable(p.with(keep)) {
				keep = was
			}
		}
		if size == 1 {
			break
		}
	}
	q := p.with(keep)
	return &Conflict{Apart: q.Apart, Swept: q.Swept, Close: q.Close, Short: q.Short, Demands: q.Demands, problem: p}
}

// with returns the problem with those rules only that are kept, the first to be tried first.
func (p Problem) with(keep []bool) Problem {
	q := p
	q.Close = kept(p.Close, keep)
	keep = keep[len(p.Close):]
	q.Apart = kept(p.Apart, keep)
	keep = keep[len(p.Apart):]
	q.Swept = kept(p.Swept, keep)
	keep = keep[len(p.Swept):]
	q.Short = kept(p.Short, keep)
	keep = keep[len(p.Short):]
	q.Demands = kept(p.Demands, keep)
	return q
}

func kept[T any](list []T, keep []bool) []T {
	var out []T
	for i, x := range list {
		if keep[i] {
			out = append(out, x)
		}
	}
	return out
}

// feasibleStates bounds the search for any answer at all, of which an explanation needs one for every rule.
const feasibleStates = 20_000

// solvable tells whether a problem has an answer. A search without a result in the states allowed counts as
// one: then a rule stays that might go.
func solvable(p Problem) bool {
	m, err := newModel(p)
	if err != nil {
		return true
	}
	if !m.finishable() {
		return false
	}
	if m.isFixed == 0 && len(p.Short) == 0 {
		return true
	}
	found, sure := m.any(len(p.Short) == 0)
	return found || !sure
}

// any looks for an answer depth first. It is sure of having found none when it went through all states.
// When no pin is held short, a side view that is further back has all the possibilities of the same one
// further in front: empty planes only make room.
func (m *model) any(roomy bool) (found, sure bool) {
	s := &search{m: m, finish: newFinish(m)}
	seen := map[string]int{}
	sure = true
	var down func(x *state)
	visit := func(x *state) {
		if found || !sure || s.finish.from(x.placed) == impossible {
			return
		}
		key := m.future(x)
		if !roomy {
			key = m.key(x)
		}
		if plane, ok := seen[key]; ok && plane <= x.plane {
			return
		}
		if len(seen) >= feasibleStates {
			sure = false
			return
		}
		seen[key] = x.plane
		down(x)
	}
	down = func(x *state) {
		if x.placed == m.all {
			found = true
			return
		}
		s.expand(x, visit)
	}
	root := m.root()
	for _, plane := range m.starts() {
		m.layers(m.ready(0, 0), func(next set) {
			if x := m.put(root, next, plane, 0); x != nil {
				visit(x)
			}
		})
	}
	return found, sure
}

// finishableSets bounds the sets that finishable looks at: all of them up to 18 bodies. Beyond it takes a
// problem for one that can be finished.
const finishableSets = 1 << 18

// finishable tells whether all bodies can be placed when planes are free: then heads and nuts can have the
// height they need in empty planes, and only sets and their order count. Unless heads or nuts of two pins
// come near each other, bodies that share a plane may as well lie on planes of their own, in any order.
func (m *model) finishable() bool {
	alone := true
	for i := range m.pins {
		c := &m.pins[i].close
		alone = alone && c[Head] == [3]set{} && c[Nut] == [3]set{}
	}
	dead := map[set]bool{}
	var down func(placed set) bool
	down = func(placed set) bool {
		if placed == m.all || len(dead) > finishableSets {
			return true
		}
		if dead[placed] {
			return false
		}
		open, found := m.open(placed), false
		try := func(next set) {
			if found || dead[placed|next] {
				return
			}
			opening, stay := m.opening(placed, next), m.open(placed|next)
			found = !m.clash(open, opening, (open|opening)&^stay, stay) && down(placed|next)
		}
		ready := m.ready(placed, open)
		if alone {
			m.singles(ready, try)
		} else {
			m.layers(ready, try)
		}
		dead[placed] = !found
		return found
	}
	return down(0)
}

// singles calls f with the ready bodies one by one, groups whole.
func (m *model) singles(ready set, f func(next set)) {
	each(ready, func(b int) {
		g := m.group[b]
		var apart set
		each(g, func(i int) { apart |= m.apart[i] })
		if g&^ready == 0 && g&(1<<b-1) == 0 && apart&g == 0 {
			f(g)
		}
	})
}
