package selfcheck

import (
	"gylebook/attenuation"
	"gylebook/gravity"
	"gylebook/gravity/method"
)

// ballingExample compares the worked example of Balling: the balance and the
// quotient on their own, the default method and the attenuations as a whole.
func ballingExample(r Relations, t *tally) {
	const col, key = "value", "balling"
	printed := make(map[string]float64)
	for _, row := range t.file.Rows {
		printed[row.Text("quantity")] = t.number(row, col)
	}
	p, m, n := gravity.Plato(printed["p"]), gravity.Plato(printed["m"]), gravity.Plato(printed["n"])
	g, err := extracts(p, m)
	if err != nil {
		t.fail(err)
		return
	}
	e := find(t, r.ABV, "balling")
	if t.err != nil {
		return
	}
	a, abvErr := e.Fn(g)
	abw, re := parts(a)
	whole, wholeErr := attenuation.Attenuate(g)
	alcohol := gravity.AlcoholFromBalance(p, n)
	for _, row := range t.file.Rows {
		one := func(info method.Info, got float64, err error, unit string) {
			t.row(info, key, row, col, got, err, unit)
		}
		switch row.Text("quantity") {
		case "p":
			one(gravity.BalanceInfo, float64(gravity.OriginalExtract(alcohol, n)), nil, unitMass)
		case "m":
			// What is read, and given to all the others.
		case "n":
			one(gravity.QuotientInfo, float64(gravity.RealExtract(p, m)), nil, unitMass)
			one(gravity.BalanceInfo, float64(gravity.RealExtractFromBalance(p, alcohol)), nil, unitMass)
			one(e.Info, re, abvErr, unitMass)
		case "alcohol_mass_pct":
			one(gravity.BalanceInfo, float64(alcohol), nil, unitMass)
			one(e.Info, abw, abvErr, unitMass)
		case "water_pct":
			one(gravity.BalanceInfo, 100-float64(alcohol)-float64(n), nil, unitMass)
		case "yeast_parts":
			one(gravity.BalanceInfo, gravity.YeastPerAlcohol*float64(alcohol), nil, "parts")
		case "co2_parts":
			one(gravity.BalanceInfo, gravity.CO2PerAlcohol*float64(alcohol), nil, "parts")
		case "apparent_attenuation":
			one(attenuation.ApparentInfo, whole.Apparent/100, wholeErr, "fraction")
		case "real_attenuation":
			one(attenuation.RealInfo, whole.Real/100, wholeErr, "fraction")
		}
	}
}

// extracts returns the gravities of two extracts [% mass], their SG by the
// default fit.
func extracts(oe, ae gravity.Plato) (attenuation.Gravities, error) {
	fit := gravity.Fits.Default().Fn
	og, err := fit.SG(oe)
	if err != nil {
		return attenuation.Gravities{}, err
	}
	fg, err := fit.SG(ae)
	return attenuation.Gravities{OG: og, FG: fg, OE: oe, AE: ae}, err
}

// parts returns alcohol and real extract by mass, NaN where the method gives none.
func parts(a attenuation.Alcohol) (abw, re float64) {
	abw, re = nan, nan
	if a.ABW != nil {
		abw = float64(*a.ABW)
	}
	if a.RE != nil {
		re = float64(*a.RE)
	}
	return abw, re
}

// difference returns the gravities that lie points apart, the lower at water.
func difference(points float64) (attenuation.Gravities, error) {
	return attenuation.NewGravities(gravity.Points(points).SG(), 1, gravity.Fits.Default())
}

// dutyBands compares the factor at both ends of each band and the strength
// printed at its upper one.
func dutyBands(r Relations, t *tally) {
	e := find(t, r.ABV, "uk-duty")
	if t.err != nil {
		return
	}
	for _, row := range t.file.Rows {
		for _, end := range []string{"diff_from", "diff_to"} {
			d := t.number(row, end)
			g, err := difference(d)
			if err != nil || d == 0 { // no difference shows no factor
				t.fail(err)
				continue
			}
			a, err := e.Fn(g)
			t.value(e.Info, row, "f at "+end, t.number(row, "f"), float64(a.ABV)/d, t.tolerance(row, e.ID, "f"), err, "% vol per point")
			if end == "diff_to" {
				t.row(e.Info, e.ID, row, "printed_ABV_to", float64(a.ABV), err, unitVol)
			}
		}
	}
}

// must compares potential alcohol and refraction of grape must.
func must(r Relations, t *tally) {
	e := find(t, r.ABV, "must-1683")
	if t.err != nil {
		return
	}
	for _, row := range t.file.Rows {
		// Water of 0.9982 kg/L turns the mass per volume into SG 20/20.
		og := gravity.SG(t.number(row, "must_rho_kg_L") / 0.9982)
		g, err := attenuation.NewGravities(og, og, gravity.Fits.Default())
		if err != nil {
			t.fail(err)
			return
		}
		a, err := e.Fn(g)
		t.row(e.Info, e.ID, row, "abv_at_16.83", float64(a.ABV), err, unitVol)
		sugar, err := attenuation.MustSugar(og)
		t.row(e.Info, e.ID, row, "sugar_g_L", float64(sugar), err, unitGPL)
	}
	refraction(r, t, "sucrose_pct", "nD20")
}
