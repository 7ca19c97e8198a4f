package tube

import (
	"encoding/binary"
	"slices"
)

// filling is how many pieces of each size are in one tube, in the order of the sizes.
type filling []int

// search fills tubes. Sizes are micrometres with a saw cut, descending; left counts what is not yet in
// a tube.
type search struct {
	capacity int
	sizes    []int
	left     []int
	most     int // steps

	steps int
	limit int            // tubes that the plan being looked for may have
	bins  []filling      // so far
	seen  map[string]int // what was left over, and with how many tubes at most it failed
}

// solve gives the bins of the best plan found, a bound from below and whether the plan is proven.
func (s *search) solve() ([]filling, int, bool) {
	plan := s.firstFit()
	bound := s.bound()
	if len(plan) > bound {
		bound = max(bound, s.priced())
	}
	for len(plan) > bound {
		s.limit = len(plan) - 1
		s.bins = s.bins[:0]
		clear(s.seen)
		if !s.fill() {
			// All was tried, or the steps are used up.
			return plan, bound, s.steps < s.most
		}
		plan = nil
		for _, b := range s.bins {
			plan = append(plan, slices.Clone(b))
		}
	}
	return plan, bound, true
}

// firstFit is first-fit decreasing.
func (s *search) firstFit() []filling {
	var bins []filling
	var room []int
	for k, size := range s.sizes {
		from := 0
		for range s.left[k] {
			for from < len(room) && room[from] < size {
				from++
			}
			if from == len(room) {
				bins = append(bins, make(filling, len(s.sizes)))
				room = append(room, s.capacity)
			}
			bins[from][k]++
			room[from] -= size
		}
	}
	return bins
}

// bound is the least number of tubes that what is left may need. Every function maps sizes so that what
// fits into a tube still does: u(k) of Fekete and Schepers, and the one that takes pieces over the
// capacity less a length for a whole tube and passes over those under that length.
func (s *search) bound() int {
	best := 0
	for k := 1; k <= 6; k++ { // u(1) changes nothing but whole divisors
		sum := 0
		for i, size := range s.sizes {
			// x = size/capacity: x when (k+1) x is whole, else floor((k+1) x)/k; here times k capacity.
			scaled := (k + 1) * size
			value := size * k
			if scaled%s.capacity != 0 {
				value = scaled / s.capacity * s.capacity
			}
			sum += value * s.left[i]
		}
		best = max(best, ceil(sum, k*s.capacity))
	}
	small := append([]int{0}, s.sizes...)
	for _, e := range small {
		if 2*e > s.capacity {
			continue
		}
		sum := 0
		for i, size := range s.sizes {
			switch {
			case size > s.capacity-e:
				sum += s.capacity * s.left[i]
			case size >= e:
				sum += size * s.left[i]
			}
		}
		best = max(best, ceil(sum, s.capacity))
	}
	return best
}

func ceil(a, b int) int { return (a + b - 1) / b }

// fill puts all that is left into the tubes that the limit leaves; false when it cannot, or when the
// steps are used up.
func (s *search) fill() bool {
	first := slices.IndexFunc(s.left, func(n int) bool { return n > 0 })
	if first < 0 {
		return true
	}
	tubes := s.limit - len(s.bins)
	if s.steps >= s.most || s.bound() > tubes {
		return false
	}
	key := s.key()
	if failed, ok := s.seen[key]; ok && failed >= tubes {
		return false
	}
	total := 0
	for k, size := range s.sizes {
		total += size * s.left[k]
	}
	for _, f := range s.fillings(first, tubes*s.capacity-total) {
		if s.steps++; s.steps >= s.most {
			return false
		}
		for k, n := range f {
			s.left[k] -= n
		}
		s.bins = append(s.bins, f)
		done := s.fill()
		for k, n := range f {
			s.left[k] += n
		}
		if done {
			return true
		}
		s.bins = s.bins[:len(s.bins)-1]
	}
	s.seen[key] = max(s.seen[key], tubes)
	return false
}

// fillings are those with a piece of the first size that leave no room for a further piece and waste no
// more than a length, the fullest first.
func (s *search) fillings(first, waste int) []filling {
	type full struct {
		filling
		room int
	}
	var out []full
	f := make(filling, len(s.sizes))
	f[first] = 1
	var add func(k, room int)
	add = func(k, room int) {
		if len(out) >= mostFillings {
			return
		}
		if k == len(s.sizes) {
			if room > waste {
				return
			}
			for i, size := range s.sizes {
				if f[i] < s.left[i] && size <= room {
					return
				}
			}
			out = append(out, full{slices.Clone(f), room})
			return
		}
		already := f[k]
		for n := min(s.left[k]-already, room/s.sizes[k]); n >= 0; n-- {
			f[k] = already + n
			add(k+1, room-n*s.sizes[k])
		}
		f[k] = already
	}
	add(first, s.capacity-s.sizes[first])
	if len(out) >= mostFillings {
		s.steps = s.most // not all are seen: nothing is proven from here on
	}
	slices.SortStableFunc(out, func(a, b full) int { return a.room - b.room })
	fillings := make([]filling, len(out))
	for i := range out {
		fillings[i] = out[i].filling
	}
	return fillings
}

// mostFillings is how many fillings of one tube are looked at.
const mostFillings = 100_000

// key is what is left.
func (s *search) key() string {
	var b []byte
	for _, n := range s.left {
		b = binary.AppendUvarint(b, uint64(n))
	}
	return string(b)
}
