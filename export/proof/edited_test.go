package proof_test

import (
	"strings"
	"testing"
	"testing/fstest"

	"pinwright/export"
	"pinwright/parts/outline"
)

// The steps of the demo sheet that the edits below take hold of.
const (
	crankMark  = 0 // of left.crank, two strokes
	crankA     = 2
	crankB     = 3
	crankEdge  = 4
	rockerA    = 12
	rockerEdge = 14
	plateMark  = 15 // of left.plate
	plateD     = 18
	plateEdge  = 19
	discEdge   = 26
	window     = 29
	frameEdge  = 30
)

func shift(dx, dy float64) outline.Transform { return outline.Place(0, false, pt(dx, dy)) }

// moved is the contour of a step, moved.
func moved(s *export.Step, t outline.Transform) {
	if s.Closed != nil {
		s.Closed = s.Closed.Transform(t)
	} else {
		s.Open = s.Open.Transform(t)
	}
}

// ring is a hole at a place.
func ring(x, y, radius float64) export.Step {
	return export.Step{Op: export.CutInside, Closed: outline.CircleHole(pt(x, y), radius)}
}

// Every edit is made so that the hashes are right: the geometry has to find it.
func TestEditedSheetFails(t *testing.T) {
	for name, c := range map[string]struct {
		edit func(s *export.Sheet)
		want []string // the checks that fail, each with a piece of its first finding
	}{
		"one corner moved by 0.01 mm": {
			func(s *export.Sheet) { s.Steps[plateEdge].Closed[1].X += 0.01 },
			[]string{"shapes: left.plate: the outside has another shape (expected "},
		},
		"one bulge changed by a thousandth": {
			func(s *export.Sheet) { s.Steps[rockerEdge].Closed[0].Bulge += 0.001 },
			[]string{"shapes: rocker: the outside has another shape (expected "},
		},
		"a hole's radius larger by 0.002 mm": {
			func(s *export.Sheet) { s.Steps[crankA] = ring(20, 20, 2.15+0.002) },
			[]string{"hole diameters: left.crank, hole A: is too large by 0.0040 mm (expected finished 4.5000 mm, found 4.5040 mm): its pin would not fit"},
		},
		"a hole's radius smaller by 0.002 mm": {
			func(s *export.Sheet) { s.Steps[plateD] = ring(152.6021, 59.9999, 6.398) },
			[]string{"hole diameters: left.plate, hole D: is too small by 0.0040 mm"},
		},
		"a hole moved by 0.01 mm": {
			func(s *export.Sheet) { moved(&s.Steps[crankB], shift(0.01, 0)) },
			[]string{
				"centre distances: left.crank: A-B differs from the linkage by 0.0100 mm (expected 30.0000 mm, found 30.0100 mm)",
				"shapes: left.crank, hole B: is moved in its part by 0.0100 mm",
			},
		},
		"a hole moved across by 0.05 mm": { // the distance changes by 0.04 micrometres only
			func(s *export.Sheet) { moved(&s.Steps[crankB], shift(0, 0.05)) },
			// Of three places in a row, either the end or the middle is off.
			[]string{"shapes: left.crank: the outside is moved against the holes by 0.0250 mm"},
		},
		"holes and outside moved against each other": {
			func(s *export.Sheet) { moved(&s.Steps[crankEdge], shift(0.1, 0)) },
			[]string{"shapes: left.crank: the outside is moved against the holes by 0.1000 mm"},
		},
		"a hole drawn as a square": {
			func(s *export.Sheet) { s.Steps[crankA].Closed = outline.Rectangle(pt(18, 18), pt(22, 22)) },
			[]string{"hole diameters: left.crank, hole A: is not round (expected a circle of 4.5000 mm)"},
		},
		"the window moved": {
			func(s *export.Sheet) { moved(&s.Steps[window], shift(0, 0.05)) },
			[]string{"shapes: frame, hole window 1: is moved in its part by 0.0500 mm"},
		},
		"the window turned": {
			func(s *export.Sheet) {
				s.Steps[window].Closed = s.Steps[window].Closed.Transform(shift(-195, -110)).Transform(outline.Place(0.01, false, pt(195, 110)))
			},
			[]string{"shapes: frame, hole window 1: is turned in its part (expected a box of 46.0000 x 36.0000 mm, found sides that differ by up to "},
		},
		"the window widened": {
			func(s *export.Sheet) {
				s.Steps[window].Closed = rounded(3, pt(175, 95), pt(215.01, 95), pt(215.01, 125), pt(175, 125)).path(-kerfWidth / 2)
			},
			[]string{"shapes: frame, hole window 1: has another shape"},
		},
		"a part taken away": {
			func(s *export.Sheet) { s.Steps = s.Steps[crankEdge+1:] },
			[]string{"parts: left.crank: is missing (expected (35.0, 20.0))"},
		},
		"a part copied": {
			func(s *export.Sheet) {
				for i := range crankEdge + 1 {
					step := s.Steps[i]
					moved(&step, shift(90, 110))
					s.Steps = append(s.Steps, step)
				}
			},
			[]string{"parts: a part near (125.0, 130.0) too many, like right.crank: take it away"},
		},
		"a part copied onto itself": {
			func(s *export.Sheet) { s.Steps = append(s.Steps, s.Steps[crankA:crankEdge+1]...) },
			[]string{"no cut twice: the cut of line "},
		},
		"a part of one's own": {
			func(s *export.Sheet) {
				s.Steps = append(s.Steps, export.Step{Op: export.CutOutside, Closed: outline.Circle(pt(120, 130), 10)})
			},
			[]string{"parts: a part near (120.0, 130.0) that is not in the job: take it away"},
		},
		"a part moved to the edge": {
			func(s *export.Sheet) {
				for i := range crankEdge + 1 {
					moved(&s.Steps[i], shift(-10, 0))
				}
			},
			[]string{"margin: a cut too near to the edge of the sheet near (25.0, 20.0) (expected 5.0000 mm of material, found 2.8000 mm): move the part inwards"},
		},
		"a part moved over the edge": {
			func(s *export.Sheet) {
				for i := range crankEdge + 1 {
					moved(&s.Steps[i], shift(-15, 0))
				}
			},
			[]string{"margin: a cut that leaves the sheet near (20.0, 20.0)"},
		},
		"a part moved to its neighbour": {
			func(s *export.Sheet) {
				for i := range crankEdge + 1 {
					moved(&s.Steps[i], shift(0, 3))
				}
			},
			[]string{"web: the cuts of lines ", " leave too small a web near (20.0, 30.1) (expected 3.0000 mm, found 2.6000 mm): move the parts apart"},
		},
		"a part moved onto its neighbour": {
			func(s *export.Sheet) {
				for i := range crankEdge + 1 {
					moved(&s.Steps[i], shift(0, 6))
				}
			},
			[]string{"web: the cuts of lines ", " touch or cross near ("},
		},
		"a part turned over": {
			func(s *export.Sheet) {
				mirror := outline.Transform{Cos: -1, Mirror: true, Move: pt(0, 87)} // y to 87 - y
				for i := plateMark; i <= plateEdge; i++ {
					moved(&s.Steps[i], mirror)
				}
			},
			[]string{"shapes: left.plate: lies with the wrong side up"},
		},
		"the outside before a hole": {
			func(s *export.Sheet) { s.Steps[crankB], s.Steps[crankEdge] = s.Steps[crankEdge], s.Steps[crankB] },
			[]string{"order of work: a cut near (50.0, 17.9) comes after the cut of line ", "once that is cut, it hangs on nothing"},
		},
		"a window before the part in it": {
			func(s *export.Sheet) { s.Steps[discEdge], s.Steps[window] = s.Steps[window], s.Steps[discEdge] },
			[]string{"order of work: a cut near "},
		},
		"engraving after the outside": {
			func(s *export.Sheet) {
				s.Steps[crankMark], s.Steps[crankEdge] = s.Steps[crankEdge], s.Steps[crankMark]
			},
			[]string{"order of work: a cut near "},
		},
		"a hole on the layer of the outsides": {
			func(s *export.Sheet) { s.Steps[crankA].Op = export.CutOutside },
			[]string{"parts: a part near (20.0, 20.0) lies on the part of line ", "holes: left.crank, hole A: is missing (expected (20.0, 20.0))"},
		},
		"an outside on the layer of the holes": {
			func(s *export.Sheet) { s.Steps[crankEdge].Op = export.CutInside },
			[]string{"parts: left.crank: is missing", "holes: a hole near (20.0, 20.0) that is in no part"},
		},
		"a hole left out": {
			func(s *export.Sheet) { s.Steps = append(s.Steps[:rockerA:rockerA], s.Steps[rockerA+1:]...) },
			[]string{"holes: rocker, hole A: is missing", "centre distances: rocker: the distance A-B cannot be measured"},
		},
		"a hole too many": {
			func(s *export.Sheet) {
				s.Steps = append([]export.Step{ring(35, 20, 1)}, s.Steps...)
			},
			[]string{"holes: left.crank: a hole too many near (35.0, 20.0): take it away"},
		},
		"a hole in the scrap": {
			func(s *export.Sheet) { s.Steps = append(s.Steps, ring(120, 130, 3)) },
			[]string{"holes: a hole near (120.0, 130.0) that is in no part"},
		},
		"a hole across the edge": {
			func(s *export.Sheet) { moved(&s.Steps[crankB], shift(6, 0)) },
			[]string{"the cuts of lines ", " touch or cross near ("},
		},
		"a hole without a wall": {
			func(s *export.Sheet) { moved(&s.Steps[crankB], shift(4.85, 0)) },
			[]string{"walls: the cuts of lines ", " leave no wall between them near ("},
		},
		"an outside that crosses itself": {
			func(s *export.Sheet) {
				o := s.Steps[frameEdge].Closed
				o[1], o[3] = o[3], o[1]
			},
			[]string{"cuts closed: a cut near (195.0, 106.2) that crosses itself near ("},
		},
		"a cut that encloses nothing": {
			func(s *export.Sheet) {
				s.Steps = append(s.Steps, export.Step{Op: export.CutOutside, Closed: outline.Polygon(pt(120, 130), pt(130, 130))})
			},
			[]string{"cuts closed: a cut near (125.0, 130.0) that encloses nothing: draw it as one plain loop"},
		},
		"engraving across a hole": {
			func(s *export.Sheet) { moved(&s.Steps[crankMark], shift(-7, 0)) },
			[]string{"engraving: a stroke runs across the cut of line "},
		},
		"engraving near a hole": {
			func(s *export.Sheet) { moved(&s.Steps[crankMark], shift(-5.5, 0)) },
			[]string{"engraving: a stroke comes too near to the cut of line ", "(expected 0.5000 mm, found "},
		},
		"engraving in the scrap": {
			func(s *export.Sheet) { moved(&s.Steps[plateMark], shift(-50, 100)) },
			[]string{"engraving: a stroke near (", " that is on no part: take it away"},
		},
		"engraving left out": {
			func(s *export.Sheet) { s.Steps = append(s.Steps[:plateMark:plateMark], s.Steps[plateMark+1:]...) },
			[]string{`engraving: left.plate: its mark "LEFT.PLATE" is not as it should be (expected 1 stroke, `},
		},
		"everything in inches": {
			func(s *export.Sheet) {
				for i, step := range s.Steps {
					for j := range step.Closed {
						s.Steps[i].Closed[j].Point = step.Closed[j].Scale(1 / 25.4)
					}
					for j := range step.Open {
						s.Steps[i].Open[j].Point = step.Open[j].Scale(1 / 25.4)
					}
				}
			},
			[]string{"margin: a cut too near", "parts: "},
		},
	} {
		t.Run(name, func(t *testing.T) {
			r := demo()
			c.edit(&r.sheet)
			report := check(t, r.write(t, false, nil))
			text := printed(t, report)
			if report.OK {
				t.Fatalf("passes:\n%s", text)
			}
			var lines []string
			for _, k := range report.Checks {
				for _, f := range k.Findings {
					s := f.String()
					if _, rest, ok := strings.Cut(s, ": "); ok && strings.HasPrefix(s, "clear3-1.dxf") {
						s = rest
					}
					lines = append(lines, k.Name+": "+s)
				}
			}
			all := strings.Join(lines, "\n")
			for _, want := range c.want {
				if !strings.Contains(all, want) {
					t.Errorf("no %q in\n%s", want, text)
				}
			}
		})
	}
}

