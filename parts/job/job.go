// Package job is the job file: what the maker asks for, read strictly.
//
// A Job is complete and plain: defaults are filled in, lengths are millimetres, angles radians, and
// every name it mentions exists. What can only be seen later (a linkage that does not close, a part
// too thin) is not checked here; At gives later stages the place in the file to speak of.
package job

import (
	"pinwright/parts/linkage"
	"pinwright/parts/outline"
)

// Job is everything that one run needs to know.
type Job struct {
	Name    string // letters, digits, hyphens: it names files
	Title   string
	Linkage linkage.Linkage
	Links   []Link // build rules, in the order of Linkage.Links
	Frame   *Frame // nil: the ground pivots are somebody else's
	Copies  []Copy // at least one; expanded: count 2 gives two entries
	Body    *Body  // nil: the copies stand apart, nothing is said about how
	Pins    []Pin  // one for every joint that carries one, in the order of Linkage.Joints
	Spacers Spacers
	Stock   []Stock
	Spare   Spare

	places  map[string]Position // key path ("linkage.links.crank.length") to place in the file
	sources map[string]*source  // by file name, for the lines of later errors
}

// Shape is the form of a part.
type Shape string

// The shapes.
const (
	Bar      Shape = "bar"       // straight, round ends
	Waisted  Shape = "waisted"   // bar drawn in between its ends
	Bent     Shape = "bent"      // bar that goes round an obstacle
	Plate    Shape = "plate"     // rounded hull of all pins
	Spider   Shape = "spider"    // arms from the middle to each pin, filleted
	DiscForm Shape = "disc"      // full disc about the first pin
	CrankArm Shape = "crank-arm" // hub and arm with a phase mark
)

// Link says how one link of the linkage is built.
type Link struct {
	Name      string
	Plane     int
	PlaneFree bool     // no plane is given: it is to be found, and Plane is 0 until then
	SameAs    string   // link or plate on whose plane it must lie; "" when free
	InFrontOf []string // links and plates that must lie on lower planes
	Shape     Shape
	Stock     string
	Width     float64        // across bars and arms, mm; 0: the least that the edge rule allows
	Waist     float64        // width at the waist, mm (Waisted)
	Bend      float64        // sideways shift of the middle of a bent bar, mm, positive to the left going from first to last pin
	Around    []outline.Disc // obstacles for a bent bar, in the link's frame: first pin at the origin, second on the x axis
	Fillet    float64        // radius of inside corners, mm
	Foot      *Foot
	Windows   bool    // lightening windows
	Rim       float64 // material left round windows, mm; 0: by the edge rule
	Bores     []Bore  // bores that differ from what the pin asks for
	PhaseMark bool
}

// Foot is a rounded toe at a traced joint.
type Foot struct {
	At     string  // joint
	Radius float64 // mm
	Pen    float64 // diameter of a hole for a pen on the traced point, mm; 0: none
}

// BoreKind is the form of a hole for a pin.
type BoreKind string

// The kinds of bore.
const (
	RoundBore   BoreKind = "round"
	DBore       BoreKind = "d"       // round with one flat
	HexagonBore BoreKind = "hexagon" // pocket for a nut or a hexagon shaft
	HubBore     BoreKind = "hub"     // centre hole and a circle of bolt holes
)

// Bore is a hole at a joint whose form is given by the maker.
type Bore struct {
	Joint    string
	Kind     BoreKind
	Diameter float64 // round and D: across the circle; hub: the centre hole; mm, finished size
	Flat     float64 // D: from the flat to the far side of the circle, mm
	Across   float64 // hexagon: across flats, mm
	Bolts    int     // hub: number of bolts
	Circle   float64 // hub: diameter of the bolt circle, mm
	Hole     float64 // hub: diameter of the bolt holes, mm
}

// Frame is the ground as plates with the ground pivots in them.
type Frame struct {
	Stock  string
	Width  float64 // rim round the pivots, mm; 0: by the edge rule
	Plates []FramePlate
	Mount  *Mount
	Cross  []CrossMember

	Standoffs *Standoffs // nil: none
}

// FramePlate is one plate of the frame.
type FramePlate struct {
	Name      string
	Plane     int
	PlaneFree bool     // as of a link
	InFrontOf []string // as of a link
	Pivots    []string // ground joints it carries, in the order of the joints
}

// Mount is the holes by which the frame is screwed to something.
type Mount struct {
	At       []outline.Point // in the linkage's coordinates
	Diameter float64         // finished, mm; 0: by Bolt and Fit
	Bolt     string          // designation when given, for the list
	Fit      string          // of the bolt, when there is one and Diameter is 0
}

