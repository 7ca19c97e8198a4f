package dxf_test

import (
	"bytes"
	"errors"
	"math"
	"strings"
	"testing"

	"pinwright/export"
	"pinwright/export/dxf"
)

func TestSameSheetSameBytes(t *testing.T) {
	if !bytes.Equal(write(t, link(), dxf.Options{}), write(t, link(), dxf.Options{})) {
		t.Error("the same sheet gave different bytes")
	}
}

// Some readers take reals by their point, and none of the common ones reads an exponent everywhere.
func TestNumbersArePlain(t *testing.T) {
	s := link()
	s.Steps[0].Open[0].X = 1e-9
	s.Steps[0].Open[1].X = math.Copysign(0, -1)
	s.Steps[1].Open[0].X = 999999
	text := string(write(t, s, dxf.Options{}))
	for _, want := range []string{"\n0.000000001\n", "\n999999.0\n"} {
		if !strings.Contains(text, want) {
			t.Errorf("no %q in the drawing", want)
		}
	}
	if strings.Contains(text, "\n-0.0\n") {
		t.Error("a minus zero")
	}
	lines := strings.Split(text, "\n")
	for i := 1; i < len(lines); i += 2 {
		code := strings.TrimSpace(lines[i-1])
		if len(code) == 2 && code >= "10" && code < "60" && strings.ContainsAny(lines[i], "eE") {
			t.Errorf("line %d: %s", i+1, lines[i])
		}
	}
}

func TestWriteRefuses(t *testing.T) {
	change := func(f func(*export.Sheet)) export.Sheet {
		s := link()
		f(&s)
		return s
	}
	for name, c := range map[string]struct {
		sheet export.Sheet
		opt   dxf.Options
		want  string
	}{
		"a colour that does not exist": {link(), dxf.Options{Inside: 256}, "drawing demo: colour 256 of layer CUT-INSIDE is outside 1 to 255"},
		"no area":                      {change(func(s *export.Sheet) { s.Height = 0 }), dxf.Options{}, "demo"},
		"size not a number":            {change(func(s *export.Sheet) { s.Width = math.NaN() }), dxf.Options{}, "demo"},
		"coordinate not a number":      {change(func(s *export.Sheet) { s.Steps[4].Closed[1].X = math.NaN() }), dxf.Options{}, "step 5 (link): "},
		"infinite bulge":               {change(func(s *export.Sheet) { s.Steps[4].Closed[1].Bulge = math.Inf(1) }), dxf.Options{}, "step 5 (link): "},
		"a cut that is open": {
			change(func(s *export.Sheet) { s.Steps[2].Open = s.Steps[0].Open }),
			dxf.Options{},
			"step 3 (link): a cut is an outline",
		},
		"a cut of one point": {
			change(func(s *export.Sheet) { s.Steps[2].Closed = s.Steps[2].Closed[:1] }),
			dxf.Options{},
			"step 3 (link): a cut is an outline of two or more points; this one has 1",
		},
		"engraving that is closed": {
			change(func(s *export.Sheet) { s.Steps[0].Closed = s.Steps[2].Closed }),
			dxf.Options{},
			"step 1 (link): engraving is an open path",
		},
		"an operation that does not exist": {
			change(func(s *export.Sheet) { s.Steps[0].Op = 7 }), dxf.Options{}, "step 1 (link): ",
		},
	} {
		t.Run(name, func(t *testing.T) {
			var buf bytes.Buffer
			err := dxf.Write(&buf, c.sheet, c.opt)
			if err == nil || !strings.Contains(err.Error(), c.want) {
				t.Errorf("got %v, want %q", err, c.want)
			}
			if buf.Len() > 0 {
				t.Error("something was written all the same")
			}
		})
	}
}

type full struct{}

func (full) Write([]byte) (int, error) { return 0, errors.New("no space left") }

func TestWriteReportsAFullDisc(t *testing.T) {
	err := dxf.Write(full{}, link(), dxf.Options{})
	if err == nil || !strings.Contains(err.Error(), "drawing demo: no space left") {
		t.Errorf("got %v", err)
	}
}

func TestLayersAndOperations(t *testing.T) {
	for _, op := range []export.Operation{export.Engrave, export.CutInside, export.CutOutside} {
		want := map[export.Operation]string{
			export.Engrave: dxf.LayerEngrave, export.CutInside: dxf.LayerInside, export.CutOutside: dxf.LayerOutside,
		}[op]
		if dxf.LayerOf(op) != want {
			t.Errorf("operation %v has layer %q, want %q", op, dxf.LayerOf(op), want)
		}
		if back, ok := dxf.OperationOf(dxf.LayerOf(op)); !ok || back != op {
			t.Errorf("operation %d has layer %q, which means %d", op, dxf.LayerOf(op), back)
		}
	}
	if _, work := dxf.OperationOf(dxf.LayerEdge); work || dxf.LayerOf(99) != "" {
		t.Error("the sheet's edge is no work, and operation 99 no operation")
	}
}

func BenchmarkWriteSheetOf500Parts(b *testing.B) {
	s := link()
	for range 499 {
		s.Steps = append(s.Steps, link().Steps...)
	}
	b.ReportAllocs()
	for b.Loop() {
		var buf bytes.Buffer
		if err := dxf.Write(&buf, s, dxf.Options{}); err != nil {
			b.Fatal(err)
		}
	}
}
