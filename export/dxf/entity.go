package dxf

import (
	"fmt"
	"math"

	"pinwright/parts/outline"
)

// raw is the figures of one entity as they are met, before they are made a contour.
type raw struct {
	kind   string
	layer  string
	line   int
	colour int
	why    string // set when the entity is not one of ours after all

	closed   bool
	count    int // stated number of vertices, -1 when not stated
	vertices []outline.Vertex
	open     bool // a vertex has its x but not its y yet

	have  map[int]float64 // 10 20 11 21 40 50 51 of lines, arcs and circles
	flags int
}

// entities reads the section of what is drawn.
func (s *scanner) entities(d *Drawing) error {
	vertices := 0
	for {
		p, err := s.next()
		if err != nil {
			return err
		}
		if p.code != 0 {
			return s.fail(p.line, "group code %d where an entity should begin", p.code)
		}
		switch p.value {
		case "ENDSEC":
			return nil
		case "SECTION", "EOF":
			return s.fail(p.line+1, "the entities do not end before %s", p.value)
		case "VERTEX", "SEQEND":
			return s.fail(p.line+1, "%s outside a POLYLINE", p.value)
		}
		e, err := s.entity(p)
		if err != nil {
			return err
		}
		if p.value == "POLYLINE" {
			if err := s.heavy(e); err != nil {
				return err
			}
		}
		if vertices += len(e.vertices); vertices > maxVertices {
			return s.fail(p.line, "more than %d vertices", maxVertices)
		}
		if e.why != "" {
			if err := s.other(d, Other{Type: e.kind, Layer: e.layer, Why: e.why, Line: e.line}); err != nil {
				return err
			}
			continue
		}
		if len(d.Others)+len(d.Entities) >= maxEntities {
			return s.fail(p.line, "more than %d entities", maxEntities)
		}
		contour, err := s.contour(e)
		if err != nil {
			return err
		}
		d.Entities = append(d.Entities, contour)
	}
}

// entity reads the pairs of one entity up to the next 0.
func (s *scanner) entity(start pair) (*raw, error) {
	e := &raw{kind: start.value, line: start.line, colour: 256, count: -1, have: map[int]float64{}}
	switch e.kind {
	case "LINE", "ARC", "CIRCLE", "LWPOLYLINE", "POLYLINE", "VERTEX", "SEQEND":
	default:
		e.why = "not a line, arc, circle or polyline"
	}
	group := false // between 102 { and 102 }
	for {
		p, err := s.next()
		if err != nil {
			return nil, err
		}
		switch {
		case p.code == 0:
			s.back(p)
			if group {
				return nil, s.fail(p.line, "the %s of line %d has an unfinished group", e.kind, e.line)
			}
			return e, nil
		case p.code == 102:
			group = len(p.value) > 0 && p.value[0] == '{'
		case group || p.code >= 1000:
			// Remarks of other programs.
		case p.code == 8:
			e.layer = p.value
		case p.code == 62:
			if e.colour, err = s.integer(p); err != nil {
				return nil, err
			}
		case p.code == 67:
			n, err := s.integer(p)
			if err != nil {
				return nil, err
			}
			if n != 0 {
				e.refuse("on the paper, not in the model")
			}
		case p.code == 60:
			n, err := s.integer(p)
			if err != nil {
				return nil, err
			}
			if n != 0 {
				e.refuse("invisible")
			}
		case e.why != "" || common(p.code):
		default:
			if err := s.figure(e, p); err != nil {
				return nil, err
			}
		}
	}
}

// common says whether a group code may stand in any entity and has no bearing on its contour: handle,
// owner, subclass, line type and its scale, colours, weights, plot style, layout, material.
func common(code int) bool {
	switch code {
	case 5, 6, 48, 92, 100, 160, 284, 310, 330, 347, 348, 360, 370, 390, 410, 420, 430, 440:
		return true
	}
	return false
}

