package curve

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

func anyParams(t *rapid.T) Params {
	return Params{
		AA:    rapid.Float64Range(minAA, maxAA).Draw(t, "AA"),
		LnT50: rapid.Float64Range(0, 7).Draw(t, "ln t50"),
		Phi:   rapid.Float64Range(-8, 6).Draw(t, "phi"),
		LnS:   rapid.Float64Range(-5, 5).Draw(t, "ln s"),
	}
}

func TestCourseFallsFromOGToFG(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := anyParams(t)
		og := rapid.Float64Range(5, 150).Draw(t, "OG")
		if y := p.At(og, 0); y != og {
			t.Fatalf("%g at pitching, wanted the original gravity %g", y, og)
		}
		before := og
		for h := 0.5; h < 1e5; h *= 1.4 {
			y := p.At(og, h)
			if !finite(y) || y > before+1e-9 || y < p.FG(og)-1e-9 {
				t.Fatalf("%g at hour %g after %g, wanted a fall to %g", y, h, before, p.FG(og))
			}
			before = y
		}
		if y := p.At(og, math.Inf(1)); math.Abs(y-p.FG(og)) > 1e-9 {
			t.Fatalf("%g in the end, wanted %g", y, p.FG(og))
		}
	})
}

// By definition half of the fall is gone at t50.
func TestHalfOfTheFallAtT50(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := anyParams(t)
		y, want := p.At(50, math.Exp(p.LnT50)), 50-p.AA*50/2
		if math.Abs(y-want) > 1e-6 {
			t.Fatalf("%g at t50, wanted %g", y, want)
		}
	})
}

func TestTimeToTurnsTheCourseRound(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := anyParams(t)
		og := rapid.Float64Range(20, 120).Draw(t, "OG")
		share := rapid.Float64Range(0.01, 0.99).Draw(t, "share left")
		delta := share * p.AA * og
		h := p.TimeTo(og, delta)
		if !finite(h) || h < 0 {
			t.Fatalf("hour %g, wanted a time", h)
		}
		if y := p.At(og, h); math.Abs(y-p.FG(og)-delta) > 1e-6*og {
			t.Fatalf("%g points left at the time for %g", y-p.FG(og), delta)
		}
	})
	if h := (Params{AA: 0.02, LnT50: 4}).TimeTo(50, 2); h != 0 { // the whole fall is 1 point
		t.Errorf("hour %g for more than the whole fall, wanted 0", h)
	}
}

// With s = 1 the course is the logistic: E = e^{-BM}, so that
// (1+E)/(1+E·e^{Bt}) is the logistic over its value at 0.
func TestUptakeAsFastAsGrowthIsTheLogistic(t *testing.T) {
	const b, m = 0.1, 40.0
	// t50 solves (1+E)/(1+E·e^{B·t50}) = 1/2: E·e^{B·t50} = 1+2E.
	e := math.Exp(-b * m)
	t50 := math.Log((1+2*e)/e) / b
	p := Params{AA: 0.8, LnT50: math.Log(t50), Phi: math.Log(b*t50/math.Ln2 - 1)}
	for _, h := range []float64{0, 10, 40, 80, 200} {
		want := 50 - 40*(1-(1+e)/(1+e*math.Exp(b*h)))
		if y := p.At(50, h); math.Abs(y-want) > 1e-9 {
			t.Errorf("%.9f at hour %g, wanted the logistic's %.9f", y, h, want)
		}
	}
}

func TestRateIsTheSlope(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := Params{
			AA: 0.8, LnT50: rapid.Float64Range(2.5, 5.5).Draw(t, "ln t50"),
			Phi: rapid.Float64Range(-2, 2).Draw(t, "phi"), LnS: rapid.Float64Range(-2, 1).Draw(t, "ln s"),
		}
		h := rapid.Float64Range(5, 200).Draw(t, "hours")
		slope := (p.At(50, h-0.01) - p.At(50, h+0.01)) / 0.02 * 24
		if r := p.Rate(50, h); math.Abs(r-slope) > 1e-3*(1+r) {
			t.Fatalf("%g points a day, the difference gives %g", r, slope)
		}
		gone := (50 - p.At(50, h)) / 50
		if r := p.RateAt(50, gone); gone > 0.01 && gone < 0.79 && math.Abs(r-slope) > 1e-2*(1+r) {
			t.Fatalf("%g points a day at attenuation %g, wanted %g", r, gone, slope)
		}
	})
}
