package tempcorr

import (
	"fmt"

	"gylebook/gravity"
	"gylebook/gravity/method"
)

// RefractometerFunc returns what is added to a refractometer's reading brix
// [% mass] taken at t [°C] to have the reading at 20 °C. It returns a
// *method.RangeError for a temperature outside the method's table.
type RefractometerFunc func(brix gravity.Plato, t gravity.Celsius) (gravity.Plato, error)

const withoutCompensation = "refractometer without automatic temperature compensation; never on top of it"

// RefractometerMethods are the temperature corrections of a refractometer that
// does not compensate by itself. Above 15 °C the first serves, below it the second.
var RefractometerMethods = method.Set[RefractometerFunc]{
	{Info: method.Info{
		ID: "refractometer-crc", Kind: "refractometer correction", Name: "CRC correction table for refractometric sucrose %",
		Source: method.Source{Author: "CRC Handbook of Chemistry and Physics", Where: "as transcribed by M. T. Flanagan, optics.RefractiveIndex", Status: method.Quoted},
		Valid:  crcTable.ranges(),
		Error:  "0.02 % mass between the rows; 0.02 to 0.05 from the OIV table at 15 °C",
		Check:  "CRC Handbook, the rows themselves", Use: withoutCompensation + "; 15 to 30 °C",
	}, Fn: func(brix gravity.Plato, t gravity.Celsius) (gravity.Plato, error) { return crcTable.at(brix, t) }},
	{Info: method.Info{
		ID: "refractometer-oiv", Kind: "refractometer correction", Name: "OIV correction table for % mass of sucrose",
		Source: method.Source{Author: "OIV", Where: "OIV-MA-AS2-02, Table I, compendium p. 49", Status: method.Read},
		Valid:  oivTable.ranges(),
		Error:  "0.02 % mass between the rows",
		Check:  "OIV-MA-AS2-02, Table I, the rows themselves", Use: withoutCompensation + "; 5 to 15 °C",
	}, Fn: func(brix gravity.Plato, t gravity.Celsius) (gravity.Plato, error) { return oivTable.at(brix, t) }},
}

// refractometerSplit is where the OIV table gives way to the CRC one [°C]; both
// have a row there.
const refractometerSplit gravity.Celsius = 15

const refractometerHint = "bring the sample to 15–25 °C"

// RefractometerCorrection returns what is added to a reading brix [% mass] of a
// refractometer without automatic compensation taken at t [°C], 5 to 30 °C, and
// the table that gave it: OIV below 15 °C, CRC from 15 °C up, which differ by
// 0.02 to 0.05 there. At 20 °C it is 0. Outside the table's columns (10 to 30 %
// and 5 to 30 %) the end column is held, with a note; between rows and columns it
// is linear, within 0.02 of a row left out.
//
// It returns a *method.RangeError for a temperature outside 5 to 30 °C and for a
// reading that no solution has.
// Sources: OIV-MA-AS2-02, Table I; CRC Handbook of Chemistry and Physics.
func RefractometerCorrection(brix gravity.Plato, t gravity.Celsius) (
	correction gravity.Plato, info method.Info, notes []method.Note, err error,
) {
	id, table := "refractometer-crc", crcTable
	if t < refractometerSplit {
		id, table = "refractometer-oiv", oivTable
	}
	e, err := RefractometerMethods.Find(id)
	if err != nil {
		return 0, method.Info{}, nil, err
	}
	lo, hi := oivTable.ends().Lo, crcTable.ends().Hi
	if !(float64(t) >= lo && float64(t) <= hi) {
		return 0, e.Info, nil, &method.RangeError{
			What: "sample temperature for the refractometer", Got: float64(t), Lo: lo, Hi: hi, Unit: "°C", Hint: refractometerHint,
		}
	}
	correction, err = e.Fn(brix, t)
	if err != nil {
		return 0, e.Info, nil, err
	}
	// At 20 °C nothing is corrected whatever the concentration, so there is
	// nothing to warn of.
	if correction != 0 {
		notes = table.notes(id, brix)
	}
	return correction, e.Info, notes, nil
}

// refractometerTable is a published table: a row a temperature, a column a
// concentration. Both ascend.
type refractometerTable struct {
	brix []float64 // % mass, the column heads
	rows []refractometerRow
}

type refractometerRow struct {
	t float64   // °C
	c []float64 // % mass to add, one a column
}

// Limits of a reading [% mass]: outside them no solution lies.
const minBrix, maxBrix = -5, 85

