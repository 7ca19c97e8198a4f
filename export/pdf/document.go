package pdf

import (
	"bytes"
	"crypto/sha256"
	"fmt"
	"io"
	"strconv"
	"strings"
	"unicode/utf16"
)

// ref is the number of an object in the file.
type ref int

func (r ref) String() string { return strconv.Itoa(int(r)) + " 0 R" }

// document is a PDF file being put together: numbered objects, written in the order of their
// numbers, with a table of where each begins (ISO 32000-1, 7.5). Streams are not compressed, so that
// the bytes do not depend on a compressor and a maker can read what is drawn.
type document struct {
	objects [][]byte
	pages   []ref
	tree    ref // the page tree, known beforehand because every page names it
}

func newDocument() *document {
	d := &document{}
	d.tree = d.reserve()
	return d
}

// reserve gives out a number for an object that is filled in later.
func (d *document) reserve() ref {
	d.objects = append(d.objects, nil)
	return ref(len(d.objects))
}

func (d *document) fill(r ref, body string) { d.objects[r-1] = []byte(body) }

func (d *document) add(body string) ref {
	r := d.reserve()
	d.fill(r, body)
	return r
}

// stream adds a stream; entries are those of its dictionary besides the length.
func (d *document) stream(entries string, data []byte) ref {
	r := d.reserve()
	var b bytes.Buffer
	fmt.Fprintf(&b, "<< /Length %d%s >>\nstream\n", len(data), space(entries))
	b.Write(data)
	b.WriteString("\nendstream")
	d.objects[r-1] = b.Bytes()
	return r
}

func space(s string) string {
	if s == "" {
		return ""
	}
	return " " + s
}

// page adds a page of a size in millimetres; resources is a dictionary.
func (d *document) page(width, height float64, content []byte, resources string) {
	c := d.stream("", content)
	d.pages = append(d.pages, d.add(fmt.Sprintf("<< /Type /Page /Parent %v /MediaBox [0 0 %s %s] /Contents %v /Resources %s >>",
		d.tree, num(width*points, 6), num(height*points, 6), c, resources)))
}

// points is the number of PDF units in a millimetre.
const points = 72 / 25.4

// write ends the document and writes it. The catalogue's entries come with it.
func (d *document) write(w io.Writer, title, catalog string) error {
	var kids strings.Builder
	for _, p := range d.pages {
		kids.WriteString(p.String() + " ")
	}
	d.fill(d.tree, fmt.Sprintf("<< /Type /Pages /Kids [%s] /Count %d >>", strings.TrimSpace(kids.String()), len(d.pages)))
	// No scaling: what a print dialogue offers as "fit" would spoil every length.
	root := d.add(fmt.Sprintf("<< /Type /Catalog /Pages %v /ViewerPreferences << /PrintScaling /None /DisplayDocTitle true >>%s >>",
		d.tree, space(catalog)))
	info := d.add(fmt.Sprintf("<< /Title %s /Creator (Pinwright) >>", text(title)))

	var b bytes.Buffer
	b.WriteString("%PDF-1.7\n%\xe2\xe3\xcf\xd3\n")
	offsets := make([]int, len(d.objects))
	for i, o := range d.objects {
		offsets[i] = b.Len()
		fmt.Fprintf(&b, "%d 0 obj\n%s\nendobj\n", i+1, o)
	}
	// The identifier that the format asks for is a digest of the content, not of the moment.
	id := sha256.Sum256(b.Bytes())
	table := b.Len()
	fmt.Fprintf(&b, "xref\n0 %d\n0000000000 65535 f \n", len(offsets)+1)
	for _, at := range offsets {
		fmt.Fprintf(&b, "%010d 00000 n \n", at)
	}
	fmt.Fprintf(&b, "trailer\n<< /Size %d /Root %v /Info %v /ID [<%x> <%x>] >>\nstartxref\n%d\n%%%%EOF\n",
		len(offsets)+1, root, info, id[:16], id[:16], table)
	_, err := w.Write(b.Bytes())
	return err
}

// num writes a number with at most so many decimals, in the plain notation that PDF asks for.
func num(v float64, decimals int) string {
	s := strconv.FormatFloat(v, 'f', decimals, 64)
	if strings.Contains(s, ".") {
		s = strings.TrimRight(strings.TrimRight(s, "0"), ".")
	}
	if s == "-0" {
		return "0"
	}
	return s
}

// text writes a text string: UTF-16 with its mark, in hexadecimal, so that any title is safe.
func text(s string) string {
	var b strings.Builder
	b.WriteString("<FEFF")
	for _, u := range utf16.Encode([]rune(s)) {
		fmt.Fprintf(&b, "%04X", u)
	}
	b.WriteString(">")
	return b.String()
}
