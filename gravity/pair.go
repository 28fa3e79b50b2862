package gravity

// Converting a relative density to another pair goes through the density of the
// liquid, never by renaming: the liquid's own expansion lies in between.

// SG returns r on the pair 20/20 °C, taking the liquid for a sucrose solution.
// It returns a *method.RangeError for a density no such solution has.
func (r Relative) SG() (SG, error) {
	if r.Pair == Pair2020 {
		return SG(r.Value), nil
	}
	to, err := r.On(Pair2020)
	return SG(to.Value), err
}

// On returns r on another pair, taking the liquid for a sucrose solution. It
// returns a *method.RangeError for a density no such solution has.
func (r Relative) On(pair Pair) (Relative, error) {
	if r.Pair == pair {
		return r, nil
	}
	at := SucroseAt(r.Pair.Sample)
	p, err := at.Extract(r.Density())
	if err != nil {
		return Relative{}, err
	}
	to := SucroseAt(pair.Sample)
	return RelativeOf(to.Density(p), pair), nil
}

// MixtureOn returns r on another pair for a fermented liquid of composition m.
func (r Relative) MixtureOn(pair Pair, m Mixture) Relative {
	from, to := MixtureAt(r.Pair.Sample), MixtureAt(pair.Sample)
	ratio := to.Density(m) / from.Density(m)
	return RelativeOf(r.Density()*ratio, pair)
}

// FermentedSG returns r on the pair 20/20 °C for a liquid of original extract oe
// [% mass] that has fermented: its composition follows from its own apparent
// extract by the default fit. It returns a *method.RangeError for a density that
// no such liquid has.
func (r Relative) FermentedSG(oe Plato) (SG, error) {
	s, err := r.SG()
	if err != nil || r.Pair == Pair2020 {
		return s, err
	}
	fit := Fits.Default().Fn
	for range 40 {
		next := SG(r.MixtureOn(Pair2020, Fermented(oe, fit.Extract(s))).Value)
		if d := next - s; d < 1e-12 && d > -1e-12 {
			break
		}
		s = next
	}
	return s, CheckSG(s)
}

// Density returns the density [kg/m³] at the pair's sample temperature, with the
// water of the sucrose model.
func (r Relative) Density() Density { return Density(r.Value) * Kell(r.Pair.Water) }

// RelativeOf returns the relative density on pair of a liquid of density rho
// [kg/m³] at the pair's sample temperature.
func RelativeOf(rho Density, pair Pair) Relative {
	return Relative{float64(rho / Kell(pair.Water)), pair}
}

// Relative returns s with its pair, 20/20 °C.
func (s SG) Relative() Relative { return Relative{float64(s), Pair2020} }

// airPerWater is 1.2/(998.2 − 1.2): air of 1.2 kg/m³ (common practice) over the
// apparent density of water at 20 °C.
const airPerWater = 0.001204

// InAir returns the relative density 20/20 °C as weighed in air of 1.2 kg/m³,
// (rho − 1.2)/(rho_w − 1.2): 6e-5 above the true one at 1.05.
func (s SG) InAir() SG { return s + airPerWater*(s-1) }

// FromAir is the inverse of InAir.
func (s SG) FromAir() SG { return (s + airPerWater) / (1 + airPerWater) }

// Density20 returns the density at 20 °C [kg/m³] of true SG s, on the water of
// the sucrose model (998.2031 kg/m³).
func (s SG) Density20() Density { return Density(s) * Kell(20) }
