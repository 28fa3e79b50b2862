package attenuation

import (
	"gylebook/gravity"
	"gylebook/gravity/asread"
)

// water20 is the density of water at 20 °C [kg/m³] that alcohol by volume and
// extract per litre are taken with, in the two digits that the trade carries.
const water20 = 998.2

// beerDensity returns the density [kg/m³ at 20 °C] of a liquid of SG fg.
func beerDensity(fg gravity.SG) gravity.Density { return gravity.Density(fg * water20) }

// VolumeOf returns ethanol [% vol at 20 °C] of a [% mass] in a liquid of SG fg.
func VolumeOf(a gravity.MassPct, fg gravity.SG) gravity.VolPct {
	return gravity.VolPct(float64(a) * float64(beerDensity(fg)/gravity.PureEthanol20))
}

// byMass completes an alcohol by mass with its volume and the real extract.
func byMass(a gravity.MassPct, re gravity.Plato, fg gravity.SG) Alcohol {
	return Alcohol{ABV: VolumeOf(a, fg), ABW: &a, RE: &re}
}

// balling is the default: real extract through the attenuation quotient, alcohol
// through the balance. Source: Balling 1865.
func balling(g Gravities) (Alcohol, error) {
	if err := g.fermentable(); err != nil {
		return Alcohol{}, err
	}
	m := gravity.Fermented(g.OE, g.AE)
	return byMass(m.Alcohol, m.Extract, g.FG), nil
}

// ballingConst takes real extract as a fixed mean of original and apparent
// extract, as if the attenuation quotient were the same for every wort; low by
// 0.1 °P at 12 °P and 0.3 to 0.5 above 20 °P.
func ballingConst(g Gravities) (Alcohol, error) {
	if err := g.fermentable(); err != nil {
		return Alcohol{}, err
	}
	// RE = 0.1808 OE + 0.8192 AE, written so that equal extracts stay equal.
	re := g.AE + 0.1808*(g.OE-g.AE)
	return byMass(gravity.AlcoholFromBalance(g.OE, re), re, g.FG), nil
}

// cutaia returns the regression on 532 measured beers, original extract 9.4 to
// 18.0 °P. Source: Cutaia, Reid & Speers 2009, Table VI. (A copy of the real
// extract form without its minus sign circulates: real extract must fall with
// original extract at equal attenuation.)
func cutaia(g Gravities) (Alcohol, error) {
	if err := g.fermentable(); err != nil {
		return Alcohol{}, err
	}
	oe, d := float64(g.OE), float64(g.OE-g.AE)
	a := gravity.MassPct((0.372 + 0.00357*oe) * d)
	re := gravity.Plato(oe - (0.814-0.000862*oe)*d)
	return byMass(a, re, g.FG), nil
}

// factor131 is the trade's one factor on the difference.
func factor131(g Gravities) (Alcohol, error) {
	return byFactor(g, 131.25)
}

// mead132 is a factor on the difference at constant volume.
func mead132(g Gravities) (Alcohol, error) {
	return byFactor(g, 132)
}

// exactPlaces is beyond what a float64 of an SG holds.
const exactPlaces = 17

func byFactor(g Gravities, f float64) (Alcohol, error) {
	if err := g.fermentable(); err != nil {
		return Alcohol{}, err
	}
	// In decimal: a declared figure is cut from it, and a tie must be a tie.
	diff := asread.RoundDiff(float64(g.OG), float64(g.FG), 1, exactPlaces, asread.HalfEven)
	return Alcohol{ABV: gravity.VolPct(asread.Product(f, diff))}, nil
}

// hall1995 is alcohol by mass from two gravities, with ethanol of 0.794 relative
// density. Source: Hall, Zymurgy, Summer 1995, as cited.
func hall1995(g Gravities) (Alcohol, error) {
	if err := g.fermentable(); err != nil {
		return Alcohol{}, err
	}
	og, fg := float64(g.OG), float64(g.FG)
	a := gravity.MassPct(76.08 * (og - fg) / (1.775 - og))
	return Alcohol{ABV: gravity.VolPct(float64(a) * fg / 0.794), ABW: &a}, nil
}
