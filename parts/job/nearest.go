package job

import (
	"strings"
	"unicode"
	"unicode/utf8"
)

// nearest gives the word of the list that the maker most likely meant, or "" when none is near: at
// most a third of its letters (and one letter of a short word) may differ, two exchanged neighbours
// counting as one, capitals and small letters, hyphens and underscores as equal. Of equally near
// words the first one is taken; a word that begins alike is better than none.
func nearest(word string, among []string) string {
	plain := fold(word)
	best, least := "", 1+max(1, (utf8.RuneCountInString(word)+1)/3)
	for _, candidate := range among {
		if candidate == word {
			continue
		}
		if d := editDistance(plain, fold(candidate)); d < least && d < utf8.RuneCountInString(candidate) {
			best, least = candidate, d
		}
	}
	if best != "" || len(plain) < 3 {
		return best
	}
	for _, candidate := range among {
		c := fold(candidate)
		if candidate != word && len(c) >= 3 && (strings.HasPrefix(string(c), string(plain)) || strings.HasPrefix(string(plain), string(c))) {
			return candidate
		}
	}
	return ""
}

// fold makes capitals small and drops what is easily mixed up between words.
func fold(s string) []rune {
	var out []rune
	for _, c := range s {
		if c != '-' && c != '_' && c != ' ' {
			out = append(out, unicode.ToLower(c))
		}
	}
	return out
}

// editDistance counts the letters to insert, delete, replace or exchange with their neighbour (the
// restricted Damerau-Levenshtein distance), in time len(a) len(b). Words longer than 64 letters are
// taken as far from everything.
func editDistance(a, b []rune) int {
	if len(a) > 64 || len(b) > 64 {
		return 64
	}
	older, old, row := make([]int, len(b)+1), make([]int, len(b)+1), make([]int, len(b)+1)
	for j := range old {
		old[j] = j
	}
	for i := 1; i <= len(a); i++ {
		row[0] = i
		for j := 1; j <= len(b); j++ {
			cost := 1
			if a[i-1] == b[j-1] {
				cost = 0
			}
			row[j] = min(old[j]+1, row[j-1]+1, old[j-1]+cost)
			if i > 1 && j > 1 && a[i-1] == b[j-2] && a[i-2] == b[j-1] {
				row[j] = min(row[j], older[j-2]+1)
			}
		}
		older, old, row = old, row, older
	}
	return old[len(b)]
}

// meant turns nearest into a hint.
func meant(word string, among []string) string {
	if near := nearest(word, among); near != "" {
		return "did you mean " + near + "?"
	}
	return ""
}
