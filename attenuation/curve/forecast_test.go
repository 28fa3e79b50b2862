package curve

import (
	"encoding/json"
	"math"
	"math/rand/v2"
	"reflect"
	"strings"
	"testing"

	"gylebook/gravity/method"
)

// simulated draws a batch of the same law as the curve, read every 10 to 26 h
// with errors of half a point.
func simulated(rng *rand.Rand) (Params, Batch) {
	p := Params{
		AA: 0.78 + 0.025*rng.NormFloat64(), LnT50: 3.9 + 0.2*rng.NormFloat64(),
		Phi: 0.8 + 0.3*rng.NormFloat64(), LnS: -0.5 + 0.3*rng.NormFloat64(),
	}
	b := Batch{OG: 45 + 20*rng.Float64(), UOG: 0.5}
	end := p.TimeTo(b.OG, 0.5)
	for h := 0.0; h < end+60; h += 10 + 16*rng.Float64() {
		b.Readings = append(b.Readings, Reading{Hours: h, Points: p.At(b.OG, h) + 0.5*rng.NormFloat64(), U: 0.5})
	}
	return p, b
}

func history(t testing.TB, rng *rand.Rand, n int) []Fitted {
	t.Helper()
	cold := NewPrior(Beer, nil)
	var past []Fitted
	for range n {
		p, b := simulated(rng)
		f, err := FitFinished(b, p.FG(b.OG), 0.3, cold, cold.Options())
		if err != nil {
			t.Fatal(err)
		}
		past = append(past, f)
	}
	return past
}

// The intervals must hold the truth as often as they say, within what 200 and
// more courses show, and the medians must beat the history's mean attenuation.
func TestCoverageOnSimulatedCourses(t *testing.T) {
	courses := 240
	if testing.Short() {
		courses = 60
	}
	rng := rand.New(rand.NewPCG(11, 12))
	inFG, inTime, inNext, n, nNext := 0, 0, 0, 0, 0
	for range courses {
		prior := NewPrior(Beer, history(t, rng, 5))
		p, b := simulated(rng)
		k := 3 + rng.IntN(3)
		f, err := prior.Forecast(Batch{OG: b.OG, UOG: b.UOG, Readings: b.Readings[:k]}, b.Readings[k-1].Hours)
		if err != nil {
			t.Fatal(err)
		}
		n++
		inFG += holds(f.FG, p.FG(b.OG))
		if at := p.TimeTo(b.OG, 2); at > b.Readings[k-1].Hours {
			nNext++
			inTime += holds(f.Hours, at)
			inNext += holds(f.GravityAt(b.Readings[k].Hours), b.Readings[k].Points)
		}
	}
	t.Logf("inside: final gravity %d of %d; time %d, next reading %d of %d", inFG, n, inTime, inNext, nNext)
	for _, c := range []struct {
		what  string
		share float64
	}{
		{"final gravity", float64(inFG) / float64(n)},
		{"next reading", float64(inNext) / float64(nNext)},
	} {
		// Of 60 courses all may lie inside a good interval; of 240 not.
		if c.share < 0.80 || c.share > 0.97 && !testing.Short() {
			t.Errorf("%s: %.3f of %d inside the 90 %% interval, wanted 0.80 to 0.97", c.what, c.share, n)
		}
	}
	// The widening of the time is for the error of the curve, which a course of
	// the same law does not have, so it may hold more.
	if share := float64(inTime) / float64(nNext); share < 0.80 {
		t.Errorf("time: %.3f of %d inside the 90 %% interval, wanted at least 0.80", share, nNext)
	}
}

func holds(i Interval, x float64) int {
	if x >= i.Lo && x <= i.Hi {
		return 1
	}
	return 0
}

