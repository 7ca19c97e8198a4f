package job

import (
	"errors"
	"fmt"
	"io"
	"regexp"
	"sort"
	"strings"

	"go.yaml.in/yaml/v3"
)

// decode turns YAML text into its node tree, nil for a text without content. It gives the second
// document's root too when there is one. Panics of the library come back as errors.
func decode(text []byte) (root, second *yaml.Node, err error) {
	defer func() {
		if p := recover(); p != nil {
			root, second, err = nil, nil, fmt.Errorf("yaml: %v", p)
		}
	}()
	decoder := yaml.NewDecoder(strings.NewReader(string(text)))
	var first, next yaml.Node
	if err := decoder.Decode(&first); err != nil {
		if errors.Is(err, io.EOF) {
			return nil, nil, nil
		}
		return nil, nil, err
	}
	switch err := decoder.Decode(&next); {
	case err == nil:
		second = &next
	case !errors.Is(err, io.EOF):
		return nil, nil, err
	}
	if len(first.Content) == 0 {
		return nil, second, nil
	}
	return first.Content[0], second, nil
}

// explain finds the place and the cause of a syntax error.
//
// The library says on which line it noticed, which for a forgotten bracket is the end of the file
// and for an indentation often the line before. So:
//
//  1. brackets and quotes are followed through the text; one that does not match is the cause;
//  2. else the shortest run of whole lines that is refused is sought by bisection (a run is tried
//     only up to a line's end outside of brackets and quotes), and its last line is the place;
//  3. the library's message is put into plain words.
//
// Time: a logarithmic number of readings of the text.
func explain(s *source, cause error) Error {
	message := strings.TrimPrefix(cause.Error(), "yaml: ")
	message = linePrefix.ReplaceAllString(message, "")
	balance := follow(s)
	if balance.fault != nil {
		return *balance.fault
	}
	ends := balance.ends
	first := sort.Search(len(ends), func(i int) bool {
		_, _, err := decode([]byte(strings.Join(s.lines[:ends[i]], "\n") + "\n"))
		return err != nil
	})
	line, last := len(s.lines), len(s.lines)
	if first < len(ends) {
		line, last = ends[first], ends[first]
		from := 1
		if first > 0 {
			from = ends[first-1] + 1
		}
		// Of a run over several lines the first one with something on it is shown.
		for from < line && strings.TrimSpace(s.line(from)) == "" {
			from++
		}
		line = from
	}
	at := s.start(line)
	text := s.line(line)
	indent := text[:len(text)-len(strings.TrimLeft(text, " \t"))]
	fault := func(at spot, message, hint string) Error {
		return Error{at.Position, at.span, s.line(at.Line), message, hint}
	}
	if tab := strings.IndexByte(indent, '\t'); tab >= 0 {
		return fault(s.at(line, tab+1, 1), "a tab in the indentation", "indent with spaces: YAML takes no tabs there")
	}
	if m := tightColon.FindStringSubmatchIndex(text); m != nil {
		return fault(s.at(line, m[2]+1, 1), "a colon without a space after it", "write "+short(text[m[0]:m[2]]+": "+text[m[3]:]))
	}
	switch {
	case strings.Contains(message, "mapping values are not allowed"):
		if m := secondColon.FindStringSubmatchIndex(text); m != nil {
			return fault(s.at(line, m[2]+1, 1), "a second colon on the line", "put quotes round text with a colon in it, or braces round keys that stand on one line, {key: value}")
		}
		return fault(at, "this key does not fit the lines above it"+s.indentClash(line), "indent it as its neighbours are, and see that the line above is complete")
	case strings.Contains(message, "could not find expected ':'"):
		return fault(at, "a key without a colon", "write key: value")
	case strings.Contains(message, "cannot start any token"):
		if i := strings.IndexAny(text, "@`%\t"); i >= 0 {
			return fault(s.at(line, i+1, 1), fmt.Sprintf("%q can't begin a value", text[i:i+1]), "put the value in quotes")
		}
	case strings.Contains(message, "did not find expected key"), strings.Contains(message, "did not find expected '-' indicator"),
		strings.Contains(message, "block sequence entries are not allowed"):
		return fault(at, "this line does not fit the lines above it"+s.indentClash(line), "give keys (or dashes) that belong together the same indentation, and see that the line above is complete")
	case strings.Contains(message, "unknown anchor"):
		if i := strings.IndexByte(text, '*'); i >= 0 {
			at = s.at(line, i+1, 1)
		}
		return fault(at, "a name after * that is nowhere defined", "write the value out: the job file has no anchors and aliases")
	case strings.Contains(message, "exceeded max depth"):
		return fault(at, "nested too deeply", "is it the right file?")
	case strings.Contains(message, "did not find expected ',' or"):
		for l := line; l <= last; l++ {
			if m := missingComma.FindStringSubmatchIndex(s.line(l)); m != nil {
				at = s.at(l, m[2]+1, m[3]-m[2])
				break
			}
		}
		return fault(at, "a comma is missing between two entries in brackets", "write [a, b] and {key: value, key: value}")
	}
	return fault(at, "not understood as YAML ("+message+")", "look at this line's indentation, colons and brackets")
}

