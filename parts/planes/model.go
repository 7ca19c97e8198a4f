package planes

import (
	"fmt"
	"math"
	"math/bits"
)

// most is how many bodies, and how many pins, fit into the sets of the search.
const most = 64

// set is a set of bodies or of pins.
type set = uint64

// length is a length in micrometres: sums of them are exact.
type length = int64

func micrometres(mm float64) length { return length(math.Round(mm * 1000)) }

// axle is a pin as the search sees it.
type axle struct {
	members      set
	swept        [3]set    // by own zone: bodies that must not be there
	close        [3][3]set // by own zone and zone of the other: pins
	below, above length
	longest      length // from first to last member; 0: any
	shortest     length
	free, loaded bool
}

// model is a problem as the search sees it.
type model struct {
	n             int
	all           set
	thick         []length
	thinnest      length
	apart         []set // by body: bodies that cannot lie on its plane
	group         []set // by body: bodies that must lie on its plane, itself included
	behind        []set // by body: bodies that must lie behind it
	fixed         []int
	isFixed       set
	lowest        int // least and greatest plane that is demanded
	highest       int
	pins          []axle
	washer, clear length
}

// newModel checks a problem and makes a model of it. Sets of bodies on one plane and their apartness are
// taken as they are: that they contradict each other comes out in the search.
func newModel(p Problem) (*model, error) {
	n := len(p.Bodies)
	if n > most || len(p.Pins) > most {
		return nil, fmt.Errorf("planes: %d parts and %d pins: at most %d of each can be laid out; state their planes", n, len(p.Pins), most)
	}
	m := &model{
		n: n, thick: make([]length, n), apart: make([]set, n), group: make([]set, n), behind: make([]set, n), fixed: make([]int, n),
		washer: micrometres(p.Washer), clear: micrometres(p.Clear),
	}
	body := func(i int) error {
		if i < 0 || i >= n {
			return fmt.Errorf("planes: there is no part %d", i)
		}
		return nil
	}
	pin := func(i int) error {
		if i < 0 || i >= len(p.Pins) {
			return fmt.Errorf("planes: there is no pin %d", i)
		}
		return nil
	}
	for i, b := range p.Bodies {
		m.thick[i] = micrometres(b.Thickness)
		if m.thick[i] <= 0 {
			return nil, fmt.Errorf("planes: %s is %g mm thick", b.Name, b.Thickness)
		}
		if i == 0 || m.thick[i] < m.thinnest {
			m.thinnest = m.thick[i]
		}
		m.all |= 1 << i
		m.group[i] = 1 << i
	}
	for _, x := range p.Pins {
		a := axle{below: micrometres(x.Below), above: micrometres(x.Above), shortest: micrometres(x.Least), free: x.Free, loaded: x.Loaded}
		for _, b := range x.Members {
			if err := body(b); err != nil {
				return nil, err
			}
			a.members |= 1 << b
		}
		if a.members == 0 {
			return nil, fmt.Errorf("planes: nothing is on pin %s", x.Name)
		}
		each(a.members, func(b int) { m.apart[b] |= a.members &^ (1 << b) })
		m.pins = append(m.pins, a)
	}
	for _, x := range p.Apart {
		if err := first(body(x.A), body(x.B)); err != nil {
			return nil, err
		}
		m.keepApart(1<<x.A, 1<<x.B)
	}
	for _, x := range p.Swept {
		if err := first(pin(x.Pin), body(x.Body), zone(x.Zone)); err != nil {
			return nil, err
		}
		if a := &m.pins[x.Pin]; a.members>>x.Body&1 == 0 {
			a.swept[x.Zone] |= 1 << x.Body
			if x.Zone == Shank {
				m.keepApart(a.members, 1<<x.Body)
			}
		}
	}
	for _, x := range p.Close {
		if err := first(pin(x.P), pin(x.Q), zone(x.ZoneP), zone(x.ZoneQ)); err != nil {
			return nil, err
		}
		if x.P == x.Q || m.pins[x.P].members&m.pins[x.Q].members != 0 && x.ZoneP == Shank && x.ZoneQ == Shank {
			continue // one part with both: whether that can be built is not a question of planes
		}
		m.pins[x.P].close[x.ZoneP][x.ZoneQ] |= 1 << x.Q
		m.pins[x.Q].close[x.ZoneQ][x.ZoneP] |= 1 << x.P
		if x.ZoneP == Shank && x.ZoneQ == Shank {
			m.keepApart(m.pins[x.P].members, m.pins[x.Q].members)
		}
	}
	for _, x := range p.Short {
		if err := pin(x.Pin); err != nil {
			return nil, err
		}
		v := max(1, micrometres(x.MM)) // nothing is thinner than that
		if a := &m.pins[x.Pin]; a.longest == 0 || v < a.longest {
			a.longest = v
		}
	}
	for _, d := range p.Demands {
		if err := first(body(d.A), body(d.B)); err != nil {
			return nil, err
		}
	}
	m.demands(p.Demands)
	return m, nil
}

func first(errs ...error) error {
	for _, err := range errs {
		if err != nil {
			return err
		}
	}
	return nil
}

func zone(z Zone) error {
	if z < Shank || z > Nut {
		return fmt.Errorf("planes: a pin has no zone %d", z)
	}
	return nil
}

