package assembly

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"pinwright/parts"
	"pinwright/parts/interference"
	"pinwright/parts/job"
	"pinwright/parts/linkage"
	"pinwright/parts/stack"
)

// Spacing says how close the copies may stand on a body.
type Spacing struct {
	Least   float64 // smallest height from one copy to the next at which nothing of one touches anything of another, mm
	Clear   float64 // nothing touches at this height and at every larger one; Least is smaller where copies reach into one another
	Between string  // what rules Clear: "tie of left and foot of right"; "" when nothing does
	Still   bool    // those do not move against each other: they are simply in one place
	Angle   float64 // else the job's drive angle at which they come too close
	Blocked string  // what keeps the shaft from running on from copy to copy, in words; "" if nothing does or no two copies have one shaft
}

// Space finds how close copies may stand that follow each other along their shafts with the same
// distance throughout (job.Body): list, kits and levels are as for Gaps. Things on different copies must
// be apart by the running gap, seen from above or in height; what does not move against each other
// may touch.
//
// Two bodies on copies k places apart that come too close seen from above, the lower one at heights a to
// A and the upper one at b to B, each within its own copy, forbid exactly the spacings s with
//
//	a - B - gap  <  k s  <  A - b + gap.
//
// Least is the smallest s >= 0 in none of these intervals, Clear the greatest upper end. Only pairs whose
// interval matters are looked at, the greatest upper ends first: the search stops at the first pair
// that comes too close.
func Space(j job.Job, m *linkage.Mechanism, list []parts.Part, kits []stack.Kit, levels []stack.Level) (Spacing, error) {
	p, err := newPairs(j, m, append(ofParts(j, list, levels), ofKits(kits)...))
	if err != nil {
		return Spacing{}, err
	}
	var out Spacing
	for i := range p.bans {
		if p.bans[i].to <= 0 {
			break
		}
		near, angle, err := p.close(&p.bans[i])
		if err != nil {
			return Spacing{}, err
		}
		if near {
			out.Clear, out.Angle, out.Between, out.Still = p.bans[i].to, angle, p.bans[i].words(j), p.bans[i].still
			break
		}
	}
	if out.Least, err = p.least(); err != nil {
		return Spacing{}, err
	}
	out.Blocked, err = p.blocked()
	return out, err
}

// Crowded is an error that names what touches at the spacing that the job gives for its body; nil when
// nothing does or the job leaves it to the tool.
func Crowded(j job.Job, m *linkage.Mechanism, list []parts.Part, kits []stack.Kit, levels []stack.Level) error {
	if j.Body == nil || j.Body.Spacing == 0 {
		return nil
	}
	p, err := newPairs(j, m, append(ofParts(j, list, levels), ofKits(kits)...))
	if err != nil {
		return err
	}
	s := j.Body.Spacing
	for i := range p.bans {
		b := &p.bans[i]
		if s <= b.from || s >= b.to {
			continue
		}
		near, angle, err := p.close(b)
		if err != nil {
			return err
		}
		if near {
			least, err := p.least()
			if err != nil {
				return err
			}
			return j.Fault("body.spacing", fmt.Sprintf("%s touch, or come too close, at a spacing of %.1f mm, drive angle %.1f deg", b.words(j), s, angle*180/math.Pi),
				fmt.Sprintf("the least is %.1f mm, or leave spacing out", math.Ceil(least*10-1e-6)/10))
		}
	}
	return nil
}

// ban is the spacings that two bodies forbid if they come close.
type ban struct {
	lower, upper int // copies, indices of job.Copies
	a, b         thing
	from, to     float64
	still        bool // they do not move against each other
}

func (b ban) words(j job.Job) string {
	name := func(t thing, c int) string { return t.Name + " of " + j.Copies[c].Name }
	return name(b.a, b.lower) + " and " + name(b.b, b.upper)
}

// pairs is all pairs of bodies on different copies, the greatest upper end of their ban first.
type pairs struct {
	j      job.Job
	m      *linkage.Mechanism
	space  *interference.Space
	things []thing
	bans   []ban
	known  map[string]interference.Gap
}

func newPairs(j job.Job, m *linkage.Mechanism, things []thing) (*pairs, error) {
	space, err := interference.NewSpace(m)
	if err != nil {
		return nil, err
	}
	p := &pairs{j: j, m: m, space: space, things: things, known: map[string]interference.Gap{}}
	order := j.Body.Order
	for i, lower := range order {
		for k := 1; i+k < len(order); k++ {
			upper := order[i+k]
			oneAxis := p.copy(lower).At == p.copy(upper).At
			for _, a := range things {
				for _, b := range things {
					if oneAxis && a.joint == b.joint && a.joint != "" && (a.shaft || b.shaft) && p.onAxis(a.joint) {
						continue // the shaft goes through both copies
					}
					still := p.still(a, oneAxis) && p.still(b, oneAxis)
					gap := stack.RunningGap
					if still {
						gap = 0
					}
					p.bans = append(p.bans, ban{
						lower: lower, upper: upper, a: a, b: b, still: still,
						from: (a.Low - b.Up - gap) / float64(k), to: (a.Up - b.Low + gap) / float64(k),
					})
				}
			}
		}
	}
	slices.SortStableFunc(p.bans, func(a, b ban) int {
		switch {
		case a.to > b.to:
			return -1
		case a.to < b.to:
			return 1
		}
		return 0
	})
	return p, nil
}

