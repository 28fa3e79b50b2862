package season_test

import (
	"math/rand/v2"
	"testing"

	"github.com/google/go-cmp/cmp"
	"pgregory.net/rapid"

	"gylebook/attenuation"
	"gylebook/attenuation/season"
	"gylebook/gravity"
)

// By hand, definition 7: the place of p among n values is p(n-1)+1.
func TestSpread(t *testing.T) {
	for _, c := range []struct {
		in   []float64
		want season.Spread
	}{
		{nil, season.Spread{}},
		{[]float64{78}, season.Spread{N: 1, Median: 78, Q1: 78, Q3: 78, Min: 78, Max: 78}},
		{[]float64{80, 78}, season.Spread{N: 2, Median: 79, Q1: 78.5, Q3: 79.5, Min: 78, Max: 80}},
		// Quarter at 0.25·2+1 = 1.5, between 70 and 76.
		{[]float64{80, 70, 76}, season.Spread{N: 3, Median: 76, Q1: 73, Q3: 78, Min: 70, Max: 80}},
		// Quarter at 0.25·3+1 = 1.75, a quarter of the way back from 2 to 1.
		{[]float64{4, 1, 3, 2}, season.Spread{N: 4, Median: 2.5, Q1: 1.75, Q3: 3.25, Min: 1, Max: 4}},
		{[]float64{5, 1, 2, 4, 3}, season.Spread{N: 5, Median: 3, Q1: 2, Q3: 4, Min: 1, Max: 5}},
	} {
		if diff := cmp.Diff(c.want, season.SpreadOf(c.in), tolerance); diff != "" {
			t.Errorf("%v: %s", c.in, diff)
		}
	}
	if iqr := season.SpreadOf([]float64{4, 1, 3, 2}).IQR(); iqr != 1.5 {
		t.Errorf("interquartile range %v, wanted 3.25 - 1.75", iqr)
	}
}

// tolerance is for the last binary digits of an interpolation.
var tolerance = cmp.Comparer(func(a, b float64) bool { return a-b < 1e-12 && b-a < 1e-12 })

func row(product, yeast string, open bool, apparent, abv, days float64) season.Row {
	v := gravity.VolPct(abv)
	return season.Row{
		Product: product, Yeast: yeast, Open: open, Attenuation: &attenuation.Attenuation{Apparent: apparent, Real: apparent * 0.8},
		ABV: &v, Days: &days,
	}
}

func TestGroups(t *testing.T) {
	rows := []season.Row{
		row("Porter", "ale", false, 74, 5.5, 8),
		row("Bitter", "ale", false, 76, 4.2, 5), row("Bitter", "ale", false, 80, 4.4, 7), row("Bitter", "ale", false, 75, 4.1, 6),
		row("Bitter", "ale", true, 30, 1.2, 1), // not its end
		{Product: "Bitter", Yeast: "ale", Why: "original gravity not known"},
		row("Bitter", "lager", false, 82, 4.6, 9),
	}
	one := func(x float64) season.Spread { return season.Spread{N: 1, Median: x, Q1: x, Q3: x, Min: x, Max: x} }
	want := []season.Group{
		{
			Product: "Bitter", Yeast: "ale", Batches: 5, Open: 1,
			Apparent: season.Spread{N: 3, Median: 76, Q1: 75.5, Q3: 78, Min: 75, Max: 80},
			Real:     season.Spread{N: 3, Median: 60.8, Q1: 60.4, Q3: 62.4, Min: 60, Max: 64},
			ABV:      season.Spread{N: 3, Median: 4.2, Q1: 4.15, Q3: 4.3, Min: 4.1, Max: 4.4},
			Days:     season.Spread{N: 3, Median: 6, Q1: 5.5, Q3: 6.5, Min: 5, Max: 7},
		},
		{Product: "Bitter", Yeast: "lager", Batches: 1, Apparent: one(82), Real: one(82 * 0.8), ABV: one(4.6), Days: one(9)},
		{Product: "Porter", Yeast: "ale", Batches: 1, Apparent: one(74), Real: one(74 * 0.8), ABV: one(5.5), Days: one(8)},
	}
	if diff := cmp.Diff(want, season.Groups(rows), tolerance); diff != "" {
		t.Error(diff)
	}
	if got := season.Groups(nil); len(got) != 0 {
		t.Errorf("no rows gave %+v", got)
	}
}

func TestOrderOfBatchesDoesNotMatter(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		n := rapid.IntRange(1, 40).Draw(t, "n")
		var rows []season.Row
		for range n {
			rows = append(rows, row(
				rapid.SampledFrom([]string{"a", "b", "c"}).Draw(t, "product"), rapid.SampledFrom([]string{"x", "y"}).Draw(t, "yeast"),
				rapid.Bool().Draw(t, "open"), rapid.Float64Range(-20, 120).Draw(t, "apparent"),
				rapid.Float64Range(0, 18).Draw(t, "abv"), rapid.Float64Range(0, 90).Draw(t, "days")))
		}
		groups := season.Groups(rows)
		rng := rand.New(rand.NewPCG(rapid.Uint64().Draw(t, "seed"), 1))
		rng.Shuffle(len(rows), func(i, j int) { rows[i], rows[j] = rows[j], rows[i] })
		if diff := cmp.Diff(groups, season.Groups(rows)); diff != "" {
			t.Fatal(diff)
		}
		total := 0
		for _, g := range groups {
			total += g.Batches
			for _, s := range []season.Spread{g.Apparent, g.Real, g.ABV, g.Days} {
				if s.N != g.Batches-g.Open {
					t.Fatalf("%d figures of %d closed batches", s.N, g.Batches-g.Open)
				}
				if !(s.Min <= s.Q1 && s.Q1 <= s.Median && s.Median <= s.Q3 && s.Q3 <= s.Max) {
					t.Fatalf("not in order: %+v", s)
				}
			}
		}
		if total != n {
			t.Fatalf("%d batches in the groups, wanted %d", total, n)
		}
	})
}
