package hardware

import (
	"errors"
	"math"
	"slices"
	"testing"
)

// Rod ends, push-on rings and standoffs are from memory or common practice, and say so; what must hold
// whatever the maker: a ball is wider than its eye, its face wider than its bore, lengths ascend.
func TestKindsTables(t *testing.T) {
	c, err := read()
	if err != nil {
		t.Fatal(err)
	}
	if len(c.rodEnds) < 6 || len(c.pushRings) < 6 || len(c.standoffs) < 5 {
		t.Fatalf("%d rod ends, %d rings, %d standoffs", len(c.rodEnds), len(c.pushRings), len(c.standoffs))
	}
	for _, e := range c.rodEnds {
		if e.Width <= e.Eye || e.BallFace <= e.Bore || e.Outside <= e.BallFace || e.Source.Confirmed != "from memory" {
			t.Errorf("%+v", e)
		}
		// With nothing wider than its face beside it a ball tilts furthest: 13 degrees by the standard for
		// 5 to 10 mm (ISO 12240-4 series K gives 13 to 14; from memory).
		if tilt := e.Tilt(e.BallFace) * 180 / math.Pi; tilt < 11.5 || tilt > 15.5 {
			t.Errorf("%s tilts by %.1f degrees", e.Designation(), tilt)
		}
		if m := e.Mass(); !(m > 0) {
			t.Errorf("%s: %g g", e.Designation(), m)
		}
	}
	for _, r := range c.pushRings {
		if r.Outside <= r.Bore || r.Height <= 0 || r.Source.Confirmed != "from memory" || !(r.Mass() > 0) {
			t.Errorf("%+v", r)
		}
	}
	for _, s := range c.standoffs {
		d, err := BoltDiameter(s.Size)
		if err != nil || s.Across <= d || !slices.IsSorted(s.Lengths) || s.Source.Confirmed != "common practice, no source" {
			t.Errorf("%+v (%v)", s, err)
		}
		for _, l := range s.Lengths {
			if s.Depth(l) > l/2 || s.Depth(l) > s.Thread || !(s.Mass(l, false) > s.Mass(l, true)) || !(s.Mass(l, true) > 0) {
				t.Errorf("%s, %g mm: depth %g, %g and %g g", s.Size, l, s.Depth(l), s.Mass(l, false), s.Mass(l, true))
			}
		}
	}
	if l := SpacerLengths(); !slices.IsSorted(l) || l[0] <= 0 {
		t.Errorf("%v", l)
	}
}

// The eye of a rod end tilted by what Tilt gives touches the rim of the washer: the distance of the rim's
// point from the plane of the eye's face, by rotating it.
func TestTilt(t *testing.T) {
	e, err := RodEndFor(5)
	if err != nil {
		t.Fatal(err)
	}
	for _, washer := range []float64{7.7, 9, 10, 15} {
		a := e.Tilt(washer)
		s, c := math.Sincos(a)
		// A point of the rim: (washer/2, ball/2); the face's normal is (-sin a, cos a) at eye/2 when tilted towards it.
		if gap := -s*washer/2 + c*e.Width/2 - e.Eye/2; math.Abs(gap) > 1e-12 {
			t.Errorf("washer %g: %.2f degrees leave %g mm", washer, a*180/math.Pi, gap)
		}
	}
}

func TestKindsUnknown(t *testing.T) {
	var errs []error
	_, err := RodEndFor(7)
	errs = append(errs, err)
	_, err = PushRingFor(7)
	errs = append(errs, err)
	_, err = StandoffFor("M7")
	errs = append(errs, err)
	for _, err := range errs {
		if err == nil || errors.Unwrap(err) != nil && err.Error() == "" {
			t.Errorf("%v", err)
		}
	}
}

// The shank that is sure: M4x30 by ISO 4762 has 20 mm of thread and a run-out of up to five pitches; screws
// that are threaded to the head have none.
func TestShank(t *testing.T) {
	s, err := ScrewFor(Socket, "M4")
	if err != nil {
		t.Fatal(err)
	}
	for length, want := range map[float64]float64{20: 0, 25: 0, 30: 6.5, 40: 16.5} {
		if got := s.Shank(length); math.Abs(got-want) > 1e-9 {
			t.Errorf("M4x%g: %g, want %g", length, got, want)
		}
	}
}

// A tube of 8 by 4 mm, 100 mm long: pi/4 (64 - 16) x 100 = 3770 mm3 of aluminium are 10.18 g.
func TestTubeMass(t *testing.T) {
	if got := TubeMass(4, 8, 100); math.Abs(got-10.179) > 1e-3 {
		t.Errorf("%g g", got)
	}
}
