package linkage

import (
	"math"
	"math/rand/v2"

	"gonum.org/v1/gonum/mat"
)

// rankTolerance is the ratio of singular values below which a row or column counts as dependent.
// Generic positions give ratios above 1e-5 for linkages of sensible size and below 1e-15 for
// dependent ones; the tolerance stands well between.
const rankTolerance = 1e-9

// gruebler counts mobility from the numbers of links and joints alone: 3 (links - 1) - 2 (pins), the
// ground counted as a link and a joint of k links as k-1 pins (Gruebler, Chebyshev, Kutzbach).
// A link that needs special lengths to move (a parallelogram's third bar) makes it too small.
func gruebler(l Linkage) int {
	uses := map[string]int{}
	for _, k := range l.Links {
		for _, p := range k.Pins {
			uses[p]++
		}
	}
	m := 3 * len(l.Links)
	for _, j := range l.Joints {
		if j.Ground != nil {
			m -= 2 * uses[j.Name]
		} else {
			m -= 2 * (uses[j.Name] - 1)
		}
	}
	return m
}

// bar is one distance that a link keeps; a link of n pins is 2n-3 bars.
type bar struct{ link, i, j int }

// bars lists the bars of the links that are not left out. Every pin after the second is tied to the
// first two, which fixes the shape in general position.
func bars(pins [][]int, out map[int]bool) []bar {
	var bs []bar
	for k, p := range pins {
		if out[k] {
			continue
		}
		bs = append(bs, bar{k, p[0], p[1]})
		for _, q := range p[2:] {
			bs = append(bs, bar{k, p[0], q}, bar{k, p[1], q})
		}
	}
	return bs
}

// freedom is what the rank of the rigidity matrix says, the drive held.
type freedom struct {
	free    []int // joints that can still move, ascending
	stress  []int // links that hold one another twice, ascending
	freely  int   // number of freedoms left
	surplus int   // number of bars too many
}

// genericFreedom finds what the pattern of links and pins alone allows, before any length is looked
// at: the rank of the bars' Jacobian at places drawn from a fixed random sequence, which with
// probability one is the rank at almost every place (Asimow and Roth, The rigidity of graphs, 1978).
// The joints in held (ground, and the pins of the drive link) do not move.
func genericFreedom(joints int, pins [][]int, held []bool, out map[int]bool) freedom {
	rng := rand.New(rand.NewPCG(11, 7))
	at := make([]Point, joints)
	for i := range at {
		at[i] = Point{X: rng.Float64(), Y: rng.Float64()}
	}
	col := make([]int, joints)
	cols := 0
	for i := range col {
		col[i] = -1
		if !held[i] {
			col[i] = cols
			cols += 2
		}
	}
	bs := bars(pins, out)
	if cols == 0 || len(bs) == 0 {
		f := freedom{freely: cols, surplus: len(bs)}
		for _, b := range bs {
			f.stress = appendNew(f.stress, b.link)
		}
		for i, h := range held {
			if !h {
				f.free = append(f.free, i)
			}
		}
		return f
	}
	a := mat.NewDense(len(bs), cols, nil)
	for r, b := range bs {
		d := sub(at[b.i], at[b.j])
		n := norm(d)
		for _, e := range [2]struct {
			joint int
			sign  float64
		}{{b.i, 1}, {b.j, -1}} {
			if c := col[e.joint]; c >= 0 {
				a.Set(r, c, e.sign*d.X/n)
				a.Set(r, c+1, e.sign*d.Y/n)
			}
		}
	}
	f, u, v := nullSpaces(a)
	for i, c := range col {
		if c < 0 {
			continue
		}
		for k := range v {
			if math.Hypot(v[k][c], v[k][c+1]) > 1e-6 {
				f.free = append(f.free, i)
				break
			}
		}
	}
	for r, b := range bs {
		for k := range u {
			if math.Abs(u[k][r]) > 1e-6 {
				f.stress = appendNew(f.stress, b.link)
				break
			}
		}
	}
	return f
}

// nullSpaces returns the vectors that the matrix sends to nothing from the left (u, one entry a row)
// and from the right (v, one entry a column).
func nullSpaces(a *mat.Dense) (f freedom, u, v [][]float64) {
	rows, cols := a.Dims()
	var svd mat.SVD
	if !svd.Factorize(a, mat.SVDFull) {
		return f, nil, nil
	}
	s := svd.Values(nil)
	rank := 0
	for _, x := range s {
		if x > rankTolerance*math.Max(s[0], 1e-300) {
			rank++
		}
	}
	var um, vm mat.Dense
	svd.UTo(&um)
	svd.VTo(&vm)
	for k := rank; k < rows; k++ {
		u = append(u, mat.Col(nil, k, &um))
	}
	for k := rank; k < cols; k++ {
		v = append(v, mat.Col(nil, k, &vm))
	}
	f.freely, f.surplus = cols-rank, rows-rank
	return f, u, v
}

func appendNew(list []int, x int) []int {
	for _, y := range list {
		if y == x {
			return list
		}
	}
	return append(list, x)
}
