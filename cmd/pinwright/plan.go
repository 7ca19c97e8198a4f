package main

import (
	"cmp"
	"context"
	"errors"
	"fmt"
	"slices"
	"strings"

	"pinwright/export"
	"pinwright/kerf"
	"pinwright/nest"
	"pinwright/parts"
	"pinwright/parts/job"
	"pinwright/parts/outline"
	"pinwright/parts/stack"
)

// plan is a job worked out: everything that is decided before a file is written.
type plan struct {
	job    job.Job
	sum    string // SHA-256 of the job file
	motion motion
	found  *arrangement // of the planes that the job leaves open; nil when it gives them all
	levels []stack.Level
	kits   []stack.Kit
	lines  []stack.Line
	parts  []parts.Part
	cuts   []kerf.Cut // of the parts, in their order
	layout nest.Layout
	sheets []export.Sheet // of the layout, in its order
}

// buildable works a job out as far as the parts: the linkage turns, the pins have their hardware,
// every part can be cut. All that is wrong with the pins and the parts comes in one error.
func buildable(j job.Job) (plan, error) {
	p := plan{job: j}
	var err error
	if p.motion, err = solve(j); err != nil {
		return p, err
	}
	if err = p.findPlanes(); err != nil {
		return p, err
	}
	j = p.job
	var faults []error
	if p.levels, err = stack.Levels(j); err != nil {
		return p, err
	}
	if p.kits, err = stack.Build(j); err != nil {
		faults = append(faults, err)
	} else {
		p.lines = stack.List(j, p.kits)
	}
	if p.parts, err = parts.Make(j, p.motion.mechanism, faces(p.levels)); err != nil {
		faults = append(faults, err)
	} else if p.cuts, err = compensate(j, p.parts); err != nil {
		faults = append(faults, err)
	}
	if err := errors.Join(faults...); err != nil {
		return p, err
	}
	return p, nil
}

// faces hands the heights of the planes on to the parts.
func faces(levels []stack.Level) []parts.Level {
	out := make([]parts.Level, len(levels))
	for i, l := range levels {
		out[i] = parts.Level{Plane: l.Plane, Low: l.From, Up: l.To}
	}
	return out
}

// beam returns what the laser takes from a stock: nothing when the shop compensates.
func beam(s job.Stock) kerf.Beam {
	if s.ByShop {
		return kerf.Beam{}
	}
	return kerf.Beam{Width: s.Kerf}
}

// taken is what the beam takes away between the paths of two parts: the kerf; twice as much when the shop
// moves the beam outwards from the finished edges that are drawn.
func taken(s job.Stock) float64 {
	if s.ByShop {
		return 2 * s.Kerf
	}
	return s.Kerf
}

// stockNamed finds a stock by its name and its place in the list.
func stockNamed(j job.Job, name string) (job.Stock, int) {
	for i, s := range j.Stock {
		if s.Name == name {
			return s, i
		}
	}
	return job.Stock{}, -1
}

// compensate makes the cut paths of all parts; every feature that the beam cannot make is named, once
// for all copies of a link.
func compensate(j job.Job, list []parts.Part) ([]kerf.Cut, error) {
	var faults []error
	cuts := make([]kerf.Cut, len(list))
	told := map[string]bool{}
	for i, p := range list {
		names := make([]string, len(p.Holes))
		for k, h := range p.Holes {
			names[k] = h.Name
		}
		s, _ := stockNamed(j, p.Stock)
		var err error
		if cuts[i], err = kerf.Compensate(p.Name, p.Region, names, beam(s)); err == nil && s.ByShop {
			// The shop's beam is no thinner than ours: what it cannot make is found here.
			_, err = kerf.Compensate(p.Name, p.Region, names, kerf.Beam{Width: s.Kerf})
		}
		if err != nil && !told[p.Link] {
			faults = append(faults, fmt.Errorf("%s: %w", j.At(cmp.Or(keyOf(j, p.Link), "frame.cross")), err))
			told[p.Link] = true
		}
	}
	return cuts, errors.Join(faults...)
}

// arrange lays the parts on the sheets and puts the steps of each sheet in the order of the work.
func (p *plan) arrange(ctx context.Context, effort int, say func(done, all int)) error {
	items, stock := p.items(), shelf(p.job)
	layout, err := nest.Nest(ctx, items, stock, nest.Options{
		Effort:   effort,
		Progress: func(g nest.Progress) { say(g.Done, g.All) },
	})
	if err != nil {
		return fmt.Errorf("%s: layout: %w", p.job.At("stock"), err)
	}
	if err := leftovers(p.job, items, layout); err != nil {
		return err
	}
	p.layout = layout
	p.sheets, err = p.draw()
	return err
}

// items states the parts as shapes to be placed. Parts are not turned over: their marks would be
// in mirror writing.
func (p *plan) items() []nest.Item {
	items := make([]nest.Item, len(p.parts))
	for i, part := range p.parts {
		s, _ := stockNamed(p.job, part.Stock)
		items[i] = nest.Item{
			Name:     part.Name,
			Shape:    outline.Region{Outer: p.cuts[i].Outside, Holes: p.cuts[i].Inside},
			Quantity: 1,
			Stock:    part.Stock,
			Angles:   turnsOf(s.Grain),
		}
	}
	return items
}

// shelf states the stock of a job as sheets to lay parts on.
func shelf(j job.Job) []nest.Stock {
	out := make([]nest.Stock, len(j.Stock))
	for i, s := range j.Stock {
		out[i] = nest.Stock{
			Name: s.Name, Width: s.Width, Height: s.Height, Quantity: s.Quantity,
			Margin: s.Margin, Web: s.Web, Kerf: taken(s),
		}
	}
	return out
}

// leftovers is an error that names every part that found no room and what it would need; parts that want
// the same are named together.
func leftovers(j job.Job, items []nest.Item, l nest.Layout) error {
	var faults []error
	for i, left := range l.Left {
		stock := items[left.Item].Stock
		alike := func(o nest.Leftover) bool { return o.Why == left.Why && items[o.Item].Stock == stock }
		if slices.ContainsFunc(l.Left[:i], alike) {
			continue
		}
		var names []string
		for _, o := range l.Left[i:] {
			if alike(o) {
				names = append(names, items[o.Item].Name)
			}
		}
		faults = append(faults, fmt.Errorf("%s: %s: %s", j.At("stock."+stock), strings.Join(names, ", "), left.Why))
	}
	return errors.Join(faults...)
}
