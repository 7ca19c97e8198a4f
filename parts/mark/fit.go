package mark

import (
	"math"
	"slices"
	"strings"

	"pinwright/parts/outline"
)

// Fitted is a text that has found its place on a part.
type Fitted struct {
	Strokes []outline.Path // in the region's coordinates
	At      outline.Transform
	Lines   []string // as they were broken
	Height  float64  // of the letters, mm
	Clear   float64  // shortest way from a stroke to a cut, mm
}

// Fit finds a place in the material of the region where the text goes with at least the way clear, mm,
// between the box of every line and every outline of the region (exact distances, strokes lie within
// their boxes). It takes the largest letters that fit, no higher than want and no lower than least,
// mm; of equally large ones first those along the part's long axis. The text is never mirrored and
// reads from below or from the right. It may be broken in two lines at a blank, or after a hyphen. Not
// ok if nothing fits, or if the text or the region is empty.
//
// Plan:
//
//  1. Candidates for the middle of the text: the points of a grid along the long axis, each also,
//     where room is scarce, pushed away from the cut that is nearest to it until two cuts are
//     equally near. Sorted: nearest to the centroid first.
//  2. A height fits if for some angle (along the long axis, then the long edges, level, upright, then
//     every 15 degrees), some breaking in lines and some candidate the boxes of the lines, turned, lie
//     in the material and keep clear. The distance of the candidate from the cuts, known beforehand,
//     rules out most of them; box corners come next, the exact distance of the boxes last.
//  3. If want does not fit, bisect between least and want (smaller letters fit wherever larger ones
//     do) until the heights are 2 % apart.
//
// Some 2,000 candidates, up to 17 angles and 2 breakings; a few milliseconds.
func Fit(region outline.Region, text string, want, least, clear float64) (Fitted, bool) {
	if text == "" || !(least > 0) || !(want >= least) || !(clear >= 0) || math.IsInf(want, 0) || len(region.Outer) < 2 {
		return Fitted{}, false
	}
	s := newSearch(region, want, clear)
	if len(s.places) == 0 {
		return Fitted{}, false
	}
	breaks := breakings(text)
	best, ok := s.at(breaks, want)
	if ok {
		return s.finish(best), true
	}
	if best, ok = s.at(breaks, least); !ok {
		return Fitted{}, false
	}
	low, high := least, want
	for high > low*1.02 {
		middle := math.Sqrt(low * high)
		if b, ok := s.at(breaks, middle); ok {
			best, low = b, middle
		} else {
			high = middle
		}
	}
	return s.finish(best), true
}

// breakings lists the ways to write the text: in one line, then in the two lines that are most nearly
// of one length.
func breakings(text string) [][]string {
	out := [][]string{{text}}
	least := math.Inf(1)
	var two []string
	for i, r := range text {
		var a, b string
		switch r {
		case ' ':
			a, b = strings.TrimSpace(text[:i]), strings.TrimSpace(text[i+1:])
		case '-':
			a, b = text[:i+1], text[i+1:]
		default:
			continue
		}
		if a == "" || b == "" || a == "-" {
			continue
		}
		_, wa := Text(a, 1)
		_, wb := Text(b, 1)
		long := max(wa, wb)
		if r == '-' {
			long *= 1.25 // rather at a blank
		}
		if long < least {
			least, two = long, []string{a, b}
		}
	}
	if two != nil {
		out = append(out, two)
	}
	return out
}

// place is a candidate for the middle of a text.
type place struct {
	at   outline.Point
	node outline.Point // the same in the frame of the field
	far  float64       // from the nearest cut, mm
	off  float64       // from the centroid, mm
}

type search struct {
	region outline.Region
	cuts   outline.Edges
	clear  float64
	angles []float64
	places []place // nearest to the centroid first
	field  field
}

// gridSize is about how many points the grid has in the part's box.
const gridSize = 1200