// at interpolates linearly in both directions, the end column held outside the
// columns.
func (tab refractometerTable) at(brix gravity.Plato, t gravity.Celsius) (gravity.Plato, error) {
	if !(brix >= minBrix && brix <= maxBrix) {
		return 0, &method.RangeError{
			What: "refractometer reading", Got: float64(brix), Lo: minBrix, Hi: maxBrix, Unit: "% mass", Hint: "type degrees Brix, such as 12.4",
		}
	}
	ends, x := tab.ends(), float64(t)
	if !(x >= ends.Lo && x <= ends.Hi) {
		return 0, &method.RangeError{
			What: ends.Of, Got: x, Lo: ends.Lo, Hi: ends.Hi, Unit: ends.Unit, Hint: refractometerHint,
		}
	}
	for k := 1; k < len(tab.rows); k++ {
		a, b := tab.rows[k-1], tab.rows[k]
		if x <= b.t {
			ca, cb := tab.column(a, float64(brix)), tab.column(b, float64(brix))
			// Weighted, so that a row comes back exactly as printed.
			f := (x - a.t) / (b.t - a.t)
			return gravity.Plato((1-f)*ca + f*cb), nil
		}
	}
	return gravity.Plato(tab.column(tab.rows[len(tab.rows)-1], float64(brix))), nil
}

// column interpolates along one row.
func (tab refractometerTable) column(row refractometerRow, brix float64) float64 {
	last := len(tab.brix) - 1
	brix = min(max(brix, tab.brix[0]), tab.brix[last])
	for k := 1; k <= last; k++ {
		if brix <= tab.brix[k] {
			f := (brix - tab.brix[k-1]) / (tab.brix[k] - tab.brix[k-1])
			return (1-f)*row.c[k-1] + f*row.c[k]
		}
	}
	return row.c[last]
}

// ends is the range of the temperatures.
func (tab refractometerTable) ends() method.Range {
	return method.Range{Of: "sample temperature", Lo: tab.rows[0].t, Hi: tab.rows[len(tab.rows)-1].t, Unit: "°C"}
}

func (tab refractometerTable) ranges() []method.Range {
	return []method.Range{{Of: "refractometer reading", Lo: tab.brix[0], Hi: tab.brix[len(tab.brix)-1], Unit: "% mass"}, tab.ends()}
}

func (tab refractometerTable) notes(id string, brix gravity.Plato) []method.Note {
	columns := tab.ranges()[0]
	if columns.Contains(float64(brix)) {
		return nil
	}
	end := columns.Lo
	if float64(brix) > columns.Hi {
		end = columns.Hi
	}
	return []method.Note{{Code: method.OutOfRange, Text: fmt.Sprintf(
		"%s: a reading of %.4g %% mass is outside the table's columns %g to %g; its column %g is used", id, float64(brix), columns.Lo, columns.Hi, end)}}
}

// Correction to add to a refractometer's reading, % mass, for 5, 10, 15, 20 and
// 30 % mass. Source: CRC Handbook of Chemistry and Physics, temperature
// correction for refractometric sucrose %, as transcribed by M. T. Flanagan,
// optics.RefractiveIndex; a selection of its rows.
var crcTable = refractometerTable{
	brix: []float64{5, 10, 15, 20, 30},
	rows: []refractometerRow{
		{15, []float64{-0.25, -0.27, -0.31, -0.31, -0.34}},
		{16, []float64{-0.21, -0.23, -0.26, -0.27, -0.29}},
		{17, []float64{-0.16, -0.18, -0.20, -0.20, -0.22}},
		{18, []float64{-0.11, -0.12, -0.14, -0.14, -0.15}},
		{19, []float64{-0.06, -0.07, -0.08, -0.08, -0.08}},
		{20, []float64{0, 0, 0, 0, 0}},
		{21, []float64{0.06, 0.07, 0.07, 0.07, 0.07}},
		{22, []float64{0.12, 0.14, 0.14, 0.14, 0.14}},
		{23, []float64{0.18, 0.20, 0.20, 0.21, 0.21}},
		{24, []float64{0.24, 0.26, 0.26, 0.27, 0.28}},
		{25, []float64{0.30, 0.32, 0.32, 0.34, 0.36}},
		{26, []float64{0.36, 0.39, 0.39, 0.41, 0.43}},
		{27, []float64{0.43, 0.46, 0.46, 0.48, 0.50}},
		{28, []float64{0.50, 0.53, 0.53, 0.55, 0.58}},
		{29, []float64{0.57, 0.60, 0.61, 0.62, 0.66}},
		{30, []float64{0.64, 0.67, 0.70, 0.71, 0.74}},
	},
}

// Correction to add to the measured % mass, for 10, 15, 20, 25 and 30 %.
// Source: OIV-MA-AS2-02, Table I, compendium p. 49; a selection of its rows,
// which ends at 17 °C.
var oivTable = refractometerTable{
	brix: []float64{10, 15, 20, 25, 30},
	rows: []refractometerRow{
		{5, []float64{-0.82, -0.87, -0.92, -0.95, -0.99}},
		{7, []float64{-0.74, -0.78, -0.82, -0.84, -0.88}},
		{9, []float64{-0.64, -0.67, -0.71, -0.73, -0.75}},
		{11, []float64{-0.54, -0.57, -0.59, -0.61, -0.63}},
		{13, []float64{-0.43, -0.45, -0.47, -0.48, -0.50}},
		{15, []float64{-0.32, -0.33, -0.34, -0.35, -0.36}},
		{17, []float64{-0.20, -0.20, -0.21, -0.21, -0.22}},
	},
}
