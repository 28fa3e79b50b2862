package volume

import (
	"gylebook/gravity"
	"gylebook/gravity/asread"
)

// powers of ten that a float64 holds.
var powers = [...]float64{1, 1e1, 1e2, 1e3, 1e4, 1e5, 1e6, 1e7, 1e8, 1e9, 1e10, 1e11, 1e12, 1e13, 1e14, 1e15}

// maxDigits is how many digits surely fit into a float64. A whole number of so many
// digits over a power of ten that is exact too is then the float64 nearest to the
// decimal, as IEEE 754 rounds one division correctly.
const maxDigits = 15

// plainNumber reads digits with at most one point or comma among them, as most cells
// are. places counts the digits behind the mark. What else asread reads is not plain.
func plainNumber(cell []byte) (mantissa uint64, places int, ok bool) {
	if len(cell) == 0 || len(cell) > maxDigits+1 {
		return 0, 0, false
	}
	mark := -1
	for i, c := range cell {
		switch d := c - '0'; {
		case d <= 9:
			mantissa = mantissa*10 + uint64(d)
		case (c == '.' || c == ',') && mark < 0 && i > 0 && i < len(cell)-1:
			mark = i
		default:
			return 0, 0, false
		}
	}
	if mark >= 0 {
		places = len(cell) - 1 - mark
	} else if len(cell) > maxDigits {
		return 0, 0, false
	}
	return mantissa, places, true
}

// plainSG reads a cell that is an SG by itself: 0.980 to 1.180 with three decimals or
// more. Everything else is for asread.ParseReading, which gives the same for these.
func plainSG(cell []byte) (float64, bool) {
	m, places, ok := plainNumber(cell)
	if !ok || places < 3 || len(cell)-places != 2 {
		return 0, false
	}
	x := float64(m) / powers[places]
	// Nothing lies between a bound and the float64 nearest to it, so that the decimal
	// is inside when its float64 is.
	return x, x >= 0.980 && x <= 1.180
}

// plainTemperature reads a cell that is a temperature by itself, 0 to 37 °C or 32 to
// 140 °F. Everything else is for asread.ParseTemperature, which gives the same for
// these.
func plainTemperature(cell []byte, unit asread.Unit) (gravity.Celsius, bool) {
	m, places, ok := plainNumber(cell)
	if !ok {
		return 0, false
	}
	x := float64(m) / powers[places]
	if unit == asread.F {
		return gravity.FromFahrenheit(x), x >= 32 && x <= 140
	}
	return gravity.Celsius(x), x >= 0 && x <= 37
}
