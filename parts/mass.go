package parts

// Mass returns the mass of the part in grams, for a sheet of this thickness (mm, as measured) and
// density (kg/m3). Its centroid and second moments are those of Region.Moments.
func (p Part) Mass(thickness, density float64) float64 {
	return p.Region.Area() * thickness * density * 1e-6
}
