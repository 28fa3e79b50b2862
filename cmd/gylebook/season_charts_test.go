package main

import (
	"strings"
	"testing"

	"gylebook/attenuation/control"
	"gylebook/attenuation/season"
)

func TestOftenText(t *testing.T) {
	for share, want := range map[float64]string{
		0: "fewer than 1 in 1000", 0.0005: "fewer than 1 in 1000", 0.004: "1 in 250", 0.0763: "1 in 13",
		0.18: "1 in 6", 0.2: "1 in 5", 0.33: "1 in 3", 0.45: "5 in 10", 0.52: "5 in 10", 0.94: "9 in 10", 1: "nearly all",
	} {
		if got := oftenText(share); got != want {
			t.Errorf("%v: %q, wanted %q", share, got, want)
		}
	}
}

// broken is a chart of 15 points of which some complete patterns.
func broken(f season.Figure, violations ...control.Violation) season.FigureChart {
	c := season.FigureChart{
		Product: "Lane Bitter", Figure: f, Closed: 15, Values: make([]float64, 15),
		Chart: &control.Chart{N: 15, Tests: control.Default, Broken: violations},
	}
	for k := range 15 {
		c.Batches = append(c.Batches, "B"+string(rune('A'+k)))
	}
	return c
}

// A batch has one line whatever it breaks, batches stand in the order of pitching,
// and of many the newest are named.
func TestBrokenBatches(t *testing.T) {
	one := func(point int, tests ...int) control.Violation {
		return control.Violation{Point: point, Tests: control.Of(tests...)}
	}
	lines, seen := brokenBatches([]season.FigureChart{
		broken(season.Apparent, one(4, 1), one(9, 1, 5)), broken(season.Real, one(4, 1)), broken(season.ABV, one(2, 6), one(4, 1), one(9, 5)),
	}, false)
	want := "BC breaks test 6 in % vol\n" +
		"BE breaks test 1 in app. %, real %, % vol\n" +
		"BJ breaks tests 1, 5 in app. %; test 5 in % vol"
	if got := strings.Join(lines, "\n"); got != want || seen != control.Of(1, 5, 6) {
		t.Errorf("seen %v:\n%s\nwanted\n%s", seen, got, want)
	}
	var all []control.Violation
	for k := range 12 {
		all = append(all, one(k, 2))
	}
	lines = brokenLines([]season.FigureChart{broken(season.Apparent, all...)}, false)
	if lines[0] != "4 earlier batches break a test; --json has them" || lines[1] != "BE breaks test 2 in app. %" || !strings.HasPrefix(lines[9], "test 2: 9 points") {
		t.Errorf("%s", strings.Join(lines, "\n"))
	}
}

func TestTrendLines(t *testing.T) {
	flat := season.Trend{N: 5, Slope: -1, Low: -3, High: 1}
	down := season.Trend{N: 5, Slope: -2, Low: -3, High: -1}
	few := season.Trend{N: 2, TooFew: true}
	of := func(apparent, midpoint, rate season.Trend) []season.Lineage {
		return []season.Lineage{{Product: "Lane Bitter", Yeast: "house ale", Apparent: apparent, Midpoint: midpoint, Rate: rate}}
	}
	for want, l := range map[string][]season.Lineage{
		"": of(few, few, few),
		"no trend shown: every interval holds zero":                of(flat, few, flat),
		"Lane Bitter, house ale: app. % falls with the generation": of(down, flat, few),
	} {
		if got := strings.Join(trendLines(l), "\n"); got != want {
			t.Errorf("%q, wanted %q", got, want)
		}
	}
}
