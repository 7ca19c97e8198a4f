package job

import (
	"math"
	"regexp"
	"strconv"
	"strings"
)

// dimension is what a number measures.
type dimension int

const (
	plain dimension = iota // a bare number: a count, a price, a percentage
	length
	angle
)

// unit is a unit that may be written behind a number.
type unit struct {
	name string
	dim  dimension
	of   func(float64) float64 // to millimetres or radians
}

// The international inch is 25.4 mm exactly. Angles are divided before they are multiplied, so that
// 180deg is math.Pi to the last bit.
var unitTable = []unit{
	{"mm", length, func(v float64) float64 { return v }},
	{"cm", length, func(v float64) float64 { return v * 10 }},
	{"m", length, func(v float64) float64 { return v * 1000 }},
	{"in", length, func(v float64) float64 { return v * 25.4 }},
	{"deg", angle, func(v float64) float64 { return v / 180 * math.Pi }},
	{"rad", angle, func(v float64) float64 { return v }},
	{"turn", angle, func(v float64) float64 { return v * 2 * math.Pi }},
}

// unitSlips are ways to write a unit that people use elsewhere.
var unitSlips = map[string]string{
	`"`: "in", "″": "in", "inch": "in", "inches": "in", "°": "deg", "degree": "deg", "degrees": "deg",
	"millimetre": "mm", "millimetres": "mm", "millimeter": "mm", "millimeters": "mm", "MM": "mm",
	"turns": "turn", "rev": "turn", "radian": "rad", "radians": "rad", "Mm": "mm", "IN": "in",
}

func unitNames(dim dimension) []string {
	var names []string
	for _, u := range unitTable {
		if u.dim == dim {
			names = append(names, u.name)
		}
	}
	return names
}

func unitNamed(name string) (unit, bool) {
	for _, u := range unitTable {
		if u.name == name {
			return u, true
		}
	}
	return unit{}, false
}

// numberPattern is how a number is written, the same in the reader and in the schema: a decimal
// number, a fraction, or a whole number and a fraction.
const (
	decimalPattern  = `[+-]?(?:[0-9]+\.?[0-9]*|\.[0-9]+)(?:[eE][+-]?[0-9]+)?`
	fractionPattern = `[+-]?(?:[0-9]+ +)?[0-9]+/[0-9]+`
)

var (
	decimalForm  = regexp.MustCompile(`^(` + decimalPattern + `)\s*(\D*)$`)
	fractionForm = regexp.MustCompile(`^([+-]?)(?:([0-9]+) +)?([0-9]+)/([0-9]+)\s*(\D*)$`)
	decimalComma = regexp.MustCompile(`^[+-]?[0-9]+,[0-9]+`)
)

// trouble is why a text is no quantity: the message, and the cure if there is one.
type trouble struct{ message, hint string }

// splitQuantity takes "1 1/4in" apart into 1.25 and "in".
func splitQuantity(text string) (number float64, unit string, bad *trouble) {
	text = strings.TrimSpace(text)
	quoted := short(text)
	if m := fractionForm.FindStringSubmatch(text); m != nil {
		top, errTop := strconv.ParseFloat(m[3], 64)
		under, errUnder := strconv.ParseFloat(m[4], 64)
		whole := 0.0
		var errWhole error
		if m[2] != "" {
			whole, errWhole = strconv.ParseFloat(m[2], 64)
		}
		if errTop != nil || errUnder != nil || errWhole != nil {
			return 0, "", &trouble{quoted + " is too large a number", ""}
		}
		if under == 0 {
			return 0, "", &trouble{quoted + " divides by zero", ""}
		}
		number = whole + top/under
		if m[1] == "-" {
			number = -number
		}
		return number, m[5], nil
	}
	if m := decimalForm.FindStringSubmatch(text); m != nil {
		number, err := strconv.ParseFloat(m[1], 64)
		if err != nil || math.IsInf(number, 0) {
			return 0, "", &trouble{quoted + " is too large a number", ""}
		}
		return number, m[2], nil
	}
	switch {
	case decimalComma.MatchString(text):
		return 0, "", &trouble{quoted + " has a decimal comma", "write " + strings.Replace(text, ",", ".", 1)}
	case strings.ContainsAny(text, "\u2212\u2013\u2014"):
		return 0, "", &trouble{quoted + " has a dash that is no minus sign", "type the minus sign of the keyboard: -"}
	}
	switch strings.ToLower(strings.TrimLeft(text, "+-.")) {
	case "nan", "inf", "infinity":
		return 0, "", &trouble{quoted + " is not a finite number", ""}
	}
	return 0, "", &trouble{quoted + " is not a number", ""}
}

// measure reads a text as a quantity of a dimension, in mm or radians. A bare number takes the unit
// fallback; without one it comes back as bare (zero is zero in every unit and is never bare).
func measure(text string, dim dimension, fallback string) (value float64, bare bool, bad *trouble) {
	number, name, bad := splitQuantity(text)
	if bad != nil {
		return 0, false, bad
	}
	if dim == plain {
		if name != "" {
			return 0, false, &trouble{short(text) + " has a unit, a bare number is wanted", "write " + strings.TrimSpace(strings.TrimSuffix(text, name))}
		}
		return number, false, nil
	}
	if name == "" {
		if number == 0 {
			return 0, false, nil
		}
		if fallback == "" {
			return 0, true, nil
		}
		name = fallback
	}
	u, known := unitNamed(name)
	if !known {
		written := strings.TrimSpace(strings.TrimSuffix(text, name))
		near := unitSlips[name]
		if near == "" {
			near = nearest(name, unitNames(dim))
		}
		if near == "" {
			return 0, false, &trouble{short(text) + ": unknown unit " + short(name), "the units are " + oneOf(unitNames(dim))}
		}
		return 0, false, &trouble{short(text) + ": unknown unit " + short(name), "write " + written + near}
	}
	if u.dim != dim {
		have, want := "a length", "an angle"
		if dim == length {
			have, want = want, have
		}
		return 0, false, &trouble{short(text) + " is " + have + ", " + want + " is wanted", "the units of " + want + " are " + oneOf(unitNames(dim))}
	}
	value = u.of(number)
	if math.IsInf(value, 0) {
		return 0, false, &trouble{short(text) + " is too large a number", ""}
	}
	return value, false, nil
}

// short quotes a text for a message, cut down when it is long.
func short(text string) string {
	runes := []rune(text)
	if len(runes) > 40 {
		text = string(runes[:37]) + "..."
	}
	return printable(text)
}

// figure writes a number for a message: at most four places behind the point, no trailing zeros.
func figure(v float64) string {
	if v != 0 && (math.Abs(v) < 1e-4 || math.Abs(v) >= 1e9) {
		return strconv.FormatFloat(v, 'g', 4, 64)
	}
	s := strconv.FormatFloat(v, 'f', 4, 64)
	s = strings.TrimRight(strings.TrimRight(s, "0"), ".")
	if s == "-0" {
		return "0"
	}
	return s
}

// figureOf writes a value that is held in mm or radians for a message.
func figureOf(v float64, dim dimension) string {
	switch dim {
	case length:
		return figure(v) + " mm"
	case angle:
		return figure(v/math.Pi*180) + " deg"
	}
	return figure(v)
}

// degrees writes an angle for a message.
func degrees(radians float64) string { return figure(radians / math.Pi * 180) }
