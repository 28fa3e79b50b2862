package gravity

import (
	"math"

	"gylebook/gravity/method"
)

// ScaleFn is a scale defined on a relative density, both ways. The pair is
// printed beside every value of it.
type ScaleFn struct {
	Pair Pair
	Of   func(s float64) float64
	SG   func(v float64) float64
}

// Ids of the scale relations that code refers to.
const (
	baume145  = "baume-145"
	baume1443 = "baume-144.3"
)

// ScaleRelations are the scales that are formulas of a relative density.
var ScaleRelations = method.Set[ScaleFn]{
	{Info: method.Info{
		ID: "points", Kind: "scale", Name: "gravity points",
		Source: method.Source{Where: "1000 (SG - 1)", Status: method.CommonPractice},
		Check:  "definition", Use: "the trade's short form of SG",
	}, Fn: ScaleFn{Pair2020, pointsOf, sgOfPoints}},
	{Info: method.Info{
		ID: "oechsle", Kind: "scale", Name: "degrees Oechsle",
		Source: method.Source{Where: "1000 (d 20/20 - 1)", Status: method.Read},
		Check:  "definition", Use: "must weight; by density in g/cm³ it is 1.8 lower",
	}, Fn: ScaleFn{Pair2020, pointsOf, sgOfPoints}},
	{Info: method.Info{
		ID: "kmw", Kind: "scale", Name: "degrees KMW",
		Source: method.Source{Author: "Ambrosi", Year: 1994, Where: "Wein A bis Z: Oe = KMW (0.022 KMW + 4.54)", Status: method.Quoted},
		Check:  "30 KMW = 156 °Oe", Use: "must weight in Austria",
	}, Fn: ScaleFn{Pair2020, kmwOf, sgOfKMW}},
	{Info: method.Info{
		ID: baume145, Kind: "scale", Name: "degrees Baumé, modulus 145",
		Source: method.Source{Where: "m - m/S, m = 145, taken on SG 20/20", Status: method.Read},
		Check:  "GNU Units", Use: "heavy liquids; on 60/60 °F in the US definition",
	}, Fn: baume(145, Pair2020)},
	{Info: method.Info{
		ID: baume1443, Kind: "scale", Name: "degrees Baumé, modulus 144.3",
		Source: method.Source{Where: "m - m/S, m = 144.3, taken on SG 15/4", Status: method.Read},
		Check:  "formula only", Use: "heavy liquids, the rational scale",
	}, Fn: baume(144.3, Pair154)},
	{Info: method.Info{
		ID: "twaddell", Kind: "scale", Name: "degrees Twaddell",
		Source: method.Source{Where: "S = 1 + 0.005 Tw, taken on SG 20/20", Status: method.Read},
		Check:  "GNU Units", Use: "heavy liquids",
	}, Fn: ScaleFn{
		Pair2020,
		func(s float64) float64 { return 200 * (s - 1) },
		func(v float64) float64 { return 1 + 0.005*v },
	}},
	{Info: method.Info{
		ID: "long", Kind: "scale", Name: "lb per barrel (long)",
		Source: method.Source{Author: "Holzner", Year: 1883, Where: "Dinglers Polytechnisches Journal 248, 472", Status: method.Read},
		Check:  "20 lb = 13.68 °Balling", Use: "historic English gravity, from °Balling",
	}, Fn: ScaleFn{
		Pair2020,
		func(s float64) float64 { return LongPounds(BallingExtract(SG(s))) },
		func(v float64) float64 { return 260 / (260 - float64(LongBalling(v))) },
	}},
}

func pointsOf(s float64) float64   { return 1000 * (s - 1) }
func sgOfPoints(v float64) float64 { return 1 + v/1000 }

// OechsleOfKMW returns °Oe of k °KMW; 30 KMW = 156 °Oe.
// Source: Ambrosi 1994, Wein A bis Z.
func OechsleOfKMW(k float64) float64 { return k * (0.022*k + 4.54) }

// kmwVertex is where the quadratic turns; below it a KMW would come back as a
// must weight that liquids have.
const kmwVertex = -4.54 / 0.044

func sgOfKMW(k float64) float64 { return sgOfPoints(OechsleOfKMW(max(k, kmwVertex))) }

// kmwOf solves 0.022 K² + 4.54 K = Oe; real above -234 °Oe, far below any liquid
// of the trade.
func kmwOf(s float64) float64 {
	return (math.Sqrt(4.54*4.54+0.088*pointsOf(s)) - 4.54) / 0.044
}

// baume returns the heavy Baumé scale of modulus m on pair.
func baume(m float64, pair Pair) ScaleFn {
	return ScaleFn{
		pair,
		func(s float64) float64 { return m - m/s },
		func(v float64) float64 { return m / (m - v) },
	}
}

// LongPounds returns the excess weight in lb per English barrel of 36 gallons at
// e °Balling. Source: Holzner 1883, Dinglers Polytechn. Journal 248, 472.
func LongPounds(e Plato) float64 { return 360 * float64(e) / (260 - float64(e)) }

// LongBalling is the inverse of LongPounds, °Balling at lb per barrel.
func LongBalling(lb float64) Plato { return Plato(260 * lb / (360 + lb)) }

// RelativeScale returns the formula of a scale that stands on a relative
// density, and false for the scales that do not (extract by mass or volume,
// density). m picks the Baumé modulus; 0 is 145.
func RelativeScale(scale Scale, m Modulus) (ScaleFn, bool) {
	id := scale.String()
	switch scale {
	case ScaleSG:
		same := func(x float64) float64 { return x }
		return ScaleFn{Pair2020, same, same}, true
	case ScalePlato, ScaleBrix, ScaleDensity, ScaleGPL:
		return ScaleFn{}, false
	case ScaleBaume:
		id = baume145
		if m == Modulus1443 {
			id = baume1443
		}
	}
	e, err := ScaleRelations.Find(id)
	return e.Fn, err == nil
}
