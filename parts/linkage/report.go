package linkage

import (
	"errors"
	"fmt"
	"math"
)

// Options says how closely to look.
type Options struct {
	Steps    int       // positions over the drive; 0: 360
	Settings int       // places along the range of each adjustable pivot, both ends included; 0: 9
	Bands    []float64 // heights of stance bands as fractions of the lift; nil: 0.02, 0.05, 0.1
}

func (o Options) filled() Options {
	if o.Steps <= 0 {
		o.Steps = 360
	}
	if o.Settings <= 1 {
		o.Settings = 9
	}
	if o.Bands == nil {
		o.Bands = []float64{0.02, 0.05, 0.1}
	}
	return o
}

// Report is what there is to know about a linkage before any part is drawn.
type Report struct {
	Mobility  int      // degrees of freedom by the Jacobian's rank at the start, the drive free
	Gruebler  int      // degrees of freedom by counting links and pins
	Surplus   []string // links that say nothing new; they fit at every position, but need exact lengths
	Ambiguity *Ambiguity
	Groups    []Group
	Full      bool
	Set       SettingReport   // the linkage as set
	Settings  []SettingReport // the adjustable pivots along their ranges; empty without such pivots
}

// Group is one Assur group in the order of solution.
type Group struct {
	Links  []string
	Joints []string // that it places
	Dyad   bool     // two links in closed form; else solved together by Newton's method
}

// SettingReport is one setting of the adjustable pivots.
type SettingReport struct {
	Setting       Setting
	Err           error   // why it does not work there; the rest is then empty
	Closure       float64 // largest error of any length at any position, mm
	Transmissions []Transmission
	Conditions    []Condition // of the groups that are no dyads
	Toggles       []Toggle
	Paths         []FootPath // of the traced joints, in their order
}

// Analyse solves the linkage over its drive and over the ranges of its adjustable pivots.
//
// With one or two adjustable pivots every combination of Options.Settings places is solved, with
// more the corners and each pivot alone; between neighbouring places the worst transmission is
// searched out, so that a gap in a range is found even when both neighbours work. The error joins
// what New or Cycle report for the set places and a *RangeError for each pivot that does not work
// all along; the report holds what could be found out.
func Analyse(l Linkage, o Options) (Report, error) {
	m, err := New(l)
	if err != nil {
		r := Report{Gruebler: gruebler(l)}
		var free *MobilityError
		if errors.As(err, &free) {
			r.Mobility = free.Mobility
		}
		return r, err
	}
	return m.Analyse(o)
}

// Analyse is the report of a mechanism; see the function of the same name.
func (m *Mechanism) Analyse(o Options) (Report, error) {
	o = o.filled()
	r := Report{
		Mobility: m.rankMobility(m.start.p), Gruebler: m.gruebler,
		Surplus: m.linkNames(m.surplus), Ambiguity: m.ambiguity, Full: m.full, Groups: m.Groups(),
	}
	r.Set = m.reportAt(nil, o)
	errs := []error{r.Set.Err}
	for _, s := range m.settings(o.Settings) {
		r.Settings = append(r.Settings, m.reportAt(s, o))
	}
	if r.Set.Err == nil {
		for _, j := range m.adjustable() {
			if e := m.checkRange(j, o.Settings); e != nil {
				errs = append(errs, e)
			}
		}
		errs = append(errs, m.combined(r.Settings, errs)...)
	}
	return r, errors.Join(errs...)
}

// combined returns the first failure of a combination of settings when no single pivot shows one.
func (m *Mechanism) combined(settings []SettingReport, before []error) []error {
	if errors.Join(before...) != nil {
		return nil
	}
	for _, s := range settings {
		if s.Err != nil {
			return []error{s.Err}
		}
	}
	return nil
}

// Groups returns the Assur groups of the linkage in the order of solution, the drive link first.
func (m *Mechanism) Groups() []Group {
	var out []Group
	for i, s := range m.plan {
		if s.kind == rigidStep && i > 0 {
			continue
		}
		out = append(out, Group{Links: m.linkNames(s.links), Joints: m.names(s.joints), Dyad: s.kind == dyadStep})
	}
	return out
}

func (m *Mechanism) reportAt(s Setting, o Options) SettingReport {
	r := SettingReport{Setting: s}
	c, err := m.Cycle(o.Steps, s)
	if err != nil {
		r.Err = err
		return r
	}
	r.Closure = c.Closure()
	r.Transmissions = c.Transmissions()
	r.Conditions = c.Conditions()
	r.Toggles = c.Toggles()
	for _, t := range m.linkage.Trace {
		if p, ok := c.FootPath(t, o.Bands); ok {
			r.Paths = append(r.Paths, p)
		}
	}
	return r
}