func (e *raw) refuse(why string) {
	if e.why == "" {
		e.why = why
	}
}

// figure takes a number that belongs to the shape of an entity.
func (s *scanner) figure(e *raw, p pair) error {
	once := func() error {
		if _, twice := e.have[p.code]; twice {
			return s.fail(p.line, "group code %d twice in the %s of line %d", p.code, e.kind, e.line)
		}
		v, err := s.coordinate(p)
		e.have[p.code] = v
		return err
	}
	flat := func(want float64, why string) error {
		v, err := s.number(p)
		if err == nil && v != want {
			e.refuse(why)
		}
		return err
	}

	switch p.code { // the same for all
	case 39:
		return flat(0, "has a thickness")
	case 38:
		return flat(0, "lies above or below the plane of the sheet")
	case 30, 31:
		return flat(0, "leaves the plane of the sheet")
	case 210, 220:
		return flat(0, "is turned out of the plane of the sheet")
	case 230:
		return flat(1, "lies on its back (extrusion)")
	}

	switch e.kind {
	case "LINE":
		if p.code == 10 || p.code == 20 || p.code == 11 || p.code == 21 {
			return once()
		}
	case "CIRCLE":
		if p.code == 10 || p.code == 20 || p.code == 40 {
			return once()
		}
	case "ARC":
		if p.code == 10 || p.code == 20 || p.code == 40 || p.code == 50 || p.code == 51 {
			return once()
		}
	case "LWPOLYLINE":
		return s.lightVertex(e, p)
	case "POLYLINE":
		switch p.code {
		case 66, 10, 20, 71, 72, 73, 74, 75:
			return nil // entities follow; a dummy point; counts of meshes
		case 40, 41:
			return flat(0, "has a width")
		case 70:
			return s.flags(e, p)
		}
	case "VERTEX":
		switch p.code {
		case 10, 20, 42:
			return once()
		case 40, 41:
			return flat(0, "has a width")
		case 50, 91:
			return nil // tangent of a fitted curve, identifier
		case 70:
			return s.flags(e, p)
		}
	case "SEQEND":
		return nil
	}
	return s.fail(p.line, "group code %d does not belong in a %s", p.code, e.kind)
}

// lightVertex takes a figure of an LWPOLYLINE, whose vertices follow one another as 10, 20 and an
// optional 42.
func (s *scanner) lightVertex(e *raw, p pair) error {
	last := len(e.vertices) - 1
	switch p.code {
	case 90:
		n, err := s.integer(p)
		if err == nil && (n < 0 || n > maxVertices) {
			return s.fail(p.line+1, "%d vertices", n)
		}
		e.count = n
		return err
	case 70:
		return s.flags(e, p)
	case 10:
		v, err := s.coordinate(p)
		if e.open {
			return s.fail(p.line, "a vertex without its y")
		}
		if len(e.vertices) >= maxVertices {
			return s.fail(p.line, "more than %d vertices", maxVertices)
		}
		e.open = true
		e.vertices = append(e.vertices, outline.Vertex{Point: outline.Point{X: v}})
		return err
	case 20:
		v, err := s.coordinate(p)
		if !e.open {
			return s.fail(p.line, "a y without its x")
		}
		e.open = false
		e.vertices[last].Y = v
		return err
	case 42:
		v, err := s.coordinate(p)
		if last < 0 {
			return s.fail(p.line, "a bulge before the first vertex")
		}
		e.vertices[last].Bulge = v
		return err
	case 40, 41, 43:
		v, err := s.number(p)
		if err == nil && v != 0 {
			e.refuse("has a width")
		}
		return err
	case 91:
		return nil // identifier of a vertex
	}
	return s.fail(p.line, "group code %d does not belong in an LWPOLYLINE", p.code)
}

func (s *scanner) flags(e *raw, p pair) error {
	n, err := s.integer(p)
	e.flags = n
	e.closed = n&1 != 0
	return err
}

