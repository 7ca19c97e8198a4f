package picture

import (
	"errors"
	"fmt"
	"math"

	"pinwright/parts/outline"
)

// Scene is the built mechanism seen from the front: the highest plane is nearest. Places are in the
// linkage's coordinates, mm.
type Scene struct {
	Bodies []Body
	Joints []Spot
	Paths  []Track
	Planes []Level // from bottom to top; Level.From and To are shown, as heights
}

// Body is one part where it stands.
type Body struct {
	Name   string
	Region outline.Region    // in the part's own frame
	At     outline.Transform // from there to the linkage's coordinates
	Joints []string          // names of those that it has holes for
	Low    int               // index in Scene.Planes of the plane that it lies on
	High   int               // the same of the last plane that it reaches; equal to Low but for what stands across
}

// Spot is a joint.
type Spot struct {
	Name   string
	At     outline.Point
	Ground bool // fixed in the frame
}

// Track is the path of a joint.
type Track struct {
	Name   string
	Points []outline.Point
	Closed bool
}

// bounds is the box of everything in the scene, and what is wrong with it.
func (s Scene) bounds() (outline.Box, error) {
	if len(s.Bodies) == 0 {
		return outline.Box{}, errors.New("there is no part to draw")
	}
	box := outline.EmptyBox()
	for _, b := range s.Bodies {
		if b.Low < 0 || b.High < b.Low || b.High >= len(s.Planes) {
			return box, fmt.Errorf("%s lies on planes %d to %d of %d", b.Name, b.Low, b.High, len(s.Planes))
		}
		box = box.Union(b.Region.Transform(b.At).Bounds())
	}
	for _, t := range s.Paths {
		box = box.Union(outline.BoxOf(t.Points...))
	}
	for _, j := range s.Joints {
		box = box.Union(outline.BoxOf(j.At))
	}
	for _, v := range []float64{box.Min.X, box.Min.Y, box.Max.X, box.Max.Y} {
		if !(math.Abs(v) <= most) {
			return box, errors.New("a place is no number, or too far away")
		}
	}
	if !(box.Width() > 0 && box.Height() > 0) {
		return box, errors.New("the parts have no size")
	}
	return box, nil
}

// rim is left free round a scene, mm of paper: room for the names of joints at its edge.
const rim = 6.0

// window is where a scene is drawn.
type window struct {
	zoom
	box outline.Box // on the paper: no name leaves it
}

// windowOf puts a box of the scene in the middle of a box of the paper.
func windowOf(scene outline.Box, scale float64, paper outline.Box) window {
	m, c := paper.Centre(), scene.Centre()
	return window{zoom{scale: scale, x: m.X - scale*c.X, y: m.Y - scale*c.Y}, paper}
}

// body draws a part.
func (p *Picture) body(w window, b Body, s Shape) {
	r := b.Region.Transform(b.At)
	s.Closed, s.Title = w.outlines(r.Outlines()), b.Name
	p.Items = append(p.Items, s)
}

// tracks draws the paths.
func (p *Picture) tracks(w window, tracks []Track, width float64) {
	for _, t := range tracks {
		points := make([]outline.Point, 0, len(t.Points)+1)
		for _, q := range t.Points {
			points = append(points, w.point(q))
		}
		if t.Closed && len(points) > 0 {
			points = append(points, points[0])
		}
		if points = thinned(points, 0.02); len(points) > 1 {
			p.Items = append(p.Items, Shape{Open: []outline.Path{line(points...)}, Stroke: colour(accent), Line: width, Title: "path of " + t.Name})
		}
	}
}

// thinned leaves out points of a run that lie within tol of the line between their neighbours that are kept
// (Douglas and Peucker, 1973).
func thinned(points []outline.Point, tol float64) []outline.Point {
	if len(points) < 3 {
		return points
	}
	keep := make([]bool, len(points))
	keep[0], keep[len(points)-1] = true, true
	type run struct{ from, to int }
	for todo := []run{{0, len(points) - 1}}; len(todo) > 0; {
		r := todo[len(todo)-1]
		todo = todo[:len(todo)-1]
		s := outline.Segment{A: points[r.from], B: points[r.to]}
		far, at := tol, -1
		for i := r.from + 1; i < r.to; i++ {
			if d := s.Nearest(points[i]).Distance; d > far {
				far, at = d, i
			}
		}
		if at >= 0 {
			keep[at] = true
			todo = append(todo, run{r.from, at}, run{at, r.to})
		}
	}
	var out []outline.Point
	for i, k := range keep {
		if k {
			out = append(out, points[i])
		}
	}
	return out
}

// spots draws the joints, and their names where these cover neither a joint nor another name.
func (p *Picture) spots(w window, joints []Spot, size float64) {
	const dot = 0.9
	var taken []outline.Box
	for _, j := range joints {
		c := w.point(j.At)
		taken = append(taken, outline.BoxOf(c).Grow(dot))
		s := Shape{Closed: []outline.Outline{outline.Circle(c, dot)}, Fill: colour(white), Stroke: colour(ink), Line: 0.25, Title: j.Name}
		if j.Ground {
			s.Fill = colour(ink)
		}
		p.Items = append(p.Items, s)
	}
	for _, j := range joints {
		name := shorten(j.Name, size, w.box.Width())
		box, ok := placeName(w, w.point(j.At), outline.Point{X: boldWidth(name, size) + 0.8, Y: size + 0.4}, taken)
		if !ok || name == "" {
			continue
		}
		taken = append(taken, box)
		p.Items = append(p.Items, Shape{Closed: []outline.Outline{rectangle(box.Min.X, box.Min.Y, box.Max.X, box.Max.Y)}, Fill: colour(white)})
		p.label(box.Centre().X, box.Min.Y+0.2+0.15*size, name, size, Middle, true)
	}
}

// placeName finds a box for a name near a joint: the nearest ring and the first of sixteen directions
// in which it is within the window and free.
func placeName(w window, c, size outline.Point, taken []outline.Box) (outline.Box, bool) {
	for away := 1.6; away < 40; away *= 1.5 {
		for i := range 16 {
			d := outline.Polar(1, (0.5+float64(i))*math.Pi/8)
			m := outline.Point{X: c.X + d.X*(away+size.X/2), Y: c.Y + d.Y*(away+size.Y/2)}
			half := size.Scale(0.5)
			box := outline.Box{Min: m.Sub(half), Max: m.Add(half)}
			free := w.box.ContainsBox(box)
			for _, t := range taken {
				free = free && !t.Intersects(box)
			}
			if free {
				return box, true
			}
		}
	}
	return outline.Box{}, false
}
