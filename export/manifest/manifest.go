// Package manifest is the record of a run: everything that was decided, with its figures, as one JSON
// file beside the drawings.
//
// It says what the finished parts must measure, taken from the linkage and the job and not from the
// drawings, so that a drawing can be held against it by somebody who has nothing else.
//
// Lengths are millimetres, areas mm2, masses grams, angles degrees counter-clockwise. The frame of a
// part is that of parts.Part; the frame of a sheet has its origin at the lower left corner.
package manifest

// Name is the file name of the manifest in the folder of a run.
const Name = "manifest.json"

// Format is the number of the format described here. It rises when a reader of the old one would
// misunderstand the new one.
const Format = 1

// Manifest is the whole record. Its lists are in the order of the job and of the work, so that the
// same job gives the same bytes.
type Manifest struct {
	Format   int      `json:"format"`
	Program  string   `json:"program"` // name and version: "pinwright 0.1.0"
	Job      Job      `json:"job"`
	Linkage  Linkage  `json:"linkage"`
	Stock    []Stock  `json:"stock"`
	Sheets   []Sheet  `json:"sheets"`
	Parts    []Part   `json:"parts"`
	Files    []File   `json:"files"` // all files of the run but the manifest, by name
	Cautions []string `json:"cautions"`
}

// Job says which job file this came from.
type Job struct {
	Name   string `json:"name"`
	Title  string `json:"title"`
	SHA256 string `json:"sha256"` // of the job file's content, lower-case hexadecimal
}

// Linkage sums up the motion.
type Linkage struct {
	Joints       int            `json:"joints"`
	Links        int            `json:"links"`
	Mobility     int            `json:"mobility"` // degrees of freedom with the drive free
	Drive        Drive          `json:"drive"`
	Transmission []Transmission `json:"transmission"`
}

// Drive is the driven link and how far it turns.
type Drive struct {
	Link string  `json:"link"`
	From float64 `json:"from"` // degrees
	To   float64 `json:"to"`
	Full bool    `json:"full"` // goes round and round
}

// Transmission is the range of the transmission angle at a joint through the cycle, degrees.
type Transmission struct {
	Joint string  `json:"joint"`
	Least float64 `json:"least"`
	Most  float64 `json:"most"`
}

// Stock is a kind of sheet, and the rules for cutting it.
type Stock struct {
	Name      string  `json:"name"`
	Material  string  `json:"material"`
	Thickness float64 `json:"thickness"` // nominal
	Measured  float64 `json:"measured"`
	Margin    float64 `json:"margin"`     // material left between a cut and the edge of the sheet
	Web       float64 `json:"web"`        // material left between the cuts of two parts
	Kerf      float64 `json:"kerf"`       // full width of the cut
	ByShop    bool    `json:"by_shop"`    // the shop compensates: the drawings show finished sizes
	MarkClear float64 `json:"mark_clear"` // least distance from an engraved stroke to a cut path
}

// Beam returns the width for which the paths in the drawings are compensated: the kerf, or 0 when
// the shop compensates.
func (s Stock) Beam() float64 {
	if s.ByShop {
		return 0
	}
	return s.Kerf
}

// Taken returns what the beam takes away between the drawn lines of two parts, half of it beside each:
// the kerf where the beam runs along the lines; twice the kerf where the shop moves it outwards by half of
// that first.
func (s Stock) Taken() float64 {
	if s.ByShop {
		return 2 * s.Kerf
	}
	return s.Kerf
}

// Sheet is one sheet in use and its drawing.
type Sheet struct {
	Name    string  `json:"name"`
	Drawing string  `json:"drawing"` // the DXF, as named in Files
	Stock   string  `json:"stock"`
	Width   float64 `json:"width"`
	Height  float64 `json:"height"`
	Parts   int     `json:"parts"` // how many are on it
	Fill    float64 `json:"fill"`  // area of the parts over area of the sheet, 0 to 1
}

