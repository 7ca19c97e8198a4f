package picture

import (
	"fmt"
	"slices"

	"pinwright/parts/outline"
)

// Measures of the planes, mm of paper.
const (
	planeText  = 2.4
	planeTitle = 2.8
	planeTop   = 6.0
	planeGap   = 4.0
	planeLeast = 30.0 // a drawing is not made smaller than this for the sake of fewer pictures
)

// Planes draws which part lies where: for each plane with a part on it, from the lowest, a small drawing of
// its parts in their tints of FrontView, with the names of the joints that they have holes for and the
// outlines of all other parts in grey. All are at one scale, the largest at which they fill width x height mm
// of paper and no larger than 1:1; where that would make them too small they go on several pictures.
func Planes(s Scene, width, height float64) ([]Picture, error) {
	box, err := s.bounds()
	if err != nil {
		return nil, fmt.Errorf("planes: %w", err)
	}
	if !(width > 60 && height > 60 && width <= most && height <= most) {
		return nil, fmt.Errorf("planes: %g x %g mm of paper are too little", width, height)
	}
	cells := s.cells()
	var g planeGrid
	for each := len(cells); each > 0; each-- {
		if g = gridOf(s, cells, each, box, outline.Point{X: width, Y: height}); g.scale*max(box.Width(), box.Height()) >= planeLeast || g.scale >= 1 {
			break
		}
	}
	if len(cells) > 0 && g.columns == 0 {
		return nil, fmt.Errorf("planes: %g x %g mm of paper are too little for the parts of one plane and their names", width, height)
	}
	var out []Picture
	for page := range slices.Chunk(cells, max(1, g.each)) {
		out = append(out, s.drawPlanes(page, g, box, width))
	}
	return out, nil
}

// planeGrid is how the drawings are set: so many on a picture, in columns.
type planeGrid struct {
	each, columns int
	scale         float64
	cell          outline.Point // size of a drawing
	foot          float64       // below it: its title and its parts
}

// gridOf finds the columns with which so many drawings on a picture are largest; none when they do not fit.
func gridOf(s Scene, cells []planeCell, each int, box outline.Box, paper outline.Point) planeGrid {
	best := planeGrid{each: each}
	for n := 1; n <= min(4, each); n++ {
		rows := (each + n - 1) / n
		w := (paper.X - float64(n-1)*planeGap) / float64(n)
		foot := 0.0
		for _, c := range cells {
			foot = max(foot, 1.7*planeTitle+s.legend(c, w).height)
		}
		h := (paper.Y-planeTop)/float64(rows) - planeGap - foot
		if at := min(1, (w-2*rim)/box.Width(), (h-2*rim)/box.Height()); at > best.scale {
			best.columns, best.scale, best.foot = n, at, foot
			best.cell = outline.Point{X: w, Y: at*box.Height() + 2*rim}
		}
	}
	return best
}

// legend names the parts of a plane.
func (s Scene) legend(c planeCell, width float64) legend {
	var entries []entry
	for _, b := range c.bodies {
		entries = append(entries, entry{tint(b), s.Bodies[b].Name})
	}
	return entriesOf(entries, width, planeText)
}

// drawPlanes draws some planes in one picture.
func (s Scene) drawPlanes(cells []planeCell, g planeGrid, box outline.Box, width float64) Picture {
	rows := (len(cells) + g.columns - 1) / g.columns
	pitch := g.cell.Y + g.foot + planeGap
	p := Picture{
		Title: "The planes, from the lowest", Width: width, Height: planeTop + float64(rows)*pitch,
		Text: fmt.Sprintf("%d planes and the parts on each.", len(cells)),
	}
	p.label(width-sideEdge, p.Height-3.4, ratio(g.scale), planeText, End, false)
	for i, c := range cells {
		x := float64(i%g.columns) * (g.cell.X + planeGap)
		y := p.Height - planeTop - float64(i/g.columns)*pitch - g.cell.Y
		w := windowOf(box, g.scale, outline.Box{Min: outline.Point{X: x, Y: y}, Max: outline.Point{X: x + g.cell.X, Y: y + g.cell.Y}})
		p.Items = append(p.Items, Shape{Closed: []outline.Outline{w.box.Outline()}, Fill: colour(pale)})
		p.cell(w, s, c)
		level := s.Planes[c.plane]
		heading := fmt.Sprintf("%s: %s to %s mm", level.Name, figure(level.From), figure(level.To))
		p.label(x, y-1.3*planeTitle, shorten(heading, planeTitle, g.cell.X/1.2), planeTitle, Start, true)
		p.entries(s.legend(c, g.cell.X), x, y-1.7*planeTitle)
	}
	return p
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
