package linkage

import "math"

// factor replaces the n by n matrix a (row by row) with its triangular factors, rows exchanged for
// size of the pivot; swap[k] is the row that row k was exchanged with. It returns the determinant,
// 0 (and an unusable a) when the matrix is singular. Nothing is allocated. Time n^3/3.
func factor(a []float64, n int, swap []int) float64 {
	det := 1.0
	for k := 0; k < n; k++ {
		p, big := k, math.Abs(a[k*n+k])
		for i := k + 1; i < n; i++ {
			if v := math.Abs(a[i*n+k]); v > big {
				p, big = i, v
			}
		}
		swap[k] = p
		if big < 1e-14 || math.IsNaN(big) {
			return 0
		}
		if p != k {
			det = -det
			rk, rp := a[k*n:k*n+n], a[p*n:p*n+n]
			for j := range rk {
				rk[j], rp[j] = rp[j], rk[j]
			}
		}
		pivot := a[k*n+k]
		det *= pivot
		for i := k + 1; i < n; i++ {
			f := a[i*n+k] / pivot
			a[i*n+k] = f
			if f == 0 {
				continue
			}
			ri, rk := a[i*n:i*n+n], a[k*n:k*n+n]
			for j := k + 1; j < n; j++ {
				ri[j] -= f * rk[j]
			}
		}
	}
	return det
}

// backSolve replaces b with the solution of a x = b, a and swap as left by factor.
func backSolve(a []float64, n int, swap []int, b []float64) {
	for k := 0; k < n; k++ {
		if p := swap[k]; p != k {
			b[k], b[p] = b[p], b[k]
		}
	}
	for i := 1; i < n; i++ {
		s := b[i]
		for j := 0; j < i; j++ {
			s -= a[i*n+j] * b[j]
		}
		b[i] = s
	}
	for i := n - 1; i >= 0; i-- {
		s := b[i]
		for j := i + 1; j < n; j++ {
			s -= a[i*n+j] * b[j]
		}
		b[i] = s / a[i*n+i]
	}
}
