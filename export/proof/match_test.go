package proof

import (
	"reflect"
	"testing"
)

// The assignment gives way where it must: König's theorem promises a complete one in each case here
// but the last, where two pieces want one place.
func TestAssign(t *testing.T) {
	for name, c := range map[string]struct {
		choices  [][]int
		expected int
		want     []int
	}{
		"nothing":              {nil, 2, []int{-1, -1}},
		"first choices":        {[][]int{{1, 0}, {0, 1}}, 2, []int{1, 0}},
		"one gives way":        {[][]int{{0, 1}, {0}}, 2, []int{1, 0}},
		"a chain gives way":    {[][]int{{0, 1}, {1, 2}, {2, 3}, {0}}, 4, []int{3, 0, 1, 2}},
		"two want the same":    {[][]int{{0}, {0}}, 2, []int{0, -1}},
		"a piece of no kind":   {[][]int{{}, {0}}, 1, []int{1}},
		"more places than fit": {[][]int{{2}}, 3, []int{-1, -1, 0}},
	} {
		if got := assign(c.choices, c.expected); !reflect.DeepEqual(got, c.want) {
			t.Errorf("%s: %v, want %v", name, got, c.want)
		}
	}
}

func TestFigure(t *testing.T) {
	for v, want := range map[float64]string{
		0: "0", 3: "3", 0.001: "0.001", 3.0004e-7: "0.0000003", 12.34567: "12.35", 123456: "123456", -0.2: "-0.2", 1e-9: "0.000000001",
	} {
		if got := figure(v); got != want {
			t.Errorf("%g is written %s, want %s", v, got, want)
		}
	}
}
