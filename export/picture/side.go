package picture

import (
	"fmt"
	"math"
	"slices"
	"sort"
	"strconv"
	"strings"

	"pinwright/export"
	"pinwright/parts/outline"
)

// SideView draws pin kits in section, side by side on common levels, in rows no wider than width mm of
// paper. To the right of a kit stand the name and the thickness of each piece. To its left stand, from
// the kit outwards: what is clamped (from head to nut), the nut, and the shank past it; then the length
// of the shank. The title names the kits and what they sit on.
//
// The scale is one of ISO 5455 (5:1, 2:1, 1:1, 1:2 ...) and is written at the top: the largest that takes the
// fewest pages of that height, but not below 1:1 unless a kit would not fit otherwise. With many rows
// the picture is higher than height. A name that is wider than the picture is cut short.
func SideView(kits []Kit, levels []Level, width, height float64) (Picture, error) {
	v, err := newSide(kits, levels, width, height, nil)
	if err != nil {
		return Picture{}, fmt.Errorf("side view: %w", err)
	}
	return v.draw(v.rows), nil
}

// SideViews draws the same as SideView in as many pictures as it takes for each to be no higher than
// height (but for a single row that is higher by itself), all at one scale.
func SideViews(kits []Kit, levels []Level, width, height float64) ([]Picture, error) {
	v, err := newSide(kits, levels, width, height, nil)
	if err != nil {
		return nil, fmt.Errorf("side view: %w", err)
	}
	return v.pages(height), nil
}

// Measures of a side view, mm of paper.
const (
	sideText  = 2.3
	sideName  = 3.2
	sideTitle = 6.0
	sideDims  = 20.0 // left of a kit, for its dimensions
	dimColumn = 8.5  // from one line of dimensions to the next
	sideGap   = 5.0  // between kits
	sideHead  = 9.0  // above a kit, for its name
	sideEdge  = 1.0  // free at the right
	beside    = 4.5  // from a kit to the names of its pieces
	ring      = 1.9  // radius of the circle round the number of a step
)

// side is a page of kits being laid out.
type side struct {
	kits   []Kit // as they are drawn
	levels []Level
	width  float64
	scale  float64
	rows   [][]int // indices of kits
	steps  bool    // exploded: numbers of steps instead of dimensions
}

// scales are those of ISO 5455.
var scales = [...]float64{5, 2, 1, 0.5, 0.2, 0.1, 0.05, 0.02, 0.01}

// newSide finds scale and rows. Where explode is given it makes of each kit, at a scale, the kit that is
// drawn.
func newSide(kits []Kit, levels []Level, width, height float64, explode func(Kit, float64) Kit) (*side, error) {
	if len(kits) == 0 {
		return nil, fmt.Errorf("there is no pin kit to draw")
	}
	if !(width > 60 && height > 40 && width <= most && height <= most) {
		return nil, fmt.Errorf("%g x %g mm of paper are too little", width, height)
	}
	base := side{levels: levels, width: width, steps: explode != nil}
	low, high := math.Inf(1), math.Inf(-1)
	for _, k := range kits {
		if err := k.sound(); err != nil {
			return nil, err
		}
		for _, p := range k.Pieces {
			low, high = min(low, p.From), max(high, p.To)
		}
	}
	for _, l := range levels {
		if !(l.To >= l.From) || math.IsInf(l.To-l.From, 0) {
			return nil, fmt.Errorf("%s from %g to %g mm cannot be drawn", l.Name, l.From, l.To)
		}
	}
	if !(high > low) {
		return nil, fmt.Errorf("the pin kits have no height")
	}
	var best *side
	fewest := 0
	for _, scale := range scales {
		v := base
		v.scale, v.kits = scale, kits
		if explode != nil {
			v.kits = make([]Kit, len(kits))
			for i, k := range kits {
				v.kits[i] = explode(k, scale)
			}
		}
		v.arrange()
		fits := true
		for _, row := range v.rows {
			fits = fits && v.height([][]int{row}) <= height
		}
		for _, k := range v.kits {
			fits = fits && v.cell(k) <= v.room()
		}
		last := scale == scales[len(scales)-1]
		if !fits && !(last && best == nil) {
			continue
		}
		if n := len(v.split(height)); best == nil || n < fewest {
			best, fewest = &v, n
		}
		if scale <= 1 && best != nil {
			break
		}
	}
	return best, nil
}

// room is the width for kits in a row.
func (v *side) room() float64 { return v.width - v.margin() - sideEdge }

// arrange puts the kits into rows.
func (v *side) arrange() {
	free := 0.0
	for i, k := range v.kits {
		w := v.cell(k)
		if len(v.rows) == 0 || w > free {
			v.rows = append(v.rows, nil)
			free = v.room()
		}
		free -= w + sideGap
		v.rows[len(v.rows)-1] = append(v.rows[len(v.rows)-1], i)
	}
}

