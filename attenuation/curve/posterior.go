package curve

import (
	"math"

	"gonum.org/v1/gonum/mat"
)

// posterior is the belief about one batch after its readings: the prior times
// a Student t likelihood whose scale joins the reading's own uncertainty and
// the error of the curve.
type posterior struct {
	prior    Prior
	og       float64
	sdOG     float64
	readings []Reading
	nu       float64
	scale    []float64 // of every reading
}

// newPosterior takes the error of the curve, tau, in points; half of it is
// allowed to the original gravity beside its own uncertainty.
func newPosterior(prior Prior, b Batch, readings []Reading, tau, nu float64) *posterior {
	p := &posterior{prior: prior, og: b.OG, sdOG: math.Hypot(b.uncertainOG(), 0.5*tau), readings: readings, nu: nu}
	p.scale = make([]float64, len(readings))
	for k, r := range readings {
		p.scale[k] = math.Hypot(r.U, tau)
	}
	return p
}

// inside reports whether the parameters describe a fermentation.
func inside(x []float64) bool {
	return x[0] > minAA && x[0] < maxAA && x[2] > minPhi && x[2] < maxPhi &&
		math.Abs(x[3]) < maxLnS && x[1] > -5 && x[1] < 12
}

// height is the logarithm of the density, without its constant.
func (p *posterior) height(x []float64) float64 {
	if !inside(x) || p.og+x[dims] < 0.1 {
		return math.Inf(-1)
	}
	d := x[dims] / p.sdOG
	f := p.prior.logDensity(x) - 0.5*d*d
	theta := paramsOf(x)
	h := theta.curveShape()
	o := theta.original(p.og)
	fall := theta.AA * o
	likely, product := 0.0, 1.0
	for k, r := range p.readings {
		e := (r.Points - o + fall*(1-h.left(r.Hours))) / p.scale[k]
		// One logarithm of a product costs less than one of every factor.
		if product *= 1 + e*e/p.nu; product > 1e100 {
			likely, product = likely+math.Log(product), 1
		}
	}
	f -= 0.5 * (p.nu + 1) * (likely + math.Log(product))
	if math.IsNaN(f) {
		return math.Inf(-1)
	}
	return f
}

// differences are the steps of the derivatives.
var differences = [dims + 1]float64{1e-4, 1e-4, 1e-3, 1e-3, 1e-2}

// slope weighs every residual by what the t distribution leaves of it, and the
// prior likewise (iteratively reweighted least squares).
func (p *posterior) slope(x []float64, g *mat.VecDense, a *mat.SymDense) {
	const n = dims + 1
	var moved [n + 1]Params
	var shapes [n + 1]shape
	var original, fall [n + 1]float64
	var y [n]float64
	for k := range n + 1 {
		copy(y[:], x)
		if k < n {
			y[k] += differences[k]
		}
		moved[k] = paramsOf(y[:])
		shapes[k] = moved[k].curveShape()
		original[k] = moved[k].original(p.og)
		fall[k] = moved[k].AA * original[k]
	}
	var j [n]float64
	var gradient [n]float64
	var curved [n][n]float64
	for i, r := range p.readings {
		left := shapes[n].left(r.Hours)
		here := original[n] - fall[n]*(1-left)
		e := (r.Points - here) / p.scale[i]
		w := (p.nu + 1) / (p.nu + e*e)
		for k := range n {
			at := left // neither the attenuation nor the original gravity moves the shape
			if k != 0 && k != dims {
				at = shapes[k].left(r.Hours)
			}
			j[k] = (original[k] - fall[k]*(1-at) - here) / (differences[k] * p.scale[i])
		}
		for k := range n {
			gradient[k] += w * e * j[k]
			for l := range k + 1 {
				curved[k][l] += w * j[k] * j[l]
			}
		}
	}
	for k := range n {
		g.SetVec(k, gradient[k])
		for l := range k + 1 {
			a.SetSym(k, l, curved[k][l])
		}
	}
	w := (p.prior.free + dims) / (p.prior.free + p.prior.quadratic(x))
	for k := range dims {
		for l := range dims {
			g.SetVec(k, g.AtVec(k)-w*p.prior.precise[k][l]*(x[l]-p.prior.centre[l]))
		}
		for l := range k + 1 {
			a.SetSym(k, l, a.At(k, l)+w*p.prior.precise[k][l])
		}
	}
	v := p.sdOG * p.sdOG
	g.SetVec(dims, g.AtVec(dims)-x[dims]/v)
	a.SetSym(dims, dims, a.At(dims, dims)+1/v)
}

// best climbs from several starts and keeps the highest top.
func (p *posterior) best() (x []float64, curvature *mat.SymDense) {
	c := climber{rounds: 60, longest: []float64{.15, .8, 1, 1, 5}, gain: 1e-6, tries: 10}
	top := math.Inf(-1)
	for _, start := range p.starts() {
		y, f, a := c.climb(p, start)
		if x == nil || f > top {
			x, curvature, top = y, a, f
		}
	}
	return x, curvature
}

// starts are the centre of the prior, the same twice as slow and twice as fast,
// the same with a sharper and a rounder end, and a half-time guessed from the
// last reading.
func (p *posterior) starts() [][]float64 {
	centre := append(append([]float64(nil), p.prior.centre[:]...), 0)
	with := func(k int, v float64) []float64 {
		x := append([]float64(nil), centre...)
		x[k] = v
		return x
	}
	starts := [][]float64{centre, with(1, centre[1]-0.7), with(1, centre[1]+0.7)}
	if n := len(p.readings); n > 0 {
		last := p.readings[n-1]
		fell := p.og - last.Points
		if full := math.Max(centre[0]*p.og, fell*1.05); fell > 0.15*full {
			starts = append(starts, with(1, math.Log(math.Max(last.Hours*0.5*full/fell, 4))))
		}
	}
	return starts
}
