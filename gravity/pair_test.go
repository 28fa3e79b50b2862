package gravity_test

import (
	"math"
	"testing"

	"pgregory.net/rapid"

	"gylebook/gravity"
)

var pairs = []gravity.Pair{
	gravity.Pair2020, gravity.Pair1515, gravity.Pair6060F, gravity.Pair175175, gravity.Pair154, gravity.Pair204,
	{Sample: 20, Water: gravity.FromFahrenheit(60)},
}

// The table of 15 and 20 °C gives four pairs by division alone: its own water of
// 15 °C is 999.13 and of 20 °C 998.23, and 1000 is water of 4 °C.
func TestPairsAgainst15And20Table(t *testing.T) {
	const water15, water20, water4 = 999.13, 998.23, 1000
	for _, r := range rows(t, "sucrose_density_15_20c") {
		p := gravity.Plato(number(t, r, "mass_pct"))
		for _, c := range []struct {
			pair  gravity.Pair
			col   string
			water float64
		}{
			{gravity.Pair1515, "rho15", water15},
			{gravity.Pair154, "rho15", water4},
			{gravity.Pair2020, "rho20", water20},
			{gravity.Pair204, "rho20", water4},
		} {
			tol, _, err := r.Tolerance(sps4ID, c.col)
			if err != nil {
				t.Fatal(err)
			}
			got := gravity.RelativeOf(gravity.SucroseDensity(p, c.pair.Sample), c.pair).Value
			// Half a place of the printed water, and 3.1e-6 by which Kell's water
			// lies below the reference at 4 °C and above.
			near(t, r.Where()+" "+c.pair.String(), got, number(t, r, c.col)/c.water, tol/1000+5e-6+3.1e-6)
		}
	}
}

// What 12 % sucrose reads on each pair, from the SPS-4 polynomial written out at
// w = 0.12 and Kell's water: at 20 °C
// 385.1761w + 135.3705w² + 40.9299w³ - 3.9643w⁴ + 13.4853w⁵ - 17.2890w⁶ = 48.2407,
// so 998.2031 + 48.2407 = 1046.4438; 20/20 is 1 + 48.2407/998.2031 = 1.0483275, and
// over Kell's water of 4 °C (999.9720) 20/4 is 1.046473.
func TestPairsOf12PercentByHand(t *testing.T) {
	on := func(p gravity.Pair) float64 { return gravity.RelativeOf(gravity.SucroseDensity(12, p.Sample), p).Value }
	near(t, "20/20", on(gravity.Pair2020), 1.0483275, 1e-7)
	near(t, "20/4", on(gravity.Pair204), 1046.4438/float64(gravity.Kell(4)), 5e-8)
	// Sugar makes water expand more, so a colder pair of one temperature reads
	// higher; over denser water every value is lower.
	order := []gravity.Pair{
		gravity.Pair204,
		{Sample: 20, Water: gravity.FromFahrenheit(60)},
		gravity.Pair154,
		gravity.Pair2020, gravity.Pair175175, gravity.Pair6060F, gravity.Pair1515,
	}
	for i := 1; i < len(order); i++ {
		if !(on(order[i]) > on(order[i-1])) {
			t.Errorf("%v gives %.5f, %v %.5f, wanted it above", order[i], on(order[i]), order[i-1], on(order[i-1]))
		}
	}
}

func TestPairThereAndBack(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		from := rapid.SampledFrom(pairs).Draw(t, "from")
		to := rapid.SampledFrom(pairs).Draw(t, "to")
		r := gravity.Relative{Value: rapid.Float64Range(0.97, 1.40).Draw(t, "value"), Pair: from}
		there, err := r.On(to)
		if err != nil {
			t.Fatal(err)
		}
		if there.Pair != to {
			t.Fatalf("on %v, wanted %v", there.Pair, to)
		}
		back, err := there.On(from)
		if err != nil {
			t.Fatal(err)
		}
		if math.Abs(back.Value-r.Value) > 1e-12 {
			t.Fatalf("%v came back as %v through %v", r, back, there)
		}
	})
}

