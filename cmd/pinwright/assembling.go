package main

import (
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"

	"pinwright/export/pdf"
	"pinwright/export/picture"
	"pinwright/parts"
	"pinwright/parts/job"
	"pinwright/parts/stack"
	"pinwright/parts/steps"
)

// assembling is the order of the assembly of the first copy, and the pins that it is about. An item of
// a pin is an element of the kit, in the same order; heads belong to their bolt and have no item.
type assembling struct {
	steps []steps.Step
	pins  []steps.Pin
	items map[string][]int // by joint: item of each element, -1 for a head
}

// assembling puts the assembly of the first copy in order.
func (p plan) assembling() (assembling, error) {
	a := assembling{items: map[string][]int{}}
	for _, k := range p.firstKits() {
		pin := steps.Pin{Joint: k.Joint, Through: throughOf(k.Through), Notes: slices.Clone(k.Notes)}
		if k.Pin.Kind == job.BearingPin && k.Pin.Nut != "none" {
			pin.Notes = append([]string{"Tighten the nut: the links turn on the bearing, not on the bolt."}, pin.Notes...)
		}
		var items []int
		for _, e := range k.Elements {
			if e.Kind == stack.HeadElement {
				items = append(items, -1)
				continue
			}
			items = append(items, len(pin.Items))
			pin.Items = append(pin.Items, p.itemOf(e))
		}
		a.pins, a.items[k.Joint] = append(a.pins, pin), items
	}
	var err error
	a.steps, err = steps.Order(p.stepParts(), a.pins)
	return a, err
}

// throughOf names the bolt or shaft of a kit.
func throughOf(t stack.Through) string {
	switch {
	case t.Length <= 0:
		return fmt.Sprintf("%s (%s mm and what it goes on into)", t.Designation, strconv.FormatFloat(math.Ceil(t.Need*10-1e-6)/10, 'f', -1, 64))
	case strings.HasPrefix(t.Designation, "shaft"):
		return fmt.Sprintf("%s, %s mm long,", t.Designation, strconv.FormatFloat(t.Length, 'f', -1, 64))
	}
	return t.Designation
}

// itemOf is an element of a kit of the first copy for the steps.
func (p plan) itemOf(e stack.Element) steps.Item {
	switch e.Kind {
	case stack.PartElement:
		return steps.Item{Part: p.partAt(e)}
	case stack.BearingElement:
		return steps.Item{What: "bearing " + e.What, Part: p.partAt(e), Seat: true}
	case stack.SleeveElement:
		return steps.Item{What: fmt.Sprintf("the sleeve of %s mm", strconv.FormatFloat(e.Thickness, 'f', -1, 64))}
	case stack.SpacerElement:
		return steps.Item{What: fmt.Sprintf("the spacer of %s mm", strconv.FormatFloat(e.Thickness, 'f', -1, 64))}
	}
	if what := string(e.Kind); !strings.Contains(e.What, what) {
		return steps.Item{What: what + " " + e.What}
	}
	return steps.Item{What: e.What}
}

// partAt is the name of the part of the first copy that an element is or sits in: of several of one
// link the one on the level that is nearest.
func (p plan) partAt(e stack.Element) string {
	name, best := e.Part, math.Inf(1)
	for _, part := range p.firstParts() {
		if part.Link != e.Part {
			continue
		}
		if away := math.Abs(p.height(part) - e.From); away < best {
			name, best = part.Name, away
		}
	}
	return name
}

// height is that of the lower face of a part.
func (p plan) height(part parts.Part) float64 { return p.levels[p.levelIndex(part.Plane)].From }

// stepParts are the parts of the first copy for the steps. Cross members stand on the lowest frame plate
// and go through or into the others.
func (p plan) stepParts() []steps.Part {
	var out []steps.Part
	var low string
	least := math.Inf(1)
	var crosses []string
	list := p.firstParts()
	for _, part := range list {
		if p.isPlate(part.Link) && p.height(part) < least {
			low, least = part.Name, p.height(part)
		}
		if _, ok := p.crossIndex(part); ok {
			crosses = append(crosses, part.Name)
		}
	}
	for _, part := range list {
		s := steps.Part{Name: part.Name, Mark: part.Mark.Text, Height: p.height(part)}
		switch {
		case slices.Contains(crosses, part.Name):
			s.After, s.How = []string{low}, "Push its tabs into the slots of the plate."
		case p.isPlate(part.Link) && part.Name != low && len(crosses) > 0:
			s.After, s.How = crosses, "The cross members go into its slots."
		}
		out = append(out, s)
	}
	return out
}

// stepOf tells in which step an element of a joint's kit goes on; 0 for a head.
func (a assembling) stepOf(joint string, element int) int {
	item := a.items[joint][element]
	if item < 0 {
		return 0
	}
	for _, s := range a.steps {
		for _, d := range s.Deeds {
			if d.Joint != joint {
				continue
			}
			if d.Part == item || slices.Contains(d.Press, item) || slices.Contains(d.Under, item) || slices.Contains(d.Over, item) {
				return s.Number
			}
		}
	}
	return 0
}

// explodedKits are the kits of the side view with the marks of the parts.
func (p plan) explodedKits(a assembling) []picture.Kit {
	marks := map[string]string{}
	for _, s := range a.steps {
		marks[s.Part] = s.Takes()
	}
	kits := p.sideKits(a)
	for i, k := range p.firstKits() {
		for n, e := range k.Elements {
			if piece := &kits[i].Pieces[n+1]; piece.Kind == picture.PartPiece {
				piece.Name = marks[p.partAt(e)]
			}
		}
	}
	return kits
}

// assemblyTable tells the steps.
func assemblyTable(a assembling) pdf.Table {
	t := pdf.Table{Columns: []pdf.Column{{Head: "step", Right: true}, {Head: "take"}, {Head: "and do"}}}
	for _, s := range a.steps {
		t.Rows = append(t.Rows, []string{strconv.Itoa(s.Number), s.Takes(), strings.Join(s.Words(), " ")})
	}
	return t
}

// assemblyIntro says how the steps are to be read.
func (p plan) assemblyIntro() string {
	out := "From the lowest plane to the highest, with the marks that are engraved on the parts; marked faces look up, towards the nuts. Joints are named as in the drawings."
	if len(p.job.Copies) > 1 {
		var others []string
		for _, c := range p.job.Copies[1:] {
			name := c.Name
			if c.Mirror != p.job.Copies[0].Mirror {
				name += " (mirrored)"
			}
			others = append(others, name)
		}
		out += fmt.Sprintf(" The steps are those of %s; in the same way, with their own marks: %s.", p.job.Copies[0].Name, strings.Join(others, ", "))
	}
	return out
}
