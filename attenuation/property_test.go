package attenuation

import (
	"math"
	"testing"

	"pgregory.net/rapid"

	"gylebook/gravity"
)

// drawPair gives an original gravity of the trade and a present one below it.
func drawPair(t *rapid.T) (og, fg float64) {
	og = rapid.Float64Range(1.010, 1.140).Draw(t, "og")
	fg = rapid.Float64Range(0.992, og-0.001).Draw(t, "fg")
	return og, fg
}

func gravitiesOf(t *rapid.T, og, fg float64) Gravities {
	g, err := NewGravities(gravity.SG(og), gravity.SG(fg), gravity.Fits.Default())
	if err != nil {
		t.Fatal(err)
	}
	return g
}

func attenuationOf(t *rapid.T, g Gravities) Attenuation {
	a, err := Attenuate(g)
	if err != nil {
		t.Fatal(err)
	}
	return a
}

// Read as SG or as the extract that the same fit gives, every fit, the
// attenuation is one.
func TestAttenuationIndependentOfScale(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		og, fg := drawPair(t)
		for _, fit := range gravity.Fits {
			c := gravity.Converter{Fit: fit, Modulus: gravity.Modulus145}
			g, err := NewGravities(gravity.SG(og), gravity.SG(fg), fit)
			if err != nil {
				t.Fatal(err)
			}
			o, err := c.Convert(gravity.ScalePlato, float64(g.OE), gravity.Pair2020)
			if err != nil {
				t.Fatal(err)
			}
			p, err := c.Convert(gravity.ScalePoints, 1000*(fg-1), gravity.Pair2020)
			if err != nil {
				t.Fatal(err)
			}
			a, b := attenuationOf(t, g), attenuationOf(t, Of(o, p))
			for _, d := range []float64{a.Apparent - b.Apparent, a.ApparentPoints - b.ApparentPoints, a.Real - b.Real, a.RDF - b.RDF, float64(a.ABV - b.ABV)} {
				if math.Abs(d) > 1e-6 {
					t.Fatalf("%s: %+v by SG, %+v by extract", fit.ID, a, b)
				}
			}
		}
	})
}

// RDF (ASBC) is real attenuation over 1 − 0.005161 RE, where 0.005161 is
// 1.0665/206.65; the balance closes on the original extract.
func TestRDFIdentityAndBalance(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		og, fg := drawPair(t)
		a := attenuationOf(t, gravitiesOf(t, og, fg))
		if want := a.Real / (1 - 1.0665/206.65*float64(a.RE)); math.Abs(a.RDF-want) > 1e-9 {
			t.Fatalf("RDF %v, by real attenuation %v", a.RDF, want)
		}
		// 0.005161 is cut after the fourth digit: 2e-7·RE relative is below 1e-3.
		if want := a.Real / (1 - 0.005161*float64(a.RE)); math.Abs(a.RDF-want) > 1e-3 {
			t.Fatalf("RDF %v, by the printed factor %v", a.RDF, want)
		}
		if back := gravity.OriginalExtract(a.ABW, a.RE); math.Abs(float64(back-a.OE)) > 1e-9 {
			t.Fatalf("balance gives %v, original extract %v", back, a.OE)
		}
	})
}

// Alcohol rises with OG and falls with FG, every method that gives it. Within one
// step of the duty table's tenths it may stand still.
func TestAlcoholMonotone(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		og, fg := drawPair(t)
		step := rapid.Float64Range(0.0002, 0.01).Draw(t, "step")
		for _, e := range ABVMethods {
			base, err := e.Fn(gravitiesOf(t, og, fg))
			if err != nil {
				continue // no factor, no row of the table
			}
			if len(InRange(e, gravitiesOf(t, og, fg), base)) > 0 {
				continue
			}
			stronger, err := e.Fn(gravitiesOf(t, og+step, fg))
			if err == nil && !(stronger.ABV > base.ABV) {
				t.Fatalf("%s: %v at OG %v, %v at %v", e.ID, base.ABV, og, stronger.ABV, og+step)
			}
			drier, err := e.Fn(gravitiesOf(t, og, fg-step))
			if e.Kind == KindABV && err == nil && !(drier.ABV > base.ABV) {
				t.Fatalf("%s: %v at FG %v, %v at %v", e.ID, base.ABV, fg, drier.ABV, fg-step)
			}
		}
	})
}

// Equal gravities have no alcohol by any method that uses both, and no value
// anywhere is negative or not a number.
func TestNoFermentationNoAlcohol(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		og := rapid.Float64Range(0.95, 1.45).Draw(t, "og")
		for _, e := range Estimates(gravitiesOf(t, og, og)) {
			if e.Info.Kind == KindABV && (e.Err != nil || math.Abs(float64(e.Alcohol.ABV)) > 1e-9) {
				t.Fatalf("%s at %v: %v, %v", e.Info.ID, og, e.Alcohol.ABV, e.Err)
			}
		}
		fg := rapid.Float64Range(0.95, og).Draw(t, "fg")
		for _, e := range Estimates(gravitiesOf(t, og, fg)) {
			if e.Err == nil && !(e.Alcohol.ABV >= 0) {
				t.Fatalf("%s at %v/%v: %v", e.Info.ID, og, fg, e.Alcohol.ABV)
			}
		}
	})
}

// What rounds once on decimals: a declared figure is never more than one place
// from the strength, and the truncated one never above it.
func TestDeclareNearStrength(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		abv := gravity.VolPct(rapid.Float64Range(0, 25).Draw(t, "abv"))
		for _, r := range Rules {
			d := r.Declare(abv)
			if math.Abs(float64(d-abv)) >= 0.1 || (r.ID == idUKDuty && d > abv) {
				t.Fatalf("%s: %v declared %v", r.ID, abv, d)
			}
		}
	})
}
