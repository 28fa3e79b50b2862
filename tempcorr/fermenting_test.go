package tempcorr_test

import (
	"fmt"
	"math"
	"testing"

	"pgregory.net/rapid"

	"gylebook/gravity"
	"gylebook/tempcorr"
)

// Without alcohol, where the corrected value is the original extract or above it,
// the fermenting model is the sucrose model. On a saccharometer both find the same
// extract; on an SG scale the trade's fit finds one 0.01 % away, which moves the
// ratio of two densities by less than 0.001 point.
func TestFermentingWithoutAlcoholIsSucrose(t *testing.T) {
	for _, c := range []struct {
		scale gravity.Scale
		mark  float64
		oe    gravity.Plato
		tol   float64
	}{
		{gravity.ScalePlato, 12, 10, 1e-8},
		{gravity.ScaleBrix, 20, 15, 1e-8},
		{gravity.ScaleSG, 1.05, 10, 1e-6},
		{gravity.ScaleDensity, 1050, 10, 1e-3},
	} {
		for _, pair := range []gravity.Pair{gravity.Pair2020, gravity.Pair1515} {
			for _, at := range []gravity.Celsius{5, 10, 18, 25, 30, 40} {
				f := tempcorr.Float{Scale: c.scale, Basis: pair, Expansion: 25e-6}
				s := tempcorr.Sample{T: at, OE: c.oe}
				want, err := tempcorr.Sucrose(f, c.mark, s)
				if err != nil {
					t.Fatal(err)
				}
				got, err := tempcorr.Fermenting(f, c.mark, s)
				if err != nil {
					t.Fatal(err)
				}
				near(t, fmt.Sprintf("%v %s on %v at %v °C", c.mark, c.scale, pair, at), got, want, c.tol)
			}
		}
	}
}

// A saccharometer's wort whose apparent extract is just its original extract.
func TestFermentingAtTheOriginalExtract(t *testing.T) {
	f := tempcorr.Float{Scale: gravity.ScalePlato, Basis: gravity.Pair2020, Expansion: 25e-6}
	for _, at := range []gravity.Celsius{10, 30} {
		want, err := tempcorr.Sucrose(f, 12, tempcorr.Sample{T: at})
		if err != nil {
			t.Fatal(err)
		}
		got, err := tempcorr.Fermenting(f, 12, tempcorr.Sample{T: at, OE: gravity.Plato(want)})
		if err != nil {
			t.Fatal(err)
		}
		near(t, fmt.Sprintf("at %v °C", at), got, want, 1e-7)
	}
}

// Alcohol and water expand more than sugar and water: warm, a fermented liquid is
// corrected by more than sucrose of the same reading, cold by less.
func TestFermentingExpandsMore(t *testing.T) {
	h := glass2020(gravity.ScaleSG)
	oe := gravity.ASBC(1.048)
	for _, at := range []gravity.Celsius{10, 15, 25, 30, 38} {
		o := tempcorr.Observation{Reading: 1.012, Step: 0.001, T: at}
		sucrose := correct(t, h, o)
		o.OE = oe
		mixture := correct(t, h, o)
		if sucrose.Method.ID != "sucrose" || mixture.Method.ID != "fermenting" {
			t.Fatalf("methods %s and %s", sucrose.Method.ID, mixture.Method.ID)
		}
		if above := mixture.Corrected > sucrose.Corrected; above != (at > 20) {
			t.Errorf("at %v °C the mixture gives %.5f, sucrose %.5f", at, mixture.Corrected, sucrose.Corrected)
		}
		if mixture.Mixture.Alcohol < 3 || mixture.Mixture.Alcohol > 5 {
			t.Errorf("1.048 to 1.012 gives %v %% alcohol by mass", mixture.Mixture.Alcohol)
		}
	}
}

// What is found fulfils the two equations that define it: composition from the
// corrected value by the Balling balance, and rho(t) (1 + g (t - t0)) = rho_mark
// with the mixture of that composition.
func TestFermentingFulfilsItsEquations(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		h := glass2020(gravity.ScaleSG)
		o := tempcorr.Observation{
			Reading: rapid.Float64Range(0.995, 1.04).Draw(t, "reading"), Step: 0.001,
			T:  gravity.Celsius(rapid.Float64Range(0, 40).Draw(t, "t")),
			OE: gravity.Plato(rapid.Float64Range(12, 26).Draw(t, "oe")),
		}
		res, err := tempcorr.Correct(h, o)
		if err != nil {
			t.Fatal(err)
		}
		want := gravity.Fermented(o.OE, gravity.ASBC(gravity.SG(res.Corrected)))
		if math.Abs(float64(res.Mixture.Alcohol-want.Alcohol)) > 1e-8 || math.Abs(float64(res.Mixture.Extract-want.Extract)) > 1e-8 {
			t.Fatalf("composition %+v, the balance gives %+v", res.Mixture, want)
		}
		at, ref := gravity.MixtureAt(o.T), gravity.MixtureAt(20)
		grown := 1 + 25e-6*float64(o.T-20)
		floats := o.Reading / res.Corrected // rho_mark over rho(t0)
		if got := float64(at.Density(want)/ref.Density(want)) * grown; math.Abs(got-floats) > 1e-10 {
			t.Fatalf("rho(t) (1 + g dt)/rho(t0) is %.12f, the marks stand as %.12f", got, floats)
		}
	})
}

// An instrument on another pair gives the same liquid: what a 60/60 °F glass reads
// in the fermented liquid is corrected to the SG 20/20 of the 20/20 glass.
func TestFermentingOnAnotherPair(t *testing.T) {
	m := gravity.Mixture{Alcohol: 4, Extract: 4.5}
	oe := gravity.OriginalExtract(m.Alcohol, m.Extract)
	// The Balling balance reads composition from the apparent extract, so the
	// liquid's own SG decides which one it takes; both glasses must agree on it.
	at := gravity.MixtureAt(25)
	rho := at.Density(m)
	reads := func(pair gravity.Pair) float64 {
		return float64(rho/gravity.Kell(pair.Water)) * (1 + 25e-6*float64(25-pair.Sample))
	}
	a := correct(t, glass2020(gravity.ScaleSG), tempcorr.Observation{Reading: reads(gravity.Pair2020), T: 25, OE: oe})
	h := tempcorr.New(gravity.ScaleSG, gravity.Pair6060F, tempcorr.Bodies[0])
	b := correct(t, h, tempcorr.Observation{Reading: reads(gravity.Pair6060F), T: 25, OE: oe})
	near(t, "SG 20/20", float64(b.SG), float64(a.SG), 1e-8)
	near(t, "alcohol", float64(b.Mixture.Alcohol), float64(a.Mixture.Alcohol), 1e-5)
	near(t, "corrected", b.Corrected, reads(gravity.Pair6060F)+b.Temperature, 1e-12)
}
