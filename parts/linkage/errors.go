package linkage

import (
	"fmt"
	"math"
	"strings"
)

// LoopError says that a loop of links cannot close somewhere in the drive.
type LoopError struct {
	Joint   string   // the joint at which the links fail to meet
	Links   []string // the links that fail to meet there
	Angle   float64  // drive angle where the loop stops closing, radians
	Short   float64  // by how much the links miss each other at the worst place of the wanted drive, mm
	ShortAt float64  // drive angle of that worst place, radians
	Reason  string   // what is too short or too long, with figures; may be empty
	Ranges  []Span   // drive angles over which the linkage does close; empty when none was found
	Setting Setting  // places of the adjustable pivots; nil for the set places
}

// Span is an interval of drive angles, radians, From < To.
type Span struct{ From, To float64 }

// Error tells which joint opens, where, by how much, and what the linkage can do instead.
func (e *LoopError) Error() string {
	var b strings.Builder
	fmt.Fprintf(&b, "joint %s: %s do not meet at drive angle %s", e.Joint, andList(e.Links), degrees(e.Angle))
	if e.Short > 0 {
		fmt.Fprintf(&b, ", short by %s at %s", millimetres(e.Short), degrees(e.ShortAt))
	}
	if e.Reason != "" {
		fmt.Fprintf(&b, " (%s)", e.Reason)
	}
	if len(e.Ranges) == 0 {
		b.WriteString("; it closes at no drive angle that was tried: change a length")
	} else {
		b.WriteString("; it closes ")
		for i, r := range e.Ranges {
			if i > 0 {
				b.WriteString(" and ")
			}
			fmt.Fprintf(&b, "from %s to %s", degrees(r.From), degrees(r.To))
		}
		b.WriteString(": drive it there or change a length")
	}
	if s := e.Setting.String(); s != "" {
		b.WriteString(" [" + s + "]")
	}
	return b.String()
}

// BranchError says that the linkage does not come back to where it began, or left its branch.
type BranchError struct {
	Joint   string  // the joint that shows it most
	Angle   float64 // drive angle where the assembly changed, radians
	Jump    float64 // distance between where the joint is and where it should be, mm
	Setting Setting
}

// Error tells which joint jumps, where and how far.
func (e *BranchError) Error() string {
	s := fmt.Sprintf("joint %s: after a full turn it is %s from where it began; the links change to another assembly at drive angle %s: drive less than a full turn or change a length",
		e.Joint, millimetres(e.Jump), degrees(e.Angle))
	if t := e.Setting.String(); t != "" {
		s += " [" + t + "]"
	}
	return s
}

// MobilityError says that the linkage has not exactly one degree of freedom.
type MobilityError struct {
	Mobility int      // degrees of freedom, drive free
	Joints   []string // joints that still move while the drive is held (too free), in the order of the joints
	Links    []string // links that hold one another (too fixed), in the order of the links
	Stretch  float64  // by how much a surplus link would have to stretch, mm; 0 when not known
	Angle    float64  // drive angle of that, radians
}

// Error names what is free and what is held twice.
func (e *MobilityError) Error() string {
	switch {
	case len(e.Joints) > 0 && len(e.Links) > 0:
		return fmt.Sprintf("mobility is %d, wanted 1: %s still free with the drive held, while %s hold each other twice: move a link from there to the free joints",
			e.Mobility, beList("joint", e.Joints), andList(e.Links))
	case len(e.Joints) > 0:
		return fmt.Sprintf("mobility is %d, wanted 1: %s still free with the drive held: add %s",
			e.Mobility, beList("joint", e.Joints), plural(e.Mobility-1, "a link there", "links there"))
	case e.Stretch > 0:
		return fmt.Sprintf("mobility is %d, wanted 1: %s hold each other twice, and %s would have to stretch by %s at drive angle %s: take one link away",
			e.Mobility, andList(e.Links), e.Links[len(e.Links)-1], millimetres(e.Stretch), degrees(e.Angle))
	}
	return fmt.Sprintf("mobility is %d, wanted 1: %s hold each other twice: take one link away", e.Mobility, andList(e.Links))
}

// StretchError says that the recovered distance between two pins of a link is not constant.
type StretchError struct {
	Link, A, B     string
	Mean, Min, Max float64 // mm
	MinAt, MaxAt   int     // samples
	Tolerance      float64 // mm
}

// Error gives the figures.
func (e *StretchError) Error() string {
	return fmt.Sprintf("link %s: %s-%s is not constant: %s mm in sample %d, %s mm in sample %d, %s mm apart with %s mm allowed: the joints belong to different links, or the samples are wrong",
		e.Link, e.A, e.B, number(e.Min), e.MinAt+1, number(e.Max), e.MaxAt+1, number(e.Max-e.Min), number(e.Tolerance))
}

func degrees(rad float64) string {
	d := rad * 180 / math.Pi
	return number(d) + " deg"
}

func millimetres(mm float64) string { return number(mm) + " mm" }

// number prints with at most four decimals and no trailing zeros; tiny figures keep two digits.
func number(x float64) string {
	if a := math.Abs(x); a > 0 && a < 5e-4 {
		return fmt.Sprintf("%.2g", x)
	}
	s := fmt.Sprintf("%.4f", x)
	s = strings.TrimRight(strings.TrimRight(s, "0"), ".")
	if s == "-0" {
		return "0"
	}
	return s
}

func andList(names []string) string {
	switch len(names) {
	case 0:
		return "nothing"
	case 1:
		return names[0]
	}
	return strings.Join(names[:len(names)-1], ", ") + " and " + names[len(names)-1]
}

func beList(noun string, names []string) string {
	if len(names) == 1 {
		return noun + " " + names[0] + " is"
	}
	return noun + "s " + andList(names) + " are"
}

func plural(n int, one, many string) string {
	if n == 1 {
		return one
	}
	return fmt.Sprintf("%d %s", n, many)
}
