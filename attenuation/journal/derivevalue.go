package journal

import (
	"fmt"
	"slices"
	"time"

	"gylebook/attenuation"
	"gylebook/gravity"
	"gylebook/gravity/method"
)

// values corrects the readings of the span, the newest first so that it can end
// early.
func (v *View) values(book *Book, readings []Numbered[Reading], s span) {
	// Readings of one minute follow each other: only the last minute is compared.
	minutes, last := 0, time.Time{}
	if !s.limited {
		v.Values = make([]Value, 0, len(readings))
	}
	for k := len(readings) - 1; k >= 0; k-- {
		r := &readings[k]
		if !s.until.IsZero() && r.Body.TakenAt.After(s.until) {
			continue
		}
		m := minute(r.Body.TakenAt)
		counted := minutes > 0 && m.Equal(last)
		if s.limited && minutes >= s.last && !counted {
			break
		}
		one := v.correct(book, r)
		if one.Counts() && !counted {
			minutes, last = minutes+1, m
		}
		v.Values = append(v.Values, one)
	}
	slices.Reverse(v.Values)
}

func minute(t time.Time) time.Time { return t.UTC().Truncate(time.Minute) }

// correct corrects one reading with the original extract in force at its time.
func (v *View) correct(book *Book, r *Numbered[Reading]) Value {
	one := Value{
		Number: r.Number, By: r.By, Void: r.Void, VoidReason: r.VoidReason,
		Source: r.Body, Suspect: r.Body.Keep != "",
	}
	one.OE, one.OG, one.Why = v.OEAt(r.Body.TakenAt)
	one.Err = one.fill(book)
	if one.Err != nil {
		one.Why = one.Err.Error()
	}
	return one
}

func (one *Value) fill(book *Book) (err error) {
	r := one.Source
	if one.Typed, err = r.Gravity.Reading(); err != nil {
		return err
	}
	if one.Temp, err = r.Temp.Temperature(); err != nil {
		return err
	}
	h, notes, err := book.Hydrometer(r.Instrument, r.TakenAt)
	if err != nil {
		return err
	}
	res, more, err := correctTyped(h, one.Typed, one.Temp, one.OE, book.Plain)
	if err != nil {
		return err
	}
	one.Result, one.SG, one.Extract = res, res.SG, res.Extract
	one.Notes = slices.Concat(notes, more)
	if r.Gassy {
		one.Notes = append(one.Notes, method.Note{Code: NoteGassy, Text: "not degassed: bubbles lift the instrument, the reading may be high"})
	}
	return nil
}

// replicates gives readings that count, of one minute and one original extract,
// their mean. Sums run over sorted values, so that the order of entry does not
// show in the last digit.
func (v *View) replicates() {
	fit := gravity.Fits.Default().Fn
	for from := 0; from < len(v.Values); {
		to := from + 1
		for to < len(v.Values) && minute(v.Values[to].Source.TakenAt).Equal(minute(v.Values[from].Source.TakenAt)) {
			to++
		}
		same := v.Values[from:to]
		from = to
		groups := make(map[gravity.Plato][]*Value)
		for k := range same {
			if same[k].Counts() {
				groups[same[k].OE] = append(groups[same[k].OE], &same[k])
			}
		}
		for _, g := range groups {
			if len(g) < 2 {
				continue
			}
			sgs := make([]float64, len(g))
			for k, one := range g {
				sgs[k] = float64(one.SG)
			}
			sg := gravity.SG(mean(sgs))
			for _, one := range g {
				one.SG, one.Extract, one.Mean, one.Replicates = sg, fit.Extract(sg), true, len(g)
			}
		}
	}
}

func mean(xs []float64) float64 {
	slices.Sort(xs)
	sum := 0.0
	for _, x := range xs {
		sum += x
	}
	return sum / float64(len(xs))
}

// ukDuty is the rule, and the method, under which a primed product counts at its
// expected strength.
const ukDuty = "uk-duty"

// figures fills attenuation and alcohol of one value.
func (v *View) figures(one *Value) {
	if one.Err != nil || one.OE <= 0 {
		one.AlcoholWhy = one.Why
		return
	}
	g := attenuation.Gravities{OG: one.OG, FG: one.SG, OE: one.OE, AE: one.Extract}
	a, err := attenuation.Attenuate(g)
	if err != nil {
		one.Why, one.AlcoholWhy = err.Error(), err.Error()
		return
	}
	one.Attenuation = &a
	if v.abv.ID == ukDuty && !v.Primed.IsZero() && !one.Source.TakenAt.Before(v.Primed) {
		one.AlcoholWhy = primedReason
		return
	}
	alcohol, err := v.abv.Fn(g)
	if err == nil && !finite(float64(alcohol.ABV)) {
		err = fmt.Errorf("%s gives no alcohol here", v.abv.ID)
	}
	if err != nil {
		one.AlcoholWhy = err.Error()
		return
	}
	one.Alcohol = &alcohol
}

const primedReason = "primed: a conditioned or primed product counts at its expected strength"
