package outlook_test

import (
	"fmt"
	"math"
	"reflect"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"gylebook/attenuation"
	"gylebook/attenuation/journal"
	"gylebook/attenuation/outlook"
	"gylebook/gravity"
)

// A course like those of the history, cut in its middle, ends within the interval.
func TestForecastFindsTheEnd(t *testing.T) {
	h := ales(t)
	f := forecast(t, course(10, 46, 204), h, 60)
	if f.Curve.N != 5 || f.Curve.History != 6 || !f.Curve.Curve || len(f.History.Batches) != 6 {
		t.Errorf("%d readings, history of %d %v, curve %v", f.Curve.N, f.Curve.History, f.History.Batches, f.Curve.Curve)
	}
	fg, ok := f.FG()
	if !ok || !contains(fg, 1.010) || fg.Hi-fg.Lo > 0.010 {
		t.Errorf("final gravity %+v, wanted 1.010 in it", fg)
	}
	// 38 points fall; 2 are left where (1+e^{0.08(t-46)}) = 19, at 46 + ln 18/0.08 h.
	want := after(46 + math.Log(18)/0.08)
	if at, ok := f.Terminal(); !ok || want.Before(at.Lo) || want.After(at.Hi) || !at.Lo.Before(at.Hi) {
		t.Errorf("terminal %v (%v to %v), wanted %v in it", at.Median, at.Lo, at.Hi, want)
	}
	next, ok := f.Next(after(66))
	if truth := 1 + (10+38/(1+math.Exp(0.08*(66-46))))/1000; !ok || !contains(next, truth) {
		t.Errorf("expected at hour 66 %+v, wanted %v in it", next, truth)
	}
}

// The strength at the end is that of the default method at the gravities shown.
func TestForecastStrength(t *testing.T) {
	f := forecast(t, course(10, 46, 204), ales(t), 60)
	fg, _ := f.FG()
	abv, ok := f.ABV()
	of := func(sg float64) float64 {
		g, err := attenuation.NewGravities(1.048, gravity.SG(sg), gravity.Fits.Default())
		if err != nil {
			t.Fatal(err)
		}
		a, err := attenuation.ABVMethods.Default().Fn(g)
		if err != nil {
			t.Fatal(err)
		}
		return float64(a.ABV)
	}
	// Strength falls with the final gravity, so the ends of the interval swap.
	for _, c := range [][2]float64{{abv.Median, of(fg.Median)}, {abv.Lo, of(fg.Hi)}, {abv.Hi, of(fg.Lo)}} {
		if !ok || math.Abs(c[0]-c[1]) > 0.01 {
			t.Errorf("strength %v, wanted %v", c[0], c[1])
		}
	}
}

// Below three readings the finished batches alone speak, and no time is given.
func TestForecastBelowThreeReadings(t *testing.T) {
	h := ales(t)
	for _, words := range []string{"", "24:1.040", "24:1.040 48:1.024", "24:1.040 48:1.024 48:1.024"} {
		f := forecast(t, words, h, 60)
		fg, ok := f.FG()
		if f.Curve.Curve || !ok || !contains(fg, 1.010) {
			t.Errorf("%q: curve %v, final gravity %+v, wanted that of the history", words, f.Curve.Curve, fg)
		}
		if _, ok := f.Terminal(); ok {
			t.Errorf("%q: a time of the end", words)
		}
		if _, ok := f.Next(after(60)); ok {
			t.Errorf("%q: an expected gravity", words)
		}
		if len(f.Notes()) == 0 {
			t.Errorf("%q: no note says so", words)
		}
	}
}

func TestNextWhereTheCurveHolds(t *testing.T) {
	h := ales(t)
	words := course(10, 46, 84)
	for _, c := range []struct {
		words string
		at    float64
		want  bool
	}{
		{words, 90, true},
		{words + " 86:dry-hop", 90, true},
		{words + " 86:crash", 90, false},
		{words + " 86:priming", 90, false},
		{words + " 86:sugar", 90, false},
	} {
		if _, ok := forecast(t, c.words, h, c.at).Next(after(c.at)); ok != c.want {
			t.Errorf("%q: expected gravity given: %v, wanted %v", strings.TrimPrefix(c.words, words), ok, c.want)
		}
	}
	if _, ok := forecast(t, words, h, 90).Next(after(60)); ok {
		t.Error("a gravity is expected before the last reading")
	}
}