// Edits of the text, with the hashes right.
func TestEditedTextFails(t *testing.T) {
	replace := func(old, new string) func(string) string {
		return func(s string) string {
			if !strings.Contains(s, old) {
				t.Fatalf("no %q in the drawing", old)
			}
			return strings.Replace(s, old, new, 1)
		}
	}
	for name, c := range map[string]struct {
		edit func(string) string
		want string
	}{
		"units of the header": {
			replace("$INSUNITS\n 70\n4\n", "$INSUNITS\n 70\n1\n"),
			"the unit of the drawing is wrong (expected millimetres ($INSUNITS 4), found inches): it would be cut at another size",
		},
		"no units": {replace("$INSUNITS\n 70\n4\n", "$INSUNITS\n 70\n0\n"), "found no unit)"},
		"a layer of one's own": {
			replace("  8\nCUT-INSIDE\n", "  8\nholes\n"),
			`layer "holes" says nothing to the beam (expected ENGRAVE, CUT-INSIDE or CUT-OUTSIDE, found 1 entity on it)`,
		},
		"a layer switched off": {replace(" 62\n34\n", " 62\n-34\n"), "layer CUT-INSIDE is switched off"},
		"text": {
			replace("ENTITIES\n", "ENTITIES\n  0\nTEXT\n  8\nENGRAVE\n 10\n50.0\n 20\n5.0\n 40\n3.0\n  1\nhello\n"),
			`TEXT on layer "ENGRAVE": not a line, arc, circle or polyline: take it away, or draw it with lines`,
		},
		"a cut opened": {
			replace("AcDbPolyline\n 90\n4\n 70\n1\n", "AcDbPolyline\n 90\n4\n 70\n0\n"),
			"an open LWPOLYLINE on layer CUT-OUTSIDE near (",
		},
		"cut short":  {func(s string) string { return s[:2*len(s)/3] }, "the file ends without EOF: it is cut short"},
		"garbage":    {func(string) string { return "\x00\xff garbage" }, "is not a group code"},
		"nothing":    {func(string) string { return "" }, "the file is empty"},
		"not number": {replace(" 40\n2.15\n", " 40\n2,15\n"), `"2,15" is not a number`},
	} {
		t.Run(name, func(t *testing.T) {
			report := check(t, demo().write(t, true, c.edit))
			text := printed(t, report)
			if report.OK || !strings.Contains(text, c.want) {
				t.Errorf("no %q in\n%s", c.want, text)
			}
			if strings.Contains(text, "was changed") {
				t.Errorf("the hash was meant to be right:\n%s", text)
			}
			if !strings.Contains(text, "do not cut these files") {
				t.Errorf("no verdict:\n%s", text)
			}
		})
	}
}

