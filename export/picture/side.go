package picture

import (
	"fmt"
	"math"
	"sort"

	"pinwright/export"
	"pinwright/parts/outline"
)

// Kit is what is stacked on one pin.
type Kit struct {
	Name   string // "A"
	Text   string // below the name: "ISO 4762 M4 x 20", or ""
	Pieces []Piece
}

// Piece is one thing of a kit, round the pin's axis. From and To are heights along the axis, mm, From
// below To; all kits of a picture count from the same level.
type Piece struct {
	Kind     PieceKind
	Name     string // shown beside it; "" shows nothing
	From, To float64
	Outer    float64 // diameter, mm; of a part the width that is drawn
	Inner    float64 // diameter of its hole, mm; 0: solid
}

// PieceKind says how a piece is drawn.
type PieceKind int

// The kinds of piece.
const (
	PartPiece   PieceKind = iota // in a tint of its own
	ShankPiece                   // the bolt or shaft itself: drawn behind the others
	HeadPiece                    // head of a bolt
	NutPiece                     // nut
	WasherPiece                  // washer
	SpacerPiece                  // spacer or sleeve
	SeatPiece                    // bearing
)

// Level is the height of a plane.
type Level struct {
	Name     string // "plane 1"
	From, To float64
}

// SideView draws pin kits in section, side by side on common levels, in rows no wider than width mm of
// paper. Each piece has its name and thickness beside it, each kit the length of its shank. The scale
// is the largest of 5, 2, 1, 0.5, 0.2 ... at which the widest kit fits the width and a row fits half
// of the height; it is written at the top. With many rows the picture is higher than height.
func SideView(kits []Kit, levels []Level, width, height float64) (Picture, error) {
	v, err := newSide(kits, levels, width, height)
	if err != nil {
		return Picture{}, fmt.Errorf("side view: %w", err)
	}
	return v.draw(v.rows), nil
}

// SideViews draws the same as SideView in as many pictures as it takes for each to be no higher than
// height (but for a single row that is higher by itself), all at one scale.
func SideViews(kits []Kit, levels []Level, width, height float64) ([]Picture, error) {
	v, err := newSide(kits, levels, width, height)
	if err != nil {
		return nil, fmt.Errorf("side view: %w", err)
	}
	var pictures []Picture
	for begin := 0; begin < len(v.rows); {
		end := begin + 1
		for end < len(v.rows) && v.height(v.rows[begin:end+1]) <= height {
			end++
		}
		pictures = append(pictures, v.draw(v.rows[begin:end]))
		begin = end
	}
	return pictures, nil
}

// Measures of a side view, mm of paper.
const (
	sideText  = 2.4
	sideName  = 3.2
	sideTitle = 6.0
	sideDim   = 14 // left of a kit, for the length of its shank
	sideGap   = 6  // between kits
	sideHead  = 10 // above a kit, for its name
)

type side struct {
	kits      []Kit
	levels    []Level
	width     float64
	scale     float64
	low, high float64        // of everything, mm along the axis
	rows      [][]int        // indices of kits
	tints     map[string]int // of the parts: one of a name has one tint throughout
}

func newSide(kits []Kit, levels []Level, width, height float64) (*side, error) {
	v := &side{kits: kits, levels: levels, width: width, low: math.Inf(1), high: math.Inf(-1), tints: map[string]int{}}
	if len(kits) == 0 {
		return nil, fmt.Errorf("there is no pin kit to draw")
	}
	if !(width > 60 && height > 40 && width <= most && height <= most) {
		return nil, fmt.Errorf("%g x %g mm of paper are too little", width, height)
	}
	for _, k := range kits {
		for _, p := range k.Pieces {
			if !(p.To >= p.From && p.Outer > 0 && p.Inner >= 0 && p.Inner <= p.Outer) || math.IsInf(p.To-p.From, 0) || math.IsInf(p.Outer, 0) {
				return nil, fmt.Errorf("pin kit %s: %s from %g to %g mm, diameter %g and %g, cannot be drawn", k.Name, p.Name, p.From, p.To, p.Outer, p.Inner)
			}
			v.low, v.high = min(v.low, p.From), max(v.high, p.To)
			if _, known := v.tints[p.Name]; p.Kind == PartPiece && !known {
				v.tints[p.Name] = len(v.tints)
			}
		}
	}
	for _, l := range levels {
		if !(l.To >= l.From) || math.IsInf(l.To-l.From, 0) {
			return nil, fmt.Errorf("%s from %g to %g mm cannot be drawn", l.Name, l.From, l.To)
		}
		v.low, v.high = min(v.low, l.From), max(v.high, l.To)
	}
	if !(v.high > v.low) {
		return nil, fmt.Errorf("the pin kits have no height")
	}
	for _, v.scale = range []float64{5, 2, 1, 0.5, 0.2, 0.1, 0.05, 0.02, 0.01} {
		widest := 0.0
		for _, k := range kits {
			widest = max(widest, v.cell(k))
		}
		if widest <= width && v.scale*(v.high-v.low) <= height/2-sideHead {
			break
		}
	}
	free := 0.0
	for i, k := range kits {
		w := v.cell(k)
		if len(v.rows) == 0 || w > free {
			v.rows = append(v.rows, nil)
			free = width - v.margin()
		}
		free -= w + sideGap
		v.rows[len(v.rows)-1] = append(v.rows[len(v.rows)-1], i)
	}
	return v, nil
}

