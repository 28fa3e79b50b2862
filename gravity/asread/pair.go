package asread

import (
	"strings"

	"github.com/shopspring/decimal"

	"gylebook/gravity"
)

// ParsePair reads the reference of a relative density, the sample's over the
// water's temperature: "20/20", "15/4", "17.5/17.5", "60/60F". A unit on one
// side counts for both, no unit is °C, each side is 0 to 60 °C. 60 °F is
// gravity.Pair6060F also when written as 15.6 or 15.56 °C. The error is a
// *Refusal.
func ParsePair(text string) (gravity.Pair, error) {
	in := strings.TrimSpace(text)
	refuse := func() (gravity.Pair, error) {
		return gravity.Pair{}, &Refusal{
			Read:   in,
			Wanted: "the sample's over the water's temperature, each 0 to 60 °C, such as 20/20, 60/60F or 15/4",
			Advice: "type 20/20, 15/15, 17.5/17.5, 15/4 or 60/60F",
		}
	}
	left, right, ok := strings.Cut(in, "/")
	if !ok {
		return refuse()
	}
	sample, sampleUnit, okS := pairSide(left)
	water, waterUnit, okW := pairSide(right)
	if !okS || !okW {
		return refuse()
	}
	if sampleUnit == "" {
		sampleUnit = waterUnit
	}
	if waterUnit == "" {
		waterUnit = sampleUnit
	}
	s, okS := pairCelsius(sample, sampleUnit)
	w, okW := pairCelsius(water, waterUnit)
	if !okS || !okW {
		return refuse()
	}
	return gravity.Pair{Sample: s, Water: w}, nil
}

// pairSide reads one side; the unit is "" when none is typed.
func pairSide(text string) (Value, Unit, bool) {
	v, rest, err := split(text)
	if err != nil {
		return Value{}, "", false
	}
	suffix := fold(rest)
	unit, known := temperatureUnits[suffix]
	return v, unit, suffix == "" || known
}

// sixtyF are the ways 60 °F is written in °C.
var sixtyF = []decimal.Decimal{decimal.New(156, -1), decimal.New(1556, -2), decimal.New(15556, -3)}

func pairCelsius(v Value, u Unit) (gravity.Celsius, bool) {
	if u == "" {
		u = C
	}
	if b := bounds[u]; !within(v.dec, b[0], b[1]) {
		return 0, false
	}
	if u == C {
		for _, d := range sixtyF {
			if v.dec.Equal(d) {
				return gravity.FromFahrenheit(60), true
			}
		}
	}
	return celsius(v.dec, u), true
}
