package dxf

import (
	"io"
	"slices"
	"strings"

	"pinwright/parts/outline"
)

// Read reads an ASCII drawing of any version from R12 on.
//
// It is strict: a file that is cut short, a number that is none, a section twice, an entity without
// its figures, or a group code that an entity of ours cannot have is an *Error with the line. What is
// drawn but is not a line, arc, circle or polyline in the plane of the sheet comes back in
// Drawing.Others, so that nothing is drawn that the caller does not hear of. An arc becomes a path
// with a bulge, a circle two half circles; polylines keep their vertices to the last bit. Angles in
// the file are degrees, as DXF has them.
//
// Blocks are not expanded: an INSERT is one of the Others. Read never panics; files are capped at
// 256 MB, a million entities and four million vertices.
func Read(r io.Reader) (Drawing, error) {
	s, err := newScanner(r)
	if err != nil {
		return Drawing{}, err
	}
	d := Drawing{Extents: outline.EmptyBox(), Limits: outline.EmptyBox()}
	var seen []string
	for {
		p, err := s.next()
		if err != nil {
			return Drawing{}, err
		}
		if p.code != 0 {
			return Drawing{}, s.fail(p.line, "group code %d stands between sections; a DXF begins with 0, SECTION", p.code)
		}
		if p.value == "EOF" {
			break
		}
		if p.value != "SECTION" {
			return Drawing{}, s.fail(p.line+1, "%s where a SECTION or EOF belongs", quote(p.value))
		}
		name, err := s.next()
		if err != nil {
			return Drawing{}, err
		}
		if name.code != 2 {
			return Drawing{}, s.fail(name.line, "a section without a name")
		}
		if slices.Contains(seen, name.value) {
			return Drawing{}, s.fail(name.line+1, "section %s is there twice", quote(name.value))
		}
		seen = append(seen, name.value)
		if err := s.section(name.value, &d); err != nil {
			return Drawing{}, err
		}
	}
	if len(strings.TrimSpace(string(s.rest))) > 0 {
		return Drawing{}, s.fail(s.line+1, "something follows EOF")
	}
	if !slices.Contains(seen, "ENTITIES") {
		return Drawing{}, s.fail(s.line, "the drawing has no ENTITIES section")
	}
	return d, nil
}

func (s *scanner) section(name string, d *Drawing) error {
	switch name {
	case "HEADER":
		return s.header(d)
	case "TABLES":
		return s.tables(d)
	case "BLOCKS":
		return s.blocks(d)
	case "ENTITIES":
		return s.entities(d)
	}
	for { // classes, objects, thumbnail: nothing is drawn there
		p, err := s.next()
		if err != nil {
			return err
		}
		if p.code == 0 && p.value == "ENDSEC" {
			return nil
		}
		if p.code == 0 && (p.value == "SECTION" || p.value == "EOF") {
			return s.fail(p.line+1, "section %s does not end before %s", quote(name), p.value)
		}
	}
}

// versions are the values of $ACADVER that are ASCII DXF as we know it.
var versions = []string{
	"AC1009", "AC1012", "AC1014", "AC1015", "AC1018", "AC1021", "AC1024", "AC1027", "AC1032",
}

func (s *scanner) header(d *Drawing) error {
	variable := ""
	for {
		p, err := s.next()
		if err != nil {
			return err
		}
		switch {
		case p.code == 0 && p.value == "ENDSEC":
			return nil
		case p.code == 0:
			return s.fail(p.line+1, "%s in the header", quote(p.value))
		case p.code == 9:
			variable = p.value
		default:
			err = s.variable(variable, p, d)
		}
		if err != nil {
			return err
		}
	}
}

