package season_test

import (
	"fmt"
	"math"
	"math/rand/v2"
	"slices"
	"testing"

	"github.com/google/go-cmp/cmp"

	"gylebook/attenuation"
	"gylebook/attenuation/control"
	"gylebook/attenuation/season"
	"gylebook/gravity"
)

// closedRow is a closed batch with its figures, pitched so many days after the first.
func closedRow(id string, day int, apparent float64) season.Row {
	abv := gravity.VolPct(apparent / 16)
	return season.Row{
		Batch: id, Product: "Lane Bitter", Yeast: "house ale", Pitched: pitched.AddDate(0, 0, day),
		Attenuation: &attenuation.Attenuation{Apparent: apparent, Real: 0.8 * apparent}, ABV: &abv,
	}
}

// closedRows are closed batches pitched a day apart.
func closedRows(apparent ...float64) []season.Row {
	rows := make([]season.Row, len(apparent))
	for k, x := range apparent {
		rows[k] = closedRow(fmt.Sprintf("B%03d", k+1), k, x)
	}
	return rows
}

// 78, 79, 77, 80, 78, 79: by hand the centre is 471/6 = 78.5, the mean moving range
// 9/5 = 1.8, the limits 78.5 ± 4.787. Figures in proportion have limits in
// proportion: real 0.8 times, alcohol a sixteenth.
func TestChartsByHand(t *testing.T) {
	rows := closedRows(78, 79, 77, 80, 78, 79)
	// Neither an open batch nor one without figures is a point.
	open := closedRow("B007", 7, 60)
	open.Open = true
	broken := closedRow("B008", 2, 0)
	broken.Attenuation, broken.ABV = nil, nil
	// Primed under a rule that has no strength for it: attenuation alone.
	weak := closedRow("Z1", 0, 75)
	weak.Product, weak.ABV = "Night Porter", nil
	rows = append(rows, open, broken, weak)
	rand.New(rand.NewPCG(3, 4)).Shuffle(len(rows), func(i, j int) { rows[i], rows[j] = rows[j], rows[i] })
	charts := season.Charts(rows, control.Default)
	if len(charts) != 6 {
		t.Fatalf("%d charts, wanted three of each of two products", len(charts))
	}
	for k, scale := range []float64{1, 0.8, 1.0 / 16} {
		c := charts[k]
		if c.Product != "Lane Bitter" || int(c.Figure) != k || c.Closed != 7 || c.LeftOut != 1 || !c.TooFew() || c.FalseAlarms.Seasons != 0 {
			t.Errorf("%+v", c)
		}
		if diff := cmp.Diff([]string{"B001", "B002", "B003", "B004", "B005", "B006"}, c.Batches); diff != "" {
			t.Error(diff)
		}
		near(t, "centre", c.Chart.Centre, 78.5*scale, 1e-9)
		near(t, "lower limit", c.Chart.Lower, 73.7*scale, 0.05*scale)
		near(t, "upper limit", c.Chart.Upper, 83.3*scale, 0.05*scale)
	}
	for k, points := range []int{1, 1, 0} {
		c := charts[3+k]
		if c.Product != "Night Porter" || len(c.Values) != points || c.LeftOut != 1-points || c.Chart != nil || !c.TooFew() {
			t.Errorf("%+v", c)
		}
	}
	if got := season.Charts(nil, control.Default); len(got) != 0 {
		t.Errorf("%+v of no batch", got)
	}
}

// Fifteen have limits, and the batch that leaves them is found by its place in the
// order of pitching.
func TestChartFindsTheBatch(t *testing.T) {
	level := slices.Repeat([]float64{78, 79}, 8)[:15]
	level[9] = 60
	rows := closedRows(level...)
	slices.Reverse(rows)
	c := season.Charts(rows, control.Of(1))[0]
	// Steps: twelve of 1, and from 78 to 60 to 78; mean 48/14 = 3.43; the centre is
	// (14·78.5-0.5-... )/15 about 77.2, the lower limit 77.2 - 9.1 = 68.
	if c.TooFew() || len(c.Chart.Broken) != 1 || c.Batches[c.Chart.Broken[0].Point] != "B010" {
		t.Errorf("%+v", c.Chart)
	}
	if c.FalseAlarms.N != 15 || !(c.FalseAlarms.Share > 0 && c.FalseAlarms.Share < 0.1) {
		t.Errorf("%+v", c.FalseAlarms)
	}
}

// Seasons to which nothing happened, put through the charts: as many of them show
// something as the charts say, within four standard deviations.
func TestFalseAlarmsOfHealthySeasons(t *testing.T) {
	const seasons, n = 2000, 30
	random := rand.New(rand.NewPCG(30, 1984))
	alarms, rate := 0, control.Rate{}
	rows := closedRows(make([]float64, n)...)
	var healthy control.Healthy
	want := healthy.Rate(n, control.Default)
	for s := range seasons {
		points := make([]float64, n)
		for k := range rows {
			points[k] = 78 + 1.2*random.NormFloat64()
			rows[k].Attenuation = &attenuation.Attenuation{Apparent: points[k]}
		}
		if s == 0 {
			rate = season.Charts(rows, control.Default)[0].FalseAlarms
		}
		c, err := control.Individuals(points, control.Default)
		if err != nil {
			t.Fatal(err)
		}
		if len(c.Broken) > 0 {
			alarms++
		}
	}
	if rate != want {
		t.Errorf("the chart says %+v, simulated %+v", rate, want)
	}
	share := float64(alarms) / seasons
	near(t, "share of healthy seasons with an alarm", rate.Share, share, 4*math.Hypot(rate.Error, math.Sqrt(share*(1-share)/seasons)))
}

func BenchmarkCharts(b *testing.B) {
	random := rand.New(rand.NewPCG(5, 6))
	rows := closedRows(make([]float64, 10000)...)
	for k := range rows {
		rows[k].Attenuation.Apparent = 78 + random.NormFloat64()
		rows[k].Generation = 1 + k%8
	}
	for b.Loop() {
		if charts := season.Charts(rows, control.Default); charts[0].TooFew() {
			b.Fatal("too few")
		}
		if l := season.Lineages(rows); l[0].Apparent.TooFew {
			b.Fatal("too few")
		}
	}
}
