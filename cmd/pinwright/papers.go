package main

import (
	"bytes"
	"fmt"
	"slices"
	"strconv"
	"strings"

	"pinwright/export/files"
	"pinwright/export/pdf"
	"pinwright/export/picture"
	"pinwright/export/svg"
	"pinwright/kerf"
	"pinwright/parts/material"
	"pinwright/parts/stack"
)

// cautions are what must be read before the laser is switched on and before the thing moves.
func (p plan) cautions() []string {
	out := []string{
		"The beam can blind and burn, and the material can catch fire: follow the laser's manual, local codes and the people in charge of it. Wear the eye protection they name, keep lids and interlocks closed, stay with the laser while it works and have the right extinguisher at hand.",
		"Cutting gives off fumes: cut only with extraction running. Cut only material that you know; chlorinated plastics such as PVC must never go in.",
		"A moving linkage pinches and shears: keep fingers away, guard it where others can reach it, and switch the drive off before you touch it.",
		"Sizes and strengths here are for models and prototypes, not for anything that carries people or that can hurt someone when it fails; ask a qualified person there.",
	}
	for _, s := range p.job.Stock {
		m, err := material.Lookup(s.Material)
		if err != nil {
			continue
		}
		for _, c := range m.Cautions {
			if line := m.Name + ": " + c; !slices.Contains(out, line) {
				out = append(out, line)
			}
		}
		if m.Note != "" {
			if line := s.Name + ": " + m.Note; !slices.Contains(out, line) {
				out = append(out, line)
			}
		}
	}
	return out
}

// pictureWidth is the width of the pictures that go beside the cut files, mm.
const pictureWidth = 180

// pictures draws the first sheet of every stock and the pins of one copy, as files.
func (p plan) pictures() ([]files.File, error) {
	var out []files.File
	add := func(name string, pic picture.Picture, err error) error {
		if err != nil {
			return err
		}
		var b bytes.Buffer
		if err := svg.WritePicture(&b, pic); err != nil {
			return err
		}
		out = append(out, files.File{Name: name, Data: b.Bytes()})
		return nil
	}
	for _, s := range p.sheets {
		pic, err := picture.Layout(s, pictureWidth, 1000)
		if err := add("pictures/"+s.Name+".svg", pic, err); err != nil {
			return nil, err
		}
	}
	pic, err := picture.SideView(p.sideKits(), p.sideLevels(), pictureWidth, 1000)
	return out, add("pictures/side.svg", pic, err)
}

// sideKits are the kits of the first copy as pieces to be drawn; all copies carry the same.
func (p plan) sideKits() []picture.Kit {
	var out []picture.Kit
	for _, k := range p.kits {
		if k.Copy != p.job.Copies[0].Name {
			continue
		}
		kit := picture.Kit{Name: k.Joint, Text: k.Through.Designation}
		kit.Pieces = append(kit.Pieces, picture.Piece{
			Kind: picture.ShankPiece, From: k.Through.From, To: k.Through.To, Outer: k.Through.Diameter,
		})
		for _, e := range k.Elements {
			kit.Pieces = append(kit.Pieces, pieceOf(e, k.Through.Diameter))
		}
		out = append(out, kit)
	}
	return out
}

// pieceOf draws an element of a kit. Parts are drawn as wide as four times the pin.
func pieceOf(e stack.Element, pin float64) picture.Piece {
	piece := picture.Piece{Name: e.What, From: e.From, To: e.To, Outer: e.Diameter, Inner: pin}
	switch e.Kind {
	case stack.HeadElement:
		piece.Kind, piece.Inner = picture.HeadPiece, 0
		piece.Name = ""
	case stack.NutElement:
		piece.Kind = picture.NutPiece
	case stack.WasherElement:
		piece.Kind = picture.WasherPiece
	case stack.SpacerElement, stack.CollarElement:
		piece.Kind = picture.SpacerPiece
	case stack.BearingElement:
		piece.Kind = picture.SeatPiece
	default:
		piece.Kind, piece.Name, piece.Outer = picture.PartPiece, e.Part, 4*pin
	}
	return piece
}

func (p plan) sideLevels() []picture.Level {
	var out []picture.Level
	for _, l := range p.levels {
		out = append(out, picture.Level{Name: "plane " + strconv.Itoa(l.Plane), From: l.From, To: l.To})
	}
	return out
}

