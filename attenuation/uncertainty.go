package attenuation

import (
	"math"

	"gylebook/gravity"
	"gylebook/gravity/method"
)

// ReadingU is the standard uncertainty [SG] of one gravity, split by what the
// other gravity of the pair shares. Resolution and repeatability are independent
// (r = 0). What one instrument puts into both readings is common (r = +1): its
// certificate, surface tension, the meniscus. Two instruments share nothing.
type ReadingU struct{ Independent, Common float64 }

// Resolution is the uncertainty of a reading of which only the half-width [SG] of
// its last place or division is known: rectangular, independent.
func Resolution(halfWidth float64) ReadingU {
	return ReadingU{Independent: math.Abs(halfWidth) / math.Sqrt(3)}
}

// Propagated is the standard uncertainty of a result with its parts, in the unit
// of the result. Expanded is with k = 2, at least 95 % for the rectangular parts
// that readings have.
type Propagated struct{ Independent, Common, Method, Standard, Expanded float64 }

// MethodU is the standard uncertainty [% vol] of the methods for alcohol
// themselves, ±0.3 with k = 2, from the scatter against measured brews (USDA
// Bulletin 493, 1917).
const MethodU = 0.15

// maxReadingU is a standard uncertainty [SG] that no float is as bad as; beyond
// it the slopes mean nothing.
const maxReadingU = 0.05

// coverage is the factor k of an expanded uncertainty.
const coverage = 2

// PropagateABV returns the uncertainty [% vol] of the alcohol that f gives at og
// and fg, the method's own doubt included. It returns the error of f or of
// NewGravities where there is no value, and a *method.RangeError for an
// uncertainty that is none.
func PropagateABV(f ABVFunc, og, fg gravity.SG, fit method.Entry[gravity.Fit], uOG, uFG ReadingU) (Propagated, error) {
	p, err := propagate(func(og, fg float64) (float64, error) {
		g, err := NewGravities(gravity.SG(og), gravity.SG(fg), fit)
		if err != nil {
			return 0, err
		}
		a, err := f(g)
		return float64(a.ABV), err
	}, float64(og), float64(fg), uOG, uFG)
	if err != nil {
		return Propagated{}, err
	}
	p.Method = MethodU
	return p.combined(), nil
}

// AttenuationU is the uncertainty of the figures of one Attenuation from its
// readings alone.
type AttenuationU struct {
	Apparent, ApparentPoints, Real Propagated // points of %
	RE                             Propagated // % mass
}

// PropagateAttenuation returns the uncertainty of apparent attenuation on both
// bases, of real attenuation and of real extract at og and fg. The doubt of the
// relations is not in it. It returns the error of NewGravities or of Attenuate
// where there is no value, and a *method.RangeError for an uncertainty that is
// none.
func PropagateAttenuation(og, fg gravity.SG, fit method.Entry[gravity.Fit], uOG, uFG ReadingU) (AttenuationU, error) {
	var u AttenuationU
	for _, part := range []struct {
		to *Propagated
		of func(Attenuation) float64
	}{
		{&u.Apparent, func(a Attenuation) float64 { return a.Apparent }},
		{&u.ApparentPoints, func(a Attenuation) float64 { return a.ApparentPoints }},
		{&u.Real, func(a Attenuation) float64 { return a.Real }},
		{&u.RE, func(a Attenuation) float64 { return float64(a.RE) }},
	} {
		p, err := propagate(func(og, fg float64) (float64, error) {
			g, err := NewGravities(gravity.SG(og), gravity.SG(fg), fit)
			if err != nil {
				return 0, err
			}
			a, err := Attenuate(g)
			return part.of(a), err
		}, float64(og), float64(fg), uOG, uFG)
		if err != nil {
			return AttenuationU{}, err
		}
		*part.to = p.combined()
	}
	return u, nil
}

// pairFunc is a result as a function of two gravities in SG 20/20.
type pairFunc func(og, fg float64) (float64, error)

// propagate returns the two parts that readings put into f. GUM (JCGM 100:2008),
// equation 10 for the independent part, equation 16 with r = +1 for the common.
func propagate(f pairFunc, og, fg float64, uOG, uFG ReadingU) (Propagated, error) {
	for _, u := range []float64{uOG.Independent, uOG.Common, uFG.Independent, uFG.Common} {
		if !(u >= 0 && u <= maxReadingU) {
			return Propagated{}, &method.RangeError{What: "standard uncertainty of a reading", Got: u, Lo: 0, Hi: maxReadingU, Unit: "SG"}
		}
	}
	cOG, cFG, err := slopes(f, og, fg)
	if err != nil {
		return Propagated{}, err
	}
	return Propagated{
		Independent: math.Hypot(cOG*uOG.Independent, cFG*uFG.Independent),
		Common:      math.Abs(cOG*uOG.Common + cFG*uFG.Common),
	}, nil
}

// combined fills the standard and the expanded uncertainty.
func (p Propagated) combined() Propagated {
	p.Standard = math.Sqrt(p.Independent*p.Independent + p.Common*p.Common + p.Method*p.Method)
	p.Expanded = coverage * p.Standard
	return p
}

// step is the half width [SG] of a slope, one point. Both ends then lie the same
// way within the tenths of a point that the duty factors count in, and no curve
// here bends within it.
const step = 0.001

// slopes returns the sensitivities of f [per SG] at og and fg.
func slopes(f pairFunc, og, fg float64) (cOG, cFG float64, err error) {
	y, err := f(og, fg)
	if err != nil {
		return 0, 0, err
	}
	cOG, err = slope(func(x float64) (float64, error) { return f(x, fg) }, og, y)
	if err != nil {
		return 0, 0, err
	}
	cFG, err = slope(func(x float64) (float64, error) { return f(og, x) }, fg, y)
	return cOG, cFG, err
}

// slope returns the central difference of f about x, where it is y. At the edge
// of what f answers for it is the difference to the side that has a value; with
// no value on either side it returns the error of f.
func slope(f func(float64) (float64, error), x, y float64) (float64, error) {
	lo, up := x-step, x+step
	below, errBelow := f(lo)
	above, errAbove := f(up)
	switch {
	case errBelow != nil && errAbove != nil:
		return 0, errAbove
	case errBelow != nil:
		lo, below = x, y
	case errAbove != nil:
		up, above = x, y
	}
	return (above - below) / (up - lo), nil
}
