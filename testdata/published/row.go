package published

import (
	"fmt"
	"math"
	"strconv"
	"strings"
)

// Where says which row this is, for messages: "water_points.csv line 7".
func (r Row) Where() string { return fmt.Sprintf("%s.csv line %d", r.file.Name, r.Line) }

// Text returns a cell as printed, "" when there is none.
func (r Row) Text(col string) string {
	if i := r.file.column(col); i >= 0 {
		return r.cells[i]
	}
	return ""
}

// Float returns a cell as a number. Printed forms such as ".0003", "-.38" and
// "+1" are numbers; an empty cell, a word, NaN or infinity is an error.
func (r Row) Float(col string) (float64, error) {
	if r.file.column(col) < 0 {
		return 0, r.errorf("no column %.40q, known: %s", col, strings.Join(r.file.Columns, ", "))
	}
	text := r.Text(col)
	x, ok := number(text)
	if !ok {
		return 0, r.errorf("%s is %.40q, wanted a number", col, text)
	}
	return x, nil
}

// HalfPlace returns half a unit of the last printed place of a cell, trailing
// zeros counted: 0.000005 for "1.04837", 0.05 for "12.0", 0.5 for "5". It is 0
// for a cell that is no number.
func (r Row) HalfPlace(col string) float64 { return halfPlace(r.Text(col)) }

// Tolerance returns how far a relation may be from the printed cell, in the unit
// of the column, and the reason when that is not the default. The entry
// "relation:col=" of the row serves first, then "relation=", then a bare number,
// which holds for the whole row, then half a unit of the last printed place.
//
// An entry wider than the default without a reason is an error, and so is a cell
// that has neither an entry nor a printed place.
func (r Row) Tolerance(relation, col string) (tol float64, why string, err error) {
	if r.file.column(col) < 0 {
		return 0, "", r.errorf("no column %.40q, known: %s", col, strings.Join(r.file.Columns, ", "))
	}
	entries, err := r.tolerances()
	if err != nil {
		return 0, "", err
	}
	half := r.HalfPlace(col)
	for _, key := range []string{relation + ":" + col, relation, ""} {
		tol, ok := entries[key]
		if !ok {
			continue
		}
		why := r.Text(colWhy)
		if tol > half && why == "" {
			return 0, "", r.errorf("tolerance %v of %s is wider than %v and has no reason, wanted one in the column why", tol, relation, half)
		}
		return tol, why, nil
	}
	if half == 0 {
		return 0, "", r.errorf("%s is %.40q, which has no last printed place, wanted a tolerance in the column tol", col, r.Text(col))
	}
	return half, "", nil
}

// tolerances reads the column tol into a map from "relation", "relation:column"
// or, for a bare number, "".
func (r Row) tolerances() (map[string]float64, error) {
	entries := make(map[string]float64)
	for _, entry := range strings.Fields(r.Text(colTol)) {
		key, text, named := strings.Cut(entry, "=")
		if !named {
			key, text = "", entry
		}
		relation, col, hasCol := strings.Cut(key, ":")
		if named && relation == "" {
			return nil, r.errorf("tolerance %.60q, wanted relation=number or relation:column=number", entry)
		}
		if hasCol && r.file.column(col) < 0 {
			return nil, r.errorf("tolerance %.60q is for a column that is not there, known: %s", entry, strings.Join(r.file.Columns, ", "))
		}
		x, ok := number(text)
		if !ok || x <= 0 {
			return nil, r.errorf("tolerance %.60q, wanted a positive number", entry)
		}
		if _, twice := entries[key]; twice {
			return nil, r.errorf("tolerance %.60q is given twice, wanted one", entry)
		}
		entries[key] = x
	}
	return entries, nil
}

func (r Row) errorf(format string, args ...any) error {
	return r.file.errorf(r.Line, format, args...)
}

// number reads a decimal number as tables print it. strconv alone would also
// take "inf", "nan" and hexadecimal.
func number(text string) (float64, bool) {
	if strings.Trim(text, "+-.0123456789eE") != "" {
		return 0, false
	}
	x, err := strconv.ParseFloat(text, 64)
	return x, err == nil && !math.IsInf(x, 0)
}

// halfPlace is half a unit of the last printed place of a number.
func halfPlace(text string) float64 {
	if _, ok := number(text); !ok {
		return 0
	}
	mantissa, exponent := text, 0
	if i := strings.IndexAny(text, "eE"); i >= 0 {
		// number has read the whole text, so the exponent is an integer; one too
		// large for an int gives a place of 0 below.
		mantissa = text[:i]
		exponent, _ = strconv.Atoi(text[i+1:])
	}
	_, decimals, _ := strings.Cut(mantissa, ".")
	// Written out and parsed, so that the result is the float nearest to 5e-6.
	half, err := strconv.ParseFloat(fmt.Sprintf("5e%d", exponent-len(decimals)-1), 64)
	if err != nil {
		return 0
	}
	return half
}