// papers is what goes to the workshop on paper.
func (p plan) papers(format pdf.Format) (files.File, error) {
	title := p.job.Title
	if title == "" {
		title = p.job.Name
	}
	doc := pdf.Papers{Title: title, Footer: fmt.Sprintf("%s, job %s", p.job.Name, p.sum[:12]), Format: format}
	add := func(b ...pdf.Block) { doc.Blocks = append(doc.Blocks, b...) }
	add(pdf.Text(p.summary()), pdf.Cautions(p.cautions()))
	width, height := format.Room()
	add(pdf.Heading("Sheets"))
	for i, s := range p.sheets {
		pic, err := picture.Layout(s, width, height)
		if err != nil {
			return files.File{}, err
		}
		add(pdf.Drawing{Picture: pic, Caption: fmt.Sprintf("%s. File %s. Parts fill %.0f %% of the sheet.", s.Title, s.Name, 100*p.layout.Sheets[i].Fill)})
	}
	add(pdf.Heading("Holes"), pdf.Text("Finished diameters, and what is drawn: the path of the beam's middle, kerf taken off."), p.holeTable())
	add(pdf.Heading("Hardware"), p.hardwareTable())
	add(pdf.Heading("What each pin carries"))
	pics, err := picture.SideViews(p.sideKits(), p.sideLevels(), width, height)
	if err != nil {
		return files.File{}, err
	}
	for _, pic := range pics {
		add(pdf.Drawing{Picture: pic, Caption: pic.Title})
	}
	add(p.kitNotes()...)
	var b bytes.Buffer
	if err := pdf.WritePapers(&b, doc); err != nil {
		return files.File{}, err
	}
	return files.File{Name: "papers.pdf", Data: b.Bytes()}, nil
}

// summary says in words what the job comes to.
func (p plan) summary() string {
	l := p.motion.mechanism.Linkage()
	lines := []string{
		fmt.Sprintf("%d parts on %d sheets; %d links and %d joints in each of %d copies.",
			len(p.parts), len(p.sheets), len(l.Links), len(l.Joints), len(p.job.Copies)),
	}
	for _, f := range p.motion.report.Set.Paths {
		lines = append(lines, fmt.Sprintf("%s: stride %.1f mm, lift %.1f mm.", f.Joint, f.Stride, f.Lift))
	}
	for _, s := range p.job.Stock {
		kerfed := fmt.Sprintf("paths are compensated for a kerf of %g mm (full width): do not compensate again", s.Kerf)
		if s.ByShop {
			kerfed = "paths show finished sizes: the shop compensates"
		}
		lines = append(lines, fmt.Sprintf("%s: %s, %g mm nominal, %g mm measured; %s.", s.Name, s.Material, s.Thickness, s.Measured, kerfed))
	}
	return strings.Join(lines, "\n")
}

// holeTable lists every kind of round hole once.
func (p plan) holeTable() pdf.Table {
	t := pdf.Table{Columns: []pdf.Column{{Head: "joint"}, {Head: "part"}, {Head: "for"}, {Head: "finished, mm", Right: true}, {Head: "drawn, mm", Right: true}}}
	seen := map[string]bool{}
	for i, part := range p.parts {
		s, _ := stockNamed(p.job, part.Stock)
		for k, h := range part.Holes {
			if h.Diameter == 0 {
				continue
			}
			row := []string{h.Name, part.Link, string(h.Kind), fixed(h.Diameter, 3), fixed(drawn(p.cuts[i], k), 3)}
			key := strings.Join(append([]string{s.Name}, row...), "|")
			if !seen[key] {
				seen[key] = true
				t.Rows = append(t.Rows, row)
			}
		}
	}
	return t
}

// drawn is the diameter of the k-th inside path, 0 if it is not round.
func drawn(c kerf.Cut, k int) float64 {
	_, r, ok := c.Inside[k].AsCircle()
	if !ok {
		return 0
	}
	return 2 * r
}

func fixed(v float64, digits int) string { return strconv.FormatFloat(v, 'f', digits, 64) }

func (p plan) hardwareTable() pdf.Table {
	t := pdf.Table{Columns: []pdf.Column{{Head: "to buy"}, {Head: "length, mm", Right: true}, {Head: "need", Right: true}, {Head: "spare", Right: true}, {Head: "buy", Right: true}, {Head: "packs", Right: true}, {Head: "for joints"}, {Head: "note"}}}
	for _, l := range p.lines {
		packs, length := "", ""
		if l.Length > 0 {
			length = strconv.FormatFloat(l.Length, 'f', -1, 64)
		}
		if l.Packs > 0 {
			packs = fmt.Sprintf("%d of %d", l.Packs, l.Pack)
		}
		t.Rows = append(t.Rows, []string{
			l.Designation, length, strconv.Itoa(l.Need), strconv.Itoa(l.Spare), strconv.Itoa(l.Buy), packs, strings.Join(l.Joints, " "), l.Note,
		})
	}
	return t
}

// kitNotes are the sentences that go with the pins, each once.
func (p plan) kitNotes() []pdf.Block {
	var out []pdf.Block
	for _, k := range p.kits {
		if k.Copy != p.job.Copies[0].Name {
			continue
		}
		for _, n := range k.Notes {
			out = append(out, pdf.Text(k.Joint+": "+n))
		}
	}
	return out
}
