package attenuation

import (
	"errors"
	"math"
	"testing"

	"gylebook/gravity"
	"gylebook/gravity/asread"
)

// Balling, Die Bierbrauerei, vol. 1 part 2, pp. 496 and 517: original extract p
// from apparent extract m, real extract n and the quotient q, which he prints in
// three decimals, truncated. From q = (p - m)/(p - n), p = (q n - m)/(q - 1).
func TestBallingQuotientPrinted(t *testing.T) {
	for _, id := range []string{"1", "5"} {
		ex := worked(t, id)
		p := ex.want[0]
		q := asread.Round(gravity.AttenuationQuotient(gravity.Plato(p)), 3, asread.Truncate)
		if q != ex.in["q"] {
			t.Errorf("row %s: quotient at %v is %v, printed %v", id, p, q, ex.in["q"])
		}
		near(t, "row "+id+" original extract", (q*ex.in["n"]-ex.in["m"])/(q-1), p, ex.tol)
		// With the quotient unrounded, n moves by (p - m)/q² times at most the
		// 0.001 that he cut off.
		cut := (p - ex.in["m"]) / (q * q) * 0.001
		near(t, "row "+id+" real extract", float64(gravity.RealExtract(gravity.Plato(p), gravity.Plato(ex.in["m"]))), ex.in["n"], cut)
	}
}

// The same book, p. 496: attenuation 11.177 - 4.250 = 6.927, degree 0.619.
func TestBallingDegree(t *testing.T) {
	ex := worked(t, "3")
	a, err := Attenuate(extracts(t, ex.in["p"], ex.in["m"]))
	if err != nil {
		t.Fatal(err)
	}
	near(t, "attenuation", float64(a.OE-a.AE), ex.want[0], ex.tol)
	near(t, "degree", a.Apparent/100, ex.want[1], ex.tol)
}

// Balling, an edition with rounded factors (TIB 833625659, scan 370): degree,
// alcohol and real extract of a 12 % wort.
func TestBallingTwelvePerCent(t *testing.T) {
	for _, id := range []string{"7", "9"} {
		ex := worked(t, id)
		a, err := Attenuate(extracts(t, ex.in["p"], ex.in["m"]))
		if err != nil {
			t.Fatal(err)
		}
		near(t, "row "+id+" degree", a.Apparent/100, ex.want[0], ex.tol)
		near(t, "row "+id+" alcohol", float64(a.ABW), ex.want[1], ex.tol)
		near(t, "row "+id+" real extract", float64(a.RE), ex.want[2], ex.tol)
	}
}

// Rudolph, Berechnung des Alkoholgehalts: 12.2 and 3.8 °P give real extract,
// density, alcohol by mass and volume and kcal in half a litre. His kJ are his
// rounded kcal times 4.187 and are not a figure of ours.
func TestRudolph(t *testing.T) {
	ex := worked(t, "35")
	g := extracts(t, ex.in["OE"], ex.in["AE"])
	a, err := Attenuate(g)
	if err != nil {
		t.Fatal(err)
	}
	got := []float64{float64(a.RE), float64(beerDensity(g.FG)) / 1000, float64(a.ABW), float64(a.ABV), 5 * a.EnergyKcal100mL}
	for i, x := range got {
		// The row's one tolerance is for the kcal; the others are printed to one
		// or three decimals and 0.1 holds for them.
		tol := min(ex.tol, 0.1)
		if i == 4 {
			tol = ex.tol
		}
		near(t, "Rudolph", x, ex.want[i], tol)
	}
}

// The same author: 2.4 °P is 2.42 g in 100 mL.
func TestResidual(t *testing.T) {
	ex := worked(t, "37")
	s, err := gravity.Fits.Default().Fn.SG(gravity.Plato(ex.in[""]))
	if err != nil {
		t.Fatal(err)
	}
	near(t, "g in 100 mL", float64(Residual(gravity.Plato(ex.in[""]), s))/10, ex.want[0], ex.tol)
}

// By hand, OE 11.91, AE 2.56 (asbc fit): 100·9.35/11.91 = 78.5; on points
// 38/48 = 79.2; q = 1.2319, RE = 11.91 - 9.35/1.2319 = 4.32, 7.59/11.91 = 63.7;
// RDF = 63.73/(1 - 0.005161·4.32) = 65.2.
func TestWorkedReference(t *testing.T) {
	a, err := Attenuate(at(t, 1.048, 1.010))
	if err != nil {
		t.Fatal(err)
	}
	near(t, "OE", float64(a.OE), 11.91, 0.005)
	near(t, "AE", float64(a.AE), 2.56, 0.005)
	near(t, "apparent attenuation", a.Apparent, 78.5, 0.05)
	near(t, "apparent attenuation on points", a.ApparentPoints, 79.2, 0.05)
	near(t, "real attenuation", a.Real, 63.7, 0.05)
	near(t, "RDF", a.RDF, 65.2, 0.05)
}

