package gravity_test

import (
	"math"
	"testing"

	"pgregory.net/rapid"

	"gylebook/gravity"
)

// C. J. N. Balling, Die Bierbrauerei, 1865, p. 513: a wort of 12.0 % read at
// 3.0 % apparent and 4.695 % real extract has made 3.767 % of alcohol by mass.
func TestBallingAgainstHisExample(t *testing.T) {
	printed := map[string]float64{}
	for _, r := range rows(t, "balling_1865_example") {
		printed[r.Text("quantity")] = number(t, r, "value")
	}
	p, m, n := gravity.Plato(printed["p"]), gravity.Plato(printed["m"]), gravity.Plato(printed["n"])
	alcohol := gravity.MassPct(printed["alcohol_mass_pct"])
	for _, r := range rows(t, "balling_1865_example") {
		switch r.Text("quantity") {
		case "alcohol_mass_pct":
			agree(t, r, "balling", "value", 1, float64(gravity.AlcoholFromBalance(p, n)))
		case "n":
			agree(t, r, "balling", "value", 1, float64(gravity.RealExtract(p, m)))
		}
	}
	// 3.767 for 3.7684 is worth 0.0014 · 2.0665 of original extract.
	near(t, "original extract", float64(gravity.OriginalExtract(alcohol, n)), float64(p), 0.003)
	// q = 1.22 + 0.001 · 12
	near(t, "attenuation quotient", gravity.AttenuationQuotient(p), 1.232, 1e-12)
}

// 2.0665 g of extract gives 1 g alcohol, 0.9565 g CO2 and 0.11 g yeast.
func TestBallingBalanceOfMasses(t *testing.T) {
	near(t, "sum", 1+gravity.CO2PerAlcohol+gravity.YeastPerAlcohol, gravity.ExtractPerAlcohol, 1e-12)
}

func TestBallingBalanceSolvesBothWays(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		oe := gravity.Plato(rapid.Float64Range(1, 35).Draw(t, "oe"))
		re := oe * gravity.Plato(rapid.Float64Range(0, 1).Draw(t, "left"))
		a := gravity.AlcoholFromBalance(oe, re)
		if d := float64(gravity.OriginalExtract(a, re) - oe); math.Abs(d) > 1e-9 {
			t.Fatalf("original extract is off by %g", d)
		}
		if d := float64(gravity.RealExtractFromBalance(oe, a) - re); math.Abs(d) > 1e-9 {
			t.Fatalf("real extract is off by %g", d)
		}
	})
}

func TestFermentedWithoutAlcohol(t *testing.T) {
	for _, ae := range []gravity.Plato{12, 12.5, 30} {
		if m := gravity.Fermented(12, ae); m.Alcohol != 0 || m.Extract != ae {
			t.Errorf("12 %% read at %v %% is %+v, wanted extract alone", ae, m)
		}
	}
	// Nothing jumps where the alcohol begins.
	m := gravity.Fermented(12, 12-1e-9)
	near(t, "alcohol", float64(m.Alcohol), 0, 1e-9)
	near(t, "extract", float64(m.Extract), 12, 1e-8)
}

// Tabarié's rule holds at its ends: without alcohol the mixture is the sucrose
// solution, without extract it is ethanol and water, each over its own water.
func TestMixtureAtItsEnds(t *testing.T) {
	for _, at := range []gravity.Celsius{5, 15, 20, 30, 40} {
		mix, sucrose, ethanol := gravity.MixtureAt(at), gravity.SucroseAt(at), gravity.EthanolAt(at)
		for x := 0.0; x <= 18; x += 3 {
			got := mix.Density(gravity.Mixture{Extract: gravity.Plato(x)})
			near(t, "extract alone", float64(got), float64(sucrose.Density(gravity.Plato(x))), 1e-8)
			rel := mix.Relative(gravity.Mixture{Alcohol: gravity.MassPct(x)})
			near(t, "alcohol alone", rel, float64(ethanol.Density(gravity.MassPct(x))/ethanol.Water()), 1e-11)
		}
	}
}

// The equation itself, S = S_alcohol + S_residue - 1 with both made up to the
// sample's volume: the residue of 1 L holds extract · rho, the distillate
// alcohol · rho, in a volume of 1 L each.
func TestMixtureFulfilsTabarie(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		at := gravity.Celsius(rapid.Float64Range(0, 40).Draw(t, "t"))
		m := gravity.Mixture{
			Alcohol: gravity.MassPct(rapid.Float64Range(0, 18).Draw(t, "alcohol")),
			Extract: gravity.Plato(rapid.Float64Range(0, 15).Draw(t, "extract")),
		}
		mix, sucrose, ethanol := gravity.MixtureAt(at), gravity.SucroseAt(at), gravity.EthanolAt(at)
		s := mix.Relative(m)
		sa, sr := 1.0, 1.0
		for range 200 {
			// grams per litre stay: a'·sa = a·s, e'·sr = e·s
			sa = float64(ethanol.Density(m.Alcohol*gravity.MassPct(s/sa)) / ethanol.Water())
			sr = float64(sucrose.Density(m.Extract*gravity.Plato(s/sr)) / sucrose.Water())
		}
		if math.Abs(sa+sr-1-s) > 1e-11 {
			t.Fatalf("%+v at %v °C: %.12f, its parts give %.12f", m, at, s, sa+sr-1)
		}
	})
}
