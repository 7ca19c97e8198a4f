package interference

import (
	"encoding/binary"
	"fmt"
	"math"
	"sync"

	"pinwright/parts/linkage"
)

// seedSteps is the number of steps of the cycles that positions are started from: only the branch
// matters, the places are solved again.
const seedSteps = 72

// Space is a mechanism ready for questions about gaps. It keeps the poses it has solved, so asking
// about many pairs costs little more than asking about one. Several goroutines may ask; the answers
// do not depend on who asks first.
type Space struct {
	m      *mechanism
	source *linkage.Mechanism

	lock   sync.Mutex
	cycles map[string]*linkage.Cycle
	poses  map[string]pose
}

// NewSpace prepares a mechanism.
//
// Surplus links count as long as they fit by their lengths, as package linkage finds them to.
func NewSpace(source *linkage.Mechanism) (*Space, error) {
	m, err := newMechanism(source)
	if err != nil {
		return nil, fmt.Errorf("interference: %w", err)
	}
	return &Space{m: m, source: source, cycles: map[string]*linkage.Cycle{}, poses: map[string]pose{}}, nil
}

// seed gives the places of all joints at a drive angle and settings, on the branch that the
// mechanism is on.
func (s *Space) seed(angle float64, settings []float64) ([]Point, error) {
	setting := linkage.Setting{}
	for i, j := range s.m.settings {
		setting[s.m.joints[j]] = settings[i]
	}
	c, err := s.cycle(setting)
	if err != nil {
		return nil, err
	}
	if s.m.full {
		angle -= 2 * math.Pi * math.Floor((angle-s.m.from)/(2*math.Pi))
	}
	p, err := c.At(math.Min(math.Max(angle, s.m.from), s.m.to))
	if err != nil {
		return nil, err
	}
	return p.Places, nil
}

func (s *Space) cycle(setting linkage.Setting) (*linkage.Cycle, error) {
	key := setting.String()
	s.lock.Lock()
	c, ok := s.cycles[key]
	s.lock.Unlock()
	if ok {
		return c, nil
	}
	c, err := s.source.Cycle(seedSteps, setting)
	if err != nil {
		return nil, err
	}
	s.lock.Lock()
	s.cycles[key] = c
	s.lock.Unlock()
	return c, nil
}

// pose solves the middle of a box of the linkage's own parameters, from memory if it was met before.
func (s *Space) pose(mid, half []float64) (pose, error) {
	var key []byte
	for i := range mid {
		key = binary.LittleEndian.AppendUint64(key, math.Float64bits(mid[i]))
		key = binary.LittleEndian.AppendUint64(key, math.Float64bits(half[i]))
	}
	s.lock.Lock()
	p, ok := s.poses[string(key)]
	s.lock.Unlock()
	if ok {
		return p, nil
	}
	seed, err := s.seed(mid[0], mid[1:])
	if err != nil {
		return pose{}, err
	}
	if p, err = s.m.poseAt(mid, half, seed); err != nil {
		return pose{}, err
	}
	s.lock.Lock()
	s.poses[string(key)] = p
	s.lock.Unlock()
	return p, nil
}

// view is a copy as it is seen from the parameters of a search: the shaft's angle, then settings.
type view struct {
	copy  Copy
	sense float64 // its drive angle is copy.Phase + sense times the shaft's
	first int     // its settings are the parameters from this one on
}

// views returns how two copies are seen in one search, and the number of parameters.
func (s *Space) views(a, b Copy) (va, vb view, parameters int, err error) {
	n := len(s.m.settings)
	if !s.m.full && (a.Phase != 0 || b.Phase != 0 || a.Mirror != b.Mirror) {
		return va, vb, 0, fmt.Errorf("copies at other phases or mirrored need a drive that turns all the way round")
	}
	at := func(c Copy, first int) view {
		if c.Mirror {
			return view{c, -1, first}
		}
		return view{c, 1, first}
	}
	if a == b {
		return at(a, 1), at(b, 1), 1 + n, nil // one set of pivots
	}
	return at(a, 1), at(b, 1+n), 1 + 2*n, nil
}

// see returns the pose of a copy in a box of the search.
func (s *Space) see(v view, b box) (pose, error) {
	n := len(s.m.settings)
	if v.copy == (Copy{}) && len(b.mid) == 1+n {
		return s.pose(b.mid, b.half)
	}
	mid := append([]float64{v.copy.Phase + v.sense*b.mid[0]}, b.mid[v.first:v.first+n]...)
	half := append([]float64{b.half[0]}, b.half[v.first:v.first+n]...)
	own, err := s.pose(mid, half)
	if err != nil {
		return pose{}, err
	}
	joints := len(own.at)
	p := pose{at: make([]Point, joints), rho: own.rho, loose: own.loose, vel: make([][]Point, len(b.mid))}
	turn := func(q Point, f float64) Point {
		if v.copy.Mirror {
			q.X = -q.X
		}
		return q.Scale(f)
	}
	for j, q := range own.at {
		p.at[j] = turn(q, 1).Add(v.copy.At)
	}
	for k := range p.vel {
		p.vel[k] = make([]Point, joints)
		from, f := -1, 1.0
		switch {
		case k == 0:
			from, f = 0, v.sense
		case k >= v.first && k < v.first+n:
			from = 1 + k - v.first
		}
		if from >= 0 {
			for j, q := range own.vel[from] {
				p.vel[k][j] = turn(q, f)
			}
		}
	}
	return p, nil
}

// box is a piece of the parameter space.
type box struct {
	mid, half []float64
	low       float64 // the gap in it is at least this; of a search for depth minus the most that is overlapped
	number    int     // of its making, for a certain order
}

// boxHeap has the most doubtful box on top.
type boxHeap []box

func (h boxHeap) Len() int { return len(h) }
func (h boxHeap) Less(i, j int) bool {
	if h[i].low != h[j].low {
		return h[i].low < h[j].low
	}
	return h[i].number < h[j].number
}
func (h boxHeap) Swap(i, j int) { h[i], h[j] = h[j], h[i] }
func (h *boxHeap) Push(x any)   { *h = append(*h, x.(box)) }
func (h *boxHeap) Pop() any {
	old := *h
	x := old[len(old)-1]
	*h = old[:len(old)-1]
	return x
}

// firstBoxes cuts the parameter space into pieces worth starting with.
func (s *Space) firstBoxes(parameters int) []box {
	const turns = 48 // pieces of the drive: 7.5 degrees of a full turn
	var boxes []box
	width := (s.m.to - s.m.from) / turns
	for i := range turns {
		b := box{
			mid:    []float64{s.m.from + (float64(i)+0.5)*width},
			half:   []float64{width / 2},
			number: i,
		}
		for len(b.mid) < parameters {
			b.mid = append(b.mid, 0.5)
			b.half = append(b.half, 0.5)
		}
		boxes = append(boxes, b)
	}
	return boxes
}

// halve cuts a box across the parameter that moves the joints most.
func halve(b box, pa, pb pose, number int) [2]box {
	side, most := 0, -1.0
	for k := range b.half {
		reach := 0.0
		for _, p := range []pose{pa, pb} {
			for _, v := range p.vel[k] {
				reach = math.Max(reach, v.Len()*b.half[k])
			}
		}
		if reach > most {
			side, most = k, reach
		}
	}
	var two [2]box
	for i, sign := range []float64{-1, 1} {
		c := box{mid: append([]float64(nil), b.mid...), half: append([]float64(nil), b.half...), number: number + i}
		c.half[side] /= 2
		c.mid[side] += sign * c.half[side]
		two[i] = c
	}
	return two
}
