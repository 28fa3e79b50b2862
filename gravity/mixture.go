package gravity

import "gylebook/gravity/method"

// Mixture is a fermenting or fermented liquid of fixed composition by mass.
type Mixture struct {
	Alcohol MassPct // ethanol, % mass
	Extract Plato   // real extract, % mass
}

// Fermented returns the composition of a liquid of original extract oe that
// reads apparent extract ae (both % mass), by the Balling balance. A reading at
// or above the original extract has no alcohol.
func Fermented(oe, ae Plato) Mixture {
	if ae >= oe {
		return Mixture{Extract: ae}
	}
	re := RealExtract(oe, ae)
	return Mixture{Alcohol: AlcoholFromBalance(oe, re), Extract: re}
}

// MixtureIsotherm holds both liquid models at one temperature.
type MixtureIsotherm struct {
	ethanol EthanolIsotherm
	sucrose SucroseIsotherm
}

// MixtureAt returns the fermenting mixture's models at t [°C], -20 to 40 °C.
func MixtureAt(t Celsius) MixtureIsotherm {
	return MixtureIsotherm{EthanolAt(t), SucroseAt(t)}
}

// mixtureTolerance is the stated tolerance of a mixture's relative density.
const mixtureTolerance = 1e-13

// Relative returns the relative density of m over water at the isotherm's
// temperature.
//
// Tabarié's rule adds densities of equal volumes: the distillate made up to the
// sample's volume holds the same alcohol per litre, the residue the same extract
// per litre, and S = S_alcohol + S_residue − 1. The composition is by mass, so
// the shares in distillate and residue follow from S itself; the loop converges
// in a few steps. Within the 95 % band below 5 % extract and 18 % ethanol by
// mass (Hackbarth 2009, 2011, abstracts).
func (x *MixtureIsotherm) Relative(m Mixture) float64 {
	wa, ws := float64(x.ethanol.Water()), float64(x.sucrose.Water())
	sa, sr := 1.0, 1.0
	s := 1.0
	for range 60 {
		sa = float64(x.ethanol.Density(m.Alcohol*MassPct(s/sa))) / wa
		sr = float64(x.sucrose.Density(m.Extract*Plato(s/sr))) / ws
		next := sa + sr - 1
		if d := next - s; d < mixtureTolerance && d > -mixtureTolerance {
			return next
		}
		s = next
	}
	return s
}

// Density returns the density [kg/m³] of m at the isotherm's temperature.
func (x *MixtureIsotherm) Density(m Mixture) Density {
	return Density(x.Relative(m)) * x.sucrose.Water()
}

// TabarieInfo is the provenance of the fermenting mixture.
var TabarieInfo = method.Info{
	ID: "tabarie", Kind: "mixture density", Name: "density of beer, cider and mead from alcohol and extract",
	Source: method.Source{Author: "Tabarié", Year: 1830, Where: "as printed in OIV-MA-AS2-03B; year from memory", Status: method.Quoted},
	Valid:  []method.Range{{Of: "real extract", Lo: 0, Hi: 5, Unit: "% mass"}, {Of: "ethanol", Lo: 0, Hi: 18, Unit: "% mass"}},
	Error:  "95 % band of Hackbarth (2009, 2011, abstracts)",
	Check:  "measured brews, USDA Bulletin 493 (1917)",
	Use:    "liquids that hold both alcohol and extract; strong or sweet mead is outside",
}
