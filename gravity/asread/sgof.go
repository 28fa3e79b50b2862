package asread

import "gylebook/gravity"

// sgOf returns the specific gravity of a value on °P, °Bx or points, by the
// default fit. It reports false for other scales and where the default fit was
// not made: a proposal then stands without the comparison.
func sgOf(v float64, s gravity.Scale) (gravity.SG, bool) {
	switch {
	case s == gravity.ScalePoints:
		return gravity.Points(v).SG(), true
	case s.IsMass():
		fit := gravity.Fits.Default()
		sg, err := fit.Fn.SG(gravity.Plato(v))
		return sg, err == nil && len(gravity.FitNotes(fit, sg)) == 0
	}
	return 0, false
}
