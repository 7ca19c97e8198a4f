package job

import (
	"fmt"

	"go.yaml.in/yaml/v3"
)

// findUnits looks up the units of bare numbers before anything is read, wherever in the file they
// stand. When they are there but wrong, bare numbers are passed over: the error in units is told, and
// one is enough.
func (r *reader) findUnits(root *yaml.Node) {
	if root.Kind != yaml.MappingNode {
		return
	}
	for i := 0; i+1 < len(root.Content); i += 2 {
		k, v := root.Content[i], root.Content[i+1]
		if k.Value != "units" && nearest(k.Value, jobForm.names()) != "units" {
			continue
		}
		if v.Kind != yaml.MappingNode {
			r.noUnit = true
			return
		}
		for n := 0; n+1 < len(v.Content); n += 2 {
			dim := length
			switch v.Content[n].Value {
			case "length":
			case "angle":
				dim = angle
			default:
				r.noUnit = true
				continue
			}
			u, known := unitNamed(v.Content[n+1].Value)
			if !known || u.dim != dim {
				r.noUnit = true
				continue
			}
			r.unit[dim] = u.name
		}
	}
}

// unitless is a bare number where no unit is stated.
type unitless struct {
	at   spot
	text string
}

// tellBare reports the numbers without a unit, once for lengths and once for angles of each file.
func (r *reader) tellBare() {
	if r.noUnit {
		return
	}
	for _, dim := range []dimension{length, angle} {
		noun, example := "length", "mm"
		if dim == angle {
			noun, example = "angle", "deg"
		}
		told := map[string]bool{}
		for i, first := range r.bare[dim] {
			if told[first.at.File] {
				continue
			}
			told[first.at.File] = true
			others, last := 0, 0
			next := 0
			for _, b := range r.bare[dim][i+1:] {
				if b.at.File == first.at.File {
					others++
					last = b.at.Line
					if next == 0 {
						next = last
					}
				}
			}
			also := ""
			switch {
			case others == 1:
				also = fmt.Sprintf(", nor has one more %s, on line %d", noun, next)
			case others > 1 && next == last:
				also = fmt.Sprintf(", nor have %d more %ss, on line %d", others, noun, next)
			case others > 1:
				also = fmt.Sprintf(", nor have %d more %ss, on lines %d to %d", others, noun, next, last)
			}
			r.fail(first.at, fmt.Sprintf("write %s%s, or state units: {%s: %s} once", first.text, example, noun, example),
				"%s has no unit%s", short(first.text), also)
		}
	}
}
