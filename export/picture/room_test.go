package picture

import (
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"

	"golang.org/x/image/font"
	"golang.org/x/image/font/gofont/gobold"
	"golang.org/x/image/font/gofont/goregular"
	"golang.org/x/image/font/sfnt"
	"golang.org/x/image/math/fixed"
	"pgregory.net/rapid"

	"pinwright/parts/outline"
)

// The widths that room is left for are no less than those of the fonts that the papers are set in.
func TestWidthsAreEnough(t *testing.T) {
	for name, c := range map[string]struct {
		data  []byte
		width func(string, float64) float64
	}{"regular": {goregular.TTF, roughWidth}, "bold": {gobold.TTF, boldWidth}} {
		f, err := sfnt.Parse(c.data)
		if err != nil {
			t.Fatal(err)
		}
		var b sfnt.Buffer
		for _, r := range " !\"#$%&'()*+,-./0123456789:;<=>?@ABCDEFGHIJKLMNOPQRSTUVWXYZ[\\]^_`abcdefghijklmnopqrstuvwxyz{|}~°äÖé" {
			g, err := f.GlyphIndex(&b, r)
			if err != nil {
				t.Fatal(err)
			}
			a, err := f.GlyphAdvance(&b, g, fixed.I(1000), font.HintingNone)
			if err != nil {
				t.Fatal(err)
			}
			if got := c.width(string(r), 1000); float64(a)/64 > got+1e-9 {
				t.Errorf("%s: %q is %g wide, taken for %g", name, r, float64(a)/64, got)
			}
		}
	}
}

// writings are the boxes of the labels of a picture: from a fifth of the size below the base line to the
// height of capitals.
func writings(p Picture) []outline.Box {
	var out []outline.Box
	for _, item := range p.Items {
		l, ok := item.(Label)
		if !ok {
			continue
		}
		w := roughWidth(l.Text, l.Size)
		if l.Bold {
			w = boldWidth(l.Text, l.Size)
		}
		x := l.At.X
		switch l.Anchor {
		case Middle:
			x -= w / 2
		case End:
			x -= w
		}
		out = append(out, outline.Box{
			Min: outline.Point{X: x, Y: l.At.Y - 0.2*l.Size},
			Max: outline.Point{X: x + w, Y: l.At.Y + 0.75*l.Size},
		})
	}
	return out
}

// clear fails when words overlap or leave the picture, or when anything is drawn outside it.
func clear(t *rapid.T, p Picture) {
	if err := p.Check(); err != nil {
		t.Fatal(err)
	}
	whole := outline.Box{Max: outline.Point{X: p.Width, Y: p.Height}}
	boxes := writings(p)
	texts := []string{}
	for _, item := range p.Items {
		switch item := item.(type) {
		case Label:
			texts = append(texts, item.Text)
		case Shape:
			for _, o := range item.Closed {
				if !whole.Grow(1e-6).ContainsBox(o.Bounds()) {
					t.Fatalf("%s: %q at %v is off the picture of %g x %g", p.Title, item.Title, o.Bounds(), p.Width, p.Height)
				}
			}
			for _, o := range item.Open {
				if !whole.Grow(1e-6).ContainsBox(o.Bounds()) {
					t.Fatalf("%s: a line at %v is off the picture of %g x %g", p.Title, o.Bounds(), p.Width, p.Height)
				}
			}
		}
	}
	for i, b := range boxes {
		if !whole.Grow(1e-6).ContainsBox(b) {
			t.Fatalf("%s: %q at %v is off the picture of %g x %g", p.Title, texts[i], b, p.Width, p.Height)
		}
		for k, c := range boxes[:i] {
			if w, h := math.Min(b.Max.X, c.Max.X)-math.Max(b.Min.X, c.Min.X), math.Min(b.Max.Y, c.Max.Y)-math.Max(b.Min.Y, c.Min.Y); w > 1e-6 && h > 1e-6 {
				t.Fatalf("%s: %q over %q by %.3f x %.3f mm", p.Title, texts[i], texts[k], w, h)
			}
		}
	}
}

