package asread

import (
	"slices"

	"github.com/shopspring/decimal"

	"gylebook/gravity"
)

func inLimits(d decimal.Decimal, s gravity.Scale) bool {
	l, ok := limits[s]
	return ok && within(d, l.lo, l.hi)
}

func within(d, lo, hi decimal.Decimal) bool { return d.Cmp(lo) >= 0 && d.Cmp(hi) <= 0 }

// proposals collects those candidates that the limits of their scale allow.
type proposals []Proposal

func (ps *proposals) add(d decimal.Decimal, s gravity.Scale) {
	if inLimits(d, s) {
		ps.put(digits(d)+limits[s].suffix, means(d, s, true))
	}
}

// addBare proposes a specific gravity that needs no suffix.
func (ps *proposals) addBare(d decimal.Decimal) {
	ps.put(digits(d), means(d, gravity.ScaleSG, false))
}

func (ps *proposals) put(typed, meant string) {
	p := Proposal{Type: typed, Means: meant}
	if !slices.Contains(*ps, p) {
		*ps = append(*ps, p)
	}
}

// means says how d on a scale is read: "SG 1.048", "12.1 °P". With sg it adds
// the specific gravity for °P, °Bx and points.
func means(d decimal.Decimal, s gravity.Scale, sg bool) string {
	if s == gravity.ScaleSG {
		return "SG " + digits(d)
	}
	text := digits(d) + " " + s.Info().Symbol
	if !sg {
		return text
	}
	if v, ok := sgOf(d.InexactFloat64(), s); ok {
		text += " (SG " + Fixed(float64(v), sgPlaces, HalfEven) + ")"
	}
	return text
}

// sgPlaces is the number of decimals of a specific gravity shown for comparison.
const sgPlaces = 4
