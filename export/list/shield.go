package list

import (
	"strings"
	"unicode/utf8"
)

// Shield returns a text that no spreadsheet takes for a formula: one whose first character other
// than a space is = + - or @ (or their full-width forms, or an apostrophe) gets an apostrophe in
// front. Control characters, line breaks among them, become spaces, and bytes that are not UTF-8
// the replacement character. Unshield takes the apostrophe away again.
//
// The characters are those that the OWASP page "CSV Injection" names, but for tab, carriage return
// and line feed, which have become spaces.
func Shield(s string) string {
	s = strings.Map(plain, strings.ToValidUTF8(s, "\uFFFD"))
	first, _ := utf8.DecodeRuneInString(strings.TrimLeft(s, " \u00a0\ufeff"))
	if strings.ContainsRune("=+-@'\uff1d\uff0b\uff0d\uff20", first) {
		return "'" + s
	}
	return s
}

// Unshield undoes the apostrophe of Shield.
func Unshield(s string) string { return strings.TrimPrefix(s, "'") }

// plain turns whatever could break or end a line into a space.
func plain(r rune) rune {
	if r < ' ' || (r >= 0x7f && r < 0xa0) || r == 0x2028 || r == 0x2029 {
		return ' '
	}
	return r
}
