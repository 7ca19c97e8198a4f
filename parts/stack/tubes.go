package stack

import (
	"fmt"
	"slices"

	"pinwright/parts/job"
	"pinwright/parts/stack/tube"
)

// Tube is a kind of tube and how the spacers and sleeves are cut from it, those to spare included.
type Tube struct {
	Designation string  // "tube for 4 mm, outside 8 mm": what goes through, and its outside
	Bore        float64 // of the bolt or shaft that goes through, mm
	Outside     float64 // mm
	Length      float64 // of one tube, mm
	Saw         float64 // mm
	Plan        tube.Plan
	Joints      []string
}

// Tubes plans the cutting of the spacers and sleeves of a list, by kind of tube in the order of the list.
// Nothing when they are bought in stock lengths, or nothing is known of the tube. A piece that is longer
// than the tube is an error.
func Tubes(j job.Job, lines []Line) ([]Tube, error) {
	if j.Spacers.Tube <= 0 {
		return nil, nil
	}
	var out []Tube
	var pieces [][]tube.Piece
	for _, l := range lines {
		if l.Outside <= 0 || l.Kind != SpacerLine && l.Kind != SleeveLine {
			continue
		}
		name := fmt.Sprintf("tube for %.3g mm, outside %.3g mm", l.Diameter, l.Outside)
		i := slices.IndexFunc(out, func(t Tube) bool { return t.Designation == name })
		if i < 0 {
			i = len(out)
			out = append(out, Tube{Designation: name, Bore: l.Diameter, Outside: l.Outside, Length: j.Spacers.Tube, Saw: j.Spacers.Saw})
			pieces = append(pieces, nil)
		}
		pieces[i] = append(pieces[i], tube.Piece{Length: l.Length, Count: l.Buy})
		for _, joint := range l.Joints {
			if !slices.Contains(out[i].Joints, joint) {
				out[i].Joints = append(out[i].Joints, joint)
			}
		}
	}
	for i := range out {
		var err error
		if out[i].Plan, err = tube.Cut(j.Spacers.Tube, j.Spacers.Saw, pieces[i]); err != nil {
			return nil, fault(j, "spacers", fmt.Sprintf("%s: %v", out[i].Designation, err), "")
		}
	}
	return out, nil
}

// tubeLine is a line of the list for a kind of tube.
func tubeLine(t Tube) Line {
	note := fmt.Sprintf("%d of %g mm; %.0f mm are left over, %.0f mm go with the saw", len(t.Plan.Bars), t.Length, t.Plan.Left, t.Plan.Saw)
	if t.Plan.Best {
		note += "; fewer do not do"
	} else {
		note += fmt.Sprintf("; at least %d", t.Plan.Bound)
	}
	return Line{
		Kind: TubeLine, Designation: t.Designation, Length: t.Length, Diameter: t.Bore, Outside: t.Outside,
		Need: len(t.Plan.Bars), Buy: len(t.Plan.Bars), Joints: t.Joints, Note: note,
	}
}
