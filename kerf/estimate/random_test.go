package estimate

import (
	"errors"
	"fmt"
	"math"
	"testing"

	"pgregory.net/rapid"

	"pinwright/kerf/reading"
)

// Whatever is read: an answer in order, or an error in words. Figures are numbers between the ends of their
// intervals, the same readings give the same figures, and the order of the rows does not matter but
// for the last digits.
func TestAnyReadings(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		var rs []reading.Reading
		n := rapid.IntRange(0, 12).Draw(t, "readings")
		kinds := []reading.Kind{reading.Hole, reading.Slot, reading.Bar}
		for range n {
			id := rapid.IntRange(0, 12).Draw(t, "feature")
			kind := kinds[id%3]
			r := reading.Reading{Feature: fmt.Sprint(id), Kind: kind, Drawn: 3 + float64(id%7), Count: 1, Line: len(rs) + 1}
			r.Axis = rapid.SampledFrom([]reading.Axis{reading.AnyAxis, reading.X, reading.Y}).Draw(t, "axis")
			r.Side = rapid.SampledFrom([]reading.Side{reading.Through, reading.Top, reading.Bottom}).Draw(t, "side")
			off := rapid.Float64Range(-0.5, 0.8).Draw(t, "off")
			if kind == reading.Bar {
				r.Count = 1 + id%4
			}
			v := r.Drawn*float64(r.Count) + off
			switch way := rapid.IntRange(0, 4).Draw(t, "way"); {
			case way == 0 && kind == reading.Hole:
				r.Pin, r.Answer = v, rapid.SampledFrom([]reading.Answer{reading.Drops, reading.Turns, reading.Push, reading.No}).Draw(t, "answer")
			case way == 1:
				r.Least, r.Most = v, v+0.1
			case way == 2:
				r.Least, r.Most = v, math.Inf(1)
			case way == 3:
				r.Least, r.Most = v, v
			default:
				r.Least, r.Most = math.Round(v*100)/100-0.005, math.Round(v*100)/100+0.005
			}
			rs = append(rs, r)
		}
		got, err := Fit(rs)
		if err != nil {
			var few TooFewError
			if err.Error() == "" || errors.As(err, &few) && len(few.Advice) == 0 {
				t.Fatalf("an error that says nothing: %v", err)
			}
			return
		}
		again, err := Fit(rs)
		if err != nil || fmt.Sprint(again) != fmt.Sprint(got) {
			t.Fatalf("a second time: %v, %+v, %+v", err, again, got)
		}
		for _, f := range got.Figures {
			if math.IsNaN(f.Value) || math.IsNaN(f.SE) || !(f.Low <= f.Value+1e-6) || !(f.High >= f.Value-1e-6) {
				t.Fatalf("%+v", f)
			}
		}
	})
}
