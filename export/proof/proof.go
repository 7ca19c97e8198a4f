// Package proof reads the cut files of a run back and holds them against the linkage.
//
// It knows nothing of how the files came about. It has the drawings, and the manifest's statement of
// what the finished parts must measure: the lengths of the linkage, the diameters of the holes, the
// rules of the stock. From a drawing alone it takes the paths of the beam, runs the beam along them
// in geometry, looks what falls out, and measures that.
//
// The plan of Check:
//
//  1. The files: each one listed is there, with its size and SHA-256; no drawing is there that is not
//     listed.
//  2. Each drawing is read. Its unit is the millimetre, its layers are known and switched on, every
//     cut is a closed contour that encloses something, no cut is made twice.
//  3. Which cut lies in which: a hole lies straight in an outside cut, an outside cut in nothing or in
//     a hole (a part cut out of another's window). Whatever lies in a cut must be cut before it:
//     afterwards it hangs on nothing.
//  4. The beam: an outside cut moved inwards by half the kerf, its holes outwards, is a finished part.
//  5. The parts found are matched to the parts expected: first those that agree in everything, any
//     assignment among alike ones being as good as another (augmenting paths, D. König 1931; H. W.
//     Kuhn 1955); then the rest, by their place on the sheet, so that it can be said what is wrong
//     with them.
//  6. Each pair is compared: centre distances, diameters, the area, perimeter, middle and turn of
//     every contour, which side is up, the engraving.
//  7. Distances on the sheet: between cuts of different parts, within a part, to the edge of the
//     sheet, from engraving to cuts. All are exact on lines and arcs.
//
// Running time: n contours are compared box by box, O(n^2), to see which lies in which; distances are
// measured for neighbours only; n parts are held against m different shapes, O(n m). A sheet of a
// thousand parts takes a fraction of a second.
package proof

import (
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"

	"pinwright/export/manifest"
)

// The tolerances, mm.
const (
	// limit is what a centre distance or a diameter may be off: a hundredth of what a good laser holds.
	limit = 0.001
	// edgeLimit is the mean shift of a contour's edge, from its area, perimeter and middle, that passes
	// for rounding. Moving one corner by a hundredth of a millimetre is a hundred times as much.
	edgeLimit = 1e-5
	// gapSlack is what a distance that was kept exactly may have lost to rounding: coordinates of a
	// metre have a spacing of 1e-13, and turning, moving and offsetting take a few steps.
	gapSlack = 1e-6
)

// Check proves a folder of cut files. The error is for what keeps it from starting: no manifest, or one
// that cannot be read; errors.Is(err, fs.ErrNotExist) tells the first. Everything else, a broken drawing
// too, is in the report.
func Check(fsys fs.FS) (Report, error) {
	f, err := fsys.Open(manifest.Name)
	if errors.Is(err, fs.ErrNotExist) {
		return Report{}, absent{"proof: there is no " + manifest.Name + " here: give the folder that the files were written to"}
	}
	if err != nil {
		return Report{}, fmt.Errorf("proof: %w", err)
	}
	m, err := manifest.Decode(f)
	if closeErr := f.Close(); err == nil {
		err = closeErr
	}
	if err != nil {
		return Report{}, fmt.Errorf("proof: %w", err)
	}

	l := newLedger()
	contents, err := l.files(fsys, m)
	if err != nil {
		return Report{}, fmt.Errorf("proof: %w", err)
	}
	r := Report{Job: m.Job.Name}
	for _, s := range tasks(m) {
		data, ok := contents[s.file]
		if !ok {
			l.fail(partCount, Finding{
				File: s.file, What: "cannot be looked at", Expected: plural(len(s.expected), "part"),
				Do: "write the files anew",
			})
			continue
		}
		parts, holes := l.drawing(s, data)
		if !s.placed {
			r.Singles++
			continue
		}
		r.Drawings++
		r.Parts += parts
		r.Holes += holes
	}
	r.Checks, r.OK = l.results()
	return r, nil
}

// CheckDir is Check for a folder of the file system.
func CheckDir(dir string) (Report, error) {
	info, err := os.Stat(dir)
	if err != nil {
		return Report{}, fmt.Errorf("proof: %w", err)
	}
	if !info.IsDir() {
		return Report{}, absent{"proof: " + filepath.ToSlash(dir) + " is not a folder: give the folder that the files were written to"}
	}
	r, err := Check(os.DirFS(dir))
	if err != nil {
		err = fmt.Errorf("%s: %w", filepath.ToSlash(dir), err)
	}
	return r, err
}

// absent says that there is nothing to prove. It is fs.ErrNotExist.
type absent struct{ says string }

func (a absent) Error() string { return a.says }

func (absent) Unwrap() error { return fs.ErrNotExist }

// task is one drawing and what it must show.
type task struct {
	file          string
	name          string // of the sheet, or of the part that is drawn alone
	width, height float64
	margin        float64 // least material to the edge; negative: the drawing has no sheet round it
	stock         manifest.Stock
	expected      []manifest.Part
	placed        bool // the parts lie where the manifest places them
}

// tasks lists the drawings of a run: the sheets, then the parts drawn alone.
func tasks(m manifest.Manifest) []task {
	stock := map[string]manifest.Stock{}
	for _, s := range m.Stock {
		stock[s.Name] = s
	}
	var all []task
	at := map[string]int{}
	for i, s := range m.Sheets {
		at[s.Name] = i
		all = append(all, task{
			file: s.Drawing, name: s.Name, width: s.Width, height: s.Height,
			margin: stock[s.Stock].Margin, stock: stock[s.Stock], placed: true,
		})
	}
	for _, p := range m.Parts {
		i := at[p.Sheet]
		all[i].expected = append(all[i].expected, p)
	}
	for _, p := range m.Parts {
		if p.Drawing == "" {
			continue
		}
		alone := p
		alone.Place = manifest.Placement{} // drawn as it is, wherever
		all = append(all, task{
			file: p.Drawing, name: p.Name, margin: -1, stock: stock[p.Stock], expected: []manifest.Part{alone},
		})
	}
	return all
}
