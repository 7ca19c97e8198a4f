package picture

// spread moves ascending values as little as it can (in squares) so that neighbours are pitch apart,
// within low and high if they all fit there: the values less their share of pitches are made
// ascending by pooling (isotonic regression), then shifted back.
func spread(values []float64, pitch, low, high float64) []float64 {
	type pool struct {
		sum float64
		n   int
	}
	var pools []pool
	for i, v := range values {
		pools = append(pools, pool{v - float64(i)*pitch, 1})
		for len(pools) > 1 {
			a, b := pools[len(pools)-2], pools[len(pools)-1]
			if a.sum/float64(a.n) <= b.sum/float64(b.n) {
				break
			}
			pools = append(pools[:len(pools)-2], pool{a.sum + b.sum, a.n + b.n})
		}
	}
	out := make([]float64, 0, len(values))
	last := high - float64(len(values)-1)*pitch
	for _, q := range pools {
		for range q.n {
			out = append(out, max(low, min(last, q.sum/float64(q.n)))+float64(len(out))*pitch)
		}
	}
	return out
}
