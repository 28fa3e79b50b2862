package curve

import (
	"math"

	"gonum.org/v1/gonum/stat"
)

const (
	normal95 = 1.959964 // two-sided 95 % of the normal distribution
	// The difference of two roundings to the same division lies within this share
	// of it with 95 %: its distribution is a triangle, 1-√0.05.
	roundings95 = 0.7763932
)

// Slope is how fast readings fall and what they leave open.
type Slope struct {
	N           int     `json:"n"`
	Days        float64 `json:"days"`         // between the first and the last
	PerDay      float64 `json:"per_day"`      // fall in points per day, negative where they rise
	SE          float64 `json:"se"`           // standard error of it
	NotExcluded float64 `json:"not_excluded"` // the largest fall per day that they cannot exclude, never below 0
}

// FSU gives the fall in the unit of cider makers, points per 100 days, and half
// the width of its 95 % interval (Jolicoeur 2012).
func (s Slope) FSU() (rate, plusMinus float64) { return 100 * s.PerDay, 100 * normal95 * s.SE }

// SlopeOf lays a straight line through readings, each weighed by its own
// uncertainty (where none is given, what its division allows). Where the
// readings scatter more than that the error grows with them; where they
// scatter less it does not shrink, since equal readings share their rounding.
// ok is false below two readings or where all are of one hour.
func SlopeOf(readings []Reading) (s Slope, ok bool) {
	if len(readings) < 2 {
		return Slope{}, false
	}
	days, points, weights := make([]float64, len(readings)), make([]float64, len(readings)), make([]float64, len(readings))
	first, last, division := math.Inf(1), math.Inf(-1), 0.0
	for k, r := range readings {
		days[k], points[k] = r.Hours/24, r.Points
		u := r.ownU()
		weights[k] = 1 / (u * u)
		first, last = math.Min(first, days[k]), math.Max(last, days[k])
		division = math.Max(division, r.Division)
	}
	s = Slope{N: len(readings), Days: last - first}
	if !(s.Days > 1e-3) {
		return Slope{}, false
	}
	a, b := stat.LinearRegression(days, points, weights, false)
	mean := stat.Mean(days, weights)
	sxx, chi2 := 0.0, 0.0
	for k := range days {
		sxx += weights[k] * (days[k] - mean) * (days[k] - mean)
		e := points[k] - a - b*days[k]
		chi2 += weights[k] * e * e
	}
	s.PerDay, s.SE = -b, 1/math.Sqrt(sxx)
	if s.N > 2 {
		s.SE *= math.Max(1, math.Sqrt(chi2/float64(s.N-2)))
	}
	s.NotExcluded = math.Max(s.PerDay+normal95*s.SE, roundings95*division/s.Days)
	s.NotExcluded = math.Max(s.NotExcluded, 0)
	return s, finite(s.PerDay) && finite(s.SE)
}

// ownU is the uncertainty of one reading by itself.
func (r Reading) ownU() float64 {
	switch {
	case r.U > 0:
		return math.Max(r.U, leastU)
	case r.Division > 0:
		return r.Division / math.Sqrt(12)
	}
	return usualU
}

func finite(x float64) bool { return !math.IsNaN(x) && !math.IsInf(x, 0) }
