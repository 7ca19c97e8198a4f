package profile

import (
	"errors"
	"fmt"
	"io"
	"math"
	"slices"
	"strconv"
	"strings"
	"time"

	"go.yaml.in/yaml/v3"

	"pinwright/kerf"
	"pinwright/kerf/estimate"
	"pinwright/parts/job"
)

// mostBytes is how large a profile may be.
const mostBytes = 1 << 16

// reader is the state of one reading.
type reader struct {
	file  string
	lines []string
	errs  job.Errors
}

// fail notes an error at a node.
func (r *reader) fail(n *yaml.Node, hint, format string, args ...any) {
	e := job.Error{Span: max(1, len([]rune(n.Value))), Message: fmt.Sprintf(format, args...), Hint: hint}
	e.File, e.Line, e.Column = r.file, max(1, n.Line), max(1, n.Column)
	if e.Line <= len(r.lines) {
		e.Source = r.lines[e.Line-1]
	}
	r.errs = append(r.errs, e)
}

// Read reads a profile strictly: unknown and repeated keys, missing ones and figures that cannot be
// are errors with file, line and column, all in one job.Errors.
func Read(file string, data []byte) (Profile, error) {
	r := &reader{file: file, lines: strings.Split(strings.ReplaceAll(string(data), "\r\n", "\n"), "\n")}
	top := &yaml.Node{Line: 1, Column: 1}
	if len(data) > mostBytes {
		r.fail(top, "is it the right file?", "a profile of %d bytes", len(data))
		return Profile{}, r.errs
	}
	var doc yaml.Node
	in := yaml.NewDecoder(strings.NewReader(string(data)))
	if err := in.Decode(&doc); err != nil {
		r.fail(top, "a profile is written by the command fit", "not understood as YAML: %s", strings.TrimPrefix(err.Error(), "yaml: "))
		return Profile{}, r.errs
	}
	if err := in.Decode(new(yaml.Node)); !errors.Is(err, io.EOF) {
		r.fail(top, "keep one of them", "more than one profile in the file")
		return Profile{}, r.errs
	}
	p := r.profile(doc.Content[0])
	if len(r.errs) == 0 {
		if err := p.sound(); err != nil {
			r.fail(doc.Content[0], "", "%v", err)
		}
	}
	if len(r.errs) > 0 {
		return Profile{}, r.errs
	}
	return p, nil
}

// table reads a mapping: every key has its reader; those wanted must be there.
func (r *reader) table(n *yaml.Node, where string, wanted []string, keys map[string]func(*yaml.Node)) {
	if n.Kind != yaml.MappingNode {
		r.fail(n, "", "%s must be keys with values", where)
		return
	}
	seen := map[string]bool{}
	for i := 0; i+1 < len(n.Content); i += 2 {
		k, v := n.Content[i], n.Content[i+1]
		read, ok := keys[k.Value]
		switch {
		case !ok || k.Kind != yaml.ScalarNode:
			var names []string
			for name := range keys {
				names = append(names, name)
			}
			slices.Sort(names)
			r.fail(k, "the keys are "+strings.Join(names, ", "), "%s: unknown key %q", where, k.Value)
		case seen[k.Value]:
			r.fail(k, "keep one of them", "%s: %s is there twice", where, k.Value)
		default:
			read(v)
		}
		seen[k.Value] = true
	}
	for _, name := range wanted {
		if !seen[name] {
			r.fail(n, "", "%s: no %s", where, name)
		}
	}
}

func (r *reader) text(to *string) func(*yaml.Node) {
	return func(n *yaml.Node) {
		if n.Kind != yaml.ScalarNode || n.ShortTag() == "!!null" {
			r.fail(n, "", "a text is wanted")
			return
		}
		*to = n.Value
	}
}

func (r *reader) number(to *float64) func(*yaml.Node) {
	return func(n *yaml.Node) {
		switch n.Value {
		case ".inf":
			*to = math.Inf(1)
			return
		case "-.inf":
			*to = math.Inf(-1)
			return
		}
		v, err := strconv.ParseFloat(n.Value, 64)
		if n.Kind != yaml.ScalarNode || err != nil || math.IsNaN(v) || math.IsInf(v, 0) {
			r.fail(n, "", "%q is no number", n.Value)
			return
		}
		*to = v
	}
}

func (r *reader) integer(to *int) func(*yaml.Node) {
	return func(n *yaml.Node) {
		v, err := strconv.Atoi(n.Value)
		if n.Kind != yaml.ScalarNode || err != nil || v < 0 {
			r.fail(n, "", "%q is no count", n.Value)
			return
		}
		*to = v
	}
}