// split says how many of the rows come on each page.
func (v *side) split(height float64) [][][]int {
	var pages [][][]int
	for begin := 0; begin < len(v.rows); {
		end := begin + 1
		for end < len(v.rows) && v.height(v.rows[begin:end+1]) <= height {
			end++
		}
		pages = append(pages, v.rows[begin:end])
		begin = end
	}
	return pages
}

func (v *side) pages(height float64) []Picture {
	var out []Picture
	for _, rows := range v.split(height) {
		out = append(out, v.draw(rows))
	}
	return out
}

// margin is the room for the names of the levels at the left of a row.
func (v *side) margin() float64 {
	longest := 0.0
	for _, l := range v.levels {
		longest = max(longest, roughWidth(l.Name, sideText))
	}
	return min(longest+2, v.width/4)
}

// dims is the room left of a kit.
func (v *side) dims() float64 {
	if v.steps {
		return 0
	}
	return sideDims
}

// wide is the largest diameter of a kit, mm of paper.
func (v *side) wide(k Kit) float64 {
	d := 0.0
	for _, p := range k.Pieces {
		d = max(d, p.Outer)
	}
	return d * v.scale
}

// words is what is written beside a piece; "" for nothing.
func (v *side) words(p Piece) string {
	switch {
	case p.Kind == ShankPiece || p.Name == "":
		return ""
	case v.steps:
		return p.Name
	}
	return p.Name + ", " + figure(p.To-p.From) + " mm"
}

// before is the room between a kit and the words beside it.
func (v *side) before() float64 {
	if v.steps {
		return beside + 2*ring + 1
	}
	return beside
}

// pitch is the least distance from one line of words to the next.
func (v *side) pitch() float64 {
	if v.steps {
		return 2*ring + 0.3
	}
	return 1.25 * sideText
}

// cell is the width of a kit with all that is written beside it.
func (v *side) cell(k Kit) float64 {
	longest := 0.0
	for _, p := range k.Pieces {
		longest = max(longest, roughWidth(v.words(p), sideText))
	}
	return v.dims() + max(v.wide(k)+v.before()+longest, roughWidth(k.Text, sideText), boldWidth(k.Name, sideName))
}

// span is the heights that a row shows: those of its kits and of the levels that they reach.
func (v *side) span(row []int) (low, high float64) {
	low, high = math.Inf(1), math.Inf(-1)
	for _, i := range row {
		for _, p := range v.kits[i].Pieces {
			low, high = min(low, p.From), max(high, p.To)
		}
	}
	if low > high {
		return 0, 0
	}
	from, to := low, high
	for _, l := range v.levels {
		if l.From <= high && l.To >= low {
			from, to = min(from, l.From), max(to, l.To)
		}
	}
	return from, to
}

// rowHeight is that of the kits, or of the longest column of words if that is more.
func (v *side) rowHeight(row []int) float64 {
	low, high := v.span(row)
	h := v.scale * (high - low)
	for _, i := range row {
		n := 0
		for _, p := range v.kits[i].Pieces {
			if v.words(p) != "" {
				n++
			}
		}
		h = max(h, float64(max(n, 3))*v.pitch())
	}
	shown := 0
	for _, l := range v.levels {
		if l.From <= high && l.To >= low {
			shown++
		}
	}
	return max(h, float64(shown)*1.25*sideText)
}

// height is that of a picture of the rows.
func (v *side) height(rows [][]int) float64 {
	total := sideTitle
	for _, row := range rows {
		total += v.rowHeight(row) + sideHead + sideGap
	}
	return total
}

func (v *side) draw(rows [][]int) Picture {
	total := v.height(rows)
	var what []string
	for _, row := range rows {
		for _, i := range row {
			name := v.kits[i].Name
			if v.kits[i].Text != "" {
				name += ": " + v.kits[i].Text
			}
			what = append(what, name)
		}
	}
	p := Picture{
		Title: strings.Join(what, "; "), Width: v.width, Height: total,
		Text: fmt.Sprintf("%d pin kits in section, from the lowest plane at the bottom to the highest at the top.", len(what)),
	}
	if v.steps {
		p.Text = fmt.Sprintf("%d pin kits pulled apart along their pins, with the numbers of the steps of the assembly.", len(what))
	}
	p.label(v.width-sideEdge, total-sideName, ratio(v.scale), sideText, End, false)
	y := total - sideTitle
	for _, row := range rows {
		height := v.rowHeight(row)
		y -= sideHead + height
		low, high := v.span(row)
		// The kits stand in the middle of the row's height.
		zero := y + (height-v.scale*(high-low))/2 - v.scale*low
		v.drawLevels(&p, zero, y, height, row)
		x := v.margin()
		for _, i := range row {
			k := v.kits[i]
			v.drawKit(&p, k, cellAt{x: x, zero: zero, bottom: y, height: height})
			x += v.cell(k) + sideGap
		}
		y -= sideGap
	}
	return p
}

