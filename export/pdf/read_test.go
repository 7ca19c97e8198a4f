package pdf_test

import (
	"bytes"
	"fmt"
	"math"
	"regexp"
	"strconv"
	"strings"

	"pinwright/parts/outline"
)

// page is what the tests read from a file: its size and what is drawn, in PDF units.
type page struct {
	width, height float64
	paths         []path
}

// path is one painted path, in units, y up.
type path struct {
	layer  string
	colour string
	dash   string
	width  float64 // of the line, units
	pieces []cubic
}

// cubic is a Bezier curve; a line has its handles a third of the way.
type cubic [4]outline.Point

func (c cubic) at(t float64) outline.Point {
	u := 1 - t
	w := [4]float64{u * u * u, 3 * u * u * t, 3 * u * t * t, t * t * t}
	var p outline.Point
	for i := range c {
		p = p.Add(c[i].Scale(w[i]))
	}
	return p
}

var (
	mediaBox = regexp.MustCompile(`/MediaBox\s*\[\s*(\S+)\s+(\S+)\s+(\S+)\s+(\S+?)\s*\]`)
	streams  = regexp.MustCompile(`(?s)stream\n(.*?)\n?endstream`)
)

// readPages reads the pages of a file whose streams are not compressed: ours, or any after qpdf --qdf.
// It knows the operators that a drawing of lines needs (ISO 32000-1, table 51 and 59) and takes
// anything else for an error.
func readPages(data []byte) ([]page, error) {
	boxes := mediaBox.FindAllSubmatch(data, -1)
	var contents [][]byte
	for _, s := range streams.FindAllSubmatch(data, -1) {
		if bytes.Contains(s[1], []byte(" cm\n")) {
			contents = append(contents, s[1])
		}
	}
	if len(boxes) != len(contents) {
		return nil, fmt.Errorf("%d pages, %d contents", len(boxes), len(contents))
	}
	var pages []page
	for i, c := range contents {
		var v [4]float64
		for k := range v {
			f, err := strconv.ParseFloat(string(boxes[i][k+1]), 64)
			if err != nil {
				return nil, err
			}
			v[k] = f
		}
		if v[0] != 0 || v[1] != 0 {
			return nil, fmt.Errorf("the page begins at %g, %g", v[0], v[1])
		}
		p := page{width: v[2], height: v[3]}
		if err := p.read(string(c)); err != nil {
			return nil, err
		}
		pages = append(pages, p)
	}
	return pages, nil
}

func (p *page) read(content string) error {
	matrix := [6]float64{1, 0, 0, 1, 0, 0}
	var args []string
	var now path
	var start, at outline.Point
	num := func(i int) float64 {
		v, err := strconv.ParseFloat(args[i], 64)
		if err != nil {
			return math.NaN()
		}
		return v
	}
	point := func(i int) outline.Point {
		x, y := num(i), num(i+1)
		return outline.Point{X: matrix[0]*x + matrix[2]*y + matrix[4], Y: matrix[1]*x + matrix[3]*y + matrix[5]}
	}
	lineTo := func(q outline.Point) {
		now.pieces = append(now.pieces, cubic{at, at.Lerp(q, 1.0/3), at.Lerp(q, 2.0/3), q})
		at = q
	}
	need := map[string]int{"cm": 6, "w": 1, "J": 1, "j": 1, "RG": 3, "BDC": 2, "m": 2, "l": 2, "c": 6}
	for _, token := range strings.Fields(content) {
		if n, operator := need[token]; operator && len(args) != n {
			return fmt.Errorf("%s with %q", token, args)
		}
		switch token {
		case "q", "Q", "J", "j":
		case "cm":
			for i := range matrix {
				matrix[i] = num(i)
			}
		case "w":
			now.width = num(0) * matrix[0]
		case "RG":
			now.colour = strings.Join(args, " ")
		case "d":
			now.dash = strings.Join(args, " ")
		case "BDC":
			now.layer = args[0] + args[1]
		case "EMC":
			now.layer = ""
		case "m":
			start, at = point(0), point(0)
		case "l":
			lineTo(point(0))
		case "c":
			now.pieces = append(now.pieces, cubic{at, point(0), point(2), point(4)})
			at = point(4)
		case "h":
			if at != start {
				lineTo(start)
			}
		case "S":
			p.paths = append(p.paths, now)
			now.pieces = nil
		default:
			if !strings.ContainsAny(token[:1], "/[]-.0123456789") {
				return fmt.Errorf("unknown operator %q", token)
			}
			args = append(args, token)
			continue
		}
		args = nil
	}
	return nil
}
