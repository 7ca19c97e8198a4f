package assembly

import (
	"fmt"
	"math"
	"slices"

	"pinwright/parts"
	"pinwright/parts/hardware"
	"pinwright/parts/interference"
	"pinwright/parts/job"
	"pinwright/parts/linkage"
	"pinwright/parts/outline"
	"pinwright/parts/stack"
)

// Mounts says where the head of a mounting screw finds no room on the side of its plate that looks
// towards the links: plain sentences, in the order of the plates and holes. The job does not say from
// which side the screws come, so it is no fault as long as the heads go outside. Without a bolt in the
// mount there is nothing to say.
func Mounts(j job.Job, m *linkage.Mechanism, list []parts.Part, kits []stack.Kit, levels []stack.Level) ([]string, error) {
	if j.Frame == nil || j.Frame.Mount == nil || j.Frame.Mount.Bolt == "" {
		return nil, nil
	}
	screw, err := hardware.ScrewFor(hardware.Socket, j.Frame.Mount.Bolt)
	if err != nil {
		return nil, nil // no head of this size in the catalogue
	}
	space, err := interference.NewSpace(m)
	if err != nil {
		return nil, err
	}
	things := append(ofParts(j, list, levels), ofKits(kits)...)
	var out []string
	for _, plate := range j.Frame.Plates {
		i := slices.IndexFunc(things, func(t thing) bool { return t.part == plate.Name && t.Carrier == interference.OnGround })
		if i < 0 {
			continue
		}
		head := interference.Body{Name: "head", Low: things[i].Up, Up: things[i].Up + screw.HeadHeight}
		if plate.Plane > middlePlane(j) {
			head.Low, head.Up = things[i].Low-screw.HeadHeight, things[i].Low
		}
		for n, at := range j.Frame.Mount.At {
			head.Region = outline.Region{Outer: outline.Circle(at, screw.HeadDiameter/2)}
			worst, by, err := nearestTo(space, head, things, plate.Name)
			if err != nil {
				return nil, err
			}
			if worst.MM < stack.RunningGap {
				out = append(out, fmt.Sprintf("mount %d of %s: the head of %s finds no room on the side of the links (%s comes to %.2f mm at drive %.1f deg): put it in from outside, or countersink it",
					n+1, plate.Name, j.Frame.Mount.Bolt, by, math.Max(0, worst.MM), worst.Angle*180/math.Pi))
			}
		}
	}
	return out, nil
}

// middlePlane is the middle of the planes of the links.
func middlePlane(j job.Job) int {
	low, high := math.MaxInt, math.MinInt
	for _, l := range j.Links {
		low, high = min(low, l.Plane), max(high, l.Plane)
	}
	return (low + high) / 2
}

// nearestTo returns the smallest gap of a body to everything that shares its height, but the plate that
// it sits on.
func nearestTo(space *interference.Space, body interference.Body, things []thing, plate string) (interference.Gap, string, error) {
	best, by := interference.Gap{MM: interest}, ""
	for _, t := range things {
		if t.part == plate || t.Low >= body.Up+axial || body.Low >= t.Up+axial {
			continue
		}
		g, err := space.Smallest(body, t.Body, interference.Options{Accuracy: accuracy, Share: share, Limit: interest, Boxes: effort})
		if err != nil {
			return best, by, err
		}
		if g.MM < best.MM {
			best, by = g, t.Name
		}
	}
	return best, by, nil
}
