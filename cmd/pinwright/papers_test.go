package main

import (
	"bytes"
	"context"
	"fmt"
	"math"
	"os"
	"os/exec"
	"path/filepath"
	"regexp"
	"strconv"
	"strings"
	"testing"

	"pinwright/export/pdf"
)

// asked runs an outside program on a file. Where the program is missing the test is skipped, or fails if
// PINWRIGHT_ORACLES=require says that it must be there.
func asked(t *testing.T, program string, args ...string) string {
	t.Helper()
	path, err := exec.LookPath(program)
	if err != nil {
		if os.Getenv("PINWRIGHT_ORACLES") == "require" {
			t.Fatalf("%s is not installed, and PINWRIGHT_ORACLES=require", program)
		}
		t.Skipf("%s is not installed: this check is left out", program)
	}
	out, err := exec.Command(path, args...).CombinedOutput()
	if err != nil {
		t.Fatalf("%s: %v\n%s", program, err, out)
	}
	return string(out)
}

// printed writes the papers of a job into a file.
func printed(t *testing.T, p plan, format pdf.Format) string {
	t.Helper()
	f, err := p.papers(format)
	if err != nil {
		t.Fatal(err)
	}
	again, err := p.papers(format)
	if err != nil || !bytes.Equal(f.Data, again.Data) {
		t.Errorf("the papers differ the second time (%v)", err)
	}
	name := filepath.Join(t.TempDir(), "papers.pdf")
	if err := os.WriteFile(name, f.Data, 0o644); err != nil {
		t.Fatal(err)
	}
	return name
}

// ready is a job worked out up to its sheets.
func ready(t *testing.T, name string) plan {
	t.Helper()
	p := planned(t, name)
	if err := p.arrange(context.Background(), 1, func(done, all int) {}); err != nil {
		t.Fatal(err)
	}
	return p
}

var wordBox = regexp.MustCompile(`<word xMin="([\d.-]+)" yMin="([\d.-]+)" xMax="([\d.-]+)" yMax="([\d.-]+)">(.*?)</word>`)

// On no page of the papers of any job, on either format, does a word leave the margins or lie over
// another: as poppler finds them.
func TestPapersOfJobs(t *testing.T) {
	const margin = 17.9 * 72 / 25.4
	for _, name := range []string{"demo.yaml", "jansen.yaml", "klann.yaml", "chebyshev.yaml", "watt-table.yaml", "fourbar-cycle.yaml"} {
		p := ready(t, name)
		for _, format := range []pdf.Format{pdf.A4, pdf.Letter} {
			file := printed(t, p, format)
			if out := asked(t, "qpdf", "--check", file); !strings.Contains(out, "No syntax or stream encoding errors found") {
				t.Errorf("%s: qpdf: %s", name, out)
			}
			if fonts := asked(t, "pdffonts", file); strings.Contains(fonts, " no ") || strings.Count(fonts, "PINWRT+") != 2 {
				t.Errorf("%s: pdffonts: %s", name, fonts)
			}
			width, height := format.Size()
			width, height = width*72/25.4, height*72/25.4
			for page, text := range strings.Split(asked(t, "pdftotext", "-bbox", file, "-"), "<page ")[1:] {
				type word struct {
					x0, y0, x1, y1 float64
					text           string
				}
				var words []word
				for _, m := range wordBox.FindAllStringSubmatch(text, -1) {
					var w word
					for i, v := range []*float64{&w.x0, &w.y0, &w.x1, &w.y1} {
						*v, _ = strconv.ParseFloat(m[i+1], 64)
					}
					w.text = m[5]
					if w.x0 < margin || w.x1 > width-margin || w.y0 < 0 || w.y1 > height {
						t.Errorf("%s, page %d: %q from %.1f to %.1f pt leaves the margins", name, page+1, w.text, w.x0, w.x1)
					}
					// The boxes are as high as the font's tallest letters: what is written is within the middle of them.
					inset := 0.12 * (w.y1 - w.y0)
					w.y0, w.y1 = w.y0+inset, w.y1-inset
					for _, v := range words {
						if math.Min(w.x1, v.x1)-math.Max(w.x0, v.x0) > 0.05 && math.Min(w.y1, v.y1)-math.Max(w.y0, v.y0) > 0.05 {
							t.Errorf("%s, page %d: %q lies over %q", name, page+1, w.text, v.text)
						}
					}
					words = append(words, w)
				}
				if len(words) < 8 {
					t.Errorf("%s: page %d has only %d words", name, page+1, len(words))
				}
			}
		}
	}
}

// The papers say what goes together, in words that can be searched.
func TestPapersOfTheDemo(t *testing.T) {
	p := ready(t, "demo.yaml")
	text := strings.Join(strings.Fields(asked(t, "pdftotext", "-layout", printed(t, p, pdf.A4), "-")), " ")
	for _, want := range []string{
		"What lies where", "What each pin carries", "Putting it together", "ISO 7089 4, 0.8 mm", "left-1.coupler, plane 3",
		"LEFT-1 COUPLER", "plane 2: ", "drawn 1 : 1", "left-2, right-1 (mirrored), right-2 (mirrored)",
	} {
		if !strings.Contains(text, want) {
			t.Errorf("%q is not in the papers", want)
		}
	}
	for _, k := range p.firstKits() {
		if want := fmt.Sprintf("%s: %s", k.Joint, k.Through.Designation); !strings.Contains(text, want) {
			t.Errorf("no side view is said to show %q", want)
		}
	}
}

// BenchmarkPapers is what printing the demo takes.
func BenchmarkPapers(b *testing.B) {
	j, _, err := readJob(filepath.Join("..", "..", "testdata", "jobs", "demo.yaml"))
	if err != nil {
		b.Fatal(err)
	}
	p, err := buildable(j)
	if err != nil {
		b.Fatal(err)
	}
	p.sum = strings.Repeat("0", 64)
	if err := p.arrange(context.Background(), 1, func(done, all int) {}); err != nil {
		b.Fatal(err)
	}
	for b.Loop() {
		if _, err := p.papers(pdf.A4); err != nil {
			b.Fatal(err)
		}
	}
}
