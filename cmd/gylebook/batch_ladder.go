package main

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"gylebook/attenuation"
	"gylebook/attenuation/journal"
	"gylebook/gravity/asread"
	"gylebook/tables"
)

// showLadder is a batch in words: what it is, where it stands, how it got there.
func (b *bench) showLadder(v journal.View) *tables.Ladder {
	rec := v.Record
	state := "open"
	if rec.Void {
		state = "void: " + rec.VoidReason
	} else if rec.Closed != nil {
		state = "closed " + day(rec.Closed.Body.At)
	} else if d, ok := v.Days(b.set.now); ok && d >= 0 {
		state += ", day " + fixed(math.Floor(d), 0)
	}
	l := &tables.Ladder{Answer: []string{strings.TrimSpace(v.Vessel() + " " + rec.Batch.ID + " " + rec.Batch.Product), state}}
	l.Rungs = append(factRungs(v), presentRungs(v)...)
	if rec.Batch.Note != "" {
		l.Lines = append(l.Lines, rec.Batch.Note)
	}
	for _, n := range v.Notes {
		l.Lines = append(l.Lines, n.Text)
	}
	return l
}

// factRungs are what was entered about the batch itself.
func factRungs(v journal.View) []tables.Rung {
	b := v.Record.Batch
	rungs := []tables.Rung{{Name: "pitched", Value: minuteText(v.Pitched), Remark: b.Yeast}}
	last := &rungs[0]
	if b.Pitched == nil && !v.Pitched.IsZero() {
		last.Remark = strings.TrimPrefix(last.Remark+"; by the first reading", "; ")
	}
	if b.Generation > 0 {
		last.Remark = strings.TrimPrefix(fmt.Sprintf("%s, generation %d", last.Remark, b.Generation), ", ")
	}
	if b.Parent != "" {
		last.Remark = strings.TrimPrefix(last.Remark+", cropped from "+b.Parent, ", ")
	}
	if litres := v.Record.Volume(); litres != "" {
		rungs = append(rungs, tables.Rung{Name: "volume", Value: litres, Remark: "L at 20 °C"})
	}
	og := tables.Rung{Name: "original", Value: none, Remark: "original gravity not known"}
	if v.OG != nil {
		og.Value, og.Remark = fixed(float64(v.OG.SG), 4), "SG 20/20, "+plato(v.OG.Extract)
		if v.OG.N > 1 {
			og.Remark += fmt.Sprintf(", mean of %d within %s points", v.OG.N, fixed(1000*v.OG.Spread, 1))
		}
	}
	rungs = append(rungs, og)
	for _, step := range v.Basis {
		r := tables.Rung{Name: "effective", Value: none, Remark: step.Why}
		if step.OE > 0 {
			r.Value, r.Remark = fixed(float64(step.SG), 4), "SG 20/20, "+plato(step.OE)+", after "+step.Why
		}
		rungs = append(rungs, r)
	}
	if used := instrumentsOf(v); used != "" {
		rungs = append(rungs, tables.Rung{Name: "read with", Value: used})
	}
	return rungs
}

// instrumentsOf lists the instruments of the readings that count.
func instrumentsOf(v journal.View) string {
	var used []string
	for _, one := range v.Values {
		if id := one.Source.Instrument; !one.Void && id != "" && !slices.Contains(used, id) {
			used = append(used, id)
		}
	}
	return strings.Join(used, ", ")
}

// presentRungs are the figures of the last reading that counts.
func presentRungs(v journal.View) []tables.Rung {
	last := v.Last()
	if last == nil {
		return []tables.Rung{{Name: "present", Value: none, Remark: "no reading that counts"}}
	}
	rungs := []tables.Rung{{
		Name: "present", Value: fixed(float64(last.SG), 4),
		Remark: fmt.Sprintf("SG 20/20, %s apparent, ±%s (k=2), %s", plato(last.Extract), uncertainty(last), minuteText(last.Source.TakenAt)),
	}}
	if f, ok := v.Fall24h(); ok {
		rungs = append(rungs, tables.Rung{Name: "fall", Value: fixed(f, 1), Remark: "points in 24 h, between the last two readings"})
	}
	a := last.Attenuation
	if a == nil {
		return append(rungs, tables.Rung{Name: "attenuation", Value: none, Remark: last.Why}, tables.Rung{Name: "alcohol", Value: none, Remark: last.AlcoholWhy})
	}
	rungs = append(
		rungs,
		tables.Rung{Name: "real extract", Value: fixed(float64(a.RE), 2), Remark: "°P (Balling)"},
		tables.Rung{Name: "apparent attenuation", Value: fixed(a.Apparent, 1), Remark: "% on extract; " + fixed(a.ApparentPoints, 1) + " % on points"},
		tables.Rung{Name: "real attenuation", Value: fixed(a.Real, 1), Remark: "% on extract"},
	)
	alcohol := tables.Rung{Name: "alcohol", Value: none, Remark: last.AlcoholWhy}
	if last.Alcohol != nil {
		alcohol.Value, alcohol.Remark = fixed(float64(last.Alcohol.ABV), 2), "% vol at 20 °C ("+attenuation.ABVMethods.Default().ID+")"
	}
	rungs = append(rungs, alcohol)
	if v.Limit != nil {
		d := attenuation.LimitDifference(a.OE, a.AE, *v.Limit)
		rungs = append(rungs, tables.Rung{Name: "to the limit", Value: asSigned(d), Remark: "points of % apparent attenuation below the forced ferment at " + plato(*v.Limit)})
	}
	return rungs
}

// uncertainty is U of a corrected value with its unit, in its own scale.
func uncertainty(one *journal.Value) string {
	info := one.Typed.Scale.Info()
	text := asread.Fixed(one.Result.Budget.Expanded, info.Decimals, asread.HalfEven)
	if info.ID == "sg" {
		return text
	}
	return text + " " + info.Symbol
}
