package pdf_test

import (
	"strings"
	"testing"

	"pinwright/export/internal/sample"
	"pinwright/export/pdf"
	"pinwright/export/picture"
	"pinwright/parts/outline"
)

// A heading, the text below it and the picture that they are about stand on one page, even when the picture is
// as high as Below allows.
func TestHeadingStaysWithPicture(t *testing.T) {
	for _, format := range []pdf.Format{pdf.A4, pdf.Letter} {
		for lines, text := range []string{"", "One line of text.", "One line of text.\nAnother line."} {
			for _, fill := range []int{0, 5, 20, 60} {
				width, height := format.Below(lines)
				blocks := []pdf.Block{}
				for range fill {
					blocks = append(blocks, pdf.Text("filler"))
				}
				blocks = append(blocks, pdf.Heading("The heading"))
				if lines > 0 {
					blocks = append(blocks, pdf.Text(text))
				}
				blocks = append(blocks, pdf.Drawing{Caption: "The caption.", Picture: picture.Picture{Width: width, Height: height, Items: []picture.Item{
					picture.Label{At: outline.Point{X: 5, Y: 5}, Text: "In the picture", Size: 3},
				}}})
				name := save(t, papers(t, pdf.Papers{Format: format, Blocks: blocks}))
				pages := strings.Split(string(sample.Oracle(t, "pdftotext", "-layout", name, "-")), "\f")
				at := -1
				for i, page := range pages {
					if strings.Contains(page, "The heading") {
						at = i
					}
				}
				if at < 0 {
					t.Fatal("the heading is gone")
				}
				for _, want := range append(strings.Split(text, "\n"), "In the picture", "The caption.") {
					if !strings.Contains(pages[at], want) {
						t.Errorf("format %d, %d lines, %d fillers: %q is not on the page of the heading", format, lines, fill, want)
					}
				}
				if strings.Contains(pages[at], "reduced") {
					t.Errorf("format %d, %d lines, %d fillers: the picture is reduced", format, lines, fill)
				}
			}
		}
	}
}
