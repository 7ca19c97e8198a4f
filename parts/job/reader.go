package job

import (
	"fmt"
	"strconv"
	"strings"
	"unicode/utf8"

	"go.yaml.in/yaml/v3"

	"pinwright/parts/linkage"
)

// reader is the state of one reading: the files seen, the errors found, the places of the keys.
type reader struct {
	name    string
	sources map[string]*source
	open    func(string) ([]byte, error)
	errs    Errors
	places  map[string]Position
	unit    [3]string // unit of bare numbers by dimension; "" when none is stated
	noUnit  bool      // units is there but wrong: bare numbers are passed over
	bare    [3][]unitless

	noStock    []string // what has no stock
	noStockAt  spot
	planeSound map[string]bool          // links whose plane is known
	groundAt   map[string]linkage.Point // where the ground pivots are
}

func (r *reader) fail(at spot, hint, format string, args ...any) {
	line := ""
	if s := r.sources[at.File]; s != nil {
		line = s.line(at.Line)
	}
	r.errs = append(r.errs, Error{at.Position, max(1, at.span), line, fmt.Sprintf(format, args...), hint})
}

// spotOf is the place of a node. The library counts columns in characters, as we do.
func (r *reader) spotOf(n *yaml.Node) spot {
	span := 1
	if n.Kind == yaml.ScalarNode {
		span = max(1, utf8.RuneCountInString(n.Value))
		if n.Style&(yaml.DoubleQuotedStyle|yaml.SingleQuotedStyle) != 0 {
			span += 2
		}
		left := utf8.RuneCountInString(r.sources[r.name].line(n.Line)) - n.Column + 1
		span = max(1, min(span, left))
	}
	return spot{Position{r.name, max(1, n.Line), max(1, n.Column)}, span}
}

// read checks a node against a form. what names the thing in messages ("width"), where the table it
// stands in ("link crank"), keyAt is the place of its key.
func (r *reader) read(n *yaml.Node, f *form, path, what, where, advice string, keyAt spot) *value {
	v := &value{form: f, at: r.spotOf(n), path: path}
	if n.Kind != yaml.ScalarNode && n.Style&yaml.FlowStyle == 0 {
		v.at = keyAt
	}
	if f.kind == passedOver {
		return v
	}
	r.places[path] = v.at.Position
	if !r.tame(n, v.at) {
		return v
	}
	if f.kind == anEither {
		f = f.pick(n)
		if f == nil {
			r.fail(v.at, advice, "%s must be %s", what, v.form.wanted())
			return v
		}
		v.form = f
	}
	empty := n.Kind == yaml.ScalarNode && n.ShortTag() == "!!null" && n.Style&(yaml.DoubleQuotedStyle|yaml.SingleQuotedStyle) == 0
	if empty && (n.Value == "" || f.kind != aText && f.kind != aName) {
		hint := advice
		if hint == "" {
			hint = f.wanted() + " is wanted"
		}
		if strings.Contains(r.sources[r.name].line(keyAt.Line), " #") {
			hint = `everything after a # is a comment: put it in quotes if it belongs to the value, as in bolt: "#8"`
		}
		r.fail(keyAt, hint, "%s has no value", what)
		return v
	}
	scalar := f.kind != aTable && f.kind != aNamed && f.kind != aList && f.kind != aPlace
	if scalar && n.Kind != yaml.ScalarNode ||
		(f.kind == aTable || f.kind == aNamed) && n.Kind != yaml.MappingNode ||
		(f.kind == aList || f.kind == aPlace) && n.Kind != yaml.SequenceNode {
		r.fail(v.at, advice, "%s must be %s", what, f.wanted())
		return v
	}
	switch f.kind {
	case aQuantity:
		v.number, v.sound = r.quantity(n.Value, f, what, advice, v.at)
	case aWhole:
		v.number, v.sound = r.whole(n.Value, f, what, advice, v.at)
	case aFlag:
		r.flag(n, v, what)
	case aText, aName, aChoice:
		r.word(n.Value, f, v, what, advice)
	case aPlace:
		r.place(n, f, v, what)
	case aList:
		r.list(n, f, v, what, where)
	case aTable:
		r.table(n, f, v, where, keyAt)
	case aNamed:
		r.named(n, f, v, what)
	}
	return v
}

// tame refuses the parts of YAML by which a text says less than it seems to.
func (r *reader) tame(n *yaml.Node, at spot) bool {
	switch {
	case n.Kind == yaml.AliasNode:
		r.fail(r.spotOf(n), "write the value out: the job file has no anchors and aliases", "*%s is a YAML alias", short(n.Value))
	case n.Anchor != "":
		r.fail(r.spotOf(n), "write the value out where it is used: the job file has no anchors and aliases", "&%s is a YAML anchor", short(n.Anchor))
	case n.Style&yaml.TaggedStyle != 0:
		r.fail(r.spotOf(n), "take it out: what a value is follows from its key", "%s is a YAML tag", short(n.Tag))
	default:
		return true
	}
	return false
}

