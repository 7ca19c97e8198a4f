package proof

import (
	"fmt"
	"math"
	"sort"

	"pinwright/export/manifest"
	"pinwright/parts/outline"
)

// engraving checks that every stroke lies on a part, clear of all cuts and made before the part falls
// out, and that every part carries the strokes of its mark.
func (l *ledger) engraving(s *scene) {
	clear := s.stock.MarkClear
	sorted := make([]int, len(s.cuts))
	for i := range sorted {
		sorted[i] = i
	}
	sort.SliceStable(sorted, func(a, b int) bool { return s.cuts[sorted[a]].box.Min.X < s.cuts[sorted[b]].box.Min.X })

	least := math.Inf(1)
	s.marks = make([]marking, len(s.parts))
	for _, k := range s.strokes {
		l.count(engraving, 1)
		owner, ownerArea := -1, math.Inf(1)
		for _, i := range sorted {
			c := &s.cuts[i]
			reach := math.Max(clear+gapSlack, least)
			if c.box.Min.X-k.box.Max.X > reach {
				break
			}
			if c.box.Distance(k.box) > reach {
				continue
			}
			nearest := strokeDistance(k.path, c.path)
			least = math.Min(least, nearest.Distance)
			l.gap(engraving, nearest.Distance, clear, s.file+" "+near(nearest.A))
			switch {
			case nearest.Distance <= gapSlack:
				l.fail(engraving, Finding{
					File: s.file, Line: k.line,
					What: "a stroke runs across the cut of line " + plain(c.line) + " " + near(nearest.A), Do: "move it onto its part",
				})
			case nearest.Distance < clear-gapSlack:
				l.fail(engraving, Finding{
					File: s.file, Line: k.line,
					What:     "a stroke comes too near to the cut of line " + plain(c.line) + " " + near(nearest.A),
					Expected: millimetres(clear), Found: millimetres(nearest.Distance), Do: "move it away from the edge",
				})
			}
			if c.area < ownerArea && c.box.ContainsBox(k.box) && c.path.Locate(k.path[0].Point) == outline.Inside {
				owner, ownerArea = i, c.area
			}
		}
		if owner < 0 || s.cuts[owner].inside || s.cuts[owner].part < 0 {
			l.fail(engraving, Finding{
				File: s.file, Line: k.line, What: "a stroke " + around(k.box) + " that is on no part", Do: "take it away",
			})
			continue
		}
		c := s.cuts[owner]
		if c.turn < k.turn {
			l.fail(order, Finding{
				File: s.file, Line: k.line,
				What: "a stroke " + around(k.box) + " comes after the cut of line " + plain(c.line) + " that frees its part",
				Do:   "put it before",
			})
		}
		m := &s.marks[c.part]
		m.strokes++
		m.length += k.path.Length()
	}
}

// marking is what is engraved on a piece.
type marking struct {
	strokes int
	length  float64
}

// agrees says whether the strokes on a piece are as many and as long as those of a part's mark.
func (m marking) agrees(want manifest.Mark) bool {
	return want.Strokes == m.strokes && math.Abs(want.Length-m.length) <= limit
}

// mark compares the engraving of a piece with the mark of the part it was matched to.
func (l *ledger) mark(s *scene, part manifest.Part, piece int) {
	have := s.marks[piece]
	if have.agrees(part.Mark) {
		return
	}
	l.fail(engraving, Finding{
		File: s.file, Line: s.cuts[s.parts[piece].outside].line, Part: part.Name,
		What:     fmt.Sprintf("its mark %q is not as it should be", part.Mark.Text),
		Expected: fmt.Sprintf("%s, %.3f mm", plural(part.Mark.Strokes, "stroke"), part.Mark.Length),
		Found:    fmt.Sprintf("%s, %.3f mm", plural(have.strokes, "stroke"), have.length),
		Do:       "alike parts could be confused: write the files anew",
	})
}
