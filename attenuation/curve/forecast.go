package curve

import (
	"fmt"
	"math"
	"math/rand/v2"
	"slices"

	"gylebook/gravity/method"

	"gonum.org/v1/gonum/stat"
)

const (
	nearEnd = 2.0 // points above the final gravity that count as the end
	enough  = 3   // readings below which no curve is laid
)

// Interval holds the median and the 5th and 95th percentile.
type Interval struct {
	Lo     float64 `json:"lo"`
	Median float64 `json:"median"`
	Hi     float64 `json:"hi"`
}

// Forecast is where a batch is going.
type Forecast struct {
	N       int           `json:"n"`       // readings used, those of one visit being one
	History int           `json:"history"` // finished batches used
	Curve   bool          `json:"curve"`   // false: too few readings, history alone speaks
	FG      Interval      `json:"fg"`      // the final reading, points
	Hours   Interval      `json:"hours"`   // since pitching, until 2 points above the end; zero without a curve
	ESS     float64       `json:"ess"`     // effective sample size, of 600; 0 without a curve
	Notes   []method.Note `json:"notes,omitempty"`

	fg       []float64 // draws of the final reading, sorted
	hours    []float64
	drawn    []*drawn
	og       float64
	last     float64 // hours of the last reading
	tau, u   float64
	late     float64 // logarithm of how late the end comes against the curve, from the history
	progress float64 // share of the fall that the last reading shows
}

// Draws of the end say less than they seem to: the curve is not the truth.
// These widenings were set by hand on 24 public beer courses and compared on
// simulated ones.
const (
	widenFG  = 1.3  // of the spread of the final gravity
	extraFG  = 0.6  // points
	shareU   = 0.7  // of the uncertainty of a reading
	logTime  = 0.20 // spread of the logarithm of the time still to go
	lateTime = 0.80 // and more of it late, when the tail decides
	lateFrom = 0.6  // share of the fall from which it is late
	gapShare = 0.29 // of the spacing of the readings: 1/√12
)

// Forecast foretells the end from the readings up to now, in hours since
// pitching. Below three readings it gives what the finished batches reached
// and says so. It returns ErrNoOG or a *method.RangeError.
func (p Prior) Forecast(b Batch, now float64) (Forecast, error) { return p.forecast(b, now, true) }

// forecast leaves out when the end comes unless that is wanted.
func (p Prior) forecast(b Batch, now float64, hours bool) (Forecast, error) {
	if err := b.check(); err != nil {
		return Forecast{}, err
	}
	if math.IsNaN(now) {
		return Forecast{}, &method.RangeError{What: "moment of the forecast", Got: now, Lo: 0, Hi: maxHours, Unit: "hours since pitching"}
	}
	if p.spread == nil {
		p = NewPrior(p.Kind, nil)
	}
	readings, notes := b.usable(now)
	f := Forecast{N: len(readings), History: p.History(), Notes: notes, og: b.OG, tau: p.Tau, u: usualU}
	if p.History() == 0 {
		f.note(method.Assumed, "no finished batch to learn from: the usual figures of %s are taken", p.Kind)
	}
	src := source()
	if f.N < enough {
		f.note(method.NoValue, "%s: no curve below 3, the figure is that of the finished batches", count(f.N, "reading"))
		f.fromHistory(p, b, src)
		return f, nil
	}
	f.Curve = true
	f.u = middle(readings)
	post := newPosterior(p, b, readings, p.Tau, usualNu)
	top, curvature := post.best()
	if wide := post.misfit(top); wide > p.Tau {
		f.note(method.OutOfRange, "the readings scatter about the curve by %.1f points, the interval is widened", wide)
		f.tau = wide
		post = newPosterior(p, b, readings, wide, usualNu)
		top, curvature = post.best()
	}
	f.drawn, f.ESS = post.draws(top, curvature, src)
	if f.ESS < enoughESS*proposals/3 {
		f.note(method.NotCovered, "only %.0f effective draws: the interval is rough", f.ESS)
	}
	f.late = p.late
	rng := rand.New(src)
	f.ends(readings, rng)
	if hours {
		f.times(readings, rng)
	}
	return f, nil
}

// misfit is the robust spread of the residuals where it is more than three
// times what the readings and the curve are held to have, else 0.
func (p *posterior) misfit(x []float64) float64 {
	theta := paramsOf(x)
	off := make([]float64, len(p.readings))
	for k, r := range p.readings {
		off[k] = math.Abs(r.Points - theta.At(p.og, r.Hours))
	}
	slices.Sort(off)
	n := len(off)
	spread := (off[n/2] + off[(n-1)/2]) / 2 / 0.6745 // of a normal distribution
	if spread <= 3*median(p.scale) {
		return 0
	}
	return spread
}

// fromHistory draws from the prior alone.
func (f *Forecast) fromHistory(p Prior, b Batch, src *rand.PCG) {
	wide, ok := p.wide(math.Hypot(b.uncertainOG(), 0.5*p.Tau), src)
	for k := 0; ok && k < kept; {
		if x := wide.Rand(nil); inside(x) && b.OG+x[dims] > 0.1 {
			f.drawn = append(f.drawn, newDrawn(x, b.OG))
			k++
		}
	}
	f.fg = figures(f.drawn, (*drawn).fg)
	f.FG = interval(f.fg)
}

// ends makes the final gravity from the draws.
func (f *Forecast) ends(readings []Reading, rng *rand.Rand) {
	last := readings[len(readings)-1]
	f.last = last.Hours
	f.fg = figures(f.drawn, (*drawn).fg)
	here := figures(f.drawn, func(d *drawn) float64 { return d.at(f.last) })
	centre := median(f.fg)
	f.progress = clamp((f.og-median(here))/math.Max(f.og-centre, 1e-6), 0, 1)
	extra := math.Hypot(shareU*f.u, extraFG)
	for k := range f.fg {
		f.fg[k] = centre + widenFG*(f.fg[k]-centre) + extra*rng.NormFloat64()
	}
	f.FG = interval(f.fg)
}

// times makes the hour of the end from the draws, after ends.
func (f *Forecast) times(readings []Reading, rng *rand.Rand) {
	gap := (readings[len(readings)-1].Hours - readings[0].Hours) / float64(len(readings)-1)
	spread := logTime + lateTime*math.Max(0, f.progress-lateFrom)
	f.hours = figures(f.drawn, func(d *drawn) float64 { return d.timeTo(nearEnd) })
	late := math.Exp(f.late)
	for k, end := range f.hours {
		togo := math.Max(end*late-f.last, 0)
		t := f.last + togo*math.Exp(spread*rng.NormFloat64()) + gapShare*gap*rng.NormFloat64()
		f.hours[k] = math.Min(math.Max(t, f.last), maxHours)
	}
	f.Hours = interval(f.hours)
}

func (f *Forecast) note(code, format string, args ...any) {
	f.Notes = append(f.Notes, method.Note{Code: code, Text: fmt.Sprintf(format, args...)})
}

// interval sorts the draws and takes the percentiles.
func interval(draws []float64) Interval {
	if len(draws) == 0 {
		return Interval{}
	}
	slices.Sort(draws)
	at := func(p float64) float64 { return stat.Quantile(p, stat.LinInterp, draws, nil) }
	return Interval{Lo: at(0.05), Median: at(0.5), Hi: at(0.95)}
}

func median(xs []float64) float64 { return interval(slices.Clone(xs)).Median }

// middle is the median uncertainty of the readings.
func middle(readings []Reading) float64 {
	us := make([]float64, len(readings))
	for k, r := range readings {
		us[k] = r.U
	}
	return median(us)
}
