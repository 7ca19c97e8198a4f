package linkage

import (
	"math"
	"sort"
)

// ToggleKind says what happens at a toggle.
type ToggleKind string

// The kinds of toggle.
const (
	// DeadEnd is an end of the drive at which a dyad lies in line: the drive can go no further.
	DeadEnd ToggleKind = "dead end"
	// Flip is a change point: a dyad passes through being in line and could leave to either side.
	Flip ToggleKind = "change point"
	// Tight is a dyad that comes within nearLine of being in line: it takes large forces there, and
	// play in the pins may let it jam.
	Tight ToggleKind = "nearly in line"
	// Reversal is a rocker's end of swing: the drive moves it with great force and little speed.
	Reversal ToggleKind = "reversal"
)

// nearLine is the transmission angle from 0 or 180 degrees below which a dyad is reported as nearly
// in line: 10 degrees, a judgement (handbooks ask for 40 to 45 for machines that carry load).
const nearLine = 10 * math.Pi / 180

// Toggle is a place in the drive where links come in line.
type Toggle struct {
	Kind  ToggleKind
	Angle float64  // of the drive, radians
	Joint string   // of the dyad; for a reversal the rocker's ground pin
	Links []string // the links in line, or the rocker
	Off   float64  // by how much the dyad is off being in line, radians; 0 for a reversal
}

// Toggles returns the dead ends, change points, tight places and reversals of the cycle, sorted by
// drive angle in the direction of the drive.
func (c *Cycle) Toggles() []Toggle {
	var out []Toggle
	for _, x := range c.Changes {
		out = append(out, Toggle{Kind: Flip, Angle: x.Angle, Joint: x.Joint, Links: x.Links[:]})
	}
	for _, t := range c.Transmissions() {
		for _, e := range [2]struct{ at, off float64 }{{t.MinAt, t.Min}, {t.MaxAt, math.Pi - t.Max}} {
			if e.off >= nearLine {
				continue
			}
			kind := Tight
			if !c.Full && e.off < 1e-4 && (e.at == c.angleAt(0) || e.at == c.angleAt(c.Steps)) {
				kind = DeadEnd
			}
			flip := false
			for _, x := range c.Changes {
				flip = flip || x.Joint == t.Joint && math.Abs(x.Angle-e.at) < 1e-5
			}
			if !flip {
				out = append(out, Toggle{Kind: kind, Angle: e.at, Joint: t.Joint, Links: t.Links[:], Off: e.off})
			}
		}
	}
	p := c.probe()
	for k, pins := range c.m.pins {
		if k == c.m.drive {
			continue
		}
		for i, o := range pins {
			if !c.m.isGround[o] {
				continue
			}
			far := pins[(i+1)%len(pins)]
			turn := func(f *frame) float64 { return cross(sub(f.p[far], f.p[o]), f.v[far]) }
			for _, r := range p.roots(turn) {
				if math.Abs(turn(p.at(r.step, r.angle))) > 1e-3 { // a jump, not a zero
					continue
				}
				out = append(out, Toggle{Kind: Reversal, Angle: r.angle, Joint: c.m.jointNames[o], Links: c.m.linkNames([]int{k})})
			}
		}
	}
	back := c.angleAt(c.Steps) < c.angleAt(0)
	sort.SliceStable(out, func(i, j int) bool {
		if back {
			return out[i].Angle > out[j].Angle
		}
		return out[i].Angle < out[j].Angle
	})
	return out
}
