package main

import (
	"fmt"
	"math"

	"github.com/spf13/cobra"

	"pinwright/parts"
	"pinwright/parts/assembly"
	"pinwright/parts/job"
	"pinwright/parts/stack"
)

func checkCommand(t terminal) *cobra.Command {
	c := &cobra.Command{
		Use:   "check JOB",
		Short: "Tell whether a job goes together, without writing anything",
		Args:  cobra.ExactArgs(1),
		RunE: func(_ *cobra.Command, args []string) error {
			j, _, err := readJob(args[0])
			if err != nil {
				return err
			}
			p, err := buildable(j)
			if p.motion.cycle != nil {
				printMotion(t.out, j, p.motion)
			}
			if err != nil {
				return refused(err)
			}
			gaps, err := p.gaps()
			if err != nil {
				return refused(err)
			}
			for _, g := range gaps {
				fmt.Fprintf(t.out, "gap %-20s %-20s %.2f at %.1f\n", g.A, g.B, g.MM, degrees(g.Angle))
			}
			return nil
		},
	}
	return c
}

// gaps returns the smallest gaps of the mechanism, one copy of it.
func (p plan) gaps() ([]assembly.Gap, error) {
	j := p.job
	name := ""
	found := false
	for _, c := range j.Copies {
		if !c.Mirror {
			name, found = c.Name, true
			break
		}
	}
	list, kits := p.parts, p.kits
	if !found {
		// Every copy is a mirror image: look at the original, which has the same gaps.
		j.Copies = []job.Copy{{}}
		var err error
		if list, err = parts.Make(j, p.motion.mechanism, faces(p.levels)); err != nil {
			return nil, err
		}
		if kits, err = stack.Build(j); err != nil {
			return nil, err
		}
	}
	var one []parts.Part
	for _, x := range list {
		if x.Copy == name {
			one = append(one, x)
		}
	}
	var kit []stack.Kit
	for _, k := range kits {
		if k.Copy == name {
			kit = append(kit, k)
		}
	}
	return assembly.Gaps(j, p.motion.mechanism, one, kit, p.levels)
}

// prove makes sure that nothing touches.
func (p plan) prove() error {
	gaps, err := p.gaps()
	if err != nil {
		return err
	}
	if len(gaps) > 0 && gaps[0].MM <= 0 {
		g := gaps[0]
		return fmt.Errorf("%s and %s touch at drive angle %.1f deg", g.A, g.B, g.Angle*180/math.Pi)
	}
	return nil
}