func (v *side) drawLevels(p *Picture, zero, bottom, height float64, row []int) {
	right := v.margin() - sideGap
	for _, i := range row {
		right += v.cell(v.kits[i]) + sideGap
	}
	right = min(v.width, right+sideEdge)
	from, to := v.span(row)
	var middles []float64
	var shown []Level
	for i, l := range v.levels {
		if l.To < from || l.From > to {
			continue
		}
		low, high := zero+v.scale*l.From, zero+v.scale*l.To
		shade := pale
		if i%2 == 1 {
			shade = export.RGB{R: 0xe9, G: 0xec, B: 0xee}
		}
		p.Items = append(p.Items, Shape{Closed: []outline.Outline{rectangle(0, low, right, high)}, Fill: colour(shade), Title: l.Name})
		middles, shown = append(middles, (low+high)/2), append(shown, l)
	}
	if !sort.Float64sAreSorted(middles) {
		sort.Sort(byHeight{middles, shown})
	}
	for i, y := range spread(middles, 1.25*sideText, bottom+0.5*sideText, bottom+height-0.5*sideText) {
		p.label(0.5, y-0.35*sideText, shorten(shown[i].Name, sideText, v.margin()-1), sideText, Start, false)
	}
}

// byHeight sorts levels by the heights of their middles.
type byHeight struct {
	middles []float64
	levels  []Level
}

func (b byHeight) Len() int           { return len(b.middles) }
func (b byHeight) Less(i, j int) bool { return b.middles[i] < b.middles[j] }
func (b byHeight) Swap(i, j int) {
	b.middles[i], b.middles[j] = b.middles[j], b.middles[i]
	b.levels[i], b.levels[j] = b.levels[j], b.levels[i]
}

// cellAt is where a kit is drawn: its cell begins at x, level 0 is at zero, bottom and height are the
// row's.
type cellAt struct{ x, zero, bottom, height float64 }

func (v *side) drawKit(p *Picture, k Kit, at cellAt) {
	left := at.x + v.dims()
	axis := left + v.wide(k)/2
	order := make([]int, len(k.Pieces))
	for i := range order {
		order[i] = i
	}
	// Shanks first: what surrounds them is drawn as two cheeks beside them.
	sort.SliceStable(order, func(a, b int) bool {
		return k.Pieces[order[a]].Kind == ShankPiece && k.Pieces[order[b]].Kind != ShankPiece
	})
	lowest, highest := math.Inf(1), math.Inf(-1)
	for _, i := range order {
		piece := k.Pieces[i]
		lowest, highest = min(lowest, piece.From), max(highest, piece.To)
		fill := fills[piece.Kind]
		if piece.Kind == PartPiece {
			fill = tint(piece.Tint)
		}
		low, high := at.zero+v.scale*piece.From, at.zero+v.scale*piece.To
		outer, inner := v.scale*piece.Outer/2, v.scale*piece.Inner/2
		cheeks := []outline.Outline{rectangle(axis-outer, low, axis+outer, high)}
		if inner > 0 {
			cheeks = []outline.Outline{rectangle(axis-outer, low, axis-inner, high), rectangle(axis+inner, low, axis+outer, high)}
		}
		title := v.words(piece)
		if title == "" {
			title = k.Text
		}
		p.Items = append(p.Items, Shape{Closed: cheeks, Fill: colour(fill), Stroke: colour(ink), Line: 0.15, Title: title})
	}
	if len(order) == 0 {
		v.drawName(p, k, left, axis, at.bottom)
		return
	}
	top := at.zero + v.scale*highest
	p.Items = append(p.Items, Shape{
		Open:   []outline.Path{line(outline.Point{X: axis, Y: at.zero + v.scale*lowest - 1}, outline.Point{X: axis, Y: top + 1})},
		Stroke: colour(grey), Line: 0.12, Dash: []float64{3, 0.8, 0.6, 0.8},
	})
	v.drawName(p, k, left, axis, max(top, v.drawWords(p, k, axis, at)))
	if s, ok := stackOf(k); ok && !v.steps {
		v.drawDims(p, s, left, axis, at)
	}
}

// drawName writes the name of a kit and what it sits on above top.
func (v *side) drawName(p *Picture, k Kit, left, axis, top float64) {
	room := v.width - sideEdge - left
	name := shorten(k.Name, sideName, room/1.2)
	p.label(max(axis, left+boldWidth(name, sideName)/2), top+1.3*sideText+1.5, name, sideName, Middle, true)
	p.label(left, top+1.3, shorten(k.Text, sideText, room), sideText, Start, false)
}

