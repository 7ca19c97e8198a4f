package stack

import (
	"errors"
	"fmt"
	"math"

	"pinwright/parts/hardware"
)

// choose gives the bolt for a budget: the shortest standard length of which even the shortest screw
// reaches past the nut on the thickest stack. A hexagon bolt is taken with a shank when it has that
// length and the nut stays off the shank on the thinnest stack: links turn better on a shank.
func (f *fitting) choose(b Budget) (Through, error) {
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
	if shanked, err := f.screw.Shanked(); err == nil {
		if l, err := shanked.SureLength(t.Need); err == nil && shanked.Grip(l) <= b.Least+slack {
			f.screw = shanked
		}
	}
	length, err := f.screw.SureLength(t.Need)
	if err != nil {
		return t, f.tooLong(err)
	}
	if grip := f.screw.Grip(length); f.nut != nil && grip > b.Least+slack {
		return t, fmt.Errorf(
			"joint %s: the thread of %s begins up to %.1f mm under the head, and the thinnest stack is %.1f mm: the nut would stop on the shank; say head: hexagon, which is threaded to the head",
			f.pin.Joint, f.screw.Designation(length), grip, b.Least)
	}
	t.Designation = f.screw.Designation(length)
	t.Length, t.Excess = length, tidy(length-t.Need)
	return t, nil
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
