package estimate

import (
	"fmt"
	"math"

	"pinwright/kerf/reading"
)

// wantedHalf is the half width of the kerf's interval, mm, that makes a hole fit dependable: about a
// tenth of the clearance of a medium hole for small bolts (ISO 273, M3 and M4: 0.4 and 0.5 mm).
// Judgement, no source.
const wantedHalf = 0.04

// advise says what to cut or measure next, most useful first.
func (d *data) advise(m model, out *Result) {
	say := func(format string, args ...any) { out.Advice = append(out.Advice, fmt.Sprintf(format, args...)) }
	n := float64(len(d.features))
	k := out.Figures[0]
	scatter, _ := out.Figure(Scatter)
	if half := (k.High - k.Low) / 2; half > wantedHalf {
		if math.IsInf(half, 1) {
			say("the kerf has no end on one side: try pins that are tighter and looser, or measure with a calliper")
		} else {
			more := math.Ceil(n*(half/wantedHalf)*(half/wantedHalf) - n)
			if more > 200 {
				say("the kerf is known to +-%s mm: measure with a calliper rather than with pins", mm(half))
			} else {
				say("the kerf is known to +-%s mm: %.0f more features bring it to +-%s mm", mm(half), max(1, more), mm(wantedHalf))
			}
		}
	}
	if scatter.High > 3*scatter.Value || scatter.Low == 0 && scatter.High > 0.05 {
		say("the scatter may be as large as %s mm: measure at least 8 different features with a calliper", mm(scatter.High))
	}
	if d.holes == 0 {
		say("no holes: cut some of each size that you need, holes come out differently from straight cuts")
	} else if len(d.diameters) < 3 {
		say("holes of %d size: cut some of at least three sizes, to see whether small ones come out differently", len(d.diameters))
	}
	if d.straight == 0 {
		say("holes alone: measure bars too, the outsides of parts and tabs follow the kerf of straight cuts")
	}
	if d.axes[reading.X] == 0 || d.axes[reading.Y] == 0 {
		say("no difference between the axes can be seen: measure some across x and some across y")
	}
	if d.sides[reading.Top] == 0 || d.sides[reading.Bottom] == 0 {
		say("no taper can be seen: measure some at the top and some at the bottom")
	}
	if !d.repeated {
		say("scatter of the laser and of measuring are one: read some features twice")
	}
}
