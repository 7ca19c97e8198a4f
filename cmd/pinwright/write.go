package main

import (
	"bytes"
	"errors"
	"io"
	"io/fs"
	"testing/fstest"

	"pinwright/export"
	"pinwright/export/dxf"
	"pinwright/export/files"
	"pinwright/export/list"
	"pinwright/export/pdf"
	"pinwright/export/svg"
)

// output says which files are wanted beside the usual ones.
type output struct {
	partFiles    bool // a DXF of every part
	letter       bool // papers on US Letter instead of A4
	decimalComma bool
}

// files writes everything into memory, the manifest last.
func (p plan) files(o output) ([]files.File, error) {
	var set []files.File
	add := func(name string, write func(w io.Writer) error) error {
		var b bytes.Buffer
		if err := write(&b); err != nil {
			return err
		}
		set = append(set, files.File{Name: name, Data: b.Bytes()})
		return nil
	}
	for _, s := range p.sheets {
		if err := p.sheetFiles(add, s); err != nil {
			return nil, err
		}
	}
	drawings := map[string]string{}
	if o.partFiles {
		for i, part := range p.parts {
			name := "parts/" + part.Name + ".dxf"
			drawings[part.Name] = name
			if err := add(name, func(w io.Writer) error { return dxf.Write(w, p.drawPart(i), dxf.Options{}) }); err != nil {
				return nil, err
			}
		}
	}
	lists := list.Options{DecimalComma: o.decimalComma}
	if err := errors.Join(
		add("parts.csv", func(w io.Writer) error { return list.Parts(w, p.partRows(), lists) }),
		add("hardware.csv", func(w io.Writer) error { return list.Hardware(w, p.hardwareRows(), lists) }),
		add("path.csv", func(w io.Writer) error { return list.Path(w, pathTable(p.job, p.motion.cycle), lists) }),
	); err != nil {
		return nil, err
	}
	format := pdf.A4
	if o.letter {
		format = pdf.Letter
	}
	papers, err := p.papers(format)
	if err != nil {
		return nil, err
	}
	pictures, err := p.pictures()
	if err != nil {
		return nil, err
	}
	set = append(append(set, papers), pictures...)
	m, err := p.record(set, drawings)
	if err != nil {
		return nil, err
	}
	last, err := encode(m)
	if err != nil {
		return nil, err
	}
	return append(set, last), nil
}

// sheetFiles writes a sheet in all its forms. A sheet larger than a PDF page has no PDF.
func (p plan) sheetFiles(add func(string, func(io.Writer) error) error, s export.Sheet) error {
	err := add(s.Name+".pdf", func(w io.Writer) error { return pdf.WriteSheet(w, s, pdf.Options{}) })
	if err != nil && !errors.Is(err, pdf.ErrTooLarge) {
		return err
	}
	return errors.Join(
		add(s.Name+".dxf", func(w io.Writer) error { return dxf.Write(w, s, dxf.Options{}) }),
		add(s.Name+".svg", func(w io.Writer) error { return svg.Write(w, s, svg.Options{}) }),
	)
}

// inMemory shows a set of files as a file system, so that it can be proved before it is on the disk.
func inMemory(set []files.File) fs.FS {
	m := fstest.MapFS{}
	for _, f := range set {
		m[f.Name] = &fstest.MapFile{Data: f.Data}
	}
	return m
}
