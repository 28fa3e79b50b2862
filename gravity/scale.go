package gravity

import "gylebook/gravity/method"

// Scale is a scale that a value can be read on or converted to. The zero value
// is specific gravity.
type Scale int

// The scales. Their ids are the keys used in flags, CSV and reports.
const (
	ScaleSG       Scale = iota // specific gravity on its pair
	ScalePlato                 // °P, extract % mass
	ScaleBrix                  // °Bx, extract % mass
	ScalePoints                // gravity points, 1000(SG − 1)
	ScaleOechsle               // °Oe
	ScaleKMW                   // °KMW, Klosterneuburger Mostwaage
	ScaleBaume                 // °Bé, heavy liquids
	ScaleTwaddell              // °Tw
	ScaleDensity               // kg/m³ at 20 °C
	ScaleGPL                   // extract g/L at 20 °C
)

// ScaleInfo describes a scale for parsers, help and tables.
type ScaleInfo struct {
	Scale    Scale
	ID       string // lower-case key
	Symbol   string // what stands behind a printed value, "" for SG
	Name     string
	Decimals int // decimals for people (common practice, no source)
}

var scales = []ScaleInfo{
	{ScaleSG, "sg", "SG", "specific gravity", 4},
	{ScalePlato, "plato", "°P", "degrees Plato, extract % mass", 2},
	{ScaleBrix, "brix", "°Bx", "degrees Brix, extract % mass", 2},
	{ScalePoints, "points", "points", "gravity points, 1000(SG - 1)", 1},
	{ScaleOechsle, "oechsle", "°Oe", "degrees Oechsle, 1000(SG 20/20 - 1)", 1},
	{ScaleKMW, "kmw", "°KMW", "degrees KMW", 2},
	{ScaleBaume, "baume", "°Bé", "degrees Baumé, heavy liquids", 2},
	{ScaleTwaddell, "twaddell", "°Tw", "degrees Twaddell", 2},
	{ScaleDensity, "density", "kg/m³", "density at 20 °C, kg/m³", 2},
	{ScaleGPL, "gpl", "g/L", "extract, g per litre at 20 °C", 1},
}

// Scales lists every scale in order.
func Scales() []ScaleInfo { return append([]ScaleInfo(nil), scales...) }

// Info returns the description of the scale.
func (s Scale) Info() ScaleInfo {
	if s < 0 || int(s) >= len(scales) {
		return ScaleInfo{Scale: s, ID: "unknown"}
	}
	return scales[s]
}

// String returns the id.
func (s Scale) String() string { return s.Info().ID }

// IsMass reports whether the scale is extract by mass (°P, °Bx).
func (s Scale) IsMass() bool { return s == ScalePlato || s == ScaleBrix }

// FindScale returns the scale with this id, or an *method.UnknownError.
func FindScale(id string) (Scale, error) {
	for _, s := range scales {
		if s.ID == id {
			return s.Scale, nil
		}
	}
	known := make([]string, len(scales))
	for i, s := range scales {
		known[i] = s.ID
	}
	return 0, &method.UnknownError{What: "scale", Got: id, Known: known}
}
