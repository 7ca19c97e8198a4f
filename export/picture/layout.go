package picture

import (
	"fmt"
	"math"
	"strconv"

	"pinwright/export"
	"pinwright/parts/outline"
)

// Layout draws how the parts lie on a sheet, as large as fits into width x height mm of paper: the
// sheet, its parts in tints with their marks, a number on each, and below it which part each number
// is. Parts are numbered in the order in which they are worked.
//
// All outside cuts of one part name are one part with one number; what lies inside them by the
// even-odd rule is material.
func Layout(s export.Sheet, width, height float64) (Picture, error) {
	if err := s.Check(); err != nil {
		return Picture{}, err
	}
	if !(width > 30 && height > 30 && width <= most && height <= most) {
		return Picture{}, fmt.Errorf("layout of %s: %g x %g mm of paper are too little", s.Name, width, height)
	}
	const (
		title  = 3.4
		text   = 2.6
		around = 0.3
		band   = 7.0 // title and figures above the sheet
	)
	parts := piecesOf(s)
	legend := legendOf(parts, width, text)
	rows := height - band - float64(legend.rows+1)*text*1.5 - 2*around - 2
	if rows < height/3 {
		return Picture{}, fmt.Errorf("layout of %s: %g mm of paper are too low for %d parts and their names", s.Name, height, len(parts))
	}
	scale := min((width-2*around)/s.Width, rows/s.Height)
	drawn := outline.Point{X: s.Width * scale, Y: s.Height * scale}
	foot := float64(legend.rows+1)*text*1.5 + 2
	p := Picture{
		Title: "Layout of " + s.Name, Width: width, Height: foot + drawn.Y + 2*around + band,
		Text: fmt.Sprintf("%d parts on a sheet of %s x %s mm.", len(parts), figure(s.Width), figure(s.Height)),
	}
	heading := s.Title
	if heading == "" {
		heading = s.Name
	}
	top := p.Height - title
	p.label(0, top, heading, title, Start, true)
	p.label(width, top, fmt.Sprintf("%s x %s mm, %s", figure(s.Width), figure(s.Height), ratio(scale)), text, End, false)

	at := zoom{scale: scale, x: around, y: foot + around}
	p.Items = append(p.Items, Shape{
		Closed: []outline.Outline{rectangle(at.x, at.y, at.x+drawn.X, at.y+drawn.Y)},
		Fill:   colour(pale), Stroke: colour(grey), Line: 0.25, Title: "sheet " + s.Name,
	})
	for i, part := range parts {
		p.Items = append(p.Items, Shape{
			Closed: at.outlines(append(append([]outline.Outline(nil), part.outside...), part.inside...)),
			Fill:   colour(tint(i)), Title: part.name,
		})
		for _, drawing := range []struct {
			op     export.Operation
			closed []outline.Outline
			open   []outline.Path
		}{{export.Engrave, nil, part.marks}, {export.CutInside, part.inside, nil}, {export.CutOutside, part.outside, nil}} {
			if len(drawing.closed)+len(drawing.open) == 0 {
				continue
			}
			p.Items = append(p.Items, Shape{
				Closed: at.outlines(drawing.closed), Open: at.paths(drawing.open),
				Stroke: colour(drawing.op.Look().Colour), Line: 0.15, Dash: dashOf(drawing.op),
			})
		}
	}
	// Numbers last, so that no part lies over the number of another.
	for i, part := range parts {
		number := strconv.Itoa(i + 1)
		for _, o := range part.outside {
			centre, clear := roomiest(o, part)
			size := min(3.2, max(1.2, 1.5*clear*scale/math.Sqrt(float64(len(number)))))
			c := at.point(centre)
			p.label(c.X, c.Y-0.36*size, number, size, Middle, true)
		}
	}
	p.operations(width, foot-text*1.5, text)
	for i, part := range parts {
		x := float64(i/legend.rows) * legend.column
		y := foot - text*1.5*float64(i%legend.rows+2)
		p.label(x, y, fmt.Sprintf("%d %s", i+1, part.name), text, Start, false)
	}
	return p, nil
}

// operations explains the lines.
func (p *Picture) operations(width, y, size float64) {
	words := [...]string{export.Engrave: "engraved", export.CutInside: "inside cut", export.CutOutside: "outside cut"}
	x := 0.0
	for _, op := range export.Operations() {
		p.Items = append(p.Items, Shape{
			Open:   []outline.Path{line(outline.Point{X: x, Y: y + size*0.3}, outline.Point{X: x + 8, Y: y + size*0.3})},
			Stroke: colour(op.Look().Colour), Line: 0.4, Dash: dashOf(op),
		})
		p.label(x+9.5, y, words[op], size, Start, false)
		x += 9.5 + roughWidth(words[op], size) + 6
	}
}

