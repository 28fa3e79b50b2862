package attenuation

import (
	"gylebook/gravity"
	"gylebook/gravity/asread"
	"gylebook/gravity/method"
)

// Alcohol is what a method gives. A field that the method does not give is nil.
type Alcohol struct {
	ABV gravity.VolPct
	ABW *gravity.MassPct
	RE  *gravity.Plato
}

// ABVFunc returns alcohol from two gravities. It gives no negative alcohol: a
// present gravity above the original is an *OrderError.
type ABVFunc func(g Gravities) (Alcohol, error)

// Kinds of the methods. Only the first kind enters the spread.
const (
	KindABV       = "abv method"
	KindPotential = "potential"
)

// What a method's range can be about; the value is looked up by it.
const (
	ofOG         = "OG"
	ofOE         = "original extract"
	ofRE         = "real extract"
	ofEthanol    = "ethanol"
	ofDifference = "gravity difference"
)

// InRange returns a note for each input or result a that lies outside the range
// that method e was made for; no note means in range.
func InRange(e method.Entry[ABVFunc], g Gravities, a Alcohol) []method.Note {
	var notes []method.Note
	for _, r := range e.Valid {
		v, ok := valueOf(r.Of, g, a)
		if !ok {
			continue
		}
		one := method.Info{ID: e.ID, Valid: []method.Range{r}, Better: e.Better}
		notes = append(notes, one.InRange(v)...)
	}
	return notes
}

func valueOf(of string, g Gravities, a Alcohol) (float64, bool) {
	switch {
	case of == ofOG:
		return float64(g.OG), true
	case of == ofOE:
		return float64(g.OE), true
	case of == ofDifference:
		// To one decimal, as the bands that it is compared with.
		return asread.RoundDiff(float64(g.OG), float64(g.FG), 1000, 1, asread.HalfUp), true
	case of == ofRE && a.RE != nil:
		return float64(*a.RE), true
	case of == ofEthanol && a.ABW != nil:
		return float64(*a.ABW), true
	}
	return 0, false
}

// Estimate is the result of one method.
type Estimate struct {
	Info    method.Info
	Alcohol Alcohol // zero when Err is set
	InRange bool
	Notes   []method.Note
	Err     error // why there is no value
}

// standing are the notes that a method's value carries whatever the gravities.
var standing = map[string][]method.Note{
	idUKDuty: {{Code: method.Historic, Text: "uk-duty: notice withdrawn February 2025; check the current official text"}},
}

// Estimates returns one estimate a method, in the order of ABVMethods.
func Estimates(g Gravities) []Estimate {
	es := make([]Estimate, len(ABVMethods))
	for i, e := range ABVMethods {
		es[i] = EstimateBy(e, g)
	}
	return es
}

// EstimateBy returns the estimate of one method.
func EstimateBy(e method.Entry[ABVFunc], g Gravities) Estimate {
	a, err := e.Fn(g)
	if err != nil {
		return Estimate{Info: e.Info, Err: err}
	}
	notes := InRange(e, g, a)
	inRange := len(notes) == 0
	return Estimate{Info: e.Info, Alcohol: a, InRange: inRange, Notes: append(notes, standing[e.ID]...)}
}

// Spread returns the highest minus the lowest ABV [% vol] of the estimates that
// are in range; potential alcohol is left out. Fewer than two give 0.
func Spread(es []Estimate) gravity.VolPct {
	var lo, hi gravity.VolPct
	found := false
	for _, e := range es {
		if e.Err != nil || !e.InRange || e.Info.Kind != KindABV {
			continue
		}
		v := e.Alcohol.ABV
		if !found {
			lo, hi, found = v, v, true
		}
		lo, hi = min(lo, v), max(hi, v)
	}
	return hi - lo
}
