package main

import (
	"errors"
	"fmt"
	"io"
	"io/fs"
	"os"
	"time"

	"github.com/spf13/cobra"

	"pinwright/kerf/estimate"
	"pinwright/kerf/profile"
	"pinwright/kerf/reading"
)

// fitOptions are the flags of the command fit.
type fitOptions struct {
	out       string
	sheet     reading.Sheet // what the flags say of the coupon
	table     bool
	profile   string
	chance    float64
	asJSON    bool
	thickness float64
}

func fitCommand(t terminal) *cobra.Command {
	var o fitOptions
	c := &cobra.Command{
		Use:   "fit READINGS | fit --table JOB --profile PROFILE",
		Short: "From readings of a coupon to what the laser does, and to holes that fit",
		Long: `Reads what was measured on a coupon (calliper values, gauges, how pins go) and
finds kerf, how holes differ, difference between the axes, taper and scatter, each
with its 95 % interval; -o writes them into a profile of this laser and sheet.

With --table it lists the pins of a job with the circle to draw for each, the
way of the beam's centre, the hole that comes of it through the thickness, and the
chance that the pin binds, fits or rattles. --chance 0.95 asks for the tightest holes
of which at most one in twenty binds, instead of the fit that the job names.

The table of readings is CSV: rows of a key and its value (material,
thickness_mm, laser, date, resolution_mm), then a heading of feature, kind (hole, slot,
bar), drawn_mm and, as needed, count, axis (x, y), side (top, bottom), reading_mm,
over_mm and under_mm, pin_mm and answer (drops, turns, push, no). drawn_mm is
what went to the laser, the way of the beam's centre.`,
		Example: `  pinwright fit readings.csv -o acrylic3.profile.yaml
  pinwright fit --table arm.yaml --profile acrylic3.profile.yaml
  pinwright fit --table arm.yaml --profile acrylic3.profile.yaml --chance 0.95`,
		Args: cobra.ExactArgs(1),
		RunE: func(_ *cobra.Command, args []string) error {
			if o.table {
				return fitTable(t, args[0], o)
			}
			if o.profile != "" || o.chance != 0 {
				return errors.New("--profile and --chance go with --table")
			}
			return fitReadings(t, args[0], o)
		},
	}
	f := c.Flags()
	f.StringVarP(&o.out, "output", "o", "", "write the profile to this file")
	f.StringVar(&o.sheet.Material, "material", "", "of what the coupon was cut, when the table does not say")
	f.Float64Var(&o.thickness, "thickness", 0, "its measured thickness, mm, when the table does not say")
	f.StringVar(&o.sheet.Laser, "laser", "", "on which laser, when the table does not say")
	f.StringVar(&o.sheet.Date, "date", "", "when, as 2026-11-30, when the table does not say")
	f.BoolVar(&o.table, "table", false, "list the holes of a job's pins")
	f.StringVar(&o.profile, "profile", "", "the profile for the table")
	f.Float64Var(&o.chance, "chance", 0, "wanted chance that a pin does not bind, 0.5 to 0.999")
	f.BoolVar(&o.asJSON, "json", false, "print the findings as JSON")
	return c
}

// fitReadings makes a profile of readings.
func fitReadings(t terminal, path string, o fitOptions) error {
	data, err := os.ReadFile(path)
	if err != nil {
		return system(err)
	}
	s, err := reading.Read(path, data)
	if err != nil {
		return refused(err)
	}
	if err := complete(&s, o); err != nil {
		return err
	}
	r, err := estimate.Fit(s.Readings)
	if err != nil {
		return refused(fmt.Errorf("%s: %w", path, err))
	}
	p := profile.Of(s, r)
	if o.asJSON {
		err = writeJSON(t.out, r)
	} else {
		err = printEstimate(t.out, s, r)
	}
	if err != nil {
		return system(err)
	}
	if o.out == "" {
		return nil
	}
	text, err := p.Write()
	if err != nil {
		return refused(fmt.Errorf("%s: no profile can be made: %w", path, err))
	}
	if err := writeNew(o.out, text); err != nil {
		return system(err)
	}
	fmt.Fprintf(t.err, "wrote %s\n", o.out)
	return nil
}

// complete fills in from the flags what the table does not say; where both speak they must agree.
func complete(s *reading.Sheet, o fitOptions) error {
	for _, f := range []struct {
		name     string
		to       *string
		flag     string
		required bool
	}{
		{"material", &s.Material, o.sheet.Material, o.out != ""}, {"laser", &s.Laser, o.sheet.Laser, false}, {"date", &s.Date, o.sheet.Date, false},
	} {
		switch {
		case *f.to == "":
			*f.to = f.flag
		case f.flag != "" && f.flag != *f.to:
			return fmt.Errorf("--%s says %s, the table %s", f.name, f.flag, *f.to)
		}
		if f.required && *f.to == "" {
			return fmt.Errorf("a profile needs to know the %s: say --%s, or write it into the table", f.name, f.name)
		}
	}
	if _, err := time.Parse(time.DateOnly, s.Date); s.Date != "" && err != nil {
		return fmt.Errorf("--date %s: write it as 2026-11-30", s.Date)
	}
	switch {
	case s.Thickness == 0:
		s.Thickness = o.thickness
	case o.thickness != 0 && o.thickness != s.Thickness:
		return fmt.Errorf("--thickness says %g, the table %g", o.thickness, s.Thickness)
	}
	if o.out != "" && !(s.Thickness > 0) {
		return errors.New("a profile needs to know the thickness: say --thickness, or write it into the table")
	}
	return nil
}

// writeNew writes a file that does not exist yet.
func writeNew(path string, text []byte) error {
	f, err := os.OpenFile(path, os.O_WRONLY|os.O_CREATE|os.O_EXCL, 0o644)
	if errors.Is(err, fs.ErrExist) {
		return fmt.Errorf("%s exists already and is left as it is: give another name", path)
	}
	if err != nil {
		return err
	}
	if _, err := f.Write(text); err != nil {
		return errors.Join(err, f.Close())
	}
	return f.Close()
}

// printEstimate tells in words what readings say.
func printEstimate(w io.Writer, s reading.Sheet, r estimate.Result) error {
	var err error
	say := func(format string, args ...any) {
		if err == nil {
			_, err = fmt.Fprintf(w, format, args...)
		}
	}
	say("%-13s %d of %d features", "readings", r.Readings, r.Features)
	if s.Blank > 0 {
		say(", %d rows not filled in", s.Blank)
	}
	say("\n")
	for _, f := range r.Figures {
		say("%-13s %.3f mm, 95 %% interval %.3f to %.3f", f.Term, f.Value, f.Low, f.High)
		switch f.Term {
		case estimate.Holes:
			say(" on top, in holes of %.1f mm", r.Centre)
		case estimate.Diameter:
			say(" times (%.3f / drawn - 1), in holes", r.Centre)
		case estimate.Axis:
			say(" wider along x than along y")
		case estimate.Taper:
			say(" wider at the top than at the bottom")
		case estimate.Scatter:
			say(" from one to the next (standard deviation)")
		}
		say("\n")
	}
	for _, d := range r.Dropped {
		say("%-13s %s: changes AICc by %+.1f, must bring %+.0f\n", "left out", d.Term, d.AICc, -estimate.Gain)
	}
	for _, o := range r.Outliers {
		say("%-13s %s (line %d) is %.1f standard deviations off: measure it again, or strike it out\n", "outlier", o.Feature, o.Line, o.Off)
	}
	for _, a := range r.Advice {
		say("%-13s %s\n", "next", a)
	}
	return err
}