func newSearch(region outline.Region, want, clear float64) *search {
	s := &search{region: region, cuts: outline.EdgesOf(region), clear: clear}
	m := region.Moments()
	// Long axis: the direction in which the material spreads most; level for a shape without one.
	axis := 0.0
	if math.Hypot(2*m.Ixy, m.Iyy-m.Ixx) > 1e-6*(m.Ixx+m.Iyy) {
		axis = 0.5 * math.Atan2(2*m.Ixy, m.Iyy-m.Ixx)
	}
	axis = upright(axis)
	s.angles = append(s.angles, axis)
	s.angles = append(s.angles, edgeDirections(region.Outer, axis)...)
	for _, degrees := range [12]float64{0, 90, 15, -15, 30, -30, 45, -45, 60, -60, 75, -75} {
		if a := degrees * math.Pi / 180; math.Abs(a-axis) > 1e-9 {
			s.angles = append(s.angles, a)
		}
	}
	turn := outline.Place(-axis, false, outline.Point{})
	back := turn.Inverse()
	box := region.Outer.Transform(turn).Bounds()
	if box.Empty() || !(box.Width()*box.Height() > 0) {
		return s
	}
	pitch := math.Sqrt(box.Width() * box.Height() / gridSize)
	s.field = newField(box, turn, turn.Apply(m.Centroid), pitch)
	for i := range s.field.rows {
		for k := range s.field.columns {
			p := back.Apply(s.field.node(i, k))
			far := s.cuts.Depth(p)
			s.field.set(i, k, far)
			if far <= clear {
				continue
			}
			s.places = append(s.places, place{p, s.field.node(i, k), far, p.Dist(m.Centroid)})
			if far > clear+want {
				continue // room enough for two lines
			}
			if q, further := s.push(p, far, pitch); further > far {
				far = further
				s.places = append(s.places, place{q, turn.Apply(q), far, q.Dist(m.Centroid)})
			}
		}
	}
	slices.SortStableFunc(s.places, func(a, b place) int {
		switch {
		case a.off < b.off:
			return -1
		case a.off > b.off:
			return 1
		}
		return 0
	})
	return s
}

// edgeDirections are the directions of the long straight edges that run across the long axis, by more
// than 5 degrees, longest first, at most four: text along the arm of a part.
func edgeDirections(o outline.Outline, axis float64) []float64 {
	type edge struct{ angle, length float64 }
	var edges []edge
	box := o.Bounds()
	for _, g := range o.Segments() {
		if !g.IsLine() || g.Length() < (box.Width()+box.Height())/12 {
			continue
		}
		edges = append(edges, edge{upright(g.B.Sub(g.A).Angle()), g.Length()})
	}
	slices.SortStableFunc(edges, func(a, b edge) int {
		switch {
		case a.length > b.length+1e-6:
			return -1
		case a.length < b.length-1e-6:
			return 1
		}
		return 0
	})
	taken := []float64{axis}
	for _, e := range edges {
		if !slices.ContainsFunc(taken, func(t float64) bool { return math.Abs(upright(e.angle-t)) < 5*math.Pi/180 }) && len(taken) < 5 {
			taken = append(taken, e.angle)
		}
	}
	return taken[1:]
}

// upright turns a direction round so that text along it reads from below or from the right: more
// than -90 and at most 90 degrees.
func upright(a float64) float64 {
	a = math.Mod(a, math.Pi)
	switch {
	case a <= -math.Pi/2+1e-9:
		a += math.Pi
	case a > math.Pi/2+1e-9:
		a -= math.Pi
	}
	return a
}

// push moves p away from its nearest cut as long as that makes room, at most one pitch.
func (s *search) push(p outline.Point, far, pitch float64) (outline.Point, float64) {
	way := p.Sub(s.cuts.Nearest(p).A).Unit()
	for step := pitch / 2; step > pitch/64; step /= 2 {
		q := p.Add(way.Scale(step))
		if d := s.cuts.Depth(q); d > far {
			p, far = q, d
		}
	}
	return p, far
}

// choice is a text in its place.
type choice struct {
	lines  []string
	height float64
	at     outline.Transform
}

// at finds a place for letters of this height.
func (s *search) at(breaks [][]string, height float64) (choice, bool) {
	for _, angle := range s.angles {
		for _, lines := range breaks {
			boxes, width, total := lineBoxes(lines, height)
			if !(width > 0) {
				continue
			}
			turn := outline.Place(angle, false, outline.Point{})
			middle := turn.Apply(outline.Point{X: width / 2, Y: total / 2})
			probes := s.probes(boxes, turn, middle)
			for _, p := range s.places {
				if !s.field.allows(p.node, probes) {
					continue
				}
				at := turn
				at.Move = p.at.Sub(middle)
				if s.keeps(boxes, at) {
					return choice{lines, height, at}, true
				}
			}
		}
	}
	return choice{}, false
}

