package dxf

import (
	"bytes"
	"fmt"
	"io"
	"math"
	"strconv"
	"strings"
)

// The caps on what is read. They are far above any sheet of parts, and low enough that a file from
// anywhere can be opened without harm.
const (
	maxBytes    = 256 << 20
	maxLine     = 4096 // the DXF Reference allows 2049
	maxEntities = 1 << 20
	maxVertices = 1 << 22 // in all
)

// pair is a group code, its value, and the line of the code.
type pair struct {
	code  int
	value string
	line  int
}

// scanner takes a drawing apart into pairs.
type scanner struct {
	rest []byte
	line int // lines taken so far
	held *pair
}

func newScanner(r io.Reader) (*scanner, error) {
	data, err := io.ReadAll(io.LimitReader(r, maxBytes+1))
	if err != nil {
		return nil, fmt.Errorf("reading the drawing: %w", err)
	}
	switch {
	case len(data) > maxBytes:
		return nil, fmt.Errorf("the drawing is larger than %d MB", maxBytes>>20)
	case len(bytes.TrimSpace(data)) == 0:
		return nil, &Error{1, "the file is empty"}
	case bytes.HasPrefix(data, []byte("AutoCAD Binary DXF")):
		return nil, &Error{1, "this is a binary DXF; save it as ASCII DXF"}
	}
	return &scanner{rest: data}, nil
}

func (s *scanner) fail(line int, format string, args ...any) error {
	return &Error{line, fmt.Sprintf(format, args...)}
}

// take returns the next line without its end; false at the end of the file.
func (s *scanner) take() (string, bool, error) {
	if len(s.rest) == 0 {
		return "", false, nil
	}
	s.line++
	line := s.rest
	if i := bytes.IndexByte(s.rest, '\n'); i >= 0 {
		line, s.rest = s.rest[:i], s.rest[i+1:]
	} else {
		s.rest = nil
	}
	line = bytes.TrimSuffix(line, []byte("\r"))
	if len(line) > maxLine {
		return "", false, s.fail(s.line, "a line of %d characters; %d are allowed", len(line), maxLine)
	}
	return string(line), true, nil
}

// next returns the next pair that is not a comment. The end of the file is an error: a drawing ends
// with its EOF marker, which the caller looks for.
func (s *scanner) next() (pair, error) {
	if s.held != nil {
		p := *s.held
		s.held = nil
		return p, nil
	}
	for {
		head, ok, err := s.take()
		if err != nil {
			return pair{}, err
		}
		if !ok {
			return pair{}, s.fail(s.line+1, "the file ends without EOF: it is cut short")
		}
		line := s.line
		code, err := strconv.Atoi(strings.TrimSpace(head))
		if err != nil || code < -5 || code > 1071 {
			return pair{}, s.fail(line, "%s is not a group code", quote(head))
		}
		value, ok, err := s.take()
		if err != nil {
			return pair{}, err
		}
		if !ok {
			return pair{}, s.fail(line, "group code %d has no value: the file is cut short", code)
		}
		if code != 999 {
			return pair{code, value, line}, nil
		}
	}
}

// back gives a pair back, to be the next one again.
func (s *scanner) back(p pair) { s.held = &p }

// number reads a value as a finite number of reasonable size.
func (s *scanner) number(p pair) (float64, error) {
	text := strings.TrimSpace(p.value)
	v, err := strconv.ParseFloat(text, 64)
	if err != nil || math.IsNaN(v) || math.IsInf(v, 0) || strings.ContainsAny(text, "xXpP_") {
		return 0, s.fail(p.line+1, "%s is not a number (group code %d)", quote(p.value), p.code)
	}
	return v, nil
}

// coordinate reads a value as a place on a sheet.
func (s *scanner) coordinate(p pair) (float64, error) {
	v, err := s.number(p)
	if err == nil && math.Abs(v) > maxCoordinate {
		return 0, s.fail(p.line+1, "%g is beyond %g (group code %d)", v, maxCoordinate, p.code)
	}
	return v, err
}

func (s *scanner) integer(p pair) (int, error) {
	v, err := strconv.ParseInt(strings.TrimSpace(p.value), 10, 32)
	if err != nil {
		return 0, s.fail(p.line+1, "%s is not a whole number (group code %d)", quote(p.value), p.code)
	}
	return int(v), nil
}

// quote shows a value in an error, shortened.
func quote(v string) string {
	if len(v) > 40 {
		v = v[:40] + "..."
	}
	return strconv.QuoteToASCII(v)
}
