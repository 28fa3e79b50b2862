package attenuation

import (
	"fmt"

	"gylebook/gravity"
)

// refractometerFormulas print the relations with their coefficients; i is the
// original and f the present Brix divided by the wort correction factor.
var refractometerFormulas = map[string]string{
	"terrill2011-linear": "SG = 1 - 0.00085683 i + 0.0034941 f",
	"terrill2011-cubic":  "SG = 1 - 0.0044993 i + 0.00027581 i² - 7.28e-6 i³ + 0.011774 f - 0.0012717 f² + 6.3293e-5 f³",
	"bonham2001":         "SG = 1.001843 - 0.002318474 i - 7.775e-6 i² - 3.4e-8 i³ + 0.00574 f + 3.344e-5 f² + 8.6e-8 f³",
}

// ExplainRefractometer lists every relation with its coefficients, its source
// and its value for original bi and present bf, °Bx at 20 °C divided by the wort
// correction factor.
func ExplainRefractometer(bi, bf gravity.Plato, es []RefractometerEstimate) []string {
	out := []string{fmt.Sprintf("i = %.4f, f = %.4f °Bx, both divided by the wort correction factor", float64(bi), float64(bf))}
	for _, e := range es {
		if e.Err != nil {
			continue
		}
		out = append(out, fmt.Sprintf("%s: %s = %.6f (%s)", e.Info.ID, refractometerFormulas[e.Info.ID], float64(e.SG), e.Info.Source))
	}
	return out
}
