package stack

import (
	"errors"
	"fmt"
	"math"

	"pinwright/parts/hardware"
)

// choose gives the bolt for a budget: the shortest standard length of which even the shortest screw
// reaches past the nut on the thickest stack, and which is not longer by more than the excess. The nut
// next to the head must stay off the shank on the thinnest stack. A hexagon bolt is taken with a shank
// where one suits; and of any screw the next length, when its shank carries all that turns, top mm from
// the head, and that of the shortest does not: links turn better on a shank.
func (f *fitting) choose(b Budget, firstNut, top float64) (Through, error) {
	t := Through{Diameter: f.diameter(), Need: b.Most}
	if f.nut != nil {
		pitches := PitchesPastNut
		if f.nut.Kind == hardware.LockNut {
			pitches = PitchesPastLocknut
		}
		t.Need += f.nut.Height + float64(pitches)*f.screw.Pitch
	}
	t.Need = tidy(t.Need)
	if f.as != f.size {
		t.Designation = fmt.Sprintf("%s head screw %s", f.screw.Head, f.size)
		return t, nil
	}
	if f.open {
		t.Designation = f.screw.Designation(0)
		return t, nil
	}
	plain := f.screw
	if shanked, err := plain.Shanked(); err == nil {
		if l, err := f.length(shanked, t.Need, firstNut, top); err == nil {
			f.screw = shanked
			t.Designation, t.Length, t.Excess = shanked.Designation(l), l, tidy(l-t.Need)
			return t, nil
		}
	}
	l, err := f.length(plain, t.Need, firstNut, top)
	if err != nil {
		return t, err
	}
	t.Designation, t.Length, t.Excess = plain.Designation(l), l, tidy(l-t.Need)
	return t, nil
}

// length gives the length of a screw for a need.
func (f *fitting) length(s hardware.Screw, need, firstNut, top float64) (float64, error) {
	l, err := s.SureLength(need)
	if err != nil {
		return 0, f.tooLong(err)
	}
	most := f.excess()
	suits := func(l float64) error {
		if grip := s.Grip(l); f.nut != nil && grip > firstNut+slack {
			return fmt.Errorf(
				"joint %s: the thread of %s begins up to %.1f mm under the head, and the thinnest stack up to the first nut is %.1f mm: the nut would stop on the shank, and %d washers under it do not help; say head: hexagon, which is threaded to the head",
				f.pin.Joint, s.Designation(l), grip, firstNut, mostUnder)
		}
		if f.nut != nil && l-need > most+slack {
			return fmt.Errorf(
				"joint %s: the bolt needs %.1f mm, the next standard length is %s, and %.1f mm too long is more than the excess of %g mm; %d washers under the nut do not help: say excess: %gmm, or take another head or other washers",
				f.pin.Joint, need, s.Designation(l), l-need, most, mostUnder, math.Ceil(l-need))
		}
		return nil
	}
	if err := suits(l); err != nil {
		return 0, err
	}
	if s.Shank(l) < top-slack {
		if next, err := s.SureLength(l + 0.5); err == nil && suits(next) == nil && s.Shank(next) >= top-slack {
			return next, nil
		}
	}
	return l, nil
}

// excess is how much longer than it must be the bolt may be, mm.
func (f *fitting) excess() float64 {
	if f.pin.Excess > 0 {
		return f.pin.Excess
	}
	return MostExcess
}

// tooLong says which planes ask for more than there is.
func (f *fitting) tooLong(err error) error {
	var short hardware.TooShortError
	if !errors.As(err, &short) {
		return fmt.Errorf("joint %s: %w", f.pin.Joint, err)
	}
	first, last := f.members[0], f.members[len(f.members)-1]
	advice := fmt.Sprintf("bring the planes nearer by %g mm", math.Ceil(short.Short*10)/10)
	if thicker, ok := longer(short); ok {
		advice += fmt.Sprintf(", or take %s, which comes up to %g mm", thicker.Size, thicker.Most)
	}
	return &wording{fmt.Sprintf(
		"joint %s: from %s (plane %d) to %s (plane %d) the bolt needs %.1f mm, and the longest %s %s is %g mm: %s",
		f.pin.Joint, first.name, first.plane, last.name, last.plane, short.Need,
		short.Screw.Standard, short.Screw.Size, short.Screw.Most, advice), err}
}

// longer is the next thicker screw of the same head that comes long enough, its thicker nut and washers
// counted roughly: once their difference in diameter, twice that in pitch.
func longer(short hardware.TooShortError) (hardware.Screw, bool) {
	for _, size := range hardware.BoltSizes() {
		s, err := hardware.ScrewFor(short.Screw.Head, size)
		if err != nil || s.Diameter <= short.Screw.Diameter {
			continue
		}
		if s.Most >= short.Need+(s.Diameter-short.Screw.Diameter)+2*(s.Pitch-short.Screw.Pitch) {
			return s, true
		}
	}
	return hardware.Screw{}, false
}

// wording is an error told in other words.
type wording struct {
	text string
	err  error
}

func (w *wording) Error() string { return w.text }
func (w *wording) Unwrap() error { return w.err }
