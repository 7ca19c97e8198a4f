package parts

import (
	"strconv"
	"strings"

	"pinwright/parts/mark"
	"pinwright/parts/outline"
)

// Sizes of the letters, mm. Letters of 1.8 mm are read at arm's length.
const (
	wantedLetters = 4.0
	leastLetters  = 1.8
)

// mark cuts the windows and engraves every part: the copy and the link (and the phase of a crank with a
// phase mark), so that no two parts can be mixed up. Where the whole text has no room, also under a
// washer, a number takes its place: the part's place in the list, P7. Windows give way to the mark: if
// there is no room beside them, the room that the mark would take without them is spared.
func (k *maker) mark() {
	for i := range k.parts {
		p, n := &k.parts[i], k.notes[i]
		full := strings.ToUpper(strings.TrimSpace(strings.ReplaceAll(p.Copy, ".", " ") + " " + p.Link))
		if n.phase != "" {
			full += " " + n.phase
		}
		texts := []string{full, "P" + strconv.Itoa(i+1)}
		solid := *p
		if n.window != nil {
			k.addWindows(p, n.window.cut(p.Region.Outer, strokesRoom(n.lines)))
		}
		f, text, ok := fit(p.Region, n, texts[:1])
		if !ok && n.window != nil {
			if f, text, ok = fit(solid.Region, n, texts); ok {
				*p = solid
				spare := append(strokesRoom(n.lines), strokesRoom(f.Strokes)...)
				k.addWindows(p, n.window.cut(p.Region.Outer, spare))
			}
		} else if !ok {
			f, text, ok = fit(p.Region, n, texts)
		}
		if !ok {
			k.fail(n.path, "widen the part", "%s: there is no room for a mark, not even for a number with digits of %s mm", p.Link, millimetres(leastLetters))
			continue
		}
		p.Mark = Mark{Text: text, Strokes: append(append([]outline.Path{}, f.Strokes...), n.lines...)}
		if n.window != nil {
			k.sound(*p, n.path)
		}
	}
}

func (k *maker) addWindows(p *Part, cuts []outline.Outline) {
	region := outline.Region{Outer: p.Region.Outer, Holes: append([]outline.Outline{}, p.Region.Holes...)}
	holes := append([]Hole{}, p.Holes...)
	for _, d := range named(cuts) {
		region.Holes = append(region.Holes, d.shape)
		holes = append(holes, d.hole)
	}
	p.Region, p.Holes = region, holes
}

// fit finds room for the first text that has some, beside the washers before under them.
func fit(r outline.Region, n note, texts []string) (mark.Fitted, string, bool) {
	bare := outline.Region{Outer: r.Outer, Holes: append([]outline.Outline{}, r.Holes...)}
	for _, line := range n.lines {
		for _, s := range outline.Stroke(line, 0.1) {
			bare.Holes = append(bare.Holes, s.Outer.Reverse())
		}
	}
	free := outline.Region{Outer: r.Outer, Holes: append([]outline.Outline{}, bare.Holes...)}
	for _, c := range n.covers {
		free.Holes = append(free.Holes, outline.CircleHole(c.Centre, c.Radius-markClear))
	}
	for _, text := range texts {
		for _, room := range []outline.Region{free, bare} {
			if f, ok := mark.Fit(room, text, wantedLetters, leastLetters, markClear); ok {
				return f, text, true
			}
		}
	}
	return mark.Fitted{}, "", false
}

// strokesRoom is the room that strokes take with what must stay clear round them.
func strokesRoom(strokes []outline.Path) []outline.Region {
	var out []outline.Region
	box := outline.EmptyBox()
	for _, p := range strokes {
		out = append(out, outline.Stroke(p, markClear+0.01)...)
		box = box.Union(p.Bounds())
	}
	return outline.Union(out...)
}
