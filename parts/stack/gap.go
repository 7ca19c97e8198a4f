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
// down; where there are stock lengths, with one of them and up to mostWashers washers, as few as will
// do. False when nothing fits.
func fill(distance, washer float64, stock ...float64) (filling, bool) {
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
	if len(stock) > 0 {
		if f, ok := bought(distance, washer, stock); ok {
			return f, true
		}
		return stacked(mostWashers)
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

// bought fills a distance with a spacer of a stock length and washers, at least one on each side.
func bought(distance, washer float64, stock []float64) (filling, bool) {
	for n := 2; n <= mostWashers; n++ {
		for _, l := range slices.Backward(stock) {
			if rest := distance - l - float64(n)*washer; rest >= -slack && rest <= MostPlay+slack {
				f := filling{spacer: l, play: tidy(max(0, rest))}
				if washer > 0 {
					f.washers = n
				}
				return f, true
			}
		}
		if washer <= 0 {
			break
		}
	}
	return filling{}, false
}

// crossing is a pin with parts on both sides of a gap and nothing between.
type crossing struct {
	washer float64
	more   float64   // what the pin has to fill more than the gap: parts thinner than their slab, bearings proud (negative), nuts (negative)
	stock  []float64 // lengths of spacers; nil: cut to length
}

// smallestGap gives the smallest gap, not under least, that all crossings can fill. There is always one
// where spacers are cut to length: a gap in which all of them take one. With stock lengths there may be
// none that suits all; then it is the greatest that suits one, and filling it tells what is wrong.
func smallestGap(least float64, crossings []crossing) float64 {
	candidates := []float64{least}
	for _, c := range crossings {
		for n := range mostWashers + 1 {
			candidates = append(candidates, float64(n)*c.washer-c.more)
		}
		if len(c.stock) == 0 {
			candidates = append(candidates, 2*c.washer+ShortestSpacer-c.more)
		}
		for _, l := range c.stock {
			for n := 2; n <= mostWashers; n++ {
				candidates = append(candidates, l+float64(n)*c.washer-c.more)
			}
		}
	}
	slices.Sort(candidates)
	for _, gap := range candidates {
		if gap < least-slack {
			continue
		}
		fits := !slices.ContainsFunc(crossings, func(c crossing) bool {
			_, ok := fill(gap+c.more, c.washer, c.stock...)
			return !ok
		})
		if fits {
			return gap
		}
	}
	return candidates[len(candidates)-1]
}

// between fills the gap under a member of a pin, whose slab and that of the member below lie at heights a
// and b.
func (f *fitting) between(i int, a, b float64) (filling, error) {
	lower, upper := f.members[i-1], f.members[i]
	distance := tidy(b + upper.bottom() - a - lower.top() - f.jamHeight(i))
	fl, ok := fill(distance, f.washerThickness(), f.stock...)
	if ok {
		return fl, nil
	}
	where := fmt.Sprintf("joint %s: between %s (plane %d) and %s (plane %d) are %.2f mm", f.pin.Joint, lower.name, lower.plane, upper.name, upper.plane, distance)
	if len(f.stock) > 0 {
		return fl, fmt.Errorf("%s, which no stock length of spacer fills with up to %d washers of %g mm (play at most %g mm); the nearest lengths are %s: say spacers: {from: tube}, or which lengths you can get",
			where, mostWashers, f.washerThickness(), MostPlay, nearestLengths(f.stock, distance))
	}
	return fl, fmt.Errorf(
		"%s, too much for washers of %g mm (play at most %g mm) and too little for a spacer of %g mm between two of them: put the two one plane nearer or further, or take other washers",
		where, f.washerThickness(), MostPlay, ShortestSpacer)
}

// nearestLengths names the stock lengths on both sides of a length.
func nearestLengths(stock []float64, length float64) string {
	under, over := 0.0, 0.0
	for _, l := range stock {
		if l <= length {
			under = l
		} else if over == 0 {
			over = l
		}
	}
	switch {
	case under == 0:
		return fmt.Sprintf("from %g mm up", over)
	case over == 0:
		return fmt.Sprintf("up to %g mm", under)
	}
	return fmt.Sprintf("%g and %g mm", under, over)
}
