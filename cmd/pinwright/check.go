package main

import (
	"cmp"
	"errors"
	"fmt"
	"io"
	"strings"

	"github.com/spf13/cobra"

	"pinwright/parts/assembly"
	"pinwright/parts/job"
	"pinwright/parts/stack"
)

func checkCommand(t terminal) *cobra.Command {
	var asJSON bool
	c := &cobra.Command{
		Use:   "check JOB",
		Short: "Tell whether a job goes together, without writing anything",
		Long: `Works a job out and says in words what it comes to: does the linkage close and
turn, transmission angles and toggles, the path of the traced joints, what each pin
carries, the smallest gaps between everything that moves, and the parts.`,
		Example: `  pinwright check arm.yaml
  pinwright check arm.yaml --json | jq .gaps`,
		Args: one("job file"),
		RunE: func(_ *cobra.Command, args []string) error {
			j, _, err := readJob(args[0])
			if err != nil {
				return err
			}
			p, err := buildable(j)
			var gaps []assembly.Gap
			if err == nil {
				gaps, err = p.gaps()
			}
			if asJSON {
				if err := writeJSON(t.out, p.findings(gaps, err)); err != nil {
					return system(err)
				}
			} else {
				p.print(t.out, gaps)
				if err == nil {
					err = p.printBody(t.out)
				}
			}
			if err != nil {
				return refused(err)
			}
			if err := p.clashes(gaps); err != nil {
				if !asJSON {
					p.printBends(t.out, gaps)
				}
				return refused(err)
			}
			if err := p.crowded(); err != nil {
				return refused(err)
			}
			if !asJSON {
				if err := p.printMounts(t.out); err != nil {
					return refused(err)
				}
				fmt.Fprintf(t.out, "%-13s it goes together\n", "verdict")
			}
			return nil
		},
	}
	c.Flags().BoolVar(&asJSON, "json", false, "print the findings as JSON")
	return c
}

// print tells in words what is known of a job; what was not reached is left out.
func (p plan) print(w io.Writer, gaps []assembly.Gap) {
	if p.motion.cycle != nil {
		printMotion(w, p.job, p.motion)
	}
	if p.found != nil {
		p.found.print(w)
	}
	for _, k := range p.kits {
		if k.Copy == p.job.Copies[0].Name {
			fmt.Fprintf(w, "%-13s %s: %s\n", "pin", k.Joint, kitWords(k))
		}
	}
	gaps = nearest(gaps)
	for i, g := range gaps {
		if i == shownGaps {
			fmt.Fprintf(w, "%-13s and %d more, all wider\n", "", len(gaps)-i)
			break
		}
		note := ""
		if g.MM < stack.RunningGap {
			note = "  tight: play in the pins may let them touch"
		}
		fmt.Fprintf(w, "%-13s %.2f mm between %s and %s, drive %.1f deg%s%s\n", "gap", g.MM, g.A, g.B, degrees(g.Angle), p.settingWords(g), note)
	}
	if len(p.parts) > 0 {
		copies := "one copy"
		if n := len(p.job.Copies); n > 1 {
			copies = fmt.Sprintf("%d copies", n)
		}
		fmt.Fprintf(w, "%-13s %d in %s, all can be cut\n", "parts", len(p.parts), copies)
	}
}

// shownGaps is how many of the smallest gaps are printed.
const shownGaps = 12

// kitWords says what a pin carries, from head to nut.
func kitWords(k stack.Kit) string {
	var names []string
	for _, e := range k.Elements {
		switch e.Kind {
		case stack.PartElement:
			names = append(names, e.Part)
		case stack.HeadElement:
		default:
			names = append(names, e.What)
		}
	}
	return fmt.Sprintf("%s through %s", k.Through.Designation, strings.Join(names, ", "))
}

// settingWords names the adjustable pivots at which a gap occurs.
func (p plan) settingWords(g assembly.Gap) string {
	var words []string
	for i, name := range p.adjustable() {
		if i < len(g.Settings) {
			words = append(words, fmt.Sprintf("%s at %.2f of its range", name, g.Settings[i]))
		}
	}
	if len(words) == 0 {
		return ""
	}
	return ", " + strings.Join(words, ", ")
}

// adjustable lists the adjustable pivots in the order of the joints.
func (p plan) adjustable() []string {
	var out []string
	for _, joint := range p.job.Linkage.Joints {
		if joint.Ground != nil && joint.Ground.Range != nil {
			out = append(out, joint.Name)
		}
	}
	return out
}

// clashes is an error that names everything that touches, a pin and all that is on it once.
func (p plan) clashes(gaps []assembly.Gap) error {
	var faults []error
	for _, g := range nearest(gaps) {
		if g.MM > 0 {
			break
		}
		faults = append(faults, p.job.Fault(p.pathOf(g),
			fmt.Sprintf("%s and %s touch at drive angle %.1f deg%s, near (%.1f, %.1f) in the linkage, at %s",
				g.A, g.B, degrees(g.Angle), p.settingWords(g), g.At.X, g.At.Y, heights(g.Low, g.Up)),
			"put one of them on another plane, make it slimmer, or bend it out of the way"))
	}
	return errors.Join(faults...)
}

// heights says over which height of the side view things touch; faces that rub have one.
func heights(low, up float64) string {
	a, b := fmt.Sprintf("%.1f", low), fmt.Sprintf("%.1f", up)
	if a == b {
		return "height " + a + " mm"
	}
	return "heights " + a + " to " + b + " mm"
}

// pathOf is the key path of a link or plate that takes part in a gap.
func (p plan) pathOf(g assembly.Gap) string {
	return cmp.Or(keyOf(p.job, g.A), keyOf(p.job, g.B), "linkage")
}

// keyOf is the key path of the link or frame plate of a name, "" when there is none.
func keyOf(j job.Job, name string) string {
	for _, l := range j.Links {
		if l.Name == name {
			return "linkage.links." + name
		}
	}
	if j.Frame != nil {
		for _, f := range j.Frame.Plates {
			if f.Name == name {
				return "frame.plates." + name
			}
		}
	}
	return ""
}

// gaps returns the smallest gaps of the mechanism, one copy of it.
func (p plan) gaps() ([]assembly.Gap, error) {
	j, list, kits, err := p.single()
	if err != nil {
		return nil, err
	}
	return assembly.Gaps(j, p.motion.mechanism, list, kits, p.levels)
}

// prove makes sure that nothing touches through the whole motion.
func (p plan) prove() error {
	gaps, err := p.gaps()
	if err != nil {
		return err
	}
	if err := p.clashes(gaps); err != nil {
		return err
	}
	return p.crowded()
}

// printMounts tells where the heads of mounting screws find no room.
func (p plan) printMounts(w io.Writer) error {
	notes, err := p.mounts()
	for _, n := range notes {
		fmt.Fprintf(w, "%-13s %s\n", "mount", n)
	}
	return err
}

// mounts says where the heads of mounting screws find no room on the side of the links.
func (p plan) mounts() ([]string, error) {
	j, list, kits, err := p.single()
	if err != nil {
		return nil, err
	}
	return assembly.Mounts(j, p.motion.mechanism, list, kits, p.levels)
}
