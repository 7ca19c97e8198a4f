package job

import "strings"

// value is what was read at one place of the job file, checked against its form. All methods take a
// nil value as "not given" and a value that is not sound (an error was reported) likewise, so that
// one mistake is told once.
type value struct {
	form    *form
	at      spot // the value itself, or its key when it runs over several lines
	path    string
	text    string  // aText, aName, aChoice
	number  float64 // aQuantity (mm, radians), aWhole
	flag    bool
	x, y    float64 // aPlace
	entries []entry // aTable, aNamed: in the order of the file
	items   []*value
	sound   bool
	torn    bool // aTable, aNamed: entries are hidden in something refused, so none counts as missing
}

// entry is a key or a name with its value.
type entry struct {
	name  string
	at    spot // of the key
	value *value
}

// get gives the value of a key, nil when it is not given.
func (v *value) get(name string) *value {
	if v != nil {
		for _, e := range v.entries {
			if e.name == name {
				return e.value
			}
		}
	}
	return nil
}

// has tells whether a key is written, soundly or not.
func (v *value) has(name string) bool { return v.get(name) != nil }

func (v *value) ok() bool { return v != nil && v.sound }

// isWhole tells whether the value is sound and all its entries could be read as entries.
func (v *value) isWhole() bool { return v.ok() && !v.torn }

func (v *value) numberOr(fallback float64) float64 {
	if !v.ok() {
		return fallback
	}
	return v.number
}

func (v *value) textOr(fallback string) string {
	if !v.ok() {
		return fallback
	}
	return v.text
}

func (v *value) isTrue() bool { return v.ok() && v.flag }

func (v *value) each() []*value {
	if v == nil {
		return nil
	}
	return v.items
}

func (v *value) all() []entry {
	if v == nil {
		return nil
	}
	return v.entries
}

// within tells whether the value stands in another, or is it.
func (v *value) within(other *value) bool {
	return other != nil && (v.path == other.path || strings.HasPrefix(v.path, other.path+"."))
}
