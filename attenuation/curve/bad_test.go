package curve

import (
	"errors"
	"math"
	"math/rand/v2"
	"testing"

	"gylebook/gravity/method"

	"pgregory.net/rapid"
)

func readingsOf(values ...float64) []Reading {
	var rs []Reading
	for k := 0; k+1 < len(values); k += 2 {
		rs = append(rs, Reading{Hours: values[k], Points: values[k+1], U: 0.5})
	}
	return rs
}

func sane(t interface{ Errorf(string, ...any) }, f Forecast) {
	for _, i := range []Interval{f.FG, f.Hours, f.GravityAt(0), f.GravityAt(100), f.GravityAt(1e9), f.Rate()} {
		if !finite(i.Lo) || !finite(i.Median) || !finite(i.Hi) || i.Lo > i.Median || i.Median > i.Hi {
			t.Errorf("interval %+v is none", i)
		}
	}
	if !finite(f.ESS) || f.ESS < 0 {
		t.Errorf("effective sample size %g", f.ESS)
	}
}

func TestOddReadingsGetAnAnswer(t *testing.T) {
	cases := map[string][]Reading{
		"none":            nil,
		"two":             readingsOf(0, 50, 30, 40),
		"all at the OG":   readingsOf(0, 50, 24, 50, 48, 50, 72, 50),
		"all equal low":   readingsOf(0, 12, 24, 12, 48, 12, 72, 12),
		"rising":          readingsOf(0, 40, 24, 44, 48, 49, 72, 55),
		"up and down":     readingsOf(0, 50, 24, 20, 48, 48, 72, 15, 96, 45),
		"all at one hour": readingsOf(10, 50, 10, 40, 10, 30),
		"below water":     readingsOf(0, 50, 24, -20, 48, -50),
		"far too high":    readingsOf(0, 250, 24, 250, 48, 250),
		"very late":       readingsOf(90000, 12, 90024, 12, 90048, 12),
	}
	for name, rs := range cases {
		for _, past := range [][]Fitted{nil, {aCourse(0.75)}} {
			for _, kind := range []Kind{Beer, Wine} {
				f, err := NewPrior(kind, past).Forecast(Batch{OG: 50, Readings: rs}, 1e5)
				if err != nil {
					t.Errorf("%s: %v", name, err)
					continue
				}
				sane(t, f)
				e, err := NewPrior(kind, past).Evidence(Batch{OG: 50, Readings: rs}, 1e5, Watch{})
				if err != nil || e.State == "" || !finite(e.Slope.NotExcluded) {
					t.Errorf("%s: evidence %+v, %v", name, e, err)
				}
			}
		}
	}
}

func TestMisfitWidens(t *testing.T) {
	good, err := NewPrior(Beer, nil).Forecast(falling(), 200)
	if err != nil {
		t.Fatal(err)
	}
	for name, rs := range map[string][]Reading{
		"rising":      readingsOf(0, 40, 24, 44, 48, 49, 72, 55),
		"up and down": readingsOf(0, 50, 24, 20, 48, 48, 72, 15, 96, 45, 120, 20),
	} {
		f, err := NewPrior(Beer, nil).Forecast(Batch{OG: 50, Readings: rs}, 200)
		if err != nil {
			t.Fatal(err)
		}
		if !(width(f.GravityAt(110)) > width(good.GravityAt(110))) {
			t.Errorf("%s: %+v is not wider than %+v of a clean course", name, f.GravityAt(110), good.GravityAt(110))
		}
	}
}

func TestOneWildReadingLosesItsWeight(t *testing.T) {
	past := history(t, rand.New(rand.NewPCG(5, 6)), 5)
	clean := Batch{OG: 50, UOG: 0.5, Readings: readingsOf(0, 50, 24, 44, 48, 27, 72, 17, 96, 13)}
	wild := clean
	wild.Readings = append(readingsOf(60, 60), clean.Readings...)
	a, err := NewPrior(Beer, past).Forecast(clean, 200)
	if err != nil {
		t.Fatal(err)
	}
	b, err := NewPrior(Beer, past).Forecast(wild, 200)
	if err != nil {
		t.Fatal(err)
	}
	if math.Abs(a.FG.Median-b.FG.Median) > 1 {
		t.Errorf("a reading of 60 among a fall to 13 moves the end from %.2f to %.2f", a.FG.Median, b.FG.Median)
	}
}

func TestReadingsOfOneVisitAreOne(t *testing.T) {
	b := Batch{OG: 50, Readings: readingsOf(0, 50, 20, 46, 20, 46, 20, 46)}
	f, err := NewPrior(Beer, nil).Forecast(b, 200)
	if err != nil {
		t.Fatal(err)
	}
	if f.N != 2 || f.Curve {
		t.Errorf("%d readings, curve %v: three of one visit count as one", f.N, f.Curve)
	}
	m := merged(readingsOf(20, 40, 20, 48), true)
	if m.Points != 44 || m.U != 4 {
		t.Errorf("%+v: wanted 44 with half of the difference, 4", m)
	}
}

