package job

import (
	"slices"
	"strconv"
	"strings"
)

// known reads a name that must be one of those given. An unknown name is reported; the one that was
// surely meant is then taken for it, so that what follows makes sense; "" when there is none.
func (r *reader) known(v *value, among []string, noun, where string) string {
	if !v.ok() {
		return ""
	}
	if slices.Contains(among, v.text) {
		return v.text
	}
	if where != "" {
		where += ": "
	}
	near := nearest(v.text, among)
	hint := ""
	switch {
	case near != "":
		hint = "did you mean " + near + "?"
	case len(among) > 0 && len(among) <= 12:
		hint = "there is " + oneOf(among)
	}
	r.fail(v.at, hint, "%sunknown %s %s", where, noun, short(v.text))
	return near
}

func contains(words []string, word string) bool { return slices.Contains(words, word) }

func itoa(n int) string { return strconv.Itoa(n) }

func lower(s string) string { return strings.ToLower(s) }

// sameName tells whether two names would be one file on a disk that takes capitals for small letters.
func sameName(a, b string) bool { return strings.EqualFold(a, b) }

func nameOr(name, fallback string) string {
	if name == "" {
		return fallback
	}
	return name
}

// counted writes "1 copy", "3 copies".
func counted(n int, noun string) string {
	switch {
	case n == 1:
		return "1 " + noun
	case strings.HasSuffix(noun, "y"):
		return strconv.Itoa(n) + " " + strings.TrimSuffix(noun, "y") + "ies"
	}
	return strconv.Itoa(n) + " " + noun + "s"
}
