package outlook

import (
	"fmt"
	"math"
	"strconv"
	"time"

	"gylebook/attenuation"
	"gylebook/attenuation/curve"
	"gylebook/attenuation/journal"
	"gylebook/gravity/method"
)

// Fact is one thing that speaks for the end of fermentation, or does not.
type Fact struct {
	Code  string // "unchanged", "curve", "watch", "warm", "limit"
	Known bool   // false: it cannot be told, and Text says why
	Met   bool
	Text  string
}

// Evidence is what the readings of a batch say about its end.
type Evidence struct {
	Forecast Forecast
	Weighed  curve.Evidence
	Facts    []Fact
	Since    time.Time // for the terminal states, by WithSince; zero when it is not known

	// LimitDifference is how far the last reading is from the limit of attenuation,
	// in points of % apparent attenuation; nil without a forced ferment.
	LimitDifference *float64

	// Left is how many points may still be to fall: what the curve leaves with 95 %,
	// down to the lower end of the forecast, and down to the forced ferment where
	// there is one; and the carbon dioxide that they would make in a closed vessel.
	Left       float64
	CO2GPL     float64
	CO2Volumes float64
	LeftKnown  bool
}

// EvidenceOf weighs the readings of a batch until a time. After dry hops, fruit,
// sugar, topping up, a blend or water a new watch period begins, and readings after
// a cold crash prove nothing. slow marks a yeast that goes on slowly below the usual
// limit: it asks for a forced ferment. Since is left out, see WithSince. The error is
// that of Of.
func EvidenceOf(v journal.View, h History, now time.Time, slow bool) (Evidence, error) {
	c, err := CourseOf(v, now)
	if err != nil {
		return Evidence{}, err
	}
	c.Watch.Slow = slow
	w, err := h.Prior().Evidence(c.Batch, c.Hours(now), c.Watch)
	if err != nil {
		return Evidence{}, err
	}
	e := Evidence{Forecast: Forecast{Course: c, History: h, Curve: w.Forecast}, Weighed: w}
	if c.Watch.LimitKnown && c.Last != nil && c.Last.Attenuation != nil {
		a := c.Last.Attenuation
		if d := attenuation.LimitDifference(a.OE, a.AE, *v.Limit); finite(d) {
			e.LimitDifference = &d
		}
	}
	if w.UndetectedKnown && c.Last != nil {
		e.Left, e.LeftKnown = math.Max(w.Undetected, points(c.Last.SG)-w.Forecast.FG.Lo), true
		if w.AboveLimitKnown {
			e.Left = math.Max(e.Left, w.AboveLimit)
		}
		e.Left = math.Max(e.Left, 0)
		e.CO2GPL, e.CO2Volumes = attenuation.CO2ToCome(e.Left)
	}
	e.Facts = []Fact{e.unchanged(), e.curve(), e.watch(), e.warm(), e.limit()}
	return e, nil
}

// WithSince adds the first reading from which the curve has called the end without a
// break. It costs a forecast for every reading that it goes back, which a look at
// many batches has no time for.
func (e Evidence) WithSince() Evidence {
	c := e.Forecast.Course
	if s := e.Weighed.State; s != curve.Terminal && s != curve.ProbablyTerminal || c.Pitched.IsZero() {
		return e
	}
	if hours, ok := e.Forecast.History.Prior().Since(c.Batch, c.Hours(c.Now), c.Watch); ok {
		e.Since = c.Pitched.Add(time.Duration(hours * float64(time.Hour))).Round(time.Second).In(c.Now.Location())
	}
	return e
}

// Notes are what is to be known about the evidence and the forecast in it.
func (e Evidence) Notes() []method.Note { return append(e.Forecast.Notes(), e.Weighed.Notes...) }

func (e Evidence) unchanged() Fact {
	w := e.Weighed
	f := Fact{Code: "unchanged", Known: true, Met: w.Unchanged}
	switch w.FlatN {
	case 0:
		f.Text = "no reading that counts; wanted 48 h within 1 point"
	case 1:
		f.Text = "1 reading by itself; wanted 48 h within 1 point"
	default:
		f.Text = fmt.Sprintf("%d readings within 1 point for %s h", w.FlatN, fixed(math.Floor(w.FlatHours+1e-9), 0))
		if !f.Met {
			f.Text += "; wanted 48 h"
		}
	}
	return f
}

func (e Evidence) curve() Fact {
	w := e.Weighed
	if !w.LeftKnown {
		return Fact{Code: "curve", Text: "no curve below 3 readings; wanted less than 10 % for more than 2 points left"}
	}
	f := Fact{Code: "curve", Known: true, Met: w.Left < 0.10, Text: percent(w.Left) + " for more than 2 points left"}
	if !f.Met {
		f.Text += "; wanted less than 10 %"
	}
	return f
}

func (e Evidence) watch() Fact {
	c := e.Forecast.Course
	if c.Added == "" {
		return Fact{Code: "watch", Known: true, Met: true, Text: "nothing added that would begin a new watch period"}
	}
	return Fact{
		Code: "watch", Known: true, Met: e.Weighed.Unchanged,
		Text: fmt.Sprintf("new watch period since the %s of %s; wanted 48 h of readings within 1 point since", c.Added, stamp(c.Since)),
	}
}

func (e Evidence) warm() Fact {
	c := e.Forecast.Course
	f := Fact{Code: "warm", Known: true, Met: c.Cold == 0, Text: "no cold crash"}
	if !c.Crashed.IsZero() {
		f.Text = "cold crash of " + stamp(c.Crashed)
		if c.Cold > 0 {
			f.Text += "; " + count(c.Cold, "reading") + " since prove nothing: cold yeast stands still"
		}
	}
	return f
}

func (e Evidence) limit() Fact {
	w, c := e.Weighed, e.Forecast.Course
	if !w.AboveLimitKnown {
		why := "no forced ferment"
		if c.Watch.LimitKnown {
			why = "no reading that counts"
		}
		return Fact{Code: "limit", Text: why}
	}
	side, off := "above", w.AboveLimit
	if off < 0 {
		side, off = "below", -off
	}
	return Fact{
		Code: "limit", Known: true, Met: w.AboveLimit <= 2,
		Text: fmt.Sprintf("%s points %s the forced ferment at %s; wanted at most 2", fixed(off, 1), side, fixed(1+c.Watch.Limit/1000, 4)),
	}
}

// stamp is a time for a person.
func stamp(t time.Time) string { return t.Format("Mon 2 Jan 15:04") }

// percent is a probability in whole percent; what is small is not called none.
func percent(p float64) string {
	switch {
	case p < 0.01:
		return "less than 1 %"
	case p > 0.99:
		return "more than 99 %"
	}
	return fixed(100*p, 0) + " %"
}

// fixed prints a number for a person, without a minus before nothing.
func fixed(x float64, places int) string {
	text := strconv.FormatFloat(x, 'f', places, 64)
	if f, err := strconv.ParseFloat(text, 64); err == nil && f == 0 {
		return strconv.FormatFloat(0, 'f', places, 64)
	}
	return text
}
