package picture

import (
	"fmt"
	"slices"

	"pinwright/parts/outline"
)

// Planes draws which part lies where: for each plane with a part on it, from the lowest, a small drawing of
// its parts in their tints of FrontView, with the names of the joints on them and the outlines of all
// other parts in grey. All are at one scale, the largest at which they fill width x height mm of
// paper and no larger than 1:1.
func Planes(s Scene, width, height float64) (Picture, error) {
	box, err := s.bounds()
	if err != nil {
		return Picture{}, fmt.Errorf("planes: %w", err)
	}
	if !(width > 60 && height > 60 && width <= most && height <= most) {
		return Picture{}, fmt.Errorf("planes: %g x %g mm of paper are too little", width, height)
	}
	cells := s.cells()
	const (
		text  = 2.4
		title = 2.8
		top   = 6.0
		gap   = 4.0
	)
	tallest := 0
	for _, c := range cells {
		tallest = max(tallest, len(c.bodies))
	}
	foot := float64(tallest)*1.5*text + 1.7*title // below a drawing: its title and its parts
	columns, scale := 0, 0.0
	for n := 1; n <= 4; n++ {
		rows := (len(cells) + n - 1) / n
		w, h := (width-float64(n-1)*gap)/float64(n), (height-top)/float64(rows)-gap-foot
		if at := min(1, (w-2*rim)/box.Width(), (h-2*rim)/box.Height()); at > scale {
			columns, scale = n, at
		}
	}
	if columns == 0 {
		return Picture{}, fmt.Errorf("planes: %g x %g mm of paper are too little for %d planes", width, height, len(cells))
	}
	rows := (len(cells) + columns - 1) / columns
	cell := outline.Point{X: (width - float64(columns-1)*gap) / float64(columns), Y: scale*box.Height() + 2*rim}
	p := Picture{
		Title: "The planes, from the lowest", Width: width, Height: top + float64(rows)*(cell.Y+foot+gap),
		Text: fmt.Sprintf("%d planes and the parts on each.", len(cells)),
	}
	p.label(width-sideEdge, p.Height-3.4, ratio(scale), text, End, false)
	for i, c := range cells {
		x := float64(i%columns) * (cell.X + gap)
		y := p.Height - top - float64(i/columns)*(cell.Y+foot+gap) - cell.Y
		w := windowOf(box, scale, outline.Box{Min: outline.Point{X: x, Y: y}, Max: outline.Point{X: x + cell.X, Y: y + cell.Y}})
		p.Items = append(p.Items, Shape{Closed: []outline.Outline{rectangle(x, y, x+cell.X, y+cell.Y)}, Fill: colour(pale)})
		p.cell(w, s, c)
		level := s.Planes[c.plane]
		heading := fmt.Sprintf("%s: %s to %s mm", level.Name, figure(level.From), figure(level.To))
		p.label(x, y-1.3*title, shorten(heading, title, cell.X/1.2), title, Start, true)
		var entries []entry
		for _, b := range c.bodies {
			entries = append(entries, entry{tint(b), s.Bodies[b].Name})
		}
		l := entriesOf(entries, 0, text)
		l.column = cell.X
		p.entries(l, x, y-1.7*title)
	}
	return p, nil
}

// planeCell is a plane and the bodies on it, as indices.
type planeCell struct {
	plane  int
	bodies []int
}

// cells are the planes on which something lies.
func (s Scene) cells() []planeCell {
	var out []planeCell
	for plane := range s.Planes {
		c := planeCell{plane: plane}
		lies := false
		for i, b := range s.Bodies {
			if b.Low <= plane && plane <= b.High {
				c.bodies = append(c.bodies, i)
				lies = lies || b.Low == b.High
			}
		}
		if lies {
			out = append(out, c)
		}
	}
	return out
}

// cell draws one plane.
func (p *Picture) cell(w window, s Scene, c planeCell) {
	on := make([]bool, len(s.Bodies))
	for _, i := range c.bodies {
		on[i] = true
	}
	for i, b := range s.Bodies {
		if !on[i] {
			b.Region.Holes = nil
			p.body(w, b, Shape{Stroke: colour(faint), Line: 0.12})
		}
	}
	for _, i := range c.bodies {
		p.body(w, s.Bodies[i], Shape{Fill: colour(tint(i)), Stroke: colour(ink), Line: 0.2})
	}
	var joints []Spot
	for _, j := range s.Joints {
		for _, i := range c.bodies {
			if slices.Contains(s.Bodies[i].Joints, j.Name) {
				joints = append(joints, j)
				break
			}
		}
	}
	p.spots(w, joints, 2.4)
}
