package proof

import (
	"math"
	"sort"

	"pinwright/parts/outline"
)

// gaps measures the material left between cuts: between those of different parts it is the web,
// within one part it is a wall. The beam takes half its width on either side of its path, which is the
// drawn line, or further out where the shop compensates.
//
// The cuts are swept from left to right; a pair is measured when its boxes come nearer than what is
// asked for, or nearer than the least found so far.
func (l *ledger) gaps(s *scene) {
	sorted := make([]int, len(s.cuts))
	for i := range sorted {
		sorted[i] = i
	}
	sort.SliceStable(sorted, func(a, b int) bool { return s.cuts[sorted[a]].box.Min.X < s.cuts[sorted[b]].box.Min.X })

	least := [2]float64{math.Inf(1), math.Inf(1)} // web, wall
	for n, i := range sorted {
		a := &s.cuts[i]
		for _, j := range sorted[n+1:] {
			b := &s.cuts[j]
			reach := math.Max(s.stock.Web+s.stock.Taken()+gapSlack, math.Max(least[0], least[1]))
			if b.box.Min.X-a.box.Max.X > reach {
				break
			}
			same := a.part == b.part && a.part >= 0
			at, asked, taken, check := 0, s.stock.Web, s.stock.Taken(), webs
			if same {
				at, asked, taken, check = 1, 0, s.stock.Beam(), walls
			}
			if a.box.Distance(b.box) > math.Max(asked+taken+gapSlack, least[at]) {
				continue
			}
			nearest := outline.OutlineDistance(a.path, b.path)
			least[at] = math.Min(least[at], nearest.Distance)
			l.count(check, 1)
			l.gap(check, nearest.Distance-taken, asked, s.file+" "+near(nearest.A))
			l.tight(s, a, b, same, nearest)
		}
	}
}

// tight reports two cuts that come too near.
func (l *ledger) tight(s *scene, a, b *cut, same bool, nearest outline.Nearest) {
	if a.turn > b.turn {
		a, b = b, a
	}
	left := nearest.Distance - s.stock.Taken()
	if same {
		left = nearest.Distance - s.stock.Beam()
	}
	lines := "the cuts of lines " + plain(a.line) + " and " + plain(b.line)
	switch {
	case nearest.Distance <= gapSlack:
		check := webs
		if same {
			check = walls
		}
		l.fail(check, Finding{
			File: s.file, Line: b.line, What: lines + " touch or cross " + near(nearest.A), Do: "move them apart",
		})
	case same && left <= gapSlack:
		l.fail(walls, Finding{
			File: s.file, Line: b.line, What: lines + " leave no wall between them " + near(nearest.A),
			Found: millimetres(left), Do: "move them apart",
		})
	case !same && left < s.stock.Web-gapSlack:
		l.fail(webs, Finding{
			File: s.file, Line: b.line, What: lines + " leave too small a web " + near(nearest.A),
			Expected: millimetres(s.stock.Web), Found: millimetres(left), Do: "move the parts apart",
		})
	}
}

// margin measures the material left between the cuts and the edge of the sheet, and that engraving
// stays on the sheet.
func (l *ledger) margin(s *scene) {
	if s.margin < 0 {
		return
	}
	inner := func(b outline.Box) float64 {
		return math.Min(math.Min(b.Min.X, b.Min.Y), math.Min(s.width-b.Max.X, s.height-b.Max.Y))
	}
	half := s.stock.Taken() / 2
	for _, c := range s.cuts {
		l.count(margins, 1)
		left := inner(c.box) - half
		l.gap(margins, left, s.margin, s.file+" "+around(c.box))
		if left >= s.margin-gapSlack {
			continue
		}
		what := "a cut too near to the edge of the sheet"
		if left < 0 {
			what = "a cut that leaves the sheet"
		}
		l.fail(margins, Finding{
			File: s.file, Line: c.line, What: what + " " + around(c.box),
			Expected: millimetres(s.margin) + " of material", Found: millimetres(left), Do: "move the part inwards",
		})
	}
	for _, k := range s.strokes {
		if inner(k.box) < 0 {
			l.fail(margins, Finding{
				File: s.file, Line: k.line, What: "engraving that leaves the sheet " + around(k.box),
				Found: millimetres(-inner(k.box)) + " outside", Do: "move it onto its part",
			})
		}
	}
}
