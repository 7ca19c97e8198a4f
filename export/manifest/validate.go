package manifest

import (
	"errors"
	"fmt"
	"io/fs"
	"math"
	"strings"
)

// Validate says what in a manifest contradicts itself, all of it at once: a name used twice or never
// given, a figure that is not a number or negative, a length to a joint that the part does not show.
// Nil when it is sound.
func (m Manifest) Validate() error {
	v := &validator{}
	if m.Format != Format {
		v.add("format %d; this program reads format %d", m.Format, Format)
		return v.err() // the rest may mean something else
	}
	if m.Job.Name == "" {
		v.add("the job has no name")
	}
	if m.Job.SHA256 != "" {
		v.hash("the job", m.Job.SHA256)
	}
	files := map[string]bool{}
	for _, f := range m.Files {
		v.file(f, files)
	}
	stock := map[string]bool{}
	for _, s := range m.Stock {
		v.name("stock", s.Name, stock)
		v.positive("stock "+s.Name+": thickness", s.Thickness)
		v.positive("stock "+s.Name+": measured thickness", s.Measured)
		v.notNegative("stock "+s.Name+": margin, web, kerf and mark_clear", s.Margin, s.Web, s.Kerf, s.MarkClear)
	}
	sheets := map[string]string{} // to the stock
	names := map[string]bool{}
	drawings := map[string]bool{}
	for _, s := range m.Sheets {
		v.name("sheet", s.Name, names)
		if !stock[s.Stock] {
			v.add("sheet %s: stock %q is not listed", s.Name, s.Stock)
		}
		v.positive("sheet "+s.Name+": width", s.Width)
		v.positive("sheet "+s.Name+": height", s.Height)
		v.notNegative("sheet "+s.Name+": fill", s.Fill)
		v.drawing("sheet "+s.Name, s.Drawing, files, drawings)
		sheets[s.Name] = s.Stock
	}
	partNames := map[string]bool{}
	count := map[string]int{}
	for _, p := range m.Parts {
		v.name("part", p.Name, partNames)
		if of, ok := sheets[p.Sheet]; !ok {
			v.add("part %s: sheet %q is not listed", p.Name, p.Sheet)
		} else if of != p.Stock {
			v.add("part %s is of stock %q, but its sheet %s is of %q", p.Name, p.Stock, p.Sheet, of)
		}
		if p.Drawing != "" {
			v.drawing("part "+p.Name, p.Drawing, files, drawings)
		}
		count[p.Sheet]++
		v.part(p)
	}
	for _, s := range m.Sheets {
		if s.Parts != count[s.Name] {
			v.add("sheet %s says it carries %d parts; %d name it", s.Name, s.Parts, count[s.Name])
		}
	}
	return v.err()
}

// validator gathers what is wrong.
type validator struct{ found []error }

// most is how many faults are listed before the rest is left out.
const most = 20

func (v *validator) add(format string, args ...any) {
	v.found = append(v.found, fmt.Errorf(format, args...))
}

func (v *validator) err() error {
	if n := len(v.found); n > most {
		v.found = append(v.found[:most], fmt.Errorf("and %d more", n-most))
	}
	return errors.Join(v.found...)
}

func (v *validator) name(kind, name string, seen map[string]bool) {
	switch {
	case name == "":
		v.add("a %s has no name", kind)
	case seen[name]:
		v.add("%s %s is listed twice", kind, name)
	}
	seen[name] = true
}

func (v *validator) positive(what string, n float64) {
	if !(n > 0) || math.IsInf(n, 0) {
		v.add("%s is %g", what, n)
	}
}

func (v *validator) notNegative(what string, numbers ...float64) {
	for _, n := range numbers {
		if !(n >= 0) || math.IsInf(n, 0) {
			v.add("%s: %g", what, n)
			return
		}
	}
}

func (v *validator) finite(what string, numbers ...float64) {
	for _, n := range numbers {
		if math.IsNaN(n) || math.IsInf(n, 0) {
			v.add("%s: %g", what, n)
			return
		}
	}
}

func (v *validator) hash(what, hash string) {
	if len(hash) != 64 || strings.Trim(hash, "0123456789abcdef") != "" {
		v.add("%s: %q is not a SHA-256 of 64 lower-case hexadecimal digits", what, hash)
	}
}

func (v *validator) file(f File, seen map[string]bool) {
	if !fs.ValidPath(f.Name) || f.Name == "." || f.Name == Name {
		v.add("file %q: a name in the folder of the run is wanted, with slashes, without ..", f.Name)
	}
	if seen[f.Name] {
		v.add("file %s is listed twice", f.Name)
	}
	seen[f.Name] = true
	v.hash("file "+f.Name, f.SHA256)
	if f.Size < 0 {
		v.add("file %s: size %d", f.Name, f.Size)
	}
}

func (v *validator) drawing(what, name string, files, seen map[string]bool) {
	switch {
	case !files[name]:
		v.add("%s: its drawing %q is not among the files", what, name)
	case seen[name]:
		v.add("%s: drawing %s belongs to something else already", what, name)
	}
	seen[name] = true
}

func (v *validator) measure(what string, m Measure) {
	v.positive(what+": area", m.Area)
	v.positive(what+": perimeter", m.Perimeter)
	v.finite(what+": middle, low and high", m.Middle.X, m.Middle.Y, m.Low.X, m.Low.Y, m.High.X, m.High.Y)
	if !(m.Low.X < m.High.X && m.Low.Y < m.High.Y) {
		v.add("%s: its box from (%g, %g) to (%g, %g) is empty", what, m.Low.X, m.Low.Y, m.High.X, m.High.Y)
	}
}

func (v *validator) part(p Part) {
	at := "part " + p.Name
	v.finite(at+": place", p.Place.X, p.Place.Y, p.Place.Turn)
	v.positive(at+": area", p.Area)
	v.notNegative(at+": mass", p.Mass)
	v.notNegative(at+": mark", float64(p.Mark.Strokes), p.Mark.Length)
	v.measure(at+": outside", p.Outside)
	holes := map[string]bool{}
	for _, h := range p.Holes {
		v.name("hole of "+p.Name, h.Name, holes)
		v.finite(at+": hole "+h.Name+": centre", h.Centre.X, h.Centre.Y)
		v.notNegative(at+": hole "+h.Name+": diameter", h.Diameter)
		v.measure(at+": hole "+h.Name, h.Measure)
	}
	feet := map[string]bool{}
	for _, f := range p.Feet {
		v.name("foot of "+p.Name, f.Joint, feet)
		v.finite(at+": foot "+f.Joint+": centre", f.Centre.X, f.Centre.Y)
		v.positive(at+": foot "+f.Joint+": radius", f.Radius)
	}
	for _, l := range p.Lengths {
		v.positive(at+": length "+l.A+"-"+l.B, l.MM)
		for _, joint := range []string{l.A, l.B} {
			if !p.Shows(joint) {
				v.add("%s: length %s-%s: it has neither a hole nor a foot at %s", at, l.A, l.B, joint)
			}
		}
	}
}
