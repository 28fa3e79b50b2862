package outlook

import (
	"math"
	"time"

	"gylebook/attenuation"
	"gylebook/attenuation/curve"
	"gylebook/attenuation/journal"
	"gylebook/gravity"
	"gylebook/gravity/method"
)

// Forecast is where a batch is going.
type Forecast struct {
	Course  Course
	History History
	Curve   curve.Forecast
}

// Of foretells the end of a batch from its readings until a time and the history of
// its product and yeast. The view holds every reading. The error is a *Refusal, or
// that of attenuation/curve.
func Of(v journal.View, h History, now time.Time) (Forecast, error) {
	c, err := CourseOf(v, now)
	if err != nil {
		return Forecast{}, err
	}
	f, err := h.Prior().Forecast(c.Batch, c.Hours(now))
	if err != nil {
		return Forecast{}, err
	}
	return Forecast{Course: c, History: h, Curve: f}, nil
}

// FG is the final gravity, SG 20/20. ok is false when it is not a gravity.
func (f Forecast) FG() (i curve.Interval, ok bool) { return asSG(f.Curve.FG) }

func asSG(p curve.Interval) (curve.Interval, bool) {
	i := curve.Interval{Lo: 1 + p.Lo/1000, Median: 1 + p.Median/1000, Hi: 1 + p.Hi/1000}
	return i, p != (curve.Interval{}) && finite(i.Lo) && finite(i.Median) && finite(i.Hi)
}

func finite(x float64) bool { return !math.IsNaN(x) && !math.IsInf(x, 0) }

// ABV is the strength at the end [% vol at 20 °C] by the default method.
func (f Forecast) ABV() (i curve.Interval, ok bool) {
	fit := gravity.Fits.Default()
	og := gravity.SG(1 + f.Course.Batch.OG/1000)
	return f.Curve.Of(func(fg float64) float64 {
		g, err := attenuation.NewGravities(og, gravity.SG(1+fg/1000), fit)
		if err != nil {
			return math.NaN()
		}
		a, err := attenuation.ABVMethods.Default().Fn(g)
		if err != nil {
			return math.NaN()
		}
		return float64(a.ABV)
	})
}

// Times are a median and the 5th and 95th percentile of a time.
type Times struct{ Lo, Median, Hi time.Time }

// Terminal is when the gravity comes within 2 points of its end. ok is false without
// a curve, and where pitching is not known.
func (f Forecast) Terminal() (t Times, ok bool) {
	if !f.Curve.Curve || f.Course.Pitched.IsZero() {
		return Times{}, false
	}
	at := func(hours float64) time.Time {
		return f.Course.Pitched.Add(time.Duration(hours * float64(time.Hour))).Round(time.Minute).In(f.Course.Now.Location())
	}
	i := f.Curve.Hours
	return Times{at(i.Lo), at(i.Median), at(i.Hi)}, true
}

// Next is the gravity, SG 20/20, that a reading at a time should show. ok is false
// without a curve, before the last reading, and where the curve no longer holds:
// after a cold crash, priming, or an addition since the last reading.
func (f Forecast) Next(at time.Time) (i curve.Interval, ok bool) {
	c := f.Course
	if !f.Curve.Curve || c.Last == nil || at.Before(c.Last.Source.TakenAt) ||
		!c.Crashed.IsZero() && at.After(c.Crashed) || !c.Primed.IsZero() && at.After(c.Primed) {
		return curve.Interval{}, false
	}
	return asSG(f.Curve.GravityAt(c.Hours(at)))
}

// Notes are what is to be known about the forecast.
func (f Forecast) Notes() []method.Note {
	return append(append([]method.Note{}, f.Course.Notes...), f.Curve.Notes...)
}
