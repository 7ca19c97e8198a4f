// Package planes decides which part of a linkage lies on which plane of the side view, from the back to
// the front: on as few planes as possible, then with the least total length of pins, then with the least
// overhang of loaded pins. The answer is proven to be the best, or comes with a proven bound.
//
// It knows no geometry: which parts may share a plane and what sweeps across which pin is given. Plan:
//
//  1. The side view is built from the back to the front, one plane after the other. A step puts a set of
//     bodies on the next plane, or on one beyond empty planes. What can happen from there on depends on
//     the set of bodies placed so far, and on how far the nuts that ended lately, and the bodies that
//     heads must stay clear of, still reach. Heights are sums of thicknesses and washers, in micrometres,
//     so that they are exact.
//  2. Without heads and nuts only the set counts, and the best way to finish from every set is found
//     exactly by dynamic programming over the sets. It is a lower bound for the problem with heads and
//     nuts (relax.go).
//  3. Best-first search (A*) with that bound: the first complete side view that is taken from the heap is
//     the best there is. Cost is compared as planes, then length, then overhang, as whole numbers (solve.go).
//  4. Too many bodies for step 2, or too many states in step 3: weaker bounds, and a dive for a good answer;
//     the most promising state left in the heap is then the proven bound.
//  5. If there is no answer, rules are taken away one by one as long as it stays so. What is left is a
//     smallest set of rules that contradict each other: without any one of them there is an answer
//     (conflict.go).
//
// Running time grows with the number of sets of bodies that can be placed first, at most 2^n, times the
// sets that can be next. The same problem gives the same answer on any machine.
//
// Lengths are millimetres, angles radians. Planes are numbered from the back (where heads are) to the
// front (where nuts are).
package planes

// Body is a part that lies on one plane: a link or a plate of the frame.
type Body struct {
	Name      string
	Thickness float64
}

// Zone is a piece of a pin along its axis.
type Zone int

// The zones of a pin.
const (
	Shank Zone = iota // from its first to its last member, these planes included: washers, spacers
	Head              // behind its first member
	Nut               // in front of its last member
)

// String names the zone as in "the spacers of B".
func (z Zone) String() string {
	switch z {
	case Head:
		return "head"
	case Nut:
		return "nut"
	}
	return "spacers"
}

// Pin is something that holds bodies together along an axis across the planes.
type Pin struct {
	Name    string
	Members []int   // bodies on it, at least one; no two of them share a plane
	Below   float64 // how far head and washer reach behind the first member
	Above   float64 // how far washer, nut and tip reach in front of the last
	Least   float64 // how long it must be at least, from the back of its first member to the front of its last
	Free    bool    // its length costs nothing: not a pin but a spacer of the frame
	Loaded  bool    // planes between its members count as overhang
}

// Near is how near two things come to each other: the smallest gap, negative when they overlap, and the
// drive angle where it occurs.
type Near struct {
	MM, Angle float64
}

// Apart says that two bodies cannot share a plane.
type Apart struct {
	A, B int
	Near
}

// Swept says that a body, seen from above, comes too near to a zone of a pin that it is not on, so that it
// must not be at the height of that zone.
type Swept struct {
	Pin, Body int
	Zone      Zone
	Near
}

// Close says that zones of two pins come too near to each other to be at the same height.
type Close struct {
	P, Q         int
	ZoneP, ZoneQ Zone
	Near
}

// Short says that a pin comes no longer than this from the back of its first member to the front of its
// last.
type Short struct {
	Pin int
	MM  float64
}

// DemandKind is what a job may demand of a body's plane.
type DemandKind int

// The demands.
const (
	On        DemandKind = iota // body A lies on plane Plane
	SamePlane                   // A and B lie on one plane
	InFrontOf                   // A lies on a higher plane than B
)

// Demand is a wish of the job that must be kept.
type Demand struct {
	Kind  DemandKind
	A, B  int
	Plane int
}

// Problem is everything that decides about the planes.
type Problem struct {
	Bodies  []Body
	Pins    []Pin
	Apart   []Apart
	Swept   []Swept
	Close   []Close
	Short   []Short
	Demands []Demand
	Washer  float64 // gap between neighbouring planes
	Clear   float64 // what must be left in height between a head or nut and what passes it
	First   int     // number of the lowest plane, when no demand fixes one

	// States is the most that the search may look at; 0: 400,000, some seconds.
	States int
}

// Cost is what an answer is judged by, in this order.
type Cost struct {
	Planes   int     // from the lowest to the highest with a part, empty ones between included
	Length   float64 // of all pins from first to last member, mm
	Overhang int     // planes between the members of loaded pins, summed over them
}

// Answer is an assignment of planes.
type Answer struct {
	Planes []int     // by body
	Spans  []float64 // by pin: from the back of its first member to the front of its last
	Cost   Cost
	Proven bool // no assignment costs less
	Bound  Cost // no assignment costs less than this; equal to Cost when Proven
	States int  // looked at by the search
}
