package manifest

import (
	"bytes"
	"encoding/json"
	"errors"
	"fmt"
	"io"
	"strings"
)

// maxBytes is the largest manifest that is read; a thousand parts take some three megabytes.
const maxBytes = 256 << 20

// Encode writes a manifest, indented, keys in a fixed order, numbers to nine decimals. A manifest that Validate refuses is not
// written.
func Encode(w io.Writer, m Manifest) error {
	if err := m.Validate(); err != nil {
		return fmt.Errorf("manifest: %w", err)
	}
	m.fill()
	m = settled(m)
	var buf bytes.Buffer
	enc := json.NewEncoder(&buf)
	enc.SetEscapeHTML(false)
	enc.SetIndent("", "  ")
	if err := enc.Encode(m); err != nil {
		return fmt.Errorf("manifest: %w", err)
	}
	if _, err := w.Write(buf.Bytes()); err != nil {
		return fmt.Errorf("manifest: %w", err)
	}
	return nil
}

// fill makes empty lists of missing ones, so that the file says [] and never null.
func (m *Manifest) fill() {
	m.Linkage.Transmission = orEmpty(m.Linkage.Transmission)
	m.Stock = orEmpty(m.Stock)
	m.Sheets = orEmpty(m.Sheets)
	m.Files = orEmpty(m.Files)
	m.Cautions = orEmpty(m.Cautions)
	m.Parts = append([]Part{}, m.Parts...) // the caller's parts stay as they are
	for i := range m.Parts {
		p := &m.Parts[i]
		p.Holes, p.Feet, p.Lengths = orEmpty(p.Holes), orEmpty(p.Feet), orEmpty(p.Lengths)
	}
}

func orEmpty[T any](list []T) []T {
	if list == nil {
		return []T{}
	}
	return list
}

// Decode reads a manifest, strictly: an unknown key, a key twice, a wrong type, something after the
// end, and whatever Validate refuses are errors, with line and column where there is one.
func Decode(r io.Reader) (Manifest, error) {
	data, err := io.ReadAll(io.LimitReader(r, maxBytes+1))
	if err != nil {
		return Manifest{}, fmt.Errorf("manifest: %w", err)
	}
	if len(data) > maxBytes {
		return Manifest{}, fmt.Errorf("manifest: larger than %d MB", maxBytes>>20)
	}
	var m Manifest
	dec := json.NewDecoder(bytes.NewReader(data))
	dec.DisallowUnknownFields()
	if err := dec.Decode(&m); err != nil {
		return Manifest{}, explain(data, dec.InputOffset(), err)
	}
	if len(bytes.TrimSpace(data[dec.InputOffset():])) > 0 {
		return Manifest{}, fmt.Errorf("manifest: %s: something follows the end", place(data, dec.InputOffset()))
	}
	if err := doubled(data); err != nil {
		return Manifest{}, err
	}
	if err := m.Validate(); err != nil {
		return Manifest{}, fmt.Errorf("manifest: %w", err)
	}
	m.fill()
	return m, nil
}

// explain puts an error of the JSON reader in our words, with its place.
func explain(data []byte, offset int64, err error) error {
	var syntax *json.SyntaxError
	var kind *json.UnmarshalTypeError
	switch {
	case errors.As(err, &syntax):
		return fmt.Errorf("manifest: %s: %s", place(data, syntax.Offset), syntax.Error())
	case errors.As(err, &kind):
		return fmt.Errorf("manifest: %s: %s cannot be a %s", place(data, kind.Offset), kind.Field, kind.Value)
	case errors.Is(err, io.EOF), errors.Is(err, io.ErrUnexpectedEOF):
		return fmt.Errorf("manifest: %s: the file is cut short", place(data, int64(len(data))))
	}
	if name, ok := strings.CutPrefix(err.Error(), "json: unknown field "); ok {
		return fmt.Errorf("manifest: unknown key %s", name)
	}
	return fmt.Errorf("manifest: %s: %w", place(data, offset), err)
}

// place turns an offset into "line 3, column 7".
func place(data []byte, offset int64) string {
	offset = max(0, min(offset, int64(len(data))))
	before := data[:offset]
	line := 1 + bytes.Count(before, []byte("\n"))
	column := len(before) - bytes.LastIndexByte(before, '\n')
	return fmt.Sprintf("line %d, column %d", line, column)
}

// doubled looks for a key that stands twice in one object: the JSON reader would quietly keep the
// last. The data is sound JSON.
func doubled(data []byte) error {
	type object struct {
		keys map[string]bool // nil: a list
		key  bool            // a key comes next
	}
	var open []object
	dec := json.NewDecoder(bytes.NewReader(data))
	for {
		token, err := dec.Token()
		if errors.Is(err, io.EOF) {
			return nil
		}
		if err != nil {
			return fmt.Errorf("manifest: %s: %w", place(data, dec.InputOffset()), err)
		}
		if text, ok := token.(string); ok && len(open) > 0 && open[len(open)-1].key {
			at := &open[len(open)-1]
			// Keys are told apart as the JSON reader does it, without regard to case.
			if folded := strings.ToLower(text); at.keys[folded] {
				return fmt.Errorf("manifest: %s: key %q stands twice", place(data, dec.InputOffset()), text)
			} else {
				at.keys[folded] = true
			}
			at.key = false
			continue
		}
		switch token {
		case json.Delim('{'):
			open = append(open, object{keys: map[string]bool{}, key: true})
			continue
		case json.Delim('['):
			open = append(open, object{})
			continue
		case json.Delim('}'), json.Delim(']'):
			open = open[:len(open)-1]
		}
		if len(open) > 0 && open[len(open)-1].keys != nil {
			open[len(open)-1].key = true
		}
	}
}
