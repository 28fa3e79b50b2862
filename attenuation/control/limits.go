package control

import (
	"fmt"
	"math"
)

// MinPoints is how many points it takes before limits are worth showing. From
// fewer they scatter too much (common practice, no source).
const MinPoints = 15

const (
	// sigmaFactor turns the mean range of two normal values into their standard
	// deviation: d2 for n = 2, 2/√π = 1.128.
	sigmaFactor = 1.128
	// rangeFactor is the limit of such a range over its mean: D4 for n = 2.
	rangeFactor = 3.267

	action  = 3.0 // standard deviations
	warning = 2.0 / 3
)

// Limits are the lines of an individuals and moving-range chart, in the unit of
// its points. The lower limit of the moving range is zero.
type Limits struct {
	Centre                     float64 // mean of the points
	MeanRange                  float64 // mean of the steps from one point to the next
	Lower, Upper               float64 // action limits, 3 standard deviations from the centre
	LowerWarning, UpperWarning float64 // at 2/3 of them
	RangeLimit                 float64 // of a moving range
	RangeWarning               float64 // 2/3 of it
}

// LimitsOf returns the lines that belong to a mean and a mean moving range. Source:
// NIST/SEMATECH e-Handbook 6.3.2.2, with 3/1.128 unrounded (2.66 in print).
func LimitsOf(centre, meanRange float64) Limits {
	width := action / sigmaFactor * meanRange
	return Limits{
		Centre: centre, MeanRange: meanRange,
		Lower: centre - width, Upper: centre + width,
		LowerWarning: centre - warning*width, UpperWarning: centre + warning*width,
		RangeLimit: rangeFactor * meanRange, RangeWarning: warning * rangeFactor * meanRange,
	}
}

// Sigma returns the standard deviation that the mean moving range stands for.
func (l Limits) Sigma() float64 { return l.MeanRange / sigmaFactor }

// LimitsFrom returns the lines drawn from points in their order. Fewer than two
// points, and points that are not finite or whose sum is not, are an error.
func LimitsFrom(points []float64) (Limits, error) {
	if len(points) < 2 {
		return Limits{}, fmt.Errorf("read too few points (%d), wanted 2 at least for a moving range", len(points))
	}
	centre, meanRange := lines(points)
	l := LimitsOf(centre, meanRange)
	for _, x := range []float64{l.Lower, l.Upper, l.RangeLimit} {
		if math.IsNaN(x) || math.IsInf(x, 0) {
			return Limits{}, fmt.Errorf("a point is not a finite number, or too large to add up, wanted finite points")
		}
	}
	return l, nil
}

// lines returns the mean and the mean moving range of two points at least.
func lines(points []float64) (centre, meanRange float64) {
	for k, x := range points {
		centre += x
		if k > 0 {
			meanRange += math.Abs(x - points[k-1])
		}
	}
	n := float64(len(points))
	return centre / n, meanRange / (n - 1)
}
