package gravity

import (
	"gylebook/gravity/method"
	"gylebook/gravity/root"
)

// SucroseFunc returns the density [kg/m³] of a sucrose solution of p % mass at t [°C].
type SucroseFunc func(p Plato, t Celsius) Density

// SucroseDensities are the density models of sucrose solutions.
var SucroseDensities = method.Set[SucroseFunc]{
	{Info: method.Info{
		ID: "icumsa-sps4", Kind: "sucrose density", Name: "density of sucrose solutions",
		Source: method.Source{
			Author: "ICUMSA", Year: 1994,
			Where:  "Methods Book SPS-4 (year and primary source from memory); Bubnik, Kadlec, Urban & Bruhns 1995, Sugar Technologists Manual, p. 164",
			Status: method.Quoted,
		},
		Valid: []method.Range{{Of: "extract", Lo: 0, Hi: 85, Unit: "% mass"}, {Of: "temperature", Lo: 0, Hi: 100, Unit: "°C"}},
		Error: "9e-5 SG against NBS C440 to 30 %; rms 0.05 kg/m³ to 25 % at 15 and 20 °C",
		Check: "NBS C440 Table 114, CRC, 15/20 °C densities; no published table was found above 31 °C",
		Use:   "wort and must before fermentation",
	}, Fn: SucroseDensity},
}

// TableCheckedTo is the highest temperature [°C] for which a published table of
// sucrose solutions was found to check the model against.
const TableCheckedTo Celsius = 31

// Range in which the sucrose model is used, as mass fractions. It was fitted on 0
// to 0.85; below zero it is extrapolated, which is where dry ferments lie, and
// the last hundredth takes in MaxSG.
const (
	minSucrose = -0.30
	maxSucrose = 0.86
)

// sps4 holds the coefficients c_ik, i the power of (t-20)/100, k that of w.
// ICUMSA SPS-4, as transcribed in Bubnik et al. 1995, p. 164.
var sps4 = [5][7]float64{
	{0, 385.1761, 135.3705, 40.9299, -3.9643, 13.4853, -17.2890},
	{0, -46.2720, -7.1720, 1.1597, 5.1126, 17.5254, 0},
	{0, 59.7712, 7.2491, 12.3630, -35.4791, 0, 0},
	{0, -47.2207, -21.6977, 27.6301, 0, 0, 0},
	{0, 18.3184, 12.3081, 0, 0, 0, 0},
}

// SucroseIsotherm is the sucrose model at one temperature: a polynomial in the
// mass fraction, cheap to evaluate many times.
type SucroseIsotherm struct {
	T Celsius
	c [7]float64 // c[0] is water, kg/m³
	// The inverse of the polynomial begins z + back[1] z² + back[2] z³ with
	// z = back[0] (rho - c[0]).
	back [3]float64
}

// SucroseAt returns the model at t [°C].
func SucroseAt(t Celsius) SucroseIsotherm {
	return sucroseAt(&sps4, t)
}

func sucroseAt(coefficients *[5][7]float64, t Celsius) SucroseIsotherm {
	iso := SucroseIsotherm{T: t}
	iso.c[0] = float64(Kell(t))
	tau := (float64(t) - 20) / 100
	for k := 1; k < 7; k++ {
		iso.c[k] = coefficients[0][k] + tau*(coefficients[1][k]+tau*(coefficients[2][k]+tau*(coefficients[3][k]+tau*coefficients[4][k])))
	}
	c1, c2, c3 := iso.c[1], iso.c[2], iso.c[3]
	iso.back = [3]float64{1 / c1, -c2 / c1, (2*c2*c2/c1 - c3) / c1}
	return iso
}

// Coefficients returns water [kg/m³] and the six coefficients of w at this
// temperature.
func (s *SucroseIsotherm) Coefficients() []float64 { return append([]float64(nil), s.c[:]...) }

// SucroseCoefficients returns the published c_ik, row i for ((t-20)/100)^i,
// column k for w^k. Source: ICUMSA SPS-4.
func SucroseCoefficients() [5][7]float64 { return sps4 }

// Water returns the density of water of the same model [kg/m³].
func (s *SucroseIsotherm) Water() Density { return Density(s.c[0]) }

// Density returns the density [kg/m³] at p [% mass].
func (s *SucroseIsotherm) Density(p Plato) Density { return Density(s.at(float64(p) / 100)) }

// at returns the density [kg/m³] at w.
func (s *SucroseIsotherm) at(w float64) float64 {
	c := &s.c
	return c[0] + w*(c[1]+w*(c[2]+w*(c[3]+w*(c[4]+w*(c[5]+w*c[6])))))
}

// slopes returns the first three coefficients of the Taylor series of at around w.
func (s *SucroseIsotherm) slopes(w float64) (d1, d2, d3 float64) {
	c := &s.c
	d1 = c[1] + w*(2*c[2]+w*(3*c[3]+w*(4*c[4]+w*(5*c[5]+w*(6*c[6])))))
	d2 = c[2] + w*(3*c[3]+w*(6*c[4]+w*(10*c[5]+w*(15*c[6]))))
	d3 = c[3] + w*(4*c[4]+w*(10*c[5]+w*(20*c[6])))
	return d1, d2, d3
}

// A step of Extract leaves an error of about 0.15 of its fourth power, so that one
// shorter than lastStep leaves less than 1e-15, which is less than the rounding of
// the density.
const lastStep = 2e-4

// extractTolerance is the stated tolerance of Extract in mass fraction, 1e-11 %.
const extractTolerance = 1e-13

// Extract returns the sucrose content [% mass] that gives density rho [kg/m³] at
// this temperature; below water it is negative and extrapolated. It returns a
// *method.RangeError for a density no solution of -30 to 86 % has.
func (s *SucroseIsotherm) Extract(rho Density) (Plato, error) {
	// The inverted series is a guess good enough for one step up to 25 %. Each step
	// inverts the Taylor series around w up to its third power.
	z := s.back[0] * (float64(rho) - s.c[0])
	w := z + z*z*(s.back[1]+z*s.back[2])
	for range 12 {
		if !(w > minSucrose && w < maxSucrose) {
			break
		}
		d1, d2, d3 := s.slopes(w)
		d1 = 1 / d1
		d2 *= d1
		step := (s.at(w) - float64(rho)) * d1
		w -= step + step*step*(d2+step*(2*d2*d2-d3*d1))
		if step < lastStep && step > -lastStep && w > minSucrose && w < maxSucrose {
			return Plato(100 * w), nil
		}
	}
	// Near the ends a step may leave the range: the bracket decides.
	w, err := root.Find(func(w float64) (float64, float64) {
		d1, _, _ := s.slopes(w)
		return s.at(w) - float64(rho), d1
	}, minSucrose, maxSucrose, extractTolerance)
	if err != nil {
		return 0, &method.RangeError{What: "density", Got: float64(rho), Lo: s.at(minSucrose), Hi: s.at(maxSucrose), Unit: "kg/m³"}
	}
	return Plato(100 * w), nil
}

// SucroseDensity returns the density [kg/m³] of a sucrose solution of p [% mass]
// at t [°C], fitted on 0 to 85 % and 0 to 100 °C; 9e-5 SG against NBS C440 to
// 30 %. Source: ICUMSA SPS-4.
func SucroseDensity(p Plato, t Celsius) Density {
	iso := SucroseAt(t)
	return iso.Density(p)
}
