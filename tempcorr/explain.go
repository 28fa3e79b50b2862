package tempcorr

import (
	"fmt"
	"strings"

	"gylebook/gravity"
)

// Explain returns every step of a correction with its coefficients and sources,
// one a line, enough to redo it by hand.
func Explain(h Hydrometer, o Observation, res Result) []string {
	f := h.Float()
	mark := res.Reading + res.Meniscus + res.Instrument()
	var out []string
	add := func(format string, args ...any) { out = append(out, fmt.Sprintf(format, args...)) }
	add("reading %g + meniscus %+.6f + instrument %+.6f = mark %.6f %s", res.Reading, res.Meniscus, res.Instrument(), mark, h.Scale.Info().Symbol)
	rho, err := f.MarkDensity(mark)
	if err != nil {
		return out
	}
	if res.Method.ID == "lyons1992" {
		x := o.T.Fahrenheit()
		add("cubic at %.2f °F: 1.313454 - 0.132674 F + 2.057793e-3 F² - 2.627634e-6 F³ = %+.4f points (%s)", x, LyonsPoints(o.T), res.Method.Source)
		add("corrected = mark + cubic = %.6f", res.Corrected)
		return append(out, explainBudget(h, res)...)
	}
	add("water at %g °C (Kell, ITS-90 form, Bettin & Spieweck 1990): %.5f kg/m³", float64(h.Basis.Water), float64(gravity.Kell(h.Basis.Water)))
	add("the mark stands for a density of %.5f kg/m³ at %g °C", float64(rho), float64(h.Basis.Sample))
	add("body grows by 1 + %g · (%.2f - %.2f) = %.7f (%s: %s)", h.Body.Expansion, float64(o.T), float64(h.Basis.Sample), f.factor(o.T), h.Body.ID, h.Body.Source)
	liquid := float64(rho) / f.factor(o.T)
	add("so the liquid at %.2f °C has %.5f kg/m³", float64(o.T), liquid)
	if res.Method.ID == "fermenting" && res.Mixture.Alcohol > 0 {
		out = append(out, explainMixture(f, o, res)...)
	} else {
		out = append(out, explainSucrose(f, o, liquid)...)
	}
	add("corrected = %.6f, a temperature correction of %+.6f", res.Corrected, res.Temperature)
	if !h.Scale.IsMass() {
		fit := gravity.Fits.Default()
		add("°P from the corrected SG 20/20 %.6f by %s: %.4f (the trade's table, in air; the solved w is by true density)", float64(res.SG), fit.ID, float64(res.Extract))
	}
	return append(out, explainBudget(h, res)...)
}

func explainSucrose(f Float, o Observation, liquid float64) []string {
	at, ref := gravity.SucroseAt(o.T), gravity.SucroseAt(f.Basis.Sample)
	p, err := at.Extract(gravity.Density(liquid))
	if err != nil {
		return nil
	}
	return []string{
		"sucrose density (ICUMSA SPS-4): rho = water + Σ c_k w^k, c_k = Σ c_ik ((t-20)/100)^i, c_ik by rows i = 0..4: " + coefficientRows(),
		fmt.Sprintf("at %.2f °C: water and c_k %s; solved for the mass fraction w = %.8f (%.4f %%), at which it gives %.5f kg/m³", float64(o.T), list(at.Coefficients()), float64(p)/100, float64(p), float64(at.Density(p))),
		fmt.Sprintf("at %.2f °C: water and c_k %s; the same solution has %.5f kg/m³", float64(f.Basis.Sample), list(ref.Coefficients()), float64(ref.Density(p))),
	}
}

func explainMixture(f Float, o Observation, res Result) []string {
	at, ref := gravity.MixtureAt(o.T), gravity.MixtureAt(f.Basis.Sample)
	m := res.Mixture
	ethanolAt, ethanolRef := gravity.EthanolAt(o.T), gravity.EthanolAt(f.Basis.Sample)
	sucroseAt, sucroseRef := gravity.SucroseAt(o.T), gravity.SucroseAt(f.Basis.Sample)
	return []string{
		fmt.Sprintf("Balling balance: original extract %.4f, apparent extract %.4f, q = 1.22 + 0.001 OE = %.5f, real extract = OE - (OE - AE)/q = %.4f %%", float64(o.OE), float64(res.Extract), gravity.AttenuationQuotient(o.OE), float64(m.Extract)),
		fmt.Sprintf("alcohol = (OE - RE)/(2.0665 - 0.010665 OE) = %.4f %% mass", float64(m.Alcohol)),
		fmt.Sprintf("ethanol (OIML R 22) in powers of the mass fraction p, rho = Σ e_k p^k: e_0 to e_11 at %.2f °C %s; at %.2f °C %s", float64(o.T), list(ethanolAt.Coefficients()), float64(f.Basis.Sample), list(ethanolRef.Coefficients())),
		fmt.Sprintf("sucrose (ICUMSA SPS-4), water and c_k at %.2f °C %s; at %.2f °C %s", float64(o.T), list(sucroseAt.Coefficients()), float64(f.Basis.Sample), list(sucroseRef.Coefficients())),
		"equal volumes (Tabarié): S = S_a + S_r - 1 over water of the same temperature, with p = A S/S_a in the distillate and w = RE S/S_r in the residue",
		fmt.Sprintf("mixture (Tabarié, equal volumes; ethanol OIML R 22, sucrose ICUMSA SPS-4): %.5f kg/m³ at %.2f °C, %.5f at %.2f °C", float64(at.Density(m)), float64(o.T), float64(ref.Density(m)), float64(f.Basis.Sample)),
		fmt.Sprintf("its ratio %.7f brings the liquid to %.2f °C; composition and result are repeated until they agree", float64(ref.Density(m)/at.Density(m)), float64(f.Basis.Sample)),
	}
}

func explainBudget(h Hydrometer, res Result) []string {
	var out []string
	unit := h.Scale.Info().Symbol
	for _, p := range res.Budget.Parts {
		why := p.Why
		if why != "" {
			why = " (" + why + ")"
		}
		out = append(out, fmt.Sprintf("uncertainty, %s%s: ±%.3g %s times %.4g = u %.6f %s", p.Name, why, p.HalfWidth, p.Unit, p.Sensitivity, p.U, unit))
	}
	covers := "the instrument's own error is not in it"
	if res.Budget.Record {
		covers = "the instrument's own error is in it"
	}
	out = append(out, fmt.Sprintf("half-widths are rectangular, u = a/√3; u² added (JCGM 100): u = %.6f, U = 2u = %.6f %s; %s", res.Budget.Standard, res.Budget.Expanded, unit, covers))
	if res.Budget.Floor {
		out = append(out, "U was raised to 370 ppm, what a hydrometer reaches in users' hands (Aguilera, Wright & Bean 2008)")
	}
	return out
}

func list(values []float64) string {
	parts := make([]string, len(values))
	for i, v := range values {
		parts[i] = fmt.Sprintf("%.4f", v)
	}
	return strings.Join(parts, ", ")
}

func coefficientRows() string {
	rows := gravity.SucroseCoefficients()
	parts := make([]string, len(rows))
	for i, r := range rows {
		parts[i] = list(r[1:])
	}
	return strings.Join(parts, "; ")
}
