package gravity

import "fmt"

// ExplainConversion returns the steps of a conversion with formulas and sources,
// one a line, enough to redo it by hand.
func ExplainConversion(c Converter, scale Scale, v float64, pair Pair, f Figures) []string {
	var out []string
	add := func(format string, args ...any) { out = append(out, fmt.Sprintf(format, args...)) }
	fit := c.Fit
	switch scale {
	case ScalePlato, ScaleBrix:
		add("%g %% mass gives SG %.6f by the inverse of %s (%s)", v, float64(f.SG), fit.ID, fit.Source)
		add("density: ICUMSA SPS-4 at 20 °C, %.4f kg/m³", float64(f.Density))
	case ScaleGPL:
		add("%g g/L: P with P · rho(P)/100 = g/L, rho by ICUMSA SPS-4 at 20 °C, is %.5f %% mass", v, float64(f.Extract))
	case ScaleDensity:
		add("SG = %g / %.4f (water at 20 °C, Kell) = %.6f, true; in air S + 0.001204 (S - 1)", v, float64(Kell(20)), float64(f.SG))
	case ScaleSG:
		if pair != Pair2020 {
			add("SG %g on %s: density at %g °C through water at %g °C, sucrose solution of that density (ICUMSA SPS-4), its density at 20 °C over water: SG 20/20 %.6f", v, pair, float64(pair.Sample), float64(pair.Water), float64(f.SG))
		}
	default:
		add("%g %s gives SG 20/20 %.6f", v, scale.Info().Symbol, float64(f.SG))
	}
	add("extract by %s: %s", fit.ID, formulas[fit.ID])
	add("  source: %s; error: %s", fit.Source, fit.Error)
	add("g/L = extract %% · density/100; density = SG · 998.2031 (water at 20 °C, Kell) for a hydrometer's SG")
	add("Oechsle = points = 1000 (S - 1); KMW from Oe = K (0.022 K + 4.54); Twaddell = 200 (S - 1); Baumé = m - m/S")
	return out
}

// formulas are the fits as printed.
var formulas = map[string]string{
	"asbc":         "P = 135.997 S³ - 630.272 S² + 1111.14 S - 616.868",
	"nbs":          "Bx = 182.4601 S³ - 775.6821 S² + 1262.7794 S - 669.5622",
	"lincoln":      "P = (463 - 205 S)(S - 1)",
	"rational-258": "S = 1 + P/(258.6 - 227.1 P/258.2)",
	"balling":      "P = 260 (1 - 1/S)",
	"sps4":         "rho = water + Σ c_k w^k at 20 °C solved for w (ICUMSA SPS-4)",
}
