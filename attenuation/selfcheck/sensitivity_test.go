package selfcheck

import (
	"errors"
	"math"
	"slices"
	"testing"

	"gylebook/attenuation"
	"gylebook/attenuation/control"
	"gylebook/gravity"
	"gylebook/gravity/method"
	"gylebook/tempcorr"
)

// usual is the relative error that the rows must show, either way.
const usual = 1e-3

// coarse are the relations whose rows were printed too roughly, or measured with
// too much scatter, for the usual error to mean anything, with the one that they
// must show.
var coarse = map[string]float64{
	"fit/balling":                                5e-3, // its own departure from the table is 0.6 %
	"correction/sucrose":                         5e-2, // printed to 0.01 °Bx of 0.7
	"correction/fermenting":                      5e-2, // as sucrose
	"correction/lyons1992":                       2e-2, // the cubic misses its table by 0.17 point
	"refractometer correction/refractometer-crc": 1e-2, // 0.005 of 0.74
	"refractometer correction/refractometer-oiv": 1e-2, // 0.005 of 0.99
	"abv method/balling-const":                   8e-2, // measured brews only
	"abv method/densimetric":                     4e-2, // measured brews only, and their mean
	"abv method/factor-131":                      8e-2, // measured brews only
	"abv method/mead-132":                        8e-2, // measured brews only
	"abv method/hall1995":                        2e-1, // measured brews only, few in range
	"sucrose density/icumsa-sps4":                3e-3, // stated bounds against rival tables
	"abv method/cutaia2009":                      6e-2, // dataset means, RE within 0.14 of 5
	"abv method/uk-duty":                         5e-3, // factors printed to 0.001 of 0.13
}

// A check that cannot fail is a defect: each relation in turn is made wrong by a
// small relative error, up and down, and the run must say so of that relation.
func TestSmallErrorsAreFound(t *testing.T) {
	all := slices.Concat(wrongLiquids(), wrongScales(), wrongMethods())
	// The single formulas are no registry and cannot be handed in changed.
	single := slices.Concat([]method.Info{gravity.TabarieInfo}, gravity.FormulaInfos, tempcorr.FormulaInfos, attenuation.FormulaInfos, control.FormulaInfos)
	for key := range Covered(run(t, Offered())) {
		made := slices.ContainsFunc(all, func(w wrong) bool { return Key(w.info) == key })
		if !made && !slices.ContainsFunc(single, func(i method.Info) bool { return Key(i) == key }) {
			t.Errorf("%s is compared but never made wrong", key)
		}
	}
	for _, w := range all {
		key := Key(w.info)
		if w.info.Kind == "scale" && (slices.Contains(withoutRows, key) || slices.Contains(definitions, key)) {
			continue
		}
		size, ok := coarse[key]
		if !ok {
			size = usual
		}
		for _, eps := range []float64{size, -size} {
			if !fails(run(t, w.with(eps)), key) {
				t.Errorf("%s: a relative error of %g is not found", key, eps)
			}
		}
	}
}

func fails(outcomes []Outcome, key string) bool {
	return slices.ContainsFunc(outcomes, func(o Outcome) bool { return o.Key() == key && !o.Passed })
}

// The misprints in circulation, 1114.14 for 1111.14 and 135.977 for 135.997.
func TestMisprintsAreFound(t *testing.T) {
	for name, delta := range map[string]func(s float64) float64{
		"1114.14": func(s float64) float64 { return 3 * s },
		"135.977": func(s float64) float64 { return -0.020 * s * s * s },
	} {
		r := Offered()
		r.Fits = shifted(r.Fits, 0, func(f gravity.Fit) gravity.Fit {
			x := f.Extract
			f.Extract = func(s gravity.SG) gravity.Plato { return x(s) + gravity.Plato(delta(float64(s))) }
			return f
		})
		if !fails(run(t, r), "fit/asbc") {
			t.Errorf("misprint %s is not found", name)
		}
	}
}

// What is no number, and what is refused, has not passed.
func TestNoNumberIsAMiss(t *testing.T) {
	r := Offered()
	r.Waters = shifted(r.Waters, 0, func(gravity.WaterFunc) gravity.WaterFunc {
		return func(gravity.Celsius) gravity.Density { return gravity.Density(math.NaN()) }
	})
	r.ABV = shifted(r.ABV, 0, func(attenuation.ABVFunc) attenuation.ABVFunc {
		return func(attenuation.Gravities) (attenuation.Alcohol, error) {
			return attenuation.Alcohol{}, errors.New("refused")
		}
	})
	outcomes := run(t, r)
	if !fails(outcomes, Key(r.Waters[0].Info)) || !fails(outcomes, Key(r.ABV[0].Info)) {
		t.Error("a relation without a value passed")
	}
	for _, o := range outcomes {
		if math.IsNaN(o.Worst) || math.IsInf(o.Worst, 0) {
			t.Errorf("%s, %s: worst is %v", o.Source, o.Key(), o.Worst)
		}
	}
}
