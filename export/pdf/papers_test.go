package pdf_test

import (
	"bytes"
	"fmt"
	"regexp"
	"strconv"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"pinwright/export/internal/sample"
	"pinwright/export/pdf"
	"pinwright/export/picture"
)

func papers(t interface{ Fatal(...any) }, p pdf.Papers) []byte {
	var b bytes.Buffer
	if err := pdf.WritePapers(&b, p); err != nil {
		t.Fatal(err)
	}
	return b.Bytes()
}

// workshop is what a run prints.
func workshop(t testing.TB) pdf.Papers {
	t.Helper()
	width, height := pdf.A4.Room()
	layout, err := picture.Layout(sample.Sheet(), width, height)
	if err != nil {
		t.Fatal(err)
	}
	kits, levels := sample.Kits()
	side, err := picture.SideView(kits, levels, width, height)
	if err != nil {
		t.Fatal(err)
	}
	holes := pdf.Table{Columns: []pdf.Column{{Head: "joint"}, {Head: "part"}, {Head: "pin"}, {Head: "hole, finished", Right: true}, {Head: "drawn", Right: true}, {Head: "fit"}}}
	for i := range 70 {
		holes.Rows = append(holes.Rows, []string{fmt.Sprint("J", i), "left-1.coupler", "ISO 4762 M4", "4.50", "4.32", "ISO 273 medium"})
	}
	return pdf.Papers{
		Title: "Demo: four legs on one shaft", Footer: "demo, written by Pinwright",
		Blocks: []pdf.Block{
			pdf.Text("24 parts on 2 sheets of cast acrylic 3 mm, Ø 4.5 mm holes ±0.1."),
			pdf.Cautions{"Moving linkages pinch: keep fingers away while the crank turns.", "Strength figures are estimates for models and prototypes."},
			pdf.Heading("Sheets"),
			pdf.Drawing{Picture: layout, Caption: "Sheet clear3-1, seen from above."},
			pdf.Heading("Pin kits"),
			pdf.Drawing{Picture: side, Caption: "From the lowest plane up."},
			pdf.Heading("Holes and fits"), holes,
		},
	}
}

func ExampleWritePapers() {
	var b bytes.Buffer
	err := pdf.WritePapers(&b, pdf.Papers{
		Title: "Demo", Format: pdf.Letter,
		Blocks: []pdf.Block{
			pdf.Cautions{"Never leave a laser alone while it cuts."},
			pdf.Heading("Hardware"),
			pdf.Table{
				Columns: []pdf.Column{{Head: "item"}, {Head: "buy", Right: true}},
				Rows:    [][]string{{"ISO 4762 M4 x 20", "14"}, {"ISO 7089 M4", "53"}},
			},
		},
	})
	if err != nil {
		panic(err)
	}
	fmt.Println(regexp.MustCompile(`/MediaBox \[[^]]*\]`).FindString(b.String()))
	// Output: /MediaBox [0 0 612 792]
}

func TestPapersAreSound(t *testing.T) {
	data := papers(t, workshop(t))
	if len(data) > 250_000 {
		t.Errorf("%d bytes", len(data))
	}
	name := save(t, data)
	if out := string(sample.Oracle(t, "qpdf", "--check", name)); !strings.Contains(out, "No syntax or stream encoding errors found") {
		t.Errorf("qpdf: %s", out)
	}
	info := string(sample.Oracle(t, "pdfinfo", name))
	if !strings.Contains(info, "(A4)") || !strings.Contains(info, "Demo: four legs on one shaft") || strings.Contains(info, "Date") {
		t.Errorf("pdfinfo: %s", info)
	}
	// Both fonts are embedded, cut down to a subset, and have a map to Unicode.
	fonts := string(sample.Oracle(t, "pdffonts", name))
	if got := len(regexp.MustCompile(`(?m)^PINWRT\+Go-\S+ +CID TrueType +Identity-H +yes yes yes`).FindAllString(fonts, -1)); got != 2 {
		t.Errorf("pdffonts: %s", fonts)
	}
	text := string(sample.Oracle(t, "pdftotext", "-layout", name, "-"))
	for _, want := range []string{
		"Demo: four legs on one shaft", "Ø 4.5 mm holes ±0.1.", "Moving linkages pinch: keep fingers away while the crank turns.",
		"5 left-1.link-5", "frame.left", "drawn 2 : 1", "locknut DIN 985 M4", "plane 3", "hole, finished", "Sheet clear3-1, seen from above.",
		"demo, written by Pinwright",
	} {
		if !strings.Contains(squeeze(text), want) {
			t.Errorf("%q is not in the text", want)
		}
	}
	for i := range 70 {
		if !regexp.MustCompile(fmt.Sprintf(`J%d +left-1.coupler +ISO 4762 M4 +4.50 +4.32 +ISO 273 medium`, i)).MatchString(text) {
			t.Errorf("row %d is not in the text", i)
		}
	}
	// The head of the table stands on each of its pages.
	if n := strings.Count(text, "hole, finished"); n < 2 {
		t.Errorf("the head is there %d times", n)
	}
	pages := strings.Count(text, "\f")
	if !strings.Contains(text, fmt.Sprintf("page %d of %d", pages, pages)) {
		t.Errorf("%d pages, but the last is not numbered so", pages)
	}
}

