package attenuation

import (
	"sort"

	"gylebook/gravity"
	"gylebook/gravity/method"
)

// mustRow is a grape must: mass per volume at 20 °C [kg/L] and its sugar [g/L].
type mustRow struct{ Rho, Sugar float64 }

// mustTable holds whole per cents, 10 to 30, of OIV-MA-AS2-02, Table II
// (Oeno 21/2004), as reproduced in the French order of 14 September 2011,
// NOR EFII1125161A, Annexe IV. A must is denser than sucrose solution of the
// same refraction, and its sugar lower: the rest is acids and salts.
var mustTable = []mustRow{
	{1.0391, 82.2},
	{1.0431, 92.8},
	{1.0472, 103.5},
	{1.0514, 114.3},
	{1.0556, 125.2},
	{1.0598, 136.1},
	{1.0641, 147.1},
	{1.0685, 158.2},
	{1.0729, 169.4},
	{1.0773, 180.6},
	{1.0818, 191.9},
	{1.0863, 203.3},
	{1.0908, 214.7},
	{1.0954, 226.2},
	{1.1001, 237.8},
	{1.1047, 249.5},
	{1.1095, 261.2},
	{1.1142, 273.0},
	{1.1190, 284.9},
	{1.1239, 296.9},
	{1.1287, 308.9},
}

// Sugar that makes 1 % vol, g/L: the base of the OIV table, and the trade's
// round figures for white and red (common practice, no source).
const (
	SugarPerVol      = 16.83
	SugarPerVolWhite = 17.0
	SugarPerVolRed   = 18.0
)

// waterKgL turns SG 20/20 into kg/L at 20 °C.
const waterKgL = water20 / 1000

// mustRange is where the table has rows, in SG 20/20, to four decimals and
// inside.
var mustRange = method.Range{Of: "OG", Lo: 1.0410, Hi: 1.1307, Unit: "SG 20/20"}

// MustSugar returns the sugar [g/L] of a grape must of SG 20/20 og, linear
// between the rows of the OIV table. It returns a *method.RangeError outside
// them. Source: OIV-MA-AS2-02, Table II.
func MustSugar(og gravity.SG) (gravity.GramsPerLitre, error) {
	rho := float64(og) * waterKgL
	last := len(mustTable) - 1
	if !(rho >= mustTable[0].Rho && rho <= mustTable[last].Rho) {
		return 0, &method.RangeError{
			What: "must's gravity", Got: float64(og), Lo: mustRange.Lo, Hi: mustRange.Hi, Unit: mustRange.Unit,
			Hint: "the table of must sugar has no rows there",
		}
	}
	k := sort.Search(last, func(i int) bool { return mustTable[i+1].Rho >= rho })
	a, b := mustTable[k], mustTable[k+1]
	return gravity.GramsPerLitre(a.Sugar + (b.Sugar-a.Sugar)*(rho-a.Rho)/(b.Rho-a.Rho)), nil
}

// PotentialAlcohol returns the alcohol [% vol] that a must of SG 20/20 og can
// reach, fully fermented: by the OIV base of 16.83 g/L, and the trade's range of
// 18 (red) and 17 (white) g/L. Rules by Brix factor differ by 1 % vol either
// way. Errors are those of MustSugar.
func PotentialAlcohol(og gravity.SG) (base, lo18, hi17 gravity.VolPct, err error) {
	sugar, err := MustSugar(og)
	if err != nil {
		return 0, 0, 0, err
	}
	return strength(sugar, SugarPerVol), strength(sugar, SugarPerVolRed), strength(sugar, SugarPerVolWhite), nil
}

// strength returns % vol of sugar [g/L] at base g/L per 1 % vol.
func strength(sugar gravity.GramsPerLitre, base float64) gravity.VolPct {
	return gravity.VolPct(float64(sugar) / base)
}

// must1683 is potential alcohol from the original gravity alone.
func must1683(g Gravities) (Alcohol, error) {
	base, _, _, err := PotentialAlcohol(g.OG)
	return Alcohol{ABV: base}, err
}
