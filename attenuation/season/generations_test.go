package season_test

import (
	"fmt"
	"math"
	"slices"
	"testing"

	"github.com/google/go-cmp/cmp"
	"pgregory.net/rapid"

	"gylebook/attenuation/journal"
	"gylebook/attenuation/season"
)

// By hand, Student's t at 97.5 % from the usual table:
//
//	1 2 3 4 with 80 79 79 76: means 2.5 and 78.5; Sxx 5, Sxy -6, slope -1.2
//	residuals -0.3 -0.1 1.1 -0.7, squares 1.8, /2 = 0.9; s = sqrt(0.9/5) = 0.42426
//	t(2) 4.303: -1.2 ± 1.8256
//
//	1 2 3 with 1 2 4: slope 1.5, squares 1/6; s = sqrt(1/6/2) = 0.28868
//	t(1) 12.706: 1.5 ± 3.668
//
//	1 1 3 3 with 80 79 76 75: means 2 and 77.5; Sxx 4, Sxy -8, slope -2
//	residuals ±0.5, squares 1, /2 = 0.5; s = sqrt(0.5/4) = 0.35355; ± 1.5213
func TestTrendByHand(t *testing.T) {
	for _, c := range []struct {
		x, y        []float64
		slope, half float64
		direction   int
	}{
		{[]float64{1, 2, 3, 4}, []float64{80, 79, 79, 76}, -1.2, 1.8256, 0},
		{[]float64{1, 2, 3}, []float64{1, 2, 4}, 1.5, 3.668, 0},
		{[]float64{1, 1, 3, 3}, []float64{80, 79, 76, 75}, -2, 1.5213, -1},
		{[]float64{1, 1, 3, 3}, []float64{75, 76, 79, 80}, 2, 1.5213, 1},
		{[]float64{1, 2, 5}, []float64{78, 78, 78}, 0, 0, 0},
	} {
		got := season.TrendOf(c.x, c.y)
		near(t, "slope", got.Slope, c.slope, 1e-9)
		near(t, "low", got.Low, c.slope-c.half, 5e-4)
		near(t, "high", got.High, c.slope+c.half, 5e-4)
		if got.TooFew || got.N != len(c.x) || got.Direction() != c.direction {
			t.Errorf("%v, %v: %+v, direction %d", c.x, c.y, got, got.Direction())
		}
	}
	for _, x := range [][]float64{nil, {1}, {1, 2}, {3, 3, 3, 3}} {
		if got := season.TrendOf(x, x); !got.TooFew || got.Direction() != 0 || got.N != len(x) || got.Slope != 0 {
			t.Errorf("%v: %+v, wanted too few", x, got)
		}
	}
}

// A line without scatter is found as it is; unit and zero of the figure act as they
// do on a slope.
func TestTrendProperties(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		n := rapid.IntRange(3, 20).Draw(t, "n")
		x, y, z := make([]float64, n), make([]float64, n), make([]float64, n)
		shift, scale := rapid.Float64Range(-90, 90).Draw(t, "shift"), rapid.Float64Range(-5, 5).Draw(t, "scale")
		for k := range n {
			x[k] = float64(rapid.IntRange(1, 9).Draw(t, "generation"))
			y[k] = rapid.Float64Range(60, 90).Draw(t, "y")
			z[k] = shift + scale*x[k]
		}
		line := season.TrendOf(x, z)
		if line.TooFew {
			if slices.Min(x) != slices.Max(x) {
				t.Fatal("too few")
			}
			return
		}
		within := func(what string, got, want float64) {
			if !(got-want < 1e-6 && want-got < 1e-6) {
				t.Fatalf("%s %v, wanted %v", what, got, want)
			}
		}
		within("slope", line.Slope, scale)
		within("low", line.Low, scale)
		within("high", line.High, scale)
		a := season.TrendOf(x, y)
		for k := range y {
			z[k] = shift - 2*y[k]
		}
		b := season.TrendOf(x, z)
		within("slope", b.Slope, -2*a.Slope)
		within("low", b.Low, -2*a.High)
		within("high", b.High, -2*a.Low)
	})
}

// Batches, generations and medians by hand; those that are open or of a generation
// not known do not count.
func TestLineages(t *testing.T) {
	rows := closedRows(80, 79, 79, 76, 70, 71, 90, 90)
	for k, g := range []int{1, 2, 3, 4, 2, 2, 0, 3} {
		rows[k].Generation = g
	}
	rows[4].Yeast, rows[5].Yeast = "cider yeast", "cider yeast"
	rows[7].Open = true
	rows[0].Course = &season.Course{Midpoint: 40, Rate: 20}
	rows[1].Course = &season.Course{Midpoint: 44, Rate: 18}
	rows[5].Attenuation = nil
	slices.Reverse(rows)
	got := season.Lineages(rows)
	if len(got) != 2 || got[0].Yeast != "cider yeast" || got[1].Yeast != "house ale" {
		t.Fatalf("%+v", got)
	}
	cider, ale := got[0], got[1]
	if cider.N != 2 || len(cider.Generations) != 1 || cider.Generations[0].N != 2 || cider.Generations[0].Apparent.N != 1 || !cider.Apparent.TooFew {
		t.Errorf("%+v", cider)
	}
	var numbers []int
	for _, g := range ale.Generations {
		numbers = append(numbers, g.Number)
	}
	if diff := cmp.Diff([]int{1, 2, 3, 4}, numbers); diff != "" || ale.N != 4 {
		t.Errorf("n %d, %s", ale.N, diff)
	}
	near(t, "slope of the attenuation", ale.Apparent.Slope, -1.2, 1e-9)
	if g := ale.Generations[0]; g.Apparent.Median != 80 || g.Midpoint.Median != 40 || g.Rate.Median != 20 || g.Midpoint.N != 1 {
		t.Errorf("%+v", g)
	}
	// Two midpoints are too few for a word.
	if ale.Midpoint.N != 2 || !ale.Midpoint.TooFew || ale.Generations[2].Midpoint.N != 0 {
		t.Errorf("%+v", ale)
	}
}

