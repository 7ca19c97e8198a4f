package main

import (
	"fmt"
	"io"
	"math"
	"strings"

	"pinwright/parts/job"
	"pinwright/parts/linkage"
)

// pathSteps is the number of drive steps in path.csv and in the report: half a degree of a full turn.
const pathSteps = 720

// motion is a linkage that was found to work, with what is to be said about it.
type motion struct {
	mechanism *linkage.Mechanism
	cycle     *linkage.Cycle
	report    linkage.Report
}

// solve checks that the linkage of a job goes together and moves through its whole drive, at every
// setting of its adjustable pivots.
func solve(j job.Job) (motion, error) {
	m, err := linkage.New(j.Linkage)
	if err != nil {
		return motion{}, fmt.Errorf("%s: linkage: %w", j.At("linkage"), err)
	}
	report, err := m.Analyse(linkage.Options{})
	if err != nil {
		return motion{report: report}, fmt.Errorf("%s: linkage: %w", j.At("linkage"), err)
	}
	cycle, err := m.Cycle(pathSteps, nil)
	if err != nil {
		return motion{report: report}, fmt.Errorf("%s: linkage: %w", j.At("linkage"), err)
	}
	return motion{m, cycle, report}, nil
}

// degrees converts from radians.
func degrees(radians float64) float64 { return radians * 180 / math.Pi }

// printMotion tells in words what the linkage does.
func printMotion(w io.Writer, j job.Job, m motion) {
	l := m.mechanism.Linkage()
	r := m.report
	row := func(name, format string, args ...any) {
		fmt.Fprintf(w, "%-13s %s\n", name, fmt.Sprintf(format, args...))
	}
	row("linkage", "%d links, %d joints; one degree of freedom (rank %d, counted %d)", len(l.Links), len(l.Joints), r.Mobility, r.Gruebler)
	if len(r.Surplus) > 0 {
		row("", "surplus: %s; fits at every position, but needs exact lengths", strings.Join(r.Surplus, ", "))
	}
	drive := "turns all the way round"
	if !r.Full {
		drive = fmt.Sprintf("from %.1f to %.1f deg", degrees(l.Drive.From), degrees(l.Drive.To))
	}
	row("drive", "%s %s", l.Drive.Link, drive)
	row("assembly", "closes at every step of the drive, worst loop error %.1e mm", r.Set.Closure)
	if r.Ambiguity != nil {
		row("", "note: %s", r.Ambiguity)
	}
	for _, g := range r.Groups {
		if !g.Dyad && len(g.Links) > 1 {
			row("", "%s are solved together (no dyad)", strings.Join(g.Links, ", "))
		}
	}
	for _, t := range r.Set.Transmissions {
		row("transmission", "%s (%s, %s): %.1f to %.1f deg; least at drive %.1f", t.Joint, t.Links[0], t.Links[1],
			degrees(t.Min), degrees(t.Max), degrees(t.MinAt))
		if worst := math.Min(t.Min, math.Pi-t.Max); degrees(worst) < poorTransmission {
			row("", "poor: under %.0f deg the joint pushes along the link and may jam under load", float64(poorTransmission))
		}
	}
	for _, t := range r.Set.Toggles {
		row("toggle", "%s at %s, drive %.2f deg (%s)", t.Kind, t.Joint, degrees(t.Angle), strings.Join(t.Links, ", "))
	}
	for _, p := range r.Set.Paths {
		row("path", "%s: stride %.3f mm, lift %.3f mm, length %.3f mm", p.Joint, p.Stride, p.Lift, p.Length)
		for _, s := range p.Stance {
			row("", "within %.3f mm of the lowest: %.1f mm long, %.0f %% of the turn", s.Height, s.Length, 100*s.Duty)
		}
	}
	if len(r.Settings) > 0 {
		row("pivots", "work over their whole range, %d settings and all between", len(r.Settings))
		for _, s := range r.Settings {
			for _, p := range s.Paths {
				row("", "%s: %s stride %.3f mm, lift %.3f mm", s.Setting, p.Joint, p.Stride, p.Lift)
			}
		}
	}
}

// poorTransmission is where a joint is pointed out, degrees from being in line; 40 is the usual advice
// for machines that carry load and 30 a floor for models (common practice, no source).
const poorTransmission = 30
