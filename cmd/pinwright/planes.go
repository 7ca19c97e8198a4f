package main

import (
	"fmt"
	"io"
	"slices"
	"strings"

	"pinwright/parts/arrange"
	"pinwright/parts/job"
	"pinwright/parts/planes"
)

// arrangement is how the planes were found that the job leaves open.
type arrangement struct {
	result arrange.Result
	lying  []layer // from the back to the front
}

// layer is a plane and the parts on it.
type layer struct {
	plane int
	parts []string
}

// findPlanes finds the planes that the job leaves open; a job that gives them all is left as it is.
func (p *plan) findPlanes() error {
	if p.job.PlanesGiven() {
		return nil
	}
	j, r, err := arrange.Planes(p.job, p.motion.mechanism)
	if err != nil {
		return err
	}
	p.job, p.found = j, &arrangement{result: r, lying: layers(j)}
	return nil
}

// layers lists what lies on which plane.
func layers(j job.Job) []layer {
	var out []layer
	put := func(plane int, name string) {
		i := slices.IndexFunc(out, func(l layer) bool { return l.plane == plane })
		if i < 0 {
			i, out = len(out), append(out, layer{plane: plane})
		}
		out[i].parts = append(out[i].parts, name)
	}
	if j.Frame != nil {
		for _, f := range j.Frame.Plates {
			put(f.Plane, f.Name)
		}
	}
	for _, l := range j.Links {
		put(l.Plane, l.Name)
	}
	slices.SortFunc(out, func(a, b layer) int { return a.plane - b.plane })
	return out
}

// print tells the planes from the back to the front, and what makes them so many.
func (a *arrangement) print(w io.Writer) {
	for i, l := range a.lying {
		if i > 0 && l.plane > a.lying[i-1].plane+1 {
			fmt.Fprintf(w, "%-13s %s: empty, for heads and nuts\n", "plane", between(a.lying[i-1].plane+1, l.plane-1))
		}
		fmt.Fprintf(w, "%-13s %d: %s\n", "plane", l.plane, strings.Join(l.parts, ", "))
	}
	r := a.result
	cost := fmt.Sprintf("%d in all, pins span %.1f mm together", r.Answer.Cost.Planes, r.Answer.Cost.Length)
	switch {
	case !r.Answer.Proven:
		fmt.Fprintf(w, "%-13s %s; not proven: %d planes or more, %.1f mm or more on as few\n", "planes", cost, r.Answer.Bound.Planes, r.Answer.Bound.Length)
	case len(r.Raised) > 0:
		fmt.Fprintf(w, "%-13s %s: optimal, proven for bolts at %s as long as they are here\n", "planes", cost, strings.Join(r.Raised, ", "))
	default:
		fmt.Fprintf(w, "%-13s %s: optimal, proven\n", "planes", cost)
	}
	a.reasons(w)
}

func between(from, to int) string {
	if from == to {
		return fmt.Sprint(from)
	}
	return fmt.Sprintf("%d to %d", from, to)
}

// reasons tells which parts keep each other from sharing a plane though no pin joins them, and which sweep
// across pins.
func (a *arrangement) reasons(w io.Writer) {
	p := a.result.Problem
	n := 0
	say := func(format string, args ...any) {
		if n++; n <= shownGaps {
			fmt.Fprintf(w, "%-13s %s\n", "because", fmt.Sprintf(format, args...))
		}
	}
	for _, x := range p.Apart {
		say("%s and %s meet, at drive %.0f deg for one: no plane together", p.Bodies[x.A].Name, p.Bodies[x.B].Name, degrees(x.Angle))
	}
	for _, x := range p.Swept {
		if x.Zone == planes.Shank {
			say("%s sweeps across %s, at drive %.0f deg for one: not between its parts", p.Bodies[x.Body].Name, p.Pins[x.Pin].Name, degrees(x.Angle))
		}
	}
	if n > shownGaps {
		fmt.Fprintf(w, "%-13s and %d more\n", "", n-shownGaps)
	}
}

// finding is the arrangement for machines.
func (a *arrangement) finding() *planesFinding {
	if a == nil {
		return nil
	}
	r := a.result
	out := &planesFinding{
		Of: map[string]int{}, Planes: r.Answer.Cost.Planes, Least: r.Answer.Bound.Planes, Length: r.Answer.Cost.Length,
		Proven: r.Answer.Proven, For: r.Raised,
	}
	for i, b := range r.Problem.Bodies {
		out.Of[b.Name] = r.Answer.Planes[i]
	}
	return out
}
