package curve

import "math"

// drawn is one course of those that a forecast holds possible, with what its figures
// have in common.
type drawn struct {
	params   Params
	shape    shape
	original float64 // fitted original gravity, points
	fall     float64 // whole fall, points
}

func newDrawn(x []float64, og float64) *drawn {
	p := paramsOf(x)
	o := p.original(og)
	return &drawn{params: p, shape: p.curveShape(), original: o, fall: p.AA * o}
}

func (d *drawn) at(hours float64) float64 { return d.original - d.fall*(1-d.shape.left(hours)) }

func (d *drawn) fg() float64 { return d.original * (1 - d.params.AA) }

// timeTo is Params.TimeTo.
func (d *drawn) timeTo(delta float64) float64 {
	q := math.Max(delta, 1e-6) / math.Max(d.fall, 1e-6)
	if q >= 1 {
		return 0
	}
	return d.shape.timeTo(q)
}

func (d *drawn) rate(hours float64) float64 {
	if hours < 0 {
		return 0
	}
	return 24 * d.params.AA * d.original * d.shape.rate(hours)
}

// figures are those of every draw. A course that was drawn more than once stands in
// the list that often, one beside the other, and is calculated once.
func figures(list []*drawn, figure func(*drawn) float64) []float64 {
	out := make([]float64, len(list))
	for k, d := range list {
		if k > 0 && d == list[k-1] {
			out[k] = out[k-1]
			continue
		}
		out[k] = figure(d)
	}
	return out
}
