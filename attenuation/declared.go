package attenuation

import (
	"strings"

	"gylebook/gravity"
	"gylebook/gravity/asread"
	"gylebook/gravity/method"
)

// Rule is how a strength is rounded for a declaration, as dated data: the law
// moves, and the operator remains responsible for the current text.
type Rule struct {
	ID       string // lower-case key used in flags, CSV and reports
	Name     string
	Text     string // what the rule says, in one line
	Source   method.Source
	Dated    string // date of the text; "" when it could not be found out
	Places   int    // decimals
	Rounding asread.Rule
	// Method is the id of the ABV method that the rule itself names, else "".
	Method    string
	Tolerance []Tolerance
}

// Tolerance is how far the declared strength may lie from the true one.
type Tolerance struct {
	For  string
	Plus float64 // % vol, either way
}

// Rules are the rules for a declared strength, the default first.
var Rules = []Rule{
	{
		ID: "uk-duty", Name: "UK alcohol duty",
		Text: "strength at 20 °C truncated to one decimal; the label strength usually governs, and a conditioned or primed product counts at its expected strength",
		Source: method.Source{
			Author: "HMRC", Where: "Alcoholic Products Technical Guide, section 11", Status: method.Read,
		},
		Places: 1, Rounding: asread.Truncate, Method: idUKDuty,
	},
	{
		ID: "eu-label", Name: "EU label (not grape wine)",
		Text:   "at most one decimal; the text names no rule for ties, half to even is taken",
		Source: method.Source{Author: "Regulation (EU) No 1169/2011", Where: "Annex XII", Status: method.Read},
		Dated:  "2011", Places: 1, Rounding: asread.HalfEven,
		Tolerance: []Tolerance{
			{"beer up to 5.5 % vol", 0.5},
			{"beer above 5.5 % vol, cider, perry, mead", 1.0},
			{"drinks with macerated fruit or parts of plants", 1.5},
			{"other drinks", 0.3},
		},
	},
	{
		ID: "us-malt", Name: "US malt beverage label",
		Text:   "nearest 0.1 % vol; the text names no rule for ties, half to even is taken",
		Source: method.Source{Author: "27 CFR 7.71", Where: "now 7.65 (renumbering from memory)", Status: method.Quoted},
		Places: 1, Rounding: asread.HalfEven,
		Tolerance: []Tolerance{{"malt beverages", 0.3}},
	},
}

// FindRule returns the rule with this id, the first for "", or a
// *method.UnknownError.
func FindRule(id string) (Rule, error) {
	if id == "" {
		return Rules[0], nil
	}
	known := make([]string, len(Rules))
	for i, r := range Rules {
		if r.ID == strings.ToLower(strings.TrimSpace(id)) {
			return r, nil
		}
		known[i] = r.ID
	}
	return Rule{}, &method.UnknownError{What: "rule", Got: id, Known: known}
}

// Declare returns the strength [% vol] that the rule makes of abv, rounded once,
// on the decimal.
func (r Rule) Declare(abv gravity.VolPct) gravity.VolPct {
	return gravity.VolPct(asread.Round(float64(abv), r.Places, r.Rounding))
}
