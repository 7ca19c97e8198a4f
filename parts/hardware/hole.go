package hardware

import (
	"fmt"
	"math"
	"slices"
)

// Kind says what goes through a hole.
type Kind string

// The kinds; the words are those of the job file.
const (
	Bolt        Kind = "bolt"
	BearingSeat Kind = "bearing"
	Shaft       Kind = "shaft"
)

// Spec is what a hole is for.
type Spec struct {
	Kind      Kind
	Size      string   // of a bolt "M4", of a bearing its designation
	Diameter  float64  // of a shaft, mm
	Fit       string   // class of ISO 273 or ASME B18.2.8 for bolts; a word or a class of ISO 286 for the others
	Clearance *float64 // hole less what goes through, mm; negative presses; overrides Fit
}

// HoleSize is a finished hole.
type HoleSize struct {
	Nominal      float64 // of what goes through: bolt, shaft, outside of the bearing, mm
	Diameter     float64 // to draw: finished size, mm
	Upper, Lower float64 // deviations from Nominal that the class allows, mm; both 0 where it has none
	Rule         string  // "ISO 273:1979 medium", "ISO 286 F8, middle of the zone"
	Source       Source
}

// Hole gives the finished hole for a pin. For the classes of ISO 286 it is the middle of the zone.
//
// A laser does not hold such a zone: H7 at 10 mm is 15 micrometres wide, and a laser scatters by
// 0.05 mm and more. The hole drawn is the right middle to aim at; a bearing seat is a press fit that
// is tuned on a coupon of the same sheet.
func Hole(s Spec) (HoleSize, error) {
	if s.Clearance != nil {
		return explicit(s)
	}
	switch s.Kind {
	case Bolt:
		return BoltHole(s.Size, s.Fit)
	case Shaft:
		return ShaftHole(s.Diameter, s.Fit)
	case BearingSeat:
		return SeatHole(s.Size, s.Fit)
	}
	return HoleSize{}, unknown("kind of pin", string(s.Kind), []string{string(Bolt), string(BearingSeat), string(Shaft)})
}

// explicit is the hole with a clearance that the maker gives.
func explicit(s Spec) (HoleSize, error) {
	var nominal float64
	var err error
	switch s.Kind {
	case Bolt:
		nominal, err = BoltDiameter(s.Size)
	case BearingSeat:
		var b Bearing
		b, err = BearingFor(s.Size)
		nominal = b.Outside
	case Shaft:
		nominal = s.Diameter
	default:
		err = unknown("kind of pin", string(s.Kind), []string{string(Bolt), string(BearingSeat), string(Shaft)})
	}
	if err != nil {
		return HoleSize{}, err
	}
	diameter := nominal + *s.Clearance
	if !(nominal > 0) || !(diameter > 0) || math.IsInf(diameter, 0) {
		return HoleSize{}, fmt.Errorf("clearance %g mm on %g mm leaves no hole", *s.Clearance, nominal)
	}
	return HoleSize{
		Nominal:  nominal,
		Diameter: diameter,
		Rule:     fmt.Sprintf("explicit clearance %+g mm", *s.Clearance),
		Source:   Source{From: "the job file"},
	}, nil
}

// word is a fit in words and the hole class that it stands for.
type word struct{ name, class string }

var (
	// Shaft basis: ready-made shafts (ground rod, dowel pins) are h6 to h9, so that the hole makes
	// the fit. F8/h and G7/h are the usual running and sliding fits on that basis, K7/h the usual
	// transition fit that is pushed home by hand or a light tap, P7/h the usual press fit (workshop
	// tables of preferred fits, ISO 286-1 annex; from memory).
	shaftWords = []word{{"running", "F8"}, {"sliding", "G7"}, {"push", "K7"}, {"press", "P7"}}

	// The link turns about the bolt, so that the load goes round on the outer ring: bearing makers
	// then advise N7 for normal loads (P7 heavy, M7 light), and J7 where the ring may be shifted by
	// hand; JS7 is J7's neighbour in the table. H7 lets the ring slide, G7 runs with play (bearing
	// makers' tables of housing fits; from memory).
	seatWords = []word{{"running", "G7"}, {"sliding", "H7"}, {"push", "JS7"}, {"press", "N7"}}
)

// ShaftHole gives the hole for a ready-made shaft of class h: running F8, sliding G7, push K7, press
// P7, or a hole class by its name.
func ShaftHole(diameter float64, fit string) (HoleSize, error) {
	return middle(diameter, fit, shaftWords)
}

// SeatHole gives the hole in which a bearing sits: press N7, push JS7, sliding H7, running G7, or a
// hole class by its name.
func SeatHole(designation, fit string) (HoleSize, error) {
	b, err := BearingFor(designation)
	if err != nil {
		return HoleSize{}, err
	}
	h, err := middle(b.Outside, fit, seatWords)
	if err != nil {
		return HoleSize{}, fmt.Errorf("seat of bearing %s: %w", designation, err)
	}
	return h, nil
}

// ShaftFits and SeatFits are the words that ShaftHole and SeatHole know besides the hole classes.
func ShaftFits() []string { return names(shaftWords) }

// SeatFits: see ShaftFits.
func SeatFits() []string { return names(seatWords) }

func names(words []word) []string {
	var out []string
	for _, w := range words {
		out = append(out, w.name)
	}
	return out
}

func middle(diameter float64, fit string, words []word) (HoleSize, error) {
	class := fit
	for _, w := range words {
		if w.name == fit {
			class = w.class
		}
	}
	if !slices.Contains(HoleClasses(), class) {
		return HoleSize{}, unknown("fit", fit, append(names(words), HoleClasses()...))
	}
	z, err := ZoneOf(class, diameter)
	if err != nil {
		return HoleSize{}, err
	}
	rule := "ISO 286 " + class + ", middle of the zone"
	if class != fit {
		rule = fit + ": " + rule
	}
	return HoleSize{
		Nominal:  diameter,
		Diameter: diameter + z.Middle(),
		Upper:    z.Upper,
		Lower:    z.Lower,
		Rule:     rule,
		Source:   z.Source,
	}, nil
}
