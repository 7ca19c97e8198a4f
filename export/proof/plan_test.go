package proof_test

import (
	"bytes"
	"crypto/sha256"
	"encoding/hex"
	"fmt"
	"math"
	"testing"
	"testing/fstest"

	"pgregory.net/rapid"

	"pinwright/export"
	"pinwright/export/dxf"
	"pinwright/export/manifest"
	"pinwright/export/proof"
	"pinwright/kerf"
	"pinwright/parts"
	"pinwright/parts/linkage"
	"pinwright/parts/outline"
)

// Parts on the way they go in a run: finished region, cut path by kerf, placed, written, read back,
// proved. Here the contours come from the geometry and the beam from kerf; spiders have inside corners,
// bores are round, hexagonal, flatted or slots, and the beam is anything that is sold.
func TestFromPartToProof(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		beam := kerf.Beam{Width: rapid.SampledFrom([]float64{0, 0.08, 0.18, 0.2, 0.45}).Draw(t, "kerf")}
		m := manifest.Manifest{
			Format: manifest.Format, Job: manifest.Job{Name: "random"},
			Stock:  []manifest.Stock{{Name: "ply", Thickness: 4, Measured: 3.8, Margin: 5, Web: 3, Kerf: beam.Width}},
			Sheets: []manifest.Sheet{{Name: "ply-1", Drawing: "ply-1.dxf", Stock: "ply", Width: 1000, Height: 400}},
		}
		sheet := export.Sheet{Name: "ply-1", Width: 1000, Height: 400}
		for i := range rapid.IntRange(1, 4).Draw(t, "parts") {
			part, link := spider(t, fmt.Sprint("part-", i))
			var names []string
			for _, h := range part.Holes {
				names = append(names, h.Name)
			}
			cut, err := kerf.Compensate(part.Name, part.Region, names, beam)
			if err != nil {
				t.Fatal(err)
			}
			finished, err := kerf.Finished(cut, beam)
			if err != nil {
				t.Fatal(err)
			}
			at := outline.Place(rapid.Float64Range(-4, 4).Draw(t, "angle"), false, pt(130+240*float64(i), 200))
			sheet.Steps = append(sheet.Steps, export.Piece{Part: part.Name, Outside: cut.Outside, Inside: cut.Inside}.Place(at)...)
			entry, err := manifest.NewPart(part, finished)
			if err != nil {
				t.Fatal(err)
			}
			entry.Sheet, entry.Place = "ply-1", manifest.PlacementOf(at)
			entry.Lengths = manifest.LinkLengths(link, entry)
			if len(entry.Lengths) != len(link.Lengths) {
				t.Fatalf("%d lengths of %d", len(entry.Lengths), len(link.Lengths))
			}
			m.Parts = append(m.Parts, entry)
			m.Sheets[0].Parts++
		}
		var drawing, text bytes.Buffer
		if err := dxf.Write(&drawing, sheet, dxf.Options{}); err != nil {
			t.Fatal(err)
		}
		sum := sha256.Sum256(drawing.Bytes())
		m.Files = []manifest.File{{Name: "ply-1.dxf", Size: int64(drawing.Len()), SHA256: hex.EncodeToString(sum[:])}}
		if err := manifest.Encode(&text, m); err != nil {
			t.Fatal(err)
		}
		report := check(t, fstest.MapFS{manifest.Name: {Data: text.Bytes()}, "ply-1.dxf": {Data: drawing.Bytes()}})
		if !report.OK || report.Parts != len(m.Parts) {
			t.Fatal(printed(t, report))
		}
		for _, f := range []string{"centre distances", "hole diameters"} {
			if figure := figureOf(report, f); figure != nil && figure.Value > 1e-8 {
				t.Fatalf("%s: %+v", f, figure)
			}
		}
	})
}

// figureOf is the figure of a check, nil when it has none.
func figureOf(r proof.Report, name string) *proof.Figure {
	for _, c := range r.Checks {
		if c.Name == name {
			return c.Figure
		}
	}
	return nil
}

// spider is arms from a middle to its joints, with a bore of any kind at each, and the link that it is.
func spider(t *rapid.T, name string) (parts.Part, linkage.Link) {
	n := rapid.IntRange(2, 4).Draw(t, "arms")
	p := parts.Part{Name: name, Link: name, Stock: "ply"}
	l := linkage.Link{Name: name}
	var at []outline.Point
	var arms []outline.Region
	turn := rapid.Float64Range(0, 6).Draw(t, "turn")
	for i := range n {
		angle := turn + (float64(i)+rapid.Float64Range(-0.1, 0.1).Draw(t, "spread"))*2*math.Pi/float64(n)
		at = append(at, outline.Polar(rapid.Float64Range(40, 90).Draw(t, "arm"), angle))
		arms = append(arms, outline.Region{Outer: outline.Capsule(pt(0, 0), at[i], 9)})
	}
	united := outline.Union(arms...)
	if len(united) != 1 {
		t.Fatalf("%d pieces", len(united))
	}
	p.Region = united[0]
	for i, c := range at {
		joint := string(rune('A' + i))
		h := parts.Hole{Name: joint, Kind: parts.PinHole, Joint: joint, Centre: c}
		turned := outline.Place(c.Angle(), false, c)
		var o outline.Outline
		switch rapid.IntRange(0, 2).Draw(t, "bore") {
		case 0:
			h.Diameter = rapid.Float64Range(2, 10).Draw(t, "diameter")
			o = outline.CircleHole(c, h.Diameter/2)
		case 1:
			h.Kind = parts.ShaftBore
			var corners []outline.Point
			for k := range 6 {
				corners = append(corners, outline.Polar(4, float64(k)*math.Pi/3))
			}
			o = outline.Polygon(corners...).Transform(turned).Reverse()
		default:
			h.Kind = parts.ShaftBore
			round := outline.Region{Outer: outline.Circle(pt(0, 0), 3)}
			flat := outline.Region{Outer: outline.Rectangle(pt(-5, -5), pt(2.5, 5))}
			o = outline.Intersection([]outline.Region{round}, []outline.Region{flat})[0].Outer.Transform(turned).Reverse()
		}
		p.Holes = append(p.Holes, h)
		p.Region.Holes = append(p.Region.Holes, o)
		for j := range i {
			l.Lengths = append(l.Lengths, linkage.Length{A: string(rune('A' + j)), B: joint, MM: at[j].Dist(c)})
		}
	}
	slot := outline.Capsule(pt(-1.5, 0), pt(1.5, 0), 1).Reverse()
	p.Region.Holes = append(p.Region.Holes, slot)
	p.Holes = append(p.Holes, parts.Hole{Name: "slot", Kind: parts.PivotSlot, Joint: "S"})
	return p, l
}