// indentClash tells the indentation of a line and of the line above that it most probably should have
// the same as: the one before it, or the last one that is indented less.
func (s *source) indentClash(line int) string {
	indent := func(n int) int {
		text := s.line(n)
		return len(text) - len(strings.TrimLeft(text, " "))
	}
	own, before, less := indent(line), 0, 0
	for n := line - 1; n > 0 && less == 0; n-- {
		if text := strings.TrimSpace(s.line(n)); text == "" || text[0] == '#' {
			continue
		}
		if before == 0 {
			before = n
		}
		if indent(n) <= own {
			less = n
		}
	}
	if less == 0 || indent(less) == own {
		return ""
	}
	other := less
	if off := indent(before) - own; off > 0 && off <= own-indent(less) {
		other = before
	}
	return fmt.Sprintf(": it is indented by %d, line %d by %d", own, other, indent(other))
}

var (
	linePrefix   = regexp.MustCompile(`^line [0-9]+: `)
	secondColon  = regexp.MustCompile(`:\s[^#"']*?(:)(?:\s|$)`)
	tightColon   = regexp.MustCompile(`[A-Za-z_][A-Za-z0-9_-]*(:)[A-Za-z0-9_{\["'.]`)
	missingComma = regexp.MustCompile(`(?::\s+[^,\[\]{}:#]*\s|[\]}]\s+)([A-Za-z][A-Za-z0-9_-]*):\s`)
)

// balance is what follow finds: the first bracket or quote without its match, and the lines at whose
// end nothing is open.
type balance struct {
	fault *Error
	ends  []int
}

// follow goes through the text with just enough of YAML's rules to know brackets and quotes from
// text: they count only where a value can begin, and brackets everywhere within brackets. In block
// text (| and >) nothing counts.
func follow(s *source) balance {
	type opened struct {
		char byte
		at   spot
	}
	var stack []opened
	var out balance
	quote := byte(0)
	var quoteAt spot
	blockIndent := -1 // indentation of the line that opened a block text
	comment := spot{} // the last comment that began inside brackets
	refuse := func(at spot, message, hint string) balance {
		return balance{fault: &Error{at.Position, at.span, s.line(at.Line), message, hint}}
	}
	for n, text := range s.lines {
		indent := len(text) - len(strings.TrimLeft(text, " "))
		if blockIndent >= 0 {
			if strings.TrimSpace(text) == "" || indent > blockIndent {
				out.ends = append(out.ends, n+1)
				continue
			}
			blockIndent = -1
		}
		fresh := true // a value may begin here
		for i := 0; i < len(text); i++ {
			c := text[i]
			spaced := i == 0 || text[i-1] == ' ' || text[i-1] == '\t'
			if quote != 0 {
				switch {
				case c == '\\' && quote == '"':
					i++
				case c == quote && c == '\'' && i+1 < len(text) && text[i+1] == '\'':
					i++
				case c == quote:
					quote = 0
				}
				continue
			}
			switch {
			case c == '#' && spaced:
				if len(stack) > 0 {
					comment = s.at(n+1, i+1, 1)
				}
				i = len(text)
			case c == ' ' || c == '\t':
			case (c == '"' || c == '\'') && fresh:
				quote, quoteAt, fresh = c, s.at(n+1, i+1, 1), false
			case (c == '[' || c == '{') && (fresh || len(stack) > 0):
				if len(stack) > 200 {
					return refuse(s.at(n+1, i+1, 1), "nested too deeply", "is it the right file?")
				}
				stack = append(stack, opened{c, s.at(n+1, i+1, 1)})
				fresh = true
			case (c == ']' || c == '}') && len(stack) > 0:
				top := stack[len(stack)-1]
				if (top.char == '[') != (c == ']') {
					return refuse(s.at(n+1, i+1, 1), fmt.Sprintf("%c closes the %c of line %d, column %d", c, top.char, top.at.Line, top.at.Column), "close brackets in the order opposite to their opening")
				}
				stack = stack[:len(stack)-1]
				fresh = false
			case (c == ']' || c == '}') && fresh:
				return refuse(s.at(n+1, i+1, 1), fmt.Sprintf("%c closes nothing", c), "take it out, or open the bracket before")
			case c == ',' && len(stack) > 0:
				fresh = true
			case (c == ':' || c == '-' || c == '?') && (i+1 == len(text) || text[i+1] == ' ' || text[i+1] == '\t'):
				fresh = c == ':' || fresh
			case (c == '|' || c == '>') && fresh && len(stack) == 0:
				blockIndent = indent
				i = len(text)
			default:
				fresh = false
			}
		}
		if quote == 0 && len(stack) == 0 {
			out.ends = append(out.ends, n+1)
		}
	}
	if quote != 0 {
		return refuse(quoteAt, "this quote is never closed", "close it with another "+string(rune(quote)))
	}
	if len(stack) > 0 {
		top := stack[len(stack)-1]
		if comment.Line == top.at.Line {
			return refuse(comment, fmt.Sprintf("everything after this # is a comment, so the %c before it is never closed", top.char), `if the # belongs to the value, put it in quotes: "#8"`)
		}
		return refuse(top.at, fmt.Sprintf("this %c is never closed", top.char), fmt.Sprintf("close it with %c", map[byte]rune{'[': ']', '{': '}'}[top.char]))
	}
	return out
}