// drawnKit is a kit as they are stacked: head, washers, parts and spacers, nut, on a bolt or a shaft.
func drawnKit(t *rapid.T) Kit {
	text := rapid.SampledFrom([]string{"", "ISO 4762 M4x16", "shaft 6 mm", "ISO 7380-1 M10x120 and a very long remark that no page of paper is wide enough for, whatever is done with it"})
	k := Kit{Name: rapid.SampledFrom([]string{"A", "O", "left-knee", "MMMMMMMMMMMMMMMM"}).Draw(t, "name"), Text: text.Draw(t, "text")}
	d := rapid.Float64Range(2, 12).Draw(t, "bolt")
	z := rapid.Float64Range(0, 60).Draw(t, "from")
	from := z
	put := func(kind PieceKind, name string, outer, thick, inner float64) {
		k.Pieces = append(k.Pieces, Piece{Kind: kind, Name: name, From: z, To: z + thick, Outer: outer, Inner: inner, Step: rapid.IntRange(0, 40).Draw(t, "step")})
		z += thick
	}
	if rapid.Bool().Draw(t, "head") {
		put(HeadPiece, "", 1.8*d, d, 0)
		from = z
	}
	for i := range rapid.IntRange(1, 8).Draw(t, "parts") {
		put(WasherPiece, "ISO 7089 4", 2*d, rapid.Float64Range(0.3, 2).Draw(t, "washer"), d)
		put(PartPiece, rapid.SampledFrom([]string{"crank", "LEFT-1 COUPLER", fmt.Sprint("link ", i)}).Draw(t, "part"), 3*d, rapid.Float64Range(0.5, 12).Draw(t, "sheet"), d)
		if rapid.IntRange(0, 3).Draw(t, "spacer?") == 0 {
			put(SpacerPiece, "spacer", 1.7*d, rapid.Float64Range(2, 40).Draw(t, "spacer"), d)
		}
	}
	if rapid.Bool().Draw(t, "nut") {
		put(NutPiece, "DIN 985 M4", 1.8*d, 0.8*d, d)
	}
	k.Pieces = append([]Piece{{Kind: ShankPiece, From: from, To: max(from+1, z+rapid.Float64Range(-3, 9).Draw(t, "past")), Outer: d}}, k.Pieces...)
	return k
}

// Words of side views and exploded views are on the picture and not over each other, whatever is stacked.
func TestSideViewsHaveRoom(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		kits := rapid.SliceOfN(rapid.Custom(drawnKit), 1, 9).Draw(t, "kits")
		var levels []Level
		z := 0.0
		for i := range rapid.IntRange(0, 9).Draw(t, "levels") {
			thick := rapid.Float64Range(0.5, 12).Draw(t, "plane")
			levels = append(levels, Level{Name: fmt.Sprint("plane ", i), From: z, To: z + thick})
			z += thick + 1
		}
		height := rapid.Float64Range(120, 300).Draw(t, "height")
		sides, err := SideViews(kits, levels, 174, height)
		if err != nil {
			t.Fatal(err)
		}
		apart, err := Exploded(kits, 174, height)
		if err != nil {
			t.Fatal(err)
		}
		for _, p := range append(sides, apart...) {
			clear(t, p)
		}
	})
}

// The dimensions of a side view add up: what is clamped, the nut and the thread past it are the length
// of the bolt, but for the millionth that counts as nothing past the nut.
func TestDimensionsAddUp(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		k := drawnKit(t)
		s, ok := stackOf(k)
		if !ok || s.past < 0 || s.from != s.shank.From {
			return
		}
		if sum := s.to - s.from + s.nutTo - s.to + s.past; math.Abs(sum-(s.shank.To-s.shank.From)) > 2e-6 {
			t.Fatalf("%g of %g", sum, s.shank.To-s.shank.From)
		}
	})
}

