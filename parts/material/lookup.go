package material

import (
	"fmt"
	"slices"
	"strings"
	"unicode"
)

// Lookup finds a material by its name or one of its other names; capitals, hyphens and words in front
// or behind ("black acrylic", "3 mm birch plywood sheet") don't matter. A word for something that must
// not be lasered decides, wherever it stands: then the error is a RefusedError, and the Material says
// the same. An unknown name is an error with the nearest spelling and the list.
func Lookup(name string) (Material, error) {
	words := split(name)
	for _, f := range forbidden {
		for _, alias := range f.names {
			if same(name, alias) || len(alias) > 2 && holds(words, split(alias)) {
				m := Material{Name: f.names[0], Asked: name, Verdict: Refused, Reason: f.reason + " (" + f.source + ")"}
				return m, RefusedError{Asked: name, Name: m.Name, Reason: m.Reason}
			}
		}
	}
	best, length := -1, 0
	note := ""
	for i, m := range sheets {
		for _, a := range append([]alias{{m.Name, ""}}, aliases[m.Name]...) {
			if w := split(a.name); holds(words, w) && len(strings.Join(w, "")) > length {
				best, length, note = i, len(strings.Join(w, "")), a.note
			}
		}
	}
	if best < 0 {
		return Material{}, unknown(name)
	}
	m := sheets[best]
	m.Asked, m.Note = name, note
	m.Lasers = slices.Clone(m.Lasers)
	m.Cautions = slices.Clone(m.Cautions)
	return m, nil
}

// Names are the names of the materials that Lookup knows, without their other names and without the
// refused ones, in the order of the table.
func Names() []string {
	out := make([]string, len(sheets))
	for i, m := range sheets {
		out[i] = m.Name
	}
	return out
}

// split gives the words of a name in small letters.
func split(name string) []string {
	return strings.FieldsFunc(strings.ToLower(name), func(c rune) bool {
		return !unicode.IsLetter(c) && !unicode.IsDigit(c) && c != '.'
	})
}

// holds tells whether some words stand in a row within others.
func holds(words, some []string) bool {
	for i := 0; i+len(some) <= len(words); i++ {
		if slices.Equal(words[i:i+len(some)], some) {
			return len(some) > 0
		}
	}
	return false
}

func same(a, b string) bool { return slices.Equal(split(a), split(b)) }

func unknown(name string) error {
	text := fmt.Sprintf("unknown material %q", name)
	best, least := "", 4
	plain := strings.Join(split(name), "")
	for _, m := range sheets {
		for _, a := range append([]alias{{m.Name, ""}}, aliases[m.Name]...) {
			c := strings.Join(split(a.name), "")
			if d := changes(plain, c); d < least && 3*d <= len(c) {
				best, least = a.name, d
			}
		}
	}
	if best != "" {
		text += ": did you mean " + best + "?"
	}
	return fmt.Errorf("%s (there is %s)", text, strings.Join(Names(), ", "))
}

// changes counts the letters to insert, delete or replace (Levenshtein's distance), in time len(a)
// len(b); words longer than 64 letters are far from everything.
func changes(a, b string) int {
	if len(a) > 64 || len(b) > 64 {
		return 64
	}
	old, line := make([]int, len(b)+1), make([]int, len(b)+1)
	for j := range old {
		old[j] = j
	}
	for i := range len(a) {
		line[0] = i + 1
		for j := range len(b) {
			cost := 1
			if a[i] == b[j] {
				cost = 0
			}
			line[j+1] = min(old[j]+cost, old[j+1]+1, line[j]+1)
		}
		old, line = line, old
	}
	return old[len(b)]
}
