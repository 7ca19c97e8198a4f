package job

import (
	"bytes"
	"fmt"
	"strings"
	"unicode/utf8"
)

// Limits on what is read: far above what a maker writes, low enough that a wrong file named by
// mistake is refused at once.
const (
	mostJobBytes   = 1 << 20
	mostTableBytes = 16 << 20
)

// spot is a place in a file and how many characters are meant there.
type spot struct {
	Position
	span int
}

// source is a file as text.
type source struct {
	name  string
	lines []string // without their ends
}

// line gives line n, counted from 1, or "" beyond the end.
func (s *source) line(n int) string {
	if n < 1 || n > len(s.lines) {
		return ""
	}
	return s.lines[n-1]
}

// at is the place of a byte of a line.
func (s *source) at(line, byteColumn, span int) spot {
	text := s.line(line)
	column := 1 + utf8.RuneCountInString(text[:max(0, min(byteColumn-1, len(text)))])
	return spot{Position{s.name, line, column}, max(1, span)}
}

// start is the first character of a line that is not blank.
func (s *source) start(line int) spot {
	text := strings.TrimRight(s.line(line), " \t")
	indent := len(text) - len(strings.TrimLeft(text, " \t"))
	return s.at(line, indent+1, utf8.RuneCountInString(text[indent:]))
}

// newSource checks that the bytes are text of a sensible size and gives them back without a byte
// order mark. The lines may end in LF, CR LF or CR.
func newSource(name string, data []byte, most int) (*source, []byte, *Error) {
	data = bytes.TrimPrefix(data, []byte("\xef\xbb\xbf"))
	top := Position{name, 1, 1}
	if len(data) > most {
		return &source{name: name}, nil, &Error{
			Position: top, Span: 1,
			Message: fmt.Sprintf("the file has %d bytes, more than the %d that are read", len(data), most),
			Hint:    "is it the right file?",
		}
	}
	if bytes.HasPrefix(data, []byte("\xff\xfe")) || bytes.HasPrefix(data, []byte("\xfe\xff")) {
		return &source{name: name}, nil, &Error{
			Position: top, Span: 1,
			Message: "the file is in UTF-16",
			Hint:    "save it as UTF-8",
		}
	}
	text := strings.ReplaceAll(strings.ReplaceAll(string(data), "\r\n", "\n"), "\r", "\n")
	s := &source{name, strings.Split(text, "\n")}
	for i, line := range s.lines {
		for b, c := range line {
			width := utf8.RuneLen(c)
			if c == utf8.RuneError {
				_, width = utf8.DecodeRuneInString(line[b:])
			}
			message, hint := "", ""
			switch {
			case c == utf8.RuneError && width == 1:
				message, hint = fmt.Sprintf("byte 0x%02X is not UTF-8 text", line[b]), "save the file as UTF-8"
			case c < ' ' && c != '\t', c >= 0x7f && c < 0xa0:
				message, hint = fmt.Sprintf("control character 0x%02X", c), "is it the right file? Else take the character out"
			case c == 0x2028, c == 0x2029, c == 0xfeff:
				// YAML ends lines at the first two, editors do not: places would not agree.
				message, hint = fmt.Sprintf("invisible character U+%04X", c), "take it out; lines end with the return key"
			default:
				continue
			}
			at := s.at(i+1, b+1, 1)
			return s, nil, &Error{at.Position, 1, line, message, hint}
		}
	}
	return s, []byte(text), nil
}
