package main

import (
	"cmp"
	"fmt"
	"strings"

	"gylebook/gravity"
	"gylebook/tables"
)

// logLadder is logLines for a page, where the corrected value is what the eye is to
// find first.
func logLadder(l logged) *tables.Ladder {
	rec, one := l.view.Record, l.value
	name := strings.TrimSpace(one.Source.Vessel + " " + rec.Batch.ID + " " + rec.Batch.Product)
	read := tables.Rung{Name: "read", Value: one.Source.Gravity.Text, Remark: "at " + one.Source.Temp.Text}
	if one.Source.Instrument != "" {
		read.Remark += ", " + one.Source.Instrument
	}
	read.Remark += ", " + minuteText(one.Source.TakenAt)
	page := &tables.Ladder{Answer: []string{none + " not corrected", name}, Rungs: []tables.Rung{read}}
	if l.entry.Number != unwritten {
		page.Answer = append(page.Answer, fmt.Sprintf("#%d", l.entry.Number))
	}
	if one.Err != nil {
		page.Lines = []string{one.Err.Error()}
		return page
	}
	page.Rungs[0].Value, page.Rungs[0].Remark = one.Typed.ReadAs(), strings.Replace(read.Remark, one.Source.Temp.Text, one.Temp.ReadAs(), 1)
	page.Answer[0] = fixed(float64(one.Result.SG), 4)
	corrected := tables.Rung{Name: "corrected", Value: page.Answer[0], Remark: "SG 20/20, " + plato(one.Result.Extract) + ", ±" + uncertainty(one) + " (k=2)"}
	if one.Typed.Scale != gravity.ScaleSG && one.Typed.Scale.IsMass() {
		page.Answer[0] = plato(one.Result.Extract)
	}
	page.Rungs = append(page.Rungs, corrected)
	if one.Suspect {
		page.Lines = []string{"kept as suspect: " + one.Source.Keep}
		return page
	}
	if f, ok := fallTo(l.view, one); ok {
		page.Rungs = append(page.Rungs, tables.Rung{Name: "fall", Value: fixed(f.points, 1), Remark: "points in " + hoursText(f.hours)})
	}
	apparent := tables.Rung{Name: "apparent attenuation", Value: none, Remark: cmp.Or(one.Why, "not known")}
	if a := one.Attenuation; a != nil {
		apparent.Value, apparent.Remark = fixed(a.Apparent, 1), "% on extract"
	}
	page.Rungs = append(page.Rungs, apparent)
	return page
}
