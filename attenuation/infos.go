package attenuation

import "gylebook/gravity/method"

// Provenance of the formulas that stand alone and in no registry.
var (
	ApparentInfo = method.Info{
		ID: "apparent-attenuation", Kind: "attenuation", Name: "100 (OE - AE)/OE",
		Source: method.Source{Author: "Balling", Year: 1865, Where: "Die Bierbrauerei, vol. 1 part 2, p. 496", Status: method.Read},
		Error:  "to the digit printed, where the print cuts its decimals",
		Check:  "worked examples of Balling",
		Use:    "how far a fermentation has gone; on points it reads 0.8 to 2 higher",
	}
	RealInfo = method.Info{
		ID: "real-attenuation", Kind: "attenuation", Name: "100 (OE - RE)/OE",
		Source: method.Source{Author: "Balling", Year: 1865, Where: "Die Bierbrauerei, vol. 1 part 2, p. 513", Status: method.Read},
		Error:  "to the digit printed, where the print cuts its decimals",
		Check:  "worked example of Balling",
		Use:    "how much of the extract is gone",
	}
	RDFInfo = method.Info{
		ID: "rdf", Kind: "attenuation", Name: "real degree of fermentation, 100 (2.0665 A)/(2.0665 A + RE)",
		Source: method.Source{Author: "American Society of Brewing Chemists", Where: "Methods of Analysis", Status: method.Quoted},
		Error:  "exact within the Balling balance",
		Check:  "degrees of fermentation, " + bulletin,
		Use:    "extract fermented over all extract, by mass of the present liquid",
	}
	EnergyInfo = method.Info{
		ID: "energy", Kind: "energy", Name: "6.9 kcal per g ethanol, 4 per g extract less ash",
		Source: method.Source{Author: "American Society of Brewing Chemists", Where: "as in the Oxford Companion to Beer", Status: method.Quoted},
		Error:  "0.1 g/100 g stands for the ash measured",
		Check:  "worked example of Rudolph",
		Use:    "energy of beer, kcal in 100 mL",
	}
	DeclaredInfo = method.Info{
		ID: "declared-strength", Kind: "declaration", Name: "strength truncated to one decimal, UK duty",
		Source: Rules[0].Source,
		Error:  "none, decimal arithmetic",
		Check:  "4.19 is 4.1 % vol, wording of Notice 226 as quoted",
		Use:    "the strength that a rule lets one declare",
	}
)

// FormulaInfos are those of this package in order.
var FormulaInfos = []method.Info{ApparentInfo, RealInfo, RDFInfo, EnergyInfo, DeclaredInfo}