// pick chooses the variant for a node: by its kind, of tables the one whose keys
// are there most nearly (each that is there counts for it, each that is not against it).
func (f *form) pick(n *yaml.Node) *form {
	var last *form
	most := 0
	for i := range f.variants {
		variant := &f.variants[i]
		switch variant.kind {
		case aTable:
			if n.Kind != yaml.MappingNode {
				continue
			}
			known := 0
			for _, name := range variant.names() {
				if hasKey(n, name) {
					known++
				}
			}
			if score := 2*known - len(variant.keys); last == nil || score > most {
				last, most = variant, score
			}
		case aList, aPlace:
			if n.Kind == yaml.SequenceNode {
				return variant
			}
		default:
			if n.Kind == yaml.ScalarNode {
				return variant
			}
		}
	}
	return last
}

func hasKey(n *yaml.Node, name string) bool {
	for i := 0; i+1 < len(n.Content); i += 2 {
		if n.Content[i].Value == name {
			return true
		}
	}
	return false
}

// mostEntries is how many joints, links, copies or entries of a list are taken: far more than is
// built, few enough that comparing each with each takes no time.
const mostEntries = 1000

func (r *reader) list(n *yaml.Node, f *form, v *value, what, where string) {
	most := f.most
	if most == 0 {
		most = mostEntries
	}
	if len(n.Content) < f.least || len(n.Content) > most {
		switch {
		case len(n.Content) == 0:
			r.fail(v.at, "leave the key out, or put something in", "%s: the list is empty", what)
		case f.least == f.most:
			r.fail(v.at, "", "%s: %d values are wanted, not %d", what, f.least, len(n.Content))
		default:
			r.fail(v.at, "", "%s: at most %d entries are taken, not %d", what, most, len(n.Content))
		}
		return
	}
	v.sound = true
	for i, c := range n.Content {
		inside := where
		if f.item.noun != "" {
			inside = fmt.Sprintf("%s %d", f.item.noun, i+1)
		}
		item := r.read(c, f.item, v.path+"."+strconv.Itoa(i), "an entry of "+what, inside, "", r.spotOf(c))
		v.items = append(v.items, item)
	}
}

// table reads fixed keys. A misspelt key whose meaning is plain is reported and then read as meant,
// so that what depends on it is not reported as missing.
func (r *reader) table(n *yaml.Node, f *form, v *value, where string, keyAt spot) {
	if where == "" {
		where = f.noun
	}
	first := map[string]spot{}
	v.sound = true
	for i := 0; i+1 < len(n.Content); i += 2 {
		k, at := n.Content[i], r.spotOf(n.Content[i])
		if !r.plainKey(k, at) {
			v.torn = true
			continue
		}
		name := k.Value
		spec := f.find(name)
		if spec == nil {
			spec = r.unknownKey(name, f, where, at, n, n.Content[i+1])
			if spec == nil || v.has(spec.name) || hasKey(n, spec.name) {
				continue
			}
			name = spec.name
		}
		if earlier, twice := first[name]; twice {
			r.fail(at, "keep one of them", "%s is given twice in %s, first on line %d", name, where, earlier.Line)
			continue
		}
		first[name] = at
		e := entry{name: name, at: at}
		e.value = r.read(n.Content[i+1], &spec.form, join2(v.path, name), name, childWhere(spec, where), spec.advice, at)
		v.entries = append(v.entries, e)
	}
	for i := range f.keys {
		if f.keys[i].need && !v.has(f.keys[i].name) && !v.torn {
			r.fail(keyAt, f.keys[i].advice, "%s has no %s", where, f.keys[i].name)
		}
	}
	if len(f.exactly) > 0 {
		var given []string
		for _, name := range f.exactly {
			if v.has(name) {
				given = append(given, name)
			}
		}
		switch {
		case len(given) == 0:
			v.sound = false
			r.fail(keyAt, "give "+oneOf(f.exactly), "%s: which kind is not said", where)
		case len(given) > 1:
			v.sound = false
			r.fail(keyAt, "keep one of them", "%s: %s exclude each other", where, allOf(given))
		}
	}
}

func childWhere(spec *key, where string) string {
	if spec.form.kind == aTable && spec.form.noun != "" && where != "" && where != jobForm.noun {
		return spec.name + " of " + where
	}
	return ""
}