// The wrong-tank check goes by the straight line where something was added since.
func TestExpect(t *testing.T) {
	h := ales(t)
	words := course(10, 46, 84)
	sg, sd, ok := outlook.Expect(view(words), h, after(96))
	if truth := 1 + (10+38/(1+math.Exp(0.08*50)))/1000; !ok || math.Abs(sg-truth) > 3*sd || sd < 0.001 || sd > 0.003 {
		t.Errorf("expected %v ± %v, %v; wanted %v and 1 to 3 points", sg, sd, ok, truth)
	}
	for _, more := range []string{" 90:dry-hop", " 90:sugar", " 90:crash"} {
		if _, _, ok := outlook.Expect(view(words+more), h, after(96)); ok {
			t.Errorf("%q: an answer", more)
		}
	}
	for _, short := range []string{"", "24:1.040 48:1.024"} {
		if _, _, ok := outlook.Expect(view(short), h, after(60)); ok {
			t.Errorf("%q: an answer from fewer than three readings", short)
		}
	}
	// Readings that came later are not asked.
	later, _, _ := outlook.Expect(view(words+" 108:1.040"), h, after(96))
	if later != sg {
		t.Errorf("expected %v with a later reading, %v without", later, sg)
	}
}

func TestForecastTwiceIsTheSame(t *testing.T) {
	words := course(10, 46, 72)
	a, b := evidence(t, words, ales(t), 80), evidence(t, words, ales(t), 80)
	if !reflect.DeepEqual(a.Weighed, b.Weighed) || !reflect.DeepEqual(a.Facts, b.Facts) {
		t.Errorf("evidence differs between two runs:\n%+v\n%+v", a.Weighed, b.Weighed)
	}
}

// Bad readings widen the interval or make a clear refusal, and no figure is NaN.
func TestBadReadings(t *testing.T) {
	h := ales(t)
	good, _ := forecast(t, course(10, 46, 60), h, 70).FG()
	for name, words := range map[string]string{
		"all equal":       "12:1.030 24:1.030 36:1.030 48:1.030 60:1.030",
		"rising":          "12:1.020 24:1.024 36:1.028 48:1.032 60:1.036",
		"equal to the OG": "12:1.048 24:1.048 36:1.048",
		"duplicates":      "12:1.046 12:1.046 12:1.046 24:1.040 24:1.040 36:1.034 36:1.034",
		"one outlier":     "12:1.0455 24:1.0423 36:1.0800 48:1.0270 60:1.0195",
	} {
		e := evidence(t, words, h, 70)
		fg, ok := e.Forecast.FG()
		if !ok || !(fg.Lo <= fg.Median && fg.Median <= fg.Hi) {
			t.Errorf("%s: final gravity %+v, %v", name, fg, ok)
		}
		if wide := fg.Hi - fg.Lo; (name == "all equal" || name == "rising") && wide < good.Hi-good.Lo {
			t.Errorf("%s: interval %v wide, wanted wider than the %v of a good course", name, wide, good.Hi-good.Lo)
		}
		finiteAll(t, name, e)
	}
	// Where pitching is known, a reading from before it is set aside.
	f := forecast(t, "-5:1.048 12:1.0455 24:1.0423 36:1.0354", h, 70)
	if f.Curve.N != 3 || !strings.Contains(fmt.Sprint(f.Notes()), "1 reading before pitching set aside") {
		t.Errorf("%d readings, notes %v", f.Curve.N, f.Notes())
	}
}

