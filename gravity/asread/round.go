package asread

import (
	"math"

	"github.com/shopspring/decimal"
)

// Rule says what rounding does.
type Rule int

// The rounding rules.
const (
	HalfEven Rule = iota // ties to the even digit: ISO 80000-1 rule A, ASTM E29
	HalfUp               // ties away from zero
	Truncate             // toward zero, as strength for UK duty
)

// noNumber stands where a value is not finite.
const noNumber = "—"

// No float64 has a digit beyond these places, so more change nothing.
const maxPlaces, minPlaces = 1100, -400

// Round returns x rounded to places decimals (negative: tens, hundreds). It
// works on the shortest decimal that gives x, so 1.0485 is a tie. A value that
// is not finite comes back unchanged.
func Round(x float64, places int, rule Rule) float64 {
	if !finite(x) {
		return x
	}
	return round(decimal.NewFromFloat(x), places, rule).InexactFloat64()
}

// Fixed returns x rounded as Round does and printed with exactly places
// decimals (at most 1100), never "-0.00"; "—" if x is not finite.
func Fixed(x float64, places int, rule Rule) string {
	if !finite(x) {
		return noNumber
	}
	d := round(decimal.NewFromFloat(x), places, rule)
	return d.StringFixed(int32(min(max(places, 0), maxPlaces)))
}

// Signed returns x with its sign and places decimals, "+0.0022", rounded half
// to even; "0" if it rounds to zero and "—" if it is not finite.
func Signed(x float64, places int) string {
	if !finite(x) {
		return noNumber
	}
	switch round(decimal.NewFromFloat(x), places, HalfEven).Sign() {
	case 0:
		return "0"
	case 1:
		return "+" + Fixed(x, places, HalfEven)
	}
	return Fixed(x, places, HalfEven)
}

// RoundDiff returns (a-b)·scaleBy, taken exactly in decimal and then rounded:
// the points between 1.048 and 1.010 are 38.0, where binary arithmetic has
// 38.00000000000003. The first argument that is not finite comes back unchanged.
func RoundDiff(a, b, scaleBy float64, places int, rule Rule) float64 {
	for _, x := range []float64{a, b, scaleBy} {
		if !finite(x) {
			return x
		}
	}
	d := decimal.NewFromFloat(a).Sub(decimal.NewFromFloat(b)).Mul(decimal.NewFromFloat(scaleBy))
	return round(d, places, rule).InexactFloat64()
}

// Product returns the float64 nearest to the exact product of the shortest
// decimals that give a and b. The first argument that is not finite comes back
// unchanged.
func Product(a, b float64) float64 {
	for _, x := range []float64{a, b} {
		if !finite(x) {
			return x
		}
	}
	return decimal.NewFromFloat(a).Mul(decimal.NewFromFloat(b)).InexactFloat64()
}

func round(d decimal.Decimal, places int, rule Rule) decimal.Decimal {
	if places >= int(-d.Exponent()) {
		return d
	}
	p := int32(max(places, minPlaces))
	switch rule {
	case HalfUp:
		return d.Round(p)
	case Truncate:
		return d.RoundDown(p)
	default:
		return d.RoundBank(p)
	}
}

func finite(x float64) bool { return !math.IsNaN(x) && !math.IsInf(x, 0) }