func (m *model) keepApart(a, b set) {
	each(a, func(i int) { m.apart[i] |= b &^ (1 << i) })
	each(b, func(i int) { m.apart[i] |= a &^ (1 << i) })
}

// demands enters the demands: bodies demanded on one plane become groups, what is demanded of one of a
// group holds for all of it, and fixed planes give an order as well.
func (m *model) demands(list []Demand) {
	for _, d := range list {
		if d.Kind == SamePlane {
			m.unite(d.A, d.B)
		}
	}
	for _, d := range list {
		if d.Kind != On {
			continue
		}
		each(m.group[d.A], func(b int) {
			if m.isFixed>>b&1 == 1 && m.fixed[b] != d.Plane {
				m.behind[b] |= 1 << b // two planes for one body: it must lie behind itself, and cannot
			}
			m.fixed[b] = d.Plane
			m.isFixed |= 1 << b
		})
	}
	each(m.isFixed, func(a int) {
		if m.isFixed&(1<<a-1) == 0 {
			m.lowest, m.highest = m.fixed[a], m.fixed[a]
		}
		m.lowest, m.highest = min(m.lowest, m.fixed[a]), max(m.highest, m.fixed[a])
		each(m.isFixed, func(b int) {
			if m.fixed[a] == m.fixed[b] {
				m.unite(a, b)
			} else if m.fixed[b] < m.fixed[a] {
				m.behind[a] |= 1 << b
			}
		})
	})
	for _, d := range list {
		if d.Kind == InFrontOf {
			m.behind[d.A] |= 1 << d.B
		}
	}
	for a := range m.n {
		each(m.group[a], func(b int) { m.behind[a] |= m.behind[b] })
	}
}

func (m *model) unite(a, b int) {
	g := m.group[a] | m.group[b]
	each(g, func(i int) { m.group[i] = g })
}

// each calls f with the elements of a set in their order.
func each(s set, f func(int)) {
	for ; s != 0; s &= s - 1 {
		f(bits.TrailingZeros64(s))
	}
}

// open returns the pins of which some members are placed and some are not.
func (m *model) open(placed set) set {
	var out set
	for i := range m.pins {
		if x := m.pins[i].members & placed; x != 0 && x != m.pins[i].members {
			out |= 1 << i
		}
	}
	return out
}

// opening returns the pins whose first member is among the next ones.
func (m *model) opening(placed, next set) set {
	var out set
	for i := range m.pins {
		if x := m.pins[i].members; x&next != 0 && x&placed == 0 {
			out |= 1 << i
		}
	}
	return out
}

// ready returns the bodies that may lie on the next plane as far as the open pins and the order go.
func (m *model) ready(placed, open set) set {
	out := m.all &^ placed
	each(open, func(i int) {
		a := &m.pins[i]
		out &^= a.swept[Shank]
		each(a.close[Shank][Shank], func(q int) { out &^= m.pins[q].members })
	})
	free := out
	each(free, func(b int) {
		if m.behind[b]&^placed != 0 || m.group[b]&^free != 0 {
			out &^= m.group[b]
		}
	})
	return out
}

// layers calls f with every set of the ready bodies that can share a plane, groups whole.
func (m *model) layers(ready set, f func(next set)) {
	var extend func(chosen, rest set)
	extend = func(chosen, rest set) {
		if chosen != 0 {
			f(chosen)
		}
		for rest != 0 {
			b := bits.TrailingZeros64(rest)
			g := m.group[b]
			whole := g&^rest == 0
			rest &^= g
			var apart set
			each(g, func(i int) { apart |= m.apart[i] })
			if whole && apart&g == 0 {
				extend(chosen|g, rest&^apart)
			}
		}
	}
	extend(0, ready)
}

// slab is how thick a plane with these bodies is.
func (m *model) slab(next set) length {
	var out length
	each(next, func(b int) { out = max(out, m.thick[b]) })
	return out
}

// expense is a cost in whole numbers.
type expense struct {
	planes   int
	length   length
	overhang int
}

func (e expense) add(x expense) expense {
	return expense{e.planes + x.planes, e.length + x.length, e.overhang + x.overhang}
}

// compare orders expenses: planes, then length, then overhang.
func (e expense) compare(x expense) int {
	switch {
	case e.planes != x.planes:
		return e.planes - x.planes
	case e.length != x.length:
		if e.length < x.length {
			return -1
		}
		return 1
	}
	return e.overhang - x.overhang
}

func (e expense) cost() Cost {
	return Cost{Planes: e.planes, Length: float64(e.length) / 1000, Overhang: e.overhang}
}

// step is what a plane costs: open are the pins open before it, opening those that begin on it, gap is the
// distance from the plane before and empty the number of empty planes in it.
func (m *model) step(open, opening, next set, gap length, empty int) expense {
	out := expense{planes: 1 + empty}
	slab := m.slab(next)
	each(open, func(i int) {
		a := &m.pins[i]
		if !a.free {
			out.length += gap + slab
		}
		if a.loaded {
			out.overhang += empty
			if a.members&next == 0 {
				out.overhang++
			}
		}
	})
	each(opening, func(i int) {
		if !m.pins[i].free {
			out.length += slab
		}
	})
	return out
}
