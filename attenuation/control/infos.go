package control

import "gylebook/gravity/method"

// ChartInfo is the provenance of the limits.
var ChartInfo = method.Info{
	ID: "individuals-chart", Kind: "control chart", Name: "mean ± 3/1.128 × mean moving range",
	Source: method.Source{Author: "NIST/SEMATECH", Where: "e-Handbook of Statistical Methods 6.3.2.2", Status: method.Read},
	Error:  "limits drawn from few points are unsure themselves",
	Check:  "flow rates of the e-Handbook, concentrations of Montgomery & Runger table 16-3",
	Use:    "single values in order, from 15 on; the scatter counted is that from one to the next",
}

// FormulaInfos lists the formulas that stand in no registry.
var FormulaInfos = []method.Info{ChartInfo}