func ofGeneration(rec *journal.Record, generation int) *journal.Record {
	rec.Batch.Generation = generation
	return rec
}

// From 1.048 to 1.008 are 40 points: a quarter is gone at 1.038, half at 1.028, three
// quarters at 1.018. Between 24 h (1.040) and 48 h (1.024) a quarter is reached at
// 24+24·2/16 = 27 h and half at 24+24·12/16 = 42 h; three quarters halfway from 48 h
// to 72 h (1.012), at 60 h. 20 points in 33 h are 14.545 a day.
func TestCourseByHand(t *testing.T) {
	course := []sg{{1, "1.040"}, {2, "1.024"}, {3, "1.012"}, {5, "1.008"}, {7, "1.008"}}
	got := season.Of(ofGeneration(closed(record("LB-1", "1.048", course...)), 3), nil).Course
	if got == nil {
		t.Fatal("no course")
	}
	near(t, "midpoint", got.Midpoint, 42, 1e-3)
	near(t, "rate", got.Rate, 14.545, 1e-3)
}

func TestNoCourse(t *testing.T) {
	course := []sg{{1, "1.040"}, {2, "1.024"}, {3, "1.012"}, {5, "1.008"}}
	sugar := ofGeneration(closed(record("LB-2", "1.048", course...)), 1)
	sugar.Batch.Volume = "100"
	sugar.Events = []journal.Numbered[journal.Event]{{Number: 40, Body: journal.Event{
		Batch: "LB-2", At: pitched.AddDate(0, 0, 2), What: journal.Sugar, MassKg: "1",
	}}}
	for what, rec := range map[string]*journal.Record{
		"open":                   ofGeneration(record("LB-1", "1.048", course...), 1),
		"generation not known":   closed(record("LB-1", "1.048", course...)),
		"original extract grew":  sugar,
		"no original gravity":    ofGeneration(closed(record("LB-1", "", course...)), 1),
		"never read":             ofGeneration(closed(record("LB-1", "1.048")), 1),
		"no reading in the fall": ofGeneration(closed(record("LB-1", "1.048", sg{6, "1.008"}, sg{7, "1.008"})), 1),
		"hardly fell":            ofGeneration(closed(record("LB-1", "1.048", sg{1, "1.046"}, sg{7, "1.044"})), 1),
		"rose":                   ofGeneration(closed(record("LB-1", "1.048", sg{1, "1.049"}, sg{7, "1.050"})), 1),
	} {
		if c := season.Of(rec, nil).Course; c != nil {
			t.Errorf("%s: %+v, wanted none", what, *c)
		}
	}
}

// Most readings are only estimated. With all of them corrected, as for readings out
// of order, the course is the same within what a correction alone is off.
func TestCourseEqualsFullDerivation(t *testing.T) {
	book := register()
	found := 0
	rapid.Check(t, func(t *rapid.T) {
		n := rapid.IntRange(2, 30).Draw(t, "n")
		var course []sg
		day, points := 0.0, 48
		for range n {
			day += rapid.SampledFrom([]float64{0.25, 0.5, 1}).Draw(t, "later")
			points = max(7, points-rapid.IntRange(-2, 12).Draw(t, "fell"))
			course = append(course, sg{day, fmt.Sprintf("1.%03d", points)})
		}
		rec := ofGeneration(closed(record("LB-1", "1.048", course...)), 1)
		for k := range rec.Readings {
			r := &rec.Readings[k]
			r.Body.Instrument = rapid.SampledFrom([]string{"H1", "H1", "H1", "", "R1"}).Draw(t, "instrument")
			r.Body.Temp.Text = rapid.SampledFrom([]string{"12.5", "17", "20", "23", "30"}).Draw(t, "temp")
			r.Void = rapid.IntRange(0, 9).Draw(t, "void") == 0
		}
		some := season.Of(rec, book).Course
		slices.Reverse(rec.Readings)
		all := season.Of(rec, book).Course
		if (some == nil) != (all == nil) {
			t.Fatalf("%v, of all values %v", some, all)
		}
		if some == nil {
			return
		}
		found++
		if math.Abs(some.Midpoint-all.Midpoint) > 1e-3 || math.Abs(some.Rate-all.Rate) > 1e-3*all.Rate {
			t.Fatalf("%+v, of all values %+v", *some, *all)
		}
	})
	if found == 0 {
		t.Error("no course was found")
	}
}

func TestCourseThatBeginsLate(t *testing.T) {
	// A fall that begins after 20 readings.
	var late []sg
	for k := range 30 {
		text := "1.048"
		if k >= 20 {
			text = []string{"1.038", "1.028", "1.018", "1.008"}[min(k-20, 3)]
		}
		late = append(late, sg{float64(k+1) / 4, text})
	}
	c := season.Of(ofGeneration(closed(record("LB-9", "1.048", late...)), 1), nil).Course
	if c == nil {
		t.Fatal("no course")
	}
	// The reading of 1.028 is the 22nd, at 22/4 days.
	near(t, "midpoint", c.Midpoint, 132, 0.01)
}

// What a course costs: the same batch as in BenchmarkRow, its generation known.
func BenchmarkRowWithCourse(b *testing.B) {
	rec := ofGeneration(many(1, 40)[0], 2)
	for b.Loop() {
		if row := season.Of(rec, nil); row.Course == nil {
			b.Fatal("no course")
		}
	}
}
