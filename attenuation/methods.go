package attenuation

import "gylebook/gravity/method"

const idUKDuty = "uk-duty"

const (
	bulletin = "USDA Bulletin 493 (1917)"
	brews    = "16 measured brews, " + bulletin
)

// ABVMethods are the ways from two gravities to alcohol, the default first. The
// stated errors are the bias against 16 brews measured in USDA Bulletin 493,
// their gravities converted from 15.6/15.6 °C; the scatter is 0.15 to 0.19 % vol
// (1 SD).
var ABVMethods = method.Set[ABVFunc]{
	{Info: method.Info{
		ID: "balling", Kind: KindABV, Name: "Balling, attenuation quotient q = 1.22 + 0.001 OE",
		Source: method.Source{Author: "Balling", Year: 1865, Where: "Die Bierbrauerei, vol. 1 part 2, p. 513", Status: method.Read},
		Error:  "+0.09 % vol against " + brews,
		Check:  "worked examples of Balling, " + brews,
		Use:    "default; all gravities",
	}, Fn: balling},
	{Info: method.Info{
		ID: "balling-const", Kind: KindABV, Name: "Balling with a constant quotient, RE = 0.1808 OE + 0.8192 AE",
		Source: method.Source{Where: "short form of the Balling relations in general use", Status: method.CommonPractice},
		Valid:  []method.Range{{Of: ofOG, Lo: 1, Hi: 1.060, Unit: "SG 20/20"}},
		Error:  "+0.16 % vol against " + brews + "; real extract low by 0.1 °P at 12 °P, by 0.3 to 0.5 above 20 °P",
		Check:  brews, Use: "worts to OG 1.060; to follow a calculation that was made with it", Better: "balling",
	}, Fn: ballingConst},
	{Info: method.Info{
		ID: "densimetric", Kind: KindABV, Name: "Balling balance with the mixture's density, solved for alcohol",
		Source: method.Source{Where: "Balling 1865, Tabarié, OIML R 22, ICUMSA SPS-4", Status: method.Derived},
		Valid:  []method.Range{{Of: ofRE, Lo: 0, Hi: 5, Unit: "% mass"}, {Of: ofEthanol, Lo: 0, Hi: 18, Unit: "% mass"}},
		Error:  "+0.04 % vol against " + brews,
		Check:  brews, Use: "reference model; no attenuation quotient in it", Better: "balling",
	}, Fn: densimetric},
	{Info: method.Info{
		ID: "cutaia2009", Kind: KindABV, Name: "regression on 532 measured beers",
		Source: method.Source{Author: "Cutaia, Reid & Speers", Year: 2009, Where: "J. Inst. Brew. 115(4), 318, Table VI", Status: method.Read},
		Valid:  []method.Range{{Of: ofOE, Lo: 9.4, Hi: 18.0, Unit: "% mass"}},
		Error:  "+0.10 % vol against " + brews,
		Check:  "dataset means of its Table III, " + brews, Use: "beer of 9.4 to 18.0 °P", Better: "balling",
	}, Fn: cutaia},
	{Info: method.Info{
		ID: idUKDuty, Kind: KindABV, Name: "UK beer duty factors, difference by bands",
		Source: method.Source{
			Author: "Laboratory of the Government Chemist", Where: "HMRC Excise Notice 226, par. 30.2-30.3, withdrawn February 2025",
			Status: method.Quoted,
		},
		Valid: []method.Range{{Of: ofDifference, Lo: 0, Hi: 100.7, Unit: "points"}},
		Error: "+0.02 % vol against " + brews,
		Check: "strengths printed at the band ends, " + brews,
		Use:   "historic; check the current official text; no factor above 100.7 points", Better: "balling",
	}, Fn: ukDuty},
	{Info: method.Info{
		ID: "factor-131", Kind: KindABV, Name: "131.25 times the difference",
		Source: method.Source{Where: "ABV = 131.25 (OG - FG)", Status: method.CommonPractice},
		Valid:  []method.Range{{Of: ofOG, Lo: 1, Hi: 1.070, Unit: "SG 20/20"}},
		Error:  "+0.05 % vol against " + brews + "; 0.8 % vol low at OG 1.140",
		Check:  method.FormulaOnly, Use: "by hand, to OG 1.070", Better: "balling",
	}, Fn: factor131},
	{Info: method.Info{
		ID: "hall1995", Kind: KindABV, Name: "Hall's formula",
		Source: method.Source{Author: "Hall", Year: 1995, Where: "Zymurgy, Summer 1995", Status: method.Quoted},
		Valid:  []method.Range{{Of: ofOG, Lo: 1, Hi: 1.055, Unit: "SG 20/20"}},
		Error:  "+0.28 % vol against " + brews + "; up to 2.1 % vol high above OG 1.055",
		Check:  method.FormulaOnly, Use: "worts to OG 1.055", Better: "balling",
	}, Fn: hall1995},
	{Info: method.Info{
		ID: "mead-132", Kind: KindABV, Name: "132 times the difference, constant volume",
		Source: method.Source{Author: "Bouville", Where: "Mead made complicated", Status: method.Quoted},
		Error:  "+0.09 % vol against " + brews,
		Check:  method.FormulaOnly, Use: "mead",
	}, Fn: mead132},
	{Info: method.Info{
		ID: "must-1683", Kind: KindPotential, Name: "potential alcohol of grape must, 16.83 g sugar per L and 1 % vol",
		Source: method.Source{Author: "OIV", Year: 2004, Where: "OIV-MA-AS2-02, Table II (Oeno 21/2004)", Status: method.Read},
		Valid:  []method.Range{mustRange},
		Error:  "17 (white) to 18 (red) g/L in the trade; rules by Brix factor differ by 1 % vol either way",
		Check:  "OIV-MA-AS2-02, Table II", Use: "must, from the original gravity alone: what it can reach",
	}, Fn: must1683},
}
