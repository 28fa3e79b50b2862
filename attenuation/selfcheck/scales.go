package selfcheck

import (
	"fmt"

	"gylebook/gravity"
	"gylebook/testdata/published"
)

// statements are the fits that scale_points gives SG 1.040 by.
var statements = map[string]string{
	"sg1.040_app2020_to_brix_nbs":        "nbs",
	"sg1.040_app2020_to_plato_asbc":      "asbc",
	"sg1.040_app2020_to_icumsa_mass_pct": sps4,
}

// scalePoints compares single published points of scales and fits.
func scalePoints(r Relations, t *tally) {
	for _, row := range t.file.Rows {
		x, name := t.number(row, "input"), row.Text("name")
		if id, ok := statements[name]; ok {
			t.statement(r, row, id, gravity.SG(x))
			continue
		}
		id, unit := "long", "°Balling"
		if name == "kmw_to_oechsle" {
			id, unit = "kmw", "°Oe"
		}
		e := find(t, r.Scales, id)
		if t.err != nil {
			return
		}
		var got float64
		switch name {
		case "kmw_to_oechsle":
			got = float64(gravity.SG(e.Fn.SG(x)).Points())
			// The input is exact and the way back is free of rounding.
			t.value(e.Info, row, "KMW of its own °Oe", x, e.Fn.Of(1+t.number(row, "value")/1000), 1e-6, nil, "°KMW")
		case "long_lb_per_barrel_to_balling":
			got = float64(gravity.BallingExtract(gravity.SG(e.Fn.SG(x))))
		case "balling_to_long_lb_per_barrel":
			unit = "lb per barrel"
			got = e.Fn.Of(260 / (260 - x)) // Balling's hyperbola, solved for SG
		default:
			t.fail(fmt.Errorf("%s: name %q is known to no check", row.Where(), name))
		}
		t.row(e.Info, id, row, "value", got, nil, unit)
	}
}

// statement compares the extract that one fit gives a relative density in air.
func (t *tally) statement(r Relations, row published.Row, id string, s gravity.SG) {
	e := find(t, r.Fits, id)
	if t.err != nil {
		return
	}
	t.row(e.Info, id, row, "value", float64(ofAir(id, e.Fn, s)), nil, unitMass)
}

// gnuUnits compares both directions of the scales that GNU Units knows.
func gnuUnits(r Relations, t *tally) {
	ids := map[string]string{"baume": "baume-145", "twaddell": "twaddell"}
	for _, row := range t.file.Rows {
		e := find(t, r.Scales, ids[row.Text("scale")])
		if t.err != nil {
			return
		}
		degrees, sg := t.number(row, "degrees"), t.number(row, "sg")
		t.row(e.Info, e.ID, row, "sg", e.Fn.SG(degrees), nil, "SG")
		// Nine printed decimals of SG are far below 1e-6 degrees.
		t.value(e.Info, row, "degrees", degrees, e.Fn.Of(sg), 1e-6, nil, "degrees")
	}
}
