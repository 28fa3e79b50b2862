package tempcorr

import "gylebook/gravity"

// Isothermal corrects many SG readings of one floating body at one temperature.
// It holds what does not depend on the reading; what it gives is to the last digit
// what Sucrose and Correct give.
type Isothermal struct {
	same    bool // read at the reference temperature
	basis   gravity.Pair
	water   gravity.Density // of the pair, kg/m³
	factor  gravity.Density // growth of the body
	at, ref gravity.SucroseIsotherm
}

// Figures is a corrected SG reading with what follows from it.
type Figures struct {
	Corrected float64       // on the instrument's pair
	SG        gravity.SG    // 20/20
	Extract   gravity.Plato // % mass
}

// IsothermalAt returns the sucrose correction of an SG instrument on pair basis,
// its body of the cubic expansion given [1/K], at t [°C]; 0 to 60 °C, best 15 to
// 25. Sources: ICUMSA SPS-4, ISO 1768:1975.
func IsothermalAt(basis gravity.Pair, expansion float64, t gravity.Celsius) Isothermal {
	f := Float{Scale: gravity.ScaleSG, Basis: basis, Expansion: expansion}
	return Isothermal{
		same: t == basis.Sample, basis: basis,
		water: gravity.Kell(basis.Water), factor: gravity.Density(f.factor(t)),
		at: gravity.SucroseAt(t), ref: gravity.SucroseAt(basis.Sample),
	}
}

// Correct returns the SG at the reference temperature of reading r. It returns a
// *method.RangeError for a density that no sucrose solution has.
func (x *Isothermal) Correct(r float64) (float64, error) {
	if x.same {
		return r, nil
	}
	p, err := x.at.Extract(gravity.Density(r) * x.water / x.factor)
	if err != nil {
		return 0, err
	}
	return float64(x.ref.Density(p) / x.water), nil
}

// Figures corrects r [SG] and gives what follows from it, extract by the default
// fit. Its errors are those of Correct and of gravity.CheckSG.
func (x *Isothermal) Figures(r float64) (Figures, error) {
	// As Correct does, a reading is judged by the density that its mark stands for.
	if err := gravity.CheckSG(gravity.SG(gravity.Density(r) * x.water / x.water)); err != nil {
		return Figures{}, err
	}
	corrected, err := x.Correct(r)
	if err != nil {
		return Figures{}, err
	}
	out := Figures{Corrected: corrected}
	rel := gravity.Relative{Value: float64(gravity.Density(corrected) * x.water / x.water), Pair: x.basis}
	if out.SG, err = rel.SG(); err != nil {
		return Figures{}, err
	}
	out.Extract = gravity.ASBC(out.SG)
	return out, gravity.CheckSG(out.SG)
}
