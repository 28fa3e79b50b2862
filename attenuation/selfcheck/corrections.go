package selfcheck

import (
	"strconv"
	"strings"

	"gylebook/gravity"
	"gylebook/tempcorr"
)

// liquorBrix is the strength [°Bx] that the canners' table is taken at: the page
// states none, tomato liquor has about 3 to 12.
const liquorBrix = 5

// fitShift [SG]: the fermenting model reads the composition through a fit, up to
// 0.02 °Bx from the sucrose model; the correction changes by 3e-5 SG per °Bx.
const fitShift = 1e-6

// bigelow compares the corrections of the canners' table, for a saccharometer and
// an SG hydrometer of glass on 20/20 °C. The liquor has no alcohol: the
// fermenting model is given an original extract below the liquor's own, must find
// no alcohol and then do as the sucrose solution does, with its tolerance.
func bigelow(r Relations, t *tally) {
	glass, err := tempcorr.FindBody("glass")
	if err != nil {
		t.fail(err)
		return
	}
	iso := gravity.SucroseAt(20)
	sg := float64(iso.Density(liquorBrix) / iso.Water())
	for _, e := range r.Corrections {
		if e.ID != "sucrose" && e.ID != "fermenting" {
			continue
		}
		for _, row := range t.file.Rows {
			s := tempcorr.Sample{T: gravity.FromFahrenheit(t.number(row, "t_F"))}
			if e.ID == "fermenting" {
				s.OE = liquorBrix - 2
			}
			brix := tempcorr.Float{Scale: gravity.ScaleBrix, Basis: gravity.Pair2020, Expansion: glass.Expansion}
			got, err := e.Fn(brix, liquorBrix, s)
			t.row(e.Info, "sucrose", row, "corr_brix", got-liquorBrix, err, "°Bx")
			relative := brix
			relative.Scale = gravity.ScaleSG
			got, err = e.Fn(relative, sg, s)
			tolerance := t.tolerance(row, "sucrose", "corr_sg")
			if e.ID == "fermenting" {
				tolerance += fitShift
			}
			t.value(e.Info, row, "corr_sg", t.number(row, "corr_sg"), got-sg, tolerance, err, "SG 20/20")
		}
	}
}

// lyons compares the cubic with the table it was fitted to, in points.
func lyons(r Relations, t *tally) {
	e := find(t, r.Corrections, "lyons1992")
	if t.err != nil {
		return
	}
	f := tempcorr.Float{Scale: gravity.ScalePoints, Basis: gravity.Pair1515}
	for _, row := range t.file.Rows {
		got, err := e.Fn(f, 0, tempcorr.Sample{T: gravity.FromFahrenheit(t.number(row, "temp_F"))})
		t.row(e.Info, e.ID, row, "corr_points", got, err, "points")
	}
}

// refractometerTable returns the check of one correction table: a row a
// temperature, a column "c10" a reading of 10 %.
func refractometerTable(id string) func(Relations, *tally) {
	return func(r Relations, t *tally) {
		e := find(t, r.RefractometerCorrections, id)
		if t.err != nil {
			return
		}
		for _, row := range t.file.Rows {
			temp := gravity.Celsius(t.number(row, "t_C"))
			for _, col := range t.file.Columns {
				brix, ok := strings.CutPrefix(col, "c")
				if !ok {
					continue
				}
				b, err := strconv.ParseFloat(brix, 64)
				if err != nil {
					t.fail(err)
					return
				}
				got, err := e.Fn(gravity.Plato(b), temp)
				t.row(e.Info, id, row, col, float64(got), err, unitMass)
			}
		}
	}
}
