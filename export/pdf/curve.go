package pdf

import (
	"bytes"
	"math"

	"pinwright/export"
	"pinwright/parts/outline"
)

// curveError is how far a drawn curve may be from the true arc, mm. A hundred times less than is
// promised, so that it adds nothing to the rounding of coordinates; it costs one piece more on the
// way round a large circle.
const curveError = 1e-5

// run writes path operators for a run: arcs as Bezier cubics within curveError.
//
// The cubic for an arc of sweep t has its handles along the end tangents, 4/3 tan(t/4) radii long. With
// the bulge b = tan(t/4) and the chord c the handle is (1+b2)/3 chords long and turned from the chord
// by t/2, which needs no angle:
//
//	handle at the start = ((1-b2) c - 2b left(c)) / 3
//
// It strays outwards by at most 2/27 sin(t/4)^6 / cos(t/4)^2 radii (0.00027 for a quarter turn, the
// textbook's figure), which is c b^5 / (54 (1+b2)); the tests measure it.
func run(b *bytes.Buffer, segments []outline.Segment, closed bool) {
	pieces := export.Split(segments, func(s outline.Segment) bool {
		k := math.Abs(s.Bulge)
		return k <= eighthTurn && s.A.Dist(s.B)*math.Pow(k, 5)/(54*(1+k*k)) <= curveError
	})
	if len(pieces) == 0 {
		return
	}
	point(b, pieces[0].A)
	b.WriteString("m\n")
	for i, s := range pieces {
		if s.IsLine() {
			if !closed || i+1 < len(pieces) {
				point(b, s.B)
				b.WriteString("l\n")
			}
			continue
		}
		c := s.B.Sub(s.A)
		along, across := c.Scale((1-s.Bulge*s.Bulge)/3), c.Left().Scale(2*s.Bulge/3)
		point(b, s.A.Add(along).Sub(across))
		point(b, s.B.Sub(along).Sub(across))
		point(b, s.B)
		b.WriteString("c\n")
	}
	if closed {
		b.WriteString("h\n")
	}
}

// eighthTurn is the largest bulge of one cubic, tan(pi/16): 45 degrees.
const eighthTurn = 0.19891236737965800

func point(b *bytes.Buffer, p outline.Point) {
	b.WriteString(num(p.X, 6))
	b.WriteByte(' ')
	b.WriteString(num(p.Y, 6))
	b.WriteByte(' ')
}