func TestFolderIsCompared(t *testing.T) {
	for name, c := range map[string]struct {
		files func() fstest.MapFS
		want  string
	}{
		"a space added": {
			func() fstest.MapFS {
				return demo().write(t, false, func(s string) string { return strings.Replace(s, "AC1015", "AC1015 ", 1) })
			},
			"clear3-1.dxf: was changed after it was written (expected ",
		},
		"a digit changed": {
			func() fstest.MapFS {
				return demo().write(t, false, func(s string) string { return strings.Replace(s, "ANSI_1252", "ANSI_1251", 1) })
			},
			"clear3-1.dxf: was changed after it was written (expected SHA-256 ",
		},
		"a file missing": {
			func() fstest.MapFS {
				f := demo().write(t, false, nil)
				delete(f, "clear3-1.dxf")
				return f
			},
			"clear3-1.dxf: is missing: write the files anew",
		},
		"an old drawing left behind": {
			func() fstest.MapFS {
				f := demo().write(t, false, nil)
				f["old/clear3-2.DXF"] = f["clear3-1.dxf"]
				return f
			},
			"old/clear3-2.DXF: is not of this run: take it away, lest it be cut as well",
		},
		"notes are nobody's business": {
			func() fstest.MapFS {
				f := demo().write(t, false, nil)
				f["notes.txt"] = &fstest.MapFile{Data: []byte("laser on Tuesday")}
				return f
			},
			"agree with the linkage",
		},
		"another kerf": {
			func() fstest.MapFS {
				r := demo()
				r.manifest.Stock[0].Kerf = 0.25
				return r.write(t, false, nil)
			},
			"left.crank, hole A: is too large by 0.0500 mm",
		},
		"another linkage": {
			func() fstest.MapFS {
				r := demo()
				r.manifest.Parts[2].Lengths[0].MM = 80.002
				return r.write(t, false, nil)
			},
			"rocker: A-B differs from the linkage by 0.0020 mm (expected 80.0020 mm, found 80.0000 mm)",
		},
	} {
		t.Run(name, func(t *testing.T) {
			text := printed(t, check(t, c.files()))
			if !strings.Contains(text, c.want) {
				t.Errorf("no %q in\n%s", c.want, text)
			}
		})
	}
}