// dashOf tells inside cuts from outside cuts without colour. Engraved strokes are told by being open,
// and letters in dashes could not be read.
func dashOf(op export.Operation) []float64 {
	if op != export.CutInside {
		return nil
	}
	return []float64{0.9, 0.4}
}

func (p *Picture) label(x, y float64, text string, size float64, anchor Anchor, bold bool) {
	if text == "" {
		return
	}
	p.Items = append(p.Items, Label{At: outline.Point{X: x, Y: y}, Text: text, Size: size, Anchor: anchor, Bold: bold, Colour: ink})
}

// piece is what the sheet says of one part.
type piece struct {
	name            string
	outside, inside []outline.Outline
	marks           []outline.Path
}

func piecesOf(s export.Sheet) []piece {
	var parts []piece
	index := map[string]int{}
	for _, step := range s.Steps {
		i, known := index[step.Part]
		if !known {
			i = len(parts)
			index[step.Part] = i
			parts = append(parts, piece{name: step.Part})
		}
		switch step.Op {
		case export.Engrave:
			parts[i].marks = append(parts[i].marks, step.Open)
		case export.CutInside:
			parts[i].inside = append(parts[i].inside, step.Closed)
		case export.CutOutside:
			parts[i].outside = append(parts[i].outside, step.Closed)
		}
	}
	return parts
}

// names is how the legend is set: so many rows, filled column by column.
type names struct {
	rows   int
	column float64
}

func legendOf(parts []piece, width, size float64) names {
	longest := 0.0
	for i, part := range parts {
		longest = max(longest, roughWidth(fmt.Sprintf("%d %s", i+1, part.name), size))
	}
	columns := max(1, min(len(parts), int(width/(longest+4))))
	rows := max(1, (len(parts)+columns-1)/columns)
	return names{rows: rows, column: width / float64(columns)}
}

// roomiest returns a point of the material within o that is far from every cut and mark of the part, and how
// far: the best of a grid, refined twice round the best.
func roomiest(o outline.Outline, part piece) (outline.Point, float64) {
	box := o.Bounds()
	best, clear := box.Centre(), math.Inf(-1)
	try := func(q outline.Point) {
		if d := clearance(q, o, part); d > clear+1e-6 { // so that a tie is not decided by rounding
			best, clear = q, d
		}
	}
	const n = 12
	try(best)
	for i := range n {
		for j := range n {
			try(outline.Point{
				X: box.Min.X + box.Width()*(float64(i)+0.5)/n,
				Y: box.Min.Y + box.Height()*(float64(j)+0.5)/n,
			})
		}
	}
	step := outline.Point{X: box.Width() / n, Y: box.Height() / n}
	for range 3 {
		middle := best
		for i := -2; i <= 2; i++ {
			for j := -2; j <= 2; j++ {
				try(outline.Point{X: middle.X + step.X*float64(i)/4, Y: middle.Y + step.Y*float64(j)/4})
			}
		}
		step = step.Scale(0.25)
	}
	return best, max(0, clear)
}

// clearance is the distance to the nearest cut or mark, negative outside o or in a hole.
func clearance(q outline.Point, o outline.Outline, part piece) float64 {
	if o.Locate(q) != outline.Inside {
		return -o.Nearest(q).Distance
	}
	d := o.Nearest(q).Distance
	for _, h := range part.inside {
		away := h.Nearest(q).Distance
		if h.Locate(q) == outline.Inside {
			return -away
		}
		d = min(d, away)
	}
	for _, m := range part.marks {
		for _, s := range m.Segments() {
			d = min(d, s.Nearest(q).Distance)
		}
	}
	return d
}

// zoom is where on the paper the sheet is drawn.
type zoom struct{ scale, x, y float64 }

func (z zoom) point(p outline.Point) outline.Point {
	return outline.Point{X: z.x + z.scale*p.X, Y: z.y + z.scale*p.Y}
}

func (z zoom) outlines(os []outline.Outline) []outline.Outline {
	out := make([]outline.Outline, len(os))
	for i, o := range os {
		out[i] = make(outline.Outline, len(o))
		for k, v := range o {
			out[i][k] = outline.Vertex{Point: z.point(v.Point), Bulge: v.Bulge}
		}
	}
	return out
}

func (z zoom) paths(ps []outline.Path) []outline.Path {
	out := make([]outline.Path, len(ps))
	for i, p := range ps {
		out[i] = make(outline.Path, len(p))
		for k, v := range p {
			out[i][k] = outline.Vertex{Point: z.point(v.Point), Bulge: v.Bulge}
		}
	}
	return out
}

// figure writes a length for the eye: at most two decimals.
func figure(v float64) string {
	return strconv.FormatFloat(math.Round(v*100)/100, 'f', -1, 64)
}

// ratio says how a scale is spoken of: "drawn 1 : 3.4", "drawn 2 : 1".
func ratio(scale float64) string {
	if scale >= 1 {
		return "drawn " + figure(scale) + " : 1"
	}
	return "drawn 1 : " + figure(1/scale)
}
