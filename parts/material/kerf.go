package material

import "math"

// kerf is what lasers usually take away at a thickness, full width, mm.
type kerf struct{ thickness, low, typical, high float64 }

// Published shop guidance and student measurements (1.6, 3, 6 mm: 2+ places; 10 mm: 1 place); 2, 5 and
// 8 mm common practice, no source.
var acrylicKerfs = []kerf{
	{2, 0.12, 0.18, 0.22},
	{3, 0.15, 0.18, 0.23},
	{5, 0.16, 0.2, 0.25},
	{6, 0.18, 0.22, 0.3},
	{8, 0.2, 0.25, 0.35},
	{10, 0.25, 0.3, 0.45},
}

// Published shop guidance and student measurements (3 and 6 mm: 2+ places; 4 mm: 1 place).
var plywoodKerfs = []kerf{{3, 0.17, 0.2, 0.23}, {4, 0.17, 0.2, 0.25}, {6, 0.2, 0.25, 0.3}}

// Published shop guidance and student measurements, 2+ places.
var mdfKerfs = []kerf{{3, 0.15, 0.17, 0.2}, {6, 0.2, 0.21, 0.25}}

// Published shop guidance and student measurements of fibre lasers, 2+ places; the split by thickness is
// common practice, no source.
var steelKerfs = []kerf{{1, 0.08, 0.12, 0.2}, {2, 0.1, 0.15, 0.25}, {3, 0.1, 0.2, 0.3}}

// Kerf gives what lasers usually take away at a thickness, full width, mm: the lowest and highest
// published value and the usual one, interpolated. ok is false where nothing is published. It is there
// to doubt a slip of the pen; the kerf of a job is measured, never looked up.
func (m Material) Kerf(thickness float64) (low, typical, high float64, ok bool) {
	k := m.kerfs
	if len(k) == 0 || math.IsNaN(thickness) {
		return 0, 0, 0, false
	}
	if thickness <= k[0].thickness {
		return k[0].low, k[0].typical, k[0].high, true
	}
	for i := 1; i < len(k); i++ {
		if a, b := k[i-1], k[i]; thickness <= b.thickness {
			f := (thickness - a.thickness) / (b.thickness - a.thickness)
			mix := func(x, y float64) float64 { return x + f*(y-x) }
			return mix(a.low, b.low), mix(a.typical, b.typical), mix(a.high, b.high), true
		}
	}
	last := k[len(k)-1]
	return last.low, last.typical, last.high, true
}
