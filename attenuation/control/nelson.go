package control

import (
	"math"

	"gylebook/gravity/method"
)

// Test reports whether the point z[k] completes a pattern. The points are in
// standard deviations from the centre; of those after k nothing is used.
type Test func(z []float64, k int) bool

// KindTest is the kind of the tests in a registry.
const KindTest = "control test"

// Tests are the eight tests of Nelson in the order of their numbers, from 1.
var Tests = method.Set[Test]{
	nelson("nelson-1", "1 point beyond 3 sigma", "on by default; a single upset", beyondThree),
	nelson("nelson-2", "9 points in a row on one side of the centre", "on by default; a shift that stays; Western Electric takes 8", oneSide),
	nelson("nelson-3", "6 points in a row rising, or falling", "a drift; often by chance", trending),
	nelson("nelson-4", "14 points in a row, up and down in turn", "two sources in turn, as two vessels", alternating),
	nelson("nelson-5", "2 of 3 points in a row beyond 2 sigma on one side", "on by default; an early sign of a shift", mostOf(2, 3, 2)),
	nelson("nelson-6", "4 of 5 points in a row beyond 1 sigma on one side", "on by default; a small shift", mostOf(4, 5, 1)),
	nelson("nelson-7", "15 points in a row within 1 sigma", "limits too wide for the points: a mixture in each", within),
	nelson("nelson-8", "8 points in a row beyond 1 sigma, on both sides", "two processes on one chart", bothSides),
}

func nelson(id, name, use string, fn Test) method.Entry[Test] {
	return method.Entry[Test]{Info: method.Info{
		ID: id, Kind: KindTest, Name: name,
		Source: method.Source{
			Author: "Nelson", Year: 1984, Status: method.FromMemory,
			Where: "The Shewhart control chart: tests for special causes, Journal of Quality Technology 16, 237",
		},
		Error: "flags healthy points too, see the rate of false alarms",
		Check: "definition", Use: use,
	}, Fn: fn}
}

// slack keeps the last bits of binary arithmetic from deciding on which side of a
// line a point lies, in standard deviations.
const slack = 1e-9

// Runs as long as the tests ask for.
const (
	oneSideRun     = 9
	trendRun       = 6
	alternatingRun = 14
	withinRun      = 15
	bothSidesRun   = 8
)

func beyondThree(z []float64, k int) bool { return math.Abs(z[k]) > 3+slack }

// all reports whether ok holds for n points up to k.
func all(z []float64, k, n int, ok func(x float64) bool) bool {
	if k+1 < n {
		return false
	}
	for _, x := range z[k+1-n : k+1] {
		if !ok(x) {
			return false
		}
	}
	return true
}

func oneSide(z []float64, k int) bool {
	side := math.Copysign(1, z[k])
	return all(z, k, oneSideRun, func(x float64) bool { return side*x > slack })
}

func trending(z []float64, k int) bool {
	return steps(z, k, trendRun, 1)
}

func alternating(z []float64, k int) bool {
	return steps(z, k, alternatingRun, -1)
}

// steps reports whether each step among the n points up to k has the sign of the
// step after it times turn. A step of nothing has no sign.
func steps(z []float64, k, n int, turn float64) bool {
	if k+1 < n {
		return false
	}
	want := math.Copysign(1, z[k]-z[k-1])
	for i := k; i > k+1-n; i-- {
		if want*(z[i]-z[i-1]) <= slack {
			return false
		}
		want *= turn
	}
	return true
}

// mostOf is some of the last few points beyond sigma on the side of the newest,
// which is one of them. At the beginning there may be fewer to look at.
func mostOf(some, few int, sigma float64) Test {
	return func(z []float64, k int) bool {
		side := math.Copysign(1, z[k])
		if side*z[k] <= sigma+slack {
			return false
		}
		n := 0
		for _, x := range z[max(0, k+1-few) : k+1] {
			if side*x > sigma+slack {
				n++
			}
		}
		return n >= some
	}
}

func within(z []float64, k int) bool {
	return all(z, k, withinRun, func(x float64) bool { return math.Abs(x) <= 1+slack })
}

func bothSides(z []float64, k int) bool {
	above, below := false, false
	return all(z, k, bothSidesRun, func(x float64) bool {
		above, below = above || x > 0, below || x < 0
		return math.Abs(x) > 1+slack
	}) && above && below
}
