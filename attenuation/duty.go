package attenuation

import (
	"errors"

	"gylebook/gravity"
	"gylebook/gravity/asread"
)

// DutyBand is one line of the duty factor table: gravity difference in points to
// one decimal, both ends included, and the factor [% vol per point].
type DutyBand struct{ From, To, Factor float64 }

// DutyBands is the factor table of the Laboratory of the Government Chemist,
// HMRC Excise Notice 226 (Beer Duty), paragraphs 30.2 and 30.3, seen as a
// quotation. The notice called it guidance and was withdrawn in February 2025.
var DutyBands = []DutyBand{
	{0, 6.9, 0.125},
	{7.0, 10.4, 0.126},
	{10.5, 17.2, 0.127},
	{17.3, 26.1, 0.128},
	{26.2, 36.0, 0.129},
	{36.1, 46.5, 0.130},
	{46.6, 57.1, 0.131},
	{57.2, 67.9, 0.132},
	{68.0, 78.8, 0.133},
	{78.9, 89.7, 0.134},
	{89.8, 100.7, 0.135},
}

// ErrNoFactor says that the duty factor table ends below the difference.
var ErrNoFactor = errors.New("no factor above 100.7 points")

// DutyFactor returns the difference of two gravities [points, half up to one
// decimal, taken in decimal] and the factor of its band [% vol per point]. A
// binary difference would put exact band edges on the wrong side. Errors are
// ErrNoFactor, and *OrderError for a present gravity above the original.
func DutyFactor(og, fg gravity.SG) (points, factor float64, err error) {
	if !(fg <= og) {
		return 0, 0, &OrderError{og, fg}
	}
	points = asread.RoundDiff(float64(og), float64(fg), 1000, 1, asread.HalfUp)
	for _, b := range DutyBands {
		if points <= b.To {
			return points, b.Factor, nil
		}
	}
	return points, 0, ErrNoFactor
}

// ukDuty is the difference in points times the factor of its band, exact in
// decimal; to 100.7 points. Source: HMRC Excise Notice 226, historic.
func ukDuty(g Gravities) (Alcohol, error) {
	if err := g.fermentable(); err != nil {
		return Alcohol{}, err
	}
	points, factor, err := DutyFactor(g.OG, g.FG)
	if err != nil {
		return Alcohol{}, err
	}
	return Alcohol{ABV: gravity.VolPct(asread.Product(points, factor))}, nil
}
