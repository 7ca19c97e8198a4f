package job

import (
	"fmt"
	"io"
	"os"
	"path/filepath"
	"strings"

	"pinwright/parts/linkage"
)

// Read reads the job file at path and the tables that it names, which lie beside it. An error in
// them is of type Errors and tells everything that is wrong; a file that can't be opened gives the
// system's error.
func Read(path string) (Job, error) {
	data, err := readCapped(path, mostJobBytes)
	if err != nil {
		return Job{}, fmt.Errorf("job file: %w", err)
	}
	dir := filepath.Dir(path)
	return Parse(path, data, func(name string) ([]byte, error) {
		if !filepath.IsAbs(name) {
			name = filepath.Join(dir, filepath.FromSlash(name))
		}
		return readCapped(name, mostTableBytes)
	})
}

// readCapped reads a file, and no more of it than one byte above the cap: enough to refuse it.
// Pipes and devices are refused: a read of them may never come back.
func readCapped(path string, most int64) ([]byte, error) {
	info, err := os.Stat(path)
	if err != nil {
		return nil, err
	}
	if !info.Mode().IsRegular() && !info.IsDir() { // reading a directory fails in the system's words
		return nil, fmt.Errorf("%s: not a plain file", path)
	}
	f, err := os.Open(path)
	if err != nil {
		return nil, err
	}
	defer f.Close()
	return io.ReadAll(io.LimitReader(f, most+1))
}

// Parse reads a job from the text of a job file. The name is for messages; open gives the bytes of a
// table by the name in the job file (nil: no table can be opened). Parse touches no file itself.
//
// A job without error is complete: defaults are filled in, every name it mentions exists, lengths are
// mm and angles radians. Else the job is the zero value and the error is of type Errors: everything
// that is wrong, by place.
//
//  1. The bytes are checked to be text, and the text to be YAML.
//  2. The tree is checked against the table of keys (keys.go): unknown and repeated keys, kinds,
//     units, bounds. What is not sound is marked and passed over from then on.
//  3. The job is built from the checked values, and what must agree between them is checked: joints,
//     lengths, planes, pins, stock.
//
// Time: linear in the size of the file, but for the search of near spellings (words times names).
func Parse(name string, data []byte, open func(name string) ([]byte, error)) (Job, error) {
	r := &reader{
		name: name, open: open, sources: map[string]*source{}, places: map[string]Position{},
		planeSound: map[string]bool{}, groundAt: map[string]linkage.Point{},
	}
	j := r.job(data)
	if len(r.errs) > 0 {
		return Job{}, r.errs.sorted(name)
	}
	j.places, j.sources = r.places, r.sources
	return j, nil
}

// job reads everything; the job is of use only when no error was reported.
func (r *reader) job(data []byte) Job {
	s, text, bad := newSource(r.name, data, mostJobBytes)
	r.sources[r.name] = s
	if bad != nil {
		r.errs = append(r.errs, *bad)
		return Job{}
	}
	root, second, err := decode(text)
	top := spot{Position{r.name, 1, 1}, 1}
	switch {
	case err != nil:
		r.errs = append(r.errs, explain(s, err))
		return Job{}
	case second != nil:
		r.fail(s.start(max(1, second.Line)), "put each job into a file of its own", "a second document begins here: a file holds one job")
		return Job{}
	case root == nil, root.ShortTag() == "!!null":
		r.fail(top, "begin with job: my-mechanism", "the job file is empty")
		return Job{}
	}
	if root.Line > 0 {
		top = r.spotOf(root)
	}
	r.findUnits(root)
	v := r.read(root, &jobForm, "", "the job file", "", "begin with job: my-mechanism", top)
	if !v.sound && len(v.entries) == 0 {
		return Job{}
	}
	j := r.build(v)
	r.tellBare()
	return j
}

// build makes the job from the checked values.
func (r *reader) build(v *value) Job {
	j := Job{Name: v.get("job").textOr(""), Title: v.get("title").textOr("")}
	j.Stock = r.stocks(v.get("stock"))
	d := r.defaults(v)
	r.linkage(v.get("linkage"), d, &j)
	j.Frame = r.frame(v.get("frame"), d, &j)
	r.order(v, &j)
	r.tellNoStock(j.Stock)
	j.Copies = r.copies(v.get("copies"))
	j.Body = r.body(v.get("body"), &j)
	j.Pins = r.pins(v.get("pins"), v.at, &j)
	j.Spacers = r.spacers(v.get("spacers"))
	r.passing(v.get("linkage").get("links"), &j)
	j.Spare = Spare{Percent: v.get("spare").get("percent").numberOr(0), Least: int(v.get("spare").get("least").numberOr(0))}
	return j
}

// At gives the place in the file of a key path such as "linkage.links.crank.width" or
// "copies.0.phase", or of the nearest key above it that the file has; the beginning of the file when
// there is none. Lengths from a table have their places in the table.
func (j Job) At(keyPath string) Position {
	for {
		if p, ok := j.places[keyPath]; ok {
			return p
		}
		dot := strings.LastIndexByte(keyPath, '.')
		if dot < 0 {
			return j.places[""]
		}
		keyPath = keyPath[:dot]
	}
}

// Fault makes an error at the place of a key path, with the line of the file, for stages after
// reading.
func (j Job) Fault(keyPath, message, hint string) Error {
	at := j.At(keyPath)
	line := ""
	if s := j.sources[at.File]; s != nil {
		line = s.line(at.Line)
	}
	return Error{at, 1, line, message, hint}
}
