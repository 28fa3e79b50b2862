package selfcheck

import (
	"gylebook/attenuation"
	"gylebook/gravity"
	"gylebook/testdata/published"
)

const (
	unitVol = "% vol"
	brewABV = "abv20_from_g100mL"
)

// meanBias [% vol] is how far the default and the reference model may lie from
// the measured brews on average. With a scatter of 0.14 % vol the mean of 16 is
// known to 0.04; the rest is what the analysis of its day may be off by.
const meanBias = 0.15

// brews compares measured brews, whose gravities stand on 60/60 °F: every alcohol
// method where the row names it or it is in its range, the mixture's density, and
// the real degree of fermentation.
func brews(r Relations, t *tally) {
	for _, e := range r.ABV {
		if e.Kind != attenuation.KindABV {
			continue
		}
		var sum float64
		var n int
		for _, row := range t.file.Rows {
			g, err := t.brewGravities(row)
			if err != nil {
				t.fail(err)
				return
			}
			a, err := e.Fn(g)
			if err == nil && !named(row, e.ID) && len(attenuation.InRange(e, g, a)) != 0 {
				continue
			}
			t.row(e.Info, e.ID, row, brewABV, float64(a.ABV), err, unitVol)
			sum += float64(a.ABV) - t.number(row, brewABV)
			n++
		}
		if t.err == nil && n > 0 && (e.ID == "balling" || e.ID == "densimetric") {
			t.of(e.Info, "mean of the brews", unitVol).compare(t.file.Name+".csv, mean of all", 0, sum/float64(n), meanBias)
		}
	}
	for _, row := range t.file.Rows {
		t.beer(row)
	}
}

// brewGravities returns both gravities on 20/20 °C, the beer's by the mixture.
func (t *tally) brewGravities(row published.Row) (attenuation.Gravities, error) {
	fit := gravity.Fits.Default()
	og, err := gravity.Relative{Value: t.number(row, "wort_SG"), Pair: gravity.Pair6060F}.SG()
	if err != nil {
		return attenuation.Gravities{}, err
	}
	fg, err := gravity.Relative{Value: t.number(row, "beer_SG"), Pair: gravity.Pair6060F}.FermentedSG(fit.Fn.Extract(og))
	if err != nil {
		return attenuation.Gravities{}, err
	}
	return attenuation.NewGravities(og, fg, fit)
}

// sixty is the temperature of the pair of the brews.
var sixty = gravity.Pair6060F.Sample

// beer compares what follows from the analysis of the beer alone.
func (t *tally) beer(row published.Row) {
	alcohol, extract := t.number(row, "alcohol_g100mL"), t.number(row, "real_extract_g100mL")
	sg := t.number(row, "beer_SG")
	// g/100 mL over the beer's density in g/mL is % mass.
	density := sg * float64(gravity.Kell(sixty)) / 1000
	m := gravity.Mixture{Alcohol: gravity.MassPct(alcohol / density), Extract: gravity.Plato(extract / density)}
	iso := gravity.MixtureAt(sixty)
	t.row(gravity.TabarieInfo, gravity.TabarieInfo.ID, row, "beer_SG", iso.Relative(m), nil, "SG 60/60F")

	// The bulletin counts 2 g of extract for 1 g of alcohol, RDF counts 2.0665:
	// the ratio of fermented to real extract goes over in that proportion.
	x := attenuation.RDF(m.Alcohol, m.Extract) / 100
	ratio := x / (1 - x) * 2 / gravity.ExtractPerAlcohol
	t.row(attenuation.RDFInfo, attenuation.RDFInfo.ID, row, "degree_ferm_printed", 100*ratio/(1+ratio), nil, "%")
}
