package tube

import (
	"math"

	"gonum.org/v1/gonum/mat"
	"gonum.org/v1/gonum/optimize/convex/lp"
)

// mostPriced is how many fillings the linear program takes.
const mostPriced = 250

// priced is the bound of the linear relaxation (Gilmore and Gomory, Oper. Res. 9, 1961): prices of the
// pieces at which no filling of a tube is worth more than a tube, and all pieces together the most.
// The prices come from the dual simplex in floating point; they are then rounded to whole numbers and
// held against every filling, so that the bound holds whatever the rounding. 0 when there are too many
// fillings, or the simplex gives up.
func (s *search) priced() int {
	all := s.everyFilling()
	n := len(s.sizes)
	if n == 0 || all == nil {
		return 0
	}
	m := len(all)
	a := mat.NewDense(m, n+m, nil)
	c, b, basis := make([]float64, n+m), make([]float64, m), make([]int, m)
	for i, f := range all {
		for k, count := range f {
			a.Set(i, k, float64(count))
		}
		a.Set(i, n+i, 1)
		b[i], basis[i] = 1, n+i
	}
	for k := range n {
		c[k] = -float64(s.left[k])
	}
	_, y, err := lp.Simplex(c, a, b, 1e-10, basis)
	if err != nil {
		return 0
	}
	const fine = 1_000_000_000
	price := make([]int, n)
	worth := 0
	for k := range n {
		price[k] = int(math.Round(max(0, min(1, y[k])) * fine))
		worth += price[k] * s.left[k]
	}
	dearest := 1
	for _, f := range all {
		sum := 0
		for k, count := range f {
			sum += count * price[k]
		}
		dearest = max(dearest, sum)
	}
	// Rounded prices may make a tube a little too dear, so that a whole bound falls just short of
	// itself: that costs a proof and never makes a wrong one.
	return ceil(worth, dearest)
}

// everyFilling lists the fillings that leave no room for a further piece, whatever of them is left; nil
// when there are too many.
func (s *search) everyFilling() []filling {
	var out []filling
	f := make(filling, len(s.sizes))
	var add func(k, room int) bool
	add = func(k, room int) bool {
		if k == len(s.sizes) {
			for i, size := range s.sizes {
				if f[i] < s.left[i] && size <= room {
					return true
				}
			}
			out = append(out, append(filling{}, f...))
			return len(out) <= mostPriced
		}
		for n := min(s.left[k], room/s.sizes[k]); n >= 0; n-- {
			f[k] = n
			if !add(k+1, room-n*s.sizes[k]) {
				return false
			}
		}
		f[k] = 0
		return true
	}
	if !add(0, s.capacity) {
		return nil
	}
	return out
}