func squeeze(s string) string { return strings.Join(strings.Fields(s), " ") }

var shown = regexp.MustCompile(`/(R|B) (\S+) Tf (\S+) (\S+) Td <([0-9A-F]*)> Tj`)

// Whatever the words are, nothing is set outside the margins and no page is endless.
func TestWordsStayOnThePaper(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		words := rapid.OneOf(rapid.String(), rapid.StringMatching(`[a-zA-Z0-9 ]{0,200}`), rapid.StringMatching(`W{1,150}`), rapid.StringMatching(`(lorem ipsum\n){0,80}`))
		p := pdf.Papers{Title: words.Draw(t, "title"), Footer: words.Draw(t, "footer"), Format: rapid.SampledFrom([]pdf.Format{pdf.A4, pdf.Letter}).Draw(t, "format")}
		for range rapid.IntRange(0, 5).Draw(t, "blocks") {
			switch rapid.IntRange(0, 4).Draw(t, "kind") {
			case 0:
				p.Blocks = append(p.Blocks, pdf.Heading(words.Draw(t, "heading")))
			case 1:
				p.Blocks = append(p.Blocks, pdf.Text(words.Draw(t, "text")))
			case 2:
				p.Blocks = append(p.Blocks, pdf.Cautions{words.Draw(t, "caution")})
			case 3:
				table := pdf.Table{Columns: make([]pdf.Column, rapid.IntRange(0, 9).Draw(t, "columns"))}
				for range rapid.IntRange(0, 6).Draw(t, "rows") {
					table.Rows = append(table.Rows, rapid.SliceOfN(words, 0, 9).Draw(t, "cells"))
				}
				p.Blocks = append(p.Blocks, table)
			case 4:
				p.Blocks = append(p.Blocks, pdf.PageBreak{})
			}
		}
		data := papers(t, p)
		width, height := p.Format.Size()
		for _, m := range shown.FindAllSubmatch(data, -1) {
			x, _ := strconv.ParseFloat(string(m[3]), 64)
			y, _ := strconv.ParseFloat(string(m[4]), 64)
			size, _ := strconv.ParseFloat(string(m[2]), 64)
			if x < 17.99 || y < 8.9 || y+size > height-10 || x > width-18 {
				t.Fatalf("text at %g, %g", x, y)
			}
		}
	})
}

// No word of a paragraph or a table is lost or cut off, however narrow its column.
func TestNoWordIsLost(t *testing.T) {
	long := strings.Repeat("coupler-with-a-very-long-name-", 12)
	var rows [][]string
	for i := range 9 {
		rows = append(rows, []string{fmt.Sprint("r", i), long, strings.Repeat("many words in one cell ", 20), "4.50", strings.Repeat("tall\n", 90)})
	}
	name := save(t, papers(t, pdf.Papers{Blocks: []pdf.Block{
		pdf.Text(long),
		pdf.Table{Columns: []pdf.Column{{Head: "a"}, {Head: "b"}, {Head: "c"}, {Head: "d", Right: true}, {Head: "e"}}, Rows: rows},
	}}))
	text := string(sample.Oracle(t, "pdftotext", "-raw", name, "-"))
	if got := strings.Count(text, "tall"); got != 9*90 {
		t.Errorf("%d tall, want %d", got, 9*90)
	}
	if got := strings.Count(text, "many"); got != 9*20 {
		t.Errorf("%d many, want %d", got, 9*20)
	}
	if got := strings.Count(strings.Join(strings.Fields(text), ""), "coupler"); got < 10*10 {
		t.Errorf("%d coupler", got)
	}
}

func TestPapersErrors(t *testing.T) {
	err := pdf.WritePapers(&bytes.Buffer{}, pdf.Papers{Blocks: []pdf.Block{nil}})
	if err == nil || err.Error() != "pdf: block 1: <nil> is not a block" {
		t.Errorf("got %v", err)
	}
	err = pdf.WritePapers(&bytes.Buffer{}, pdf.Papers{Blocks: []pdf.Block{pdf.Text("x"), pdf.Drawing{}}})
	if err == nil || err.Error() != `pdf: block 2: picture "": a size of 0 x 0 mm cannot be drawn` {
		t.Errorf("got %v", err)
	}
	if err := pdf.WritePapers(failing{fmt.Errorf("full")}, pdf.Papers{}); err == nil {
		t.Error("no error")
	}
}

// A picture larger than the page is reduced, and says so.
func TestLargePicture(t *testing.T) {
	name := save(t, papers(t, pdf.Papers{Blocks: []pdf.Block{
		pdf.Drawing{Picture: picture.Picture{Width: 348, Height: 100}, Caption: "A wide one."},
	}}))
	if text := string(sample.Oracle(t, "pdftotext", name, "-")); !strings.Contains(text, "A wide one. (reduced to 50 %)") {
		t.Errorf("got %s", text)
	}
}

func BenchmarkWritePapers(b *testing.B) {
	p := workshop(b)
	var buf bytes.Buffer
	for b.Loop() {
		buf.Reset()
		if err := pdf.WritePapers(&buf, p); err != nil {
			b.Fatal(err)
		}
	}
}
