package attenuation

import (
	"fmt"

	"gylebook/gravity"
	"gylebook/gravity/root"
)

// mixture20 is the fermenting mixture at the temperature of SG 20/20.
var mixture20 = gravity.MixtureAt(20)

const (
	alcoholTolerance = 1e-9 // % mass, tolerance of the solution
	slopeStep        = 1e-4 // % mass, for the slope of the mixture's density
	// dryEnd is a real extract [% mass] below that of any fermented liquid; it
	// closes the bracket.
	dryEnd gravity.Plato = -12
)

// densimetric returns the one alcohol content whose mixture with the real
// extract left by the Balling balance has the density that was read. It uses no
// attenuation quotient and no alcohol table of beers. Real extract to 5 %,
// ethanol to 18 % by mass; tolerance 1e-9 % mass. The original extract comes
// from a fit and the mixture from the sucrose model, which differ by up to
// 9e-5 SG: unfermented liquid gives no alcohol, and none is ever negative.
// Sources: Balling 1865; Tabarié; OIML R 22; ICUMSA SPS-4.
func densimetric(g Gravities) (Alcohol, error) {
	if err := g.fermentable(); err != nil {
		return Alcohol{}, err
	}
	excess := func(a float64) float64 {
		m := gravity.Mixture{Alcohol: gravity.MassPct(a), Extract: gravity.RealExtractFromBalance(g.OE, gravity.MassPct(a))}
		return mixture20.Relative(m) - float64(g.FG)
	}
	if g.FG == g.OG || excess(0) <= 0 {
		return byMass(0, g.OE, g.FG), nil
	}
	most := gravity.AlcoholFromBalance(g.OE, min(dryEnd, g.OE+dryEnd))
	a, err := root.Find(func(a float64) (float64, float64) {
		y := excess(a)
		return y, (excess(a+slopeStep) - y) / slopeStep
	}, 0, float64(most), alcoholTolerance)
	if err != nil {
		return Alcohol{}, fmt.Errorf("no alcohol content gives SG %.4f from %.2f %% original extract: %w", float64(g.FG), float64(g.OE), err)
	}
	x := gravity.MassPct(a)
	return byMass(x, gravity.RealExtractFromBalance(g.OE, x), g.FG), nil
}
