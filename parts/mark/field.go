package mark

import (
	"math"

	"pinwright/parts/outline"
)

// field is the signed distance from the cuts, positive in the material, on the nodes of a grid. The
// distance changes no faster than one walks, so a node bounds it for every place nearby: most places
// are ruled out by looking at one number.
type field struct {
	turn          outline.Transform // into the grid's frame
	low           outline.Point     // node 0, 0
	pitch         float64
	rows, columns int
	far           []float64
}

// newField lays a grid over the box (in the frame that turn leads to) so that one node is at middle.
func newField(box outline.Box, turn outline.Transform, middle outline.Point, pitch float64) field {
	left, right := math.Floor((middle.X-box.Min.X)/pitch), math.Floor((box.Max.X-middle.X)/pitch)
	down, up := math.Floor((middle.Y-box.Min.Y)/pitch), math.Floor((box.Max.Y-middle.Y)/pitch)
	f := field{
		turn:    turn,
		low:     outline.Point{X: middle.X - left*pitch, Y: middle.Y - down*pitch},
		pitch:   pitch,
		columns: int(left+right) + 1,
		rows:    int(down+up) + 1,
	}
	f.far = make([]float64, f.rows*f.columns)
	return f
}

func (f *field) node(row, column int) outline.Point {
	return outline.Point{X: f.low.X + float64(column)*f.pitch, Y: f.low.Y + float64(row)*f.pitch}
}

func (f *field) set(row, column int, far float64) { f.far[row*f.columns+column] = far }

// probe is a place about the middle of a text, in the frame of the field, and its least distance from
// the cuts.
type probe struct {
	way  outline.Point
	need float64
}

// allows is false if a probe about the place at is certain to come too near to a cut, by the nodes
// about it.
func (f *field) allows(at outline.Point, probes []probe) bool {
	for _, p := range probes {
		x, y := at.X+p.way.X, at.Y+p.way.Y
		column := max(0, min(f.columns-1, int((x-f.low.X)/f.pitch+0.5)))
		row := max(0, min(f.rows-1, int((y-f.low.Y)/f.pitch+0.5)))
		dx, dy := x-f.low.X-float64(column)*f.pitch, y-f.low.Y-float64(row)*f.pitch
		if short := p.need - f.far[row*f.columns+column]; short > 0 && short*short > dx*dx+dy*dy {
			return false
		}
	}
	return true
}
