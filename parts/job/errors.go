package job

import (
	"slices"
	"strconv"
	"strings"
	"unicode/utf8"
)

// Error is one thing wrong with a job file or with a table that it names.
type Error struct {
	Position
	Span    int    // how many characters are meant, at least 1
	Source  string // the line itself, without its end
	Message string // what is wrong, by how much
	Hint    string // what to do; may be empty
}

// Error writes the place and the message, the line itself with carets under what is meant, and the
// cure, each on a line of its own.
func (e Error) Error() string {
	var b strings.Builder
	b.WriteString(e.Position.String() + ": " + e.Message)
	if strings.TrimSpace(e.Source) != "" {
		line, caret := excerpt(e.Source, e.Column, e.Span)
		b.WriteString("\n  " + line + "\n  " + caret)
	}
	if e.Hint != "" {
		b.WriteString("\n  " + e.Hint)
	}
	return b.String()
}

// Errors is everything that is wrong with a job file: first what is in the job file itself, then
// what is in its tables, each sorted by place.
type Errors []Error

// mostShown is how many errors are written out: more than a screen helps nobody.
const mostShown = 50

// Error writes the errors with an empty line between them, at most 50, and counts the rest.
func (es Errors) Error() string {
	var b strings.Builder
	for i, e := range es {
		if i == mostShown {
			b.WriteString("\n\nand " + strconv.Itoa(len(es)-i) + " more")
			break
		}
		if i > 0 {
			b.WriteString("\n\n")
		}
		b.WriteString(e.Error())
	}
	return b.String()
}

// Unwrap gives the errors one by one, for errors.As.
func (es Errors) Unwrap() []error {
	all := make([]error, len(es))
	for i, e := range es {
		all[i] = e
	}
	return all
}

// sorted puts the errors of the file named first before those of other files, each by place, and
// drops repetitions.
func (es Errors) sorted(first string) Errors {
	slices.SortStableFunc(es, func(a, b Error) int {
		if a.File != b.File {
			switch first {
			case a.File:
				return -1
			case b.File:
				return 1
			}
			return strings.Compare(a.File, b.File)
		}
		if a.Line != b.Line {
			return a.Line - b.Line
		}
		return a.Column - b.Column
	})
	return slices.CompactFunc(es, func(a, b Error) bool {
		return a.Position == b.Position && a.Message == b.Message
	})
}

// widest is how many characters of a long line are shown.
const widest = 100

// excerpt gives the line, cut down to a window when it is long, and a line of carets to be written
// under it. Tabs are kept in both, so that they stay in step.
func excerpt(line string, column, span int) (shown, carets string) {
	runes := []rune(line)
	start := max(0, min(column-1, len(runes)))
	end := min(max(start+1, start+span), max(start+1, len(runes)))
	from, to := 0, len(runes)
	before, after := "", ""
	if len(runes) > widest {
		from = max(0, min(start-widest/2, len(runes)-widest))
		to = from + widest
		if from > 0 {
			before = "... "
		}
		if to < len(runes) {
			after = " ..."
		}
	}
	end = max(start+1, min(end, to))
	var pad strings.Builder
	pad.WriteString(strings.Repeat(" ", len(before)))
	for _, c := range runes[from:start] {
		if c == '\t' {
			pad.WriteRune('\t')
		} else {
			pad.WriteByte(' ')
		}
	}
	return before + printable(string(runes[from:to])) + after, pad.String() + strings.Repeat("^", end-start)
}

// printable replaces what a terminal would obey rather than show.
func printable(s string) string {
	return strings.Map(func(c rune) rune {
		if c < ' ' && c != '\t' || c >= 0x7f && c < 0xa0 || c == utf8.RuneError || c == 0x2028 || c == 0x2029 || c == 0xfeff {
			return '?'
		}
		return c
	}, s)
}
