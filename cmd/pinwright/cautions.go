package main

import (
	"fmt"
	"slices"
	"strings"

	"pinwright/parts/material"
)

// general is what must be read before the laser is switched on and before the thing moves, whatever it is
// made of.
var general = [...]string{
	"The beam can blind and burn, and the material can catch fire: follow the laser's manual, local codes and the people in charge of it. Wear the eye protection they name, keep lids and interlocks closed, never leave a running laser alone and have the right fire extinguisher at hand.",
	"Cutting gives off unhealthy fumes: cut only with extraction running. Cut only material that you know; chlorinated plastics such as PVC must never go in.",
	"A moving linkage pinches and shears: keep fingers away, guard it where others can reach it, and switch the drive off before you touch it.",
	"Sizes and strengths here are for models and prototypes, not for anything that carries people or that can hurt someone when it fails; ask a qualified person there.",
}

// saidInGeneral are the cautions of materials that the general ones hold already.
var saidInGeneral = [...]string{
	"Never leave a running laser alone; keep a fire extinguisher at hand.",
	"Cut with extraction: the fumes are unhealthy.",
}

// cautions are the general ones, then those of the materials of the job, each once with the names of
// all materials that it is for.
func (p plan) cautions() []string {
	out := slices.Clone(general[:])
	type caution struct {
		text string
		of   []string
	}
	var list []caution
	add := func(of, text string) {
		i := slices.IndexFunc(list, func(c caution) bool { return c.text == text })
		if i < 0 {
			i = len(list)
			list = append(list, caution{text: text})
		}
		if !slices.Contains(list[i].of, of) {
			list[i].of = append(list[i].of, of)
		}
	}
	for _, s := range p.job.Stock {
		m, err := material.Lookup(s.Material)
		if err != nil {
			continue
		}
		for _, c := range m.Cautions {
			if !slices.Contains(saidInGeneral[:], c) {
				add(m.Name, c)
			}
		}
		if m.Note != "" {
			add(s.Name, m.Note)
		}
	}
	for _, c := range list {
		out = append(out, fmt.Sprintf("%s: %s", strings.Join(c.of, ", "), c.text))
	}
	return out
}
