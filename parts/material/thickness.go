package material

// tolerance gives how far a sheet may be under and over its nominal thickness, both as positive mm.
type tolerance struct {
	of     func(nominal float64) (under, over float64)
	source string
}

// Thickness gives the thinnest and the thickest that a sheet of a nominal thickness may be, mm, and
// where that comes from. The thinnest is never under 0.
func (m Material) Thickness(nominal float64) (least, most float64, source string) {
	if m.tolerance.of == nil {
		return nominal, nominal, "not known"
	}
	under, over := m.tolerance.of(nominal)
	return max(0, nominal-under), nominal + over, m.tolerance.source
}

var (
	castAcrylic = tolerance{
		func(t float64) (float64, float64) { return 0.4 + 0.1*t, 0.4 + 0.1*t },
		"ISO 7823-1: +-(0.4 + 0.1 t); published data sheets and handbooks, 2+ places",
	}
	extrudedAcrylic = tolerance{
		func(t float64) (float64, float64) {
			if t < 3 {
				return 0.1 * t, 0.1 * t // 1 place
			}
			return 0.05 * t, 0.05 * t // 2+ places
		},
		"ISO 7823-2: +-10 % under 3 mm, +-5 % from 3 mm; published data sheets and handbooks",
	}
	// Over 12 mm the formula is carried on: a judgement.
	plywood = tolerance{
		func(t float64) (float64, float64) {
			if t <= 3 {
				return 0.2, 0.2 // ISO 1954, from a garbled copy; 1 place
			}
			return 0.4 + 0.03*t, 0.2 + 0.03*t
		},
		"EN 315, sanded: -(0.4 + 0.03 t) +(0.2 + 0.03 t) over 3 mm; published data sheets and handbooks, 2+ places, one public table disagrees",
	}
	mdf = tolerance{
		func(float64) (float64, float64) { return 0.2, 0.2 },
		"EN 324-1, sanded: +-0.2; published data sheets and handbooks, 1 place",
	}
	pom = tolerance{
		func(float64) (float64, float64) { return 0, 0.7 },
		"EN 15860: +0.2 to +0.7, plus only; from memory",
	}
	tenPercent = tolerance{
		func(t float64) (float64, float64) { return 0.1 * t, 0.1 * t },
		"+-10 %; common practice, no source",
	}
)
