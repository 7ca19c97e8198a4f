package parts

import (
	"fmt"
	"math"
	"strconv"
	"strings"

	"pinwright/parts/job"
	"pinwright/parts/linkage"
	"pinwright/parts/outline"
)

// Level is where a plane lies in the side view: the heights of its two faces, mm, Low < Up.
type Level struct {
	Plane   int
	Low, Up float64
}

// Make returns all parts of all copies at finished size: for every copy, in their order, the links in
// the order of the linkage, then the frame plates, then the cross members. levels are needed for cross
// members only, which stand between the faces of the frame plates.
//
// A mirrored copy's link parts are mirrored about their x axis, so that the second pin still lies on
// it; its frame plates are mirrored about the linkage's y axis, as the whole linkage is. Marks are put
// on afterwards and are never mirrored.
//
// The direction of a crank on its shaft: what has a direction (the flat of a D, the flats of a hexagon,
// the first bolt of a hub, the phase mark) points, at the drive's angle 0 of the job, along the x axis
// of the linkage in every copy, mirrored or not. So the cranks of all copies, put on one shaft with
// their flats in line, stand at their phases.
//
// The error is a job.Errors with everything that is wrong with any part, or nil.
func Make(j job.Job, m *linkage.Mechanism, levels []Level) ([]Part, error) {
	k := &maker{job: j, linkage: m, levels: levels}
	for _, c := range j.Copies {
		for i := range j.Links {
			k.link(c, i)
		}
		k.frame(c)
	}
	k.mark()
	if len(k.errs) > 0 {
		return nil, k.errs
	}
	return k.parts, nil
}

// maker collects parts and errors.
type maker struct {
	job     job.Job
	linkage *linkage.Mechanism
	levels  []Level
	parts   []Part
	notes   []note // beside parts, in the same order
	errs    job.Errors
	faults  int // told so far, repetitions counted
}

// note is what the making of a part leaves for its mark.
type note struct {
	path   string // key path of the part in the job
	phase  string // text of the phase, or ""
	lines  []outline.Path
	covers []outline.Disc // washers and heads that would hide a mark
	window *windows       // nil: none wanted
}

// fail adds an error at a key path of the job, once.
func (k *maker) fail(path, hint, format string, args ...any) {
	k.faults++
	e := k.job.Fault(path, fmt.Sprintf(format, args...), hint)
	for _, old := range k.errs {
		if old.Position == e.Position && old.Message == e.Message {
			return
		}
	}
	k.errs = append(k.errs, e)
}

// stock returns the stock of this name; the zero value if the job has none.
func (k *maker) stock(name string) job.Stock {
	for _, s := range k.job.Stock {
		if s.Name == name {
			return s
		}
	}
	return job.Stock{}
}

// pin returns what a joint carries, nil for nothing.
func (k *maker) pin(joint string) *job.Pin {
	for i := range k.job.Pins {
		if k.job.Pins[i].Joint == joint {
			return &k.job.Pins[i]
		}
	}
	return nil
}

// partName names a part of a copy.
func partName(c job.Copy, link string) string {
	if c.Name == "" {
		return link
	}
	return c.Name + "." + link
}

// mirrored is the motion of a link part of a mirrored copy: y to -y.
func mirrored() outline.Transform { return outline.Place(math.Pi, true, outline.Point{}) }

// millimetres writes a length for a message, to a hundredth.
func millimetres(v float64) string {
	s := strconv.FormatFloat(v, 'f', 2, 64)
	s = strings.TrimRight(strings.TrimRight(s, "0"), ".")
	if s == "-0" {
		return "0"
	}
	return s
}

// upTo writes a length that something must have at least: rounded up to a tenth.
func upTo(v float64) string { return millimetres(math.Ceil(v*10-1e-6) / 10) }

// place writes a point for a message.
func place(p outline.Point) string { return "(" + millimetres(p.X) + ", " + millimetres(p.Y) + ")" }
