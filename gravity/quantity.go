package gravity

import (
	"fmt"
	"strconv"
	"strings"
)

// Quantities are defined float64 types: the unit and the reference stand here,
// and a wrong mix does not compile.
type (
	// SG is true relative density at 20 °C over water at 20 °C (SG 20/20).
	// A value on another pair is a Relative.
	SG float64
	// Plato is extract in % by mass (g per 100 g), called °P, °Bx or °Balling.
	Plato float64
	// Density is mass per volume in kg/m³ at the temperature the function states.
	Density float64
	// Celsius is temperature in °C (ITS-90).
	Celsius float64
	// GramsPerLitre is extract in g per litre at 20 °C.
	GramsPerLitre float64
	// Points is 1000·(SG − 1), SG on its stated pair.
	Points float64
	// MassPct is a share by mass in %, of ethanol unless said otherwise (ABW).
	MassPct float64
	// VolPct is ethanol by volume in % at 20 °C (ABV).
	VolPct float64
)

// Fahrenheit returns t in °F.
func (t Celsius) Fahrenheit() float64 { return float64(t)*9/5 + 32 }

// FromFahrenheit returns the temperature f [°F] in °C.
func FromFahrenheit(f float64) Celsius { return Celsius((f - 32) * 5 / 9) }

// Points returns gravity points, 1000·(SG − 1).
func (s SG) Points() Points { return Points(1000 * (float64(s) - 1)) }

// SG returns the relative density of p gravity points.
func (p Points) SG() SG { return SG(1 + float64(p)/1000) }

// Pair is the reference of a relative density: the sample's temperature over
// the water's, both in °C.
type Pair struct{ Sample, Water Celsius }

// The pairs that instruments and tables carry.
var (
	Pair2020   = Pair{20, 20}
	Pair1515   = Pair{15, 15}
	Pair6060F  = Pair{FromFahrenheit(60), FromFahrenheit(60)}
	Pair175175 = Pair{17.5, 17.5}
	Pair154    = Pair{15, 4}
	Pair204    = Pair{20, 4}
)

// String gives "20/20", "17.5/17.5", "15/4" or "60/60F".
func (p Pair) String() string {
	if p == Pair6060F {
		return "60/60F"
	}
	return trim(p.Sample) + "/" + trim(p.Water)
}

func trim(t Celsius) string {
	s := strconv.FormatFloat(float64(t), 'f', 2, 64)
	return strings.TrimRight(strings.TrimRight(s, "0"), ".")
}

// Relative is a relative density with its pair.
type Relative struct {
	Value float64
	Pair  Pair
}

func (r Relative) String() string { return fmt.Sprintf("%.5f %s", r.Value, r.Pair) }