func finiteAll(t testing.TB, name string, e outlook.Evidence) {
	t.Helper()
	fg, _ := e.Forecast.FG()
	abv, _ := e.Forecast.ABV()
	next, _ := e.Forecast.Next(e.Forecast.Course.Now)
	for what, x := range map[string]float64{
		"fg": fg.Median, "fg low": fg.Lo, "fg high": fg.Hi, "abv": abv.Median, "abv low": abv.Lo, "abv high": abv.Hi,
		"next": next.Median, "left": e.Left, "co2": e.CO2GPL, "volumes": e.CO2Volumes,
		"slope": e.Weighed.Slope.PerDay, "not excluded": e.Weighed.Slope.NotExcluded, "probability": e.Weighed.Left,
	} {
		if math.IsNaN(x) || math.IsInf(x, 0) {
			t.Errorf("%s: %s is %v", name, what, x)
		}
	}
	if at, ok := e.Forecast.Terminal(); ok && (at.Hi.Before(at.Median) || at.Median.Before(at.Lo)) {
		t.Errorf("%s: terminal %v (%v to %v)", name, at.Median, at.Lo, at.Hi)
	}
}

// Whatever was typed, there is an answer without NaN or a refusal.
func TestAnyBatch(t *testing.T) {
	h := ales(t)
	rapid.Check(t, func(t *rapid.T) {
		var words []string
		for range rapid.IntRange(0, 12).Draw(t, "n") {
			hours := rapid.Float64Range(-20, 400).Draw(t, "hours")
			if rapid.IntRange(0, 6).Draw(t, "kind") == 0 {
				words = append(words, fmt.Sprintf("%.2f:%s", hours, rapid.SampledFrom(journal.EventKinds).Draw(t, "event")))
				continue
			}
			words = append(words, fmt.Sprintf("%.2f:%.4f", hours, rapid.Float64Range(0.985, 1.170).Draw(t, "sg")))
		}
		now := after(rapid.Float64Range(-10, 500).Draw(t, "now"))
		e, err := outlook.EvidenceOf(view(strings.Join(words, " ")), h, now, rapid.Bool().Draw(t, "slow"))
		if err != nil {
			if _, refused := err.(*outlook.Refusal); !refused {
				t.Fatalf("%v: %v", words, err)
			}
			return
		}
		fg, _ := e.Forecast.FG()
		abv, _ := e.Forecast.ABV()
		for _, x := range []float64{fg.Lo, fg.Median, fg.Hi, abv.Lo, abv.Median, abv.Hi, e.Left, e.CO2GPL, e.Weighed.Slope.NotExcluded} {
			if math.IsNaN(x) || math.IsInf(x, 0) {
				t.Fatalf("%v: a figure is %v", words, x)
			}
		}
		if e.Weighed.State == "" || len(e.Facts) != 5 {
			t.Fatalf("%v: word %q with %d facts", words, e.Weighed.State, len(e.Facts))
		}
	})
}

// Without a pitching time the first reading begins the course.
func TestNoPitching(t *testing.T) {
	rec := batch("B1", "12:1.046 24:1.042 36:1.036 48:1.027")
	rec.Batch.Pitched = nil
	f, err := outlook.Of(journal.Derive(rec, nil), ales(t), after(50))
	if err != nil || f.Curve.N != 4 || !strings.Contains(fmt.Sprint(f.Notes()), "pitching not entered") {
		t.Errorf("%d readings, notes %v, error %v", f.Curve.N, f.Notes(), err)
	}
	rec.Readings = nil
	f, err = outlook.Of(journal.Derive(rec, nil), ales(t), after(50))
	if fg, ok := f.FG(); err != nil || !ok || f.Curve.Curve || fg.Median < 1 {
		t.Errorf("without a reading: %+v, %v", fg, err)
	}
	if _, ok := f.Terminal(); ok {
		t.Error("without a reading: a time of the end")
	}
}

func BenchmarkHistory(b *testing.B) {
	r := &reader{}
	for k := range 20 {
		r.records = append(r.records, closed(batch(fmt.Sprintf("A%d", k), course(9+0.1*float64(k), 45, 204)), 220))
	}
	for b.Loop() {
		if _, err := outlook.HistoryOf(b.Context(), r, journal.NewBook(nil), "P", "Y", after(1000), outlook.Drink{}); err != nil {
			b.Fatal(err)
		}
	}
}

func BenchmarkEvidence(b *testing.B) {
	h, v := ales(b), view(course(10, 46, 72))
	for b.Loop() {
		if _, err := outlook.EvidenceOf(v, h, after(80), false); err != nil {
			b.Fatal(err)
		}
	}
}
