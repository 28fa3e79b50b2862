package control_test

import (
	"math"
	"math/rand/v2"
	"strings"
	"testing"

	"gylebook/attenuation/control"
)

// letters writes a season down, one letter a point: the distance from the centre in
// whole sigmas, capital above it. Patterns are then looked for as a reader would.
func letters(points []float64, centre, sigma float64) string {
	var b strings.Builder
	for _, x := range points {
		z := (x - centre) / sigma
		zone := byte('a')
		if z > 0 {
			zone = 'A'
		}
		b.WriteByte(zone + byte(min(math.Abs(z), 3)))
	}
	return b.String()
}

// plainly looks for the tests in another way than the package does.
func plainly(points []float64, centre, sigma float64, tests map[int]bool) bool {
	text := letters(points, centre, sigma)
	var steps strings.Builder
	for k := 1; k < len(points); k++ {
		if points[k] > points[k-1] {
			steps.WriteByte('u')
		} else {
			steps.WriteByte('d')
		}
	}
	in := func(s, chars string) int {
		n := 0
		for _, c := range s {
			if strings.ContainsRune(chars, c) {
				n++
			}
		}
		return n
	}
	// anyRun reports whether some run of n letters has at least k of the set.
	anyRun := func(n, k int, sets ...string) bool {
		for i := 0; i+n <= len(text); i++ {
			for _, set := range sets {
				if in(text[i:i+n], set) >= k {
					return true
				}
			}
		}
		return false
	}
	up := strings.Repeat("ud", 7)
	switch {
	case tests[1] && strings.ContainsAny(text, "dD"),
		tests[2] && anyRun(9, 9, "abcd", "ABCD"),
		tests[3] && (strings.Contains(steps.String(), "uuuuu") || strings.Contains(steps.String(), "ddddd")),
		tests[4] && (strings.Contains(steps.String(), up[:13]) || strings.Contains(steps.String(), up[1:])),
		tests[5] && anyRun(3, 2, "cd", "CD"),
		tests[6] && anyRun(5, 4, "bcd", "BCD"),
		tests[7] && anyRun(15, 15, "aA"):
		return true
	}
	if tests[8] {
		for i := 0; i+8 <= len(text); i++ {
			run := text[i : i+8]
			if in(run, "bcd") > 0 && in(run, "BCD") > 0 && in(run, "bcdBCD") == 8 {
				return true
			}
		}
	}
	return false
}

// The rate is that of seasons simulated here with another seed and looked through
// in another way, within four standard deviations of the two.
func TestRateIsTheSimulatedOne(t *testing.T) {
	const seasons = 10000
	var h control.Healthy
	random := rand.New(rand.NewPCG(7, 11))
	for _, c := range []struct {
		n     int
		tests control.Set
	}{{30, control.Default}, {30, everyTest}, {15, control.Default}, {24, control.Of(3, 4, 7, 8)}, {30, control.Of(1)}} {
		asked := make(map[int]bool)
		for _, n := range c.tests.Numbers() {
			asked[n] = true
		}
		alarms := 0
		points := make([]float64, c.n)
		for range seasons {
			sum, steps := 0.0, 0.0
			for k := range points {
				points[k] = 78 + 1.5*random.NormFloat64()
				sum += points[k]
				if k > 0 {
					steps += math.Abs(points[k] - points[k-1])
				}
			}
			if plainly(points, sum/float64(c.n), steps/float64(c.n-1)/1.128, asked) {
				alarms++
			}
		}
		want := float64(alarms) / seasons
		got := h.Rate(c.n, c.tests)
		sd := math.Sqrt(want * (1 - want) / seasons)
		near(t, "rate of "+c.tests.String(), got.Share, want, 4*math.Hypot(sd, got.Error))
	}
}

// The tests on by default flag about 18 of 100 healthy seasons of 30 (derived by
// simulation), all eight flag clearly more.
func TestRateOfThirty(t *testing.T) {
	var h control.Healthy
	usual, most := h.Rate(30, control.Default), h.Rate(30, everyTest)
	near(t, "rate of the default set", usual.Share, 0.18, 0.01)
	if usual.Error > 0.004 || usual.Seasons < 5000 || usual.N != 30 {
		t.Errorf("%+v", usual)
	}
	if most.Share < usual.Share+0.05 {
		t.Errorf("all eight flag %v, the default %v", most.Share, usual.Share)
	}
}

// Which of six values is larger than which is a matter of order alone: of the 720
// orders one rises and one falls throughout, 2/720. Of the 14! orders of fourteen
// 2·199360981 go up and down in turn (the zigzag numbers of André 1879, from
// memory), that is 0.004574.
func TestRatesKnownExactly(t *testing.T) {
	var h control.Healthy
	for _, c := range []struct {
		n, test int
		want    float64
	}{{6, 3, 2.0 / 720}, {14, 4, 2 * 199360981.0 / 87178291200}, {5, 3, 0}, {13, 4, 0}, {8, 2, 0}, {14, 7, 0}, {7, 8, 0}} {
		got := h.Rate(c.n, control.Of(c.test))
		sd := math.Sqrt(c.want * (1 - c.want) / float64(got.Seasons))
		near(t, control.Tests[c.test-1].ID, got.Share, c.want, 4*sd)
	}
}

func TestRateIsRemembered(t *testing.T) {
	var a, b control.Healthy
	if a.Rate(20, control.Default) != b.Rate(20, control.Default) || a.Rate(20, control.Default) != a.Rate(20, control.Default) {
		t.Error("two simulations of the same differ")
	}
	for _, none := range []control.Rate{a.Rate(1, control.Default), a.Rate(-3, control.Default), a.Rate(30, 0)} {
		if none.Share != 0 || none.Seasons != 0 {
			t.Errorf("%+v, wanted nothing simulated", none)
		}
	}
	// A season longer than any is not simulated at its length.
	if long := a.Rate(1_000_000, control.Default); !(long.Share > 0.99) || long.N >= 1_000_000 {
		t.Errorf("%+v", long)
	}
}

// More points, and more tests, flag no fewer seasons.
func TestRateGrows(t *testing.T) {
	var h control.Healthy
	last := 0.0
	for _, n := range []int{10, 15, 20, 30, 50, 100, 300, 1000} {
		r := h.Rate(n, control.Default)
		if r.Share < last {
			t.Errorf("%d points: %v, with fewer %v", n, r.Share, last)
		}
		last = r.Share
	}
}

func BenchmarkIndividuals(b *testing.B) {
	random := rand.New(rand.NewPCG(1, 2))
	points := make([]float64, 1000)
	for k := range points {
		points[k] = random.NormFloat64()
	}
	for b.Loop() {
		if _, err := control.Individuals(points, everyTest); err != nil {
			b.Fatal(err)
		}
	}
}

// A rate that is not remembered yet.
func BenchmarkRate(b *testing.B) {
	for b.Loop() {
		var h control.Healthy
		if h.Rate(30, control.Default).Share == 0 {
			b.Fatal("no rate")
		}
	}
}
