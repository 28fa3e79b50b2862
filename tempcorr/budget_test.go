package tempcorr_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"gylebook/gravity"
	"gylebook/tempcorr"
)

// recorded is an instrument of which everything is known.
func recorded(scale gravity.Scale) tempcorr.Hydrometer {
	h := glass2020(scale)
	h.ID, h.StemMM, h.MassG, h.Adjusted, h.ReadAt = "h1", 5, 60, 72.75, tempcorr.Bottom
	return h
}

// JCGM 100:2008, 5.1.2: u² is the sum of (c u)²; 4.3.7: a rectangular half-width
// a gives a/√3.
func TestBudgetIsAQuadraticSum(t *testing.T) {
	h := recorded(gravity.ScaleSG)
	h.MaxError = 0.001
	h.Certificate = []tempcorr.Certificate{{Reading: 1.0, U: 0.0005}}
	res := correct(t, h, tempcorr.Observation{Reading: 1.05, Step: 0.001, T: 28, TU: 0.3, ReadAt: tempcorr.Top})
	var sum float64
	for _, p := range res.Budget.Parts {
		want := math.Abs(p.Sensitivity) * p.HalfWidth / math.Sqrt(3)
		if p.Name == "certificate" {
			want = math.Abs(p.Sensitivity) * p.HalfWidth / 2 // U at k = 2
		}
		near(t, p.Name, p.U, want, 1e-15)
		sum += p.U * p.U
	}
	near(t, "u", res.Budget.Standard, math.Sqrt(sum), 1e-12)
	near(t, "U", res.Budget.Expanded, 2*res.Budget.Standard, 0)
	for _, name := range []string{"reading", "thermometer", "body expansion", "model", "meniscus", "surface tension", "maximum error", "certificate"} {
		if p, ok := part(res.Budget, name); !ok || !(p.U > 0) {
			t.Errorf("%s: %+v, wanted a share", name, p)
		}
	}
	near(t, "thermometer as told", must(part(res.Budget, "thermometer")).HalfWidth, 0.3, 0)
	near(t, "half a step", must(part(res.Budget, "reading")).HalfWidth, 0.0005, 1e-18)
	h.Division = 0.002
	res = correct(t, h, tempcorr.Observation{Reading: 1.05, Step: 0.001, T: 28})
	near(t, "half a division", must(part(res.Budget, "reading")).HalfWidth, 0.001, 0)
	near(t, "a usual thermometer", must(part(res.Budget, "thermometer")).HalfWidth, 0.5, 0)
}

func must(p tempcorr.Contribution, _ bool) tempcorr.Contribution { return p }

func TestMoreDigitsShrinkU(t *testing.T) {
	for scale, v := range usual {
		last := math.Inf(1)
		for _, step := range []float64{1e-1, 1e-2, 1e-3, 1e-4} {
			got := correct(t, glass2020(scale), tempcorr.Observation{Reading: v, Step: step, T: 25}).Budget.Expanded
			if !(got < last && got > 0) {
				t.Errorf("%s: step %v gives U = %v, the coarser %v", scale, step, got, last)
			}
			last = got
		}
	}
}

func TestBudgetWithoutARecord(t *testing.T) {
	res := correct(t, glass2020(gravity.ScaleSG), tempcorr.Observation{Reading: 1.05, Step: 0.001, T: 25})
	if res.Budget.Record || res.Budget.Floor {
		t.Errorf("nothing is known of the instrument, budget says %+v", res.Budget)
	}
	for _, name := range []string{"maximum error", "certificate", "surface tension", "meniscus"} {
		if p, ok := part(res.Budget, name); ok {
			t.Errorf("nothing is known of the instrument, yet %+v", p)
		}
	}
}

// NIST SP 250-78: 370 ppm or more of the density in users' hands. A narrow
// certified instrument computes to less and is raised to it: 0.37 · 1.05 points.
func TestRecordFloor(t *testing.T) {
	h := recorded(gravity.ScaleSG)
	h.InLiquid, h.MaxError = true, 1e-5
	res := correct(t, h, tempcorr.Observation{Reading: 1.05, Step: 1e-5, T: 20, TU: 0.01})
	if !res.Budget.Floor || !res.Budget.Record {
		t.Fatalf("got %+v, wanted the floor", res.Budget)
	}
	near(t, "U", res.Budget.Expanded, 370e-6*1.05, 1e-9)
	near(t, "u", res.Budget.Standard, 185e-6*1.05, 1e-9)
	// On °P it is the same share of the density: 0.3885 point at 0.238 °P a point.
	p := recorded(gravity.ScalePlato)
	p.InLiquid, p.MaxError = true, 0.002
	res = correct(t, p, tempcorr.Observation{Reading: 12, Step: 0.001, T: 20, TU: 0.01})
	perPoint := 1 / ((sucroseByHand(0.1205, 20) - sucroseByHand(0.1195, 20)) / 0.1 / waterByHand(20) * 1000)
	near(t, "U in °P", res.Budget.Expanded, 370e-6*sucroseByHand(0.12, 20)/waterByHand(20)*1000*perPoint, 2e-4)
	// A kit instrument is worse by itself and is left alone.
	h.MaxError = 0.002
	if res = correct(t, h, tempcorr.Observation{Reading: 1.05, Step: 0.001, T: 20}); res.Budget.Floor {
		t.Errorf("U = %v was raised to the floor", res.Budget.Expanded)
	}
}

