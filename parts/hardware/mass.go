package hardware

import "math"

// Steel is the density by which masses are estimated, g/mm3 (EN 10025-2: 7850 kg/m3).
const Steel = 7.85e-3

// bearingFill is the part of a ball bearing's envelope that is steel: 624, 608 and 6000 weigh 3.1,
// 12 and 19 g by makers' lists (from memory), 0.66 to 0.72 of their envelopes.
const bearingFill = 0.68

// Mass estimates the mass of a screw, g: shank at the nominal diameter, thread at the mean of its
// crest and root, head as the solid of revolution or hexagon less the socket. Within some 10 % of the
// makers' lists.
func (s Screw) Mass(length float64) float64 {
	threaded := length - s.Grip(length)
	root := s.Diameter - 1.0825*s.Pitch // inner diameter of the basic profile, ISO 68-1
	v := cylinder(s.Diameter, length-threaded) + cylinder((s.Diameter+root)/2, threaded)
	switch s.Head {
	case Hexagon:
		v += hexagon(s.Drive, s.HeadHeight)
	case Button: // between the cylinder and the cone
		v += 0.6*cylinder(s.HeadDiameter, s.HeadHeight) - hexagon(s.Drive, 0.5*s.HeadHeight)
	default:
		v += cylinder(s.HeadDiameter, s.HeadHeight) - hexagon(s.Drive, 0.5*s.HeadHeight)
	}
	return Steel * v
}

// Mass estimates the mass of a nut, g, the insert taken as steel.
func (n Nut) Mass() float64 {
	inner := n.threadDiameter()
	return Steel * (hexagon(n.Across, n.Height) - cylinder(inner, n.Height))
}

func (n Nut) threadDiameter() float64 {
	d, err := BoltDiameter(n.Size)
	if err != nil {
		return 0
	}
	return d - 0.5413*n.Pitch // half way between root and crest
}

// Mass gives the mass of a steel washer, g.
func (w Washer) Mass() float64 {
	return Steel * (cylinder(w.Outside, w.Thickness) - cylinder(w.Bore, w.Thickness))
}

// Mass estimates the mass of a bearing, g.
func (b Bearing) Mass() float64 {
	return Steel * bearingFill * (cylinder(b.Outside, b.Width) - cylinder(b.Bore, b.Width))
}

// Mass gives the mass of a steel collar, g, its screw hole taken as full.
func (c Collar) Mass() float64 {
	return Steel * (cylinder(c.Outside, c.Width) - cylinder(c.Bore, c.Width))
}

// Aluminium is the density by which the masses of spacers and sleeves are estimated, g/mm3 (the usual
// alloys have 2.7 g/cm3; from memory).
const Aluminium = 2.70e-3

// TubeMass gives the mass of a piece of aluminium tube, g.
func TubeMass(bore, outside, length float64) float64 {
	return Aluminium * (cylinder(outside, length) - cylinder(bore, length))
}

// ShaftMass gives the mass of a plain steel shaft, g.
func ShaftMass(diameter, length float64) float64 { return Steel * cylinder(diameter, length) }

func cylinder(diameter, height float64) float64 { return math.Pi / 4 * diameter * diameter * height }

// hexagon is the volume of a regular hexagonal prism: area sqrt(3)/2 s^2 over its width s.
func hexagon(across, height float64) float64 { return math.Sqrt(3) / 2 * across * across * height }
