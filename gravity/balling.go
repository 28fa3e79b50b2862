package gravity

// The Balling balance. 2.0665 g of extract gives 1 g of ethanol, 0.9565 g of
// carbon dioxide and 0.11 g of yeast.
// Source: C. J. N. Balling, Die Bierbrauerei, 1854/1865.
const (
	ExtractPerAlcohol = 2.0665 // g extract fermented per g ethanol
	CO2PerAlcohol     = 0.9565 // g CO2 per g ethanol
	YeastPerAlcohol   = 0.11   // g yeast per g ethanol
	lossPerAlcohol    = CO2PerAlcohol + YeastPerAlcohol
)

// OriginalExtract returns the original extract [% mass] of a liquid that now
// holds a [% mass] ethanol and real extract re [% mass].
func OriginalExtract(a MassPct, re Plato) Plato {
	// Balling (1865): p = 100 (2.0665 A + n) / (100 + 1.0665 A)
	return Plato(100 * (ExtractPerAlcohol*float64(a) + float64(re)) / (100 + lossPerAlcohol*float64(a)))
}

// AlcoholFromBalance returns ethanol [% mass] from original and real extract
// [% mass], the same equation solved for A.
func AlcoholFromBalance(oe, re Plato) MassPct {
	return MassPct(float64(oe-re) / (ExtractPerAlcohol - lossPerAlcohol/100*float64(oe)))
}

// RealExtractFromBalance returns real extract [% mass] from original extract
// [% mass] and ethanol [% mass], the same equation solved for n.
func RealExtractFromBalance(oe Plato, a MassPct) Plato {
	return oe - Plato(float64(a)*(ExtractPerAlcohol-lossPerAlcohol/100*float64(oe)))
}

// AttenuationQuotient returns q = (OE − AE)/(OE − RE), without unit, of a wort of
// original extract oe [% mass]. Source: Balling 1865, linear form of his table.
func AttenuationQuotient(oe Plato) float64 { return 1.22 + 0.001*float64(oe) }

// RealExtract returns real extract [% mass] from original and apparent extract
// [% mass] through the attenuation quotient. Source: Balling 1865.
func RealExtract(oe, ae Plato) Plato {
	return oe - Plato(float64(oe-ae)/AttenuationQuotient(oe))
}
