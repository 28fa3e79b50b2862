package main

import (
	"errors"
	"fmt"
	"slices"
	"strings"
	"time"

	"gylebook/attenuation/journal"
	"gylebook/gravity"
	"gylebook/tables"
)

// lineTable is readings and deeds in the order of time.
func (b *bench) lineTable(v journal.View) tables.Table {
	t := tables.Table{Columns: []tables.Column{
		{Head: "#", Align: tables.Right},
		{Head: "taken"},
		{Head: "read", Align: tables.Right},
		{Head: "at", Align: tables.Right},
		{Head: "SG", Align: tables.Right},
		{Head: "24 h", Align: tables.Right},
		{Head: "app. %", Align: tables.Right},
		{Head: "by"},
		{Head: ""},
	}, Foot: []string{"24 h: fall in points; app. %: apparent attenuation on extract; " + coversAll(v)}}
	for _, l := range lines(v) {
		t.Rows = append(t.Rows, append(l.row(), l.remark))
	}
	return b.hanging(t)
}

// coversAll says whether the error of their instruments is in the readings that count.
func coversAll(v journal.View) string {
	with, without := false, false
	for k := range v.Values {
		if one := &v.Values[k]; one.Counts() {
			with, without = with || one.Result.Budget.Record, without || !one.Result.Budget.Record
		}
	}
	if with && without {
		return "instrument error included where an instrument is named"
	}
	return covers(with)
}

// hanging carries the last column over to further rows, so that the table fits.
func (b *bench) hanging(t tables.Table) tables.Table {
	last := len(t.Columns) - 1
	room := b.set.width - 2*last
	for k, col := range t.Columns[:last] {
		widest := max(1, tables.Width(col.Head))
		for _, row := range t.Rows {
			widest = max(widest, tables.Width(tables.Clean(row[k])))
		}
		room -= widest
	}
	rows := t.Rows
	t.Rows = nil
	for _, row := range rows {
		for k, part := range tables.Wrap(tables.Clean(row[last]), max(room, 10)) {
			if k > 0 {
				row = make([]string, last+1)
			}
			t.Rows = append(t.Rows, append(slices.Clone(row[:last]), part))
		}
	}
	return t
}

// row is a line without its remark.
func (l line) row() []string {
	return append([]string{fmt.Sprint(l.number), l.at.Format("01-02 15:04")}, l.cells...)
}

// line is one reading or deed in its place in time.
type line struct {
	at     time.Time
	number int64
	cells  []string
	remark string
}

// lines puts readings, original gravities, limits and events in one order.
func lines(v journal.View) []line {
	var all []line
	deed := func(at time.Time, number int64, by string, void bool, reason, text string) {
		if void {
			text = "void: " + reason + " (" + text + ")"
		}
		all = append(all, line{at, number, []string{"", "", "", "", "", by}, text})
	}
	for _, og := range v.Record.OGs {
		text := "OG " + og.Body.Gravity.Text
		if og.Body.Temp.Text != "" {
			text += " at " + og.Body.Temp.Text
		}
		deed(og.Body.At, og.Number, og.By, og.Void, og.VoidReason, text)
	}
	for _, l := range v.Record.Limits {
		deed(l.Body.At, l.Number, l.By, l.Void, l.VoidReason, "limit "+l.Body.Gravity.Text)
	}
	for _, x := range v.Record.Volumes {
		deed(x.Body.At, x.Number, x.By, x.Void, x.VoidReason, "volume "+x.Body.Volume+" L")
	}
	for _, e := range v.Record.Given {
		if e.Body.Batch != v.Record.Batch.ID {
			deed(e.Body.At, e.Number, e.By, e.Void, e.VoidReason, givenText(e.Body))
		}
	}
	for _, e := range v.Record.Events {
		deed(e.Body.At, e.Number, e.By, e.Void, e.VoidReason, eventText(e.Body))
	}
	if c := v.Record.Closed; c != nil {
		deed(c.Body.At, c.Number, c.By, false, "", strings.TrimSpace("closed "+c.Body.Note))
	}
	for k := range v.Values {
		one := &v.Values[k]
		all = append(all, line{one.Source.TakenAt, one.Number, valueCells(v, one), remarkOf(one)})
	}
	slices.SortStableFunc(all, func(x, y line) int {
		if d := x.at.Compare(y.at); d != 0 {
			return d
		}
		return int(x.number - y.number)
	})
	return all
}

// valueCells are: read, temperature, SG, fall in 24 h, apparent attenuation, who.
func valueCells(v journal.View, one *journal.Value) []string {
	cells := []string{one.Source.Gravity.Text, one.Source.Temp.Text, none, none, none, one.By}
	if one.Err != nil {
		return cells
	}
	if one.Typed.Scale != gravity.ScaleSG {
		cells[0] = one.Typed.ReadAs()
	}
	cells[1] = one.Temp.Typed.String() + " °" + one.Temp.Unit
	cells[2] = fixed(float64(one.Result.SG), 4)
	if f, ok := fallTo(v, one); ok {
		cells[3] = fixed(24*f.points/f.hours, 1)
	}
	if one.Attenuation != nil && !one.Void {
		cells[4] = fixed(one.Attenuation.Apparent, 1)
	}
	return cells
}

// remarkOf says what else is to be known of a reading.
func remarkOf(one *journal.Value) string {
	var parts []string
	var other *journal.InstrumentError
	switch status, reason := statusOf(one); {
	case status == statusOK && one.Replicates > 1:
		parts = append(parts, "one of "+fixed(float64(one.Replicates), 0))
	case status == statusUncorrected && errors.As(one.Err, &other):
		parts = append(parts, other.ID+", "+other.Why)
	case status == statusUncorrected:
		parts = append(parts, reason)
	case status != statusOK:
		parts = append(parts, status+": "+reason)
	}
	if one.Source.Gassy {
		parts = append(parts, "gassy")
	}
	if one.Source.Quality == journal.Estimated {
		parts = append(parts, "time estimated")
	}
	if one.Source.Note != "" {
		parts = append(parts, one.Source.Note)
	}
	return strings.Join(parts, "; ")
}

// explainBatch repeats the steps of every reading.
func explainBatch(v journal.View) []string {
	var out []string
	for k := range v.Values {
		out = append(out, explainValue(&v.Values[k])...)
	}
	return out
}

// explainValue is the correction of one reading in a line; correct --instrument
// --explain has every coefficient.
func explainValue(one *journal.Value) []string {
	if one.Err != nil {
		return nil
	}
	res := one.Result
	parts := []string{
		"read " + one.Typed.ReadAs() + " at " + one.Temp.ReadAs(),
		"instrument " + shortSigned(res.Meniscus+res.Instrument(), 5),
		"temperature " + shortSigned(res.Temperature, 5),
		"corrected " + fixed(res.Corrected, 5) + " by " + res.Method.ID + " (" + res.Method.Source.String() + ")",
	}
	if one.OE > 0 {
		parts = append(parts, "original extract "+fixed(float64(one.OE), 4)+" %")
	}
	return []string{minuteText(one.Source.TakenAt) + ": " + strings.Join(parts, ", ")}
}
