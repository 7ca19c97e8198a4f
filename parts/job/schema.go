package job

import (
	"encoding/json"
	"math"
	"strings"
)

// Schema writes the JSON Schema (draft 2020-12) of the job file, from the same table of keys that the
// reader checks by, so that editors complete keys and show what they mean. It is looser than the
// reader: it knows forms and words, not names that must exist elsewhere in the file.
func Schema() []byte {
	root := schemaOf(&jobForm)
	root["$schema"] = "https://json-schema.org/draft/2020-12/schema"
	root["title"] = "Pinwright job file"
	defs := object{}
	for _, dim := range []dimension{length, angle} {
		defs[quantityName(dim)] = quantitySchema(dim)
	}
	place := object{"type": "array", "items": reference(quantityName(length)), "minItems": 2, "maxItems": 2, "description": "A place [x, y]."}
	defs["place"] = place
	root["$defs"] = defs
	out, err := json.MarshalIndent(root, "", "  ")
	if err != nil {
		return nil // maps, lists, strings and finite numbers can always be written
	}
	return append(out, '\n')
}

// object is a JSON object; its keys are written in alphabetical order.
type object map[string]any

func reference(name string) object { return object{"$ref": "#/$defs/" + name} }

func quantityName(dim dimension) string {
	if dim == angle {
		return "angle"
	}
	return "length"
}

// quantitySchema is a bare number or a number with a unit.
func quantitySchema(dim dimension) object {
	about := "A length: 3mm, 0.25in, 1/4in, 1.2cm; or a bare number in the unit of units."
	if dim == angle {
		about = "An angle: 15deg, 0.26rad, 0.5turn; or a bare number in the unit of units."
	}
	return object{
		"description": about,
		"anyOf": []any{
			object{"type": "number"},
			object{"type": "string", "pattern": `^\s*(?:` + decimalPattern + `|` + fractionPattern + `)\s*(?:` + strings.Join(unitNames(dim), "|") + `)?\s*$`},
		},
	}
}

func schemaOf(f *form) object {
	switch f.kind {
	case aQuantity:
		if f.dim == plain {
			return object{"type": "number", "minimum": f.low, "maximum": f.high}
		}
		out := reference(quantityName(f.dim))
		// Bounds other than zero depend on the unit, and those of numbers with units are no numbers.
		if f.low == 0 && f.above {
			out["exclusiveMinimum"] = 0
		} else if f.low == 0 {
			out["minimum"] = 0
		}
		return out
	case aWhole:
		return object{"type": "integer", "minimum": int(math.Round(f.low)), "maximum": int(math.Round(f.high))}
	case aFlag:
		return object{"type": "boolean"}
	case aText:
		return object{"type": []any{"string", "number"}, "minLength": 1, "maxLength": longestText}
	case aName:
		// Names may look like numbers or truth values to YAML: 624, no.
		return object{"type": []any{"string", "number", "boolean"}, "pattern": f.rule.pattern}
	case aChoice:
		words := make([]any, len(f.words))
		for i, w := range f.words {
			words[i] = w
		}
		return object{"enum": words}
	case aPlace:
		return reference("place")
	case aList:
		out := object{"type": "array", "items": schemaOf(f.item), "minItems": f.least}
		if f.most > 0 {
			out["maxItems"] = f.most
		}
		return out
	case aNamed:
		return object{
			"type": "object", "minProperties": f.least,
			"patternProperties":    object{f.rule.pattern: schemaOf(f.item)},
			"additionalProperties": false,
		}
	case aTable:
		return tableSchema(f)
	case anEither:
		variants := make([]any, len(f.variants))
		for i := range f.variants {
			variants[i] = schemaOf(&f.variants[i])
		}
		return object{"anyOf": variants}
	}
	return object{}
}

func tableSchema(f *form) object {
	properties, need := object{}, []any{}
	for i := range f.keys {
		k := &f.keys[i]
		s := schemaOf(&k.form)
		s["description"] = k.about
		properties[k.name] = s
		if k.need {
			need = append(need, k.name)
		}
	}
	out := object{"type": "object", "properties": properties, "additionalProperties": false}
	if len(need) > 0 {
		out["required"] = need
	}
	if len(f.exactly) > 0 {
		var one []any
		for _, name := range f.exactly {
			one = append(one, object{"required": []any{name}})
		}
		out["oneOf"] = one
	}
	return out
}