func TestReadingsBeforePitchingAndAfterNow(t *testing.T) {
	b := falling()
	want, err := NewPrior(Beer, nil).Forecast(b, 200)
	if err != nil {
		t.Fatal(err)
	}
	b.Readings = append(b.Readings, readingsOf(-5, 52, 300, 9)...)
	got, err := NewPrior(Beer, nil).Forecast(b, 200)
	if err != nil {
		t.Fatal(err)
	}
	if got.FG != want.FG || got.N != 4 {
		t.Errorf("%+v with readings before pitching and after now, %+v without", got.FG, want.FG)
	}
	if !says(got.Notes, method.Interpreted, "before pitching") || !says(got.Notes, method.Interpreted, "after the moment") {
		t.Errorf("notes %v do not say what was set aside", got.Notes)
	}
}

func TestLoggerIsBinned(t *testing.T) {
	p := Params{AA: 0.78, LnT50: 3.9, Phi: 0.8, LnS: -0.5}
	rng := rand.New(rand.NewPCG(3, 4))
	b := Batch{OG: 50, UOG: 0.5}
	for k := range 10000 {
		h := float64(k) * 0.02
		b.Readings = append(b.Readings, Reading{Hours: h, Points: p.At(50, h) + 0.3*rng.NormFloat64(), U: 0.5})
	}
	f, err := NewPrior(Beer, nil).Forecast(b, 1000)
	if err != nil {
		t.Fatal(err)
	}
	if f.N > maxBins+1 || !says(f.Notes, method.Interpreted, "binned") {
		t.Errorf("%d readings used, notes %v", f.N, f.Notes)
	}
	if math.Abs(f.FG.Median-p.FG(50)) > 0.5 {
		t.Errorf("end %.2f, the logger's course ends at %.2f", f.FG.Median, p.FG(50))
	}
	if width(f.FG) < 0.5 {
		t.Errorf("%+v: ten thousand readings do not average an instrument's error away", f.FG)
	}
}

func TestRefusals(t *testing.T) {
	prior := NewPrior(Beer, nil)
	for _, og := range []float64{0, -3, math.NaN(), math.Inf(1), 1050} {
		if _, err := prior.Forecast(Batch{OG: og, Readings: falling().Readings}, 200); !errors.Is(err, ErrNoOG) {
			t.Errorf("original gravity %g: %v, wanted ErrNoOG", og, err)
		}
	}
	var out *method.RangeError
	for _, r := range []Reading{
		{Hours: math.NaN(), Points: 20},
		{Hours: 1e9, Points: 20},
		{Hours: 5, Points: math.NaN()},
		{Hours: 5, Points: 1020},
		{Hours: 5, Points: 20, U: -1},
		{Hours: 5, Points: 20, Division: math.Inf(1)},
	} {
		if _, err := prior.Forecast(Batch{OG: 50, Readings: []Reading{r}}, 200); !errors.As(err, &out) {
			t.Errorf("reading %+v: %v, wanted a range error", r, err)
		}
	}
	if _, err := prior.Forecast(falling(), math.NaN()); !errors.As(err, &out) {
		t.Errorf("now NaN: %v, wanted a range error", err)
	}
	if _, err := prior.Forecast(Batch{OG: 50, UOG: math.NaN()}, 5); !errors.As(err, &out) {
		t.Errorf("uncertainty NaN: %v, wanted a range error", err)
	}
	for _, w := range []Watch{{From: -1}, {Crash: math.NaN()}, {Limit: math.NaN(), LimitKnown: true}} {
		if _, err := prior.Evidence(falling(), 200, w); !errors.As(err, &out) {
			t.Errorf("watch %+v: %v, wanted a range error", w, err)
		}
	}
}

func TestZeroPriorIsACoolOne(t *testing.T) {
	f, err := Prior{}.Forecast(falling(), 200)
	if err != nil {
		t.Fatal(err)
	}
	want, err := NewPrior(Beer, nil).Forecast(falling(), 200)
	if err != nil {
		t.Fatal(err)
	}
	if f.FG != want.FG {
		t.Errorf("%+v from the zero prior, %+v from the cold one", f.FG, want.FG)
	}
}

func TestAnyReadingsGetASaneAnswer(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		b := Batch{OG: rapid.Float64Range(1, 250).Draw(t, "OG"), UOG: rapid.Float64Range(0, 5).Draw(t, "u OG")}
		for range rapid.IntRange(0, 9).Draw(t, "n") {
			b.Readings = append(b.Readings, Reading{
				Hours:    rapid.Float64Range(-10, 3000).Draw(t, "hours"),
				Points:   rapid.Float64Range(-60, 250).Draw(t, "points"),
				U:        rapid.Float64Range(0, 50).Draw(t, "u"),
				Division: rapid.Float64Range(0, 5).Draw(t, "division"),
			})
		}
		e, err := NewPrior(Kind(rapid.IntRange(0, 3).Draw(t, "kind")), nil).Evidence(b, 2000, Watch{})
		if err != nil {
			t.Fatal(err)
		}
		sane(t, e.Forecast)
	})
}
