package hardware

import "slices"

// tight are the fits that hold a ready-made shaft fast: the words and the hole classes.
var tight = []string{"push", "press", "K7", "M7", "N7", "P7"}

// Tight tells whether a shaft's hole holds what it goes through. An explicit clearance, mm, overrides
// the fit; none or less holds.
func Tight(fit string, clearance *float64) bool {
	if clearance != nil {
		return *clearance <= 0
	}
	return slices.Contains(tight, fit)
}

// PlateFit is the fit of a shaft in a plate of the frame: as asked for, but running where that would
// hold the shaft. The link that is fast on the shaft turns with it, so the frame must let it turn; were
// both tight, the mechanism would lock.
func PlateFit(fit string, clearance *float64) (string, *float64) {
	if Tight(fit, clearance) {
		return "running", nil
	}
	return fit, clearance
}