// adjustable lists the adjustable pivots in the order of the joints.
func (m *Mechanism) adjustable() []int {
	var out []int
	for _, j := range m.ground {
		if m.linkage.Joints[j].Ground.Range != nil {
			out = append(out, j)
		}
	}
	return out
}

// settings lists the settings to look at, n along each range.
func (m *Mechanism) settings(n int) []Setting {
	adj := m.adjustable()
	var out []Setting
	switch {
	case len(adj) == 0:
	case len(adj) <= 2:
		out = []Setting{{}}
		for _, j := range adj {
			var next []Setting
			for _, s := range out {
				for k := range n {
					next = append(next, s.with(m.jointNames[j], float64(k)/float64(n-1)))
				}
			}
			out = next
		}
	default:
		for _, j := range adj {
			for k := range n {
				out = append(out, Setting{m.jointNames[j]: float64(k) / float64(n-1)})
			}
		}
		for corner := range 1 << min(len(adj), 6) {
			s := Setting{}
			for i, j := range adj {
				s[m.jointNames[j]] = float64(corner >> min(i, 6) & 1)
			}
			out = append(out, s)
		}
	}
	return out
}

func (s Setting) with(name string, t float64) Setting {
	u := Setting{name: t}
	for n, v := range s {
		u[n] = v
	}
	return u
}

// RangeError says that an adjustable pivot cannot be set everywhere along its range.
type RangeError struct {
	Joint    string
	From, To float64 // parameters between which the linkage works, about where it is set
	A, B     Point   // the places of these
	Cause    error   // what goes wrong beyond
}

// Error gives the part of the range that works, as places.
func (e *RangeError) Error() string {
	return fmt.Sprintf("pivot %s works only from (%s, %s) to (%s, %s) of its range: shorten the range to that; beyond: %v",
		e.Joint, number(e.A.X), number(e.A.Y), number(e.B.X), number(e.B.Y), e.Cause)
}

// Unwrap returns the cause.
func (e *RangeError) Unwrap() error { return e.Cause }

// rangeSteps is how many positions a trial of a setting takes; the walk is certain between them.
const rangeSteps = 72

// checkRange tries a pivot along its range, the others as set. It goes out from the set place both
// ways over n places; between two places it looks for the least transmission by golden section, and
// where a place fails it halves down to a millionth of the range.
func (m *Mechanism) checkRange(j, n int) error {
	name := m.jointNames[j]
	g := m.linkage.Joints[j].Ground
	set, _ := g.Range.Nearest(g.At)
	// margin is the least off-line angle of any dyad, or an error.
	margin := func(t float64) (float64, error) {
		c, err := m.Cycle(rangeSteps, Setting{name: t})
		if err != nil {
			return 0, err
		}
		least := math.Pi
		for _, x := range c.Transmissions() {
			least = math.Min(least, math.Min(x.Min, math.Pi-x.Max))
		}
		return least, nil
	}
	var cause error
	reach := [2]float64{set, set}
	for side, end := range [2]float64{0, 1} {
		good, steps := set, max(1, int(math.Ceil(math.Abs(end-set)*float64(n-1))))
		bad, failed := 0.0, error(nil)
		for k := 1; k <= steps && failed == nil; k++ {
			t := set + (end-set)*float64(k)/float64(steps)
			if bad, failed = firstBad(margin, good, t); failed == nil {
				good = t
			}
		}
		for range 20 {
			if failed == nil {
				break
			}
			mid := (good + bad) / 2
			if _, err := margin(mid); err != nil {
				bad = mid // the cause stays the one further out, where the figures are larger
			} else {
				good = mid
			}
		}
		reach[side] = good
		if failed != nil && cause == nil {
			cause = failed
		}
	}
	if cause == nil {
		return nil
	}
	r := g.Range
	return &RangeError{Joint: name, From: reach[0], To: reach[1], A: r.Place(reach[0]), B: r.Place(reach[1]), Cause: cause}
}

// firstBad looks for a failure between a (which works) and b, b included.
func firstBad(margin func(float64) (float64, error), a, b float64) (float64, error) {
	if _, err := margin(b); err != nil {
		return b, err
	}
	const golden = 0.6180339887498949
	lo, hi := a, b
	x, y := hi-golden*(hi-lo), lo+golden*(hi-lo)
	fx, err := margin(x)
	if err != nil {
		return x, err
	}
	fy, err := margin(y)
	if err != nil {
		return y, err
	}
	for range 24 {
		if fx < fy {
			hi, y, fy = y, x, fx
			x = hi - golden*(hi-lo)
			if fx, err = margin(x); err != nil {
				return x, err
			}
		} else {
			lo, x, fx = x, y, fy
			y = lo + golden*(hi-lo)
			if fy, err = margin(y); err != nil {
				return y, err
			}
		}
	}
	return 0, nil
}
