package dxf

import (
	"fmt"
	"io"

	"pinwright/export"
	"pinwright/parts/outline"
)

// Write writes a sheet as a complete drawing, the entities in the order of its steps.
//
// A sheet that fails its Check, and a colour outside 1 to 255, is an error, and then nothing is written. $EXTMIN and $EXTMAX are the exact bounds of what is drawn, or
// of the sheet when nothing is.
func Write(w io.Writer, s export.Sheet, opt Options) error {
	layers, err := layersOf(opt)
	if err != nil {
		return fmt.Errorf("drawing %s: %w", s.Name, err)
	}
	if err := s.Check(); err != nil {
		return err
	}

	edge := outline.Rectangle(outline.Point{}, outline.Point{X: s.Width, Y: s.Height})
	var body tags
	box := outline.EmptyBox()
	handle := hFirstEntity
	if opt.SheetEdge {
		body.polyline(handle, LayerEdge, edge, true)
		handle++
		box = edge.Bounds()
	}
	for _, step := range s.Steps {
		box = box.Union(body.step(handle, step))
		handle++
	}
	if box.Empty() {
		box = edge.Bounds()
	}

	f := frame{
		width: s.Width, height: s.Height,
		min: [2]float64{box.Min.X, box.Min.Y}, max: [2]float64{box.Max.X, box.Max.Y},
		handSeed: handle, layers: layers,
	}
	var t tags
	t.header(f)
	t.tables(f)
	t.blocks()
	t.str(0, "SECTION")
	t.str(2, "ENTITIES")
	t.buf = append(t.buf, body.buf...)
	t.str(0, "ENDSEC")
	t.objects(f)
	t.str(0, "EOF")
	if t.bad || body.bad {
		return fmt.Errorf("drawing %s: a coordinate is not a number, or beyond %g mm", s.Name, maxCoordinate)
	}
	if _, err := w.Write(t.buf); err != nil {
		return fmt.Errorf("drawing %s: %w", s.Name, err)
	}
	return nil
}

// step writes the entity of one step and returns its bounds.
func (t *tags) step(handle int, s export.Step) outline.Box {
	name := LayerOf(s.Op)
	if s.Op == export.Engrave {
		t.stroke(handle, name, s.Open)
		return s.Open.Bounds()
	}
	if centre, radius, ok := s.Closed.AsCircle(); ok {
		t.entity("CIRCLE", handle, name, "AcDbCircle")
		t.point3(10, centre.X, centre.Y, 0)
		t.num(40, radius)
	} else {
		t.polyline(handle, name, s.Closed, true)
	}
	return s.Closed.Bounds()
}

// stroke writes an open path: a LINE when it is one, else a polyline.
func (t *tags) stroke(handle int, layer string, p outline.Path) {
	if len(p) == 2 && p[0].Bulge == 0 {
		t.entity("LINE", handle, layer, "AcDbLine")
		t.point3(10, p[0].X, p[0].Y, 0)
		t.point3(11, p[1].X, p[1].Y, 0)
		return
	}
	t.polyline(handle, layer, p, false)
}

// polyline writes an LWPOLYLINE. The bulge of the last vertex of an open one has no meaning and is
// left out.
func (t *tags) polyline(handle int, layer string, vertices []outline.Vertex, closed bool) {
	t.entity("LWPOLYLINE", handle, layer, "AcDbPolyline")
	t.int(90, len(vertices))
	if closed {
		t.int(70, 1)
	} else {
		t.int(70, 0)
	}
	for i, v := range vertices {
		t.point(10, v.X, v.Y)
		if v.Bulge != 0 && (closed || i+1 < len(vertices)) {
			t.num(42, v.Bulge)
		}
	}
}

func (t *tags) entity(kind string, handle int, layer, class string) {
	t.str(0, kind)
	t.handle(5, handle)
	t.handle(330, hModelRecord)
	t.str(100, "AcDbEntity")
	t.str(8, layer)
	t.str(100, class)
}

func layersOf(opt Options) ([]layer, error) {
	colour := func(asked, usual int) int {
		if asked == 0 {
			return usual
		}
		return asked
	}
	layers := []layer{
		{hLayerZero, 7, "0", true},
		{hLayerEngrave, colour(opt.Engrave, DefaultEngrave), LayerEngrave, true},
		{hLayerInside, colour(opt.Inside, DefaultInside), LayerInside, true},
		{hLayerOutside, colour(opt.Outside, DefaultOutside), LayerOutside, true},
		{hLayerEdge, colour(opt.Edge, DefaultEdge), LayerEdge, false},
	}
	for _, l := range layers {
		if l.colour < 1 || l.colour > 255 {
			return nil, fmt.Errorf("colour %d of layer %s is outside 1 to 255", l.colour, l.name)
		}
	}
	return layers, nil
}
