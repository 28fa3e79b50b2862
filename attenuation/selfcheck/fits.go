package selfcheck

import (
	"slices"

	"gylebook/gravity"
	"gylebook/testdata/published"
)

const (
	unitMass = "% mass"
	unitGPL  = "g/L"
)

// ofAir returns extract [% mass] of a relative density weighed in air. A fit made
// in air takes the number as it is, and so does Balling's, whose age knew no
// difference; the sucrose model needs the true one.
func ofAir(id string, fit gravity.Fit, s gravity.SG) gravity.Plato {
	if id == sps4 {
		s = s.FromAir()
	}
	return fit.Extract(s)
}

const sps4 = "sps4"

// roundTrip is how well [% mass] an inverse gives its argument back.
const roundTrip = 1e-8

// c440 compares the sucrose densities in their range, and every fit on the rows
// that state what it may miss by: their Brix is a whole number, an argument, whose
// printed place tells nothing.
func c440(r Relations, t *tally) {
	const col = "sg_20_20_apparent"
	for _, e := range r.Sucrose {
		for _, row := range t.file.Rows {
			p := t.number(row, "brix")
			if named(row, e.ID) || len(e.InRange(p)) == 0 {
				rho := e.Fn(gravity.Plato(p), 20)
				t.row(e.Info, e.ID, row, col, float64(gravity.SG(rho/e.Fn(0, 20)).InAir()), nil, "SG 20/20 in air")
			}
		}
	}
	for _, e := range r.Fits {
		for _, row := range t.file.Rows {
			if !named(row, e.ID) {
				continue
			}
			s := gravity.SG(t.number(row, col))
			t.row(e.Info, e.ID, row, "brix", float64(ofAir(e.ID, e.Fn, s)), nil, "°Bx")
			// The inverse, on the printed argument; it is solved to 1e-12 SG.
			brix := t.number(row, "brix")
			back, err := e.Fn.SG(gravity.Plato(brix))
			t.value(e.Info, row, "there and back", brix, float64(e.Fn.Extract(back)), roundTrip, err, "°Bx")
		}
	}
}

// extractPerLitre compares g/L from a true relative density, by the fits that the
// file names: in their range, and where the row itself names them.
func extractPerLitre(r Relations, t *tally) {
	const col = "extract_g_L"
	for k, e := range r.Fits {
		if !slices.ContainsFunc(t.file.Rows, func(row published.Row) bool { return named(row, e.ID) }) {
			continue
		}
		for _, row := range t.file.Rows {
			s := gravity.SG(t.number(row, "d_20_20"))
			if !named(row, e.ID) && len(gravity.FitNotes(e, s)) != 0 {
				continue
			}
			got := float64(gravity.ExtractGPL(e.Fn.TrueExtract(s), s.Density20()))
			t.row(e.Info, e.ID, row, col, got, nil, unitGPL)
			if k == 0 {
				t.row(gravity.ExtractInfo, e.ID, row, col, got, nil, unitGPL)
			}
		}
	}
}