// heavy reads the vertices of an old-style POLYLINE, to its SEQEND.
func (s *scanner) heavy(e *raw) error {
	if e.flags&^(1|128) != 0 { // 128 is how line types run round corners
		e.refuse("a fitted curve, a mesh or a polyline in space")
	}
	for {
		p, err := s.next()
		if err != nil {
			return err
		}
		if p.code != 0 || (p.value != "VERTEX" && p.value != "SEQEND") {
			return s.fail(p.line+1, "the POLYLINE of line %d has no SEQEND", e.line)
		}
		v, err := s.entity(p)
		if err != nil {
			return err
		}
		if p.value == "SEQEND" {
			return nil
		}
		if v.why != "" {
			e.refuse(v.why)
		}
		if len(e.vertices) >= maxVertices {
			return s.fail(p.line, "more than %d vertices", maxVertices)
		}
		if err := s.need(v, 10, 20); err != nil {
			return err
		}
		e.vertices = append(e.vertices, outline.Vertex{
			Point: outline.Point{X: v.have[10], Y: v.have[20]}, Bulge: v.have[42],
		})
	}
}

// need makes sure that an entity has the figures it cannot do without.
func (s *scanner) need(e *raw, codes ...int) error {
	for _, c := range codes {
		if _, ok := e.have[c]; !ok && e.why == "" {
			return s.fail(e.line, "a %s without group code %d", e.kind, c)
		}
	}
	return nil
}

// contour makes an entity's figures a closed outline or an open path.
func (s *scanner) contour(e *raw) (Entity, error) {
	out := Entity{Type: e.kind, Layer: e.layer, Colour: e.colour, Line: e.line}
	if e.layer == "" {
		return out, s.fail(e.line, "a %s without a layer", e.kind)
	}
	centre := outline.Point{X: e.have[10], Y: e.have[20]}
	switch e.kind {
	case "LINE":
		if err := s.need(e, 10, 20, 11, 21); err != nil {
			return out, err
		}
		out.Open = outline.Path{{Point: centre}, {Point: outline.Point{X: e.have[11], Y: e.have[21]}}}
	case "CIRCLE":
		if err := s.need(e, 10, 20, 40); err != nil {
			return out, err
		}
		if !(e.have[40] > 0) {
			return out, s.fail(e.line, "a circle of radius %g", e.have[40])
		}
		disc := outline.Disc{Centre: centre, Radius: e.have[40]}
		out.Circle = &disc
		out.Closed = outline.Circle(disc.Centre, disc.Radius)
	case "ARC":
		if err := s.need(e, 10, 20, 40, 50, 51); err != nil {
			return out, err
		}
		if !(e.have[40] > 0) {
			return out, s.fail(e.line, "an arc of radius %g", e.have[40])
		}
		start := math.Mod(e.have[50], 360)
		sweep := math.Mod(e.have[51]-e.have[50], 360)
		if sweep <= 0 {
			sweep += 360
		}
		const degree = math.Pi / 180
		out.Open = outline.Arc(centre, e.have[40], start*degree, (start+sweep)*degree)
	default:
		if e.open {
			return out, s.fail(e.line, "the last vertex of the %s has no y", e.kind)
		}
		if e.count >= 0 && e.count != len(e.vertices) {
			return out, s.fail(e.line, "the %s says it has %d vertices and has %d", e.kind, e.count, len(e.vertices))
		}
		if len(e.vertices) < 2 {
			return out, s.fail(e.line, "%s of %d vertices", article(e.kind), len(e.vertices))
		}
		if e.closed {
			out.Closed = e.vertices
		} else {
			out.Open = e.vertices
		}
	}
	return out, nil
}

func article(kind string) string {
	if kind == "LWPOLYLINE" {
		return "an " + kind
	}
	return fmt.Sprintf("a %s", kind)
}
