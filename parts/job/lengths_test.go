package job

import (
	"math"
	"math/rand/v2"
	"slices"
	"testing"
)

func TestMissingPairs(t *testing.T) {
	give := func(pairs ...string) (out []stated) {
		for _, p := range pairs {
			out = append(out, stated{a: p[:1], b: p[1:]})
		}
		return out
	}
	for _, c := range []struct {
		pins  []string
		given []stated
		want  []string
	}{
		{[]string{"A", "B"}, nil, []string{"A-B"}},
		{[]string{"A", "B"}, give("BA"), nil},
		{[]string{"A", "B", "C"}, nil, []string{"A-B", "B-C", "A-C"}},
		{[]string{"A", "B", "C"}, give("AB", "AC"), []string{"B-C"}},
		{[]string{"A", "B", "C", "D"}, give("AB", "BC", "CD", "DA"), []string{"A-C"}},
		// Two rigid triangles on one pin each: six lengths, but two bodies that turn on B.
		{[]string{"A", "B", "C", "D", "E"}, give("AB", "BC", "CA", "BD", "DE", "EB"), []string{"C-D"}},
		// Four pins with all six pairs, a fifth on one length: seven lengths, still loose.
		{[]string{"A", "B", "C", "D", "E"}, give("AB", "AC", "AD", "BC", "BD", "CD", "DE"), []string{"C-E"}},
		// K(3,3), rigid in general position without any triangle.
		{[]string{"A", "B", "C", "D", "E", "F"}, give("AD", "AE", "AF", "BD", "BE", "BF", "CD", "CE", "CF"), nil},
	} {
		if got := missingPairs(c.pins, c.given); !slices.Equal(got, c.want) {
			t.Errorf("pins %v with %v: missing %v, want %v", c.pins, c.given, got, c.want)
		}
	}
}

// The pebble game against the rank of the rigidity matrix at random places: what is missing is as
// many lengths as the rank lacks, and with them the rank is full.
func TestMissingPairsAgainstRank(t *testing.T) {
	random := rand.New(rand.NewPCG(1, 2))
	for range 400 {
		n := 2 + random.IntN(7)
		pins := make([]string, n)
		places := make([][2]float64, n)
		for i := range pins {
			pins[i] = string(rune('A' + i))
			places[i] = [2]float64{random.Float64(), random.Float64()}
		}
		row := func(a, b int) []float64 {
			r := make([]float64, 2*n)
			dx, dy := places[a][0]-places[b][0], places[a][1]-places[b][1]
			r[2*a], r[2*a+1], r[2*b], r[2*b+1] = dx, dy, -dx, -dy
			return r
		}
		var given []stated
		var matrix [][]float64
		for a := range n {
			for b := range a {
				if random.Float64() < 0.5 {
					given = append(given, stated{a: pins[a], b: pins[b]})
					matrix = append(matrix, row(a, b))
				}
			}
		}
		missing := missingPairs(pins, given)
		if got, want := len(missing), 2*n-3-rank(matrix); got != want {
			t.Fatalf("%d pins with %v: %d missing, by the rank %d", n, given, got, want)
		}
		for _, m := range missing {
			matrix = append(matrix, row(int(m[0]-'A'), int(m[2]-'A')))
		}
		if got := rank(matrix); got != 2*n-3 {
			t.Fatalf("%d pins with %v and %v: rank %d", n, given, missing, got)
		}
	}
}

// rank by elimination with full pivoting.
func rank(matrix [][]float64) int {
	m := make([][]float64, len(matrix))
	for i := range m {
		m[i] = slices.Clone(matrix[i])
	}
	r := 0
	for r < len(m) {
		pi, pj := r, 0
		for i := r; i < len(m); i++ {
			for j := range m[i] {
				if math.Abs(m[i][j]) > math.Abs(m[pi][pj]) {
					pi, pj = i, j
				}
			}
		}
		if math.Abs(m[pi][pj]) < 1e-9 {
			break
		}
		m[r], m[pi] = m[pi], m[r]
		for i := r + 1; i < len(m); i++ {
			f := m[i][pj] / m[r][pj]
			for j := range m[i] {
				m[i][j] -= f * m[r][j]
			}
		}
		r++
	}
	return r
}

func TestHeight(t *testing.T) {
	for _, c := range []struct{ a, b, c, want float64 }{
		{3, 4, 5, 2.4}, // the right triangle on its hypotenuse
		{50, 50, 100, 0},
		{100, 50, 50, 0},
		{1, 1, 3, 0}, // no triangle
		{1, 1, math.Sqrt2, math.Sqrt2 / 2},
	} {
		if got := height(c.a, c.b, c.c); math.Abs(got-c.want) > 1e-12 {
			t.Errorf("height(%v, %v, %v) = %v, want %v", c.a, c.b, c.c, got, c.want)
		}
	}
}