// Part is one flat part: where it is, and what it must measure when it is cut.
type Part struct {
	Name    string    `json:"name"`
	Link    string    `json:"link"` // link, frame plate or cross member
	Copy    string    `json:"copy"`
	Stock   string    `json:"stock"`
	Plane   int       `json:"plane"`
	Sheet   string    `json:"sheet"`             // name of the sheet it lies on
	Drawing string    `json:"drawing,omitempty"` // a DXF of this part alone, when there is one
	Mirror  bool      `json:"mirror"`            // belongs to a mirrored copy; its figures are mirrored already
	Place   Placement `json:"place"`
	Mark    Mark      `json:"mark"`
	Area    float64   `json:"area"` // finished, holes taken off
	Mass    float64   `json:"mass"`
	Outside Measure   `json:"outside"`
	Holes   []Hole    `json:"holes"`
	Feet    []Foot    `json:"feet"`
	Lengths []Length  `json:"lengths"`
}

// Placement is how a part lies on its sheet: turned over (x to -x) if Flip, then turned, then moved.
type Placement struct {
	Flip bool    `json:"flip"`
	Turn float64 `json:"turn"` // degrees
	X    float64 `json:"x"`
	Y    float64 `json:"y"`
}

// Mark is what is engraved on a part.
type Mark struct {
	Text    string  `json:"text"`
	Strokes int     `json:"strokes"` // pieces drawn without lifting
	Length  float64 `json:"length"`  // of all strokes
}

// Point is a place in the frame of a part.
type Point struct {
	X float64 `json:"x"`
	Y float64 `json:"y"`
}

// Measure is what can be measured of a contour without knowing its shape. It is taken of what the
// beam leaves: a corner that a beam of half the kerf cannot enter is round.
type Measure struct {
	Area      float64 `json:"area"`      // enclosed, positive
	Perimeter float64 `json:"perimeter"` // length of the edge
	Middle    Point   `json:"middle"`    // centroid of the enclosed area
	Low       Point   `json:"low"`       // lower left and upper right corner of the box round it, along the axes
	High      Point   `json:"high"`      // of the part's frame: they tell which way it is turned
}

// Hole is one inside contour of a part.
type Hole struct {
	Name     string  `json:"name"`
	Kind     string  `json:"kind"`  // pin, bearing, shaft, slot, tab, bolt, window, pen
	Joint    string  `json:"joint"` // the joint it sits on, or ""
	Centre   Point   `json:"centre"`
	Diameter float64 `json:"diameter"` // finished; 0: not round
	Measure  Measure `json:"measure"`  // finished
}

// Foot is a rounded toe: an arc of the outside about a traced joint.
type Foot struct {
	Joint  string  `json:"joint"`
	Centre Point   `json:"centre"`
	Radius float64 `json:"radius"` // finished
}

// Length is a distance between two joints as the linkage has it. Both joints are places that the part
// shows: a hole of its own or a foot.
type Length struct {
	A  string  `json:"a"`
	B  string  `json:"b"`
	MM float64 `json:"mm"`
}

// File is one file of the run.
type File struct {
	Name   string `json:"name"` // relative to the folder, with slashes
	Size   int64  `json:"size"` // bytes
	SHA256 string `json:"sha256"`
}

// HoleAt returns the index of the hole that stands for a joint: the first that sits on it and fixes
// a place, which bolt holes round it, windows, slots of tabs and slots of adjustable pivots do not.
func (p Part) HoleAt(joint string) (int, bool) {
	for i, h := range p.Holes {
		if h.Joint == joint && joint != "" {
			switch h.Kind {
			case "pin", "bearing", "shaft", "pen":
				return i, true
			}
		}
	}
	return 0, false
}

// FootAt returns the index of the foot at a joint.
func (p Part) FootAt(joint string) (int, bool) {
	for i, f := range p.Feet {
		if f.Joint == joint {
			return i, true
		}
	}
	return 0, false
}

// Shows says whether the part has a place for a joint: a hole or a foot.
func (p Part) Shows(joint string) bool {
	_, hole := p.HoleAt(joint)
	_, foot := p.FootAt(joint)
	return hole || foot
}
