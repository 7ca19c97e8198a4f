package main

import (
	"fmt"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"
)

// auditScript has ezdxf (M. Moitzi) open and audit drawings. It prints a line for each.
const auditScript = `
import sys, logging
logging.basicConfig(level=logging.WARNING, stream=sys.stderr)
import ezdxf
for name in sys.argv[1:]:
    doc = ezdxf.readfile(name)
    audit = doc.audit()
    print(doc.header["$INSUNITS"], len(audit.errors) + len(audit.fixes), len(doc.modelspace()))
`

// What the demo writes is sound in the eyes of programs that share nothing with ours: ezdxf for the drawings,
// qpdf and poppler for the PDF, librsvg for the SVG.
func TestDemoAsOthersSeeIt(t *testing.T) {
	dir := filepath.Join(t.TempDir(), "out")
	fine(t, "cut", jobs+"demo.yaml", "-o", dir, "-q", "--part-files")
	sheets := []struct {
		name          string
		width, height float64 // mm, as the job has them
	}{{"sheet-clear3-1", 300, 200}, {"sheet-birch4-1", 400, 250}}

	t.Run("ezdxf", func(t *testing.T) {
		python := "python3"
		if exec.Command(python, "-c", "import ezdxf").Run() != nil {
			python = "/usr/bin/python3"
		}
		if exec.Command(python, "-c", "import ezdxf").Run() != nil {
			if os.Getenv("PINWRIGHT_ORACLES") == "require" {
				t.Fatal("ezdxf is not installed, and PINWRIGHT_ORACLES=require")
			}
			t.Skip("ezdxf is not installed: this check is left out")
		}
		names := []string{filepath.Join(dir, sheets[0].name+".dxf"), filepath.Join(dir, sheets[1].name+".dxf")}
		parts, err := filepath.Glob(filepath.Join(dir, "parts", "*.dxf"))
		if err != nil {
			t.Fatal(err)
		}
		names = append(names, parts...)
		cmd := exec.Command(python, append([]string{"-c", auditScript}, names...)...)
		var said strings.Builder
		cmd.Stderr = &said
		out, err := cmd.Output()
		if err != nil || said.Len() > 0 {
			t.Fatalf("ezdxf: %v\n%s", err, said.String())
		}
		lines := strings.Split(strings.TrimSpace(string(out)), "\n")
		if len(lines) != len(names) {
			t.Fatalf("%d drawings audited of %d", len(lines), len(names))
		}
		for i, l := range lines {
			var units, faults, entities int
			if _, err := fmt.Sscan(l, &units, &faults, &entities); err != nil || units != 4 || faults != 0 || entities == 0 {
				t.Errorf("%s: units, faults, entities: %s (%v)", filepath.Base(names[i]), l, err)
			}
		}
	})
	for _, s := range sheets {
		file := filepath.Join(dir, s.name)
		t.Run("pdf of "+s.name, func(t *testing.T) {
			if out := asked(t, "qpdf", "--check", file+".pdf"); !strings.Contains(out, "No syntax or stream encoding errors found") {
				t.Errorf("qpdf: %s", out)
			}
			var width, height float64
			for _, l := range strings.Split(asked(t, "pdfinfo", file+".pdf"), "\n") {
				if rest, ok := strings.CutPrefix(l, "Page size:"); ok {
					if _, err := fmt.Sscanf(strings.TrimSpace(rest), "%f x %f pts", &width, &height); err != nil {
						t.Fatalf("%q: %v", l, err)
					}
				}
			}
			const point = 25.4 / 72
			if !near(width*point, s.width) || !near(height*point, s.height) {
				t.Errorf("the page is %.3f x %.3f mm, the sheet %g x %g", width*point, height*point, s.width, s.height)
			}
		})
		t.Run("svg of "+s.name, func(t *testing.T) {
			for _, svg := range []string{file + ".svg", filepath.Join(dir, "pictures", s.name+".svg")} {
				if png := asked(t, "rsvg-convert", svg); !strings.HasPrefix(png, "\x89PNG") || len(png) < 2000 {
					t.Errorf("%s: %d bytes of picture", filepath.Base(svg), len(png))
				}
			}
		})
	}
	t.Run("papers", func(t *testing.T) {
		if out := asked(t, "qpdf", "--check", filepath.Join(dir, "papers.pdf")); !strings.Contains(out, "No syntax or stream encoding errors found") {
			t.Errorf("qpdf: %s", out)
		}
	})
}

// near tells whether two lengths are the same to 0.05 mm.
func near(a, b float64) bool { return a-b < 0.05 && b-a < 0.05 }