func join2(path, name string) string {
	if path == "" {
		return name
	}
	return path + "." + name
}

// plainKey refuses keys that are lists, aliases, merges or empty.
func (r *reader) plainKey(k *yaml.Node, at spot) bool {
	switch {
	case k.Kind == yaml.ScalarNode && k.ShortTag() == "!!merge":
		r.fail(at, "write the keys out: the job file has no merging", "<< is a YAML merge")
		return false
	case k.Kind == yaml.ScalarNode && k.Value == "":
		r.fail(at, "write key: value", "a key without a name")
		return false
	case k.Kind == yaml.SequenceNode || k.Kind == yaml.MappingNode:
		r.fail(at, "write key: value", "a key must be a word, not something in brackets")
		return false
	}
	return r.tame(k, at)
}

// unknownKey reports a key that the table does not have, and gives the one that was surely meant.
func (r *reader) unknownKey(name string, f *form, where string, at spot, n, beside *yaml.Node) *key {
	if colon := strings.IndexByte(name, ':'); colon > 0 && f.find(name[:colon]) != nil {
		r.fail(at, "put a space after the colon: "+name[:colon]+": "+short(name[colon+1:]), "unknown key %s in %s", short(name), where)
		return &key{name: name[:colon], form: form{kind: passedOver}}
	}
	if gap := strings.IndexByte(name, ' '); gap > 0 && f.find(name[:gap]) != nil && beside.Kind == yaml.ScalarNode && beside.Value == "" {
		r.fail(at, "put a colon after "+name[:gap]+": "+name[:gap]+": "+short(strings.TrimSpace(name[gap:])), "unknown key %s in %s", short(name), where)
		return &key{name: name[:gap], form: form{kind: passedOver}}
	}
	var free []string // keys that are not used yet are meant more probably
	for _, k := range f.names() {
		if !hasKey(n, k) {
			free = append(free, k)
		}
	}
	near := nearest(name, free)
	for i := range f.keys {
		for _, slip := range f.keys[i].slips {
			if strings.EqualFold(slip, name) && !hasKey(n, f.keys[i].name) {
				near = f.keys[i].name
			}
		}
	}
	if near == "" {
		near = nearest(name, f.names())
	}
	if home := homeOf(name); home != "" && (near == "" || editDistance(fold(near), fold(name)) > 1) {
		r.fail(at, name+" belongs to "+home, "unknown key %s in %s", short(name), where)
		return nil
	}
	if near == "" {
		r.fail(at, "the keys here are "+allOf(f.names()), "unknown key %s in %s", short(name), where)
		return nil
	}
	r.fail(at, "did you mean "+near+"?", "unknown key %s in %s", short(name), where)
	return f.find(near)
}

// named reads free names with equal things.
func (r *reader) named(n *yaml.Node, f *form, v *value, what string) {
	if len(n.Content) == 0 {
		r.fail(v.at, "leave the key out, or put something in", "%s is empty", what)
		return
	}
	if len(n.Content)/2 > mostEntries {
		r.fail(v.at, "is it the right file?", "%s: at most %d entries are taken, not %d", what, mostEntries, len(n.Content)/2)
		return
	}
	first := map[string]spot{}
	v.sound = true
	for i := 0; i+1 < len(n.Content); i += 2 {
		k, at := n.Content[i], r.spotOf(n.Content[i])
		if !r.plainKey(k, at) {
			v.torn = true
			continue
		}
		if colon := strings.IndexByte(k.Value, ':'); colon > 0 && f.rule.form.MatchString(k.Value[:colon]) {
			r.fail(at, "put a space after the colon: "+k.Value[:colon]+": "+short(k.Value[colon+1:]), "%s: %s can't be %s", what, short(k.Value), f.rule.noun)
			v.torn = true
			continue
		}
		noun := f.item.noun
		if noun == "" {
			noun = what
		}
		sound := f.rule.form.MatchString(k.Value)
		if !sound {
			r.fail(at, "allowed are "+f.rule.says, "%s: %s can't be %s", what, short(k.Value), f.rule.noun)
		}
		same := k.Value
		if f.rule == fileName {
			same = strings.ToLower(same) // they name files, and many disks take Crank for crank
		}
		if earlier, twice := first[same]; twice {
			r.fail(at, "give each a name of its own", "%s %s is named twice, first on line %d", noun, short(k.Value), earlier.Line)
			continue
		}
		first[same] = at
		item := r.read(n.Content[i+1], f.item, join2(v.path, k.Value), k.Value, noun+" "+short(k.Value), "", at)
		item.sound = item.sound && sound
		v.entries = append(v.entries, entry{k.Value, at, item})
	}
}