func (p *pairs) copy(i int) interference.Copy {
	c := p.j.Copies[i]
	return interference.Copy{Phase: c.Phase, Mirror: c.Mirror, At: p.j.Body.Shafts[i]}
}

// onAxis tells whether a ground joint is the axis of the drive, at the origin, so that a mirrored copy
// has it at the same place.
func (p *pairs) onAxis(joint string) bool {
	l := p.m.Linkage()
	for _, k := range l.Links {
		if k.Name != l.Drive.Link || !slices.Contains(k.Pins, joint) {
			continue
		}
		i, ok := p.m.Joint(joint)
		g := l.Joints[i].Ground
		return ok && g != nil && g.Range == nil && math.Abs(g.At.X) < 1e-6
	}
	return false
}

// still tells whether a thing does not move, or only turns with the common shaft about its own middle.
func (p *pairs) still(t thing, oneAxis bool) bool {
	switch t.Carrier {
	case interference.OnGround:
		return true
	case interference.OnJoint:
		i, ok := p.m.Joint(t.joint)
		g := p.m.Linkage().Joints[i].Ground
		return ok && g != nil && g.Range == nil && (oneAxis || !t.shaft)
	}
	return false
}

// close tells whether the bodies of a ban come closer than they may, seen from above, and where. Pairs that
// look the same from above, on copies that stand to each other in the same way, are looked at once.
func (p *pairs) close(b *ban) (bool, float64, error) {
	x, y := b.a.Body, b.b.Body
	x.Copy, y.Copy = p.copy(b.lower), p.copy(b.upper)
	key := p.key(b)
	g, ok := p.known[key]
	if !ok {
		gap := stack.RunningGap
		if b.still {
			gap = accuracy
		}
		var err error
		g, err = p.space.Smallest(x, y, interference.Options{Accuracy: accuracy / 2, Limit: gap + accuracy, Enough: gap, Boxes: effort})
		if err != nil {
			return false, 0, err
		}
		if g.MM >= gap {
			g.MM = math.Inf(1)
		}
		p.known[key] = g
	}
	return !math.IsInf(g.MM, 1), g.Angle, nil
}

// key names all that the answer of close depends on.
func (p *pairs) key(b *ban) string {
	return fmt.Sprint(plan(b.a), "|", plan(b.b), p.copy(b.lower), p.copy(b.upper), b.still)
}

// plan names what a thing looks like from above.
func plan(t thing) string {
	if t.part != "" {
		return t.part
	}
	return fmt.Sprintf("%s %.6f", t.joint, t.Region.Bounds().Width())
}

// least goes up from 0 to the first spacing that no pair forbids.
func (p *pairs) least() (float64, error) {
	s := 0.0
again:
	for i := range p.bans {
		b := &p.bans[i]
		if s <= b.from || s >= b.to {
			continue
		}
		near, _, err := p.close(b)
		if err != nil {
			return 0, err
		}
		if near {
			s = b.to
			goto again
		}
	}
	return s, nil
}

// blocked tells what sweeps over the drive's shaft, beside those that sit on it, when two copies are to
// share it.
func (p *pairs) blocked() (string, error) {
	shared := false
	for i := range p.j.Copies {
		for k := range i {
			shared = shared || p.copy(i).At == p.copy(k).At
		}
	}
	i := slices.IndexFunc(p.things, func(t thing) bool { return t.shaft && p.onAxis(t.joint) })
	if !shared || i < 0 {
		return "", nil
	}
	shaft := p.things[i]
	var words []string
	for _, t := range p.things {
		tall := shaft
		tall.Low, tall.Up = t.Low, t.Up
		if !meet(p.m.Linkage(), tall, t) {
			continue
		}
		g, err := p.space.Smallest(t.Body, tall.Body, interference.Options{Accuracy: accuracy, Limit: stack.RunningGap + accuracy, Enough: stack.RunningGap, Boxes: effort})
		if err != nil {
			return "", err
		}
		if g.MM < stack.RunningGap {
			words = append(words, fmt.Sprintf("%s at %.0f deg", t.Name, g.Angle*180/math.Pi))
		}
	}
	if len(words) == 0 {
		return "", nil
	}
	return fmt.Sprintf("%s sweep across the axis of %s: the shaft cannot run through", strings.Join(words, ", "), shaft.joint), nil
}
