package asread

import (
	"strings"

	"github.com/shopspring/decimal"

	"gylebook/gravity"
)

// Reading is one typed gravity reading and how it was read.
type Reading struct {
	Input string        // as typed, trimmed
	Scale gravity.Scale // the scale it was read on
	Value float64       // in Scale; 1048 and 48 read as specific gravity give 1.048
	Step  float64       // one unit of the last typed place, in Scale; 0.001 for 1048
	Typed Value         // the number as typed

	dec decimal.Decimal // in Scale
}

// ReadAs says how the reading was understood, with the typed digits:
// "SG 1.0480", "12.1 °P", "48 points", "1046 kg/m³".
func (r Reading) ReadAs() string { return means(r.dec, r.Scale, false) }

// Canonical returns the reading with its suffix, "1.0480sg" or "12.1P". It
// parses to the same value, step and scale whatever the default scale is.
func (r Reading) Canonical() string { return digits(r.dec) + limits[r.Scale].suffix }

// ParseReading reads a gravity on the scale of its suffix, or else on def. The
// error is a *Doubt or a *Refusal.
//
// On specific gravity a bare number is read as follows: 0.980 to 1.180 as it
// stands, whole 980 to 1180 as thousandths, whole 0 to 180 as points. On °P and
// °Bx a bare number is -5 to 40. A suffix settles what is doubtful in a bare
// number, but not what is impossible on its scale.
func ParseReading(text string, def gravity.Scale) (Reading, error) {
	v, rest, err := split(text)
	if err != nil {
		return Reading{}, err
	}
	in := strings.TrimSpace(text)
	if _, ok := limits[def]; !ok {
		return Reading{}, &Refusal{Read: in, Wanted: "a known default scale", Advice: suffixHelp}
	}
	unit := fold(rest)
	if unit == "" {
		if rest != "" && !strings.Contains(def.Info().Symbol, "°") {
			return degrees(in, v)
		}
		switch {
		case def == gravity.ScaleSG:
			return bareSG(in, v)
		case def.IsMass():
			return bareMass(in, v, def)
		}
		return stated(in, v, def)
	}
	s, ok := spellings[unit]
	if !ok {
		wanted := "a known scale behind the number"
		if _, temperature := temperatureUnits[unit]; temperature {
			wanted = "a gravity, not a temperature"
		}
		return refuse(in, wanted, nil)
	}
	return stated(in, v, s)
}

// accept makes a reading of v, which is d on the scale.
func accept(in string, v Value, d decimal.Decimal, s gravity.Scale) (Reading, error) {
	return Reading{Input: in, Scale: s, Value: d.InexactFloat64(), Step: step(d), Typed: v, dec: d}, nil
}

// doubt asks which proposal was meant, or refuses when none is possible.
func doubt(in, why, wanted string, ps proposals) (Reading, error) {
	if len(ps) == 0 {
		return refuse(in, wanted, ps)
	}
	return Reading{}, &Doubt{Read: in, Why: why, Proposals: ps}
}

func refuse(in, wanted string, ps proposals) (Reading, error) {
	return Reading{}, &Refusal{Read: in, Wanted: wanted, Advice: suffixHelp, Proposals: ps}
}

// degrees answers a degree sign with no letter behind it, where the default
// scale has no degrees.
func degrees(in string, v Value) (Reading, error) {
	var ps proposals
	ps.add(v.dec, gravity.ScalePlato)
	ps.add(v.dec, gravity.ScaleOechsle)
	return doubt(in, "wanted the scale behind the degree sign", "a scale behind the degree sign", ps)
}

// stated reads a number whose scale is known.
func stated(in string, v Value, s gravity.Scale) (Reading, error) {
	if inLimits(v.dec, s) {
		return accept(in, v, v.dec, s)
	}
	var ps proposals
	switch d := v.dec; {
	case s == gravity.ScaleSG:
		ps.add(d.Shift(-3), gravity.ScaleSG)
		if d.Cmp(one) > 0 && d.Cmp(two) < 0 {
			ps.add(zeroAfterPoint(d), gravity.ScaleSG)
		}
		if d.Cmp(two) >= 0 {
			ps.add(d, gravity.ScalePoints)
		}
	case s == gravity.ScaleDensity && d.Sign() > 0 && d.Cmp(two) < 0:
		ps.add(d.Shift(3), gravity.ScaleDensity)
	default:
		if within(d.Shift(-3), sgLo, sgHi) {
			ps.add(d.Shift(-3), gravity.ScaleSG)
		}
		ps.add(d, gravity.ScalePoints)
	}
	l := limits[s]
	wanted := means(l.hi, s, false)
	if s == gravity.ScaleSG {
		wanted = "SG " + digits(l.lo) + " to " + digits(l.hi)
	} else {
		wanted = digits(l.lo) + " to " + wanted
	}
	return refuse(in, wanted, ps)
}
