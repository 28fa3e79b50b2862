package asread

import (
	"github.com/shopspring/decimal"

	"gylebook/gravity"
)

// Bounds of bare numbers.
var (
	one, two = decimal.New(1, 0), decimal.New(2, 0)

	sgLo, sgHi       = decimal.New(980, -3), decimal.New(1180, -3)
	wholeLo, wholeHi = decimal.New(980, 0), decimal.New(1180, 0)
	pointsHi         = decimal.New(180, 0)
	massLo, massHi   = decimal.New(-5, 0), decimal.New(40, 0)

	// From here on two decimals are more likely a lost zero: 1.16 for 1.016.
	twoPlaces = decimal.New(111, -2)
	// Nine tenths and two decimals are more likely a lost nine: 0.96 for 0.996.
	nineTenths = decimal.New(9, -1)
)

const wantedSG = "SG 0.980 to 1.180, whole 980 to 1180 or whole points 0 to 180"

// bareSG reads a number without a suffix as specific gravity.
func bareSG(in string, v Value) (Reading, error) {
	d, whole := v.dec, v.Places() == 0
	unsigned := v.Text[0] >= '0' && v.Text[0] <= '9'
	var ps proposals
	switch {
	case d.Sign() < 0:
		if within(d.Neg(), sgLo, sgHi) && !whole {
			ps.addBare(d.Neg())
		}
		ps.add(d, gravity.ScalePlato)
		ps.add(d, gravity.ScalePoints)
		return refuse(in, wantedSG, ps)

	case whole && d.Equal(one): // SG 1.000, or one point
		ps.addBare(decimal.New(1000, -3))
		ps.add(d, gravity.ScalePoints)
		return doubt(in, "wanted three decimals or a suffix", wantedSG, ps)

	case within(d, sgLo, sgHi):
		if v.Places() == 2 && d.Cmp(twoPlaces) >= 0 {
			ps.addBare(zeroAfterPoint(d))
			ps.add(d, gravity.ScaleSG)
			return doubt(in, "wanted three decimals or a suffix", wantedSG, ps)
		}
		return accept(in, v, d, gravity.ScaleSG)

	case whole && within(d, wholeLo, wholeHi):
		return accept(in, v, d.Shift(-3), gravity.ScaleSG)

	case whole && unsigned && d.Cmp(pointsHi) <= 0:
		return accept(in, v, one.Add(d.Shift(-3)), gravity.ScaleSG)

	case within(d, wholeLo, wholeHi):
		ps.addBare(d.Shift(-3))
		ps.add(d, gravity.ScaleDensity)
		return doubt(in, "wanted the scale", wantedSG, ps)

	case d.Cmp(sgLo) < 0 && !whole:
		return refuse(in, wantedSG, lowSG(v))

	case d.Cmp(two) < 0 && v.Places() >= 2:
		ps.addBare(zeroAfterPoint(d))
		ps.add(d, gravity.ScaleSG)
		return refuse(in, wantedSG, ps)

	case whole && unsigned, d.Cmp(wholeHi) > 0:
		ps.add(d, gravity.ScalePoints)
		ps.add(d.Shift(-3), gravity.ScaleSG)
		ps.add(d, gravity.ScaleDensity)
		return refuse(in, wantedSG, ps)
	}
	ps.add(d, gravity.ScalePlato)
	ps.add(d, gravity.ScalePoints)
	return doubt(in, "wanted the scale", wantedSG, ps)
}

// lowSG proposes what a number from 0 to below 0.980 may have been.
func lowSG(v Value) proposals {
	var ps proposals
	d := v.dec
	if v.Places() == 2 && d.Cmp(nineTenths) >= 0 {
		ps.addBare(d.Sub(nineTenths).Shift(-1).Add(decimal.New(99, -2)))
	}
	if v.Places() >= 3 && within(one.Add(d), sgLo, sgHi) {
		ps.addBare(one.Add(d))
	}
	ps.add(d, gravity.ScaleSG)
	if !inLimits(d, gravity.ScaleSG) {
		ps.add(d, gravity.ScalePlato)
		ps.add(d, gravity.ScalePoints)
	}
	return ps
}

// bareMass reads a number without a suffix as °P or °Bx.
func bareMass(in string, v Value, s gravity.Scale) (Reading, error) {
	d := v.dec
	var ps proposals
	if within(d, sgLo, sgHi) && v.Places() >= 3 {
		ps.add(d, gravity.ScaleSG)
		ps.add(d, s)
		return doubt(in, "wanted the scale", "", ps)
	}
	if within(d, massLo, massHi) {
		return accept(in, v, d, s)
	}
	if within(d, wholeLo, wholeHi) {
		ps.add(d.Shift(-3), gravity.ScaleSG)
		if v.Places() > 0 {
			ps.add(d, gravity.ScaleDensity)
		}
	} else {
		ps.add(d, gravity.ScalePoints)
		ps.add(d, s)
	}
	return refuse(in, digits(massLo)+" to "+means(massHi, s, false), ps)
}

// zeroAfterPoint puts back a lost zero: 1.16 becomes 1.016. d lies between 1 and 2.
func zeroAfterPoint(d decimal.Decimal) decimal.Decimal {
	return one.Add(d.Sub(one).Shift(-1))
}
