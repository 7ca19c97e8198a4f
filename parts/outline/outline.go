// Package outline is the one geometry of Pinwright: closed contours of straight lines and circular
// arcs, kept exact.
//
// Lengths are millimetres, angles radians, positive counter-clockwise. An outer outline runs
// counter-clockwise, a hole clockwise. Nothing is flattened except by Flatten, and then to the side
// that the caller asks for.
package outline

// Point is a place or a direction in the plane, mm.
type Point struct{ X, Y float64 }

// Vertex is a corner of an outline or path and the shape of the segment that leaves it.
//
// Bulge is the tangent of a quarter of the sweep of the arc to the next vertex, positive
// counter-clockwise, as DXF defines it: 0 is a straight line, 1 a half circle.
type Vertex struct {
	Point
	Bulge float64
}

// Outline is a closed contour; its last vertex joins the first. A full circle is two vertices with
// bulge 1 (or -1). The zero value is the empty outline.
type Outline []Vertex

// Path is an open run of lines and arcs (an engraved stroke); the bulge of its last vertex is
// ignored.
type Path []Vertex

// Region is a bounded piece of the plane: Outer counter-clockwise, Holes clockwise, none of them
// touching another.
type Region struct {
	Outer Outline
	Holes []Outline
}

// Box is an axis-parallel rectangle, Min to Max inclusive. An empty set has Min > Max.
type Box struct{ Min, Max Point }

// Side says to which side of the true curve a flattened one may stray.
type Side int

// The sides for Flatten.
const (
	// Inscribed puts the chords' ends on the curve, so chords of a convex arc lie inside it.
	Inscribed Side = iota
	// Within keeps the polygon inside the outline everywhere: convex arcs by chords, concave arcs
	// by tangents.
	Within
	// Around keeps the outline inside the polygon everywhere: convex arcs by tangents, concave
	// arcs by chords.
	Around
)

// Location is where a point lies with regard to an outline or region.
type Location int

// The locations.
const (
	Outside Location = iota
	OnEdge
	Inside
)

// Disc is a filled circle, the building block of hulls and bars.
type Disc struct {
	Centre Point
	Radius float64
}

// Moments holds the area measures of a region.
type Moments struct {
	Area     float64 // mm2, positive for a region
	Centroid Point   // mm
	Ixx      float64 // second moment about the axis through the centroid parallel to x, mm4
	Iyy      float64 // the same for y, mm4
	Ixy      float64 // product of inertia about the centroid, mm4
}

// Nearest is the shortest way between two shapes.
type Nearest struct {
	Distance float64 // mm; 0 when they touch or overlap
	A, B     Point   // the ends of the shortest way, A on the first shape, B on the second
}
