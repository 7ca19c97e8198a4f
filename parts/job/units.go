package job

import "go.yaml.in/yaml/v3"

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