// lineBoxes returns the box of every line as Lines lays them out, and the size of the whole.
func lineBoxes(lines []string, height float64) (boxes []outline.Box, width, total float64) {
	_, width, total = Lines(lines, height)
	step := height * leading / capHeight
	for i, l := range lines {
		_, w := Text(l, height)
		y := step * float64(len(lines)-1-i)
		boxes = append(boxes, outline.Box{
			Min: outline.Point{X: (width - w) / 2, Y: y},
			Max: outline.Point{X: (width + w) / 2, Y: y + height},
		})
	}
	return boxes, width, total
}

// probes are places of a text about its middle, in the frame of the field, and how far from the cuts
// each of them must be: corners of the boxes, and their middle lines, where there is half a height
// more.
func (s *search) probes(boxes []outline.Box, turn outline.Transform, middle outline.Point) []probe {
	var out []probe
	add := func(p outline.Point, need float64) {
		way := turn.Apply(p).Sub(middle)
		f := s.field.turn
		out = append(out, probe{outline.Point{X: f.Cos*way.X - f.Sin*way.Y, Y: f.Sin*way.X + f.Cos*way.Y}, need})
	}
	for _, b := range boxes {
		for _, p := range corners(b) {
			add(p, s.clear)
		}
	}
	for _, b := range boxes {
		half := min(b.Width(), b.Height()) / 2
		for x := b.Min.X + half; x <= b.Max.X-half; x += s.field.pitch {
			add(outline.Point{X: x, Y: (b.Min.Y + b.Max.Y) / 2}, s.clear+half)
		}
	}
	return out
}

func corners(b outline.Box) [4]outline.Point {
	return [4]outline.Point{b.Min, {X: b.Max.X, Y: b.Min.Y}, b.Max, {X: b.Min.X, Y: b.Max.Y}}
}

// keeps says whether all boxes, moved, lie in the material and clear of the cuts.
func (s *search) keeps(boxes []outline.Box, at outline.Transform) bool {
	for _, b := range boxes {
		for _, p := range corners(b) {
			if s.cuts.Depth(at.Apply(p)) < s.clear {
				return false
			}
		}
	}
	for _, b := range boxes {
		frame := outline.Rectangle(b.Min, b.Max).Transform(at)
		if len(frame) == 0 {
			frame = outline.Polygon(at.Apply(b.Min), at.Apply(b.Max)) // a letter of no width
		}
		if s.cuts.Distance(frame).Distance < s.clear {
			return false
		}
		for _, h := range s.region.Holes {
			// A hole wholly within the box is as bad as one that crosses it.
			if len(h) > 0 && frame.Locate(h[0].Point) != outline.Outside {
				return false
			}
		}
	}
	return true
}

func (s *search) finish(c choice) Fitted {
	strokes, _, _ := Lines(c.lines, c.height)
	f := Fitted{Lines: c.lines, Height: c.height, At: c.at, Clear: math.Inf(1)}
	for _, p := range strokes {
		f.Strokes = append(f.Strokes, p.Transform(c.at))
	}
	f.Clear = Clearance(s.region, f.Strokes)
	return f
}

// Clearance returns the shortest way from a stroke to an outline of the region, mm; 0 if one crosses
// an outline or lies outside the material. Infinite without strokes.
func Clearance(region outline.Region, strokes []outline.Path) float64 {
	least := math.Inf(1)
	for _, p := range strokes {
		if len(p) == 0 {
			continue
		}
		if region.Locate(p[0].Point) != outline.Inside {
			return 0
		}
		for _, a := range p.Segments() {
			for _, o := range region.Outlines() {
				for _, b := range o.Segments() {
					if a.Bounds().Distance(b.Bounds()) < least {
						least = min(least, outline.SegmentDistance(a, b).Distance)
					}
				}
			}
		}
	}
	return least
}