// margin is the room for the names of the levels at the left of a row.
func (v *side) margin() float64 {
	longest := 0.0
	for _, l := range v.levels {
		longest = max(longest, roughWidth(l.Name, sideText))
	}
	return longest + 2
}

// wide is the largest diameter of a kit, mm of paper.
func (v *side) wide(k Kit) float64 {
	d := 0.0
	for _, p := range k.Pieces {
		d = max(d, p.Outer)
	}
	return d * v.scale
}

// cell is the width of a kit with all that is written beside it.
func (v *side) cell(k Kit) float64 {
	names := 0.0
	for _, p := range k.Pieces {
		names = max(names, roughWidth(caption(p), sideText))
	}
	return sideDim + max(v.wide(k)+5+names, roughWidth(k.Text, sideText))
}

func caption(p Piece) string {
	switch {
	case p.Name == "":
		return ""
	case p.Kind == ShankPiece:
		return p.Name
	}
	return p.Name + " " + figure(p.To-p.From) + " mm"
}

// rowHeight is that of the kits, or of the longest column of captions if that is more.
func (v *side) rowHeight(row []int) float64 {
	h := v.scale * (v.high - v.low)
	for _, i := range row {
		n := 0
		for _, p := range v.kits[i].Pieces {
			if caption(p) != "" && p.Kind != ShankPiece {
				n++
			}
		}
		h = max(h, float64(n)*sideText*1.3)
	}
	return h
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
	count := 0
	for _, row := range rows {
		count += len(row)
	}
	p := Picture{
		Title: "Side view of the pin kits", Width: v.width, Height: total,
		Text: fmt.Sprintf("%d pin kits in section, from the lowest plane at the bottom to the highest at the top.", count),
	}
	p.label(v.width, total-sideName, ratio(v.scale), sideText, End, false)
	y := total - sideTitle
	for _, row := range rows {
		height := v.rowHeight(row)
		y -= sideHead + height
		// The kits stand in the middle of the row's height.
		zero := y + (height-v.scale*(v.high-v.low))/2 - v.scale*v.low
		v.drawLevels(&p, zero, row)
		x := v.margin()
		for _, i := range row {
			k := v.kits[i]
			v.drawKit(&p, k, x, zero, y, height)
			x += v.cell(k) + sideGap
		}
		y -= sideGap
	}
	return p
}

func (v *side) drawLevels(p *Picture, zero float64, row []int) {
	right := v.margin()
	for _, i := range row {
		right += v.cell(v.kits[i]) + sideGap
	}
	right = min(v.width, right-sideGap)
	for i, l := range v.levels {
		low, high := zero+v.scale*l.From, zero+v.scale*l.To
		shade := pale
		if i%2 == 1 {
			shade = export.RGB{R: 0xe9, G: 0xec, B: 0xee}
		}
		p.Items = append(p.Items, Shape{Closed: []outline.Outline{rectangle(0, low, right, high)}, Fill: colour(shade), Title: l.Name})
		p.label(0.5, (low+high)/2-0.35*sideText, l.Name, sideText, Start, false)
	}
}

// drawKit draws one kit into the cell that begins at x; zero is the height of level 0 on the paper,
// bottom and height are the row's.
func (v *side) drawKit(p *Picture, k Kit, x, zero, bottom, height float64) {
	axis := x + sideDim + v.wide(k)/2
	p.label(axis, bottom+height+sideText*1.3+1.5, k.Name, sideName, Middle, true)
	p.label(x+sideDim, bottom+height+1.5, k.Text, sideText, Start, false)

	order := make([]int, len(k.Pieces))
	for i := range order {
		order[i] = i
	}
	// Shanks first: what surrounds them is drawn as two cheeks beside them.
	sort.SliceStable(order, func(a, b int) bool {
		return k.Pieces[order[a]].Kind == ShankPiece && k.Pieces[order[b]].Kind != ShankPiece
	})
	for _, i := range order {
		piece := k.Pieces[i]
		fill := fills[piece.Kind]
		if piece.Kind == PartPiece {
			fill = tint(v.tints[piece.Name])
		}
		low, high := zero+v.scale*piece.From, zero+v.scale*piece.To
		outer, inner := v.scale*piece.Outer/2, v.scale*piece.Inner/2
		cheeks := []outline.Outline{rectangle(axis-outer, low, axis+outer, high)}
		if inner > 0 {
			cheeks = []outline.Outline{rectangle(axis-outer, low, axis-inner, high), rectangle(axis+inner, low, axis+outer, high)}
		}
		p.Items = append(p.Items, Shape{Closed: cheeks, Fill: colour(fill), Stroke: colour(ink), Line: 0.15, Title: caption(piece)})
	}
	p.Items = append(p.Items, Shape{
		Open:   []outline.Path{line(outline.Point{X: axis, Y: zero + v.scale*v.low - 1}, outline.Point{X: axis, Y: zero + v.scale*v.high + 1})},
		Stroke: colour(grey), Line: 0.12, Dash: []float64{3, 0.8, 0.6, 0.8},
	})
	v.drawCaptions(p, k, axis, zero, bottom, height)
	for _, piece := range k.Pieces {
		if piece.Kind == ShankPiece {
			v.drawLength(p, piece, x+sideDim-3, axis, zero)
		}
	}
}