func TestForecastIsTheSameTwice(t *testing.T) {
	rng := rand.New(rand.NewPCG(1, 2))
	past := history(t, rng, 5)
	_, b := simulated(rng)
	b.Readings = b.Readings[:4]
	one, err := NewPrior(Beer, past).Forecast(b, 500)
	if err != nil {
		t.Fatal(err)
	}
	two, err := NewPrior(Beer, past).Forecast(b, 500)
	if err != nil {
		t.Fatal(err)
	}
	if !reflect.DeepEqual(one, two) || one.GravityAt(90) != two.GravityAt(90) {
		t.Error("two forecasts of the same readings differ")
	}
	b.Readings[0], b.Readings[2] = b.Readings[2], b.Readings[0]
	three, err := NewPrior(Beer, past).Forecast(b, 500)
	if err != nil {
		t.Fatal(err)
	}
	if one.FG != three.FG || one.Hours != three.Hours {
		t.Error("the order in which the readings are listed matters")
	}
	if _, err := json.Marshal(one); err != nil {
		t.Error(err)
	}
}

func TestBelowThreeReadingsOnlyHistorySpeaks(t *testing.T) {
	past := []Fitted{aCourse(0.70), aCourse(0.71), aCourse(0.69), aCourse(0.70), aCourse(0.70)}
	b := Batch{OG: 50, Readings: []Reading{{Hours: 0, Points: 50, U: 0.5}, {Hours: 40, Points: 20, U: 0.5}}}
	f, err := NewPrior(Beer, past).Forecast(b, 100)
	if err != nil {
		t.Fatal(err)
	}
	if f.Curve || f.N != 2 || f.History != 5 || f.Hours != (Interval{}) || f.ESS != 0 {
		t.Errorf("%+v: wanted no curve and no time", f)
	}
	if math.Abs(f.FG.Median-15) > 1 { // 50·(1-0.70)
		t.Errorf("median %.2f, wanted about 15", f.FG.Median)
	}
	if !says(f.Notes, method.NoValue, "no curve below 3") {
		t.Errorf("notes %v do not say that history alone speaks", f.Notes)
	}
	if _, ok := f.Left(2); ok {
		t.Error("a probability of what is left without a curve")
	}
	if _, ok := f.LaterThan(50); ok || f.Rate() != (Interval{}) {
		t.Error("a time or a rate without a curve")
	}
	cold, err := NewPrior(Beer, nil).Forecast(b, 100)
	if err != nil {
		t.Fatal(err)
	}
	if !says(cold.Notes, method.Assumed, "no finished batch") || !(width(cold.FG) > width(f.FG)) {
		t.Errorf("cold %+v beside %+v: wanted wider and said so", cold.FG, f.FG)
	}
}

func says(notes []method.Note, code, part string) bool {
	for _, n := range notes {
		if n.Code == code && strings.Contains(n.Text, part) {
			return true
		}
	}
	return false
}

func width(i Interval) float64 { return i.Hi - i.Lo }

func TestFigureOfTheFinalGravity(t *testing.T) {
	f, err := NewPrior(Beer, nil).Forecast(falling(), 200)
	if err != nil {
		t.Fatal(err)
	}
	abv, ok := f.Of(func(fg float64) float64 { return (50 - fg) * 0.13 })
	// Percentiles of 800 draws counted from the other end differ by one draw.
	if !ok || math.Abs(abv.Median-(50-f.FG.Median)*0.13) > 0.01 || math.Abs(abv.Hi-(50-f.FG.Lo)*0.13) > 0.01 {
		t.Errorf("%+v from %+v, wanted the figure turned round", abv, f.FG)
	}
	if _, ok := f.Of(func(float64) float64 { return math.NaN() }); ok {
		t.Error("an interval of no number")
	}
}

// falling is a batch half way down.
func falling() Batch {
	return Batch{OG: 50, UOG: 0.5, Readings: []Reading{
		{Hours: 0, Points: 50, U: 0.5},
		{Hours: 24, Points: 44, U: 0.5},
		{Hours: 48, Points: 27, U: 0.5},
		{Hours: 72, Points: 17, U: 0.5},
	}}
}

// For one draw the score is the absolute error; for two at 0 and 2 and a truth
// of 1 it is mean|x-1| - Σ(2i-n-1)x/n² = 1 - 2/4 = 0.5.
func TestScore(t *testing.T) {
	if s := Score([]float64{3}, 1); s != 2 {
		t.Errorf("%g, wanted 2", s)
	}
	if s := Score([]float64{2, 0}, 1); s != 0.5 {
		t.Errorf("%g, wanted 0.5", s)
	}
	if s := Score(nil, 1); s != 0 {
		t.Errorf("%g for no draw, wanted 0", s)
	}
}
