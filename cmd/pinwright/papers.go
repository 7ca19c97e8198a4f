package main

import (
	"bytes"
	"fmt"
	"strconv"
	"strings"

	"pinwright/export/files"
	"pinwright/export/pdf"
	"pinwright/export/picture"
	"pinwright/kerf"
)

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
	_, below := format.Below(0)
	add(pdf.Heading("Sheets"))
	for i, s := range p.sheets {
		pic, err := picture.Layout(s, width, below)
		if err != nil {
			return files.File{}, err
		}
		add(pdf.Drawing{Picture: pic, Caption: fmt.Sprintf("%s. File %s. Parts fill %.0f %% of the sheet.", s.Title, s.Name, 100*p.layout.Sheets[i].Fill)})
	}
	add(pdf.Heading("Holes"), pdf.Text("Finished diameters, and what is drawn: the path of the beam's middle, kerf taken off."), p.holeTable())
	add(pdf.Heading("Hardware"), p.hardwareTable())
	scene := p.scene()
	front, err := picture.FrontView(scene, width, below)
	if err != nil {
		return files.File{}, err
	}
	planes, err := picture.Planes(scene, width, height)
	if err != nil {
		return files.File{}, err
	}
	add(pdf.Heading("What lies where"))
	add(pdf.Drawing{Picture: front, Caption: p.pose() + " The highest plane is nearest; joints of the frame are filled."})
	for _, pic := range planes {
		add(pdf.Drawing{Picture: pic, Caption: "Each plane with its parts, the others in grey; heights are those of the side view. " + p.pose()})
	}
	order, err := p.assembling()
	if err != nil {
		return files.File{}, err
	}
	kits := p.sideKits(order)
	_, below = format.Below(sideKeyLines)
	sides, err := picture.SideViews(kits, p.sideLevels(), width, below)
	if err != nil {
		return files.File{}, err
	}
	add(pdf.Heading("What each pin carries"), pdf.Text(sideKey))
	for _, pic := range sides {
		add(pdf.Drawing{Picture: pic, Caption: pic.Title + "."})
	}
	apart, err := picture.Exploded(p.explodedKits(order), width, height)
	if err != nil {
		return files.File{}, err
	}
	add(pdf.Heading("Putting it together"), pdf.Text(p.assemblyIntro()), assemblyTable(order))
	for _, pic := range apart {
		add(pdf.Drawing{Picture: pic, Caption: "Numbers are those of the steps. " + pic.Title + "."})
	}
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

// holeTable lists every kind of hole once: of round ones the diameter, of others how wide they are where
// they are narrowest, or their extent.
func (p plan) holeTable() pdf.Table {
	t := pdf.Table{Columns: []pdf.Column{{Head: "joint"}, {Head: "part"}, {Head: "for"}, {Head: "finished, mm", Right: true}, {Head: "drawn, mm", Right: true}}}
	seen := map[string]bool{}
	for i, part := range p.parts {
		s, _ := stockNamed(p.job, part.Stock)
		for k, h := range part.Holes {
			size, path := fixed(h.Diameter, 3), fixed(drawn(p.cuts[i], k), 3)
			if h.Diameter == 0 {
				box, cut := p.parts[i].Region.Holes[k].Bounds(), p.cuts[i].Inside[k].Bounds()
				size = fixed(box.Width(), 2) + " x " + fixed(box.Height(), 2)
				path = fixed(cut.Width(), 2) + " x " + fixed(cut.Height(), 2)
				if h.Width > 0 {
					size = fixed(h.Width, 3) + " wide"
				}
			}
			row := []string{h.Name, part.Link, string(h.Kind), size, path}
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
