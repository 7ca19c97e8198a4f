package main

import (
	"errors"
	"fmt"
	"io"
	"os"
	"text/tabwriter"

	"pinwright/kerf/fit"
	"pinwright/kerf/profile"
	"pinwright/parts/job"
)

// fitRow is a hole of the table of fits.
type fitRow struct {
	Joint     string   `json:"joint"`
	What      string   `json:"what"`
	DrawMM    float64  `json:"draw_mm"`
	MiddleMM  float64  `json:"middle_mm"`
	TopMM     float64  `json:"top_mm"`
	BottomMM  float64  `json:"bottom_mm"`
	LeastMM   float64  `json:"least_mm"`
	MostMM    float64  `json:"most_mm"`
	PinLeast  float64  `json:"pin_least_mm"`
	PinMost   float64  `json:"pin_most_mm"`
	Binds     float64  `json:"binds"`
	Fits      float64  `json:"fits"`
	Rattles   float64  `json:"rattles"`
	Rule      string   `json:"rule"`
	HoopMPa   float64  `json:"hoop_mpa,omitempty"`
	PressesMM float64  `json:"presses_mm,omitempty"`
	Warnings  []string `json:"warnings,omitempty"`
}

// fitTable prints the holes of a job's pins by a profile.
func fitTable(t terminal, path string, o fitOptions) error {
	if o.profile == "" {
		return errors.New("by which profile? say --profile FILE; pinwright fit READINGS -o FILE makes one")
	}
	if o.out != "" {
		return errors.New("-o writes profiles; --table prints")
	}
	j, _, err := readJob(path)
	if err != nil {
		return err
	}
	data, err := os.ReadFile(o.profile)
	if err != nil {
		return system(err)
	}
	p, err := profile.Read(o.profile, data)
	if err != nil {
		return refused(err)
	}
	warnings, err := suited(p, j)
	if err != nil {
		return refused(err)
	}
	rows, err := fitRows(p, j, o.chance)
	if err != nil {
		return refused(err)
	}
	if o.asJSON {
		err = writeJSON(t.out, rows)
	} else {
		err = printFits(t.out, rows)
	}
	if err != nil {
		return system(err)
	}
	for _, w := range warnings {
		fmt.Fprintf(t.err, "%s %s\n", t.paint("33", "note:", t.errTTY), w)
	}
	return nil
}

// suited looks whether the profile may be used for any stock of the job, and for which not.
func suited(p profile.Profile, j job.Job) (warnings []string, err error) {
	var faults []error
	for _, s := range j.Stock {
		w, err := p.Suits(s.Material, s.Measured)
		switch {
		case err != nil:
			faults = append(faults, fmt.Errorf("%s: %w", j.At("stock."+s.Name), err))
		case w != "":
			warnings = append(warnings, s.Name+": "+w)
		}
	}
	if len(faults) == len(j.Stock) {
		return nil, errors.Join(faults...)
	}
	for _, f := range faults {
		warnings = append(warnings, "not for "+f.Error())
	}
	return warnings, nil
}

// fitRows works the table out. A press fit keeps the size that the job names, or with a chance the
// size that most often fits: fewer that bind would be more that fall out.
func fitRows(p profile.Profile, j job.Job, chance float64) ([]fitRow, error) {
	holes, err := fit.Holes(j)
	if err != nil {
		return nil, err
	}
	var rows []fitRow
	var faults []error
	for _, h := range holes {
		var f fit.Fit
		switch {
		case chance != 0 && h.Window.Press:
			f, err = fit.Best(p, h.Pin, h.Window)
		case chance != 0:
			f, err = fit.ForChance(p, h.Pin, h.Window, chance)
		default:
			f, err = fit.In(p, h.Pin, h.Window, h.Finished)
		}
		if err != nil {
			faults = append(faults, fmt.Errorf("joint %s: %w", h.Joint, err))
			continue
		}
		row := fitRow{
			Joint: h.Joint, What: h.What, DrawMM: f.Draw, MiddleMM: f.Sizes.Middle, TopMM: f.Sizes.Top, BottomMM: f.Sizes.Bottom,
			LeastMM: f.Low, MostMM: f.High, PinLeast: f.Pin.Least, PinMost: f.Pin.Most,
			Binds: f.Binds, Fits: f.Fits, Rattles: f.Rattles, Rule: h.Window.Rule, Warnings: f.Warnings,
		}
		if h.Window.Press {
			if s, ok := fit.Stress(f, p.Material, p.Thickness); ok {
				row.HoopMPa, row.PressesMM = s.Hoop, s.Interference
				if s.Warning != "" {
					row.Warnings = append(row.Warnings, s.Warning)
				}
			}
		}
		rows = append(rows, row)
	}
	return rows, errors.Join(faults...)
}

// printFits prints the table, the warnings of each hole under it.
func printFits(w io.Writer, rows []fitRow) error {
	tab := tabwriter.NewWriter(w, 0, 0, 2, ' ', tabwriter.AlignRight)
	fmt.Fprintln(tab, "joint\twhat\tdraw\ttop\tbottom\tholes\tpin\tbinds\tfits\trattles\t")
	for _, r := range rows {
		fmt.Fprintf(tab, "%s\t%s\t%.3f\t%.3f\t%.3f\t%.2f to %.2f\t%.3f to %.3f\t%.1f %%\t%.1f %%\t%.1f %%\t\n",
			r.Joint, r.What, r.DrawMM, r.TopMM, r.BottomMM, r.LeastMM, r.MostMM, r.PinLeast, r.PinMost, 100*r.Binds, 100*r.Fits, 100*r.Rattles)
	}
	if err := tab.Flush(); err != nil {
		return err
	}
	for _, r := range rows {
		for _, s := range r.Warnings {
			if _, err := fmt.Fprintf(w, "%s: %s\n", r.Joint, s); err != nil {
				return err
			}
		}
	}
	return nil
}
