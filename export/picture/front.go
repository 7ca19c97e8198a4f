package picture

import (
	"fmt"
	"slices"

	"pinwright/parts/outline"
)

// FrontView draws the whole mechanism from the front, as large as fits into width x height mm of
// paper: parts in the order of their planes, upper ones over lower ones, each in a tint of its own; the
// paths; the joints with their names, those of the frame filled. Below it stands which tint is which
// part and on which plane, the uppermost first.
func FrontView(s Scene, width, height float64) (Picture, error) {
	box, err := s.bounds()
	if err != nil {
		return Picture{}, fmt.Errorf("front view: %w", err)
	}
	if !(width > 60 && height > 60 && width <= most && height <= most) {
		return Picture{}, fmt.Errorf("front view: %g x %g mm of paper are too little", width, height)
	}
	const text = 2.6
	order := upwards(s.Bodies)
	var rows []entry
	for _, i := range slices.Backward(order) {
		b := s.Bodies[i]
		rows = append(rows, entry{tint(i), b.Name + ", " + s.where(b)})
	}
	legend := entriesOf(rows, width, text)
	top := 6.0
	free := height - top - legend.height - 2
	if free < height/3 {
		return Picture{}, fmt.Errorf("front view: %g mm of paper are too low for the names of %d parts", height, len(s.Bodies))
	}
	scale := min((width-2*rim)/box.Width(), (free-2*rim)/box.Height())
	drawn := scale*box.Height() + 2*rim
	p := Picture{
		Title: "The mechanism from the front", Width: width, Height: top + drawn + 2 + legend.height,
		Text: fmt.Sprintf("%d parts on %d planes, the uppermost nearest, with joints and paths.", len(s.Bodies), len(s.Planes)),
	}
	p.label(width-sideEdge, p.Height-3.4, ratio(scale), text, End, false)
	w := windowOf(box, scale, outline.Box{Min: outline.Point{Y: legend.height + 2}, Max: outline.Point{X: width, Y: legend.height + 2 + drawn}})
	for _, i := range order {
		p.body(w, s.Bodies[i], Shape{Fill: colour(tint(i)), Stroke: colour(ink), Line: 0.2})
	}
	p.tracks(w, s.Paths, 0.4)
	p.spots(w, s.Joints, 3)
	p.entries(legend, 0, legend.height)
	return p, nil
}

// where says on which planes a body is.
func (s Scene) where(b Body) string {
	if b.Low == b.High {
		return s.Planes[b.Low].Name
	}
	return s.Planes[b.Low].Name + " to " + s.Planes[b.High].Name
}

// upwards is the order in which bodies are drawn: by the lowest plane, then as they are listed.
func upwards(bodies []Body) []int {
	order := make([]int, len(bodies))
	for i := range order {
		order[i] = i
	}
	slices.SortStableFunc(order, func(a, b int) int { return bodies[a].Low - bodies[b].Low })
	return order
}
