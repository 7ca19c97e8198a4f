package linkage

import (
	"errors"
	"fmt"
	"math"
)

// limits keep the searches within bounds; no leg, gripper or table comes near them.
const (
	maxJoints = 200
	maxLinks  = 200
	maxPins   = 8  // of one link
	maxBlock  = 24 // joints solved together
)

// onRange is how far the set place of an adjustable pivot may lie off its range, mm.
const onRange = 0.01

// validate reports everything that can be seen without solving, joined into one error.
func validate(l Linkage) error {
	var errs []error
	bad := func(format string, a ...any) { errs = append(errs, fmt.Errorf(format, a...)) }

	if len(l.Joints) == 0 || len(l.Links) == 0 {
		return errors.New("linkage is empty: it wants joints, links and a drive")
	}
	if len(l.Joints) > maxJoints || len(l.Links) > maxLinks {
		return fmt.Errorf("linkage has %d joints and %d links: at most %d and %d are solved", len(l.Joints), len(l.Links), maxJoints, maxLinks)
	}
	joints := map[string]*Joint{}
	grounds := 0
	for i := range l.Joints {
		j := &l.Joints[i]
		switch {
		case j.Name == "":
			bad("joint %d has no name", i+1)
			continue
		case joints[j.Name] != nil:
			bad("joint %s is there twice: give one of them another name", j.Name)
			continue
		}
		joints[j.Name] = j
		if j.Near != nil && !finitePoint(*j.Near) {
			bad("joint %s: near is not a place", j.Name)
		}
		if j.Ground != nil {
			grounds++
			errs = append(errs, checkGround(*j)...)
		}
	}
	if grounds == 0 {
		bad("no joint is ground: fix at least two pivots in the frame")
	}

	uses := map[string]int{}
	links := map[string]*Link{}
	for i := range l.Links {
		k := &l.Links[i]
		switch {
		case k.Name == "":
			bad("link %d has no name", i+1)
			continue
		case links[k.Name] != nil:
			bad("link %s is there twice: give one of them another name", k.Name)
			continue
		}
		links[k.Name] = k
		pinErrs := checkPins(*k, joints)
		for _, p := range k.Pins {
			uses[p]++
		}
		errs = append(errs, pinErrs...)
		if len(pinErrs) == 0 {
			errs = append(errs, checkLengths(*k)...)
		}
	}
	for _, j := range l.Joints {
		if j.Name != "" && uses[j.Name] == 0 {
			bad("joint %s is in no link: put it into the pins of one, or take it out", j.Name)
		}
	}
	errs = append(errs, checkDrive(l.Drive, links, joints)...)
	traced := map[string]bool{}
	for _, t := range l.Trace {
		switch j := joints[t]; {
		case j == nil:
			bad("trace: there is no joint %s", t)
		case j.Ground != nil:
			bad("trace: joint %s is ground and does not move", t)
		case traced[t]:
			bad("trace: joint %s is there twice", t)
		}
		traced[t] = true
	}
	return errors.Join(errs...)
}

func checkGround(j Joint) []error {
	var errs []error
	g := j.Ground
	if !finitePoint(g.At) || math.Abs(g.At.X) > 1e6 || math.Abs(g.At.Y) > 1e6 {
		return []error{fmt.Errorf("joint %s: ground (%v, %v) is not a place within 1000000 mm", j.Name, g.At.X, g.At.Y)}
	}
	r := g.Range
	if r == nil {
		return nil
	}
	for _, x := range []float64{r.From.X, r.From.Y, r.To.X, r.To.Y, r.Centre.X, r.Centre.Y, r.Radius, r.Start, r.End} {
		if !finite(x) || math.Abs(x) > 1e6 {
			return []error{fmt.Errorf("joint %s: its range has a figure that is no number within 1000000", j.Name)}
		}
	}
	if r.Length() < 1e-6 {
		errs = append(errs, fmt.Errorf("joint %s: its range has no length: give two places, or make it a fixed pivot", j.Name))
	} else if _, away := r.Nearest(g.At); away > onRange {
		errs = append(errs, fmt.Errorf("joint %s: it is set at (%s, %s), %s off its range: set it on the range", j.Name, number(g.At.X), number(g.At.Y), millimetres(away)))
	}
	return errs
}

func checkPins(l Link, joints map[string]*Joint) []error {
	var errs []error
	bad := func(format string, a ...any) {
		errs = append(errs, fmt.Errorf("link %s: "+format, append([]any{l.Name}, a...)...))
	}
	if len(l.Pins) < 2 {
		bad("it has %d pins: a link wants at least two", len(l.Pins))
	}
	if len(l.Pins) > maxPins {
		bad("it has %d pins: at most %d are solved", len(l.Pins), maxPins)
	}
	seen := map[string]bool{}
	var ground []string
	for _, p := range l.Pins {
		switch {
		case joints[p] == nil:
			bad("there is no joint %s", p)
		case seen[p]:
			bad("pin %s is there twice", p)
		case joints[p].Ground != nil:
			ground = append(ground, p)
		}
		seen[p] = true
	}
	if len(ground) > 1 {
		bad("%s are both ground, so it cannot move: leave it out, or make one of them a moving joint", andList(ground))
	}
	return errs
}

func checkDrive(d Drive, links map[string]*Link, joints map[string]*Joint) []error {
	var errs []error
	bad := func(format string, a ...any) { errs = append(errs, fmt.Errorf("drive: "+format, a...)) }
	l := links[d.Link]
	switch {
	case d.Link == "":
		bad("no link is driven: name the crank")
	case l == nil:
		bad("there is no link %s", d.Link)
	default:
		hasGround := false
		for _, p := range l.Pins {
			hasGround = hasGround || joints[p] != nil && joints[p].Ground != nil
		}
		if !hasGround {
			bad("link %s has no ground pin to turn about: drive a link that is pinned to the frame", d.Link)
		}
	}
	switch {
	case !finite(d.From) || !finite(d.To) || math.Abs(d.From) > 1e4 || math.Abs(d.To) > 1e4:
		bad("its angles are not numbers within 10000 radians")
	case !d.Full && math.Abs(d.To-d.From) < 1e-6:
		bad("it turns from %s to %s, which is nothing: give two angles, or a full turn", degrees(d.From), degrees(d.To))
	case math.Abs(d.To-d.From) > 2*math.Pi+1e-9:
		bad("it turns by %s: at most a full turn is solved", degrees(math.Abs(d.To-d.From)))
	}
	return errs
}
