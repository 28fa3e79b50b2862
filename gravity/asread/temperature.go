package asread

import (
	"strings"

	"github.com/shopspring/decimal"

	"gylebook/gravity"
)

// Unit is a unit of temperature.
type Unit string

// The units of temperature that are read.
const (
	C Unit = "C" // °C
	F Unit = "F" // °F
)

// Temperature is one typed temperature and how it was read.
type Temperature struct {
	Input string          // as typed, trimmed
	C     gravity.Celsius // the temperature, 0 to 60 °C
	Step  float64         // one unit of the last typed place, in °C
	Unit  string          // the unit it was read in, "C" or "F"
	Typed Value           // the number as typed, in Unit
}

// Sample temperatures that are read at all, in °C and °F, and the highest bare
// number that is taken as °C without asking.
var (
	bounds = map[Unit][2]decimal.Decimal{
		C: {decimal.New(0, 0), decimal.New(60, 0)},
		F: {decimal.New(32, 0), decimal.New(140, 0)},
	}
	surelyC = decimal.New(37, 0)
)

// ReadAs says how the temperature was understood: "28 °C", "68 °F (20.0 °C)".
func (t Temperature) ReadAs() string { return temperatureMeans(t.Typed.dec, Unit(t.Unit)) }

// Canonical returns the temperature with its unit, "20.5C", which parses to
// the same value, step and unit.
func (t Temperature) Canonical() string { return t.Typed.String() + t.Unit }

// ParseTemperature reads a sample temperature in the unit of its suffix, or
// else in def, from 0 to 60 °C or 32 to 140 °F. A bare number over 37 read as
// °C is a *Doubt, because 40 is a hot sample or a cold one in °F; every other
// error is a *Refusal.
func ParseTemperature(text string, def Unit) (Temperature, error) {
	v, rest, err := split(text)
	if err != nil {
		return Temperature{}, err
	}
	in := strings.TrimSpace(text)
	unit := def
	suffix := fold(rest)
	if suffix != "" {
		unit = temperatureUnits[suffix]
	}
	b, ok := bounds[unit]
	if !ok {
		return Temperature{}, &Refusal{Read: in, Wanted: "a temperature in C or F", Advice: "write it like 20C or 68F"}
	}
	bare := suffix == ""
	var ps proposals
	switch d := v.dec; {
	case !within(d, b[0], b[1]):
		r := &Refusal{Read: in, Wanted: "0 to 60 °C", Advice: "warm the sample, then read again"}
		if d.Cmp(b[1]) > 0 {
			r.Advice = "cool the sample before reading: hot liquid burns and breaks glass"
		}
		if unit == F {
			r.Wanted = "32 to 140 °F"
		}
		if bare {
			ps.addTemperature(d, other(unit))
			r.Proposals = ps
		}
		return Temperature{}, r
	case bare && unit == C && d.Cmp(surelyC) > 0:
		ps.addTemperature(d, C)
		ps.addTemperature(d, F)
		return Temperature{}, &Doubt{Read: in, Why: "wanted the unit", Proposals: ps}
	}
	return Temperature{Input: in, C: celsius(v.dec, unit), Step: stepC(v, unit), Unit: string(unit), Typed: v}, nil
}

func other(u Unit) Unit {
	if u == C {
		return F
	}
	return C
}

// celsius returns d in °C.
func celsius(d decimal.Decimal, u Unit) gravity.Celsius {
	if u == F {
		return gravity.FromFahrenheit(d.InexactFloat64())
	}
	return gravity.Celsius(d.InexactFloat64())
}

// stepC returns the last typed place in °C; a degree Fahrenheit is 5/9 of one.
func stepC(v Value, u Unit) float64 {
	if u == F {
		return v.Step() * 5 / 9
	}
	return v.Step()
}

func (ps *proposals) addTemperature(d decimal.Decimal, u Unit) {
	if b := bounds[u]; within(d, b[0], b[1]) {
		ps.put(digits(d)+string(u), temperatureMeans(d, u))
	}
}

func temperatureMeans(d decimal.Decimal, u Unit) string {
	text := digits(d) + " °" + string(u)
	if u == F {
		text += " (" + Fixed(float64(celsius(d, F)), 1, HalfEven) + " °C)"
	}
	return text
}
