package outline

import (
	"math"
	"math/rand/v2"
	"testing"

	"github.com/peterstace/simplefeatures/geom"
)

// Comparison with a general-purpose polygon library (github.com/peterstace/simplefeatures, pure Go) on fine
// polygons. Every polygon strays by at most the chord error, so areas agree to the chord error times the length
// of all outlines involved.

const referenceChord = 1e-3

// toReference flattens regions into a multipolygon.
func toReference(t *testing.T, rs []Region) geom.Geometry {
	t.Helper()
	var polygons []geom.Polygon
	for _, r := range rs {
		var rings []geom.LineString
		for _, o := range r.Outlines() {
			var xy []float64
			pts := Flatten(o, referenceChord, Inscribed)
			for _, p := range append(pts, pts[0]) {
				xy = append(xy, p.X, p.Y)
			}
			rings = append(rings, geom.NewLineString(geom.NewSequence(xy, geom.DimXY)))
		}
		polygons = append(polygons, geom.NewPolygon(rings))
	}
	g := geom.NewMultiPolygon(polygons).AsGeometry()
	return g
}

func lengthOf(rs []Region) float64 {
	l := 0.0
	for _, r := range rs {
		l += r.Length()
	}
	return l
}

// euler is the number of regions less the number of holes.
func euler(rs []Region) int {
	n := 0
	for _, r := range rs {
		n += 1 - len(r.Holes)
	}
	return n
}

func eulerOf(g geom.Geometry) int {
	n := 0
	for _, part := range g.Dump() {
		if p, ok := part.AsPolygon(); ok {
			n += 1 - p.NumInteriorRings()
		}
	}
	return n
}

func TestBooleansAgainstPolygonLibrary(t *testing.T) {
	topology := 0
	for seed := range uint64(60) {
		r := rand.New(rand.NewPCG(seed, 99))
		a, b := randomShape(t, r, general), randomShape(t, r, general)
		ga, gb := toReference(t, a), toReference(t, b)
		slack := referenceChord * (lengthOf(a) + lengthOf(b))
		for _, c := range []struct {
			name string
			ours []Region
			ref  func(a, b geom.Geometry) (geom.Geometry, error)
		}{
			{"union", Union(append(append([]Region(nil), a...), b...)...), geom.Union},
			{"intersection", Intersection(a, b), geom.Intersection},
			{"difference", Difference(a, b), geom.Difference},
		} {
			want, err := c.ref(ga, gb)
			if err != nil {
				t.Logf("seed %d: the library refuses: %v", seed, err)
				continue
			}
			near(t, c.name, Area(c.ours), want.Area(), slack)
			// Where nothing is narrower than the chord error, the number of pieces and holes agrees too.
			if robust(c.ours) {
				topology++
				if got, ref := euler(c.ours), eulerOf(want); got != ref {
					t.Errorf("seed %d: %s has Euler characteristic %d, the library says %d", seed, c.name, got, ref)
				}
			}
		}
	}
	if topology < 60 {
		t.Errorf("topology compared only %d times", topology)
	}
}

// robust says whether the regions stay the same pieces when their edges move by some chord errors.
func robust(rs []Region) bool {
	const d = 10 * referenceChord
	in, out := Offset(rs, -d), Offset(rs, d)
	return len(in) == len(rs) && len(out) == len(rs) && euler(in) == euler(rs) && euler(out) == euler(rs)
}

// TestOffsetAgainstPolygonLibrary unites the flattened shape with a fine capsule for every chord of its outline: all
// points within d, made by another program from nothing but unions of convex polygons.
func TestOffsetAgainstPolygonLibrary(t *testing.T) {
	for seed := range uint64(12) {
		r := rand.New(rand.NewPCG(seed, 101))
		a := randomShape(t, r, general)
		d := 0.2 + r.Float64()
		const chord = 5e-3
		var pieces []geom.Geometry
		for _, reg := range a {
			for _, o := range reg.Outlines() {
				pts := Flatten(o, chord, Inscribed)
				for i, p := range pts {
					q := pts[(i+1)%len(pts)]
					var xy []float64
					ring := Flatten(Capsule(p, q, d), chord, Inscribed)
					for _, v := range append(ring, ring[0]) {
						xy = append(xy, v.X, v.Y)
					}
					pieces = append(pieces, geom.NewPolygon([]geom.LineString{geom.NewLineString(geom.NewSequence(xy, geom.DimXY))}).AsGeometry())
				}
			}
		}
		band, err := geom.UnionMany(pieces)
		if err != nil {
			t.Logf("seed %d: the library refuses: %v", seed, err)
			continue
		}
		shape := toReference(t, a)
		grown, err := geom.Union(shape, band)
		if err != nil {
			t.Logf("seed %d: the library refuses: %v", seed, err)
			continue
		}
		shrunk, err := geom.Difference(shape, band)
		if err != nil {
			t.Logf("seed %d: the library refuses: %v", seed, err)
			continue
		}
		out, in := Offset(a, d), Offset(a, -d)
		near(t, "grown", Area(out), grown.Area(), 2*chord*lengthOf(out)+1e-6)
		near(t, "shrunk", Area(in), shrunk.Area(), 2*chord*math.Max(lengthOf(in), lengthOf(a)))
	}
}
