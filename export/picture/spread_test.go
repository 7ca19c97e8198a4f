package picture

import (
	"math"
	"sort"
	"testing"

	"pgregory.net/rapid"
)

func TestSpread(t *testing.T) {
	// Closed form: two at the same place move half a pitch each; what has room stays.
	got := spread([]float64{10, 10, 30}, 3, 0, 100)
	for i, want := range []float64{8.5, 11.5, 30} {
		if math.Abs(got[i]-want) > 1e-12 {
			t.Fatalf("got %v", got)
		}
	}
	rapid.Check(t, func(t *rapid.T) {
		values := rapid.SliceOfN(rapid.Float64Range(0, 50), 1, 12).Draw(t, "values")
		sort.Float64s(values)
		got := spread(values, 3, 0, 60)
		for i := range got {
			if i > 0 && got[i]-got[i-1] < 3-1e-9 {
				t.Fatalf("%v", got)
			}
			if got[i] < -1e-9 || got[i] > 60+1e-9 {
				t.Fatalf("%v", got)
			}
		}
	})
}
