package stack

import (
	"fmt"
	"math"
	"slices"
)

// slack swallows the rounding of sums in binary, mm.
const slack = 1e-9

// mostWashers is how many washers may lie on each other where a spacer has no room.
const mostWashers = 8

// filling is what fills the gap between two parts on a pin, from below: washers, then a spacer with a
// washer on each side.
type filling struct {
	washers int     // in all
	spacer  float64 // 0: none
	play    float64 // what is left
}

// fill finds what fills a distance with washers of a thickness (0: there are none): up to three
// washers, else a spacer between two washers, else more washers. Spacers are cut to 0.1 mm, rounded
// down. False when nothing fits.
func fill(distance, washer float64) (filling, bool) {
	if distance < -slack {
		return filling{}, false
	}
	stacked := func(most int) (filling, bool) {
		n := 0
		if washer > 0 {
			n = min(most, int(math.Floor((distance+slack)/washer)))
			if n == 0 {
				return filling{}, false // parts would rub on each other
			}
		}
		rest := max(0, distance-float64(n)*washer)
		return filling{washers: n, play: tidy(rest)}, rest <= MostPlay+slack
	}
	if f, ok := stacked(3); ok {
		return f, true
	}
	if length := distance - 2*washer; length >= ShortestSpacer-slack {
		cut := math.Floor((length+slack)*10) / 10
		f := filling{spacer: cut, play: max(0, length-cut)}
		if washer > 0 {
			f.washers = 2
		}
		return f, true
	}
	return stacked(mostWashers)
}

// crossing is a pin with parts on both sides of a gap and nothing between.
type crossing struct {
	washer float64
	more   float64 // what the pin has to fill more than the gap: parts thinner than their slab, bearings proud (negative)
}

// smallestGap gives the smallest gap, not under least, that all crossings can fill. There is always one:
// a gap in which all of them take a spacer.
func smallestGap(least float64, crossings []crossing) float64 {
	candidates := []float64{least}
	for _, c := range crossings {
		for n := range mostWashers + 1 {
			candidates = append(candidates, float64(n)*c.washer-c.more)
		}
		candidates = append(candidates, 2*c.washer+ShortestSpacer-c.more)
	}
	slices.Sort(candidates)
	for _, gap := range candidates {
		if gap < least-slack {
			continue
		}
		fits := !slices.ContainsFunc(crossings, func(c crossing) bool {
			_, ok := fill(gap+c.more, c.washer)
			return !ok
		})
		if fits {
			return gap
		}
	}
	return candidates[len(candidates)-1] // not reached: the last candidate lets every pin take a spacer
}

// between fills the gap between two members of a pin whose slabs lie at heights a and b.
func (f *fitting) between(lower, upper member, a, b float64) (filling, error) {
	distance := b + upper.bottom() - a - lower.top()
	if fl, ok := fill(distance, f.washerThickness()); ok {
		return fl, nil
	}
	return filling{}, fmt.Errorf(
		"joint %s: between %s (plane %d) and %s (plane %d) are %.2f mm, too much for washers of %g mm (play at most %g mm) and too little for a spacer of %g mm between two of them: put the two one plane nearer or further, or take other washers",
		f.pin.Joint, lower.name, lower.plane, upper.name, upper.plane, distance, f.washerThickness(), MostPlay, ShortestSpacer)
}
