package main

import (
	"fmt"
	"io"
	"math"

	"pinwright/parts"
	"pinwright/parts/assembly"
	"pinwright/parts/job"
	"pinwright/parts/stack"
)

// single returns parts and kits of one copy that is not mirrored, for questions about gaps.
func (p plan) single() (job.Job, []parts.Part, []stack.Kit, error) {
	j := p.job
	list, kits := p.parts, p.kits
	name, found := "", false
	for _, c := range j.Copies {
		if !c.Mirror {
			name, found = c.Name, true
			break
		}
	}
	if !found {
		// Every copy is a mirror image: look at the original, which has the same gaps.
		alone := j
		alone.Copies, alone.Body = []job.Copy{{}}, nil
		var err error
		if list, err = parts.Make(alone, p.motion.mechanism, faces(p.levels)); err != nil {
			return j, nil, nil, err
		}
		if kits, err = stack.Build(alone); err != nil {
			return j, nil, nil, err
		}
	}
	var one []parts.Part
	for _, x := range list {
		if x.Copy == name {
			one = append(one, x)
		}
	}
	var pins []stack.Kit
	for _, k := range kits {
		if k.Copy == name {
			pins = append(pins, k)
		}
	}
	return j, one, pins, nil
}

// spacing finds how close the copies may stand on their body; nil when the job has none.
func (p plan) spacing() (*assembly.Spacing, error) {
	if p.job.Body == nil {
		return nil, nil
	}
	j, list, kits, err := p.single()
	if err != nil {
		return nil, err
	}
	s, err := assembly.Space(j, p.motion.mechanism, list, kits, p.levels)
	if err != nil {
		return nil, fmt.Errorf("%s: body: %w", j.At("body"), err)
	}
	return &s, nil
}

// crowded is an error if the copies stand closer on their body than they may, or if that cannot be
// told.
func (p plan) crowded() error {
	if p.job.Body == nil {
		return nil
	}
	if p.job.Body.Spacing == 0 {
		_, err := p.spacing()
		return err
	}
	j, list, kits, err := p.single()
	if err != nil {
		return err
	}
	return assembly.Crowded(j, p.motion.mechanism, list, kits, p.levels)
}

// printBody tells how close the copies may stand on their body.
func (p plan) printBody(w io.Writer) error {
	s, err := p.spacing()
	if s == nil {
		return err
	}
	words := fmt.Sprintf("copies may stand %s mm apart along their shafts and more", upToTenth(s.Clear))
	if s.Between != "" {
		words += fmt.Sprintf("; %s rule", s.Between)
		if !s.Still {
			words += fmt.Sprintf(", drive %.1f deg", degrees(s.Angle))
		}
	}
	fmt.Fprintf(w, "%-13s %s\n", "body", words)
	if s.Least < s.Clear-0.05 {
		fmt.Fprintf(w, "%-13s or %s mm, where they reach into one another and touch nowhere\n", "", upToTenth(s.Least))
	}
	if s.Blocked != "" {
		fmt.Fprintf(w, "%-13s note: %s\n", "", s.Blocked)
	}
	return nil
}

// printBends tells which bars could be bent out of the way.
func (p plan) printBends(w io.Writer, gaps []assembly.Gap) {
	j, list, kits, err := p.single()
	if err != nil {
		return
	}
	asked := map[string]bool{}
	for _, g := range gaps {
		if g.MM > 0 {
			break
		}
		for _, name := range []string{g.A, g.B} {
			if asked[name] {
				continue
			}
			asked[name] = true
			b, ok, err := assembly.FindBend(j, p.motion.mechanism, list, kits, p.levels, name)
			if err == nil && ok {
				fmt.Fprintf(w, "%-13s shape: bent, bend: %.1fmm on %s frees it (gap %.2f mm)\n", "advice", b.MM, b.Link, b.Gap)
			}
		}
	}
}

// upToTenth writes a length rounded up to a tenth.
func upToTenth(mm float64) string { return fmt.Sprintf("%.1f", math.Ceil(mm*10-1e-6)/10) }