var fills = map[PieceKind]export.RGB{
	ShankPiece:  {R: 0xc8, G: 0xcc, B: 0xd0},
	HeadPiece:   {R: 0xa4, G: 0xaa, B: 0xb0},
	NutPiece:    {R: 0xa4, G: 0xaa, B: 0xb0},
	WasherPiece: {R: 0xde, G: 0xe1, B: 0xe4},
	SpacerPiece: {R: 0xef, G: 0xef, B: 0xef},
	SeatPiece:   {R: 0x86, G: 0x9b, B: 0xb4},
}

// drawLength dimensions a shank at the left.
func (v *side) drawLength(p *Picture, piece Piece, x, axis, zero float64) {
	low, high := zero+v.scale*piece.From, zero+v.scale*piece.To
	at := func(x, y float64) outline.Point { return outline.Point{X: x, Y: y} }
	p.Items = append(p.Items, Shape{
		Open: []outline.Path{
			line(at(x, low), at(x, high)),
			line(at(x-1, low), at(axis, low)), line(at(x-1, high), at(axis, high)),
			line(at(x-0.6, low+1.4), at(x, low), at(x+0.6, low+1.4)),
			line(at(x-0.6, high-1.4), at(x, high), at(x+0.6, high-1.4)),
		},
		Stroke: colour(grey), Line: 0.12,
	})
	p.label(x-1.2, (low+high)/2-0.35*sideText, figure(piece.To-piece.From), sideText, End, false)
}

// drawCaptions writes the names at the right, each at the height of its piece as far as they leave each
// other room, and joins them to their pieces by thin lines.
func (v *side) drawCaptions(p *Picture, k Kit, axis, zero, bottom, height float64) {
	var named []Piece
	for _, piece := range k.Pieces {
		if caption(piece) != "" && piece.Kind != ShankPiece {
			named = append(named, piece)
		}
	}
	sort.SliceStable(named, func(i, j int) bool { return named[i].From+named[i].To < named[j].From+named[j].To })
	wanted := make([]float64, len(named))
	for i, piece := range named {
		wanted[i] = zero + v.scale*(piece.From+piece.To)/2
	}
	const pitch = sideText * 1.25
	places := spread(wanted, pitch, bottom+pitch/2, bottom+height-pitch/2)
	x := axis + v.wide(k)/2
	for i, piece := range named {
		p.Items = append(p.Items, Shape{
			Open: []outline.Path{line(
				outline.Point{X: axis + v.scale*piece.Outer/2, Y: wanted[i]}, outline.Point{X: x + 1, Y: wanted[i]},
				outline.Point{X: x + 3.6, Y: places[i]}, outline.Point{X: x + 4.4, Y: places[i]},
			)},
			Stroke: colour(grey), Line: 0.12,
		})
		p.label(x+5, places[i]-0.35*sideText, caption(piece), sideText, Start, false)
	}
}

// spread moves ascending values as little as it can (in squares) so that neighbours are pitch apart,
// within low and high if they all fit there: the values less their share of pitches are made
// ascending by pooling (isotonic regression), then shifted back.
func spread(values []float64, pitch, low, high float64) []float64 {
	type pool struct {
		sum float64
		n   int
	}
	var pools []pool
	for i, v := range values {
		pools = append(pools, pool{v - float64(i)*pitch, 1})
		for len(pools) > 1 {
			a, b := pools[len(pools)-2], pools[len(pools)-1]
			if a.sum/float64(a.n) <= b.sum/float64(b.n) {
				break
			}
			pools = append(pools[:len(pools)-2], pool{a.sum + b.sum, a.n + b.n})
		}
	}
	out := make([]float64, 0, len(values))
	last := high - float64(len(values)-1)*pitch
	for _, q := range pools {
		for range q.n {
			out = append(out, max(low, min(last, q.sum/float64(q.n)))+float64(len(out))*pitch)
		}
	}
	return out
}
