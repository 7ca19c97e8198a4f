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

// oneOf lists words as "a, b or c".
func oneOf(words []string) string { return join(words, " or ") }

// allOf lists words as "a, b and c".
func allOf(words []string) string { return join(words, " and ") }

func join(words []string, last string) string {
	switch len(words) {
	case 0:
		return ""
	case 1:
		return words[0]
	}
	return strings.Join(words[:len(words)-1], ", ") + last + words[len(words)-1]
}

// plural is the s of several things.
func plural(n int) string {
	if n == 1 {
		return ""
	}
	return "s"
}

// isAre is the verb that goes with a number of things.
func isAre(n int) string {
	if n == 1 {
		return " is"
	}
	return " are"
}
