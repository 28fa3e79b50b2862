package outlook

import (
	"fmt"
	"math"
	"slices"
	"time"

	"gylebook/attenuation/curve"
	"gylebook/attenuation/journal"
	"gylebook/gravity"
	"gylebook/gravity/method"
)

// Course is a batch as attenuation/curve takes it.
type Course struct {
	Batch   curve.Batch
	Watch   curve.Watch
	Pitched time.Time // zero when it is not known
	Now     time.Time
	Last    *journal.Value // newest reading in it, nil when there is none
	Added   string         // what began the watch period, "" when nothing did
	Since   time.Time      // when that was
	Crashed time.Time      // zero when the batch was not cooled
	Cold    int            // readings after that, left out
	Primed  time.Time      // zero when it was not, by then
	Notes   []method.Note
}

// restarts are the events after which a new watch period begins.
var restarts = []string{journal.DryHop, journal.Fruit, journal.Sugar, journal.TopUp, journal.Blend, journal.Dilution}

// CourseOf gives the readings of a batch until a time. Those that are void, suspect,
// could not be corrected or came from a refractometer are left out, replicates count
// once, and a sample that was not degassed is held to be less sure.
//
// Water shifts the readings before it as it shifts the original gravity. After
// anything else that changes the original gravity the readings before it belong to
// another course and are left out, and so are those after priming and after a cold
// crash. The error is a *Refusal.
func CourseOf(v journal.View, now time.Time) (Course, error) {
	c := Course{Pitched: v.Pitched, Now: now}
	og, refused := original(v, now)
	if refused != nil {
		return c, refused
	}
	c.Batch.OG = og
	if v.OG.N > 1 {
		c.Batch.UOG = math.Max(usualU, 500*v.OG.Spread) // half of what they differ by
	}
	if !v.Primed.IsZero() && !v.Primed.After(now) {
		c.Primed = v.Primed
	}
	c.events(v)
	c.readings(v)
	c.limit(v)
	if v.Record.Batch.Pitched == nil && !v.Pitched.IsZero() {
		c.note(method.Assumed, "pitching not entered: hours run from the first reading")
	}
	return c, nil
}

// usualU is the uncertainty of an original gravity in points, an ordinary
// hydrometer's.
const usualU = 0.5

// Hours is a time in hours since pitching; 0 when pitching is not known.
func (c Course) Hours(at time.Time) float64 {
	if c.Pitched.IsZero() {
		return 0
	}
	return at.Sub(c.Pitched).Hours()
}

func (c *Course) note(code, format string, args ...any) {
	c.Notes = append(c.Notes, method.Note{Code: code, Text: fmt.Sprintf(format, args...)})
}

// events finds the watch period and the crash.
func (c *Course) events(v journal.View) {
	for _, e := range v.Record.Events {
		at := e.Body.At
		if e.Void || at.After(c.Now) || c.Hours(at) <= 0 {
			continue
		}
		switch {
		case slices.Contains(restarts, e.Body.What):
			if c.Since.IsZero() || !at.Before(c.Since) {
				c.Since, c.Added = at, e.Body.What
			}
		case e.Body.What == journal.Crash && (c.Crashed.IsZero() || at.Before(c.Crashed)):
			c.Crashed = at
		}
	}
	// A sample drawn at the moment of a deed came before it.
	if c.Added != "" {
		c.Watch.From = c.Hours(c.Since) + moment
	}
	if !c.Crashed.IsZero() {
		c.Watch.Crash = c.Hours(c.Crashed) + moment
	}
}

const moment = 1e-6 // hours

// readings takes those that count.
func (c *Course) readings(v journal.View) {
	from, scale := c.basis(v)
	other, primed, suspect := 0, 0, 0
	for k := range v.Values {
		if one := &v.Values[k]; one.Suspect && !one.Void && !one.Source.TakenAt.After(c.Now) {
			suspect++
		}
	}
	list := v.Counting()
	alone := !slices.ContainsFunc(list, func(one *journal.Value) bool { return one.Source.Instrument != list[0].Source.Instrument })
	for _, one := range list {
		at := one.Source.TakenAt
		switch {
		case at.After(c.Now):
		case !from.at.IsZero() && !at.After(from.at):
			other++
		case !c.Primed.IsZero() && at.After(c.Primed):
			primed++
		case !c.Crashed.IsZero() && at.After(c.Crashed):
			c.Cold++
		default:
			r := readingOf(one, c.Hours(at), alone)
			r.Points *= scale(at)
			c.Batch.Readings = append(c.Batch.Readings, r)
			c.Last = one
		}
	}
	for _, left := range []struct {
		n    int
		text string
	}{
		{other, "from before the " + from.what + " left out: they belong to another original gravity"},
		{primed, "after priming left out"},
		{c.Cold, "after the cold crash left out: cold yeast stands still"},
		{suspect, "kept as suspect left out"},
	} {
		if left.n > 0 {
			c.note(method.Interpreted, "%s %s", count(left.n, "reading"), left.text)
		}
	}
}

// change is the last change of the original gravity that no shift makes good.
type change struct {
	at   time.Time
	what string
}

// basis gives that change, and the factor by which water shifts a reading.
func (c *Course) basis(v journal.View) (from change, scale func(time.Time) float64) {
	type water struct {
		at    time.Time
		share float64
	}
	var waters []water
	before := points(v.OG.SG)
	for _, s := range v.Basis {
		if !s.At.Before(c.Now) {
			break
		}
		after := points(s.SG)
		if s.Why == journal.Dilution && before > 0 {
			waters = append(waters, water{s.At, after / before})
		} else if c.Hours(s.At) > 0 {
			from, waters = change{s.At, s.Why}, nil
		}
		before = after
	}
	return from, func(at time.Time) float64 {
		f := 1.0
		for _, w := range waters {
			if !at.After(w.at) {
				f *= w.share
			}
		}
		return f
	}
}

// limit takes the forced ferment of the liquid as it is: one from before an addition
// was of another.
func (c *Course) limit(v journal.View) {
	if v.Limit == nil {
		return
	}
	for _, s := range v.Basis {
		if s.At.Before(c.Now) && !limitAt(v).After(s.At) {
			c.note(method.Interpreted, "the forced ferment is from before the %s: its limit is not used", s.Why)
			return
		}
	}
	sg, err := gravity.Fits.Default().Fn.SG(*v.Limit)
	if err != nil || gravity.CheckSG(sg) != nil {
		return
	}
	c.Watch.Limit, c.Watch.LimitKnown = points(sg), true
}

// limitAt is when the forced ferment was read that v.Limit is of.
func limitAt(v journal.View) (at time.Time) {
	for _, l := range v.Record.Limits {
		if !l.Void && !l.Body.At.Before(at) {
			at = l.Body.At
		}
	}
	return at
}

// count gives "1 reading" and "3 readings".
func count(n int, what string) string {
	if n == 1 {
		return "1 " + what
	}
	return fmt.Sprintf("%d %ss", n, what)
}
