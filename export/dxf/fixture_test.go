package dxf_test

import (
	"bytes"
	"os"
	"os/exec"
	"testing"

	"pinwright/export"
	"pinwright/export/dxf"
	"pinwright/parts/outline"
)

func at(x, y, bulge float64) outline.Vertex {
	return outline.Vertex{Point: outline.Point{X: x, Y: y}, Bulge: bulge}
}

func hole(x, y, r float64) outline.Outline {
	return outline.Outline{at(x-r, y, -1), at(x+r, y, -1)}
}

// link is a sheet with one bar of two holes and an engraved mark: the usual entities, one of each.
func link() export.Sheet {
	return export.Sheet{
		Name: "demo", Title: "a link", Width: 120, Height: 60,
		Steps: []export.Step{
			{Op: export.Engrave, Part: "link", Open: outline.Path{at(40, 28, 0), at(40, 32, 0)}},
			{Op: export.Engrave, Part: "link", Open: outline.Path{at(44, 28, 0), at(46, 30, 1), at(46, 32, 0), at(44, 32, 0)}},
			{Op: export.CutInside, Part: "link", Closed: hole(20, 30, 2.15)},
			{Op: export.CutInside, Part: "link", Closed: hole(100.1, 30, 2.15)},
			{Op: export.CutOutside, Part: "link", Closed: outline.Outline{
				at(20, 22, 0), at(100.1, 22, 1), at(100.1, 38, 0), at(20, 38, 1),
			}},
		},
	}
}

func write(t testing.TB, s export.Sheet, opt dxf.Options) []byte {
	t.Helper()
	var buf bytes.Buffer
	if err := dxf.Write(&buf, s, opt); err != nil {
		t.Fatal(err)
	}
	return buf.Bytes()
}

// absent skips a test whose outside program is not there, or fails it when the checks are to be
// complete.
func absent(t *testing.T, what string) {
	t.Helper()
	if os.Getenv("PINWRIGHT_ORACLES") == "require" {
		t.Fatalf("%s is not installed, and PINWRIGHT_ORACLES=require is set", what)
	}
	t.Skipf("%s is not installed; this check is left out", what)
}

// ezdxf returns a Python that has ezdxf. The system's own is tried as well: its packages are not seen
// by a Python installed beside it.
func ezdxf(t *testing.T) string {
	t.Helper()
	for _, python := range []string{"python3", "/usr/bin/python3"} {
		if exec.Command(python, "-c", "import ezdxf").Run() == nil {
			return python
		}
	}
	absent(t, "ezdxf (python3-ezdxf)")
	return ""
}