// NBS Circular C440, Table 114: the apparent SG of p and of p/4 per cent is an
// attenuation of 75 % on extract. On points it is 100 (S - s)/(S - 1) of the
// printed SG, and reads 0.5 higher at 8 %, 1.0 at 16 %, 1.6 at 24 %, 2.1 at 32 %.
func TestPointsBasisReadsHigher(t *testing.T) {
	fit, err := gravity.Fits.Find("nbs")
	if err != nil {
		t.Fatal(err)
	}
	for _, c := range []struct{ og, fg, higher float64 }{
		{1.03180, 1.00780, 100*2400.0/3180 - 75},
		{1.06542, 1.01569, 100*4973.0/6542 - 75},
		{1.10104, 1.02369, 100*7735.0/10104 - 75},
		{1.13877, 1.03180, 100*10697.0/13877 - 75},
	} {
		g, err := NewGravities(gravity.SG(c.og), gravity.SG(c.fg), fit)
		if err != nil {
			t.Fatal(err)
		}
		a, err := Attenuate(g)
		if err != nil {
			t.Fatal(err)
		}
		// Half a last place of both SG moves the basis of 8 % by 0.02.
		near(t, "attenuation on extract", a.Apparent, 75, 0.02)
		near(t, "points basis minus extract basis", a.ApparentPoints-a.Apparent, c.higher, 0.02)
	}
}

// A dry cider, 1.048 to 0.998, is attenuated beyond 100 % apparently but not
// really; a liquid that rose is accepted and has no alcohol.
func TestAttenuateEdges(t *testing.T) {
	dry, err := Attenuate(at(t, 1.048, 0.998))
	if err != nil {
		t.Fatal(err)
	}
	if dry.Apparent <= 100 || dry.Real >= 100 || dry.RDF >= 100 {
		t.Errorf("dry cider: %+v", dry)
	}
	rose, err := Attenuate(at(t, 1.010, 1.012))
	if err != nil {
		t.Fatal(err)
	}
	if rose.ABV != 0 || rose.Apparent >= 0 || rose.RE != rose.AE {
		t.Errorf("risen gravity: %+v", rose)
	}
}

func TestCheck(t *testing.T) {
	hinted := func(err error) bool {
		var h interface{ Hint() string }
		return errors.As(err, &h) && h.Hint() != ""
	}
	if err := at(t, 1.048, 1.010).Check(); err != nil {
		t.Error(err)
	}
	for _, fg := range []float64{1.048, 1.049} {
		if err := at(t, 1.048, fg).Check(); !errors.Is(err, ErrOrder) || !hinted(err) {
			t.Errorf("1.048 and %v: %v, wanted an order error with a hint", fg, err)
		}
	}
	for _, og := range []float64{1.000, 1.0003, 0.998} {
		g := at(t, og, 0.997)
		if err := g.Check(); !errors.Is(err, ErrNoExtract) || !hinted(err) {
			t.Errorf("%v: %v, wanted a no extract error with a hint", og, err)
		}
		if _, err := Attenuate(g); !errors.Is(err, ErrNoExtract) {
			t.Errorf("attenuation of %v: %v", og, err)
		}
	}
	nan := gravity.SG(math.NaN())
	for _, pair := range [][2]gravity.SG{{nan, 1}, {1.05, nan}, {1.5, 1}, {1.05, 0}} {
		if _, err := NewGravities(pair[0], pair[1], gravity.Fits.Default()); !hasRange(err) {
			t.Errorf("%v: %v, wanted a range error", pair, err)
		}
	}
	bad := Gravities{OG: 1.05, FG: 1.01, OE: 12, AE: gravity.Plato(math.NaN())}
	if _, err := Attenuate(bad); !hasRange(err) {
		t.Errorf("extract not a number: %v", err)
	}
	for _, e := range Estimates(bad) {
		if e.Info.Kind == KindABV && !hasRange(e.Err) {
			t.Errorf("%s: %v, wanted a range error", e.Info.ID, e.Err)
		}
	}
}

// To the limit: a wort of 12 °P at 3.0 °P whose forced ferment ended at 2.4 °P
// has (3.0 - 2.4)/12 = 5 points of % to go.
func TestLimitDifference(t *testing.T) {
	near(t, "difference to the limit", LimitDifference(12, 3.0, 2.4), 5, 1e-12)
	if d := LimitDifference(0, 3, 2); d != 0 {
		t.Errorf("no wort: %v, wanted 0", d)
	}
}

// One point is 0.258 °P apparent at the end of fermentation, 2.58 g/L; the real
// extract moves 0.81 of it, 2.09 g/L. Maltose (342.30) takes up one water and
// gives 4 CO2 (44.010): 0.5143 g per g, 1.07 g/L. A volume is 1.977 g/L at 0 °C
// (density of the gas, from memory): 0.54.
func TestCO2ToCome(t *testing.T) {
	g, v := CO2ToCome(1)
	extract := 2.58 * 0.81
	gas := extract * 4 * 44.010 / 342.30
	near(t, "g/L a point", g, gas, 0.05)
	near(t, "volumes a point", v, gas/1.977, 0.01)
	if g, v := CO2ToCome(-1); g != 0 || v != 0 {
		t.Errorf("below the end: %v and %v, wanted none", g, v)
	}
	if g, v := CO2ToCome(math.NaN()); g != 0 || v != 0 {
		t.Errorf("not a number: %v and %v, wanted none", g, v)
	}
}
