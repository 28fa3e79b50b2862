package main

import (
	"hash/fnv"
	"math/rand/v2"
	"slices"

	"gylebook/attenuation/curve"

	"gonum.org/v1/gonum/stat"
)

// truth is what a course came to.
type truth struct {
	fg  float64 // mean of the final plateau, points
	end float64 // hours until 2 points above it
}

const (
	plateauHours = 20.0
	leastFall    = 15.0 // points
	nearEnd      = 2.0  // points
	thinBelow    = 6.0  // hours of median step
	gapLo, gapHi = 8.0, 30.0
)

// truth finds the final plateau: the longest run of last readings that stay
// within the width, if it has at least two and lasts 20 h. A course without
// one, or with a fall under 15 points, has no truth.
func (c course) truth() (truth, bool) {
	n := len(c.hours)
	if n < 3 {
		return truth{}, false
	}
	i := n - 1
	lo, hi := c.points[i], c.points[i]
	for i > 0 && max(hi, c.points[i-1])-min(lo, c.points[i-1]) <= c.plateau+1e-9 {
		i--
		lo, hi = min(lo, c.points[i]), max(hi, c.points[i])
	}
	if n-i < 2 || c.hours[n-1]-c.hours[i] < plateauHours {
		return truth{}, false
	}
	t := truth{fg: stat.Mean(c.points[i:], nil)}
	if c.points[0]-t.fg < leastFall {
		return truth{}, false
	}
	t.end = c.crossing(t.fg + nearEnd)
	return t, true
}

// crossing is when the gravity first comes to a level and is not above it at
// the next reading either, between the readings by a straight line.
func (c course) crossing(level float64) float64 {
	for k := range c.points {
		if c.points[k] > level || k+1 < len(c.points) && c.points[k+1] > level {
			continue
		}
		if k == 0 || c.points[k-1] <= c.points[k] {
			return c.hours[k]
		}
		share := (c.points[k-1] - level) / (c.points[k-1] - c.points[k])
		return c.hours[k-1] + max(share, 0)*(c.hours[k]-c.hours[k-1])
	}
	return c.hours[len(c.hours)-1]
}

// thinned leaves readings 8 to 30 h apart of a course that was read more often
// than every 6 h, as people would have read it.
func (c course) thinned(seed uint64) course {
	steps := make([]float64, 0, len(c.hours))
	for k := 1; k < len(c.hours); k++ {
		steps = append(steps, c.hours[k]-c.hours[k-1])
	}
	slices.Sort(steps)
	if len(steps) == 0 || stat.Quantile(0.5, stat.Empirical, steps, nil) >= thinBelow {
		return c
	}
	rng := c.rng(seed)
	index := []int{0}
	next := gapLo + (gapHi-gapLo)*rng.Float64()
	for k, h := range c.hours {
		if h >= next {
			index = append(index, k)
			next = h + gapLo + (gapHi-gapLo)*rng.Float64()
		}
	}
	return c.pick(index)
}

// rng is the same for a seed and a course, whatever else is in the folder.
func (c course) rng(seed uint64) *rand.Rand {
	h := fnv.New64a()
	h.Write([]byte(c.class + "\x00" + c.name)) // a hash does not fail
	return rand.New(rand.NewPCG(seed, h.Sum64()))
}

// batch gives the first k readings, the first of which is the original gravity.
func (c course) batch(k int, u float64) curve.Batch {
	b := curve.Batch{OG: c.points[0], UOG: u}
	for i := range min(k, len(c.hours)) {
		b.Readings = append(b.Readings, curve.Reading{Hours: c.hours[i], Points: c.points[i], U: u})
	}
	return b
}
