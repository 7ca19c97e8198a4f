package hardware

import (
	"fmt"
	"math"
)

// RodEnd is a ball in an eye on a threaded shank, by which an arm may leave the plane.
type RodEnd struct {
	Bore     float64 // of the ball, mm
	Width    float64 // of the ball, face to face, mm
	Eye      float64 // width of the eye, mm
	Outside  float64 // diameter of the eye, mm
	BallFace float64 // diameter of the ball's face, mm
	Source   Source
}

func rodEndOf(r *row) RodEnd {
	return RodEnd{
		Bore: r.number("bore"), Width: r.number("width"), Eye: r.number("eye"),
		Outside: r.number("outside"), BallFace: r.number("ball_face"), Source: r.source(r.text("standard")),
	}
}

// RodEndFor gives the rod end whose ball a bolt of a diameter fills, ISO 12240-4 series K. The figures
// are from memory: measure what is bought.
func RodEndFor(diameter float64) (RodEnd, error) {
	c, err := read()
	if err != nil {
		return RodEnd{}, err
	}
	var sizes []string
	for _, row := range c.rodEnds {
		if row.Bore == diameter {
			return row, nil
		}
		sizes = append(sizes, fmt.Sprintf("%g", row.Bore))
	}
	return RodEnd{}, unknown("rod end for a bolt of", fmt.Sprintf("%g", diameter), sizes)
}

// Designation writes the rod end so that any shop knows it: "rod end, bore 5 mm".
func (e RodEnd) Designation() string { return fmt.Sprintf("rod end, bore %g mm", e.Bore) }

// Tilt is how far the eye turns out of square before it touches the rim of a washer of a diameter beside
// the ball, radians: the rim, washer/2 out and half a ball from the middle, lies on the eye's face, which
// is half an eye from the middle, when ball/2 cos a - washer/2 sin a = eye/2.
func (e RodEnd) Tilt(washer float64) float64 {
	rim := math.Hypot(washer, e.Width)
	return math.Acos(min(1, e.Eye/rim)) - math.Atan2(washer, e.Width)
}

// Mass estimates the mass of a rod end without its shank, g: eye and ball as one solid.
func (e RodEnd) Mass() float64 {
	return Steel * (cylinder(e.Outside, e.Eye) - cylinder(e.Bore, e.Eye))
}