// An exploded kit has every piece once, as thick as it was, none touching the next but the bolt's own.
func TestExplode(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		k := drawnKit(t)
		scale := rapid.SampledFrom(scales[:]).Draw(t, "scale")
		e := explode(k, scale)
		if len(e.Pieces) != len(k.Pieces) {
			t.Fatalf("%d pieces of %d", len(e.Pieces), len(k.Pieces))
		}
		left := append([]Piece(nil), k.Pieces...)
		for i, p := range e.Pieces {
			found := false
			for n, q := range left {
				if q.Kind == p.Kind && q.Name == p.Name && q.Step == p.Step && math.Abs(q.To-q.From-p.To+p.From) < 1e-9 {
					left, found = append(left[:n], left[n+1:]...), true
					break
				}
			}
			if !found {
				t.Fatalf("%v is not of the kit", p)
			}
			if i > 0 && p.Kind != ShankPiece && p.From-e.Pieces[i-1].To < apart/scale-1e-9 {
				t.Fatalf("%v and %v touch", e.Pieces[i-1], p)
			}
		}
	})
}

// drawnScene is bars and discs anywhere, with joints on them.
func drawnScene(t *rapid.T) Scene {
	var s Scene
	planes := rapid.IntRange(1, 24).Draw(t, "planes")
	for i := range planes {
		s.Planes = append(s.Planes, Level{Name: fmt.Sprint("plane ", i), From: float64(i) * 4, To: float64(i)*4 + 3})
	}
	number := func(name string) float64 { return rapid.Float64Range(-80, 80).Draw(t, name) }
	for i := range rapid.IntRange(1, 30).Draw(t, "bodies") {
		length := rapid.Float64Range(10, 90).Draw(t, "length")
		at := outline.Place(number("angle"), rapid.Bool().Draw(t, "mirror"), outline.Point{X: number("x"), Y: number("y")})
		b := Body{Name: fmt.Sprint("left-1.link-", i), At: at, Low: rapid.IntRange(0, planes-1).Draw(t, "plane")}
		b.Region.Outer = outline.Capsule(outline.Point{}, outline.Point{X: length}, 6)
		b.High = b.Low
		if rapid.IntRange(0, 5).Draw(t, "across") == 0 {
			b.High = planes - 1
		}
		for k, x := range []float64{0, length} {
			name := fmt.Sprintf("J%d", 2*i+k)
			b.Joints = append(b.Joints, name)
			s.Joints = append(s.Joints, Spot{Name: name, At: at.Apply(outline.Point{X: x}), Ground: rapid.Bool().Draw(t, "ground")})
		}
		s.Bodies = append(s.Bodies, b)
	}
	if rapid.Bool().Draw(t, "path") {
		track := Track{Name: "P", Closed: rapid.Bool().Draw(t, "closed")}
		for range rapid.IntRange(0, 50).Draw(t, "points") {
			track.Points = append(track.Points, outline.Point{X: number("px"), Y: number("py")})
		}
		s.Paths = append(s.Paths, track)
	}
	return s
}

// Front views and planes fit the paper, names are not over each other, and every plane with a part is
// there once.
func TestScenesHaveRoom(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := drawnScene(t)
		width, height := rapid.Float64Range(150, 190).Draw(t, "width"), rapid.Float64Range(180, 260).Draw(t, "height")
		front, err := FrontView(s, width, height)
		if err != nil {
			t.Fatal(err)
		}
		planes, err := Planes(s, width, height)
		if err != nil {
			t.Fatal(err)
		}
		shown := map[string]int{}
		for _, p := range planes {
			for _, item := range p.Items {
				if l, ok := item.(Label); ok && strings.HasPrefix(l.Text, "plane ") {
					name, _, _ := strings.Cut(l.Text, ":")
					shown[name]++
				}
			}
		}
		for i, l := range s.Planes {
			want := 0
			if slices.ContainsFunc(s.Bodies, func(b Body) bool { return b.Low == i && b.High == i }) {
				want = 1
			}
			if shown[l.Name] != want {
				t.Fatalf("%s is drawn %d times, want %d", l.Name, shown[l.Name], want)
			}
		}
		for _, p := range append(planes, front) {
			if p.Height > height+1e-9 || p.Width > width+1e-9 {
				t.Fatalf("%s: %g x %g on %g x %g", p.Title, p.Width, p.Height, width, height)
			}
			clear(t, p)
		}
	})
}

