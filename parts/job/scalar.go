package job

import (
	"slices"
	"strconv"
	"strings"
	"unicode/utf8"

	"go.yaml.in/yaml/v3"
)

// quantity reads a number with its unit and checks its bounds.
func (r *reader) quantity(text string, f *form, what, advice string, at spot) (float64, bool) {
	number, bare, bad := measure(text, f.dim, r.unit[f.dim])
	if bad != nil {
		hint := bad.hint
		if hint == "" {
			hint = advice
		}
		if hint == "" {
			hint = f.wanted() + " is wanted"
		}
		r.fail(at, hint, "%s: %s", what, bad.message)
		return 0, false
	}
	if bare {
		r.bare[f.dim] = append(r.bare[f.dim], unitless{at, strings.TrimSpace(text)})
		return 0, false
	}
	return number, r.inBounds(number, f, what, advice, at)
}

func (r *reader) inBounds(number float64, f *form, what, advice string, at spot) bool {
	// Bounds in radians come from degrees: a hair's breadth is given.
	const hair = 1e-9
	switch {
	case f.above && number <= f.low:
		if number < 0 {
			r.fail(at, advice, "%s: %s is negative", what, figureOf(number, f.dim))
		} else {
			r.fail(at, advice, "%s must be greater than zero", what)
		}
	case number < f.low-hair && f.low == 0:
		r.fail(at, advice, "%s: %s is negative", what, figureOf(number, f.dim))
	case number < f.low-hair:
		r.fail(at, advice, "%s: %s is too little; the least is %s", what, figureOf(number, f.dim), figureOf(f.low, f.dim))
	case number > f.high+hair:
		r.fail(at, advice, "%s: %s is too much to be meant; the most is %s", what, figureOf(number, f.dim), figureOf(f.high, f.dim))
	default:
		return true
	}
	return false
}

// whole reads a whole number.
func (r *reader) whole(text string, f *form, what, advice string, at spot) (float64, bool) {
	n, err := strconv.Atoi(strings.TrimPrefix(strings.TrimSpace(text), "+"))
	if err != nil {
		r.fail(at, advice, "%s: %s is not a whole number", what, short(text))
		return 0, false
	}
	return float64(n), r.inBounds(float64(n), f, what, advice, at)
}

func (r *reader) flag(n *yaml.Node, v *value, what string) {
	quoted := n.Style&(yaml.DoubleQuotedStyle|yaml.SingleQuotedStyle) != 0
	switch {
	case n.Value == "true" && !quoted:
		v.flag, v.sound = true, true
	case n.Value == "false" && !quoted:
		v.sound = true
	default:
		hint := "write true or false"
		switch strings.ToLower(n.Value) {
		case "yes", "y", "on", "true", "1":
			hint = "write true"
		case "no", "n", "off", "false", "0":
			hint = "write false"
		}
		r.fail(v.at, hint, "%s: %s is neither true nor false", what, short(n.Value))
	}
}

// longestText is the length of a title or of a material's name, in characters.
const longestText = 200

func (r *reader) word(word string, f *form, v *value, what, advice string) {
	switch f.kind {
	case aChoice:
		for _, w := range f.words {
			if w == word {
				v.text, v.sound = word, true
				return
			}
		}
		hint := meant(word, f.words)
		if unit := unitSlips[word]; slices.Contains(f.words, unit) {
			hint = "write " + unit
		} else if hint == "" {
			hint = "write " + oneOf(f.words)
		}
		r.fail(v.at, hint, "%s: unknown %s", what, short(word))
	case aName:
		if !f.rule.form.MatchString(word) {
			r.fail(v.at, "allowed are "+f.rule.says, "%s: %s can't be %s", what, short(word), f.rule.noun)
			return
		}
		v.text, v.sound = word, true
	default:
		switch {
		case strings.TrimSpace(word) == "":
			r.fail(v.at, advice, "%s is empty", what)
		case utf8.RuneCountInString(word) > longestText:
			r.fail(v.at, "shorten it", "%s has %d characters, more than the %d allowed", what, utf8.RuneCountInString(word), longestText)
		case strings.ContainsAny(word, "\n\t"):
			r.fail(v.at, "", "%s: one line of text is wanted", what)
		default:
			v.text, v.sound = strings.TrimSpace(word), true
		}
	}
}

func (r *reader) place(n *yaml.Node, f *form, v *value, what string) {
	if len(n.Content) != 2 {
		r.fail(v.at, "write [x, y]", "%s: a place has two coordinates, not %d", what, len(n.Content))
		return
	}
	coordinate := form{kind: aQuantity, dim: length, low: f.low, high: f.high}
	x := r.read(n.Content[0], &coordinate, v.path+".0", what, "", "", v.at)
	y := r.read(n.Content[1], &coordinate, v.path+".1", what, "", "", v.at)
	v.x, v.y, v.sound = x.number, y.number, x.sound && y.sound
}
