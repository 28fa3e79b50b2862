package gravity

import (
	"gylebook/gravity/method"
	"gylebook/gravity/root"
)

const mustTable2 = "OIV-MA-AS2-02, Table II"

// Refractions are the relations between sucrose content [% mass] and refractive
// index nD at 20 °C.
var Refractions = method.Set[func(p Plato) float64]{
	{Info: method.Info{
		ID: "nd20-sucrose", Kind: "refractive index", Name: "refractive index of sucrose solutions at 20 °C",
		Source: method.Source{Author: "OIV", Year: 2004, Where: mustTable2 + " (Oeno 21/2004); the cubic is our own fit through its rows", Status: method.Derived},
		Valid:  []method.Range{{Of: "extract", Lo: 10, Hi: 30, Unit: "% mass"}},
		Error:  "6e-6 against " + mustTable2 + ", 10 to 30 %; 6e-5 against the CRC Handbook, 0 to 68 %",
		Check:  mustTable2 + "; CRC Handbook, aqueous sucrose",
		Use:    "sucrose solution and must at 20 °C; not for a liquid with alcohol",
	}, Fn: RefractiveIndex},
}

// Ends of the inverse [% mass]: above 68 % the fit leaves the published rows.
const (
	minRefraction Plato = -5
	maxRefraction Plato = 68
)

// RefractiveIndex returns nD at 20 °C (sodium D line, without unit) of a sucrose
// solution of p [% mass]; fitted on 10 to 30 %, within 6e-6 of the rows there
// (0.004 % mass), and within 6e-5 of the CRC Handbook for 0 to 68 %.
// Source: our own fit through OIV-MA-AS2-02, Table II (Oeno 21/2004).
func RefractiveIndex(p Plato) float64 {
	n, _ := refraction(float64(p))
	return n
}

// refraction returns nD and its slope per % mass.
func refraction(p float64) (n, slope float64) {
	const n0, n1, n2, n3 = 1.33299, 0.142794, 0.05370907, 0.01811671
	w := p / 100
	return n0 + w*(n1+w*(n2+w*n3)), (n1 + w*(2*n2+w*3*n3)) / 100
}

// ExtractOfRefraction inverts RefractiveIndex: sucrose [% mass] of a solution of
// refractive index n (nD, 20 °C), tolerance 1e-10 %. It returns a
// *method.RangeError for an index that no solution of -5 to 68 % has; the fitted
// range is that of RefractiveIndex.
func ExtractOfRefraction(n float64) (Plato, error) {
	p, err := root.Find(func(p float64) (float64, float64) {
		y, slope := refraction(p)
		return y - n, slope
	}, float64(minRefraction), float64(maxRefraction), 1e-10)
	if err != nil {
		return 0, &method.RangeError{
			What: "refractive index", Got: n, Unit: "nD at 20 °C",
			Lo: RefractiveIndex(minRefraction), Hi: RefractiveIndex(maxRefraction),
		}
	}
	return Plato(p), nil
}