// variable reads one value of a header variable that matters to us.
func (s *scanner) variable(name string, p pair, d *Drawing) error {
	corner := func(low bool, box *[4]float64) error {
		v, err := s.number(p)
		if err != nil {
			return err
		}
		i := 0
		if !low {
			i = 2
		}
		switch p.code {
		case 10:
			box[i] = v
		case 20:
			box[i+1] = v
		}
		return nil
	}
	extents := [4]float64{d.Extents.Min.X, d.Extents.Min.Y, d.Extents.Max.X, d.Extents.Max.Y}
	limits := [4]float64{d.Limits.Min.X, d.Limits.Min.Y, d.Limits.Max.X, d.Limits.Max.Y}
	var err error
	switch name {
	case "$ACADVER":
		d.Version = strings.TrimSpace(p.value)
		if !slices.Contains(versions, d.Version) {
			return s.fail(p.line+1, "version %s is not known; save the drawing as R2000 (AC1015)", quote(p.value))
		}
	case "$INSUNITS":
		var n int
		n, err = s.integer(p)
		d.Units = Units(n)
	case "$MEASUREMENT":
		var n int
		n, err = s.integer(p)
		d.Metric = n == 1
	case "$EXTMIN", "$EXTMAX":
		err = corner(name == "$EXTMIN", &extents)
		d.Extents.Min.X, d.Extents.Min.Y, d.Extents.Max.X, d.Extents.Max.Y = extents[0], extents[1], extents[2], extents[3]
	case "$LIMMIN", "$LIMMAX":
		err = corner(name == "$LIMMIN", &limits)
		d.Limits.Min.X, d.Limits.Min.Y, d.Limits.Max.X, d.Limits.Max.Y = limits[0], limits[1], limits[2], limits[3]
	}
	return err
}

// tables reads the layer table and passes over the others.
func (s *scanner) tables(d *Drawing) error {
	var at *Layer // the layer whose record is being read
	keep := func() {
		if at != nil {
			d.Layers = append(d.Layers, *at)
			at = nil
		}
	}
	for {
		p, err := s.next()
		if err != nil {
			return err
		}
		if p.code == 0 {
			keep()
			switch p.value {
			case "ENDSEC":
				return nil
			case "SECTION", "EOF":
				return s.fail(p.line+1, "the tables do not end before %s", p.value)
			case "LAYER":
				at = &Layer{Line: p.line, Colour: 7}
			}
			continue
		}
		if at == nil {
			continue
		}
		switch p.code {
		case 2:
			at.Name = p.value
		case 62:
			at.Colour, err = s.integer(p)
			if at.Colour < 0 { // the sign switches a layer off
				at.Colour, at.Off = -at.Colour, true
			}
		case 70:
			var flags int
			flags, err = s.integer(p)
			at.Off = at.Off || flags&1 != 0
		}
		if err != nil {
			return err
		}
		if len(d.Layers) > maxEntities {
			return s.fail(p.line, "more than %d layers", maxEntities)
		}
	}
}

// blocks passes over the definitions of blocks, which are drawn only where they are inserted. What
// stands in the block of the model itself is drawn, so it is reported.
func (s *scanner) blocks(d *Drawing) error {
	model, fresh := false, false
	for {
		p, err := s.next()
		if err != nil {
			return err
		}
		switch {
		case p.code == 0 && p.value == "ENDSEC":
			return nil
		case p.code == 0 && (p.value == "SECTION" || p.value == "EOF"):
			return s.fail(p.line+1, "the blocks do not end before %s", p.value)
		case p.code == 0 && p.value == "BLOCK":
			fresh = true
		case p.code == 0 && p.value == "ENDBLK":
			model, fresh = false, false
		case p.code == 0:
			fresh = false
			if model {
				if err := s.other(d, Other{Type: p.value, Why: "stands in a block", Line: p.line}); err != nil {
					return err
				}
			}
		case p.code == 2 && fresh:
			model = strings.EqualFold(p.value, "*Model_Space") || strings.EqualFold(p.value, "$MODEL_SPACE")
		}
	}
}

func (s *scanner) other(d *Drawing, o Other) error {
	if len(d.Others)+len(d.Entities) >= maxEntities {
		return s.fail(o.Line, "more than %d entities", maxEntities)
	}
	d.Others = append(d.Others, o)
	return nil
}
