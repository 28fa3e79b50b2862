package tempcorr

import (
	"errors"

	"gylebook/gravity"
	"gylebook/gravity/method"
)

// Errors that callers may ask for.
var (
	ErrScale       = errors.New("no hydrometer is divided in this scale")
	ErrNeedsOG     = errors.New("the fermenting model needs the original gravity")
	ErrCertificate = errors.New("certificate readings must ascend")
)

// Sample is the liquid as it was read.
type Sample struct {
	T  gravity.Celsius
	OE gravity.Plato // original extract, % mass; 0 when it is not known
}

// Func returns the value on the instrument's scale at its reference temperature
// of a reading r (same scale) taken in s.
type Func func(f Float, r float64, s Sample) (float64, error)

// Methods are the temperature corrections, the default first.
var Methods = method.Set[Func]{
	{Info: method.Info{
		ID: "sucrose", Kind: "correction", Name: "sucrose solution and floating body",
		Source: method.Source{Author: "ICUMSA", Where: "Methods Book SPS-4 for the liquid; ISO 1768:1975 for the glass", Status: method.Quoted},
		Valid:  []method.Range{{Of: "sample temperature", Lo: 10, Hi: 30, Unit: "°C"}},
		Error:  "0.03 °Bx against Bigelow & Stevenson (1923)",
		Check:  "Bigelow & Stevenson 1923, Table 8, at 5 °Bx",
		Use:    "wort and must before fermentation; anything whose OG is not known",
	}, Fn: Sucrose},
	{Info: method.Info{
		ID: "fermenting", Kind: "correction", Name: "fermenting mixture and floating body",
		Source: method.Source{Author: "Balling, Tabarié, OIML R 22", Where: "composition by the Balling balance, density by R 22 and SPS-4", Status: method.Derived},
		Valid:  []method.Range{{Of: "sample temperature", Lo: 10, Hi: 30, Unit: "°C"}},
		Error:  "no published table; the liquids are checked singly",
		Check:  "equals sucrose when there is no alcohol",
		Use:    "fermenting or finished beer, cider and mead whose OG is known; ends at 40 °C",
	}, Fn: Fermenting},
	{Info: method.Info{
		ID: "lyons1992", Kind: "correction", Name: "temperature-only cubic, for comparison",
		Source: method.Source{Author: "Lyons", Year: 1992, Where: "Homebrew Digest 963, 7 Sep 1992", Status: method.Read},
		Valid:  []method.Range{{Of: "sample temperature", Lo: 0, Hi: 100, Unit: "°C"}},
		Error:  "0.17 point against its own table; -1.26 points at 1.080 and 35 °C",
		Check:  "its own table, Homebrew Digest 963",
		Use:    "comparison only: water, no glass, a 59 °F instrument; +0.11 point at 59 °F",
	}, Fn: Lyons1992},
}

// Limits of the sample temperature [°C].
const (
	MinTemp gravity.Celsius = 0
	MaxTemp gravity.Celsius = 60
	// maxMixture is where OIML R 22 ends.
	maxMixture gravity.Celsius = 40
)

// Sucrose corrects r for a sucrose solution floating a body of f's material;
// 0 to 60 °C, best 15 to 25. Within 0.03 °Bx of Bigelow & Stevenson (1923).
// Sources: ICUMSA SPS-4, ISO 1768:1975.
func Sucrose(f Float, r float64, s Sample) (float64, error) {
	if f.Scale == gravity.ScaleSG {
		x := IsothermalAt(f.Basis, f.Expansion, s.T)
		return x.Correct(r)
	}
	mark, err := f.MarkDensity(r)
	if err != nil {
		return 0, err
	}
	if s.T == f.Basis.Sample {
		return r, nil
	}
	at := gravity.SucroseAt(s.T)
	p, err := at.Extract(mark / gravity.Density(f.factor(s.T)))
	if err != nil {
		return 0, err
	}
	if f.Scale.IsMass() {
		return float64(p), nil
	}
	ref := gravity.SucroseAt(f.Basis.Sample)
	return f.Mark(ref.Density(p))
}

// Fermenting corrects r for a liquid of original extract s.OE that has begun to
// ferment: alcohol and extract from the Balling balance, density by Tabarié's
// rule at both temperatures, composition by mass held constant. It returns
// ErrNeedsOG without an OE and a *method.RangeError above 40 °C. A value that
// comes out at or above the OE is corrected as sucrose.
func Fermenting(f Float, r float64, s Sample) (float64, error) {
	rho, _, err := ferment(f, r, s)
	if err != nil {
		return 0, err
	}
	if s.T == f.Basis.Sample {
		return r, nil
	}
	return f.Mark(rho)
}

// ferment returns the density at the reference temperature and the composition.
func ferment(f Float, r float64, s Sample) (gravity.Density, gravity.Mixture, error) {
	if s.OE <= 0 {
		return 0, gravity.Mixture{}, ErrNeedsOG
	}
	if s.T > maxMixture {
		return 0, gravity.Mixture{}, &method.RangeError{
			What: "sample temperature for the fermenting model", Got: float64(s.T),
			Lo: float64(MinTemp), Hi: float64(maxMixture), Unit: "°C", Hint: "cool the sample, or leave the OG out",
		}
	}
	mark, err := f.MarkDensity(r)
	if err != nil {
		return 0, gravity.Mixture{}, err
	}
	at, ref := gravity.MixtureAt(s.T), gravity.MixtureAt(f.Basis.Sample)
	at20 := ref
	if f.Basis.Sample != 20 {
		at20 = gravity.MixtureAt(20)
	}
	factor := gravity.Density(f.factor(s.T))
	rho := mark / factor
	to20 := gravity.Density(1)
	var m gravity.Mixture
	// The ratio of densities hardly depends on the composition, so each round
	// gains two digits; 40 is never reached.
	for range 40 {
		ae, err := f.apparentExtract(rho, to20)
		if err != nil {
			return 0, m, err
		}
		m = gravity.Fermented(s.OE, ae)
		atRef := ref.Density(m)
		if f.Basis.Sample != 20 {
			to20 = at20.Density(m) / atRef
		}
		next := mark / factor * atRef / at.Density(m)
		if d := next - rho; d < 1e-9 && d > -1e-9 {
			return next, m, nil
		}
		rho = next
	}
	return rho, m, nil
}

// apparentExtract returns the extract [% mass] that the trade reads from density
// rho at the reference temperature; to20 is the liquid's own density at 20 °C
// over that at the reference temperature.
func (f Float) apparentExtract(rho, to20 gravity.Density) (gravity.Plato, error) {
	if f.Scale.IsMass() {
		p, err := f.Mark(rho)
		return gravity.Plato(p), err
	}
	fit := gravity.Fits.Default().Fn
	s := gravity.SG(rho * to20 / gravity.Kell(20))
	if f.Scale == gravity.ScaleDensity {
		return fit.TrueExtract(s), nil
	}
	return fit.Extract(s), nil
}

// Lyons1992 adds the temperature-only cubic, made for water and a 59 °F
// instrument without glass; 0.17 point against its own table.
// Source: C. Lyons 1992, Homebrew Digest 963.
func Lyons1992(f Float, r float64, s Sample) (float64, error) {
	d, err := f.shift(r, LyonsPoints(s.T))
	return r + d, err
}

// LyonsPoints returns the cubic itself, in points, at t [°C].
func LyonsPoints(t gravity.Celsius) float64 {
	x := t.Fahrenheit()
	// Lyons (1992): the fit stated, T in °F
	return 1.313454 + x*(-0.132674+x*(2.057793e-3-x*2.627634e-6))
}
