package dxf_test

import (
	"encoding/json"
	"math"
	"os"
	"os/exec"
	"path/filepath"
	"slices"
	"testing"

	"pinwright/export"
	"pinwright/export/dxf"
	"pinwright/export/internal/sample"
	"pinwright/parts/outline"
)

// auditScript opens a drawing with ezdxf, audits it, and tells what it sees as JSON. Python writes
// floats with the digits that read back to the same number.
const auditScript = `
import sys, json, logging
logging.basicConfig(level=logging.WARNING, stream=sys.stderr)
import ezdxf
doc = ezdxf.readfile(sys.argv[1])
audit = doc.audit()
seen = []
for e in doc.modelspace():
    d = {"type": e.dxftype(), "layer": e.dxf.layer, "points": [], "bulges": [], "closed": False, "radius": 0}
    if d["type"] == "LWPOLYLINE":
        d["closed"] = e.closed
        for x, y, b in e.get_points("xyb"):
            d["points"].append([x, y]); d["bulges"].append(b)
    elif d["type"] == "CIRCLE":
        d["points"].append([e.dxf.center.x, e.dxf.center.y]); d["radius"] = e.dxf.radius
    elif d["type"] == "LINE":
        d["points"] += [[e.dxf.start.x, e.dxf.start.y], [e.dxf.end.x, e.dxf.end.y]]
    seen.append(d)
print(json.dumps({
    "version": doc.dxfversion, "units": doc.header["$INSUNITS"], "metric": doc.header["$MEASUREMENT"],
    "extmin": list(doc.header["$EXTMIN"])[:2], "extmax": list(doc.header["$EXTMAX"])[:2],
    "limmax": list(doc.header["$LIMMAX"])[:2],
    "errors": [x.message for x in audit.errors], "fixes": [x.message for x in audit.fixes],
    "layers": {l.dxf.name: [l.dxf.color, l.dxf.plot, l.dxf.lineweight] for l in doc.layers},
    "blocks": [b.name for b in doc.blocks], "layouts": doc.layout_names(),
    "entities": seen}))
`

type ezEntity struct {
	Type, Layer string
	Points      [][2]float64
	Bulges      []float64
	Closed      bool
	Radius      float64
}

type ezDrawing struct {
	Version                string
	Units, Metric          int
	ExtMin, ExtMax, LimMax [2]float64
	Errors, Fixes          []string
	Layers                 map[string][3]int
	Blocks, Layouts        []string
	Entities               []ezEntity
}

// audit has ezdxf read a drawing. Anything it logs while reading is an error.
func audit(t *testing.T, data []byte) ezDrawing {
	t.Helper()
	python := ezdxf(t)
	file := filepath.Join(t.TempDir(), "sheet.dxf")
	if err := os.WriteFile(file, data, 0o600); err != nil {
		t.Fatal(err)
	}
	cmd := exec.Command(python, "-c", auditScript, file)
	var said errorText
	cmd.Stderr = &said
	out, err := cmd.Output()
	if err != nil {
		t.Fatalf("ezdxf: %v\n%s", err, said)
	}
	if len(said) > 0 {
		t.Errorf("ezdxf complains: %s", said)
	}
	var d ezDrawing
	if err := json.Unmarshal(out, &d); err != nil {
		t.Fatal(err)
	}
	return d
}

type errorText []byte

func (e *errorText) Write(p []byte) (int, error) { *e = append(*e, p...); return len(p), nil }

// The judge is ezdxf (M. Moitzi), an implementation of the DXF Reference that shares nothing with ours.
func TestEzdxfAuditIsClean(t *testing.T) {
	s := link()
	for name, opt := range map[string]dxf.Options{
		"usual": {}, "with edge and other colours": {SheetEdge: true, Engrave: 11, Inside: 12, Outside: 13, Edge: 14},
	} {
		t.Run(name, func(t *testing.T) {
			d := audit(t, write(t, s, opt))
			if len(d.Errors)+len(d.Fixes) > 0 {
				t.Errorf("errors %q, fixes %q", d.Errors, d.Fixes)
			}
			if d.Version != "AC1015" || d.Units != 4 || d.Metric != 1 {
				t.Errorf("version %s, units %d, metric %d", d.Version, d.Units, d.Metric)
			}
			min, max := [2]float64{12, 22}, [2]float64{108.1, 38}
			colours := [4]int{dxf.DefaultEngrave, dxf.DefaultInside, dxf.DefaultOutside, dxf.DefaultEdge}
			entities := 5
			if opt.SheetEdge {
				min, max = [2]float64{0, 0}, [2]float64{120, 60}
				colours = [4]int{11, 12, 13, 14}
				entities = 6
			}
			for i := range 2 {
				if math.Abs(d.ExtMin[i]-min[i]) > 1e-9 || math.Abs(d.ExtMax[i]-max[i]) > 1e-9 {
					t.Errorf("extents %v to %v, want %v to %v", d.ExtMin, d.ExtMax, min, max)
				}
			}
			if d.LimMax != [2]float64{120, 60} {
				t.Errorf("limits to %v", d.LimMax)
			}
			for i, layer := range []string{dxf.LayerEngrave, dxf.LayerInside, dxf.LayerOutside, dxf.LayerEdge} {
				got, ok := d.Layers[layer]
				plot := 1
				if layer == dxf.LayerEdge {
					plot = 0
				}
				if !ok || got[0] != colours[i] || got[1] != plot {
					t.Errorf("layer %s: %v, want colour %d, plot %d", layer, got, colours[i], plot)
				}
			}
			if len(d.Layouts) != 2 || len(d.Blocks) != 2 {
				t.Errorf("layouts %q, blocks %q", d.Layouts, d.Blocks)
			}
			if len(d.Entities) != entities {
				t.Fatalf("%d entities", len(d.Entities))
			}
			agree(t, s.Steps, d.Entities[entities-5:])
		})
	}
}