// Upper parts are drawn over lower ones, at the same place and scale.
func TestFrontViewOrder(t *testing.T) {
	square := func(name string, x, plane float64) Body {
		return Body{
			Name: name, Region: outline.Region{Outer: outline.Rectangle(outline.Point{}, outline.Point{X: 40, Y: 40})},
			At: outline.Place(0, false, outline.Point{X: x}), Low: int(plane), High: int(plane),
		}
	}
	s := Scene{Planes: []Level{{Name: "plane 0"}, {Name: "plane 1"}}, Bodies: []Body{square("over", 20, 1), square("under", 0, 0)}}
	p, err := FrontView(s, 132, 200)
	if err != nil {
		t.Fatal(err)
	}
	var names []string
	for _, item := range p.Items {
		shape, ok := item.(Shape)
		if !ok || shape.Title == "" {
			continue
		}
		names = append(names, shape.Title)
		// 60 mm into 132 - 2 x 6 mm: 2 : 1.
		if b := shape.Closed[0].Bounds(); math.Abs(b.Width()-80) > 1e-9 || math.Abs(b.Height()-80) > 1e-9 {
			t.Errorf("%s is %g x %g", shape.Title, b.Width(), b.Height())
		}
	}
	if fmt.Sprint(names) != "[under over]" {
		t.Errorf("drawn in the order %v", names)
	}
}

// A path is thinned to what can be seen: every point stays within the tolerance of what is drawn.
func TestThinned(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		var points []outline.Point
		for range rapid.IntRange(0, 60).Draw(t, "points") {
			points = append(points, outline.Point{X: rapid.Float64Range(0, 3).Draw(t, "x"), Y: rapid.Float64Range(0, 3).Draw(t, "y")})
		}
		got := thinned(points, 0.5)
		if len(got) > len(points) || len(points) > 0 && (got[0] != points[0] || got[len(got)-1] != points[len(points)-1]) {
			t.Fatalf("%v of %v", got, points)
		}
		for _, q := range points {
			nearest := math.Inf(1)
			for i, a := range got {
				nearest = math.Min(nearest, a.Dist(q))
				if i > 0 {
					nearest = math.Min(nearest, outline.Segment{A: got[i-1], B: a}.Nearest(q).Distance)
				}
			}
			if nearest > 0.5+1e-9 {
				t.Fatalf("%v is %g from what is drawn", q, nearest)
			}
		}
	})
}

func TestSceneErrors(t *testing.T) {
	good := Scene{Planes: []Level{{Name: "plane 0"}}, Bodies: []Body{{
		Name: "bar", Region: outline.Region{Outer: outline.Circle(outline.Point{}, 5)}, At: outline.Place(0, false, outline.Point{}),
	}}}
	far, off := good, good
	far.Joints = []Spot{{Name: "A", At: outline.Point{X: math.Inf(1)}}}
	off.Bodies = []Body{{Name: "bar", Low: 0, High: 1}}
	for want, got := range map[string]error{
		"front view: there is no part to draw":                                          failure(FrontView(Scene{}, 170, 240)),
		"front view: bar lies on planes 0 to 1 of 1":                                    failure(FrontView(off, 170, 240)),
		"front view: a place is no number, or too far away":                             failure(FrontView(far, 170, 240)),
		"front view: 10 x 240 mm of paper are too little":                               failure(FrontView(good, 10, 240)),
		"planes: there is no part to draw":                                              second(Planes(Scene{}, 170, 240)),
		"planes: 170 x 20 mm of paper are too little":                                   second(Planes(good, 170, 20)),
		"planes: a place is no number, or too far away":                                 second(Planes(far, 170, 240)),
		"exploded view: there is no pin kit to draw":                                    second(Exploded(nil, 170, 240)),
		"exploded view: 170 x 20 mm of paper are too little":                            second(Exploded([]Kit{{Name: "A"}}, 170, 20)),
		"exploded view: the pin kits have no height":                                    second(Exploded([]Kit{{Name: "A"}}, 170, 240)),
		"exploded view: pin kit A: x from 0 to 1 mm, diameter 0 and 0, cannot be drawn": second(Exploded([]Kit{{Name: "A", Pieces: []Piece{{Name: "x", To: 1}}}}, 170, 240)),
	} {
		if got == nil || got.Error() != want {
			t.Errorf("got  %v\nwant %s", got, want)
		}
	}
}

func failure(_ Picture, err error) error  { return err }
func second(_ []Picture, err error) error { return err }