var fills = [...]export.RGB{
	ShankPiece:  {R: 0xc8, G: 0xcc, B: 0xd0},
	HeadPiece:   {R: 0xa4, G: 0xaa, B: 0xb0},
	NutPiece:    {R: 0xa4, G: 0xaa, B: 0xb0},
	WasherPiece: {R: 0xde, G: 0xe1, B: 0xe4},
	SpacerPiece: {R: 0xef, G: 0xef, B: 0xef},
	SeatPiece:   {R: 0x86, G: 0x9b, B: 0xb4},
}

// drawDims dimensions a kit at the left: next to it stack, nut and what is past it, outside the shank.
func (v *side) drawDims(p *Picture, s stack, left, axis float64, at cellAt) {
	inner := [][2]float64{{s.from, s.to}}
	if s.nuts() {
		inner = append(inner, [2]float64{s.to, s.nutTo})
	}
	if s.past > 0 {
		inner = append(inner, [2]float64{s.shank.To - s.past, s.shank.To})
	}
	v.drawChain(p, inner, left-3, axis, at)
	v.drawChain(p, [][2]float64{{s.shank.From, s.shank.To}}, left-3-dimColumn, axis, at)
}

// drawChain draws lengths one above the other along a line at x, each with its figure to the left of
// the line; the figures leave each other room.
func (v *side) drawChain(p *Picture, lengths [][2]float64, x, axis float64, at cellAt) {
	paper := func(height float64) float64 { return at.zero + v.scale*height }
	q := func(x, y float64) outline.Point { return outline.Point{X: x, Y: y} }
	var paths []outline.Path
	middles := make([]float64, len(lengths))
	for i, l := range lengths {
		low, high := paper(l[0]), paper(l[1])
		middles[i] = (low + high) / 2
		paths = append(paths, line(q(x, low), q(x, high)), line(q(x-1, low), q(axis, low)), line(q(x-1, high), q(axis, high)))
		tip := min(1.4, (high-low)/2)
		paths = append(paths,
			line(q(x-0.43*tip, low+tip), q(x, low), q(x+0.43*tip, low+tip)),
			line(q(x-0.43*tip, high-tip), q(x, high), q(x+0.43*tip, high-tip)))
	}
	for i, y := range spread(middles, 1.25*sideText, at.bottom+0.6*sideText, at.bottom+at.height-0.6*sideText) {
		if math.Abs(y-middles[i]) > 0.5*sideText {
			paths = append(paths, line(q(x, middles[i]), q(x-1, y)))
		}
		p.label(x-1.2, y-0.35*sideText, figure(lengths[i][1]-lengths[i][0]), sideText, End, false)
	}
	p.Items = append(p.Items, Shape{Open: paths, Stroke: colour(grey), Line: 0.12})
}

// drawWords writes the names at the right, each at the height of its piece as far as they leave each
// other room, and joins them to their pieces by thin lines. It returns the height of the highest.
func (v *side) drawWords(p *Picture, k Kit, axis float64, at cellAt) float64 {
	var named []Piece
	for _, piece := range k.Pieces {
		if v.words(piece) != "" {
			named = append(named, piece)
		}
	}
	slices.SortStableFunc(named, func(a, b Piece) int {
		switch x, y := a.From+a.To, b.From+b.To; {
		case x < y:
			return -1
		case x > y:
			return 1
		}
		return 0
	})
	wanted := make([]float64, len(named))
	for i, piece := range named {
		wanted[i] = at.zero + v.scale*(piece.From+piece.To)/2
	}
	pitch := v.pitch()
	places := spread(wanted, pitch, at.bottom+pitch/2, at.bottom+at.height-pitch/2)
	x := axis + v.wide(k)/2
	highest := math.Inf(-1)
	for i, piece := range named {
		y := places[i]
		highest = max(highest, y+pitch/2)
		p.Items = append(p.Items, Shape{
			Open: []outline.Path{line(
				outline.Point{X: axis + v.scale*piece.Outer/2, Y: wanted[i]}, outline.Point{X: x + 0.8, Y: wanted[i]},
				outline.Point{X: x + beside - 1.2, Y: y}, outline.Point{X: x + beside - 0.5, Y: y},
			)},
			Stroke: colour(grey), Line: 0.12,
		})
		if v.steps && piece.Step > 0 {
			c := outline.Point{X: x + beside + ring - 0.5, Y: y}
			p.Items = append(p.Items, Shape{Closed: []outline.Outline{outline.Circle(c, ring)}, Fill: colour(white), Stroke: colour(ink), Line: 0.15})
			p.label(c.X, y-0.35*sideText, strconv.Itoa(piece.Step), sideText, Middle, true)
		}
		from := x + v.before()
		p.label(from, y-0.35*sideText, shorten(v.words(piece), sideText, v.width-sideEdge-from), sideText, Start, false)
	}
	return highest
}
