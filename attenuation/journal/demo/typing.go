package demo

import (
	"fmt"
	"math"
	"math/rand/v2"

	"gylebook/gravity"
	"gylebook/tempcorr"
)

// shown returns what h shows in a liquid of original extract oe [% mass] and SG
// 20/20 sg at t: the reading that its correction leads back to sg.
func shown(h tempcorr.Hydrometer, sg gravity.SG, t gravity.Celsius, oe gravity.Plato) (float64, error) {
	r, perSG := float64(sg), 1.0
	if h.Scale.IsMass() {
		fit := gravity.Fits.Default().Fn
		r, perSG = float64(fit.Extract(sg)), 1000*float64(fit.Extract(sg+0.001)-fit.Extract(sg))
	}
	for range 50 {
		res, err := tempcorr.Correct(h, tempcorr.Observation{Reading: r, Step: division, T: t, OE: oe})
		if err != nil {
			return 0, err
		}
		off := float64(sg - res.SG)
		if math.Abs(off) < 1e-9 {
			return r, nil
		}
		// The correction changes slowly with the reading, so the slope of the scale
		// serves for the slope of the whole.
		r += off * perSG
	}
	return 0, fmt.Errorf("no reading of %s gives SG %.4f at %.1f °C", h.ID, float64(sg), float64(t))
}

// typed rounds a reading to what h lets the eye tell and types it the way the
// operator does.
func typed(h tempcorr.Hydrometer, r float64, operator string, rng *rand.Rand) string {
	if h.Scale.IsMass() {
		text := fmt.Sprintf("%.1f", onto(r, 10))
		if operator == "tomas" {
			return text // the instrument's scale is known
		}
		return text + "P"
	}
	thousandths := int(math.Round(1000 * r))
	switch operator {
	case "tomas":
		return fmt.Sprint(thousandths) // 1048
	case "ines": // between the marks
		return fmt.Sprintf("%.4f", onto(r, 2000))
	}
	// A whole number stands for points when it is 2 or more.
	if points := thousandths - 1000; points >= 2 && rng.IntN(6) == 0 {
		return fmt.Sprint(points)
	}
	return fmt.Sprintf("%.3f", float64(thousandths)/1000)
}

// onto rounds x to a whole number of nths, never to a negative zero.
func onto(x, n float64) float64 { return math.Round(x*n)/n + 0 }

// temperature types t [°C] the way the operator does; a bare number is °C.
func temperature(t float64, operator string) string {
	switch operator {
	case "tomas":
		return fmt.Sprintf("%.0fF", t*9/5+32)
	case "ines":
		return fmt.Sprintf("%.1f", onto(t, 2))
	}
	return fmt.Sprintf("%.0f", t)
}