// Standoffs keep the lowest and the highest frame plate apart, with a screw from either side.
type Standoffs struct {
	At    []outline.Point // in the linkage's coordinates
	Bolt  string          // size of their thread, metric
	Fit   string          // of the screws in the plates
	Head  string          // of the screws: socket, button, hexagon
	Round bool            // round instead of hexagon
}

// CrossMember is a plate that stands between two frame plates, with tabs in their slots.
type CrossMember struct {
	At        outline.Point // middle of its foot on the frame plates, in the linkage's coordinates
	Angle     float64       // direction of its length along the frame plate
	Width     float64       // length of the slot's line, mm: the member's width
	Tabs      int           // tabs on each side
	Stock     string
	Clearance float64 // slot minus measured thickness, mm; negative presses
}

// Copy is one built copy of the whole linkage.
type Copy struct {
	Name   string // "left-1"; "" when the job has a single unnamed copy
	Phase  float64
	Mirror bool
}

// PinKind says what goes through a joint.
type PinKind string

// The kinds of pin.
const (
	BoltPin    PinKind = "bolt"    // bolt as axle, with a locknut
	BearingPin PinKind = "bearing" // ball bearing pressed into one link, bolt through its bore
	ShaftPin   PinKind = "shaft"   // plain round shaft
	SleevePin  PinKind = "sleeve"  // bolt that clamps a sleeve, on which links turn
	ClampPin   PinKind = "clamp"   // bolt clamped to one link, as a crank's pin; the others turn on it
	RodEndPin  PinKind = "rod-end" // bolt that clamps the ball of a rod end to a link
)

// Pin is what one joint carries.
type Pin struct {
	Joint     string
	Kind      PinKind
	Bolt      string   // "M4", "#8", "1/4"; for a bearing the bolt through its bore
	Bearing   string   // designation, "624"
	Seats     []string // links and frame plates that carry the bearing or turn on the sleeve
	Sleeve    float64  // outside diameter of the sleeve, mm
	Clamped   string   // link or frame plate that the bolt is clamped to
	RodEnd    Side     // where the rod end is
	Shaft     float64  // shaft diameter, mm
	Retain    Retainer // what keeps a shaft where it is
	Fit       string   // fine medium coarse (ISO 273), close normal loose (ASME B18.2.8), running sliding push press or an ISO 286 hole class ("H7")
	Clearance *float64 // explicit diametral clearance, mm; overrides Fit
	Head      string   // socket, button, hexagon
	Nut       string   // lock, plain, thin, none
	Washer    string   // normal, small, large, none

	// Play is the least and the greatest axial play wanted, mm; both 0: what is usual for the kind.
	Play [2]float64
	// Excess is how much longer than it must be the bolt may be, mm; 0: what is usual.
	Excess float64
}

// Side is an end of a bolt.
type Side string

// The sides; "" is none.
const (
	HeadSide Side = "head"
	NutSide  Side = "nut"
)

// Retainer keeps a shaft from wandering.
type Retainer string

// The retainers; "" is taken as collars.
const (
	CollarRetainer Retainer = "collar" // set collar with a screw
	RingRetainer   Retainer = "ring"   // push-on ring with teeth, for shafts without a groove
)

// Spacers says where spacers and sleeves come from. The zero value: cut from tube, and nothing is known
// of the tube.
type Spacers struct {
	Stock   bool      // of stock lengths only
	Lengths []float64 // the stock lengths, ascending, mm; empty: the usual ones
	Tube    float64   // length of a tube from which they are cut, mm; 0: not known, no cutting plan
	Saw     float64   // what a cut takes away, mm
}

// Grain says how parts may be turned on a stock.
type Grain string

// The grains.
const (
	NoGrain  Grain = "none"         // free turning
	HalfTurn Grain = "half-turn"    // 0 and 180 degrees
	Quarter  Grain = "quarter-turn" // 0, 90, 180, 270
	Fixed    Grain = "fixed"        // no turning
)

// Stock is a kind of sheet.
type Stock struct {
	Name          string
	Material      string
	Thickness     float64 // nominal, mm
	Measured      float64 // as measured, mm; equal to Thickness when not given
	Width, Height float64
	Quantity      int
	Margin        float64
	Web           float64
	Kerf          float64 // full width, mm
	ByShop        bool    // the shop compensates: paths are finished size
	Grain         Grain
	Price         float64 // a sheet, in the maker's money; 0: unknown
}

// Spare is what is bought on top.
type Spare struct {
	Percent float64 // of each line, rounded up
	Least   int     // at least so many of each line
}
