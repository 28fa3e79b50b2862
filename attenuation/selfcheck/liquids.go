package selfcheck

import (
	"strings"

	"gylebook/gravity"
)

const unitDensity = "kg/m³"

// waterTable compares the water densities where they are valid.
func waterTable(r Relations, t *tally) {
	for _, e := range r.Waters {
		for _, row := range t.file.Rows {
			x := t.number(row, "t_C")
			if len(e.InRange(x)) == 0 {
				t.row(e.Info, e.ID, row, "rho_kg_m3", float64(e.Fn(gravity.Celsius(x))), nil, unitDensity)
			}
		}
	}
}

// What tables in air and tables before 1964 stand on.
const (
	airDensity   = 1.2      // kg/m³ (common practice)
	brassDensity = 8400     // kg/m³, of the weights (from memory)
	oldLitre     = 1.000028 // dm³, the volume of 1 kg of water at 4 °C (1901 to 1964)
)

// waterPoints compares single densities of water: the true ones, the largest one
// where the row names the relation, and the one weighed in air with brass weights.
func waterPoints(r Relations, t *tally) {
	for _, e := range r.Waters {
		at := func(x float64) float64 { return float64(e.Fn(gravity.Celsius(x))) }
		for _, row := range t.file.Rows {
			var got float64
			switch {
			case strings.HasSuffix(row.Text("t_C"), "(maximum)"):
				if !named(row, e.ID) {
					continue
				}
				// So flat that steps of 0.005 °C miss less than 1e-6 kg/m³.
				for x := 3.9; x < 4.1; x += 0.005 {
					got = max(got, at(x))
				}
			case strings.HasPrefix(row.Text("kind"), "apparent"):
				got = oldLitre * (at(t.number(row, "t_C")) - airDensity) / (1 - airDensity/brassDensity)
			default:
				got = at(t.number(row, "t_C"))
			}
			t.row(e.Info, e.ID, row, "rho_kg_m3", got, nil, unitDensity)
		}
	}
}

// sucrose1520 compares densities at 15 and 20 °C, printed against water at 4 °C.
func sucrose1520(r Relations, t *tally) {
	for _, e := range r.Sucrose {
		for _, row := range t.file.Rows {
			p := gravity.Plato(t.number(row, "mass_pct"))
			t.row(e.Info, e.ID, row, "rho15", oldLitre*float64(e.Fn(p, 15)), nil, unitDensity)
			t.row(e.Info, e.ID, row, "rho20", oldLitre*float64(e.Fn(p, 20)), nil, unitDensity)
			litres := gravity.ExtractGPL(p, oldLitre*e.Fn(p, 20))
			t.row(gravity.ExtractInfo, e.ID, row, "g_per_L", float64(litres), nil, unitGPL)
		}
	}
}

// sucroseCRC compares density, extract per litre and refraction at 20 °C.
func sucroseCRC(r Relations, t *tally) {
	for _, row := range t.file.Rows {
		p := gravity.Plato(t.number(row, "mass_pct"))
		for _, e := range r.Sucrose {
			rho := e.Fn(p, 20)
			t.row(e.Info, e.ID, row, "rho20_kg_m3", float64(rho), nil, unitDensity)
			t.row(gravity.ExtractInfo, e.ID, row, "g_per_L", float64(gravity.ExtractGPL(p, rho)), nil, unitGPL)
		}
	}
	refraction(r, t, "mass_pct", "nD20")
}

// ethanolTable compares relative densities in air; the argument is the mass
// share where that was the whole number, and else the mass share printed.
func ethanolTable(r Relations, t *tally) {
	for _, e := range r.Ethanol {
		for _, row := range t.file.Rows {
			a := gravity.MassPct(t.number(row, "mass_pct"))
			inAir := func(temp gravity.Celsius) float64 {
				return (float64(e.Fn(a, temp)) - airDensity) / (float64(e.Fn(0, temp)) - airDensity)
			}
			t.row(e.Info, e.ID, row, "sg_25_25_air", inAir(25), nil, "SG 25/25 in air")
			t.row(e.Info, e.ID, row, "sg_15.56_15.56_air", inAir(gravity.FromFahrenheit(60)), nil, "SG 60/60F in air")
			if row.Text("entry") == "mass" {
				sixty := gravity.FromFahrenheit(60)
				vol := float64(a) * float64(e.Fn(a, sixty)/e.Fn(100, sixty))
				t.row(e.Info, e.ID, row, "vol_pct_15.56", vol, nil, "% vol at 60 °F")
			}
		}
	}
}

// ethanolPoints compares densities printed in g/cm³.
func ethanolPoints(r Relations, t *tally) {
	for _, e := range r.Ethanol {
		for _, row := range t.file.Rows {
			a := gravity.MassPct(t.number(row, "x"))
			temp := t.parse(row, "t", strings.TrimSuffix(row.Text("t"), " C"))
			t.row(e.Info, e.ID, row, "value", float64(e.Fn(a, gravity.Celsius(temp)))/1000, nil, "g/cm³")
		}
	}
}

// refraction compares the refractive index at 20 °C of a sucrose solution.
func refraction(r Relations, t *tally, mass, col string) {
	for _, e := range r.Refractions {
		for _, row := range t.file.Rows {
			x := t.number(row, mass)
			if len(e.InRange(x)) == 0 {
				t.row(e.Info, e.ID, row, col, e.Fn(gravity.Plato(x)), nil, "nD at 20 °C")
			}
		}
	}
}