func TestMixturePairThereAndBack(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		from := rapid.SampledFrom(pairs).Draw(t, "from")
		to := rapid.SampledFrom(pairs).Draw(t, "to")
		m := gravity.Mixture{
			Alcohol: gravity.MassPct(rapid.Float64Range(0, 12).Draw(t, "alcohol")),
			Extract: gravity.Plato(rapid.Float64Range(0, 10).Draw(t, "extract")),
		}
		r := gravity.Relative{Value: rapid.Float64Range(0.98, 1.03).Draw(t, "value"), Pair: from}
		back := r.MixtureOn(to, m).MixtureOn(from, m)
		if math.Abs(back.Value-r.Value) > 1e-12 || back.Pair != from {
			t.Fatalf("%v came back as %v", r, back)
		}
	})
}

// The SG of a fermented liquid on another pair is the one whose own composition,
// by the Balling balance, brings it back to what was read.
func TestFermentedSGIsItsOwnMixture(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		r := gravity.Relative{Value: rapid.Float64Range(0.985, 1.04).Draw(t, "value"), Pair: rapid.SampledFrom(pairs).Draw(t, "pair")}
		oe := gravity.Plato(rapid.Float64Range(12, 30).Draw(t, "oe"))
		s, err := r.FermentedSG(oe)
		if err != nil {
			t.Fatal(err)
		}
		m := gravity.Fermented(oe, gravity.ASBC(s))
		if back := s.Relative().MixtureOn(r.Pair, m); math.Abs(back.Value-r.Value) > 1e-10 {
			t.Fatalf("%v is SG %v, which reads %v", r, s, back)
		}
		f, err := gravity.NewConverter().ConvertFermented(gravity.ScaleSG, r.Value, r.Pair, oe)
		if err != nil || math.Abs(float64(f.SG-s)) > 1e-15 {
			t.Fatalf("converted to %v, %v, wanted %v", f.SG, err, s)
		}
	})
	_, err := gravity.Relative{Value: math.NaN(), Pair: gravity.Pair1515}.FermentedSG(12)
	refused(t, "not a number", err)
}

// Water is 1 on every pair whose two temperatures are one.
func TestWaterIsOneOnItsOwnPair(t *testing.T) {
	for _, p := range pairs {
		got := gravity.RelativeOf(gravity.Kell(p.Sample), p).Value
		if p.Sample == p.Water && got != 1 || p.Sample != p.Water && !(got < 1) {
			t.Errorf("water on %v is %v", p, got)
		}
	}
}

func TestPairRefusals(t *testing.T) {
	for _, x := range []float64{0, 0.5, 1.6, -1, math.NaN(), math.Inf(1)} {
		_, err := gravity.Relative{Value: x, Pair: gravity.Pair1515}.SG()
		refused(t, "15/15", err)
	}
}

// (rho - 1.2)/(rho_w - 1.2) at 1.05: (1048.117 - 1.2)/(998.207 - 1.2) = 1.050060.
func TestInAir(t *testing.T) {
	near(t, "in air", float64(gravity.SG(1.05).InAir()), 1.050060, 5e-7)
	rapid.Check(t, func(t *rapid.T) {
		s := gravity.SG(rapid.Float64Range(0.95, 1.45).Draw(t, "s"))
		if d := float64(s.InAir().FromAir() - s); math.Abs(d) > 1e-14 {
			t.Fatalf("off by %g", d)
		}
	})
	if gravity.SG(1).InAir() != 1 {
		t.Error("water in air is not 1")
	}
}

func TestPairNames(t *testing.T) {
	for want, p := range map[string]gravity.Pair{
		"20/20": gravity.Pair2020, "15/15": gravity.Pair1515, "60/60F": gravity.Pair6060F,
		"17.5/17.5": gravity.Pair175175, "15/4": gravity.Pair154, "20/4": gravity.Pair204,
	} {
		if p.String() != want {
			t.Errorf("got %s, wanted %s", p, want)
		}
	}
	if got := gravity.SG(1.05).Relative().String(); got != "1.05000 20/20" {
		t.Errorf("got %q", got)
	}
}
