package proof

import (
	"fmt"
	"io"
	"math"
	"strconv"
	"strings"
)

// Report is what a proof found. It is plain data, for JSON as well as for people.
type Report struct {
	OK       bool     `json:"ok"`
	Job      string   `json:"job"`
	Drawings int      `json:"drawings"` // of sheets
	Singles  int      `json:"singles"`  // drawings of one part alone; what is on them is not counted again
	Parts    int      `json:"parts"`    // found, cut out whole
	Holes    int      `json:"holes"`    // in these
	Checks   []Result `json:"checks"`
}

// Result is the outcome of one check over all drawings.
type Result struct {
	Name     string    `json:"name"`
	OK       bool      `json:"ok"`
	Compared int       `json:"compared"` // how many things were looked at
	Figure   *Figure   `json:"figure,omitempty"`
	Findings []Finding `json:"findings"`
	Left     int       `json:"left,omitempty"` // findings beyond those listed
}

// Figure is the worst of what a check measured.
type Figure struct {
	Word  string  `json:"word"`  // "largest error", "least"
	Bound string  `json:"bound"` // "allowed", "wanted"
	Value float64 `json:"value"` // mm, in steps of 1e-9
	Limit float64 `json:"limit"` // mm
	Where string  `json:"where"`
}

// largest is the word of a figure that should be small.
const largest = "largest error"

// Finding is one thing that is wrong.
type Finding struct {
	File     string `json:"file,omitempty"`
	Line     int    `json:"line,omitempty"`
	Part     string `json:"part,omitempty"`
	Hole     string `json:"hole,omitempty"`
	What     string `json:"what"` // one sentence
	Expected string `json:"expected,omitempty"`
	Found    string `json:"found,omitempty"`
	Do       string `json:"do"` // what to do about it
}

// String puts a finding on one line: where, what, expected, found, what to do.
func (f Finding) String() string {
	var b strings.Builder
	if f.File != "" {
		b.WriteString(f.File)
		if f.Line > 0 {
			b.WriteString(":" + strconv.Itoa(f.Line))
		}
		b.WriteString(": ")
	}
	if f.Part != "" {
		b.WriteString(f.Part)
		if f.Hole != "" {
			b.WriteString(", hole " + f.Hole)
		}
		b.WriteString(": ")
	}
	b.WriteString(f.What)
	switch {
	case f.Expected != "" && f.Found != "":
		b.WriteString(" (expected " + f.Expected + ", found " + f.Found + ")")
	case f.Expected != "":
		b.WriteString(" (expected " + f.Expected + ")")
	case f.Found != "":
		b.WriteString(" (found " + f.Found + ")")
	}
	if f.Do != "" {
		b.WriteString(": " + f.Do)
	}
	return b.String()
}

// The checks, in the order of the report.
const (
	files     = "files"
	drawings  = "drawings"
	contours  = "cuts closed"
	doubled   = "no cut twice"
	partCount = "parts"
	holeCount = "holes"
	distances = "centre distances"
	diameters = "hole diameters"
	shapes    = "shapes"
	walls     = "walls"
	webs      = "web"
	margins   = "margin"
	order     = "order of work"
	engraving = "engraving"
)

var checkNames = [...]string{
	files, drawings, contours, doubled, partCount, holeCount, distances, diameters, shapes, walls, webs,
	margins, order, engraving,
}

// Write prints the report for people: a line for each check, under it what is wrong, and the verdict
// last.
func (r Report) Write(w io.Writer) error {
	var b strings.Builder
	bad := 0
	for _, c := range r.Checks {
		state := "ok  "
		if !c.OK {
			state = "FAIL"
			bad++
		}
		fmt.Fprintf(&b, "%s  %-17s %6d compared", state, c.Name, c.Compared)
		if f := c.Figure; f != nil {
			value := figure(f.Value)
			if f.Word == largest && f.Value == 0 {
				value = "under " + figure(resolution)
			}
			fmt.Fprintf(&b, ", %s %s mm (%s %s) at %s", f.Word, value, f.Bound, figure(f.Limit), f.Where)
		}
		b.WriteByte('\n')
		for _, f := range c.Findings {
			b.WriteString("      " + f.String() + "\n")
		}
		if c.Left > 0 {
			fmt.Fprintf(&b, "      and %d more\n", c.Left)
		}
	}
	if r.OK {
		singles := ""
		if r.Singles > 0 {
			singles = ", and " + plural(r.Singles, "drawing") + " of single parts,"
		}
		fmt.Fprintf(&b, "proof of %s: %s with %s on %s%s agree with the linkage\n",
			r.Job, plural(r.Parts, "part"), plural(r.Holes, "hole"), plural(r.Drawings, "drawing"), singles)
	} else {
		fmt.Fprintf(&b, "proof of %s FAILS: %s of %d; do not cut these files\n", r.Job, plural(bad, "check"), len(r.Checks))
	}
	_, err := io.WriteString(w, b.String())
	return err
}

// figure writes a length to four digits, plainly: 0.0000003, never 3e-07.
func figure(v float64) string {
	if v == 0 {
		return "0"
	}
	digits := 3 - int(math.Floor(math.Log10(math.Abs(v))))
	s := strconv.FormatFloat(v, 'f', max(digits, 0), 64)
	if strings.Contains(s, ".") {
		s = strings.TrimRight(strings.TrimRight(s, "0"), ".")
	}
	return s
}

func plural(n int, noun string) string {
	if n == 1 {
		return "1 " + noun
	}
	return strconv.Itoa(n) + " " + noun + "s"
}

// millimetres writes a length for a finding, to the tenth of a micrometre.
func millimetres(v float64) string { return strconv.FormatFloat(v, 'f', 4, 64) + " mm" }
