package curve

import "math"

// Limits of the parameters. Outside them no fermentation is described and the
// exponentials lose digits.
const (
	minAA, maxAA   = 0.02, 1.6
	minPhi, maxPhi = -6.0, 4.0
	maxLnS         = 4.0
	maxGrowth      = 400.0 // k·t50
)

// Params are the four numbers that describe a course, whatever its OG.
type Params struct {
	AA    float64 `json:"aa"`     // apparent attenuation at the end, 0.02..1.6 (dry wine ends below water)
	LnT50 float64 `json:"ln_t50"` // natural logarithm of the hours to half of the fall
	Phi   float64 `json:"phi"`    // how late the fall starts, -6..4; large is a long lag
	LnS   float64 `json:"ln_s"`   // logarithm of uptake rate over growth rate, -4..4; 0 is the logistic
	DOG   float64 `json:"d_og"`   // how far the fitted original gravity is from the one given, points
}

// shape is the part of a course that depends on time only: the share of the
// fall still to come is ((1+E)/(1+E·e^{kt}))^s.
type shape struct {
	s, k, lnE, top float64 // top is ln(1+E)
}

// curveShape works in ln E, since E itself leaves the range of a float64 for a
// long lag. From c·t50 = ln2·(1+e^φ) and k = c/s follows
// E = (2^{1/s}-1)/(e^{k·t50}-2^{1/s}).
func (p Params) curveShape() shape {
	s := math.Exp(clamp(p.LnS, -maxLnS, maxLnS))
	kt := math.Min(math.Ln2*(1+math.Exp(clamp(p.Phi, minPhi, maxPhi)))/s, maxGrowth)
	half := math.Ln2 / s
	lnE := math.Log(math.Expm1(half)) - (kt + math.Log(-math.Expm1(math.Min(half-kt, -1e-12))))
	return shape{s: s, k: kt / math.Exp(clamp(p.LnT50, -10, 20)), lnE: lnE, top: softplus(lnE)}
}

// left is the share of the fall still to come, 1 at pitching, falling to 0.
func (h shape) left(hours float64) float64 {
	if !(hours > 0) {
		return 1
	}
	x := h.lnE + h.k*hours
	// As softplus, but math.Log is the quicker: it loses the digits of a small number,
	// which are far behind those of the exponent it is part of.
	return math.Exp(h.s * (h.top - math.Max(x, 0) - math.Log(1+math.Exp(-math.Abs(x)))))
}

// rate is the share of the fall that goes in an hour.
func (h shape) rate(hours float64) float64 {
	x := h.lnE + h.k*math.Max(hours, 0)
	return h.left(hours) * h.s * h.k / (1 + math.Exp(-x))
}

// timeTo is when the share left has come down to q, 0 < q <= 1.
func (h shape) timeTo(q float64) float64 {
	z := h.top - math.Log(q)/h.s // ln[(1+E)·q^{-1/s}]
	return math.Max((z+math.Log(-math.Expm1(math.Min(-z, -1e-12)))-h.lnE)/h.k, 0)
}

// original is the fitted original gravity, at least a tenth of a point.
func (p Params) original(og float64) float64 { return math.Max(og+p.DOG, 0.1) }

// At gives the gravity in points at a time in hours since pitching; og is the
// original gravity in points. Before pitching it is the original gravity.
func (p Params) At(og, hours float64) float64 {
	o := p.original(og)
	return o - p.AA*o*(1-p.curveShape().left(hours))
}

// FG gives the gravity in points at which the course ends.
func (p Params) FG(og float64) float64 { return p.original(og) * (1 - p.AA) }

// TimeTo gives the hours since pitching at which delta points are left to
// fall, 0 if the whole fall is smaller. delta below a millionth counts as that.
func (p Params) TimeTo(og, delta float64) float64 {
	q := math.Max(delta, 1e-6) / math.Max(p.AA*p.original(og), 1e-6)
	if q >= 1 {
		return 0
	}
	return p.curveShape().timeTo(q)
}

// Rate gives how fast the gravity falls at a time, in points per day.
func (p Params) Rate(og, hours float64) float64 {
	if hours < 0 {
		return 0
	}
	return 24 * p.AA * p.original(og) * p.curveShape().rate(hours)
}

// RateAt gives the fall in points per day at the moment when a share of the
// original gravity, the apparent attenuation, has gone; 0 past the end.
func (p Params) RateAt(og, attenuation float64) float64 {
	q := 1 - attenuation/p.AA
	if !(q > 0) {
		return 0
	}
	h := p.curveShape()
	return 24 * p.AA * p.original(og) * h.rate(h.timeTo(math.Min(q, 1)))
}

func (p Params) vector() [dims + 1]float64 {
	return [dims + 1]float64{p.AA, p.LnT50, p.Phi, p.LnS, p.DOG}
}

func paramsOf(x []float64) Params {
	return Params{AA: x[0], LnT50: x[1], Phi: x[2], LnS: x[3], DOG: x[4]}
}

// softplus is ln(1+e^x) without overflow.
func softplus(x float64) float64 { return math.Max(x, 0) + math.Log1p(math.Exp(-math.Abs(x))) }

func clamp(x, lo, hi float64) float64 { return math.Min(math.Max(x, lo), hi) }
