package tempcorr

import (
	"fmt"

	"gylebook/gravity"
)

// Meniscus says where on the meniscus a scale is read.
type Meniscus string

// The two places.
const (
	Bottom Meniscus = "bottom"
	Top    Meniscus = "top"
)

// Hydrometer is what is known of an instrument. Zero values mean not known.
type Hydrometer struct {
	ID          string // "" when no instrument is named
	Scale       gravity.Scale
	Basis       gravity.Pair
	Body        Body
	ReadAt      Meniscus      // where its scale is meant to be read; "" is bottom
	Division    float64       // one division, in Scale
	MaxError    float64       // largest error its maker allows, in Scale
	StemMM      float64       // stem diameter, mm
	MassG       float64       // mass, g
	Adjusted    float64       // surface tension it was adjusted for, mN/m
	InLiquid    bool          // its corrections were found in the drink itself
	Certificate []Certificate // ascending readings
}

// New returns an instrument of which only scale, basis and body are known.
func New(scale gravity.Scale, basis gravity.Pair, body Body) Hydrometer {
	return Hydrometer{Scale: scale, Basis: basis, Body: body, ReadAt: Bottom}
}

// Float is the part of a hydrometer that decides the temperature correction.
type Float struct {
	Scale     gravity.Scale
	Basis     gravity.Pair
	Expansion float64 // 1/K
}

// Float returns the floating body.
func (h Hydrometer) Float() Float { return Float{h.Scale, h.Basis, h.Body.Expansion} }

// factor is the growth of the body's volume from its reference to t.
func (f Float) factor(t gravity.Celsius) float64 {
	return 1 + f.Expansion*float64(t-f.Basis.Sample)
}

// modulus of a Baumé instrument: the one that belongs to its pair.
func (f Float) modulus() gravity.Modulus {
	if f.Basis == gravity.Pair154 {
		return gravity.Modulus1443
	}
	return gravity.Modulus145
}

// MarkDensity returns the density [kg/m³] at the reference temperature that the
// mark v on the scale stands for. A saccharometer's mark stands for a sucrose
// solution of that strength. It returns an error for a scale that no hydrometer
// carries.
func (f Float) MarkDensity(v float64) (gravity.Density, error) {
	switch f.Scale {
	case gravity.ScalePlato, gravity.ScaleBrix:
		return gravity.SucroseDensity(gravity.Plato(v), f.Basis.Sample), nil
	case gravity.ScaleDensity:
		return gravity.Density(v), nil
	}
	fn, ok := gravity.RelativeScale(f.Scale, f.modulus())
	if !ok {
		return 0, fmt.Errorf("%w: %s", ErrScale, f.Scale.Info().Name)
	}
	return gravity.Relative{Value: fn.SG(v), Pair: f.Basis}.Density(), nil
}

// Mark is the inverse of MarkDensity: the mark that stands for density rho
// [kg/m³] at the reference temperature.
func (f Float) Mark(rho gravity.Density) (float64, error) {
	switch f.Scale {
	case gravity.ScalePlato, gravity.ScaleBrix:
		iso := gravity.SucroseAt(f.Basis.Sample)
		p, err := iso.Extract(rho)
		return float64(p), err
	case gravity.ScaleDensity:
		return float64(rho), nil
	}
	fn, ok := gravity.RelativeScale(f.Scale, f.modulus())
	if !ok {
		return 0, fmt.Errorf("%w: %s", ErrScale, f.Scale.Info().Name)
	}
	return fn.Of(gravity.RelativeOf(rho, f.Basis).Value), nil
}

// shift returns what a change of points (0.001 of the relative density, or of
// the density over water) makes on the scale at v.
func (f Float) shift(v, points float64) (float64, error) {
	if points == 0 {
		return 0, nil
	}
	rho, err := f.MarkDensity(v)
	if err != nil {
		return 0, err
	}
	to, err := f.Mark(rho + gravity.Density(points/1000)*gravity.Kell(f.Basis.Water))
	return to - v, err
}
