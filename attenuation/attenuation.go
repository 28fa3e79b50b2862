package attenuation

import "gylebook/gravity"

// Attenuation is how far a fermentation has gone, and what the liquid holds.
type Attenuation struct {
	OE, AE, RE      gravity.Plato         // original, apparent, real extract, % mass
	Apparent        float64               // % of the original extract, by apparent extract
	ApparentPoints  float64               // % of the original gravity points; reads higher
	Real            float64               // % of the original extract, by real extract
	RDF             float64               // real degree of fermentation (ASBC), %
	ABW             gravity.MassPct       // ethanol, % mass
	ABV             gravity.VolPct        // ethanol, % vol at 20 °C
	EnergyKcal100mL float64               // kcal
	ResidualGPL     gravity.GramsPerLitre // real extract, g/L at 20 °C
}

// Attenuate returns the attenuations of g with real extract by Balling's
// attenuation quotient. A present gravity at or above the original is accepted:
// its liquid has no alcohol and its attenuations are zero or negative; Check
// tells. It returns a *NoExtractError where there was nothing to ferment and a
// *method.RangeError for an SG that no liquid of the trade has.
func Attenuate(g Gravities) (Attenuation, error) {
	if err := g.possible(); err != nil {
		return Attenuation{}, err
	}
	if err := g.checkExtract(); err != nil {
		return Attenuation{}, err
	}
	m := gravity.Fermented(g.OE, g.AE)
	return Attenuation{
		OE: g.OE, AE: g.AE, RE: m.Extract,
		Apparent:        degree(g.OE, g.AE),
		ApparentPoints:  100 * float64((g.OG-g.FG)/(g.OG-1)),
		Real:            degree(g.OE, m.Extract),
		RDF:             RDF(m.Alcohol, m.Extract),
		ABW:             m.Alcohol,
		ABV:             VolumeOf(m.Alcohol, g.FG),
		EnergyKcal100mL: Energy(m.Alcohol, m.Extract, g.FG),
		ResidualGPL:     Residual(m.Extract, g.FG),
	}, nil
}

// degree returns the share [%] of the original extract that is gone.
func degree(oe, left gravity.Plato) float64 { return 100 * float64((oe-left)/oe) }

// RDF returns the real degree of fermentation [%] of a liquid of a [% mass]
// ethanol and real extract re [% mass]: the extract that was fermented over all
// extract, both by mass of the present liquid. A liquid that holds neither gives
// 0. Source: ASBC Methods of Analysis; it equals 100 (OE − RE)/OE over
// 1 − 0.005161 RE, where 0.005161 is 1.0665/206.65 of the Balling balance.
func RDF(a gravity.MassPct, re gravity.Plato) float64 {
	fermented := gravity.ExtractPerAlcohol * float64(a)
	all := fermented + float64(re)
	if !(all > 0) {
		return 0
	}
	return 100 * fermented / all
}

// LimitDifference returns how many points of % the apparent attenuation of ae
// lies below its limit, that of a forced fermentation of the same wort which
// ended at limitAE (all extracts % mass). One decimal at most is meant:
// laboratories repeat the limit to 2.4 to 3.5 points (Hagen & Schwarz 1999). A
// wort without extract (see MinExtract) gives 0.
func LimitDifference(oe, ae, limitAE gravity.Plato) float64 {
	if !(oe >= MinExtract) {
		return 0
	}
	return degree(oe, limitAE) - degree(oe, ae)
}

// measuredAsh stands for the ash [g/100 g] that a laboratory would subtract from
// the real extract.
const measuredAsh = 0.1

// Energy returns kcal in 100 mL at 20 °C of a liquid of a [% mass] ethanol, real
// extract re [% mass] and SG fg: 6.9 kcal per g ethanol, 4 per g extract, ash
// taken as 0.1 g/100 g. Source: ASBC, as in the Oxford Companion to Beer.
func Energy(a gravity.MassPct, re gravity.Plato, fg gravity.SG) float64 {
	// An extract below the ash has no energy to take away from the alcohol's.
	extract := max(0, float64(re)-measuredAsh)
	return (6.9*float64(a) + 4*extract) * float64(fg)
}

// Residual returns real extract [g/L at 20 °C] of a liquid of real extract re
// [% mass] and SG fg, on water of 998.2 kg/m³.
func Residual(re gravity.Plato, fg gravity.SG) gravity.GramsPerLitre {
	return gravity.ExtractGPL(re, beerDensity(fg))
}

// Carbon dioxide of one gravity point that ferments, if no yeast grows.
const (
	co2GPLPerPoint     = 1.1  // g/L
	co2VolumesPerPoint = 0.55 // volumes of gas at 0 °C in one of liquid
)

// CO2ToCome returns how much carbon dioxide points of gravity still to ferment
// can give at most, in g/L and in volumes, on top of what is dissolved and of
// priming sugar. Nothing left gives 0. Derived, no yeast growth: a point of
// apparent gravity is about 2.1 g/L of real extract, of which half becomes gas.
func CO2ToCome(points float64) (gPerL, volumes float64) {
	if !(points > 0) {
		return 0, 0
	}
	return co2GPLPerPoint * points, co2VolumesPerPoint * points
}
