package tempcorr

import "gylebook/gravity/method"

// FormulaInfos is the provenance of the formulas that stand alone and in no
// registry: what happens at the stem, and the certificate.
var FormulaInfos = []method.Info{
	{
		ID: "meniscus", Kind: "meniscus", Name: "rise of the liquid on a stem",
		Source: method.Source{Author: "Langberg", Where: "h = s/(rho G D) (sqrt(1 + 2 rho G D²/s) - 1), from memory", Status: method.FromMemory},
		Error:  "not stated; the spread of the drink's surface tension, 42 to 48 mN/m, is in the budget",
		Check:  method.FormulaOnly,
		Use:    "a scale read at the other end of the meniscus than it is meant for",
	},
	{
		ID: "surface-tension", Kind: "surface tension", Name: "pull of the liquid on a stem",
		Source: method.Source{Where: "balance of forces on the stem", Status: method.Derived},
		Error:  "not stated; the spread of the drink's surface tension, 42 to 48 mN/m, is in the budget",
		Check:  method.FormulaOnly,
		Use:    "an instrument adjusted in another liquid than it is floated in",
	},
	{
		ID: "certificate", Kind: "certificate", Name: "correction between calibration points, linear",
		Source: method.Source{Where: "linear between points, the end value held outside", Status: method.CommonPractice},
		Error:  "the larger U of the two points",
		Check:  method.FormulaOnly,
		Use:    "an instrument with a calibration certificate; before the temperature correction",
	},
}
