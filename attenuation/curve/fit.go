package curve

import (
	"math"

	"gylebook/gravity/method"
)

// Options of a fit.
type Options struct {
	Tau float64 // error of the curve in points, 0..20; 0 trusts the curve wholly
	Nu  float64 // degrees of freedom of the errors; 0 means 4
}

const usualNu = 4.0

// Fitted is a course laid through the readings of a batch.
type Fitted struct {
	Params Params        `json:"params"`
	OG     float64       `json:"og"`   // points, as given
	RMS    float64       `json:"rms"`  // root mean square of the residuals, points, for the parameters used
	N      int           `json:"n"`    // readings it rests on
	Last   float64       `json:"last"` // hours of the last of them
	Late   float64       `json:"late"` // logarithm of the time at which the readings came within 2 points of the end over that of the curve; 0 where not seen
	Notes  []method.Note `json:"notes,omitempty"`
}

// FG is the final gravity of the fitted course in points.
func (f Fitted) FG() float64 { return f.Params.FG(f.OG) }

// Hours is when the fitted course comes within 2 points of its end.
func (f Fitted) Hours() float64 { return f.Params.TimeTo(f.OG, nearEnd) }

func (f Fitted) usable() bool {
	for _, v := range f.Params.vector() {
		if math.IsNaN(v) || math.IsInf(v, 0) {
			return false
		}
	}
	return f.OG > 0 && f.RMS >= 0 && f.RMS < maxU && math.Abs(f.Late) <= 0.5 && inside([]float64{f.Params.AA, f.Params.LnT50, f.Params.Phi, f.Params.LnS})
}

// Options gives the options that a forecast from this prior uses.
func (p Prior) Options() Options { return Options{Tau: p.Tau, Nu: usualNu} }

// Fit finds the most probable course of a batch. It returns ErrNoOG,
// ErrNoReadings below three readings after pitching, or a *method.RangeError.
func Fit(b Batch, prior Prior, opt Options) (Fitted, error) { return fit(b, nil, prior, opt) }

// FitFinished is Fit for a batch that has ended, as a history wants it: the
// final gravity in points and its standard uncertainty are known, and the curve
// must end there. A curve left free runs on below a short plateau.
func FitFinished(b Batch, fg, u float64, prior Prior, opt Options) (Fitted, error) {
	if !(fg >= -60 && fg <= 250) {
		return Fitted{}, &method.RangeError{What: "final gravity", Got: fg, Lo: -60, Hi: 250, Unit: "points"}
	}
	if !(u > 0 && u <= maxU) {
		return Fitted{}, &method.RangeError{What: "uncertainty of the final gravity", Got: u, Lo: leastU, Hi: maxU, Unit: "points"}
	}
	return fit(b, &Reading{Hours: math.Inf(1), Points: fg, U: math.Max(u, leastU)}, prior, opt)
}

func fit(b Batch, end *Reading, prior Prior, opt Options) (Fitted, error) {
	if err := b.check(); err != nil {
		return Fitted{}, err
	}
	if !(opt.Tau >= 0 && opt.Tau <= 20) {
		return Fitted{}, &method.RangeError{What: "error of the curve", Got: opt.Tau, Lo: 0, Hi: 20, Unit: "points"}
	}
	if opt.Nu == 0 {
		opt.Nu = usualNu
	}
	if !(opt.Nu >= 1 && opt.Nu <= 1e6) {
		return Fitted{}, &method.RangeError{What: "degrees of freedom of the errors", Got: opt.Nu, Lo: 1, Hi: 1e6}
	}
	if prior.spread == nil {
		prior = NewPrior(prior.Kind, nil)
	}
	readings, notes := b.usable(math.Inf(1))
	if len(readings) < enough {
		return Fitted{}, ErrNoReadings
	}
	p := newPosterior(prior, b, readings, opt.Tau, opt.Nu)
	if end != nil { // known as such, so without the error of the curve
		p.readings, p.scale = append(p.readings, *end), append(p.scale, end.U)
	}
	x, _ := p.best()
	f := Fitted{Params: paramsOf(x), OG: b.OG, N: len(readings), Last: readings[len(readings)-1].Hours, Notes: notes}
	sum := 0.0
	for _, r := range readings {
		e := r.Points - f.Params.At(b.OG, r.Hours)
		sum += e * e
	}
	if end != nil {
		f.Late = lateness(readings, end.Points, f.Hours())
	}
	f.RMS = math.Sqrt(sum / math.Max(float64(f.N-3), 1))
	return f, nil
}
