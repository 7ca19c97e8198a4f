package hardware

import (
	"errors"
	"fmt"
	"strconv"
	"strings"
	"unicode"
)

// ErrInch is wrapped by the errors of everything that the catalogue does not hold for inch bolts:
// lengths, heads, nuts and washers.
var ErrInch = errors.New("the catalogue holds clearance holes of inch bolts and nothing else of them")

// mostListed is the longest list that is written out when a near spelling is known.
const mostListed = 30

// unknown is the error for a word that is not in a list: with the nearest right spelling when one is
// near, and with the list.
func unknown(noun, word string, among []string) error {
	text := fmt.Sprintf("unknown %s %q", noun, word)
	if near := nearest(word, among); near != "" {
		text += ": did you mean " + near + "?"
		if len(among) > mostListed {
			return errors.New(text)
		}
	}
	return errors.New(text + " (there is " + strings.Join(among, ", ") + ")")
}

// missing is the error for a size that a table does not hold.
func missing(noun, size string, among []string) error {
	if IsInch(size) {
		return fmt.Errorf("%s %s: %w", noun, size, ErrInch)
	}
	if _, err := strconv.ParseFloat(strings.TrimPrefix(size, "M"), 64); err == nil {
		// A size that is written right and is not there: no other spelling is meant.
		return fmt.Errorf("there is no %s for %s in the catalogue: it has %s", noun, size, strings.Join(among, ", "))
	}
	return unknown(noun, size, among)
}

// IsInch tells the inch sizes: "#8", "1/4".
func IsInch(size string) bool {
	return strings.HasPrefix(size, "#") || strings.Contains(size, "/")
}

// nearest gives the word of the list that was most likely meant, "" when more than a third of its
// letters (at least one) would have to change. Capitals, blanks and hyphens don't count.
func nearest(word string, among []string) string {
	plain := fold(word)
	if len(plain) > 64 {
		return ""
	}
	best, least := "", 1+max(1, (len(plain)+1)/3)
	for _, candidate := range among {
		c := fold(candidate)
		if d := changes(plain, c); d < least && d < len(c) {
			best, least = candidate, d
		}
	}
	return best
}

func fold(s string) []rune {
	var out []rune
	for _, c := range s {
		if c != '-' && c != '_' && c != ' ' {
			out = append(out, unicode.ToLower(c))
		}
	}
	return out
}

// changes counts the letters to insert, delete or replace (Levenshtein's distance), in time len(a)
// len(b).
func changes(a, b []rune) int {
	old, line := make([]int, len(b)+1), make([]int, len(b)+1)
	for j := range old {
		old[j] = j
	}
	for i := range a {
		line[0] = i + 1
		for j := range b {
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
