package main

import (
	"bytes"
	"crypto/sha256"
	"encoding/hex"
	"fmt"

	"pinwright/export/files"
	"pinwright/export/manifest"
	"pinwright/kerf"
	"pinwright/parts"
	"pinwright/parts/job"
	"pinwright/parts/linkage"
	"pinwright/parts/material"
	"pinwright/parts/outline"
)

// record states everything that was decided, and what the finished parts must measure. The files are
// all of the run but the manifest.
func (p plan) record(set []files.File, drawings map[string]string) (manifest.Manifest, error) {
	l := p.motion.mechanism.Linkage()
	m := manifest.Manifest{
		Format:  manifest.Format,
		Program: "pinwright " + version,
		Job:     manifest.Job{Name: p.job.Name, Title: p.job.Title, SHA256: p.sum},
		Linkage: manifest.Linkage{
			Joints: len(l.Joints), Links: len(l.Links), Mobility: p.motion.report.Mobility,
			Drive: manifest.Drive{
				Link: l.Drive.Link, From: degrees(l.Drive.From), To: degrees(l.Drive.To), Full: p.motion.report.Full,
			},
		},
		Cautions: p.cautions(),
	}
	for _, t := range p.motion.report.Set.Transmissions {
		m.Linkage.Transmission = append(m.Linkage.Transmission, manifest.Transmission{
			Joint: t.Joint, Least: degrees(t.Min), Most: degrees(t.Max),
		})
	}
	for _, s := range p.job.Stock {
		m.Stock = append(m.Stock, manifest.Stock{
			Name: s.Name, Material: s.Material, Thickness: s.Thickness, Measured: s.Measured, Margin: s.Margin,
			Web: s.Web, Kerf: s.Kerf, ByShop: s.ByShop, MarkClear: parts.MarkClear,
		})
	}
	count := make([]int, len(p.layout.Sheets))
	for _, at := range p.layout.Placements {
		count[at.Sheet]++
	}
	for i, s := range p.layout.Sheets {
		sheet := p.sheets[i]
		m.Sheets = append(m.Sheets, manifest.Sheet{
			Name: sheet.Name, Drawing: sheet.Name + ".dxf", Stock: p.job.Stock[s.Stock].Name,
			Width: sheet.Width, Height: sheet.Height, Parts: count[i], Fill: s.Fill,
		})
	}
	for i, part := range p.parts {
		row, err := p.partRecord(i)
		if err != nil {
			return m, err
		}
		row.Drawing = drawings[part.Name]
		m.Parts = append(m.Parts, row)
	}
	for _, f := range set {
		sum := sha256.Sum256(f.Data)
		m.Files = append(m.Files, manifest.File{Name: f.Name, Size: int64(len(f.Data)), SHA256: hex.EncodeToString(sum[:])})
	}
	return m, nil
}

// partRecord states what part i must measure when it is cut, and where it lies.
func (p plan) partRecord(i int) (manifest.Part, error) {
	part := p.parts[i]
	s, _ := stockNamed(p.job, part.Stock)
	finished, err := kerf.Finished(p.cuts[i], beam(s))
	if err != nil {
		return manifest.Part{}, fmt.Errorf("%s: %w", part.Name, err)
	}
	row, err := manifest.NewPart(part, finished)
	if err != nil {
		return manifest.Part{}, err
	}
	for _, at := range p.layout.Placements {
		if at.Item == i {
			row.Sheet = p.sheets[at.Sheet].Name
			row.Place = manifest.PlacementOf(at.At)
		}
	}
	row.Mass = mass(s, part.Region)
	row.Mirror = mirrored(p.job, part.Copy)
	l := p.motion.mechanism.Linkage()
	for k, link := range l.Links {
		if link.Name != part.Link {
			continue
		}
		row.Feet = feet(p.job.Links[k], link, p.motion.mechanism, row.Mirror)
		row.Lengths = manifest.LinkLengths(link, row)
		return row, nil
	}
	row.Lengths = manifest.PivotLengths(l, row)
	return row, nil
}

// feet states the rounded toe of a link, in the frame of its part.
func feet(build job.Link, link linkage.Link, m *linkage.Mechanism, mirror bool) []manifest.Foot {
	if build.Foot == nil {
		return nil
	}
	for k, pin := range link.Pins {
		if pin != build.Foot.At {
			continue
		}
		at := m.LinkFrame(link.Name)[k]
		if mirror {
			at = parts.Mirrored().Apply(at)
		}
		return []manifest.Foot{{Joint: pin, Centre: manifest.Point(at), Radius: build.Foot.Radius}}
	}
	return nil
}

// mirrored tells whether the copy of this name is built as a mirror image.
func mirrored(j job.Job, name string) bool {
	for _, c := range j.Copies {
		if c.Name == name {
			return c.Mirror
		}
	}
	return false
}

// mass estimates what a part weighs, g; 0 when the density is not known.
func mass(s job.Stock, r outline.Region) float64 {
	m, err := material.Lookup(s.Material)
	if err != nil {
		return 0
	}
	const perCubicMillimetre = 1e-6 // g per mm3 for 1 kg/m3
	return r.Area() * s.Measured * m.Density.Value * perCubicMillimetre
}

// encode writes a manifest as a file of the run.
func encode(m manifest.Manifest) (files.File, error) {
	var b bytes.Buffer
	if err := manifest.Encode(&b, m); err != nil {
		return files.File{}, err
	}
	return files.File{Name: manifest.Name, Data: b.Bytes()}, nil
}
