package attenuation

import (
	"gylebook/gravity"
	"gylebook/gravity/method"
)

// Wort is an amount at its original state, before anything fermented. Masses add
// up and extracts are weighted by them; volumes do neither.
type Wort struct {
	MassKg  float64
	Extract gravity.Plato // original extract, % mass; sugar is 100, water 0
}

// The extracts [% mass] that an amount may have: those of the sucrose model, and
// up to dry sugar by mass.
const (
	minAmount gravity.Plato = -10
	maxVolume gravity.Plato = 85
	dry       gravity.Plato = 100
)

// FromVolume returns litres at t [°C, 0 to 100] of a wort of extract [% mass, -10
// to 85], its density by the sucrose model at t (ICUMSA SPS-4). What is outside
// these, or no volume, gives the zero Wort.
func FromVolume(litres float64, extract gravity.Plato, t gravity.Celsius) Wort {
	if !(litres > 0 && litres <= 1e12 && extract >= minAmount && extract <= maxVolume && t >= 0 && t <= 100) {
		return Wort{}
	}
	return Wort{MassKg: litres / 1000 * float64(gravity.SucroseDensity(extract, t)), Extract: extract}
}

// Known reports whether w is an amount: a mass above zero and an extract of -10 to
// 100 % mass.
func (w Wort) Known() bool {
	return w.MassKg > 0 && w.MassKg <= 1e12 && w.Extract >= minAmount && w.Extract <= dry
}

// Litres returns the volume of w at 20 °C by the sucrose model, 0 when it is not
// Known or more concentrated than the model reaches.
func (w Wort) Litres() float64 {
	if !w.Known() || w.Extract > maxVolume {
		return 0
	}
	return 1000 * w.MassKg / float64(gravity.SucroseDensity(w.Extract, 20))
}

// Add returns both amounts together, by mass balance: the original extract of a
// mixture is Σ mass·extract over Σ mass. An amount that is not Known adds nothing.
func (w Wort) Add(x Wort) Wort {
	switch {
	case !x.Known():
		return w
	case !w.Known():
		return x
	}
	mass := w.MassKg + x.MassKg
	extract := (gravity.Plato(w.MassKg)*w.Extract + gravity.Plato(x.MassKg)*x.Extract) / gravity.Plato(mass)
	return Wort{MassKg: mass, Extract: extract}
}

// DilutionWater returns the water [kg] that brings w down to target [% mass]. It
// returns a *method.RangeError for an amount that is none and for a target that is
// not above 0 and at most w's own extract.
func DilutionWater(w Wort, target gravity.Plato) (kg float64, err error) {
	if !w.Known() {
		return 0, &method.RangeError{What: "mass to dilute", Got: w.MassKg, Lo: 0, Hi: 1e12, Unit: "kg", Hint: "give the mass or the volume"}
	}
	if !(target >= MinExtract && target <= w.Extract) {
		return 0, &method.RangeError{
			What: "extract after dilution", Got: float64(target), Lo: float64(MinExtract), Hi: float64(w.Extract), Unit: "% mass",
			Hint: "water only lowers the extract",
		}
	}
	return w.MassKg * float64(w.Extract/target-1), nil
}

// PrimedStrength returns the alcohol that a liquid reaches when all extract of
// priming ferments out in it: w is its amount at the original state, a its present
// attenuation at SG fg. It is an upper bound where the priming is not all sugar.
// Carbon dioxide leaves the balance as in the main fermentation. It returns a
// *method.RangeError when an amount is not known.
// Source: Balling balance; density of the mixture by Tabarié's rule.
func PrimedStrength(w Wort, a Attenuation, fg gravity.SG, priming Wort) (Alcohol, error) {
	for _, x := range []Wort{w, priming} {
		if !x.Known() {
			return Alcohol{}, &method.RangeError{What: "mass for the expected strength", Got: x.MassKg, Lo: 0, Hi: 1e12, Unit: "kg", Hint: "give the batch volume and the mass of sugar"}
		}
	}
	if err := checkSG("present gravity", fg); err != nil {
		return Alcohol{}, err
	}
	const loss = gravity.CO2PerAlcohol + gravity.YeastPerAlcohol
	// Present mass P: w − loss·ethanol, and ethanol is a share of P itself.
	present := w.MassKg / (1 + loss*float64(a.ABW)/100)
	gained := priming.MassKg * float64(priming.Extract) / 100 / gravity.ExtractPerAlcohol
	after := present + priming.MassKg - loss*gained
	m := gravity.Mixture{
		Alcohol: gravity.MassPct((float64(a.ABW)*present + 100*gained) / after),
		Extract: gravity.Plato(float64(a.RE) * present / after),
	}
	// The model gives the change of gravity; the gravity itself was read.
	iso := gravity.MixtureAt(20)
	sg := fg + gravity.SG(iso.Relative(m)-iso.Relative(gravity.Mixture{Alcohol: a.ABW, Extract: a.RE}))
	if err := checkSG("gravity after priming", sg); err != nil {
		return Alcohol{}, err
	}
	return byMass(m.Alcohol, m.Extract, sg), nil
}
