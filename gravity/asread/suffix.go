package asread

import (
	"strings"
	"unicode"

	"github.com/shopspring/decimal"

	"gylebook/gravity"
)

// limit is the closed interval a value of a scale may lie in when the scale is
// stated, and the short suffix that states it. The intervals take in every
// liquid a fermenter meets and stop what can only be a slip (common practice,
// no source).
type limit struct {
	suffix string
	lo, hi decimal.Decimal
}

var limits = map[gravity.Scale]limit{
	gravity.ScaleSG:       {"sg", decimal.New(950, -3), decimal.New(1450, -3)},
	gravity.ScalePlato:    {"P", decimal.New(-10, 0), decimal.New(85, 0)},
	gravity.ScaleBrix:     {"Bx", decimal.New(-10, 0), decimal.New(85, 0)},
	gravity.ScalePoints:   {"pt", decimal.New(-50, 0), decimal.New(450, 0)},
	gravity.ScaleOechsle:  {"Oe", decimal.New(-50, 0), decimal.New(450, 0)},
	gravity.ScaleKMW:      {"KMW", decimal.New(-10, 0), decimal.New(60, 0)},
	gravity.ScaleBaume:    {"Be", decimal.New(-5, 0), decimal.New(45, 0)},
	gravity.ScaleTwaddell: {"Tw", decimal.New(-10, 0), decimal.New(90, 0)},
	gravity.ScaleDensity:  {"kg/m3", decimal.New(900, 0), decimal.New(1450, 0)},
	gravity.ScaleGPL:      {"g/L", decimal.New(0, 0), decimal.New(1250, 0)},
}

// suffixHelp lists one spelling a scale, for hints.
const suffixHelp = "a scale is one of sg, P, Bx, pt, Oe, KMW, Be, Tw, kg/m3, g/L"

// spellings are the suffixes as fold leaves them; every id is one too. The
// accented ones stand composed and with a combining acute.
var spellings = map[string]gravity.Scale{
	"sg":    gravity.ScaleSG,
	"p":     gravity.ScalePlato,
	"plato": gravity.ScalePlato, "balling": gravity.ScalePlato,
	"bx": gravity.ScaleBrix, "brix": gravity.ScaleBrix,
	"pt": gravity.ScalePoints, "pts": gravity.ScalePoints,
	"point": gravity.ScalePoints, "points": gravity.ScalePoints,
	"oe": gravity.ScaleOechsle, "oechsle": gravity.ScaleOechsle, "öchsle": gravity.ScaleOechsle,
	"kmw": gravity.ScaleKMW,
	"be":  gravity.ScaleBaume, "bé": gravity.ScaleBaume, "be\u0301": gravity.ScaleBaume,
	"baume": gravity.ScaleBaume, "baumé": gravity.ScaleBaume, "baume\u0301": gravity.ScaleBaume,
	"tw": gravity.ScaleTwaddell, "twaddell": gravity.ScaleTwaddell,
	"kg/m3": gravity.ScaleDensity, "kg/m³": gravity.ScaleDensity, "density": gravity.ScaleDensity,
	"g/l": gravity.ScaleGPL, "gpl": gravity.ScaleGPL,
}

// temperatureUnits are the temperature suffixes as fold leaves them.
var temperatureUnits = map[string]Unit{"c": C, "celsius": C, "f": F, "fahrenheit": F}

// fold takes the case, the spaces and the degree sign (also the ordinal º that
// some keyboards give) out of a suffix.
func fold(suffix string) string {
	return strings.Map(func(r rune) rune {
		if r == '°' || r == 'º' || unicode.IsSpace(r) {
			return -1
		}
		return unicode.ToLower(r)
	}, suffix)
}

// ParseScale returns the scale with this id or suffix in any spelling that a
// reading may carry, or an *method.UnknownError that lists the ids.
func ParseScale(text string) (gravity.Scale, error) {
	if s, ok := spellings[fold(text)]; ok {
		return s, nil
	}
	return gravity.FindScale(strings.TrimSpace(text))
}

// Join puts back together a number and its unit where a space stood between
// them: "12", "P" becomes "12 P". Only a known unit alone is joined, and only
// to a number that has none yet. args is left as it is.
func Join(args []string) []string {
	var out []string
	for _, a := range args {
		if last := len(out) - 1; last >= 0 && isUnit(a) && isBare(out[last]) {
			out[last] += " " + a
			continue
		}
		out = append(out, a)
	}
	return out
}

// Fields splits a line on white space and joins numbers and units.
func Fields(line string) []string { return Join(strings.Fields(line)) }

func isUnit(arg string) bool {
	unit := fold(arg)
	if unit == "" {
		return arg != "" // a degree sign alone
	}
	_, scale := spellings[unit]
	_, temperature := temperatureUnits[unit]
	return scale || temperature
}

// isBare reports whether arg is a number with nothing but a degree sign behind it.
func isBare(arg string) bool {
	end := numberEnd(arg)
	return strings.ContainsAny(arg[:end], "0123456789") && fold(arg[end:]) == ""
}
