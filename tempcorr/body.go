package tempcorr

import "gylebook/gravity/method"

// Body is what a hydrometer is made of.
type Body struct {
	ID         string
	Expansion  float64 // cubic expansion, 1/K
	ExpansionU float64 // half-width of what the expansion may be, 1/K (from memory)
	Source     method.Source
}

// Bodies are the materials known, glass first. The spread of each coefficient is
// a judgement of a tenth, rounded up.
var Bodies = []Body{
	{"glass", 25e-6, 3e-6, method.Source{Author: "ISO 1768", Year: 1975, Where: "clause 3", Status: method.Read}},
	{"borosilicate", 10e-6, 1e-6, method.Source{Where: "handbook value", Status: method.FromMemory}},
	{"polycarbonate", 200e-6, 20e-6, method.Source{Where: "handbook value", Status: method.FromMemory}},
}

// FindBody returns the body with this id, glass for "", or an *method.UnknownError.
func FindBody(id string) (Body, error) {
	if id == "" {
		return Bodies[0], nil
	}
	known := make([]string, len(Bodies))
	for i, b := range Bodies {
		if b.ID == id {
			return b, nil
		}
		known[i] = b.ID
	}
	return Body{}, &method.UnknownError{What: "body", Got: id, Known: known}
}
