package job

import "math"

// kind is what stands at a place of the job file.
type kind int

const (
	aQuantity  kind = iota // number with a dimension
	aWhole                 // whole number
	aFlag                  // true or false
	aText                  // one line of text
	aName                  // text that follows a rule for names
	aChoice                // one of a few words
	aPlace                 // [x, y]
	aList                  // list of equal things
	aTable                 // fixed keys
	aNamed                 // free names, equal things
	anEither               // one of several forms
	passedOver             // not looked at: an error was reported already
)

// form says what may stand at a place: the reader checks by it and the schema is written from it.
type form struct {
	kind
	noun      string    // what one entry is called in messages: "link"
	dim       dimension // aQuantity
	low, high float64   // bounds of a quantity or whole number, in mm or radians, inclusive
	above     bool      // the lower bound itself is refused
	words     []string  // aChoice
	rule      *nameRule // aName, and the names of aNamed
	item      *form     // aList, aNamed
	least     int       // aList, aNamed: fewest entries
	most      int       // aList: most entries; 0: as many as are taken anywhere
	keys      []key     // aTable
	exactly   []string  // aTable: exactly one of these keys must be there
	variants  []form    // anEither: tried by what stands there
}

// key is one key of a table.
type key struct {
	name   string
	about  string // for the schema: what it means
	need   bool   // must be there
	form   form
	advice string   // the cure when it is missing or wrong
	slips  []string // other words for it that makers may write
}

func table(noun string, keys ...key) form { return form{kind: aTable, noun: noun, keys: keys} }
func named(rule *nameRule, item form) form {
	return form{kind: aNamed, rule: rule, item: &item, least: 1}
}
func listOf(item form) form        { return form{kind: aList, item: &item, least: 1} }
func choice(words ...string) form  { return form{kind: aChoice, words: words} }
func name(rule *nameRule) form     { return form{kind: aName, rule: rule} }
func either(variants ...form) form { return form{kind: anEither, variants: variants} }
func whole(low, high float64) form { return form{kind: aWhole, low: low, high: high} }
func between(dim dimension, low, high float64) form {
	return form{kind: aQuantity, dim: dim, low: low, high: high}
}

// positive is a length greater than zero and at most high, mm.
func positive(high float64) form {
	f := between(length, 0, high)
	f.above = true
	return f
}

var (
	truth = form{kind: aFlag}
	text  = form{kind: aText}
	place = form{kind: aPlace, dim: length, low: -farthest, high: farthest}
	turn  = between(angle, -20*math.Pi, 20*math.Pi)
)

// farthest is the greatest coordinate that is taken for meant, mm.
const farthest = 10000

// find gives the key of a table.
func (f *form) find(name string) *key {
	for i := range f.keys {
		if f.keys[i].name == name {
			return &f.keys[i]
		}
	}
	return nil
}

// names lists the keys of a table.
func (f *form) names() []string {
	names := make([]string, len(f.keys))
	for i := range f.keys {
		names[i] = f.keys[i].name
	}
	return names
}

// wanted describes the form for a message.
func (f *form) wanted() string {
	switch f.kind {
	case aQuantity:
		switch f.dim {
		case length:
			return "a length such as 3mm"
		case angle:
			return "an angle such as 15deg"
		}
		return "a number"
	case aWhole:
		return "a whole number"
	case aFlag:
		return "true or false"
	case aName:
		return f.rule.noun
	case aChoice:
		return oneOf(f.words)
	case aPlace:
		return "a place [x, y]"
	case aList:
		return "a list such as [" + f.item.sample("A") + ", " + f.item.sample("B") + "]"
	case aTable:
		if len(f.keys) > 1 {
			return "keys with values, {" + f.keys[0].name + ": ..., " + f.keys[1].name + ": ...}"
		}
		return "keys with values, {" + f.keys[0].name + ": ...}"
	case aNamed:
		return "names with what they stand for, {name: ...}"
	case anEither:
		var all []string
		for i := range f.variants {
			all = append(all, f.variants[i].wanted())
		}
		return oneOf(all)
	}
	return "text"
}

// sample is a short example of an entry of a list, with a name to use in it.
func (f *form) sample(name string) string {
	switch f.kind {
	case aQuantity:
		if f.dim == angle {
			return "0deg"
		}
		return "10mm"
	case aPlace:
		return "[x, y]"
	case aTable:
		return "{...}"
	}
	return name
}
