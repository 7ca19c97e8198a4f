// Package stack tells what each pin carries from head to nut, how long its bolt must be, at which
// height every plane lies, and what is to be bought.
//
// The planes are given in the job. Plan:
//
//  1. A plane is a slab as thick as the thickest part on it, as measured. A part lies on the lower face
//     of its slab. Heads of bolts are below, nuts above.
//  2. Between neighbouring planes is the smallest gap that lets every pin with a part above it fill what
//     is between that part and its next one below: one washer as a rule; several washers, or washers on both sides of a spacer, where the pins have
//     washers of different thickness, the parts on a plane differ in thickness or a bearing stands
//     proud. What is left of the gap by then is play, at most MostPlay.
//  3. Planes without parts are kept as room for heads and nuts: each as thick as the thicker neighbour
//     with a washer on both sides, and in all high enough for every head and nut that ends there.
//  4. From bottom to top, as soon as a pin's last part has its height, its kit is stacked and its bolt
//     is chosen: on the thickest stack that the tolerances allow, with the shortest bolt of its length,
//     thread past the nut by at least one pitch (two past a locknut). On the thinnest stack the nut must
//     not run onto the shank.
//
// A sleeve is cut so much longer than the part that turns on it that the least play is left when the
// part is thickest and the sleeve shortest. A link to which the bolt is clamped has a thin nut between it
// and its neighbour, which counts as part of what fills that gap. A bolt that would be too long has
// washers put under its nut. Budgets are given at the worst and by root-sum-square; bolts and sleeves are
// chosen at the worst.
//
// Where spacers are bought, gaps are widened until stock lengths and washers fill them; where the frame
// has standoffs, the gap under the upper plate is widened until one of their stock lengths fits with as
// few washers as will do, and all pins still fill theirs.
//
// One pass, no search: time in proportion to the pins and the planes (and to the stock lengths where there are). Whether a part sweeps across a
// head, a nut or a spacer is geometry and not seen here; the elements of a kit have their heights and
// diameters for that.
//
// Lengths and heights are millimetres. Height 0 is the lower face of the lowest plane with a part.
package stack

import "pinwright/parts/job"

// Allowances of the axial budget. Common practice, no source, except where stated.
const (
	// LeastPlay and EndPlay are left under the nut of a bolt on which links turn, and beside a collar,
	// when the job does not say: 0.1 to 0.2 mm is usual, the larger takes the lengths.
	LeastPlay = 0.1
	EndPlay   = 0.2

	// SleevePlay is the most by which a sleeve is longer than what turns on it, when the job does not say:
	// what is left of the tolerances of a measured sheet and of the sleeve.
	SleevePlay = 0.4

	// SleeveTolerance is how far a sleeve may be off its length: cut, and filed to a gauge.
	SleeveTolerance = 0.05

	// MostExcess is how much longer than it must be a bolt may be, when the job does not say: the
	// lengths of ISO 888 have steps of up to 10 mm here, and a short one of their tolerance may be missing.
	MostExcess = 12.0

	// MostPlay is what washers may leave of a gap.
	MostPlay = 0.3

	// ShortestSpacer is the shortest piece of tube that can be cut square.
	ShortestSpacer = 2.0

	// SpacerTolerance is how far a spacer may be off its length.
	SpacerTolerance = 0.1

	// MeasuredTolerance is how far a sheet may be off its measured thickness elsewhere.
	MeasuredTolerance = 0.1

	// RunningGap is left between things that pass each other: an end of a pin and the part beyond.
	RunningGap = 0.5

	// PitchesPastNut: a fastener supplier's guide wants at least one thread beyond a nut.
	PitchesPastNut = 1

	// PitchesPastLocknut: self-locking nuts want two pitches beyond, so that the whole insert grips
	// (NASA-STD-5020A, from memory; API RP 686 wants two of any nut).
	PitchesPastLocknut = 2
)

// ElementKind says what an element of a kit is.
type ElementKind string

// The kinds of element.
const (
	HeadElement    ElementKind = "head"
	NutElement     ElementKind = "nut"
	WasherElement  ElementKind = "washer"
	SpacerElement  ElementKind = "spacer"
	PartElement    ElementKind = "part"    // a link or a frame plate
	BearingElement ElementKind = "bearing" // in the part before it in the list
	CollarElement  ElementKind = "collar"  // set collar or push-on ring
	SleeveElement  ElementKind = "sleeve"  // in the part before it in the list, which turns on it
	RodEndElement  ElementKind = "rod end" // as thick as its ball
)

// Element is one thing on a pin.
type Element struct {
	Kind      ElementKind
	What      string  // designation: "ISO 7089 4"; of a part empty
	Part      string  // link or frame plate, of parts, bearings and sleeves
	Thickness float64 // nominal; of a spacer its length
	From, To  float64 // heights
	Diameter  float64 // outside, largest; 0 for parts
}

// Budget is the axial sum between the head and the nut (for shafts between the ends), all play
// included in the greatest alone. Bolts are chosen on the worst case.
type Budget struct {
	Least, Nominal, Most float64 // worst case: every tolerance at its limit

	// Root-sum-square: the tolerances added as the square root of the sum of their squares, about the
	// middle of the limits. If they are independent and each spreads evenly about its middle with its
	// limits at three standard deviations, so are these.
	LikelyLeast, LikelyMost float64

	squares float64 // sum of the squares of half the tolerances
}

// Turning is the axial play of a part on its sleeve.
type Turning struct {
	Part string
	Play Budget
}

// Through is the bolt or shaft that everything sits on.
type Through struct {
	Designation string  // "ISO 4762 M4x20", "shaft 6 mm"; without a length when Length is 0
	Diameter    float64 // nominal
	Length      float64 // standard length of a bolt, length to cut of a shaft; 0: not known, see Need
	Need        float64 // least length that the budget asks for
	Excess      float64 // Length less Need; 0 when Length is
	Past        float64 // beyond the nut on the nominal stack, head to tip; 0 without nut
	From, To    float64 // heights of shank and tip, or of the ends of a shaft
}

// Kit is what one joint of one copy carries, from head to nut: from bottom to top.
type Kit struct {
	Copy     string // name of the copy, "" for a single one
	Joint    string
	Pin      job.Pin
	Elements []Element
	Through  Through
	Budget   Budget
	Play     float64   // axial play that is left on the nominal stack: end play and what washers leave
	Turning  []Turning // the parts that turn on a sleeve, in the order of the stack
	Washers  int       // how many of its washers were put under the nut so that the bolt is not too long
	Open     bool      // the pin goes on into something that is not in the job
	Notes    []string  // plain sentences for whoever assembles; may be empty
}

// Level is where a plane lies.
type Level struct {
	Plane    int
	From, To float64
	Empty    bool // no part lies on it
}