// agree compares what ezdxf sees with what was meant, to the last bit.
func agree(t *testing.T, steps []export.Step, seen []ezEntity) {
	t.Helper()
	for i, step := range steps {
		e := seen[i]
		if e.Layer != dxf.LayerOf(step.Op) {
			t.Errorf("entity %d on layer %s", i, e.Layer)
		}
		vertices, closed := []outline.Vertex(step.Open), false
		if step.Op != export.Engrave {
			vertices, closed = step.Closed, true
		}
		if centre, radius, ok := step.Closed.AsCircle(); ok {
			if e.Type != "CIRCLE" || e.Points[0] != [2]float64{centre.X, centre.Y} || e.Radius != radius {
				t.Errorf("entity %d: %+v, want %v, %v", i, e, centre, radius)
			}
			continue
		}
		if e.Closed != closed || len(e.Points) != len(vertices) {
			t.Errorf("entity %d: %+v, want %v", i, e, vertices)
			continue
		}
		for j, v := range vertices {
			if e.Points[j] != [2]float64{v.X, v.Y} || (e.Type == "LWPOLYLINE" && (closed || j+1 < len(vertices)) && e.Bulges[j] != v.Bulge) {
				t.Errorf("entity %d vertex %d: %v, want %v", i, j, e.Points[j], v)
			}
		}
	}
}

// Everything that a sheet can have, many times over: every coordinate as ezdxf reads it is the one meant.
func TestEzdxfReadsEveryCoordinate(t *testing.T) {
	s := sample.Sheet()
	d := audit(t, write(t, s, dxf.Options{}))
	if len(d.Errors)+len(d.Fixes) > 0 || len(d.Entities) != len(s.Steps) {
		t.Fatalf("errors %q, fixes %q, %d entities of %d", d.Errors, d.Fixes, len(d.Entities), len(s.Steps))
	}
	agree(t, s.Steps, d.Entities)
}

// resaveScript opens a drawing and saves it again as another version.
const resaveScript = `
import sys, ezdxf
doc = ezdxf.readfile(sys.argv[1])
doc.dxfversion = sys.argv[3]
doc.saveas(sys.argv[2])
`

// A drawing that somebody opened and saved again in another program, and another version, reads the
// same: layers, order and every coordinate.
func TestReadWhatAnotherProgramSaved(t *testing.T) {
	python := ezdxf(t)
	data := write(t, link(), dxf.Options{SheetEdge: true})
	want := read(t, data)
	dir := t.TempDir()
	ours := filepath.Join(dir, "ours.dxf")
	if err := os.WriteFile(ours, data, 0o600); err != nil {
		t.Fatal(err)
	}
	for version, code := range map[string]string{"R2000": "AC1015", "R2007": "AC1021", "R2018": "AC1032"} {
		theirs := filepath.Join(dir, version+".dxf")
		if out, err := exec.Command(python, "-c", resaveScript, ours, theirs, version).CombinedOutput(); err != nil {
			t.Fatalf("%v\n%s", err, out)
		}
		saved, err := os.ReadFile(theirs)
		if err != nil {
			t.Fatal(err)
		}
		got := read(t, saved)
		if got.Version != code || got.Units != dxf.Millimetre || len(got.Others) > 0 || len(got.Entities) != len(want.Entities) {
			t.Fatalf("%s: version %s, units %v, %d entities, others %+v", version, got.Version, got.Units, len(got.Entities), got.Others)
		}
		for i, w := range want.Entities {
			g := got.Entities[i]
			if g.Layer != w.Layer || g.Type != w.Type || !slices.Equal(g.Closed, w.Closed) || !slices.Equal(g.Open, w.Open) {
				t.Errorf("%s: entity %d is %+v, want %+v", version, i, g, w)
			}
		}
	}
}
