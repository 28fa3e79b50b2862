package attenuation

import (
	"fmt"

	"gylebook/gravity"
)

// ExplainAttenuation returns the steps of an Attenuation with formulas and
// sources, one a line, enough to redo it by hand.
func ExplainAttenuation(g Gravities, a Attenuation) []string {
	return []string{
		fmt.Sprintf("original extract %.5f and apparent extract %.5f %% mass, from SG %.6f and %.6f", float64(g.OE), float64(g.AE), float64(g.OG), float64(g.FG)),
		fmt.Sprintf("q = 1.22 + 0.001 OE = %.5f; real extract = OE - (OE - AE)/q = %.5f %% (Balling 1865)", gravity.AttenuationQuotient(g.OE), float64(a.RE)),
		fmt.Sprintf("alcohol = (OE - RE)/(2.0665 - 0.010665 OE) = %.5f %% mass (Balling 1865)", float64(a.ABW)),
		fmt.Sprintf("%% vol = %% mass · SG · 998.2/789.24 = %.5f (OIML R 22 for ethanol at 20 °C)", float64(a.ABV)),
		fmt.Sprintf("apparent attenuation = 100 (OE - AE)/OE = %.4f; on points 100 (OG - PG)/(OG - 1) = %.4f", a.Apparent, a.ApparentPoints),
		fmt.Sprintf("real attenuation = 100 (OE - RE)/OE = %.4f; RDF = 100 · 2.0665 A/(2.0665 A + RE) = %.4f (ASBC)", a.Real, a.RDF),
		fmt.Sprintf("energy = (6.9 A + 4 (RE - 0.1)) · SG = %.3f kcal per 100 mL (ASBC); residual extract = RE · SG · 998.2/100 = %.3f g/L", a.EnergyKcal100mL, float64(a.ResidualGPL)),
	}
}

// ExplainAlcohol returns the steps of one estimate.
func ExplainAlcohol(g Gravities, e Estimate) []string {
	out := []string{
		fmt.Sprintf("original %.6f SG 20/20, %.5f %% extract; present %.6f SG 20/20, %.5f %% apparent extract", float64(g.OG), float64(g.OE), float64(g.FG), float64(g.AE)),
		fmt.Sprintf("%s: %s", e.Info.ID, formulas[e.Info.ID]),
		fmt.Sprintf("  source: %s; error: %s", e.Info.Source, e.Info.Error),
	}
	if e.Alcohol.RE != nil {
		out = append(out, fmt.Sprintf("real extract %.5f %% mass", float64(*e.Alcohol.RE)))
	}
	if e.Alcohol.ABW != nil {
		out = append(out, fmt.Sprintf("alcohol %.5f %% mass", float64(*e.Alcohol.ABW)))
	}
	if e.Info.ID == idUKDuty {
		if points, factor, err := DutyFactor(g.OG, g.FG); err == nil {
			out = append(out, fmt.Sprintf("difference %.1f points, factor of its band %.3f", points, factor))
		}
	}
	return append(out, fmt.Sprintf("alcohol %.5f %% vol at 20 °C", float64(e.Alcohol.ABV)))
}

// formulas are the methods as printed.
var formulas = map[string]string{
	"balling":       "q = 1.22 + 0.001 OE, RE = OE - (OE - AE)/q, A = (OE - RE)/(2.0665 - 0.010665 OE), % vol = A · PG · 998.2/789.24",
	"balling-const": "RE = 0.1808 OE + 0.8192 AE, then as balling",
	"densimetric":   "RE = OE - A (2.0665 - 0.010665 OE); A such that Tabarié's sum of the densities of distillate (OIML R 22) and residue (ICUMSA SPS-4) is PG",
	"cutaia2009":    "A = (0.372 + 0.00357 OE)(OE - AE), RE = OE - (0.814 - 0.000862 OE)(OE - AE)",
	"uk-duty":       "1000 (OG - PG) to one decimal, half up, times the factor of its band",
	"factor-131":    "131.25 (OG - PG)",
	"hall1995":      "A = 76.08 (OG - PG)/(1.775 - OG), % vol = A · PG/0.794",
	"mead-132":      "132 (OG - PG)",
	"must-1683":     "sugar g/L by must density (OIV-MA-AS2-02, Table II) / 16.83",
}
