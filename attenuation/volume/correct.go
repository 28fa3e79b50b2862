package volume

import (
	"math"

	"gylebook/gravity"
	"gylebook/gravity/asread"
	"gylebook/tempcorr"
)

// Figure is a result that a Corrector knows how to give.
type Figure int

// The figures.
const (
	Other     Figure = iota // none: it stays empty
	Reading                 // SG as read
	SampleC                 // sample temperature, °C
	ShiftSG                 // temperature correction, SG
	Corrected               // SG on the pair of the instrument
	SG2020
	Extract // % mass
)

// Corrector corrects SG readings, the first cell, of a bare instrument in a sucrose
// solution at the temperature of the second cell. It reads plain decimals itself and
// leaves every other row, such as one with a suffix or one to refuse, to another
// Worker.
type Corrector struct {
	figures   []Figure
	basis     gravity.Pair
	expansion float64 // of the body, 1/K
	units     asread.Unit
	fixed     *gravity.Celsius
	others    Worker
	known     []tempcorr.Isothermal
	at        []float64 // the temperature of each known, NaN for a free place
}

// knownBits is 10 for 1024 temperatures kept; tenths of a degree over the whole range
// are 601.
const knownBits = 10

// NewCorrector returns a Corrector that gives the figures in their order. fixed is
// the temperature of all rows, nil when it is the second cell.
func NewCorrector(figures []Figure, basis gravity.Pair, body tempcorr.Body, units asread.Unit, fixed *gravity.Celsius, others Worker) *Corrector {
	c := &Corrector{
		figures: figures, basis: basis, expansion: body.Expansion, units: units, fixed: fixed, others: others,
		known: make([]tempcorr.Isothermal, 1<<knownBits), at: make([]float64, 1<<knownBits),
	}
	for i := range c.at {
		c.at[i] = math.NaN()
	}
	return c
}

// Row corrects one reading. Its errors are those of the other Worker.
func (c *Corrector) Row(cells [][]byte, out *Results) error {
	r, ok := plainSG(cells[0])
	if !ok {
		return c.others.Row(cells, out)
	}
	var t gravity.Celsius
	if c.fixed != nil {
		t = *c.fixed
	} else if t, ok = plainTemperature(cells[1], c.units); !ok {
		return c.others.Row(cells, out)
	}
	f, err := c.isothermal(t).Figures(r)
	if err != nil {
		return c.others.Row(cells, out)
	}
	for i, figure := range c.figures {
		switch figure {
		case Reading:
			out.Number(i, r)
		case SampleC:
			out.Number(i, float64(t))
		case ShiftSG:
			out.Number(i, f.Corrected-r)
		case Corrected:
			out.Number(i, f.Corrected)
		case SG2020:
			out.Number(i, float64(f.SG))
		case Extract:
			out.Number(i, float64(f.Extract))
		}
	}
	return nil
}

// isothermal returns the correction at t, from those known.
func (c *Corrector) isothermal(t gravity.Celsius) *tempcorr.Isothermal {
	i := math.Float64bits(float64(t)) * 0x9e3779b97f4a7c15 >> (64 - knownBits)
	if c.at[i] != float64(t) {
		c.known[i], c.at[i] = tempcorr.IsothermalAt(c.basis, c.expansion, t), float64(t)
	}
	return &c.known[i]
}
