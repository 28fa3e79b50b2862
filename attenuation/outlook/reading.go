package outlook

import (
	"math"

	"gylebook/attenuation/curve"
	"gylebook/attenuation/journal"
	"gylebook/gravity"
)

// gasPoints is what a sample that was not degassed may read too high, as a standard
// uncertainty in points (judged, no source: bubbles on the glass lift it).
const gasPoints = 1.0

// readingOf turns a corrected value into points, with the uncertainty of its budget
// and the division of the instrument. What is not known is 0. Where one instrument
// read the whole course, what is common to all its readings is left out: it shifts
// them together, and a fall and the last reading are not less sure for it.
func readingOf(one *journal.Value, hours float64, alone bool) curve.Reading {
	r := curve.Reading{Hours: hours, Points: points(one.SG)}
	per := perScale(one)
	own := 0.0
	for _, part := range one.Result.Budget.Parts {
		if part.Name == "reading" {
			r.Division = 2 * part.HalfWidth * per
		}
		if !part.Common {
			own = math.Hypot(own, part.U)
		}
	}
	r.U = one.Result.Budget.Standard * per
	if alone {
		r.U = own * per
	}
	if one.Source.Gassy {
		r.U = math.Hypot(r.U, gasPoints)
	}
	return r
}

// points is an SG in points.
func points(sg gravity.SG) float64 { return 1000 * (float64(sg) - 1) }

// perScale is how many points one unit of the instrument's scale makes around a
// value, 0 when that is not known.
func perScale(one *journal.Value) float64 {
	const least = 0.05 // of the scale, to both sides
	scale := one.Typed.Scale
	if scale == gravity.ScaleSG {
		return 1000
	}
	convert := gravity.NewConverter()
	low, errLo := convert.Convert(scale, one.Result.Corrected-least, gravity.Pair2020)
	high, errHi := convert.Convert(scale, one.Result.Corrected+least, gravity.Pair2020)
	if errLo != nil || errHi != nil {
		return 0
	}
	lo, hi := low.SG, high.SG
	// An instrument with two scales is corrected on its own, which need not be the
	// one that was typed.
	if here := (points(lo) + points(hi)) / 2; !(math.Abs(here-points(one.Result.SG)) < 3) {
		return 0
	}
	return math.Abs(points(hi)-points(lo)) / (2 * least)
}
