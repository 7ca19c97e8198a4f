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

// Tilt is how far the eye turns out of square before it touches a washer of a diameter beside the ball,
// radians: the face of the eye, half an eye from its middle, tilted by a, stands
// eye/2 cos a + washer/2 sin a off the middle at the washer's rim, which is half the ball away.
func (e RodEnd) Tilt(washer float64) float64 {
	rim, half := washer/2, e.Eye/2
	if rim <= 0 {
		return math.Pi / 2
	}
	return math.Asin(min(1, e.Width/2/math.Hypot(rim, half))) - math.Atan2(half, rim)
}

// Mass estimates the mass of a rod end without its shank, g: eye and ball as one solid.
func (e RodEnd) Mass() float64 {
	return Steel * (cylinder(e.Outside, e.Eye) - cylinder(e.Bore, e.Eye))
}
