package dxf_test

import (
	"encoding/json"
	"math"
	"os"
	"path/filepath"
	"testing"

	"pinwright/export"
	"pinwright/export/dxf"
	"pinwright/export/internal/sample"
	"pinwright/parts/outline"
)

// GDAL reads DXF with code of its own and turns every contour into short chords. So each of our vertices
// must be among its points, and each of its points on one of our segments.
func TestGdalAgrees(t *testing.T) {
	for _, s := range []export.Sheet{link(), sample.Sheet()} {
		t.Run(s.Name, func(t *testing.T) { gdal(t, s) })
	}
}

func gdal(t *testing.T, s export.Sheet) {
	file := filepath.Join(t.TempDir(), "sheet.dxf")
	if err := os.WriteFile(file, write(t, s, dxf.Options{}), 0o600); err != nil {
		t.Fatal(err)
	}
	out := sample.Oracle(t, "ogr2ogr", "-f", "GeoJSON", "-lco", "COORDINATE_PRECISION=15", "/vsistdout/", file)
	var seen struct {
		Features []struct {
			Properties struct{ Layer string }
			Geometry   struct {
				Type        string
				Coordinates json.RawMessage
			}
		}
	}
	if err := json.Unmarshal(out, &seen); err != nil {
		t.Fatal(err)
	}
	if len(seen.Features) != len(s.Steps) {
		t.Fatalf("GDAL sees %d features, want %d", len(seen.Features), len(s.Steps))
	}
	for i, step := range s.Steps {
		f := seen.Features[i]
		if f.Properties.Layer != dxf.LayerOf(step.Op) {
			t.Errorf("feature %d on layer %s", i, f.Properties.Layer)
		}
		var points [][]float64
		if f.Geometry.Type == "Polygon" { // some versions make areas of closed contours
			var rings [][][]float64
			if err := json.Unmarshal(f.Geometry.Coordinates, &rings); err != nil || len(rings) != 1 {
				t.Fatal(err, len(rings))
			}
			points = rings[0]
		} else if err := json.Unmarshal(f.Geometry.Coordinates, &points); err != nil {
			t.Fatal(err)
		}
		_, _, round := step.Closed.AsCircle()
		along(t, i, segments(step), points, round)
	}
}

// segment is a straight line or an arc, by its ends, and the centre and radius of an arc.
type segment struct {
	a, b, centre outline.Point
	radius       float64
}

// segments takes a step apart; the centre of an arc is by the closed form for its bulge.
func segments(s export.Step) []segment {
	vertices := []outline.Vertex(s.Open)
	if s.Op != export.Engrave {
		vertices = append(append([]outline.Vertex{}, s.Closed...), s.Closed[0])
	}
	var all []segment
	for i, v := range vertices[:len(vertices)-1] {
		a, b := v.Point, vertices[i+1].Point
		g := segment{a: a, b: b}
		if v.Bulge != 0 {
			offset := (1 - v.Bulge*v.Bulge) / (4 * v.Bulge)
			g.centre = outline.Point{X: (a.X+b.X)/2 - offset*(b.Y-a.Y), Y: (a.Y+b.Y)/2 + offset*(b.X-a.X)}
			g.radius = math.Hypot(a.X-g.centre.X, a.Y-g.centre.Y)
		}
		all = append(all, g)
	}
	return all
}

// along compares a contour with GDAL's points for it; a circle may be drawn from another start.
func along(t *testing.T, feature int, all []segment, points [][]float64, circle bool) {
	t.Helper()
	const near = 1e-9
	if !circle {
		for _, g := range all {
			found := false
			for _, p := range points {
				found = found || math.Hypot(p[0]-g.a.X, p[1]-g.a.Y) < near
			}
			if !found {
				t.Errorf("feature %d: GDAL has no point at %v", feature, g.a)
			}
		}
	}
	length := 0.0
	for i, p := range points {
		if i > 0 {
			length += math.Hypot(p[0]-points[i-1][0], p[1]-points[i-1][1])
		}
		least := math.Inf(1)
		for _, g := range all {
			d := math.Abs(math.Hypot(p[0]-g.centre.X, p[1]-g.centre.Y) - g.radius)
			if g.radius == 0 {
				over := math.Hypot(g.b.X-g.a.X, g.b.Y-g.a.Y)
				d = math.Abs((p[0]-g.a.X)*(g.b.Y-g.a.Y)-(p[1]-g.a.Y)*(g.b.X-g.a.X)) / over
			}
			least = math.Min(least, d)
		}
		if least > near {
			t.Errorf("feature %d: GDAL has a point at %v, %g from the contour", feature, p, least)
		}
	}
	if circle && math.Abs(length-2*math.Pi*all[0].radius) > 0.01*length {
		t.Errorf("feature %d: GDAL's circle is %g long", feature, length)
	}
}
