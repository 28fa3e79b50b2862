package asread

import (
	"slices"
	"strings"

	"github.com/shopspring/decimal"
)

// Mass is a typed mass and how it was read.
type Mass struct {
	Input string  // as typed, trimmed
	Kg    float64 // kg
	Text  string  // the exact decimal in kg: "0.500" for 500 g
}

// Volume is a typed volume and how it was read.
type Volume struct {
	Input string  // as typed, trimmed
	L     float64 // litres
	Text  string  // the exact decimal in litres: "0.750" for 750 mL
}

// The bounds of a mass in kg and of a volume in litres: a pinch to a large cellar.
var (
	quantityLo = decimal.New(1, -6)
	quantityHi = decimal.New(1, 7)
)

// The units in lower case with their factor to kg or L, and those whose size
// depends on the country or the goods.
var (
	massUnits = map[string]decimal.Decimal{
		"kg": decimal.New(1, 0), "kilo": decimal.New(1, 0), "kilos": decimal.New(1, 0),
		"g": decimal.New(1, -3), "gram": decimal.New(1, -3), "grams": decimal.New(1, -3),
		// International yard and pound agreement of 1959, exact.
		"lb": decimal.New(45359237, -8), "lbs": decimal.New(45359237, -8),
	}
	volumeUnits = map[string]decimal.Decimal{
		"l": decimal.New(1, 0), "litre": decimal.New(1, 0), "litres": decimal.New(1, 0),
		"liter": decimal.New(1, 0), "liters": decimal.New(1, 0),
		"ml": decimal.New(1, -3), "cl": decimal.New(1, -2), "hl": decimal.New(100, 0),
	}
	ambiguousVolumes = []string{
		"gal", "gallon", "gallons", "bbl", "bbls", "barrel", "barrels",
		"qt", "quart", "quarts", "pt", "pint", "pints", "floz", "fl oz",
	}
)

// ParseMass reads a mass with its unit: "2kg", "500 g", "4lb", "0,75 kg"; 1 mg to
// 10 000 t. A bare number is not read. The error is a *Refusal.
func ParseMass(text string) (Mass, error) {
	in, d, err := quantity(text, "a mass in kg, g or lb", "kg", "g", massUnits, nil)
	if err != nil {
		return Mass{}, err
	}
	return Mass{Input: in, Kg: d.InexactFloat64(), Text: digits(d)}, nil
}

// ParseVolume reads a volume with its unit: "100L", "5hl", "750 mL", "1,5 l";
// 1 µL to 10 000 m³. A bare number is not read, nor a gallon or a barrel, which are
// not the same everywhere. The error is a *Refusal.
func ParseVolume(text string) (Volume, error) {
	in, d, err := quantity(text, "a volume in L, hL or mL", "L", "hL", volumeUnits, ambiguousVolumes)
	if err != nil {
		return Volume{}, err
	}
	return Volume{Input: in, L: d.InexactFloat64(), Text: digits(d)}, nil
}

// quantity reads a number with one of units and returns it in the unit of factor 1.
// one and other are what a bare number is proposed with.
func quantity(text, wanted, one, other string, units map[string]decimal.Decimal, ambiguous []string) (string, decimal.Decimal, error) {
	in := strings.TrimSpace(text)
	refuse := func(wanted, advice string) (string, decimal.Decimal, error) {
		return in, decimal.Decimal{}, &Refusal{Read: in, Wanted: wanted, Advice: advice}
	}
	v, rest, err := split(text)
	if err != nil {
		return in, decimal.Decimal{}, err
	}
	unit := strings.ToLower(rest)
	factor, ok := units[unit]
	switch {
	case unit == "":
		return refuse(wanted+", not a bare number", "type "+v.String()+one+" or "+v.String()+other)
	case slices.Contains(ambiguous, unit):
		return refuse(wanted+": a "+unit+" is not the same everywhere", "type litres, such as 100L")
	case !ok:
		return refuse(wanted, "write it like 2"+one+" or 5"+other)
	}
	d := v.dec.Mul(factor)
	if !within(d, quantityLo, quantityHi) {
		return refuse(wanted+", 0.000001 to 10000000 "+one, "check the unit and the decimal mark")
	}
	if len(digits(d)) > maxNumber {
		return refuse(wanted+" with fewer decimals", "leave out the last decimals")
	}
	return in, d, nil
}
