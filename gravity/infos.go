package gravity

import "gylebook/gravity/method"

// Provenance of the formulas that stand alone and in no registry.
var (
	BalanceInfo = method.Info{
		ID: "balling-balance", Kind: "balance", Name: "2.0665 g extract to 1 g ethanol, 0.9565 g carbon dioxide, 0.11 g yeast",
		Source: method.Source{Author: "Balling", Year: 1865, Where: "Die Bierbrauerei, vol. 1 part 2, p. 513", Status: method.Read},
		Error:  "to the digit printed, where the print cuts its decimals",
		Check:  "worked example of Balling",
		Use:    "original extract, alcohol and real extract from one another",
	}
	QuotientInfo = method.Info{
		ID: "attenuation-quotient", Kind: "balance", Name: "q = 1.22 + 0.001 OE = (OE - AE)/(OE - RE)",
		Source: method.Source{Author: "Balling", Year: 1865, Where: "Die Bierbrauerei, vol. 1 part 2, pp. 496-517; linear form of his table", Status: method.Read},
		Error:  "q to half of its third decimal in the worked examples",
		Check:  "worked examples of Balling",
		Use:    "real extract from original and apparent extract",
	}
	ExtractInfo = method.Info{
		ID: "extract-gpl", Kind: "extract per litre", Name: "extract % times density at 20 °C over 100",
		Source: method.Source{Where: "definition, density by the sucrose model", Status: method.Derived},
		Error:  "0.13 g/L against GOST R 51620 below 34 g/L",
		Check:  "GOST R 51620-2000, Table 1; CRC Handbook; densities at 20 °C",
		Use:    "extract in g/L; the sugar of a must is lower",
	}
)

// FormulaInfos are those of this package in order; TabarieInfo stands beside the
// mixture.
var FormulaInfos = []method.Info{BalanceInfo, QuotientInfo, ExtractInfo}
