package main

import (
	"context"
	"fmt"
	"math"
	"slices"
	"strings"
	"time"

	"gylebook/attenuation/journal"
	"gylebook/attenuation/outlook"
	"gylebook/gravity"
	"gylebook/tables/chart"
)

// picture is the course of a batch drawn and told: what the lines say is what the
// drawing shows.
type picture struct {
	course chart.Course
	lines  []string
	curves func(*chart.Course) // puts in what is costly; nil is nothing
}

const (
	enveloped   = 10  // finished batches behind the course
	curveSteps  = 72  // along the time axis
	pictureLag  = 6.0 // hours shown at least
	lookAhead   = 1.3 // of the time to the end
	mostAhead   = 21  // days shown after the last reading
	hoursOfADay = 24.0
)

// pictureOf draws a batch at the time of the foresight. The forecast may be missing,
// for the reason that is told.
func pictureOf(ctx context.Context, r journal.Reader, f *foresight, rec *journal.Record) (picture, error) {
	p, err := sketchOf(ctx, r, f, rec)
	if err != nil {
		return picture{}, err
	}
	return p.drawn(), nil
}

// drawn is the picture with its curves, which are most of the work.
func (p picture) drawn() picture {
	if p.curves != nil {
		p.curves(&p.course)
	}
	return p
}

// sketchOf is pictureOf without the curves: all that the lines say.
func sketchOf(ctx context.Context, r journal.Reader, f *foresight, rec *journal.Record) (picture, error) {
	v := journal.Derive(rec, f.book)
	p := picture{course: chart.Course{
		Title:  strings.TrimSpace(v.Vessel() + " " + rec.Batch.ID + " " + rec.Batch.Product),
		XLabel: "days since pitching", YLabel: "SG 20/20",
	}}
	start := v.Pitched
	if start.IsZero() {
		start, p.course.XLabel = rec.Batch.Opened, "days since opening"
	}
	days := func(at time.Time) float64 { return at.Sub(start).Hours() / hoursOfADay }
	p.marks(v, days)
	p.limit(v)
	h, err := f.history(rec)
	if err != nil {
		return p, err
	}
	end := p.last()
	o, why := outlook.Of(f.view(rec), h, f.at)
	if why == nil && o.Curve.Curve && !v.Pitched.IsZero() {
		end = p.foretell(v, o, end)
	} else {
		p.lines = append(p.lines, noCurve(o, why))
	}
	if err := p.behind(ctx, r, f, v, end); err != nil {
		return p, err
	}
	p.deeds(v, days)
	return p, nil
}

func noCurve(o outlook.Forecast, why error) string {
	switch {
	case why != nil:
		return "No curve: " + why.Error() + "."
	case !o.Curve.Curve:
		return "No curve: " + counted(o.Curve.N, "reading") + ", wanted 3."
	}
	return "No curve: the time of pitching is not known."
}

// marks are the readings, with the expanded uncertainty of each.
func (p *picture) marks(v journal.View, days func(time.Time) float64) {
	hollow, not := 0, 0
	var counting []*journal.Value
	for k := range v.Values {
		one := &v.Values[k]
		if one.Err != nil {
			not++
			continue
		}
		m := chart.Mark{X: days(one.Source.TakenAt), Y: float64(one.SG), U: outlook.ExpandedPoints(one) / 1000, Hollow: one.Void || one.Suspect}
		if m.Hollow {
			hollow++
		} else {
			counting = append(counting, one)
		}
		p.course.Marks = append(p.course.Marks, m)
	}
	p.lines = append(p.lines, fellText(v, counting))
	if hollow > 0 {
		p.lines = append(p.lines, counted(hollow, "hollow mark")+": void or suspect, outside the reckoning.")
	}
	if not > 0 {
		p.lines = append(p.lines, counted(not, "reading")+" could not be corrected and cannot be drawn.")
	}
}

