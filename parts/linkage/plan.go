package linkage

import "math/bits"

// stepKind is how a part of the linkage follows from what is placed already.
type stepKind uint8

const (
	rigidStep stepKind = iota // a link with two placed pins: the rest of its pins
	dyadStep                  // a joint of two links that have one placed pin each
	blockStep                 // several links at once
)

// planStep is one Assur group, or a rigid link that is carried along.
type planStep struct {
	kind   stepKind
	links  []int // indices; two for a dyad, one for a rigid link
	joint  int   // dyad: the joint where the two links meet
	from   [2]int
	joints []int // joints that this step places, ascending
}

// plan takes the linkage apart into Assur groups, smallest first:
//
//  1. the drive link is placed whole by its angle;
//  2. a link with two placed pins carries the rest of its pins along;
//  3. two links that have one placed pin each and one joint in common are a dyad: two circles;
//  4. else the smallest set of links whose lengths (2n-3 each) are as many as the coordinates of the
//     joints they place is a block, solved by Newton's method. Sets are tried by size; when there
//     are too many, all links that are left make one block.
//
// The links in out are not used (they only repeat what others say). The linkage must have no
// freedom left, which genericFreedom has established.
func plan(joints int, pins [][]int, ground []bool, drive int, out map[int]bool) []planStep {
	placed := append([]bool(nil), ground...)
	done := make([]bool, len(pins))
	for k := range out {
		done[k] = true
	}
	var steps []planStep
	place := func(s planStep) {
		for _, k := range s.links {
			done[k] = true
			for _, p := range pins[k] {
				if !placed[p] {
					placed[p] = true
					s.joints = append(s.joints, p)
				}
			}
		}
		steps = append(steps, s)
	}
	place(planStep{kind: rigidStep, links: []int{drive}})

	placedPins := func(k int) (n, one int) {
		one = -1
		for _, p := range pins[k] {
			if placed[p] {
				n, one = n+1, p
			}
		}
		return n, one
	}
	for {
		progress := false
		for k := range pins {
			if n, _ := placedPins(k); !done[k] && n >= 2 {
				place(planStep{kind: rigidStep, links: []int{k}})
				progress = true
			}
		}
		if progress {
			continue
		}
		if s, ok := findDyad(pins, done, placed, placedPins); ok {
			j := s.joint
			placed[j] = true
			s.joints = append(s.joints, j)
			steps = append(steps, s)
			continue // the two links are now rigid links with two placed pins
		}
		var rest []int
		for k := range pins {
			if !done[k] {
				rest = append(rest, k)
			}
		}
		if len(rest) == 0 {
			return steps
		}
		place(planStep{kind: blockStep, links: smallestGroup(pins, rest, placed)})
	}
}

func findDyad(pins [][]int, done, placed []bool, placedPins func(int) (int, int)) (planStep, bool) {
	for a := range pins {
		na, fromA := placedPins(a)
		if done[a] || na != 1 {
			continue
		}
		for b := a + 1; b < len(pins); b++ {
			nb, fromB := placedPins(b)
			if done[b] || nb != 1 {
				continue
			}
			for _, p := range pins[a] {
				if placed[p] {
					continue
				}
				for _, q := range pins[b] {
					if p == q {
						return planStep{kind: dyadStep, links: []int{a, b}, joint: p, from: [2]int{fromA, fromB}}, true
					}
				}
			}
		}
	}
	return planStep{}, false
}

// smallestGroup returns the fewest links of rest that fix their joints together, or all of rest.
func smallestGroup(pins [][]int, rest []int, placed []bool) []int {
	const effort = 1 << 18
	n := len(rest)
	if n > 24 {
		return rest
	}
	tried := 0
	for size := 3; size < n; size++ {
		for set := uint32(1)<<size - 1; set < 1<<n; {
			if tried++; tried > effort {
				return rest
			}
			if fixesItself(pins, rest, placed, set) {
				var g []int
				for i, k := range rest {
					if set>>i&1 == 1 {
						g = append(g, k)
					}
				}
				return g
			}
			low := set & -set // next set of the same size (Gosper)
			up := set + low
			set = up | (set^up)>>2>>bits.TrailingZeros32(low)
		}
	}
	return rest
}

func fixesItself(pins [][]int, rest []int, placed []bool, set uint32) bool {
	lengths := 0
	var unknown []int
	for i, k := range rest {
		if set>>i&1 == 0 {
			continue
		}
		lengths += 2*len(pins[k]) - 3
		for _, p := range pins[k] {
			if !placed[p] {
				unknown = appendNew(unknown, p)
			}
		}
	}
	return lengths == 2*len(unknown)
}
