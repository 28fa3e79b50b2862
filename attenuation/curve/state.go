package curve

import (
	"math"
	"slices"

	"gylebook/gravity/method"

	"gonum.org/v1/gonum/stat"
)

// State is a word for where a batch stands. It is no approval.
type State string

// The states.
const (
	Moving           State = "moving"
	Sluggish         State = "sluggish"          // slower than nearly all of the history
	Stalled          State = "stalled"           // unchanged, but above where it should end
	ProbablyTerminal State = "probably terminal" // the curve alone says so
	Terminal         State = "terminal"          // unchanged for 48 h, and the curve says so
)

// fewest finished batches from which a percentile is taken.
const fewestForSluggish = 5

// decide finds the word. A stall goes before the end: yeast that stopped early
// also looks flat, and the curve bends to flat readings.
func (e *Evidence) decide(p Prior, b Batch, flat []Reading, w Watch) {
	ended := e.LeftKnown && e.Left < leftLimit
	open := e.limitOpen(w)
	switch {
	case e.Unchanged && (e.AboveLimitKnown && e.AboveLimit > nearEnd || e.stuck(p, b, flat)):
		e.State = Stalled
	case e.Unchanged && ended && !open:
		e.State = Terminal
	case ended && w.From == 0 && !(e.AboveLimitKnown && e.AboveLimit > nearEnd):
		e.State = ProbablyTerminal
	case !ended && e.slow(p, b.OG, flat): // what has ended falls slowly for that reason
		e.State = Sluggish
	default:
		e.State = Moving
	}
	if open && e.Unchanged && ended {
		e.note(method.Caution, "this yeast goes on slowly below the usual limit: a forced ferment is wanted before the end is called")
	}
	if ended && w.From > 0 && !e.Unchanged {
		e.note(method.Interpreted, "something was added at hour %.0f: the fall before it proves nothing, wanted 48 h unchanged since", w.From)
	}
}

// limitOpen reports whether the limit of a forced ferment is still wanted.
func (e *Evidence) limitOpen(w Watch) bool { return w.Slow && !e.AboveLimitKnown }

// stuck reports whether the unchanged readings stand above the interval that
// was foretold before they stood still: they may not explain themselves away.
func (e *Evidence) stuck(p Prior, b Batch, flat []Reading) bool {
	before, err := p.forecast(b, math.Nextafter(flat[0].Hours, math.Inf(-1)), false)
	if err != nil {
		return false
	}
	level := make([]float64, len(flat))
	for k, r := range flat {
		level[k] = r.Points
	}
	slices.Sort(level)
	return stat.Quantile(0.5, stat.Empirical, level, nil) > before.FG.Hi+flat[len(flat)-1].ownU()
}

// slow compares with the history: an end later than its 95th percentile, more
// likely than not, or a rate below its 10th percentile at the same attenuation.
// Fixed limits in points per day call a cool tank slow that is not.
func (e *Evidence) slow(p Prior, og float64, flat []Reading) bool {
	if len(p.finished) < fewestForSluggish || !e.Forecast.Curve || len(flat) == 0 {
		return false
	}
	hours, rates := make([]float64, len(p.finished)), make([]float64, len(p.finished))
	attenuation := e.Forecast.progress * (og - e.Forecast.FG.Median) / og
	for k, f := range p.finished {
		hours[k] = f.Hours()
		rates[k] = f.Params.RateAt(f.OG, attenuation)
	}
	slices.Sort(hours)
	slices.Sort(rates)
	if later, ok := e.Forecast.LaterThan(stat.Quantile(0.95, stat.LinInterp, hours, nil)); ok && later > 0.5 {
		return true
	}
	return e.Forecast.progress > 0.1 && e.Forecast.Rate().Hi < stat.Quantile(0.10, stat.LinInterp, rates, nil)
}
