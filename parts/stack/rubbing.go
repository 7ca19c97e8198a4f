package stack

import (
	"slices"

	"pinwright/parts/job"
	"pinwright/parts/material"
)

// rubs tells whether two parts of a kit turn against each other face to face, both of acrylic, which
// seizes on itself.
func rubs(j job.Job, k Kit) bool {
	for i := 1; i < len(k.Elements); i++ {
		a, b := k.Elements[i-1], k.Elements[i]
		if a.Kind == PartElement && b.Kind == PartElement && isAcrylic(j, a.Part) && isAcrylic(j, b.Part) {
			return true
		}
	}
	return false
}

// isAcrylic tells whether a link or a frame plate is cut from acrylic.
func isAcrylic(j job.Job, part string) bool {
	name := ""
	if i := slices.IndexFunc(j.Links, func(l job.Link) bool { return l.Name == part }); i >= 0 {
		name = j.Links[i].Stock
	} else if j.Frame != nil {
		name = j.Frame.Stock
	}
	s, ok := stockNamed(j, name)
	if !ok {
		return false
	}
	m, err := material.Lookup(s.Material)
	return err == nil && (m.Name == "cast acrylic" || m.Name == "extruded acrylic")
}
