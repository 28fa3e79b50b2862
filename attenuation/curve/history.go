package curve

import (
	"math"

	"gonum.org/v1/gonum/stat"
)

// The error of the curve itself in points, beside that of a reading.
const (
	coldTau        = 1.0
	minTau, maxTau = 0.4, 2.0
)

const (
	lateShrink   = 2.0 // batches at which half of their lateness is believed
	robustNu     = 4.0
	robustRounds = 30
)

// tauOf pools the residuals of the finished batches with one batch's worth of
// the cold value, within its limits.
func tauOf(finished []Fitted) float64 {
	sum, weight := coldTau*coldTau, 1.0
	for _, f := range finished {
		if f.N > dims {
			sum += f.RMS * f.RMS
			weight++
		}
	}
	return clamp(math.Sqrt(sum/weight), minTau, maxTau)
}

// lateOf is the mean lateness of the finished batches, shrunk towards none.
func lateOf(finished []Fitted) float64 {
	sum := 0.0
	for _, f := range finished {
		sum += f.Late
	}
	return sum / (float64(len(finished)) + lateShrink)
}

// lateness compares when the readings came within 2 points of the end, by a
// straight line between them, with when the curve did.
func lateness(readings []Reading, fg, fitted float64) float64 {
	level := fg + nearEnd
	for k := 1; k < len(readings); k++ {
		a, b := readings[k-1], readings[k]
		if a.Points > level && b.Points <= level {
			seen := a.Hours + (b.Hours-a.Hours)*(a.Points-level)/(a.Points-b.Points)
			if seen > 0 && fitted > 0 {
				return clamp(math.Log(seen/fitted), -0.5, 0.5)
			}
			return 0
		}
	}
	return 0
}

// robustMean is the centre of a Student t distribution laid through what the
// batches say of one parameter: one odd batch among five does not draw the
// others along. The variance, worth one batch, keeps the scale from collapsing
// where all agree.
func robustMean(xs []float64, variance float64) float64 {
	weights := make([]float64, len(xs))
	for i := range weights {
		weights[i] = 1
	}
	mean := stat.Mean(xs, weights)
	for range robustRounds {
		v := variance
		for i, x := range xs {
			v += weights[i] * (x - mean) * (x - mean)
		}
		v /= float64(len(xs)) + 1
		for i, x := range xs {
			weights[i] = (robustNu + 1) / (robustNu + (x-mean)*(x-mean)/v)
		}
		mean = stat.Mean(xs, weights)
	}
	return mean
}