// The budget is linear; drawing every input at random is not. Both agree within
// 5 % on the standard uncertainty.
func TestMonteCarloAgreesWithBudget(t *testing.T) {
	kit := recorded(gravity.ScaleSG)
	kit.MaxError, kit.StemMM, kit.MassG = 0.001, 6.5, 24
	lab := recorded(gravity.ScalePlato)
	lab.Certificate = []tempcorr.Certificate{{Reading: 0, Correction: 0.05, U: 0.06}, {Reading: 20, Correction: -0.02, U: 0.06}}
	plastic := tempcorr.New(gravity.ScaleSG, gravity.Pair6060F, tempcorr.Bodies[2])
	for name, c := range map[string]struct {
		h tempcorr.Hydrometer
		o tempcorr.Observation
	}{
		"wort, kit":              {kit, tempcorr.Observation{Reading: 1.05, Step: 0.001, T: 30, TU: 1, ReadAt: tempcorr.Top}},
		"wort, lab, cold":        {lab, tempcorr.Observation{Reading: 12, Step: 0.2, T: 10}},
		"plastic, hot":           {plastic, tempcorr.Observation{Reading: 1.08, Step: 0.002, T: 45, TU: 2}},
		"fermenting, kit, warm":  {kit, tempcorr.Observation{Reading: 1.012, Step: 0.001, T: 28, OE: 11.9}},
		"temperature-only cubic": {kit, tempcorr.Observation{Reading: 1.05, Step: 0.001, T: 30, Method: "lyons1992"}},
	} {
		t.Run(name, func(t *testing.T) {
			res := correct(t, c.h, c.o)
			if res.Budget.Floor {
				t.Fatal("the budget was raised to the floor and is no sum")
			}
			got := spread(t, c.h, c.o, res)
			if ratio := got / res.Budget.Standard; math.Abs(ratio-1) > 0.05 {
				t.Errorf("drawn %.6g, budget %.6g, ratio %.3f", got, res.Budget.Standard, ratio)
			}
		})
	}
}

// spread draws every line of the budget and returns the standard deviation of the
// corrected value.
func spread(t *testing.T, h tempcorr.Hydrometer, o tempcorr.Observation, res tempcorr.Result) float64 {
	t.Helper()
	m, err := tempcorr.Methods.Find(res.Method.ID)
	if err != nil {
		t.Fatal(err)
	}
	const draws = 100_000
	rng := rand.New(rand.NewPCG(1923, 5))
	half := func(name string) float64 {
		p, _ := part(res.Budget, name)
		return (2*rng.Float64() - 1) * p.HalfWidth
	}
	mark := res.Reading + res.Meniscus + res.Instrument()
	// A point is 0.001 of the relative density: on a saccharometer, what one more
	// point of density is worth in extract.
	point := 0.001
	if h.Scale == gravity.ScalePlato {
		at := gravity.SucroseAt(h.Basis.Sample)
		p, err := at.Extract(at.Density(gravity.Plato(mark)) + at.Water()/1000)
		if err != nil {
			t.Fatal(err)
		}
		point = float64(p) - mark
	}
	var sum, squares float64
	for range draws {
		f := h.Float()
		f.Expansion += half("body expansion")
		r := mark + half("reading") + half("maximum error") + point*(half("meniscus")+half("surface tension"))
		if p, ok := part(res.Budget, "certificate"); ok {
			r += rng.NormFloat64() * p.HalfWidth / 2
		}
		s := tempcorr.Sample{T: o.T + gravity.Celsius(half("thermometer")), OE: o.OE}
		x, err := m.Fn(f, r, s)
		if err != nil {
			t.Fatal(err)
		}
		x += point*half("model") - res.Corrected
		sum += x
		squares += x * x
	}
	mean := sum / draws
	return math.Sqrt(squares/draws - mean*mean)
}
