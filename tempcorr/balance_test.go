package tempcorr_test

import (
	"fmt"
	"math"
	"testing"

	"gylebook/gravity"
	"gylebook/tempcorr"
)

// The float solved a second time, by plain bisection, with the published
// coefficients written out: ICUMSA SPS-4 (Bubnik et al. 1995, p. 164) and the
// ITS-90 form of Kell's water (Bettin & Spieweck 1990).

func waterByHand(t float64) float64 {
	return (999.83952 + 16.952577*t - 7.9905127e-3*math.Pow(t, 2) - 46.241757e-6*math.Pow(t, 3) +
		105.84601e-9*math.Pow(t, 4) - 281.03006e-12*math.Pow(t, 5)) / (1 + 16.887236e-3*t)
}

func sucroseByHand(w, t float64) float64 {
	table := [][]float64{
		{385.1761, 135.3705, 40.9299, -3.9643, 13.4853, -17.2890},
		{-46.2720, -7.1720, 1.1597, 5.1126, 17.5254},
		{59.7712, 7.2491, 12.3630, -35.4791},
		{-47.2207, -21.6977, 27.6301},
		{18.3184, 12.3081},
	}
	rho := waterByHand(t)
	for i, row := range table {
		for k, c := range row {
			rho += c * math.Pow((t-20)/100, float64(i)) * math.Pow(w, float64(k+1))
		}
	}
	return rho
}

// bisect finds the zero of a rising function.
func bisect(f func(float64) float64, lo, hi float64) float64 {
	for range 200 {
		mid := (lo + hi) / 2
		if f(mid) < 0 {
			lo = mid
		} else {
			hi = mid
		}
	}
	return (lo + hi) / 2
}

// scaleByHand is a scale as density at t0 against mark, with its own formula.
type scaleByHand struct {
	scale   gravity.Scale
	density func(v, t0, tw float64) float64
	marks   []float64
	lo, hi  float64
}

var scalesByHand = []scaleByHand{
	{gravity.ScaleSG, func(v, _, tw float64) float64 { return v * waterByHand(tw) }, []float64{0.99, 1, 1.012, 1.05, 1.1, 1.2, 1.3}, 0.9, 1.44},
	{gravity.ScalePoints, func(v, _, tw float64) float64 { return (1 + v/1000) * waterByHand(tw) }, []float64{-5, 12, 50, 110}, -100, 440},
	{gravity.ScaleOechsle, func(v, _, tw float64) float64 { return (1 + v/1000) * waterByHand(tw) }, []float64{40, 90, 150}, -100, 440},
	{gravity.ScaleKMW, func(v, _, tw float64) float64 { return (1 + v*(0.022*v+4.54)/1000) * waterByHand(tw) }, []float64{5, 18, 30}, -20, 70},
	{gravity.ScaleTwaddell, func(v, _, tw float64) float64 { return (1 + 0.005*v) * waterByHand(tw) }, []float64{2, 18, 40}, -10, 85},
	{gravity.ScalePlato, func(v, t0, _ float64) float64 { return sucroseByHand(v/100, t0) }, []float64{-2, 0, 5, 12, 25, 45}, -25, 84},
	{gravity.ScaleBrix, func(v, t0, _ float64) float64 { return sucroseByHand(v/100, t0) }, []float64{2, 20, 60}, -25, 84},
	{gravity.ScaleDensity, func(v, _, _ float64) float64 { return v }, []float64{990, 1010, 1050, 1200}, 900, 1430},
}

// byHand is the corrected value: rho(w,t) (1 + g (t - t0)) = rho_mark gives w,
// and w at t0 gives the mark.
func (s scaleByHand) byHand(v float64, pair gravity.Pair, g, t float64) float64 {
	t0, tw := float64(pair.Sample), float64(pair.Water)
	liquid := s.density(v, t0, tw) / (1 + g*(t-t0))
	w := bisect(func(w float64) float64 { return sucroseByHand(w, t) - liquid }, -0.28, 0.85)
	rho := sucroseByHand(w, t0)
	return bisect(func(v float64) float64 { return s.density(v, t0, tw) - rho }, s.lo, s.hi)
}

func TestSucroseAgainstBisection(t *testing.T) {
	pairs := []gravity.Pair{
		gravity.Pair2020, gravity.Pair1515, gravity.Pair6060F, gravity.Pair175175, gravity.Pair154, gravity.Pair204,
	}
	checked := 0
	for _, s := range scalesByHand {
		tol := 1e-6
		if s.scale == gravity.ScaleSG {
			tol = 1e-9 // a millionth of a point
		}
		for _, pair := range pairs {
			for _, body := range tempcorr.Bodies {
				h := tempcorr.New(s.scale, pair, body)
				for _, at := range []float64{0, 5, 10, 15, 18, 22, 25, 30, 35, 45, 60} {
					for _, v := range s.marks {
						got, err := tempcorr.Sucrose(h.Float(), v, tempcorr.Sample{T: gravity.Celsius(at)})
						if err != nil {
							t.Fatalf("%s %v on %v at %v °C: %v", s.scale, v, pair, at, err)
						}
						want := s.byHand(v, pair, body.Expansion, at)
						near(t, fmt.Sprintf("%s %v on %v, %s, at %v °C", s.scale, v, pair, body.ID, at), got, want, tol)
						checked++
					}
				}
			}
		}
	}
	t.Logf("%d corrections", checked)
}

// Baumé brings its modulus with its pair: 144.3 on 15/4, 145 otherwise.
func TestBaumeAgainstBisection(t *testing.T) {
	for _, c := range []struct {
		pair    gravity.Pair
		modulus float64
	}{{gravity.Pair2020, 145}, {gravity.Pair6060F, 145}, {gravity.Pair154, 144.3}} {
		s := scaleByHand{gravity.ScaleBaume, func(v, _, tw float64) float64 {
			return c.modulus / (c.modulus - v) * waterByHand(tw)
		}, []float64{2, 12, 25}, -5, 44}
		for _, v := range s.marks {
			f := tempcorr.Float{Scale: s.scale, Basis: c.pair, Expansion: 25e-6}
			got, err := tempcorr.Sucrose(f, v, tempcorr.Sample{T: 28})
			if err != nil {
				t.Fatal(err)
			}
			near(t, fmt.Sprintf("%v °Bé on %v", v, c.pair), got, s.byHand(v, c.pair, 25e-6, 28), 1e-6)
		}
	}
}

// The thermometer's line of the budget is the slope of the same bisection.
func TestThermometerSlopeAgainstBisection(t *testing.T) {
	var plato scaleByHand
	for _, s := range scalesByHand {
		if s.scale == gravity.ScalePlato {
			plato = s
		}
	}
	last := 0.0
	for _, at := range []float64{5, 10, 20, 30, 40, 59} {
		res := correct(t, glass2020(gravity.ScalePlato), tempcorr.Observation{Reading: 12, Step: 0.1, T: gravity.Celsius(at)})
		p, ok := part(res.Budget, "thermometer")
		if !ok {
			t.Fatal("the budget has no thermometer")
		}
		want := (plato.byHand(12, gravity.Pair2020, 25e-6, at+0.05) - plato.byHand(12, gravity.Pair2020, 25e-6, at-0.05)) / 0.1
		near(t, fmt.Sprintf("°P per °C at %v °C", at), p.Sensitivity, want, 1e-6)
		// Water expands the more the warmer it is, so the share grows with warmth.
		if !(p.U > last) {
			t.Errorf("at %v °C the thermometer's share is %.4f, colder it was %.4f", at, p.U, last)
		}
		last = p.U
	}
}