// profile reads the whole.
func (r *reader) profile(n *yaml.Node) Profile {
	var p Profile
	version := 0
	r.table(n, "profile", []string{"profile", "material", "thickness", "readings", "features", "freedom", "figures", "covariance"}, map[string]func(*yaml.Node){
		"profile": func(n *yaml.Node) {
			r.integer(&version)(n)
			if version != 1 {
				r.fail(n, "make it again from its readings", "a profile of version %s: this program reads version 1", n.Value)
			}
		},
		"material": r.text(&p.Material), "thickness": r.number(&p.Thickness), "laser": r.text(&p.Laser),
		"date": func(n *yaml.Node) {
			r.text(&p.Date)(n)
			if _, err := time.Parse(time.DateOnly, n.Value); err != nil {
				r.fail(n, "write it as 2026-11-30", "%q is no date", n.Value)
			}
		},
		"readings": r.integer(&p.Readings), "features": r.integer(&p.Features), "freedom": r.number(&p.Freedom),
		"holes": func(n *yaml.Node) {
			r.table(n, "holes", []string{"centre", "smallest", "largest"}, map[string]func(*yaml.Node){
				"centre": r.number(&p.Centre), "smallest": r.number(&p.Smallest), "largest": r.number(&p.Largest),
			})
		},
		"figures": func(n *yaml.Node) { p.Figures = r.figures(n) },
		"covariance": func(n *yaml.Node) {
			if n.Kind != yaml.SequenceNode {
				r.fail(n, "", "covariance must be a list of rows")
				return
			}
			for _, line := range n.Content {
				row := make([]float64, len(line.Content))
				for i, c := range line.Content {
					r.number(&row[i])(c)
				}
				p.Covariance = append(p.Covariance, row)
			}
		},
	})
	return p
}

// figures come in the order of the terms, however the file has them.
func (r *reader) figures(n *yaml.Node) []estimate.Figure {
	got := map[estimate.Term]*estimate.Figure{}
	keys := map[string]func(*yaml.Node){}
	for _, t := range allTerms {
		keys[string(t)] = func(n *yaml.Node) {
			f := &estimate.Figure{Term: t}
			got[t] = f
			r.table(n, string(t), []string{"value", "se", "low", "high"}, map[string]func(*yaml.Node){
				"value": r.number(&f.Value), "se": r.number(&f.SE), "low": r.number(&f.Low), "high": r.number(&f.High),
			})
		}
	}
	r.table(n, "figures", []string{"kerf", "scatter"}, keys)
	var out []estimate.Figure
	for _, t := range allTerms {
		if f := got[t]; f != nil {
			out = append(out, *f)
		}
	}
	return out
}

// sound refuses what cannot be.
func (p Profile) sound() error {
	var errs []error
	bad := func(format string, args ...any) { errs = append(errs, fmt.Errorf(format, args...)) }
	if p.Material == "" {
		bad("no material: say of what the coupon was cut")
	}
	if !(p.Thickness > 0) || p.Thickness > 100 {
		bad("a thickness of %v mm: write the measured thickness of the sheet", p.Thickness)
	}
	if !(p.Freedom >= 1) {
		bad("freedom is %v, must be 1 or more", p.Freedom)
	}
	if p.Largest < p.Smallest || p.Smallest < 0 || p.Largest > 0 && !(p.Centre >= p.Smallest && p.Centre <= p.Largest) {
		bad("holes: centre %v must lie between smallest %v and largest %v", p.Centre, p.Smallest, p.Largest)
	}
	for _, f := range p.Figures {
		if !(f.Low <= f.Value+1e-9 && f.Value <= f.High+1e-9) || f.SE < 0 || math.IsInf(f.Value, 0) || math.IsNaN(f.SE) {
			bad("%s: value %v, standard error %v, interval %v to %v do not go together", f.Term, f.Value, f.SE, f.Low, f.High)
		}
	}
	k, s := p.Value(estimate.Kerf), p.Value(estimate.Scatter)
	if k < 0 || k > kerf.Widest {
		bad("a kerf of %v mm: no laser takes less than nothing or more than %v mm", k, kerf.Widest)
	}
	if !(s > 0) || s > 1 {
		bad("a scatter of %v mm", s)
	}
	n := len(p.terms())
	if _, ok := p.figure(estimate.Diameter); ok && p.Centre == 0 {
		bad("diameter is given without holes")
	}
	if len(p.Covariance) != n {
		bad("covariance has %d rows, %d figures need as many", len(p.Covariance), n)
		return errors.Join(errs...)
	}
	for i, row := range p.Covariance {
		if len(row) != n {
			bad("row %d of covariance has %d numbers, %d are wanted", i+1, len(row), n)
			continue
		}
		if !(row[i] >= 0) {
			bad("variance %v of %s", row[i], p.terms()[i])
		}
	}
	return errors.Join(errs...)
}