func fellText(v journal.View, list []*journal.Value) string {
	if len(list) == 0 {
		return "No reading that counts."
	}
	first, last := list[0], list[len(list)-1]
	if len(list) == 1 {
		return fmt.Sprintf("One reading: %s on %s.", fixed(float64(first.SG), 4), minuteText(first.Source.TakenAt))
	}
	text := fmt.Sprintf("%s from %s on %s to %s on %s",
		counted(len(list), "reading"), fixed(float64(first.SG), 4), minuteText(first.Source.TakenAt),
		fixed(float64(last.SG), 4), minuteText(last.Source.TakenAt))
	if a := last.Attenuation; a != nil {
		text += fmt.Sprintf(", %s %% apparent attenuation", fixed(a.Apparent, 1))
	}
	return text + "; bars are the expanded uncertainty (k = 2)."
}

func (p *picture) limit(v journal.View) {
	if v.Limit == nil {
		return
	}
	if sg, err := gravity.Fits.Default().Fn.SG(*v.Limit); err == nil {
		p.course.Limit = &chart.Level{Name: "limit of attenuation", Y: float64(sg)}
		p.lines = append(p.lines, fmt.Sprintf("The limit of attenuation, by the forced ferment, is %s.", fixed(float64(sg), 4)))
	}
}

// last is the newest mark, in days.
func (p *picture) last() float64 {
	end := pictureLag / hoursOfADay
	for _, m := range p.course.Marks {
		end = math.Max(end, m.X)
	}
	return end
}

// behind is the envelope of the last finished batches of the same product and yeast.
func (p *picture) behind(ctx context.Context, r journal.Reader, f *foresight, v journal.View, end float64) error {
	if v.Pitched.IsZero() {
		return nil
	}
	hours := steps(0, end)
	for k := range hours {
		hours[k] *= hoursOfADay
	}
	b := v.Record.Batch
	before := f.at
	if c := v.Record.Closed; c != nil && c.Body.At.Before(before) {
		before = c.Body.At
	}
	e, err := outlook.EnvelopeOf(ctx, r, f.book, b.Product, b.Yeast, before, enveloped, hours)
	if err != nil || len(e.Hours) < 2 {
		return err
	}
	for k := range e.Hours {
		e.Hours[k] /= hoursOfADay
	}
	name := fmt.Sprintf("last %d batches", len(e.Batches))
	p.course.Envelope = &chart.Band{Name: name, X: e.Hours, Low: e.Low, High: e.High}
	k := len(e.Hours) - 1
	p.lines = append(p.lines, fmt.Sprintf("Behind it the span of the last %d finished batches of this product and yeast (%s): on day %s they stood between %s and %s.",
		len(e.Batches), strings.Join(e.Batches, ", "), fixed(e.Hours[k], 1), fixed(e.Low[k], 4), fixed(e.High[k], 4)))
	return nil
}

// deeds are what was done to the batch, as flags in the order of time.
func (p *picture) deeds(v journal.View, days func(time.Time) float64) {
	events := slices.DeleteFunc(slices.Clone(v.Record.Events), func(e journal.Numbered[journal.Event]) bool { return e.Void })
	slices.SortStableFunc(events, func(a, b journal.Numbered[journal.Event]) int { return a.Body.At.Compare(b.Body.At) })
	var said []string
	for _, e := range events {
		x := days(e.Body.At)
		p.course.Flags = append(p.course.Flags, chart.Flag{X: x, Text: e.Body.What})
		said = append(said, fmt.Sprintf("day %s %s", fixed(x, 1), eventText(e.Body)))
	}
	if !p.course.Numbered(chart.Page) {
		if len(said) > 0 {
			p.lines = append(p.lines, "Flags: "+strings.Join(said, "; ")+".")
		}
		return
	}
	for k := range said {
		said[k] = fmt.Sprintf("%d: %s", k+1, said[k])
	}
	p.lines = append(p.lines, "Flags, by number: "+strings.Join(said, "; ")+".")
}
