package curve

import (
	"math"
	"math/rand/v2"
	"slices"

	"gonum.org/v1/gonum/stat"
)

// GravityAt gives the gravity in points that a reading at a time, in hours
// since pitching, should show. Without a curve it is what the finished batches
// would show, which is wide.
func (f Forecast) GravityAt(hours float64) Interval {
	if math.IsNaN(hours) || len(f.drawn) == 0 {
		return Interval{}
	}
	hours = clamp(hours, 0, maxHours)
	rng := rand.New(rand.NewPCG(seed1, seed2+1))
	noise := math.Hypot(f.u, f.tau)
	draws := figures(f.drawn, func(d *drawn) float64 { return d.at(hours) })
	for k := range draws {
		draws[k] += noise * rng.NormFloat64()
	}
	return interval(draws)
}

// Of gives the interval of a figure made from the final gravity in points,
// alcohol for one. Draws for which it is not a finite number are left out; ok
// is false where none is left.
func (f Forecast) Of(figure func(fgPoints float64) float64) (i Interval, ok bool) {
	draws := make([]float64, 0, len(f.fg))
	for _, fg := range f.fg {
		if v := figure(fg); !math.IsNaN(v) && !math.IsInf(v, 0) {
			draws = append(draws, v)
		}
	}
	return interval(draws), len(draws) > 0
}

// Left gives the probability that more than so many points were still to fall
// at the last reading, in the time in which such batches end; ok is false
// without a curve.
func (f Forecast) Left(points float64) (p float64, ok bool) {
	if !f.Curve || len(f.drawn) == 0 || math.IsNaN(points) {
		return 0, false
	}
	more, late := 0, math.Exp(f.late)
	for _, t := range figures(f.drawn, func(d *drawn) float64 { return d.timeTo(points) }) {
		if t*late > f.last {
			more++
		}
	}
	return float64(more) / float64(len(f.drawn)), true
}

// LaterThan gives the probability that the end comes later than a time in
// hours since pitching; ok is false without a curve.
func (f Forecast) LaterThan(hours float64) (p float64, ok bool) {
	if !f.Curve || len(f.hours) == 0 || math.IsNaN(hours) {
		return 0, false
	}
	k, _ := slices.BinarySearch(f.hours, math.Nextafter(hours, math.Inf(1)))
	return 1 - float64(k)/float64(len(f.hours)), true
}

// Rate gives how fast the gravity fell at the last reading, in points per day;
// zero without a curve.
func (f Forecast) Rate() Interval {
	if !f.Curve {
		return Interval{}
	}
	return interval(figures(f.drawn, func(d *drawn) float64 { return d.rate(f.last) }))
}

// Score gives the continuous ranked probability score of the final gravity
// against what came, in points: the mean absolute error of a forecast that is
// a distribution, less being better (Gneiting and Raftery 2007, J. Am. Stat.
// Assoc. 102, 359).
func (f Forecast) Score(fgPoints float64) float64 { return Score(f.fg, fgPoints) }

// Score is the continuous ranked probability score of draws; one draw gives
// the absolute error.
func Score(draws []float64, truth float64) float64 {
	n := float64(len(draws))
	if n == 0 {
		return 0
	}
	sorted := slices.Clone(draws)
	slices.Sort(sorted)
	spread := 0.0
	for i, x := range sorted {
		spread += (2*float64(i+1) - n - 1) * x
	}
	off := make([]float64, len(sorted))
	for i, x := range sorted {
		off[i] = math.Abs(x - truth)
	}
	return stat.Mean(off, nil) - spread/(n*n)
}
