// Package material holds facts and rules of sheet materials: what may be lasered, how thick a sheet
// may really be, how much has to stay round a hole.
//
// Every figure has its source beside it with a word on how far it was confirmed: "2+ places",
// "1 place", "from memory" or "common practice, no source"; a rule that is a judgement says so. No
// standard itself was read; what was compared are public tables, data sheets and guides of workshops.
// The figures are for models and prototypes. The laser's manual, local rules and qualified people
// decide what may be cut.
//
// Lengths are millimetres, densities kg/m3.
package material

import "fmt"

// Verdict says whether a material goes into a laser.
type Verdict string

// The verdicts.
const (
	OK      Verdict = "ok"
	Warn    Verdict = "warn"    // with the cautions read
	Refused Verdict = "refused" // never
)

// Laser is a kind of laser.
type Laser string

// The lasers.
const (
	CO2   Laser = "CO2"
	Diode Laser = "diode" // about 450 nm
	Fibre Laser = "fibre"
)

// Figure is a number with its source.
type Figure struct {
	Value  float64
	Source string
}

// Material is a sheet material.
type Material struct {
	Name     string // the name that the package uses: "cast acrylic"
	Asked    string // the name that was asked for
	Note     string // what was assumed when Asked could mean several; may be empty
	Density  Figure // kg/m3
	Brittle  bool   // no yielding saves a notched hole
	Grain    string // how parts may be turned when the job does not say: "none" or "half-turn"
	Edge     EdgeRule
	Friction string  // what runs on what
	Lasers   []Laser // that cut it in usual workshops
	Verdict  Verdict
	Cautions []string // plain sentences to show; may be empty
	Reason   string   // of a refusal, with its source

	tolerance tolerance
	web       webRule
	kerfs     []kerf
}

// RefusedError is the error of a material that must not go into a laser.
type RefusedError struct {
	Asked  string
	Name   string
	Reason string
}

func (e RefusedError) Error() string {
	name := e.Asked
	if !same(e.Asked, e.Name) {
		name += " (" + e.Name + ")"
	}
	return fmt.Sprintf("%s must not go into a laser: %s", name, e.Reason)
}
